"""Marks on a panel and the words beside them, placed clear of the curves and of one another."""

from __future__ import annotations

from itertools import pairwise
from typing import TYPE_CHECKING, Any

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Chart, Panel
from linkcalc.report.pen import Pen, text_size

if TYPE_CHECKING:
    from matplotlib.axes import Axes

_MARKERS = {"largest": "o", "reversal": "D"}
# points between a mark and its words
_NEAR = 3.0


def label_flags(ax: Axes, panel: Panel, chart: Chart) -> None:
    """Mark each flag of the panel at its place; one off the scale is marked at the edge, its size in its words."""
    low, high = ax.get_ylim()
    pen = Pen(ax, 1.0, (0.0, 0.0))
    for curve in panel.curves:
        heights = np.clip(curve.values, low, high)
        for a, b in pairwise(zip(chart.drive, heights, strict=True)):
            if np.isfinite([*a, *b]).all():
                pen.keep_clear([a, b])
    for line in chart.lines:
        pen.keep_clear([(line.drive, low), (line.drive, high)], weight=3.0)
    left, right = ax.get_xlim()
    pen.keep_clear([(left, max(low, 0.0)), (right, max(low, 0.0))], weight=0.6)
    for flag in panel.flags:
        spot = (flag.drive, float(np.clip(flag.value, low, high)))
        look: dict[str, Any] = {"color": style.hue(flag.hue), "ms": 3.6, "mec": style.PAPER, "mew": 0.5}
        ax.plot(*spot, _MARKERS[flag.kind], zorder=6, clip_on=False, **look)
        pen.words(flag.text, spot, _NEAR, (0.0, 1.0), fontsize=style.SMALL)
    pen.write()


def label_lines(ax: Axes, chart: Chart) -> None:
    """What happens at the lines across all panels, over the top panel; neighbours that would touch go a row up."""
    pixel = ax.bbox.width / (ax.get_position().width * style.PAGE_WIDTH * style.MM * 72)
    left, right, top = ax.bbox.x0 / pixel, ax.bbox.x1 / pixel, ax.bbox.y1 / pixel
    last, row = -np.inf, 0
    places = {line: float(ax.transData.transform((line.drive, 0.0))[0]) / pixel for line in chart.lines}
    for line, place in sorted(places.items(), key=lambda item: item[1]):
        wide, high = text_size(ax, line.text, style.SMALL)
        centre = float(np.clip(place, left + wide / 2, right - wide / 2))
        row = row + 1 if centre - wide / 2 < last else 0
        last = max(last, centre + wide / 2 + 3)
        at = ((centre - left) / (right - left), 0.0)
        rise = top - ax.bbox.y0 / pixel + 3 + row * (high + 2)
        ax.annotate(
            line.text, at, xycoords="axes fraction", xytext=(0, rise), textcoords="offset points", ha="center",
            fontsize=style.SMALL, color=style.SOFT,
        )  # fmt: skip
