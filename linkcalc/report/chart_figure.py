"""A chart -> a figure for the page."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING, Any

import numpy as np

from linkcalc.parts.pose import Array
from linkcalc.report import style
from linkcalc.report.blocks import Chart, Curve, Panel
from linkcalc.report.chart_labels import label_flags, label_lines
from linkcalc.report.figure import new_figure, title_line

if TYPE_CHECKING:
    from matplotlib.axes import Axes
    from matplotlib.figure import Figure

# mm
_LEFT, _RIGHT, _BOTTOM, _TOP, _KEY = 19.0, 5.0, 13.0, 15.0, 5.0
_PANEL, _GAP = 48.0, 11.0
_ROOM = 0.12


def chart_figure(chart: Chart) -> Figure:
    """Panel under panel over one drive axis that runs the way the stroke runs; a page wide."""
    import matplotlib

    with matplotlib.rc_context(style.RC):
        n = len(chart.panels)
        top = _TOP + (_KEY * _rows(chart.cases) if any(chart.cases) else 0.0)
        panel = min(_PANEL, (style.TALLEST - top - _BOTTOM - _GAP * (n - 1)) / n)
        height = top + _BOTTOM + n * panel + (n - 1) * _GAP
        figure = new_figure(style.PAGE_WIDTH, height)
        axes: list[Axes] = []
        for i in range(n):
            bottom = height - top - panel - i * (panel + _GAP)
            box = (_LEFT, bottom, style.PAGE_WIDTH - _LEFT - _RIGHT, panel)
            scale = (style.PAGE_WIDTH, height, style.PAGE_WIDTH, height)
            part = tuple(a / b for a, b in zip(box, scale, strict=True))
            axes.append(figure.add_axes(part, sharex=axes[0] if axes else None))  # type: ignore[arg-type]
        for ax, content in zip(axes, chart.panels, strict=True):
            _draw(ax, content, chart)
        _drive_axis(axes, chart)
        for ax, content in zip(axes, chart.panels, strict=True):
            label_flags(ax, content, chart)
        title_line(figure, chart.title, _LEFT)
        _case_key(figure, chart, 1 - 9 / height)
    return figure


def _draw(ax: Axes, panel: Panel, chart: Chart) -> None:
    low, high, clipped = visible(panel.curves)
    for curve in panel.curves:
        width = style.BROAD if curve.broad else style.CURVE
        drive, values = _torn(np.asarray(chart.drive), np.asarray(curve.values), low, high)
        ax.plot(drive, values, color=style.hue(curve.hue), linestyle=style.dash(curve.case), lw=width)
    ax.set_ylabel(panel.axis.title)
    ax.set_ylim(low, high)
    if low < 0 < high:
        ax.axhline(0, color=style.SOFT, lw=style.THIN)
    if clipped:
        _mark_clipped(ax, panel, np.asarray(chart.drive), low, high)
    for side in ("top", "right"):
        ax.spines[side].set_visible(False)
    for line in chart.lines:
        ax.axvline(line.drive, color=style.SOFT, lw=style.THIN, linestyle=(0, (4, 3)))
    _panel_key(ax, panel, clipped)


def _torn(drive: Array, values: Array, low: float, high: float) -> tuple[Array, Array]:
    """A curve that runs off one side of the axis and comes back from the other does not pass through between."""
    a, b = values[:-1], values[1:]
    jump = np.flatnonzero(
        (np.minimum(a, b) < 0) & (np.maximum(a, b) > 0) & ((np.minimum(a, b) < low) | (np.maximum(a, b) > high))
    )
    return np.insert(drive, jump + 1, np.nan), np.insert(values.astype(float), jump + 1, np.nan)


def visible(curves: tuple[Curve, ...]) -> tuple[float, float, bool]:
    """The range of an axis: all that the curves do, or, where they run off at a dead point, what most poses do.

    Returns (low, high, True if something is off the scale).
    """
    values = np.concatenate([np.asarray(c.values) for c in curves])
    values = values[np.isfinite(values)]
    if not values.size:
        return 0.0, 1.0, False
    low, high = min(0.0, float(values.min())), max(0.0, float(values.max()))
    usual = float(np.quantile(np.abs(values), 0.85))
    cap = 1.6 * usual
    # a curve that merely rises steeply is shown whole; one that would press all else flat is cut
    clipped = usual > 0 and max(high, -low) > 4 * usual
    if clipped:
        low, high = max(low, -cap), min(high, cap)
    room = _ROOM * (high - low or 1.0)
    return (low - room if low < 0 else low), high + (room if high > 0 or low == 0 else 0.0), clipped


def _mark_clipped(ax: Axes, panel: Panel, drive: np.ndarray, low: float, high: float) -> None:
    """A small arrow where a curve leaves the axis or comes back."""
    for curve in panel.curves:
        values = np.asarray(curve.values)
        for limit, marker, off in ((high, "^", values > high), (low, "v", values < low)):
            for i in np.flatnonzero(off[1:] != off[:-1]):
                a, b = values[i], values[i + 1]
                if np.isfinite([a, b]).all() and (a - limit) * (b - limit) <= 0 and low <= min(a, b, key=abs) <= high:
                    at = drive[i] + (drive[i + 1] - drive[i]) * (limit - a) / (b - a)
                    ax.plot(at, limit, marker, color=style.hue(curve.hue), ms=4, clip_on=False, zorder=5)


def _panel_key(ax: Axes, panel: Panel, clipped: bool) -> None:
    """Which colour is what, over the panel, outside it: a key inside would sooner or later cover a curve."""
    from matplotlib.lines import Line2D

    named: dict[str, Curve] = {}
    for curve in panel.curves:
        named.setdefault(curve.name, curve)
    if list(named) == [panel.axis.text]:
        named = {}
    widths = [style.BROAD if c.broad else style.CURVE for c in named.values()]
    lines = [Line2D([], [], color=style.hue(c.hue), lw=w) for c, w in zip(named.values(), widths, strict=True)]
    words = list(named)
    if clipped:
        lines.append(Line2D([], [], color=style.SOFT, marker="^", ms=4, ls="none"))
        words.append("runs off the scale")
    if not words:
        return
    ax.legend(
        lines, words, loc="lower left", bbox_to_anchor=(-0.005, 0.985), ncols=_in_row(words),
        handlelength=1.4, columnspacing=1.2, handletextpad=0.5, borderaxespad=0.1,
    )  # fmt: skip


def _in_row(words: Sequence[str]) -> int:
    """How many entries of a key fit beside one another: a letter is about half its size wide, a line sample five."""
    longest = max(len(w) for w in words)
    room = (style.PAGE_WIDTH - _LEFT - _RIGHT) * style.MM * 72
    return max(1, min(len(words), int(room / ((0.55 * longest + 5) * style.SMALL))))


def _rows(words: Sequence[str]) -> int:
    return -(-len(words) // _in_row(words))


def _case_key(figure: Figure, chart: Chart, height: float) -> None:
    from matplotlib.lines import Line2D

    left = _LEFT / style.PAGE_WIDTH
    if len(chart.cases) == 1:
        figure.text(left, height, chart.cases[0], fontsize=style.SMALL, va="top")
    if len(chart.cases) < 2:
        return
    lines = [Line2D([], [], color=style.INK, lw=style.CURVE, linestyle=style.dash(i)) for i in range(len(chart.cases))]
    figure.legend(
        lines, chart.cases, loc="upper left", borderaxespad=0, borderpad=0,
        bbox_to_anchor=(left, height), handlelength=2.6, columnspacing=1.2,
        ncols=_in_row(chart.cases),
    )  # fmt: skip


def _drive_axis(axes: list[Any], chart: Chart) -> None:
    drive = np.asarray(chart.drive)
    real = drive[np.isfinite(drive)]
    first, last = float(real[0]), float(real[-1])
    margin = 0.02 * (last - first)
    axes[0].set_xlim(first - margin, last + margin)
    for ax in axes[:-1]:
        ax.tick_params(labelbottom=False)
    axes[-1].set_xlabel(f"{chart.axis.title}, in the direction of the stroke →")
    label_lines(axes[0], chart)
