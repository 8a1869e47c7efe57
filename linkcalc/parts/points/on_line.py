"""A point on a line between two others, or beside it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch, Value
from linkcalc.parts.points import NoPlace
from linkcalc.words import word


@word("construction", "on")
@dataclass(frozen=True)
class OnLine:
    """A point on the line from one point to another, or offset from it."""

    on: tuple[str, str] = fields.names("point", "the line: first point to second")
    distance: Size | None = fields.size("length", "how far from the first point", None)
    part: Size | None = fields.size("number", "how far as a part of the line: 0.5 is the middle", None)
    offset: Size = fields.size("length", "how far to the left of the line, minus to the right", 0)

    one_of = ("distance", "part")

    def needs(self) -> tuple[str, ...]:
        return self.on

    def place(self, sketch: Sketch) -> tuple[Value, Value]:
        (ax, ay), (bx, by) = (sketch.point(p) for p in self.on)
        length = np.hypot(bx - ax, by - ay)
        if not np.all(length > 0):
            raise NoPlace(f"the line {self.on[0]} - {self.on[1]} has no length")
        tx, ty = (bx - ax) / length, (by - ay) / length
        far = sketch.value(self.distance, "length") if self.distance is not None else None
        along = far if far is not None else sketch.value(self.part or 0, "number") * length
        off = sketch.value(self.offset, "length")
        return ax + along * tx - off * ty, ay + along * ty + off * tx
