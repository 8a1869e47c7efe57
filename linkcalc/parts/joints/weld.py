"""Weld: two members made one, or a member built into the ground; force and moment across."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Mark, Poses, Row, Rub, Site, Size, Sketch, Value
from linkcalc.parts.joints.pin import PinJoint
from linkcalc.parts.stiff import stiff, stiffness_field, turning_field
from linkcalc.words import word


@word("joint", "weld")
@dataclass(frozen=True)
class Weld:
    """Two members made one at a point, or a member built into the ground: force and moment across."""

    members: tuple[str, str] = fields.names("member", "the two members; force and moment are told on the first")
    at: str = fields.name("point", "where they are joined, and where force and moment are told")
    stiffness: Size | None = stiffness_field()
    torsion_stiffness: Size | None = turning_field()

    def joints(self, name: str, sketch: Sketch) -> Iterator[WeldJoint]:
        a, b = self.members
        yield WeldJoint(name, sketch.site(self.at, a), sketch.site(self.at, b), **stiff(self, sketch))


@dataclass(frozen=True, eq=False)
class WeldJoint:
    """The equations of a weld: a pin [m] that does not turn [rad]."""

    name: str
    site: Site
    other: Site
    on_pin: str = ""
    share: Value | None = None
    turning_stiffness: Value | None = None
    angular = (False, False, True)
    word = "weld"

    @property
    def members(self) -> tuple[int, int]:
        return self.site.member, self.other.member

    def gap(self, at: Poses) -> tuple[Value, Value, Value]:
        a, b = self.members
        return (*PinJoint(self.name, self.site, self.other).gap(at), at.s[a] * at.c[b] - at.c[a] * at.s[b])

    def slope(self, at: Poses) -> tuple[Row, Row, Row]:
        a, b = self.members
        return (*PinJoint(self.name, self.site, self.other).slope(at), ((a, TURN, 1.0), (b, TURN, -1.0)))

    def rubs(self) -> tuple[Rub, ...]:
        return ()

    def mark(self, at: Poses) -> Mark:
        x, y = at.spot(self.site)
        return Mark("weld", ((float(x), float(y)),), name=self.name)
