"""Errors and sensitivity over the load, as a figure for the page."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from linkcalc.design.weighing.answer import WeighAnswer
from linkcalc.faults import fault
from linkcalc.report import style
from linkcalc.report.figure import new_figure, title_line
from linkcalc.report.weigh.edge import MassEdge

if TYPE_CHECKING:
    from matplotlib.axes import Axes
    from matplotlib.figure import Figure

# mm
_LEFT, _RIGHT, _BOTTOM, _TOP = 19.0, 6.0, 13.0, 17.0
_PANEL, _GAP = 50.0, 12.0
_ROOM = 1.12


def weigh_figure(answer: WeighAnswer) -> Figure:
    """Errors with the limits of the class, and how far the pointer goes for a unit of load. Raises Faults: one load."""
    import matplotlib

    if answer.loads.size < 2:
        raise fault((), "a curve needs more than one load", 'ask for several: --loads "0..25 kg"')
    panels = [_errors] * bool(answer.causes or answer.accuracy) + [_motion]
    height = _TOP + _BOTTOM + len(panels) * _PANEL + (len(panels) - 1) * _GAP
    with matplotlib.rc_context(style.RC):
        figure = new_figure(style.PAGE_WIDTH, height)
        for k, draw in enumerate(panels):
            bottom = height - _TOP - _PANEL - k * (_PANEL + _GAP)
            wide = (style.PAGE_WIDTH - _LEFT - _RIGHT) / style.PAGE_WIDTH
            ax = figure.add_axes((_LEFT / style.PAGE_WIDTH, bottom / height, wide, _PANEL / height))
            draw(ax, answer)
            for side in ("top", "right"):
                ax.spines[side].set_visible(False)
            if ax.get_legend_handles_labels()[1]:
                ax.legend(loc="lower left", bbox_to_anchor=(-0.005, 0.985), ncols=4, handlelength=1.6,
                          columnspacing=1.2, handletextpad=0.5, borderaxespad=0.1)  # fmt: skip
            if k == len(panels) - 1:
                ax.set_xlabel(f"load [{MassEdge(answer).head('mass')}]")
        title_line(figure, answer.mechanism.title or "Scale", _LEFT)
    return figure


def _errors(ax: Axes, answer: WeighAnswer) -> None:
    edge = MassEdge(answer)
    loads = edge.out(answer.loads, "mass")
    order = np.argsort(loads)
    x, most = loads[order], 0.0

    def both(values: np.ndarray, hue: int, dash: int, name: str, width: float = style.CURVE) -> None:
        nonlocal most
        y = edge.out(values, "mass")[order]
        most = max(most, float(np.nanmax(np.abs(y), initial=0.0)))
        for sign in (1, -1):
            ax.plot(
                x, sign * y, color=style.hue(hue), linestyle=style.dash(dash), lw=width, label=name if sign > 0 else ""
            )

    if answer.accuracy is not None:
        fine = np.linspace(float(answer.loads.min()), float(answer.loads.max()), 2001)
        limit = edge.out(answer.accuracy.limit(fine), "mass")
        most = float(limit.max())
        for sign in (1, -1):
            ax.plot(edge.out(fine, "mass"), sign * limit, color=style.INK, lw=style.OUTLINE,
                    label=f"limit, {answer.accuracy.name}" if sign > 0 else "")  # fmt: skip
    if answer.causes:
        both(answer.likely, 1, 0, "likely")
        both(answer.largest, 3, 1, "all at their worst")
    if answer.scatter is not None:
        for values in (answer.scatter.low, answer.scatter.high):
            y = edge.out(values, "mass")[order]
            most = max(most, float(np.abs(y).max()))
            first = values is answer.scatter.low
            ax.plot(x, y, color=style.hue(2), linestyle=style.dash(3), lw=style.CURVE,
                    label="99.73 % of the copies" if first else "")  # fmt: skip
    ax.axhline(0, color=style.SOFT, lw=style.THIN)
    ax.set_ylim(-_ROOM * (most or 1.0), _ROOM * (most or 1.0))
    ax.set_ylabel(f"error of indication [{edge.head('mass')}]")


def _motion(ax: Axes, answer: WeighAnswer) -> None:
    edge, tilt = MassEdge(answer), answer.tilt
    loads = edge.out(answer.loads, "mass")
    order = np.argsort(loads)
    ways = np.abs(edge.out(tilt.per_load * tilt.arm, "length", "mass"))[order]
    ax.plot(loads[order], np.where(tilt.steady[order] > 0, ways, np.nan), color=style.hue(0), lw=style.CURVE)
    sound = ways[np.isfinite(ways) & (tilt.steady[order] > 0)]
    # near the load where it topples the way grows without bound
    ax.set_ylim(0, _ROOM * min(float(sound.max()), 6 * float(np.median(sound))) if sound.size else 1.0)
    if loads.min() < edge.one(tilt.unstable, "mass") < loads.max():
        x = edge.one(tilt.unstable, "mass")
        ax.axvline(x, color=style.SOFT, lw=style.THIN, linestyle=(0, (4, 3)))
        ax.text(x, ax.get_ylim()[1], " unstable from here on", fontsize=style.SMALL, va="top", color=style.SOFT)
    ax.set_ylabel(f"way of {tilt.pointer} [{edge.head('length', 'mass')}]")
