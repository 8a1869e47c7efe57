"""Slot: a point of one member guided along a straight line of another, or of the ground.

The force is square to the line and nothing else. A roller support is a slot on the ground.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Mark, Poses, Push, Row, Rub, Site, Size, Sketch, Value, X, Y
from linkcalc.parts.lines import Guide, Line, guide, rubless
from linkcalc.parts.shoes import WHOLE, Shoe, allowed_field, length_field, shoe, width_field
from linkcalc.parts.stiff import stiff, stiffness_field
from linkcalc.words import word


@word("joint", "slot")
@dataclass(frozen=True)
class Slot:
    """A point of one member guided along a line of another, free to turn: force square to the line only."""

    point: str = fields.name("point", "the point that is guided")
    along: Line = fields.line("line of the slot: two points, or an angle from the x axis as drawn")
    on: str = fields.name("member", "the member that has the slot", "ground")
    of: str | None = fields.name("member", "the member that the point belongs to, if several carry it", None)

    friction: Size | None = fields.friction("if not the one for all slots")
    length: Size | None = length_field()
    width: Size | None = width_field()
    allowed_pressure: Size | None = allowed_field()
    stiffness: Size | None = stiffness_field()

    goes_with = (("length", ("width",)), *WHOLE)

    def joints(self, name: str, sketch: Sketch) -> Iterator[SlotJoint]:
        alone = self.of is not None or len(sketch.carriers(self.point)) < 2
        line = guide(sketch, self.along, self.on, self.point)
        mu = sketch.coefficient("slots", self.friction)
        on_pin = "" if alone else self.point
        yield SlotJoint(
            name, sketch.site(self.point, self.of), line, on_pin, mu, shoe=shoe(self, sketch), **stiff(self, sketch)
        )


@dataclass(frozen=True, eq=False)
class SlotJoint:
    """The equation of a slot; gap = how far the point stands to the left of the line [m]."""

    name: str
    site: Site
    line: Guide
    on_pin: str = ""
    friction: Value = 0.0
    shoe: Shoe | None = None
    share: Value | None = None
    angular = (False,)
    word = "slot"

    @property
    def members(self) -> tuple[int, int]:
        return self.site.member, self.line.member

    def _from_start(self, at: Poses) -> tuple[Value, Value, Value, Value]:
        (px, py), (qx, qy) = at.spot(self.site), at.spot(self.line.start)
        tx, ty = at.turned(self.line.member, self.line.tx, self.line.ty)
        return px - qx, py - qy, tx, ty

    def gap(self, at: Poses) -> tuple[Value]:
        dx, dy, tx, ty = self._from_start(at)
        return (tx * dy - ty * dx,)

    def slope(self, at: Poses) -> tuple[Row]:
        dx, dy, tx, ty = self._from_start(at)
        return (_row(self, at, dx, dy, -ty, tx),)

    def travel(self, at: Poses) -> Value:
        dx, dy, tx, ty = self._from_start(at)
        return tx * dx + ty * dy

    def travel_slope(self, at: Poses) -> Row:
        dx, dy, tx, ty = self._from_start(at)
        return _row(self, at, dx, dy, tx, ty)

    def rubs(self) -> tuple[Rub, ...]:
        if rubless(self.friction):
            return ()
        return (Rub((((1.0,),),), self.friction, self.along_line),)

    def along_line(self, at: Poses) -> tuple[Push, ...]:
        """A force along the line on the guided point, and back on the member of the line at the same place."""
        dx, dy, tx, ty = self._from_start(at)
        row = _row(self, at, dx, dy, tx, ty)
        return _as_pushes(row)

    def mark(self, at: Poses) -> Mark:
        x, y = at.spot(self.site)
        tx, ty = at.turned(self.line.member, self.line.tx, self.line.ty)
        return Mark("slot", ((float(x), float(y)),), (float(tx), float(ty)), self.name)


def _as_pushes(row: Row) -> tuple[Push, ...]:
    """A row of six entries, x, y and turn of two members, as forces for a multiplier of 1."""
    (a, _, ax), (_, _, ay), (_, _, at), (b, _, bx), (_, _, by), (_, _, bt) = row
    return (a, ax, ay, at), (b, bx, by, bt)


def _row(joint: SlotJoint, at: Poses, dx: Value, dy: Value, nx: Value, ny: Value) -> Row:
    """Derivative of n·(p - q), with n fixed in the member of the line."""
    a, b = joint.site.member, joint.line.member
    ua, va = at.arm(joint.site)
    ub, vb = at.arm(joint.line.start)
    # turning the line's member turns n as well as its start: together the moment arm of n at p about the origin
    return (
        (a, X, nx), (a, Y, ny), (a, TURN, ua * ny - va * nx),
        (b, X, -nx), (b, Y, -ny), (b, TURN, (vb + dy) * nx - (ub + dx) * ny),
    )  # fmt: skip
