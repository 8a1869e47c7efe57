"""A drawing -> a figure for the page: to scale, with a scale bar in the file's unit, tables beneath."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING, Any

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Drawing, Table
from linkcalc.report.figure import new_figure, title_line
from linkcalc.report.numbers import number, plain
from linkcalc.report.pen import Pen
from linkcalc.report.shapes import SHAPES
from linkcalc.report.text import cell_text

if TYPE_CHECKING:
    from matplotlib.figure import Figure

# mm
_SIDE, _TOP, _BOTTOM = 4.0, 15.0, 4.0
_TALLEST, _LOWEST = 165.0, 50.0
_ROW, _STRIP = 4.4, 9.0
_POINT = 72.0 * style.MM  # points in a mm


def drawing_figure(drawing: Drawing) -> Figure:
    """One page wide, as high as the drawing at that width asks, within a page."""
    import matplotlib

    with matplotlib.rc_context({**style.RC, "axes.grid": False}):
        beneath = _STRIP + sum(_ROW * (len(t.rows) + 3.6) for t in drawing.tables)
        left, bottom, wide, high = _extent(drawing)
        room = style.PAGE_WIDTH - 2 * _SIDE, _TALLEST - beneath
        margin = 2 * style.MARGIN / _POINT
        # mm of page in one unit of the drawing
        scale = min((room[0] - margin) / wide if wide else np.inf, (room[1] - margin) / high if high else np.inf)
        tall = max(_LOWEST, high * scale + margin)
        figure = new_figure(style.PAGE_WIDTH, _TOP + tall + beneath + _BOTTOM)
        height = _TOP + tall + beneath + _BOTTOM
        ax = figure.add_axes(
            (_SIDE / style.PAGE_WIDTH, (_BOTTOM + beneath) / height, room[0] / style.PAGE_WIDTH, tall / height)
        )
        middle = left + wide / 2, bottom + high / 2
        ax.set_xlim(middle[0] - room[0] / 2 / scale, middle[0] + room[0] / 2 / scale)
        ax.set_ylim(middle[1] - tall / 2 / scale, middle[1] + tall / 2 / scale)
        ax.set_axis_off()
        pen = Pen(ax, 1 / (_POINT * scale), middle)
        scale_bar(pen, drawing.unit)
        for item in drawing.items:
            SHAPES[item.shape](pen, item)
        pen.write()
        title_line(figure, drawing.title, _SIDE)
        figure.text(_SIDE / style.PAGE_WIDTH, 1 - 11 / height, drawing.caption, color=style.SOFT, va="center")
        top = _BOTTOM + beneath - _STRIP
        for table in drawing.tables:
            top = _print_table(figure, table, top, height)
    return figure


def _extent(drawing: Drawing) -> tuple[float, float, float, float]:
    """Left, bottom, width and height of all that has a place."""
    places = np.array([spot for item in drawing.items for spot in item.spots]).reshape(-1, 2)
    low, high = places.min(axis=0), places.max(axis=0)
    wide, tall = high - low
    if not max(wide, tall) > 0:
        wide = tall = 1.0
        low = low - 0.5
    return float(low[0]), float(low[1]), float(wide), float(tall)


def scale_bar(pen: Pen, unit: str) -> None:
    """A round length under the drawing."""
    x0, _ = pen.ax.get_xlim()
    y0, _ = pen.ax.get_ylim()
    wanted = 90 * pen.point
    power = 10.0 ** np.floor(np.log10(wanted))
    length = float(max(step for step in (1, 2, 5, 10) if step * power <= wanted * 1.0001) * power)
    x, y = x0 + 2 * pen.point, y0 - 0.75 * _STRIP * _POINT * pen.point
    tick = 2.5 * pen.point
    for spots in ([(x, y), (x + length, y)], *([(e, y - tick), (e, y + tick)] for e in (x, x + length))):
        pen.line(spots, style.OUTLINE, style.INK, clip_on=False)
    text = f"{number(length, 3, trim=True)} {unit}"
    pen.ax.text(x + length / 2, y + 3 * pen.point, text, ha="center", va="bottom", fontsize=style.SMALL)


def _print_table(figure: Figure, table: Table, top: float, height: float) -> float:
    """Rows of words on the page, from `top` mm down; returns where the next may begin."""
    from matplotlib.lines import Line2D

    width = style.PAGE_WIDTH
    heads = [c.head for c in table.columns]
    cells = [[cell_text(c, column) for c, column in zip(row, table.columns, strict=True)] for row in table.rows]
    # the page shared out by the longest word of each column, so that no head reaches into its neighbour
    letters = np.array([3 + max(map(len, column)) for column in zip(heads, *cells, strict=True)], dtype=np.float64)
    right = _SIDE + (width - 2 * _SIDE) * np.cumsum(letters) / letters.sum()

    def write(row: Sequence[str], y: float, **look: Any) -> None:
        look = {"fontsize": style.SMALL, "va": "center", **look}
        figure.text(_SIDE / width, y / height, row[0], **look)
        for x, text in zip(right[1:], row[1:], strict=True):
            figure.text(float(x) / width, y / height, text, ha="right", **look)

    y = top - _ROW
    write(heads, y, fontweight="bold")
    y -= 0.9 * _ROW
    write([f"[{plain(c.unit)}]" if c.unit else "" for c in table.columns], y, color=style.SOFT)
    rule = [(y - _ROW / 2) / height] * 2
    figure.add_artist(Line2D([_SIDE / width, 1 - _SIDE / width], rule, color=style.SOFT, lw=style.THIN))
    for row in cells:
        y -= _ROW
        write(row, y)
    return y - 0.7 * _ROW
