"""How what is left of equilibrium changes with the places: Newton's equations, stiffness, speeds of free members."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.mechanics.held import State, Work
from linkcalc.mechanics.motion import fastest, moved
from linkcalc.mechanics.pushing import Column
from linkcalc.mechanics.sums import dot, plus, small
from linkcalc.parts.pose import Array, Codes, Poses, Value, zero

_HAIR = 1e-5  # how far to either side the forces are looked at, in sizes of the mechanism or radians
_NEUTRAL = 1e-7  # stiffness over the largest force and the size of the mechanism: neither stable nor unstable


def tangent_of(work: Work, state: State) -> Tangent:
    multipliers = [-z for z in state.closed.factored.solve(state.total, transposed=True)]
    slopes = [_bent(work, state.closed.at, v, multipliers, state.unknown) for v in state.rates]
    tangent = Tangent(work, state, multipliers, slopes)
    if (work.chain.rubs or work.pushing.rubbing) and work.drive is not None:
        work.sense = settled_speed(work, tangent)
    return tangent


def settled_speed(work: Work, tangent: Tangent) -> list[Value]:
    """Of the coordinates per unit of the drive, the free members following."""
    state = tangent.state
    bend = _bent(work, state.closed.at, state.closed.speed, tangent.multipliers, state.unknown)
    rates = tangent.following([dot(v, bend) for v in state.ways])
    speed = list(state.closed.speed)
    with np.errstate(all="ignore"):
        for k, way in enumerate(state.rates):
            speed = [a + rates[..., k] * b if not zero(b) else a for a, b in zip(speed, way, strict=True)]
    return speed


def _bent(work: Work, at: Poses, way: Sequence[Value], multipliers: Sequence[Value], unknown: Value) -> Column:
    """How the forces on the coordinates change along a way, those of the joints turning with them."""
    hair = _HAIR / np.maximum(fastest(work.chain, way) / work.chain.size, 1e-300)
    sides = []
    for sense in (1.0, -1.0):
        there = moved(at, [-sense * hair * v if not zero(v) else 0.0 for v in way])
        known, unit = work.forces(there)
        whole = plus(known, unknown, unit) if work.asked else known
        held = [place.hold(0.0) for place in work.places]
        entries = work.chain.equations(there, work.drive, held)[1]
        for (i, j), e in zip(work.chain.places, entries, strict=True):
            whole[j] = whole[j] + e * multipliers[i]
        sides.append(whole)
    return [(a - b) / (2 * hair) if not (zero(a) and zero(b)) else 0.0 for a, b in zip(*sides, strict=True)]


class Tangent:
    """How the powers of a state change with the places.

    free     (count, count, case, variant, pose) along the places, at a constant unknown
    reduced  (case, variant, pose, count, count) the same, the unknown following
    """

    def __init__(self, work: Work, state: State, multipliers: Sequence[Value], slopes: Sequence[Column]):
        self.state, self.multipliers = state, multipliers
        self._work, self._asked = work, len(state.ways) > len(state.rates)
        shape = work.shape(state.closed.at)
        rows = [[np.broadcast_to(dot(v, slope), shape) for slope in slopes] for v in state.ways]
        matrix = np.stack([np.stack(row, -1) for row in rows], -2)
        own = matrix[..., 1:, :] if self._asked else matrix
        self.free: Array = np.moveaxis(own, (-2, -1), (0, 1))
        self.reduced: Array = own
        if self._asked:
            with np.errstate(all="ignore"):
                self._share = [np.divide(u, state.powers[0]) for u in state.powers[1:]]
                lead = np.stack([np.broadcast_to(u, shape) for u in self._share], -1)[..., :, None]
                self.reduced = own - lead * matrix[..., :1, :]
        most = state.most
        for m, size in zip(multipliers, work.chain.row_size, strict=True):
            if not zero(m):
                most = np.maximum(most, np.abs(m) / size)
        self._most = most

    def steady(self) -> Codes:
        """+1 stable, 0 neutral, -1 unstable: the sign of the least stiffness, nothing but rounding apart."""
        fast = np.stack([np.broadcast_to(f, self.free.shape[2:]) for f in self.state.fast])
        k = np.moveaxis(-self.free / (fast[:, None] * fast), (0, 1), (-2, -1))
        sound = np.isfinite(k).all(axis=(-1, -2))
        least = np.linalg.eigvalsh(np.where(sound[..., None, None], (k + np.swapaxes(k, -1, -2)) / 2, 0.0))[..., 0]
        slack = _NEUTRAL * self._most / self._work.chain.size
        return np.asarray(np.where(np.abs(least) <= slack, 0, np.sign(least)), np.int8)

    def following(self, bend: Sequence[Value]) -> Array:
        """(..., count) rates of the places per unit of the drive, from how the powers change along the drive."""
        own = [b - s * bend[0] for b, s in zip(bend[1:], self._share, strict=True)] if self._asked else list(bend)
        right = np.stack([np.broadcast_to(b, self.reduced.shape[:-2]) for b in own], -1)
        return -small(self.reduced, right)
