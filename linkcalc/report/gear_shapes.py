"""How gears and racks look: pitch circles and pitch lines as thin chain lines (as ISO 2203 draws them), and the pitch
point, a dot where the two roll on each other."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Item
from linkcalc.report.pen import Pen

_CHAIN = (0, (9, 2.5, 1.5, 2.5))


def _pitch_point(pen: Pen, item: Item) -> None:
    (spot,) = item.spots
    pen.ax.plot(*spot, "o", ms=style.PIN * 0.55, color=style.INK, zorder=6.2)
    pen.keep_clear(item.spots, style.PIN)
    if item.name:
        pen.words(item.name, spot, style.BAR, pen.away(spot), fontsize=style.SMALL)


def _pitch_circle(pen: Pen, item: Item) -> None:
    """Centre, and four places on the circle."""
    (x, y), (rim, _) = item.spots[0], item.spots[1]
    turns = np.linspace(0.0, 2 * np.pi, 145)
    ring = [(x + (rim - x) * float(np.cos(t)), y + (rim - x) * float(np.sin(t))) for t in turns]
    pen.line(ring, style.THIN, style.INK, linestyle=_CHAIN, zorder=4.2)
    pen.keep_clear(ring, weight=0.5)


def _pitch_line(pen: Pen, item: Item) -> None:
    pen.line(item.spots, style.THIN, style.INK, linestyle=_CHAIN, zorder=4.2)
    pen.keep_clear(item.spots, weight=0.5)


def _centres(pen: Pen, item: Item) -> None:
    """The line of centres."""
    pen.line(item.spots, style.THIN, style.SOFT, linestyle=_CHAIN, zorder=4.1)
    pen.keep_clear(item.spots, weight=0.2)


def _segment(pen: Pen, item: Item) -> None:
    """Centre, then the rim that has teeth; of a whole wheel its rim alone."""
    fill = style.PAPER if item.tone == "ground" else style.BODIES[item.hue % len(style.BODIES)]
    edge = style.SOFT if item.tone == "ground" else style.INK
    pen.shape(item.spots, facecolor=fill, edgecolor="none", zorder=2.6)
    pen.line([*item.spots, item.spots[0]], style.OUTLINE, edge, zorder=2.7)
    pen.keep_clear(item.spots, weight=0.5)


def _rim(pen: Pen, item: Item) -> None:
    """A toothed line alone, of a ring or a rack."""
    edge = style.SOFT if item.tone == "ground" else style.INK
    pen.line(item.spots, 2.2 * style.OUTLINE, edge, zorder=2.7)
    pen.keep_clear(item.spots, weight=0.5)


GEAR_SHAPES: dict[str, Callable[[Pen, Item], None]] = {
    "gear": _pitch_point,
    "rack": _pitch_point,
    "round of gear": _pitch_circle,
    "round of rack": _pitch_circle,
    "line of gear": _centres,
    "line of rack": _pitch_line,
    "segment": _segment,
    "rim": _rim,
}
