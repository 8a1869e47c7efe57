"""Sectors of a load rose in the file's unit of angle, for reading."""

from __future__ import annotations

import math

from linkcalc.design.pins_answer import Rose
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number

_EXACT = 1e-6


def free_text(rose: Rose | None, edge: Edge) -> str:
    """The sector without load from the own axis, for a table: "120 to 250", "all but 90", "-" if there is none."""
    if rose is None or rose.free is None:
        return "-"
    turn, places = _turn(edge)
    step = 10.0**-places
    begin, end = (edge.one(angle, "angle") for angle in rose.free)
    if end - begin > turn - step:
        return f"all but {number(round(begin / step) * step % turn, places=places)}"
    # rounded into the sector: what is told as free is free
    first, last = math.ceil(begin / step - _EXACT) * step, math.floor(end / step + _EXACT) * step
    if last <= first:
        return "-"
    return " to ".join(number(angle % turn, places=places) for angle in (first, last))


def _turn(edge: Edge) -> tuple[float, int]:
    """A whole turn in the file's unit, and the decimal places that tell about a degree."""
    turn = edge.one(2 * math.pi, "angle")
    return turn, max(0, 2 - math.floor(math.log10(turn)))
