"""Force: at a point of a member, or on a pin itself."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Mark, Poses, Push, Site, Size, Sketch, Value
from linkcalc.parts.lines import exact
from linkcalc.words import word


@word("load", "at")
@dataclass(frozen=True)
class Force:
    """A force at a point: its direction fixed, turning with a member, or along or square to a line of two points."""

    at: str = fields.name("point", "the point it acts at; where several members meet it acts on the pin itself")
    on: str | None = fields.name("member", "the member it acts on, if several carry the point", None)
    direction: Size | None = fields.size("angle", "where it points, from the x axis", None)
    turns_with: str | None = fields.name("member", "the member that the direction turns with; as drawn", None)
    along: tuple[str, str] | None = fields.names("point", "it points from the first of these to the second", None)
    square_to: tuple[str, str] | None = fields.names(
        "point", "it points a quarter turn counter-clockwise from the line first to second", None
    )
    size: Size | None = fields.size("force", "how large; left out for the one unknown", None)

    one_of = ("direction", "along", "square_to")

    def pusher(self, name: str, sketch: Sketch) -> ForcePush:
        site = sketch.site(self.at, self.on)
        alone = self.on is not None or len(sketch.carriers(self.at)) < 2
        aim: Aim
        if self.direction is not None:
            angle = sketch.value(self.direction, "angle")
            member = sketch.member(self.turns_with) if self.turns_with else 0
            aim = FixedAim(member, exact(np.cos(angle)), exact(np.sin(angle)))
        else:
            first, second = self.along or self.square_to or ("", "")
            aim = LineAim(sketch.site(first), sketch.site(second), self.along is None)
        size = None if self.size is None else sketch.value(self.size, "force")
        return ForcePush(name, site, aim, size, ("" if alone else self.at,))


@dataclass(frozen=True, eq=False)
class FixedAim:
    """A direction fixed in a member; in the ground if it is member 0."""

    member: int
    u: Value
    v: Value

    def direction(self, at: Poses) -> tuple[Value, Value]:
        return at.turned(self.member, self.u, self.v) if self.member else (self.u, self.v)


@dataclass(frozen=True, eq=False)
class LineAim:
    """The direction from one point to another, or a quarter turn counter-clockwise from it."""

    first: Site
    second: Site
    square: bool

    def direction(self, at: Poses) -> tuple[Value, Value]:
        (ax, ay), (bx, by) = at.spot(self.first), at.spot(self.second)
        dx, dy = bx - ax, by - ay
        length = np.hypot(dx, dy)
        dx, dy = dx / length, dy / length
        return (-dy, dx) if self.square else (dx, dy)


Aim = FixedAim | LineAim


@dataclass(frozen=True, eq=False)
class ForcePush:
    """What a force does, for 1 N."""

    name: str
    site: Site
    aim: Aim
    size: Value | None
    on_pins: tuple[str]
    kind = "force"
    word = "force"

    @property
    def sites(self) -> tuple[Site, ...]:
        return (self.site,)

    def strength(self, at: Poses) -> Value:  # noqa: ARG002
        assert self.size is not None
        return self.size

    def push(self, at: Poses) -> tuple[Push, ...]:
        fx, fy = self.aim.direction(at)
        a, b = at.arm(self.site)
        return ((self.site.member, fx, fy, a * fy - b * fx),)

    def mark(self, at: Poses) -> Mark:
        x, y = at.spot(self.site)
        fx, fy = self.aim.direction(at)
        return Mark("force", ((float(x), float(y)),), (float(fx), float(fy)), self.name)
