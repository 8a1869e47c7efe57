"""Marks of loads that have a shape of their own."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Item
from linkcalc.report.pen import Pen


def _spread(pen: Pen, item: Item) -> None:
    """A comb that presses on the line, as high as the load there; the resultant, at the first spot, has an arrow."""
    centre, a, b = (np.array(spot) for spot in (*item.spots[:1], *item.spots[-2:]))
    # the centroid of a trapezoid lies at (q0 + 2 q1)/(3 (q0 + q1)) of the way
    part = float((centre - a) @ (b - a) / ((b - a) @ (b - a))) if len(item.spots) > 2 else 0.5
    first, last = 2 - 3 * part, 3 * part - 1
    high = 0.8 * style.BLOCK * pen.point
    up = -high / max(abs(first), abs(last)) * np.array(item.along)
    color, back = style.tone("weight"), (tuple(a + first * up), tuple(b + last * up))
    pen.line(back, style.THIN, color, zorder=5)
    for t in np.linspace(0.0, 1.0, max(2, round(float(np.hypot(*(b - a))) / high))):
        foot = a + t * (b - a)
        pen.line((tuple(foot + (first + t * (last - first)) * up), tuple(foot)), style.THIN, color, zorder=5)
    pen.keep_clear(back, weight=0.5)


LOAD_SHAPES: dict[str, Callable[[Pen, Item], None]] = {"spread": _spread}
