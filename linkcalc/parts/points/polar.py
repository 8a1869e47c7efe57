"""A point by distance and angle from another."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch, Value
from linkcalc.parts.lines import exact
from linkcalc.words import word


@word("construction", "from")
@dataclass(frozen=True)
class Polar:
    """A point by distance and angle from another."""

    from_: str = fields.name("point", "the point to start from")
    distance: Size = fields.size("length", "how far")
    angle: Size = fields.size("angle", "in which direction, from the x axis or from the line")
    line: tuple[str, str] | None = fields.names(
        "point", "the line that the angle is measured from, else the x axis", None
    )

    def needs(self) -> tuple[str, ...]:
        return (self.from_, *(self.line or ()))

    def place(self, sketch: Sketch) -> tuple[Value, Value]:
        x, y = sketch.point(self.from_)
        distance, angle = sketch.value(self.distance, "length"), sketch.value(self.angle, "angle")
        c, s = exact(np.cos(angle)), exact(np.sin(angle))
        if self.line:
            (ax, ay), (bx, by) = (sketch.point(p) for p in self.line)
            length = np.hypot(bx - ax, by - ay)
            tx, ty = (bx - ax) / length, (by - ay) / length
            c, s = c * tx - s * ty, s * tx + c * ty
        return x + distance * c, y + distance * s
