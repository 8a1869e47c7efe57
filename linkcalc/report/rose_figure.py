"""Load roses -> a figure for the page: small multiples, each on its own scale."""

from __future__ import annotations

import math
import textwrap
from typing import TYPE_CHECKING

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Rose, Roses
from linkcalc.report.figure import new_figure, title_line

if TYPE_CHECKING:
    from matplotlib.axes import Axes
    from matplotlib.figure import Figure

# mm
_MARGIN, _TOP, _LINE, _WORDS = 4.0, 11.0, 3.6, 11.5
# of the circle's radius
_ROOM, _BAND, _TICKS = 1.5, (1.05, 1.1), 1.16
_MANY_CASES = 4


def rose_figure(block: Roses) -> Figure:
    """Three roses in a row, or four or five if they are many."""
    import matplotlib

    count = len(block.roses)
    columns = min(count, 3 if count <= 9 else 4 if count <= 16 else 5)
    rows = -(-count // columns)
    caption = textwrap.wrap(block.caption, 118)
    cell = (style.PAGE_WIDTH - 2 * _MARGIN) / max(columns, 3)
    top = _TOP + _LINE * len(caption) + 2
    height = top + rows * (cell + _WORDS) + 2
    with matplotlib.rc_context(style.RC):
        figure = new_figure(style.PAGE_WIDTH, height)
        title_line(figure, block.title, _MARGIN)
        for k, line in enumerate(caption):
            figure.text(
                _MARGIN / style.PAGE_WIDTH, 1 - (_TOP - 1 + _LINE * k) / height, line, fontsize=style.SMALL, va="top"
            )
        for k, rose in enumerate(block.roses):
            row, column = divmod(k, columns)
            left, bottom = _MARGIN + column * cell, height - top - (row + 1) * (cell + _WORDS) + _WORDS
            box = (left / style.PAGE_WIDTH, bottom / height, cell / style.PAGE_WIDTH, cell / height)
            ax = figure.add_axes(box)
            _draw(ax, rose)
            for n, text in enumerate((rose.title, *rose.lines)):
                at = ((left + cell / 2) / style.PAGE_WIDTH, (bottom + 1 - _LINE * n) / height)
                figure.text(
                    *at, text, fontsize=style.SMALL, ha="center", va="top", fontweight="bold" if n == 0 else "normal"
                )
    return figure


def _draw(ax: Axes, rose: Rose) -> None:
    from matplotlib.patches import Circle, Wedge

    ax.set_axis_off()
    ax.set_aspect("equal")
    ax.set_xlim(-_ROOM, _ROOM)
    ax.set_ylim(-_ROOM, _ROOM)
    worst = math.hypot(*rose.worst)
    scale = worst if math.isfinite(worst) and worst > 0 else max(rose.sectors)
    wide = 360.0 / len(rose.sectors)
    for radius in (0.5, 1.0):
        ax.add_patch(Circle((0, 0), radius, fill=False, ec=style.FAINT, lw=style.THIN, zorder=1))
    for angle in (0, 90, 180, 270):
        x, y = math.cos(math.radians(angle)), math.sin(math.radians(angle))
        ax.plot([0, x], [0, y], color=style.HAIR, lw=style.THIN, zorder=1)
        level = {0: "left", 180: "right"}.get(angle, "center")
        upright = {90: "bottom", 270: "top"}.get(angle, "center")
        ax.text(_TICKS * x, _TICKS * y, f"{angle}°", fontsize=5.5, color=style.SOFT, ha=level, va=upright)
    for k, size in enumerate(rose.sectors):
        if size > 0:
            bar = Wedge(
                (0, 0),
                min(size / scale, 1.0),
                (k - 0.5) * wide,
                (k + 0.5) * wide,
                fc=style.HUES[5],
                ec=style.PAPER,
                lw=0.4,
            )
            ax.add_patch(bar)
    if rose.free:
        begin, end = (math.degrees(a) for a in rose.free)
        inner, outer = _BAND
        ax.add_patch(Wedge((0, 0), outer, begin, end, width=outer - inner, fc=style.HUES[2], ec="none"))
    if len(rose.curves) <= _MANY_CASES:
        for case, places in enumerate(rose.curves):
            x, y = np.clip(np.array(places, float).T / scale, -1.0, 1.0)
            ax.plot(x, y, color=style.INK, lw=0.8, linestyle=style.dash(case), zorder=4)
    _axis(ax)
    if math.isfinite(worst):
        ax.plot([rose.worst[0] / scale], [rose.worst[1] / scale], "o", color=style.HUES[1], ms=3.4, mec=style.PAPER,
                mew=0.4, zorder=6)  # fmt: skip


def _axis(ax: Axes) -> None:
    """The member's own axis, a thin arrow to the right from the middle."""
    ax.annotate("", (1.0, 0.0), (0.0, 0.0), zorder=3,
                arrowprops={"arrowstyle": "-|>", "color": style.SOFT, "lw": style.THIN, "mutation_scale": 5,
                            "shrinkA": 0, "shrinkB": 0})  # fmt: skip
