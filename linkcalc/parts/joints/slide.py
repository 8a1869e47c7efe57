"""Slide: a member guided along a line of another without turning (ram, jaw, collar)."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Mark, Poses, Row, Rub, Site, Size, Sketch, Value
from linkcalc.parts.joints.slot import SlotJoint
from linkcalc.parts.lines import Guide, Line, guide, rubless
from linkcalc.parts.shoes import WHOLE, Shoe, allowed_field, shoe, width_field
from linkcalc.parts.stiff import stiff, stiffness_field, turning_field
from linkcalc.words import word


@word("joint", "slide")
@dataclass(frozen=True)
class Slide:
    """A member guided along a line of another without turning: force square to the line, and a moment."""

    member: str = fields.name("member", "the member that slides")
    along: Line = fields.line("direction of the guide: two points, or an angle from the x axis as drawn")
    on: str = fields.name("member", "the member that has the guide", "ground")
    at: str | None = fields.name("point", "where force and moment are told; else the member's first point", None)

    friction: Size | None = fields.friction("if not the one for all slides")
    length: Size | None = fields.size(
        "length", "length of the guide: its moment then presses at both ends, and rubs there", None, sign="plus"
    )
    width: Size | None = width_field()
    allowed_pressure: Size | None = allowed_field()
    stiffness: Size | None = stiffness_field()
    torsion_stiffness: Size | None = turning_field()

    goes_with = WHOLE

    def joints(self, name: str, sketch: Sketch) -> Iterator[SlideJoint]:
        site = sketch.site(self.at, self.member) if self.at else Site(sketch.member(self.member), 0.0, 0.0)
        through = self.at or sketch.first_point(self.member)
        # the guide may run beside the told point: only its direction counts, so it is laid through that point
        line = guide(sketch, self.along, self.on, through)
        start = sketch.site(through, self.on)
        lead = line.start if isinstance(self.along, tuple) else start
        mu = sketch.coefficient("slides", self.friction)
        length = None if self.length is None else sketch.value(self.length, "length")
        yield SlideJoint(
            name, site, Guide(start, line.tx, line.ty), lead, friction=mu, length=length, shoe=shoe(self, sketch),
            **stiff(self, sketch),
        )  # fmt: skip


@dataclass(frozen=True, eq=False)
class SlideJoint:
    """The equations of a slide: the told point stays on its line [m], the member does not turn on it [rad].

    lead  where travel is counted from, on the member of the guide
    """

    name: str
    site: Site
    line: Guide
    lead: Site
    on_pin: str = ""
    friction: Value = 0.0
    length: Value | None = None
    shoe: Shoe | None = None
    share: Value | None = None
    turning_stiffness: Value | None = None
    angular = (False, True)
    word = "slide"

    @property
    def members(self) -> tuple[int, int]:
        return self.site.member, self.line.member

    @property
    def lever(self) -> Value | None:
        """[m] from the middle of the guide to its ends, at which it presses."""
        return None if self.length is None else self.length / 2

    @property
    def _slot(self) -> SlotJoint:
        return SlotJoint(self.name, self.site, self.line)

    def gap(self, at: Poses) -> tuple[Value, Value]:
        a, b = self.members
        return (*self._slot.gap(at), at.s[a] * at.c[b] - at.c[a] * at.s[b])

    def slope(self, at: Poses) -> tuple[Row, Row]:
        a, b = self.members
        # d sin(turn) = cos(turn), which is 1 where the joint holds
        return (*self._slot.slope(at), ((a, TURN, 1.0), (b, TURN, -1.0)))

    def travel(self, at: Poses) -> Value:
        return SlotJoint(self.name, self.site, Guide(self.lead, self.line.tx, self.line.ty)).travel(at)

    def travel_slope(self, at: Poses) -> Row:
        return SlotJoint(self.name, self.site, Guide(self.lead, self.line.tx, self.line.ty)).travel_slope(at)

    def rubs(self) -> tuple[Rub, ...]:
        if rubless(self.friction):
            return ()
        if self.length is None:
            return (Rub((((1.0, 0.0),),), self.friction, self._slot.along_line),)
        # a force and a moment are two forces at the ends of the guide, half its length from the told point
        lever = 1.0 / self.length
        return (Rub((((0.5, lever),), ((0.5, -lever),)), self.friction, self._slot.along_line),)

    def mark(self, at: Poses) -> Mark:
        x, y = at.spot(self.site)
        tx, ty = at.turned(self.line.member, self.line.tx, self.line.ty)
        return Mark("slide", ((float(x), float(y)),), (float(tx), float(ty)), self.name)
