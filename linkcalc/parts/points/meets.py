"""A point where two arcs cross."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch, Value
from linkcalc.parts.points import NoPlace
from linkcalc.words import word

_SLACK = 1e-9


@word("construction", "meets")
@dataclass(frozen=True)
class Meets:
    """A point where two arcs cross, on the left or right of the line from the first centre to the second."""

    meets: tuple[tuple[str, Size], tuple[str, Size]] = fields.arcs("the two arcs: [centre, radius] each")
    side: str = fields.choice(
        ("left", "right"), "which of the two crossings, looking from the first centre to the second"
    )

    def needs(self) -> tuple[str, ...]:
        return tuple(centre for centre, _ in self.meets)

    def place(self, sketch: Sketch) -> tuple[Value, Value]:
        (first, r1), (second, r2) = ((c, sketch.value(r, "length")) for c, r in self.meets)
        (ax, ay), (bx, by) = sketch.point(first), sketch.point(second)
        d = np.hypot(bx - ax, by - ay)
        if not np.all(d > 0):
            raise NoPlace(f"the arcs about {first} and {second} have the same centre")
        along = (d * d + r1 * r1 - r2 * r2) / (2 * d)
        square = r1 * r1 - along * along
        # one copy out of many that does not assemble is no fault of the drawing: it becomes NaN and gets a status
        if np.ndim(square) == 0 and square < -_SLACK * d * d:
            apart, reach, differ = (sketch.shown(float(np.abs(v))) for v in (d, r1 + r2, r1 - r2))
            radii = f"the radii together reach {reach}" if d > r1 + r2 else f"the radii differ by {differ}"
            raise NoPlace(f"the arcs about {first} and {second} do not meet: the centres are {apart} apart, {radii}")
        with np.errstate(invalid="ignore"):
            off = np.sqrt(np.where(square < 0, np.where(square < -_SLACK * d * d, np.nan, 0.0), square))
        off = off if self.side == "left" else -off
        tx, ty = (bx - ax) / d, (by - ay) / d
        x, y = ax + along * tx - off * ty, ay + along * ty + off * tx
        return (x, y) if np.ndim(x) else (float(x), float(y))
