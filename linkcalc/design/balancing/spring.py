"""Springs in numbers: for settled ends linear in the rate and in the rate times the free length, or in the force."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from linkcalc.design.balancing.block import Unknown, Writer, Written, place_of, room_sizes, settle, settle_room
from linkcalc.design.balancing.influence import Influence
from linkcalc.parts.contract import Push
from linkcalc.parts.laws.gas import taken_by_rise
from linkcalc.parts.laws.linear import COMPRESSION, TENSION
from linkcalc.parts.loads.gas_spring import GasSpring
from linkcalc.parts.loads.spring import Spring
from linkcalc.parts.paths.straight import Straight
from linkcalc.parts.pose import Array, Site, Value
from linkcalc.parts.rooms import Room

_KEPT = 2e-6
"""Of the mechanism: beyond its stroke a gas spring has no force, so the search keeps a hair away from its ends."""
ENDS = ("of the first end", "of the second end")


@dataclass(frozen=True, eq=False)
class End:
    """One end of a spring.

    member  its index; origin [m] the drawn place of its first point
    on      name of the member, "" if it is hooked to the pin itself
    """

    room: Room
    member: int
    origin: tuple[float, float]
    on: str

    def site(self, t: Array) -> Site:
        """t (open axes, variant) [m]"""
        x, y = self.room.base
        u, v = np.full((1, t.shape[1], 1), x - self.origin[0]), np.full((1, t.shape[1], 1), y - self.origin[1])
        for k, value in zip(self.room.free, t, strict=True):
            along = value.reshape(1, -1, 1)
            u, v = u + along * self.room.axes[k][0], v + along * self.room.axes[k][1]
        return Site(self.member, u, v)

    def place(self, t: Array) -> tuple[float, float]:
        return place_of(self.room, dict(zip(self.room.free, t.tolist(), strict=True)))


@dataclass(frozen=True, eq=False)
class SpringBlock:
    """What both kinds share: the ends, and the line between them."""

    name: str
    part: Any
    ends: tuple[End, End]
    place_step: float
    number: int
    loss: float
    scale: float  # [m] what lengths are compared with

    @property
    def on(self) -> tuple[str, ...]:
        return tuple(end.on or f"pin {end.room.point}" for end in self.ends)

    @property
    def searched(self) -> tuple[Unknown, ...]:
        return tuple(one for one in self._places() if not one.settled)

    def start(self, values: dict[str, float]) -> list[float]:
        return [min(max(values[one.name], one.low), one.high) for one in self.searched]

    def _places(self) -> tuple[Unknown, ...]:
        return tuple(
            one
            for end, label in zip(self.ends, ENDS, strict=True)
            for one in room_sizes(end.room, label, self.place_step)
        )

    def _split(self, t: Array) -> tuple[Array, Array]:
        first = len(self.ends[0].room.free)
        return t[:first], t[first : first + len(self.ends[1].room.free)]

    def line(self, t: Array, by: Influence) -> tuple[Array, tuple[Push, ...]]:
        """(case, variant, pose) [m] length, and the push for 1 N apart."""
        a, b = self._split(t)
        path = Straight(self.ends[0].site(a), self.ends[1].site(b), ("", ""))
        return np.maximum(np.asarray(path.value(by.at), float), 1e-12), path.push(by.at)

    def _spans(self, t: Array, by: Influence) -> tuple[Array, Array]:
        """(variant) [m] the least and the greatest length over the stroke."""
        length = self.line(t, by)[0]
        return length.min(axis=(0, 2)), length.max(axis=(0, 2))

    def _within_circles(self, t: Array) -> list[Array]:
        """(variant) each: how far an end keeps from the circle of its reach, over the scale."""
        out = []
        for end, part in zip(self.ends, self._split(t), strict=True):
            if end.room.circle is not None and end.room.free:
                x, y, reach = end.room.circle
                site = end.site(part)
                far = np.hypot(np.ravel(site.u) + end.origin[0] - x, np.ravel(site.v) + end.origin[1] - y)
                out.append((reach - far) / self.scale)
        return out

    def _settled_ends(self, name: str, value: float) -> tuple[End, End] | None:
        for k, label in enumerate(ENDS):
            room = settle_room(self.ends[k].room, label, name, value)
            if room:
                ends = list(self.ends)
                ends[k] = replace(ends[k], room=room)
                return ends[0], ends[1]
        return None

    def _place_values(self, t: Array) -> dict[str, float]:
        values: dict[str, float] = {one.name: one.low for one in self._places() if one.settled}
        open_ones = [one.name for one in self._places() if not one.settled]
        values |= dict(zip(open_ones, t.tolist(), strict=False))
        return {one.name: values[one.name] for one in self._places()}

    def _ends_written(self, values: dict[str, float]) -> tuple[tuple[str, str, str, tuple[float, float]], ...]:
        out = []
        for end, label, short in zip(self.ends, ENDS, ("first", "second"), strict=True):
            names = [f"{n} {label}".strip() for n in end.room.names]
            place = place_of(end.room, {k: values[names[k]] for k in end.room.free})
            out.append((short, end.on, end.room.point, place))
        return tuple(out)


@dataclass(frozen=True, eq=False)
class CoilBlock(SpringBlock):
    """z: the rate, and the rate times the free length."""

    rate: Unknown
    free: Unknown
    acts: str
    shortest: float | None
    longest: float | None

    @property
    def sizes(self) -> tuple[Unknown, ...]:
        return (*self._places(), self.free, self.rate)

    @property
    def linear(self) -> tuple[tuple[float, float], ...]:
        rate = (self.rate.low, self.rate.high)
        return (rate,) if self.free.settled else (rate, (-np.inf, np.inf))

    def columns(self, t: Array, by: Influence) -> list[Array]:
        length, push = self.line(t, by)
        one = self.number * by.of(push)
        if self.free.settled:
            return [one * (self.free.low - length)]
        return [-one * length, one * np.ones_like(length)]

    def limits(self, t: Array, by: Influence) -> tuple[Array, Array]:
        least, most = self._spans(t, by)
        zero, one = np.zeros_like(least), np.ones_like(least)
        # each row: (rate, rate times free length), and what stands alone
        rows: list[tuple[Array, Array, Array]] = []
        if not self.free.settled:
            rows.append((-self.free.low * one, one, zero))
            if np.isfinite(self.free.high):
                rows.append((self.free.high * one, -one, zero))
        if self.acts == TENSION:
            rows.append((least, -one, zero))
        if self.acts == COMPRESSION:
            rows.append((-most, one, zero))
        if self.shortest is not None:
            rows.append((zero, zero, (least - self.shortest) / self.scale))
        if self.longest is not None:
            rows.append((zero, zero, (self.longest - most) / self.scale))
        rows += [(zero, zero, room) for room in self._within_circles(t)]
        if self.free.settled:
            # the rate times a settled free length is no unknown of its own
            G = np.array([[a + b * self.free.low] for a, b, _ in rows]).reshape(len(rows), 1, -1)
        else:
            G = np.array([[a, b] for a, b, _ in rows]).reshape(len(rows), 2, -1)
        return G, np.array([c for _, _, c in rows]).reshape(len(rows), t.shape[1])

    def found(self, t: Array, z: Array) -> dict[str, float]:
        rate = float(z[0])
        free = self.free.low
        if not self.free.settled:
            free = float(z[1]) / rate if rate > 0 else self.free.low
            free = min(max(free, self.free.low), self.free.high)
        return {**self._place_values(t), "free length": free, "rate": rate}

    def settled(self, name: str, value: float) -> CoilBlock:
        ends = self._settled_ends(name, value)
        if ends:
            return replace(self, ends=ends)
        if name == "rate":
            return replace(self, rate=settle(self.rate, value))
        return replace(self, free=settle(self.free, value))

    def written(self, values: dict[str, float]) -> Written:
        def load(points: tuple[str, ...], members: tuple[str, ...], write: Writer) -> Spring:
            def maybe(size: float | None) -> float | None:
                return None if size is None else write(size, "length")

            return Spring(
                (points[0], points[1]), write(values["rate"], "stiffness"), write(values["free length"], "length"),
                acts=self.acts, shortest=maybe(self.shortest), longest=maybe(self.longest), on=on(members),
            )  # fmt: skip

        return Written(self._ends_written(values), load, self.number if values["rate"] > 0 else 0)


@dataclass(frozen=True, eq=False)
class GasBlock(SpringBlock):
    """z: the force fully extended; its length is searched beside its ends.

    warmth  (case, 1, 1) or 1.0: how much stronger it is in each case than at the temperature at which it is told
    """

    force: Unknown
    length: Unknown
    stroke: float
    rise: float
    exponent: float
    spare: float
    warmth: Value

    @property
    def sizes(self) -> tuple[Unknown, ...]:
        return (*self._places(), self.length, self.force)

    @property
    def searched(self) -> tuple[Unknown, ...]:
        places = tuple(one for one in self._places() if not one.settled)
        return places if self.length.settled else (*places, self.length)

    @property
    def linear(self) -> tuple[tuple[float, float], ...]:
        return ((self.force.low, self.force.high),)

    def _longest(self, t: Array) -> Array:
        return np.full(t.shape[1], self.length.low) if self.length.settled else t[-1]

    def columns(self, t: Array, by: Influence) -> list[Array]:
        length, push = self.line(t, by)
        taken = taken_by_rise(self.rise, self.stroke, self.exponent)
        # beyond its stroke, where the search may come to, as at its end: the limits lead back
        into = np.clip(self._longest(t).reshape(1, -1, 1) - length, 0.0, self.stroke)
        strength = self.warmth * self.number / (1.0 - into * taken) ** self.exponent
        return [by.of(push) * strength]

    def limits(self, t: Array, by: Influence) -> tuple[Array, Array]:
        least, most = self._spans(t, by)
        longest, spare = self._longest(t), max(self.spare, _KEPT * self.scale if self.searched else -1e-9 * self.stroke)
        g = [
            (least - (longest - self.stroke) - spare) / self.scale, (longest - most - spare) / self.scale,
            *self._within_circles(t),
        ]  # fmt: skip
        return np.zeros((len(g), 1, t.shape[1])), np.array(g)

    def found(self, t: Array, z: Array) -> dict[str, float]:
        length = float(self._longest(t.reshape(-1, 1))[0])
        return {**self._place_values(t), "length": length, "force": float(z[0])}

    def settled(self, name: str, value: float) -> GasBlock:
        ends = self._settled_ends(name, value)
        if ends:
            return replace(self, ends=ends)
        if name == "force":
            return replace(self, force=settle(self.force, value))
        return replace(self, length=settle(self.length, value))

    def written(self, values: dict[str, float]) -> Written:
        def load(points: tuple[str, ...], members: tuple[str, ...], write: Writer) -> GasSpring:
            return GasSpring(
                (points[0], points[1]), write(values["force"], "force"), write(values["length"], "length"),
                write(self.stroke, "length"), rise=self.part.rise, exponent=self.part.exponent,
                temperature=self.part.temperature, on=on(members),
            )  # fmt: skip

        return Written(self._ends_written(values), load, self.number if values["force"] > 0 else 0)


def on(members: tuple[str, ...]) -> tuple[str, str] | None:
    """The members that a spring is hooked to, where it is told for both."""
    return (members[0], members[1]) if members[0] and members[1] else None
