"""Pins across their plates -> a figure for the page: the stack to scale, shear and bending under it."""

from __future__ import annotations

import textwrap
from typing import TYPE_CHECKING

from linkcalc.report import style
from linkcalc.report.blocks import Curve, PinDiagram, PinDiagrams
from linkcalc.report.figure import new_figure, title_line

if TYPE_CHECKING:
    from matplotlib.axes import Axes
    from matplotlib.figure import Figure

# mm
_LEFT, _RIGHT, _TOP, _LINE, _BOTTOM = 17.0, 5.0, 11.0, 3.6, 12.0
_HEAD, _STACK, _PANEL, _GAP = 6.0, 32.0, 32.0, 4.0
_COLUMNS = 2
_PLATE = 2.2  # plates are drawn so many diameters high above and below the pin's own
_LETTERS = 9  # of a name that fit along a plate, from its edge to the pin


def pin_figure(block: PinDiagrams) -> Figure:
    """Two pins in a row."""
    import matplotlib

    columns = min(_COLUMNS, len(block.pins))
    rows = -(-len(block.pins) // columns)
    caption = textwrap.wrap(block.caption, 118)
    top = _TOP + _LINE * len(caption) + 2
    tall = _HEAD + _STACK + 2 * (_PANEL + _GAP) + _BOTTOM
    height = top + rows * tall
    wide = (style.PAGE_WIDTH - columns * (_LEFT + _RIGHT)) / columns
    with matplotlib.rc_context(style.RC):
        figure = new_figure(style.PAGE_WIDTH, height)
        title_line(figure, block.title, 4.0)
        for k, line in enumerate(caption):
            place = (4.0 / style.PAGE_WIDTH, 1 - (_TOP - 1 + _LINE * k) / height)
            figure.text(*place, line, fontsize=style.SMALL, va="top")
        for k, pin in enumerate(block.pins):
            row, column = divmod(k, columns)
            left, under = column * (_LEFT + wide + _RIGHT) + _LEFT, height - top - row * tall - _HEAD
            axes: list[Axes] = []
            for high in (_STACK, _PANEL, _PANEL):
                under -= high
                box = (left / style.PAGE_WIDTH, under / height, wide / style.PAGE_WIDTH, high / height)
                axes.append(figure.add_axes(box, sharex=axes[0] if axes else None))
                under -= _GAP
            axes[0].set_title(pin.title, fontsize=style.TEXT, fontweight="bold", loc="left", pad=3)
            _stack(axes[0], pin, wide)
            for ax, curves, peak, axis in zip(
                axes[1:], (pin.shear, pin.moment), pin.peaks, block.axes[1:], strict=True
            ):
                _curves(ax, pin, curves, peak)
                ax.set_ylabel(axis.title)
            for ax in axes[:-1]:
                ax.tick_params(labelbottom=False)
            axes[-1].set_xlabel(block.axes[0].title)
    return figure


def _stack(ax: Axes, pin: PinDiagram, wide: float) -> None:
    """The plates from the side, cut through the middle of the pin; wide: of the axes [mm]."""
    from matplotlib.patches import Rectangle

    half, high = pin.diameter / 2, pin.diameter * _PLATE
    long = pin.plates[-1][2]
    names = list(dict.fromkeys(name for name, _, _ in pin.plates))
    for name, start, stop in pin.plates:
        fill = style.BODIES[names.index(name) % len(style.BODIES)]
        ax.add_patch(Rectangle((start, -high), stop - start, 2 * high, fc=fill, ec=style.INK, lw=style.THIN))
        # a letter is about half its size wide: across the plate if it fits, else along it, smaller if need be
        level = 0.6 * len(name) * style.SMALL < (stop - start) / (1.1 * long) * wide * style.MM * 72
        size = style.SMALL if level else min(style.SMALL, style.SMALL * _LETTERS / len(name))
        ax.text(
            (start + stop) / 2, high * 0.94, name, rotation=0 if level else 90, fontsize=size, ha="center", va="top"
        )
    ax.add_patch(Rectangle((0, -half), long, 2 * half, fc=style.PAPER, ec=style.INK, lw=style.OUTLINE))
    ax.plot([-0.03 * long, 1.03 * long], [0, 0], color=style.SOFT, lw=style.THIN, linestyle=(0, (8, 2, 1.5, 2)))
    ax.set_ylim(-1.1 * high, 1.1 * high)
    ax.set_xlim(-0.05 * long, 1.05 * long)
    ax.grid(visible=False)
    ax.set_yticks([])
    for side in ("top", "right", "left", "bottom"):
        ax.spines[side].set_visible(False)
    ax.tick_params(bottom=False)


def _curves(ax: Axes, pin: PinDiagram, curves: tuple[Curve, ...], peak: tuple[float, float, str]) -> None:
    for curve in curves:
        width = 1.6 if curve.broad else 0.9
        ax.plot(pin.places, curve.values, color=style.hue(curve.hue), lw=width, linestyle=style.dash(curve.case))
    place, value, words = peak
    ax.plot([place], [value], "o", color=style.hue(0), ms=3.6, mec=style.PAPER, mew=0.5, zorder=6)
    long = pin.plates[-1][2]
    right = place > 0.7 * long
    ax.annotate(words, (place, value), xytext=(-4 if right else 4, 3), textcoords="offset points",
                ha="right" if right else "left", fontsize=style.SMALL)  # fmt: skip
    low, high = ax.get_ylim()
    ax.set_ylim(low, high + 0.15 * (high - low))
    ax.axhline(0, color=style.SOFT, lw=style.THIN)
    for side in ("top", "right"):
        ax.spines[side].set_visible(False)
