"""The bars of a scale at true size: every line and notch where it is cut, to be printed without scaling."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

import numpy as np

from linkcalc.design.weighing.answer import Bar, WeighAnswer
from linkcalc.faults import fault
from linkcalc.report import style
from linkcalc.report.figure import new_figure
from linkcalc.report.numbers import number, places_for, plain
from linkcalc.report.weigh.edge import MassEdge

if TYPE_CHECKING:
    from matplotlib.axes import Axes
    from matplotlib.figure import Figure

# mm
_SIDE, _TOP, _BOTTOM, _BAR = 14.0, 13.0, 15.0, 25.0
_SHORT, _MIDDLE, _LONG, _NOTCH = 2.6, 4.0, 5.4, 3.0
_CONTROL = 100.0
_LEAST, _LONGEST = 130.0, 5000.0
_ROUND = (1, 2, 5, 10, 20, 50, 100, 200, 500, 1000)
_ROOM = 1.5  # between two figures


def bar_figure(answer: WeighAnswer) -> Figure:
    """Bar under bar, 1 : 1. Raises Faults: no bar has a mark, or one is too long for a sheet."""
    import matplotlib

    shown = [b for b in answer.bars if b.loads.size]
    if not shown:
        raise fault((), "no bar has a mark: there is nothing to draw", "a poise with a finer step is wanted")
    reach = 1e3 * max(max(b.length, float(b.places.max())) for b in shown)
    if reach > _LONGEST:
        raise fault((), f"a bar of {reach:.0f} mm", f"true size is drawn up to {_LONGEST:.0f} mm")
    width = max(_LEAST, 2 * _SIDE + reach)
    height = _TOP + _BAR * len(shown) + _BOTTOM
    with matplotlib.rc_context({**style.RC, "axes.grid": False}):
        figure = new_figure(width, height)
        # one unit of the axes is one mm of the sheet
        ax = figure.add_axes((0, 0, 1, 1), xlim=(0, width), ylim=(0, height))
        ax.set_axis_off()
        ax.text(
            _SIDE, height - 5.5, answer.mechanism.title or "Bars", fontsize=style.TITLE, fontweight="bold", va="center"
        )
        for k, bar in enumerate(shown):
            _draw(ax, answer, bar, height - _TOP - _BAR * k)
        _control(ax)
    return figure


def _draw(ax: Axes, answer: WeighAnswer, bar: Bar, top: float) -> None:
    edge, line = MassEdge(answer), top - 10.5
    unit = edge.head("mass")
    kind = "notches" if bar.notched else "lines"
    first, last = bar.along
    words = f"{bar.name}: {first} to {last}, {kind} in {unit}" if bar.use != "zero" else f"{bar.name}: zero"
    ax.text(_SIDE, top - 2, words, fontsize=style.TEXT, va="center")
    end = _SIDE + 1e3 * bar.length
    _line(ax, [(_SIDE, line), (end, line)], style.CURVE)
    loads = edge.out(bar.loads, "mass")
    step = float(np.min(np.diff(np.sort(loads)))) if loads.size > 1 else 1.0
    numbered = _numbered(loads, bar.places * 1e3, step)
    for load, place in zip(loads, bar.places * 1e3, strict=True):
        x, labelled = _SIDE + float(place), float(load) in numbered
        if bar.notched:
            half = min(1.2, _NOTCH / 2)
            _line(ax, [(x - half, line), (x, line - _NOTCH), (x + half, line)], style.OUTLINE)
        else:
            fifth = abs(load / (5 * step) - round(load / (5 * step))) < 1e-6
            _line(ax, [(x, line), (x, line - (_LONG if labelled else _MIDDLE if fifth else _SHORT))], style.THIN)
        if labelled:
            text = number(float(load), 6, places_for(sorted(numbered)), trim=False)
            ax.text(x, line - _LONG - 0.7, text, fontsize=style.SMALL, ha="center", va="top")
    for name, x in ((first, _SIDE), (last, end)):
        _line(ax, [(x, line), (x, line + 1.8)], style.OUTLINE)
        ax.text(x, line + 2.3, name, fontsize=style.SMALL, ha="center", va="bottom", color=style.SOFT)


def _numbered(loads: Any, places: Any, step: float) -> set[float]:
    """The marks that get a figure: round ones, as many as leave room between them."""
    if loads.size < 2:
        return {float(v) for v in loads}
    apart = float(np.mean(np.abs(np.diff(places))))
    wide = max(len(number(float(v), 6, trim=True)) for v in loads) * 0.6 * style.SMALL * 25.4 / 72 + _ROOM
    every = next((k for k in _ROUND if k * apart >= wide), _ROUND[-1])
    round_ = [float(v) for v in loads if abs(v / (every * step) - round(v / (every * step))) < 1e-6]
    # notches need not be at round loads: then every so many of them
    return set(round_) if len(round_) > 1 else {float(v) for v in loads[::every]}


def _control(ax: Axes) -> None:
    """A length to check a print by."""
    y = 5.0
    _line(ax, [(_SIDE, y), (_SIDE + _CONTROL, y)], style.OUTLINE)
    for x in (_SIDE, _SIDE + _CONTROL):
        _line(ax, [(x, y - 1.2), (x, y + 1.2)], style.OUTLINE)
    words = f"{plain(f'{_CONTROL:.0f} mm')}: scale 1 : 1, print without fitting to the page"
    ax.text(_SIDE, y + 1.6, words, fontsize=style.SMALL, ha="left", va="bottom", color=style.SOFT)


def _line(ax: Axes, spots: list[tuple[float, float]], width: float) -> None:
    x, y = zip(*spots, strict=True)
    ax.plot(x, y, color=style.INK, lw=width, solid_capstyle="butt", solid_joinstyle="miter", clip_on=False)
