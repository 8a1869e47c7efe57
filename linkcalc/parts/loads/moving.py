"""Loads that stand somewhere along a line of a member and can be moved along it: a trolley, a goods on a platform."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Limit, Mark, Poses, Push, Site, Size, Sketch, Value
from linkcalc.parts.lines import exact
from linkcalc.words import word

_LINE = "the line it moves along, from the first of these points to the second"
_PLACE = "how far it stands from the first of them, if that is not what is stepped"
_ON = "the member that carries both points, if several do"


@word("load", "moves_along")
@dataclass(frozen=True)
class MovingForce:
    """A force that moves along a line of a member, as that of a wheel or a roller."""

    moves_along: tuple[str, str] = fields.names("point", _LINE)
    direction: Size = fields.size("angle", "where it points, from the x axis")
    turns_with: str | None = fields.name("member", "the member that the direction turns with; as drawn", None)
    place: Size = fields.size("length", _PLACE, 0)
    on: str | None = fields.name("member", _ON, None)
    size: Size | None = fields.size("force", "how large; left out for the one unknown", None)

    @property
    def way(self) -> tuple[str, str]:
        return self.moves_along

    def pusher(self, name: str, sketch: Sketch) -> MovingPush:
        angle = sketch.value(self.direction, "angle")
        aim = (
            sketch.member(self.turns_with) if self.turns_with else 0,
            exact(np.cos(angle)),
            exact(np.sin(angle)),
        )
        size = None if self.size is None else sketch.value(self.size, "force")
        return MovingPush(name, *_laid(self.moves_along, self.place, self.on, sketch), size, aim)


@word("load", "mass_along")
@dataclass(frozen=True)
class MovingMass:
    """A mass that moves along a line of a member, as a trolley or goods on a platform; its weight follows gravity."""

    mass_along: tuple[str, str] = fields.names("point", _LINE)
    mass: Size = fields.size("mass", "how much", sign="not minus")
    place: Size = fields.size("length", _PLACE, 0)
    on: str | None = fields.name("member", _ON, None)

    @property
    def way(self) -> tuple[str, str]:
        return self.mass_along

    def pusher(self, name: str, sketch: Sketch) -> MovingPush:
        return MovingPush(
            name, *_laid(self.mass_along, self.place, self.on, sketch), sketch.value(self.mass, "mass"), None, "weight"
        )


def _laid(points: tuple[str, str], place: Size, on: str | None, sketch: Sketch) -> tuple[MovingLine, Value]:
    """The line on its member, and the drawn place on it."""
    first, second = points
    member = on or next(m for m in sketch.carriers(first) if m in sketch.carriers(second))
    start, end = (sketch.site(p, member) for p in points)
    du, dv = end.u - start.u, end.v - start.v
    span = np.hypot(du, dv)
    text = f"it stands beyond the end of its line {first} to {second}"
    return MovingLine(start, du / span, dv / span, span, text), sketch.value(place, "length")


@dataclass(frozen=True, eq=False)
class MovingLine:
    """A line of a member.

    start   its first point
    eu, ev  its direction in the member's own frame
    span    [m] how long it is
    beyond  what is so beyond its ends
    """

    start: Site
    eu: Value
    ev: Value
    span: Value
    beyond: str

    def arm(self, at: Poses, place: Value) -> tuple[Value, Value]:
        """[m] from the member's origin to a place on it, ground axes."""
        return at.turned(self.start.member, self.start.u + place * self.eu, self.start.v + place * self.ev)


@dataclass(frozen=True, eq=False)
class MovingPush:
    """What a force does at a place along a line, for 1 N. The poses may say where it stands; else it is as drawn.

    place  [m] its place as drawn
    aim    member it turns with, and direction in its frame; None: gravity, the size then is a mass [kg]
    """

    name: str
    line: MovingLine
    place: Value
    size: Value | None
    aim: tuple[int, Value, Value] | None
    word: str = "force"
    on_pins: tuple[str] = ("",)
    kind = "force"

    @property
    def span(self) -> Value:
        """[m] the length of its line."""
        return self.line.span

    @property
    def site(self) -> Site:
        """Where it stands as drawn."""
        line = self.line
        return Site(line.start.member, line.start.u + self.place * line.eu, line.start.v + self.place * line.ev)

    @property
    def sites(self) -> tuple[Site, ...]:
        return (self.site,)

    def arms(self, at: Poses) -> tuple[tuple[Value, Value], ...]:
        return (self.line.arm(at, self._place(at)),)

    def _place(self, at: Poses) -> Value:
        return at.places.get(self.name, self.place)

    def _direction(self, at: Poses) -> tuple[Value, Value]:
        if self.aim is None:
            return at.down
        member, u, v = self.aim
        return at.turned(member, u, v) if member else (u, v)

    def strength(self, at: Poses) -> Value:
        assert self.size is not None
        return self.size * at.field if self.aim is None else self.size

    def push(self, at: Poses) -> tuple[Push, ...]:
        fx, fy = self._direction(at)
        a, b = self.line.arm(at, self._place(at))
        return ((self.line.start.member, fx, fy, a * fy - b * fx),)

    def limits(self) -> tuple[Limit, ...]:
        text = self.line.beyond
        return (
            Limit(text, lambda at, _: self._place(at)),
            Limit(text, lambda at, _: self.span - self._place(at)),
        )

    def mark(self, at: Poses) -> Mark:
        k = self.line.start.member
        a, b = self.line.arm(at, self._place(at))
        fx, fy = (float(np.ravel(d)[0]) for d in self._direction(at))
        return Mark(self.word, ((float(at.x[k] + a), float(at.y[k] + b)),), (fx, fy), self.name)
