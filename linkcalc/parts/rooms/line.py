"""A place on a line."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Sketch
from linkcalc.parts.rooms import Room, spot
from linkcalc.words import word


@word("room", "line")
@dataclass(frozen=True)
class OnLineRoom:
    """Anywhere on the line from one point to another."""

    line: tuple[str, str] = fields.names("point", "the ends of the line, as drawn")
    on: str | None = fields.name("member", "the member that has it, if it is not the only one with these points", None)

    @property
    def points(self) -> tuple[str, ...]:
        return self.line

    def room(self, sketch: Sketch) -> Room:
        (ax, ay), (bx, by) = (spot(sketch, p) for p in self.line)
        length = float(np.hypot(bx - ax, by - ay))
        if not length > 0:
            raise fault(("line",), f"{' to '.join(self.line)} has no length", "two points that lie apart are wanted")
        axis = ((bx - ax) / length, (by - ay) / length)
        return Room((ax, ay), (axis,), (f"from {self.line[0]}",), (0.0,), (length,))
