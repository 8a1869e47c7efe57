"""Where free members settle: equilibrium and closure solved together, over a batch.

With the places p held, everything follows from the drive and p: the pose, its speeds v0 (of the drive) and v1, v2, ...
(of each place), and the power v·Q of all that acts along each of them. The unknown (effort or load) makes the power
along v0 nothing; what is left along v1, v2, ... must vanish too: g(p) = 0, by Newton's first step and Broyden's after
it (C. G. Broyden, Mathematics of Computation 19, 1965, pp. 577-593). The tangent K of the powers by p comes from the
forces at two poses a hair to either side, joint forces included, so no part needs second derivatives; g itself is
exact, so that only the number of steps hangs on K. K of the free freedoms at a held drive and a constant effort is
their stiffness with the sign turned: stable if all its eigenvalues are below nothing.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from linkcalc.mechanics.batch import tops
from linkcalc.mechanics.held import STILL, Work
from linkcalc.mechanics.loose import Loose, Places
from linkcalc.mechanics.motion import Closed, fastest
from linkcalc.mechanics.pushing import Column, Pushing, add_pushes, column
from linkcalc.mechanics.sums import small
from linkcalc.mechanics.tangent import settled_speed, tangent_of
from linkcalc.parts.pose import Array, Codes, Mask, Poses, Value, zero

TELLS_BADLY = 30.0  # times the speed of the places that a coordinate goes: others would tell the pose better
_LAST = 1e-6  # no longer step is taken in a pose that is in balance already
_SMALLEST = 1e-15  # a step as small changes nothing
_ANEW = (2, 5, 8)  # steps without gain after which the tangent is taken anew
_IDLE = 12  # steps without gain after which it is given up
_LONGEST = 0.25  # of the size or a radian: the longest step
_STEPS = 40
_CHUNK, _CHUNKS = 12, 25  # steps with the same places on the way to rest, and how often they are chosen


@dataclass(frozen=True, eq=False)
class Settled:
    """A batch of settled poses, (case, variant, pose).

    closed     with the speeds of the settled motion per unit of the drive, free members following
    unknown    what the effort (or the load, if that is asked for) was found to be
    stiffness  (count, count, case, variant, pose) of the free freedoms at a held drive, in the places' coordinates
    matrix     (case, variant, pose, count, count) how what is left changes with the places, the unknown following
    rates      speeds of the coordinates per unit of each place
    """

    closed: Closed
    unknown: Value
    stiffness: Array
    matrix: Array
    rates: list[list[Value]]

    @property
    def steady(self) -> Codes:
        """(case, variant, pose) +1 stable, 0 neutral, -1 unstable"""
        assert self.closed.steady is not None
        return self.closed.steady

    @property
    def reach(self) -> float:
        """Largest speed of a coordinate per unit of a place, sizes and radians: large where the places tell badly."""
        return max(tops([v for rate in self.rates for v in rate]))


def settle(
    loose: Loose, places: Places, guess: Poses, target: Value | None, pushing: Pushing, unknown: Value,
    *, relax: bool = False, steps: int = _STEPS, along: Sequence[Value] | None = None, matrix: Array | None = None,
) -> Settled:  # fmt: skip
    """Settle a batch from a guess; entries that find no balance are told by ``closed.fine``. Raises NoPlan.

    target  [rad or m] value of the drive; None: there is none
    relax   go down to a stable balance, rather than to the nearest
    along   speeds of the settled motion near by, which tell friction its sense; None: those of the drive alone
    matrix  that of a pose near by, with the same places, to begin with
    """
    work = Work(loose, places, pushing, target)
    work.sense = along
    shape = work.shape(guess)
    at = _filled(guess, shape)
    p = np.stack([_grown(place.value(guess), shape) for place in places], -1)
    done: Mask = np.zeros(shape, bool)
    last, before = None, None
    best, idle = np.full(shape, np.inf), 0
    for _ in range(steps):
        state = work.state(at, p, unknown)
        unknown, done = state.unknown, done | state.still
        if bool(np.all(done | ~np.isfinite(state.size))) and not relax:
            break
        better = state.size < 0.7 * best
        best, idle = np.minimum(best, state.size), 0 if (better & ~done).any() else idle + 1
        if matrix is None or relax or idle in _ANEW:
            matrix = tangent_of(work, state).reduced
        elif last is not None and before is not None:
            matrix = _broyden(matrix, last, state.left - before)
        with np.errstate(all="ignore"):
            step = _downhill(matrix, state.left) if relax else -small(matrix, state.left)
            long = state.length(step)
            step = step * np.where(long > _LONGEST, _LONGEST / long, 1.0)[..., None]
            going = np.isfinite(long) & ~(done & (long > _LAST))
        last, before = np.where(going[..., None], step, 0.0), state.left
        p = p + last
        at = state.moved(last)
        done = done | (long <= _SMALLEST)
        if bool(np.all(done | ~np.isfinite(long))) or (idle > _IDLE and not relax):
            state = work.state(at, p, unknown)
            break
    tangent = tangent_of(work, state)
    speed = settled_speed(work, tangent) if target is not None else []
    closed = replace(
        state.closed, speed=speed, fine=state.closed.fine & done & np.isfinite(state.size), steady=tangent.steady()
    )
    return Settled(closed, state.unknown, -tangent.free, tangent.reduced, state.rates)


def settle_well(
    loose: Loose, places: Places, guess: Poses, target: Value | None, pushing: Pushing, unknown: Value,
    *, near: Poses | None = None, along: Sequence[Value] | None = None, steps: int = _STEPS,
    matrix: Array | None = None,
) -> tuple[Settled, Places]:  # fmt: skip
    """Settle a batch, with other places where those given tell it badly; and the places that it was done with.

    near  the batch that others are chosen from; None: what was settled with those given
    """
    found = settle(loose, places, guess, target, pushing, unknown, steps=steps, along=along, matrix=matrix)
    if found.reach <= TELLS_BADLY:
        return found, places
    better = loose.places(found.closed.at if near is None else near)
    if better is None or better == places:
        return found, places
    return settle(loose, better, guess, target, pushing, unknown, steps=steps, along=along), better


def _broyden(matrix: Array, step: Array, change: Array) -> Array:
    """The matrix that the last step should have been taken with, nearest to the one that it was."""
    square = np.einsum("...i,...i->...", step, step)
    off = change - np.einsum("...ij,...j->...i", matrix, step)
    with np.errstate(all="ignore"):
        update = off[..., :, None] * step[..., None, :] / square[..., None, None]
    return matrix + np.where(np.isfinite(update), update, 0.0)


def acted_on(loose: Loose, places: Places, settled: Settled, pushing: Pushing) -> Mask:
    """Where something acts on every free motion: a member that nothing loads has no balance to settle in."""
    work = Work(loose, places, pushing, None)
    at, most = settled.closed.at, np.zeros((1, 1, 1))
    columns = [column([a], at, work.chain.columns, unit=False) for a in pushing.all if a.pusher.size is not None]
    if work.chain.gives:
        given: Column = [0.0] * work.chain.columns
        add_pushes(given, 1.0, work.chain.given(at)[1])
        columns.append(given)
    powers: list[Value] = []
    for rate in settled.rates:
        power: Value = np.zeros((1, 1, 1))
        for push in columns:
            for v, q, size in zip(rate, push, work.chain.column_size, strict=True):
                if not (zero(v) or zero(q)):
                    power = power + np.abs(v * q)
                    most = np.maximum(most, np.abs(q) / size)
        powers.append(power / np.maximum(fastest(work.chain, rate), 1e-300))
    stiff = np.abs(settled.stiffness).max(axis=(0, 1))
    acted = np.ones(work.shape(at), bool)
    for power in powers:
        acted = acted & ((power > STILL * most) | (stiff > 0.0))
    return acted


def _downhill(matrix: Array, left: Array) -> Array:
    """A step as long as Newton's, but always along what is left: it comes to rest where the balance is stable."""
    sound: Mask = np.asarray(np.isfinite(matrix).all(axis=(-1, -2)) & np.isfinite(left).all(axis=-1))
    k = np.where(sound[..., None, None], (matrix + np.swapaxes(matrix, -1, -2)) / 2, 0.0)
    values, vectors = np.linalg.eigh(k)
    # what is not stiff at all goes as far as a step may
    least = np.maximum(
        1e-9 * np.abs(values).max(axis=-1, keepdims=True), 1e-3 * np.abs(left).max(axis=-1, keepdims=True)
    )
    along = np.einsum("...ji,...j->...i", vectors, left) / np.maximum(np.abs(values), np.maximum(least, 1e-300))
    step: Array = np.where(sound[..., None], np.einsum("...ij,...j->...i", vectors, along), np.nan)
    return step


def _grown(value: Value, shape: tuple[int, ...]) -> Array:
    return np.array(np.broadcast_to(value, shape), float)


def _filled(at: Poses, shape: tuple[int, ...]) -> Poses:
    """Every moving member as an array of the whole batch."""

    def fill(values: Sequence[Value]) -> list[Value]:
        return [values[0], *(_grown(v, shape) for v in values[1:])]

    return Poses(fill(at.x), fill(at.y), fill(at.c), fill(at.s), at.down, at.field)


def come_to_rest(
    loose: Loose, guess: Poses, target: Value | None, pushing: Pushing, unknown: Value, *, chunks: int = _CHUNKS
) -> tuple[Settled, Places] | None:
    """Go down to a stable balance, however far, the places chosen anew on the way. None: they cannot be chosen.

    Raises NoPlan.
    """
    at, found = guess, None
    for _ in range(chunks):
        which = (0, 0, 0)
        if found is not None:
            left = np.argwhere(~found[0].closed.fine)
            which = tuple(int(k) for k in left[0])  # type: ignore[assignment]
        places = loose.places(at, which)
        if places is None:
            return found
        settled = settle(loose, places, at, target, pushing, unknown, relax=True, steps=_CHUNK)
        found = settled, places
        if settled.closed.fine.all():
            break
        at, unknown = settled.closed.at, settled.unknown
    return found
