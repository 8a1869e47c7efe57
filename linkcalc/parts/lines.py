"""A line that a member carries, and the two ways a file gives one: two points, or an angle as drawn."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts.contract import Site, Size, Sketch, Value

Line = tuple[str, str] | Size


@dataclass(frozen=True, eq=False)
class Guide:
    """A straight line on a member.

    start   a point of it, where travel is counted from
    tx, ty  unit direction in the member's own frame, float or (1, variant, 1)
    """

    start: Site
    tx: Value
    ty: Value

    @property
    def member(self) -> int:
        return self.start.member


def guide(sketch: Sketch, line: Line, member: str, through: str) -> Guide:
    """The line as drawn. Given by an angle it passes through the drawn place of a point, and travel is
    counted from there; given by two points travel is counted from the first."""
    if isinstance(line, tuple):
        (x0, y0), (x1, y1) = sketch.point(line[0]), sketch.point(line[1])
        length = np.hypot(x1 - x0, y1 - y0)
        start, tx, ty = sketch.site(line[0], member), (x1 - x0) / length, (y1 - y0) / length
    else:
        angle = sketch.value(line, "angle")
        start, tx, ty = sketch.site(through, member), np.cos(angle), np.sin(angle)
    return Guide(start, exact(tx), exact(ty))


def rubless(factor: Value) -> bool:
    """True where there is no friction at all."""
    return isinstance(factor, float) and factor == 0.0


def exact(value: Value) -> Value:
    """A component that is 0 or 1 but for rounding is made so: straight guides then fold into constants."""
    if np.ndim(value):
        return value
    number = float(value)
    near = round(number)
    return float(near) if abs(number - near) < 1e-15 else number
