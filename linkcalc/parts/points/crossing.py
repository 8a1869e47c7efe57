"""A point where two lines cross."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Sketch, Value
from linkcalc.parts.points import NoPlace
from linkcalc.words import word


@word("construction", "crossing")
@dataclass(frozen=True)
class Crossing:
    """A point where two lines cross, if need be beyond their ends."""

    crossing: tuple[tuple[str, str], tuple[str, str]] = fields.pairs("point", "the two lines: [point, point] each")

    def needs(self) -> tuple[str, ...]:
        return (*self.crossing[0], *self.crossing[1])

    def place(self, sketch: Sketch) -> tuple[Value, Value]:
        (ax, ay), (bx, by) = (sketch.point(p) for p in self.crossing[0])
        (px, py), (qx, qy) = (sketch.point(p) for p in self.crossing[1])
        ux, uy, vx, vy = bx - ax, by - ay, qx - px, qy - py
        cross = ux * vy - uy * vx
        if not np.all(np.abs(cross) > 1e-12 * np.hypot(ux, uy) * np.hypot(vx, vy)):
            raise NoPlace("the two lines are parallel")
        t = ((px - ax) * vy - (py - ay) * vx) / cross
        return ax + t * ux, ay + t * uy
