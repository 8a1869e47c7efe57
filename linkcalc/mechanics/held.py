"""A pose with its places held: what follows from it, and what is left of equilibrium along each free motion."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np

from linkcalc.mechanics.balance import balance
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.loose import Loose, Places
from linkcalc.mechanics.motion import Closed, close, fastest, moved
from linkcalc.mechanics.pushing import Column, Pushing, add_pushes, column, strength
from linkcalc.mechanics.sums import dot, plus
from linkcalc.parts.contract import Drive
from linkcalc.parts.pose import Array, Mask, Poses, Value, zero

STILL = 1e-13  # power of what is left over the largest force: in balance


def rates_of(chain: Chain, closed: Closed) -> list[list[Value]]:
    """Speeds of the coordinates per unit of each place that a chain holds."""
    first, rows = chain.joint_rows, chain.rows
    return [
        closed.factored.solve([1.0 if i == first + k else 0.0 for i in range(rows)]) for k in range(len(chain.holds))
    ]


class Work:
    """What stays the same while a batch settles."""

    def __init__(self, loose: Loose, places: Places, pushing: Pushing, target: Value | None):
        self.loose, self.places, self.pushing = loose, places, pushing
        self.chain = loose.chain(places)
        self.drive: Drive | None = None
        if target is not None:
            assert loose.coordinate is not None
            self.drive = loose.coordinate.hold(target)
        self.target = target
        self.asked = pushing.effort_asked or pushing.load_asked
        self.sense: Sequence[Value] | None = None

    def shape(self, at: Poses) -> tuple[int, ...]:
        cases = len(self.pushing.cases)
        return np.broadcast_shapes((cases, 1, 1), np.shape(self.target) if self.target is not None else (),
                                   *(np.shape(v) for v in at.c))  # fmt: skip

    def close(self, at: Poses, p: Sequence[Value]) -> Closed:
        held = [place.hold(v) for place, v in zip(self.places, p, strict=True)]
        return close(self.chain, at, self.drive, sure=1, held=held)

    def rates(self, closed: Closed) -> list[list[Value]]:
        """Speeds of the coordinates per unit of each place."""
        return rates_of(self.chain, closed)

    def forces(self, at: Poses) -> tuple[Column, Column]:
        """Generalised forces of all that is known, and of the unknown for 1."""
        pushing, n = self.pushing, self.chain.columns
        known = column(pushing.rest, at, n, unit=False)
        if self.chain.gives:
            add_pushes(known, 1.0, self.chain.given(at)[1])
        effort, load = column(pushing.effort, at, n, unit=True), column(pushing.load, at, n, unit=True)
        if pushing.load_asked:
            return plus(known, strength(pushing.effort, at) if pushing.effort else 0.0, effort), load
        if pushing.load:
            known = plus(known, strength(pushing.load, at), load)
        return known, effort

    def state(self, at: Poses, p: Array, unknown: Value) -> State:
        """Everything that follows from the places."""
        closed = self.close(at, [p[..., k] for k in range(len(self.places))])
        known, unit = self.forces(closed.at)
        if self.chain.toothed or (self._rubs and self.asked and self.drive is not None):
            for amount, push in self._rubbed(closed):
                known = plus(known, amount, push)
        return State(self, closed, self.rates(closed), known, unit, unknown)

    @property
    def _rubs(self) -> bool:
        return bool(self.chain.rubs) or self.pushing.rubbing

    def _rubbed(self, closed: Closed) -> list[tuple[Value, Column]]:
        """Frictions that go with a pose, in the sense of the motion last known."""
        b = balance(self.chain, replace(closed, speed=list(self.sense or closed.speed)), self.pushing, checked=False)
        return b.acting


class State:
    """A pose with its places held: what is left along each free motion.

    ways     speeds of drive and places, of places only if nothing is asked for
    unknown  what makes the power along the drive nothing
    left     (case, variant, pose, count) power that is left along each place
    size     (case, variant, pose) the largest of those, over the largest force and the size of its motion
    still    where that is nothing
    """

    def __init__(
        self, work: Work, closed: Closed, rates: list[list[Value]], known: Column, unit: Column, unknown: Value
    ):
        self.work, self.closed, self.rates, self.unit = work, closed, rates, unit
        self.fast = [fastest(work.chain, v) for v in rates]
        self.ways: list[Sequence[Value]] = [closed.speed, *rates] if work.drive is not None and work.asked else [*rates]
        self.powers = [dot(v, unit) for v in self.ways]
        self.total, self.unknown = known, unknown
        if work.asked:
            with np.errstate(all="ignore"):
                self.unknown = -np.divide(dot(closed.speed, known), self.powers[0])
            self.total = plus(known, self.unknown, unit)
        shape = work.shape(closed.at)
        self.left = np.stack([np.broadcast_to(dot(v, self.total), shape) for v in rates], -1)
        most: Value = 1e-300
        for q, size in zip(self.total, work.chain.column_size, strict=True):
            if not zero(q):
                most = np.maximum(most, np.abs(q) / size)
        self.most = most
        with np.errstate(all="ignore"):
            over = [np.abs(self.left[..., k]) / fast for k, fast in enumerate(self.fast)]
            self.size = np.broadcast_to(np.max(over, axis=0), shape)
            self.still: Mask = self.size <= STILL * most + work.chain.floor

    def length(self, step: Array) -> Array:
        """How far a step moves the fastest coordinate, in sizes of the mechanism or radians."""
        total: Value = 0.0
        for k, fast in enumerate(self.fast):
            total = total + np.abs(step[..., k]) * fast / self.work.chain.size
        return np.asarray(total)

    def moved(self, step: Array) -> Poses:
        way: list[Value] = [0.0] * self.work.chain.columns
        for k, rate in enumerate(self.rates):
            way = [w - step[..., k] * r if not zero(r) else w for w, r in zip(way, rate, strict=True)]
        return moved(self.closed.at, way)
