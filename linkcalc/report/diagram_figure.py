"""A sheet of drawings -> a figure for the page: panels to one scale, one under the other or two by two."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Panels
from linkcalc.report.drawing_figure import scale_bar
from linkcalc.report.figure import new_figure, title_line
from linkcalc.report.pen import Pen
from linkcalc.report.shapes import SHAPES

if TYPE_CHECKING:
    from matplotlib.figure import Figure

# mm
_SIDE, _TOP, _FOOT, _HEAD = 4.0, 15.0, 9.0, 6.0
_POINT = 72.0 * style.MM
_ROOM = 2 * 42.0 / _POINT  # round the geometry of a panel, for arrows and words
_LOWEST = 26.0


def diagram_figure(sheet: Panels) -> Figure:
    """One page wide; the panels share one scale, so that they can be laid over each other."""
    import matplotlib

    low, high = _extent(sheet)
    wide, tall = (float(v) for v in high - low)
    columns, scale, cell = _layout(wide, tall, len(sheet.panels))
    rows = -(-len(sheet.panels) // columns)
    width, height = style.PAGE_WIDTH, _TOP + rows * (cell + _HEAD) + _FOOT
    with matplotlib.rc_context({**style.RC, "axes.grid": False}):
        figure = new_figure(width, height)
        across = (width - 2 * _SIDE) / columns
        pens = []
        for k, panel in enumerate(sheet.panels):
            left = _SIDE + (k % columns) * across
            top = _TOP + (k // columns) * (cell + _HEAD)
            figure.text(
                left / width, 1 - (top + 3) / height, panel.title, fontsize=style.TEXT, fontweight="bold", va="center"
            )
            ax = figure.add_axes((left / width, 1 - (top + _HEAD + cell) / height, across / width, cell / height))
            middle = (low + high) / 2
            reach = np.array([across, cell]) / 2 / scale
            ax.set_xlim(middle[0] - reach[0], middle[0] + reach[0])
            ax.set_ylim(middle[1] - reach[1], middle[1] + reach[1])
            ax.set_axis_off()
            pen = Pen(ax, 1 / (_POINT * scale), (float(middle[0]), float(middle[1])))
            for item in panel.items:
                SHAPES[item.shape](pen, item)
            pens.append(pen)
        scale_bar(pens[(rows - 1) * columns], sheet.panels[0].unit)
        for pen in pens:
            pen.write()
        title_line(figure, sheet.title, _SIDE)
        figure.text(_SIDE / width, 1 - 11 / height, sheet.caption, color=style.SOFT, va="center")
    return figure


def _extent(sheet: Panels) -> tuple[np.ndarray, np.ndarray]:
    places = np.array([spot for panel in sheet.panels for item in panel.items for spot in item.spots]).reshape(-1, 2)
    low, high = places.min(axis=0), places.max(axis=0)
    if not np.max(high - low) > 0:
        low, high = low - 0.5, high + 0.5
    return low, high


def _layout(wide: float, tall: float, count: int) -> tuple[int, float, float]:
    """Columns, mm of page in one unit, height of a panel: whichever shows the member larger on the page."""
    best = (1, 0.0, _LOWEST)
    for columns in (1, 2):
        rows = -(-count // columns)
        across = (style.PAGE_WIDTH - 2 * _SIDE) / columns - _ROOM
        most = (style.TALLEST - _TOP - _FOOT) / rows - _HEAD - _ROOM
        scale = min(across / wide if wide else np.inf, most / tall if tall else np.inf)
        if scale > 1.001 * best[1]:
            best = (columns, float(scale), max(_LOWEST, tall * float(scale) + _ROOM))
    return best
