"""A counterweight in numbers: its effort is linear in its mass m and in m times its place on the member."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from linkcalc.design.balancing.block import Unknown, Writer, Written, place_of, room_sizes, settle, settle_room
from linkcalc.design.balancing.influence import Influence
from linkcalc.parts.balancers.counterweight import Counterweight
from linkcalc.parts.loads.weight import Weight, WeightPush
from linkcalc.parts.pose import Array, Site
from linkcalc.parts.rooms import Room

_NOTHING = 1e-11
_SIDES = 360
"""Sides of the polygon within a circle of reach: at most 0.004 % of the reach is lost."""


@dataclass(frozen=True, eq=False)
class CounterweightBlock:
    """z: its mass, then its mass times its place along each open axis of its room.

    member  its index; origin [m] the drawn place of the member's first point
    """

    name: str
    part: Counterweight
    member: int
    origin: tuple[float, float]
    room: Room
    mass: Unknown
    place_step: float
    loss: float = 0.0

    @property
    def on(self) -> tuple[str, ...]:
        return (self.part.mass_on,)

    @property
    def sizes(self) -> tuple[Unknown, ...]:
        return (*room_sizes(self.room, "", self.place_step), self.mass)

    @property
    def searched(self) -> tuple[Unknown, ...]:
        return ()

    @property
    def linear(self) -> tuple[tuple[float, float], ...]:
        return ((self.mass.low, self.mass.high), *((-np.inf, np.inf) for _ in self.room.free))

    def columns(self, t: Array, by: Influence) -> list[Array]:  # noqa: ARG002
        at = self._effort(by, self.room.base)
        ways = (place_of(self.room, {k: 1.0}) for k in self.room.free)
        return _cleared([at, *(self._effort(by, way) - at for way in ways)], by)

    def anywhere(self, by: Influence) -> list[Array]:
        """Columns of a mass, of a mass times x and of a mass times y, whatever the room."""
        x, y = self.origin
        at = self._effort(by, (x, y))
        return _cleared([at, self._effort(by, (x + 1.0, y)) - at, self._effort(by, (x, y + 1.0)) - at], by)

    def limits(self, t: Array, by: Influence) -> tuple[Array, Array]:  # noqa: ARG002
        rows: list[list[float]] = []
        free = self.room.free
        for j, k in enumerate(free):
            for bound, sign in ((self.room.low[k], 1.0), (self.room.high[k], -1.0)):
                rows.append([-sign * bound, *(sign if i == j else 0.0 for i in range(len(free)))])
        if self.room.circle is not None:
            x, y, reach = self.room.circle
            bx, by_ = self.room.base
            apothem = reach * np.cos(np.pi / _SIDES)
            for angle in np.arange(_SIDES) * 2 * np.pi / _SIDES:
                c, s = np.cos(angle), np.sin(angle)
                inside = apothem - (c * (bx - x) + s * (by_ - y))
                rows.append([inside, *(-(c * self.room.axes[k][0] + s * self.room.axes[k][1]) for k in free)])
        G = np.array(rows, float).reshape(len(rows), 1 + len(free), 1)
        return G, np.zeros((len(rows), 1))

    def found(self, t: Array, z: Array) -> dict[str, float]:  # noqa: ARG002
        mass = float(z[0])
        values = dict(zip(self.room.names, self.room.low, strict=True))
        for k, product in zip(self.room.free, z[1:], strict=True):
            low, high = self.room.low[k], self.room.high[k]
            at = float(product) / mass if mass > 0 else (low + high) / 2
            values[self.room.names[k]] = min(max(at, low), high)
        return {**values, "mass": mass}

    def start(self, values: dict[str, float]) -> list[float]:  # noqa: ARG002
        return []

    def settled(self, name: str, value: float) -> CounterweightBlock:
        room = settle_room(self.room, "", name, value)
        return replace(self, room=room) if room else replace(self, mass=settle(self.mass, value))

    def written(self, values: dict[str, float]) -> Written:
        place = place_of(self.room, {k: values[self.room.names[k]] for k in self.room.free})

        def load(points: tuple[str, ...], members: tuple[str, ...], write: Writer) -> Weight:
            return Weight(points[0], write(values["mass"], "mass"), members[0] or None)

        number = int(values["mass"] > 0)
        return Written((("place", self.part.mass_on, self.room.point, place),), load, number)

    def _effort(self, by: Influence, place: tuple[float, float]) -> Array:
        site = Site(self.member, place[0] - self.origin[0], place[1] - self.origin[1])
        found: Array = by.of(WeightPush("", site, 1.0).push(by.at)) * by.at.field
        return found


def _cleared(columns: list[Array], by: Influence) -> list[Array]:
    """What is nothing but rounding beside what a mass at the other end of the mechanism does is nothing."""
    sound = by.sound
    reach = [1.0, *(by.ready.chain.size for _ in columns[1:])]
    most = [r * float(np.abs(c[:, 0][sound]).max(initial=0.0)) for r, c in zip(reach, columns, strict=True)]
    return [c * float(m > _NOTHING * max(most)) for m, c in zip(most, columns, strict=True)]
