"""A point mirrored in a line."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Sketch, Value
from linkcalc.parts.points import NoPlace
from linkcalc.words import word


@word("construction", "mirror")
@dataclass(frozen=True)
class Mirror:
    """A point mirrored in a line."""

    mirror: str = fields.name("point", "the point that is mirrored")
    line: tuple[str, str] = fields.names("point", "the line it is mirrored in")

    def needs(self) -> tuple[str, ...]:
        return (self.mirror, *self.line)

    def place(self, sketch: Sketch) -> tuple[Value, Value]:
        x, y = sketch.point(self.mirror)
        (ax, ay), (bx, by) = (sketch.point(p) for p in self.line)
        dx, dy = bx - ax, by - ay
        square = dx * dx + dy * dy
        if not np.all(square > 0):
            raise NoPlace(f"the line {self.line[0]} - {self.line[1]} has no length")
        beside = 2 * (dx * (y - ay) - dy * (x - ax)) / square
        return x + beside * dy, y - beside * dx
