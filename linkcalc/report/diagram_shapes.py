"""How the parts of an inner-force diagram look: the line of the member, filled ordinates, values beside them."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Item
from linkcalc.report.pen import Pen

_STEP = 7.0  # points between the thin lines square to the member


def _spine(pen: Pen, item: Item) -> None:
    pen.line(item.spots, style.CURVE, style.INK, zorder=5)
    for spot in item.spots:
        pen.ax.plot(*spot, "o", ms=2.4, color=style.INK, zorder=6)
    pen.keep_clear(item.spots, 4.0)


def _ordinates(pen: Pen, item: Item) -> None:
    """First half of the spots along the member, second half the ends of the ordinates, back to the beginning."""
    color = style.tone(item.tone)
    half = len(item.spots) // 2
    foot, top = np.array(item.spots[:half]), np.array(item.spots[half:][::-1])
    pen.shape(item.spots, facecolor=color, edgecolor="none", alpha=0.16, zorder=2)
    pen.line([item.spots[0], *map(tuple, top.tolist()), item.spots[half - 1]], style.OUTLINE, color, zorder=4)
    long = float(np.hypot(*(foot[-1] - foot[0]))) / pen.point
    part = np.linspace(0.0, 1.0, max(2, int(long / _STEP) + 1))
    known = np.hypot(*(foot - foot[0]).T) / (np.hypot(*(foot[-1] - foot[0])) or 1.0)
    for p in part[1:-1]:
        ends = [tuple(float(np.interp(p, known, line[:, k])) for k in (0, 1)) for line in (foot, top)]
        pen.line([(ends[0][0], ends[0][1]), (ends[1][0], ends[1][1])], 0.35, color, zorder=3)
    pen.keep_clear([(float(x), float(y)) for x, y in top], 3.0)
    pen.keep_clear([(float(x), float(y)) for x, y in (top + foot) / 2], 4.0, 0.6)


def _value(pen: Pen, item: Item) -> None:
    pen.words(item.name, item.spots[0], 3.0, item.along, color=style.tone(item.tone), fontsize=style.SMALL)


def _remark(pen: Pen, item: Item) -> None:
    pen.words(item.name, item.spots[0], 8.0, color=style.SOFT, fontsize=style.SMALL)


DIAGRAM_SHAPES: dict[str, Callable[[Pen, Item], None]] = {
    "spine": _spine, "ordinates": _ordinates, "value": _value, "remark": _remark,
}  # fmt: skip
