"""A place in a box."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Sketch
from linkcalc.parts.rooms import Room, spot
from linkcalc.words import word


@word("room", "box")
@dataclass(frozen=True)
class Box:
    """Anywhere in the box between two opposite corners, its sides along x and y of the drawing."""

    box: tuple[str, str] = fields.names("point", "two opposite corners, as drawn")
    on: str | None = fields.name("member", "the member that has it, if it is not the only one with these points", None)

    @property
    def points(self) -> tuple[str, ...]:
        return self.box

    def room(self, sketch: Sketch) -> Room:
        (ax, ay), (bx, by) = (spot(sketch, p) for p in self.box)
        low, high = (min(ax, bx), min(ay, by)), (max(ax, bx), max(ay, by))
        if low == high:
            what = f"{self.box[0]} and {self.box[1]} are the same place: the box is empty"
            raise fault(("box",), what, "two opposite corners are wanted")
        return Room((0.0, 0.0), ((1.0, 0.0), (0.0, 1.0)), ("x", "y"), low, high)
