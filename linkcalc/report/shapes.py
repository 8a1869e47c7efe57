"""How each thing on a drawing looks: one function a shape, found by the shape's name. A new mark is one more entry.

Own signs, kept to plain line work: bars with round ends, open circles for pins, a block on its guide, hatching for
what stands on the ground.
"""

from __future__ import annotations

from collections.abc import Callable
from itertools import pairwise

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Item
from linkcalc.report.diagram_shapes import DIAGRAM_SHAPES
from linkcalc.report.gear_shapes import GEAR_SHAPES
from linkcalc.report.load_shapes import LOAD_SHAPES
from linkcalc.report.pen import Pen, Spot
from linkcalc.report.spring_shapes import SPRING_SHAPES


def _bar(pen: Pen, item: Item) -> None:
    ghost = item.tone == "ghost"
    outline = style.FAINT if ghost else style.INK
    fill = style.BODY_GHOST if ghost else style.BODIES[item.hue % len(style.BODIES)]
    spots = item.spots if len(item.spots) > 1 else item.spots * 2
    pen.line(spots, style.BAR, outline, zorder=2 if ghost else 3)
    pen.line(spots, style.BAR - 2 * style.OUTLINE * (0.6 if ghost else 1), fill, zorder=2 if ghost else 3)
    pen.keep_clear(spots, 0.0 if ghost else style.BAR, 0.1 if ghost else 1.0)
    if item.name:
        lengths = [np.hypot(b[0] - a[0], b[1] - a[1]) for a, b in pairwise(spots)]
        longest = int(np.argmax(lengths))
        a, b = spots[longest], spots[longest + 1]
        middle = ((a[0] + b[0]) / 2, (a[1] + b[1]) / 2)
        pen.words(item.name, middle, style.BAR, pen.away(middle), fontstyle="italic", fontsize=style.SMALL)


def _stem(pen: Pen, item: Item) -> None:
    pen.line(item.spots, style.OUTLINE, style.FAINT if item.tone == "ghost" else style.SOFT, zorder=1.5)


def _path(pen: Pen, item: Item) -> None:
    pen.line(item.spots, style.THIN, style.SOFT, linestyle=(0, (6, 3)), zorder=1)
    pen.keep_clear(item.spots, weight=0.8)


def _pin(pen: Pen, item: Item) -> None:
    (spot,) = item.spots
    pen.ax.plot(*spot, "o", ms=style.PIN, mfc=style.PAPER, mec=style.INK, mew=style.OUTLINE, zorder=6)
    pen.keep_clear(item.spots, style.PIN)
    if item.name:
        pen.words(item.name, spot, style.BAR, pen.away(spot), fontsize=style.SMALL)


def _guide(pen: Pen, item: Item) -> None:
    """The line of a slot or slide, a little longer than the travel; hatched if it stands on the ground."""
    u, v = item.along
    room = 1.6 * style.BLOCK * pen.point
    (ax, ay), (bx, by) = item.spots
    ends = [(ax - u * room, ay - v * room), (bx + u * room, by + v * room)]
    if item.tone == "ground":
        side = _clear_side(pen, ends, (-v, u))
        off = 0.62 * style.BLOCK * pen.point
        rail = [(x + side[0] * off, y + side[1] * off) for x, y in ends]
        pen.line(rail, style.OUTLINE, style.INK, zorder=2.5)
        _hatch(pen, rail[0], rail[1], side)
        pen.line(ends, style.THIN, style.SOFT, linestyle=(0, (8, 2, 1.5, 2)), zorder=2)
    else:
        pen.line(ends, style.BAR * 0.55, style.INK, zorder=4)
        pen.line(ends, style.BAR * 0.55 - 2 * style.THIN, style.PAPER, zorder=4)
    pen.keep_clear(ends, weight=0.5)


def _clear_side(pen: Pen, ends: list[Spot], square: Spot) -> Spot:
    """The side of a line with less on it; of two empty ones the lower."""
    far = 2.0 * style.BLOCK * pen.point

    def cost(sign: float) -> float:
        moved = [(x + sign * square[0] * far / 2, y + sign * square[1] * far / 2) for x, y in ends]
        return pen.covers(moved, 1.4 * style.BLOCK) + (0.5 if sign * square[1] > 0 else 0.0)

    sign = min((1.0, -1.0), key=cost)
    return sign * square[0], sign * square[1]


def _hatch(pen: Pen, a: Spot, b: Spot, side: Spot) -> None:
    """Short slanted strokes on the ground's side of a line."""
    length = float(np.hypot(b[0] - a[0], b[1] - a[1]))
    u, v = (b[0] - a[0]) / length, (b[1] - a[1]) / length
    step, deep = 3.6 * pen.point, 4.2 * pen.point
    for k in np.arange(0.5, length / step):
        x, y = a[0] + u * step * k, a[1] + v * step * k
        pen.line(
            [(x, y), (x + (side[0] - 0.8 * u) * deep, y + (side[1] - 0.8 * v) * deep)], style.THIN, style.SOFT, zorder=2
        )
    middle = [(x + side[0] * deep / 2, y + side[1] * deep / 2) for x, y in (a, b)]
    pen.keep_clear(middle, 6.0)


def _block(pen: Pen, item: Item, long: float) -> None:
    (spot,) = item.spots
    u, v = item.along
    a, b = long * style.BLOCK / 2 * pen.point, style.BLOCK / 2 * pen.point
    corners = [
        (spot[0] + i * a * u - j * b * v, spot[1] + i * a * v + j * b * u)
        for i, j in ((1, 1), (-1, 1), (-1, -1), (1, -1))
    ]
    pen.shape(corners, facecolor=style.PAPER, edgecolor=style.INK, lw=style.OUTLINE, zorder=4.5)
    pen.keep_clear([(spot[0] - a * u, spot[1] - a * v), (spot[0] + a * u, spot[1] + a * v)], style.BLOCK)
    if item.name:
        pen.words(item.name, spot, style.BLOCK, pen.away(spot), fontsize=style.SMALL)


def _slot(pen: Pen, item: Item) -> None:
    _block(pen, item, 1.0)
    pen.ax.plot(*item.spots[0], "o", ms=style.PIN - 1, mfc=style.PAPER, mec=style.INK, mew=style.OUTLINE, zorder=6)


def _slide(pen: Pen, item: Item) -> None:
    _block(pen, item, 2.2)


def _weld(pen: Pen, item: Item) -> None:
    (spot,) = item.spots
    pen.ax.plot(*spot, "s", ms=style.PIN, mfc=style.INK, mec=style.INK, zorder=6)
    pen.keep_clear(item.spots, style.PIN)
    if item.name:
        pen.words(item.name, spot, style.BAR, pen.away(spot), fontsize=style.SMALL)


def _footing(pen: Pen, item: Item) -> None:
    """What a pin or weld on the ground stands on, drawn to the side where least is in the way."""
    (spot,) = item.spots
    high, half = 11 * pen.point, 7.5 * pen.point
    sides: list[Spot] = [(0.0, -1.0), (0.0, 1.0), (-1.0, 0.0), (1.0, 0.0)]
    start = 3 * pen.point

    def cost(side: Spot) -> float:
        ray = [
            (spot[0] + side[0] * start, spot[1] + side[1] * start),
            (spot[0] + side[0] * 1.6 * high, spot[1] + side[1] * 1.6 * high),
        ]
        return pen.covers(ray, 17.0) + 4.0 * sides.index(side)

    u, v = min(sides, key=cost)
    foot = (spot[0] + u * high, spot[1] + v * high)
    a, b = (foot[0] - v * half, foot[1] + u * half), (foot[0] + v * half, foot[1] - u * half)
    near = [(spot[0] - v * half * 0.4, spot[1] + u * half * 0.4), (spot[0] + v * half * 0.4, spot[1] - u * half * 0.4)]
    pen.shape([near[0], near[1], b, a], facecolor=style.PAPER, edgecolor=style.INK, lw=style.OUTLINE, zorder=2.4)
    wide = 1.35
    ends = [
        (foot[0] - v * half * wide, foot[1] + u * half * wide),
        (foot[0] + v * half * wide, foot[1] - u * half * wide),
    ]
    pen.line(ends, style.OUTLINE, style.INK, zorder=2.5)
    _hatch(pen, ends[0], ends[1], (u, v))
    pen.keep_clear([spot, foot], 14.0)


def _point(pen: Pen, item: Item) -> None:
    (spot,) = item.spots
    pen.ax.plot(*spot, "o", ms=1.6, color=style.INK, zorder=6.5)
    pen.words(item.name, spot, style.BAR * 0.8, pen.away(spot))


def _wheel(pen: Pen, item: Item) -> None:
    """A pulley or drum by its pitch circle: centre, and four places on it."""
    (x, y), (rim, _) = item.spots[0], item.spots[1]
    turns = np.linspace(0.0, 2 * np.pi, 73)
    ring = [(x + (rim - x) * float(np.cos(t)), y + (rim - x) * float(np.sin(t))) for t in turns]
    pen.shape(ring, facecolor=style.PAPER, edgecolor=style.SOFT, lw=style.OUTLINE, zorder=2.2, alpha=0.85)
    pen.keep_clear(ring, weight=0.5)


def _rope(pen: Pen, item: Item) -> None:
    if item.name:
        (ax, ay), (bx, by) = item.spots[0], item.spots[1]
        middle = ((ax + bx) / 2, (ay + by) / 2)
        pen.words(item.name, middle, style.BAR, pen.away(middle), fontsize=style.SMALL)


def _line_of_rope(pen: Pen, item: Item) -> None:
    pen.line(item.spots, style.ROPE, style.INK, zorder=4.8)
    pen.keep_clear(item.spots, style.ROPE)


def _line_of_track(pen: Pen, item: Item) -> None:
    """A groove along a curve."""
    pen.line(item.spots, style.BAR * 0.55, style.INK, zorder=3.6)
    pen.line(item.spots, style.BAR * 0.55 - 2 * style.THIN, style.PAPER, zorder=3.6)
    pen.keep_clear(item.spots, weight=0.5)


def _told_by_arrow(pen: Pen, item: Item) -> None:
    """Forces and torques have no body of their own."""


def _arrow_at(pen: Pen, item: Item) -> None:
    """An arrow that starts or ends at its spot, on whichever side of it there is more room."""
    (spot,) = item.spots
    u, v = item.along
    long = style.SHORTEST_ARROW + (style.LONGEST_ARROW - style.SHORTEST_ARROW) * item.size
    gap, reach = 4.5 * pen.point, (long + 4.5) * pen.point
    away = pen.away(spot)

    def ends(sign: float) -> list[Spot]:
        return [(spot[0] + sign * u * d, spot[1] + sign * v * d) for d in (gap, reach)]

    sign = min((1.0, -1.0), key=lambda s: pen.covers(ends(s), 12.0) - 6.0 * s * (u * away[0] + v * away[1]))
    near, far = ends(sign)
    tail, tip = (near, far) if sign > 0 else (far, near)
    color = style.tone(item.tone)
    _arrow(pen, tail, tip, color)
    pen.keep_clear([tail, tip], 5.0, 1.5)
    pen.words(item.name, far, 4.0, (sign * u, sign * v), color=color, fontsize=style.SMALL, fontweight="bold")


def _arrow(pen: Pen, tail: Spot, tip: Spot, color: str, curve: str = "") -> None:
    look = {
        "arrowstyle": "-|>,head_length=0.55,head_width=0.22", "color": color, "lw": style.ARROW,
        "shrinkA": 0, "shrinkB": 0, "mutation_scale": 10, "joinstyle": "miter",
    }  # fmt: skip
    if curve:
        look["connectionstyle"] = curve
    pen.ax.annotate("", tip, tail, arrowprops=look, zorder=7, annotation_clip=False)


def _couple(pen: Pen, item: Item) -> None:
    """An arrow bent round its spot, the way the couple turns."""
    (spot,) = item.spots
    sense, radius = item.along[0], 14 * pen.point
    turns = np.radians(np.linspace(-60, 200, 40) if sense > 0 else np.linspace(240, -20, 40))
    arc = [(spot[0] + radius * float(np.cos(t)), spot[1] + radius * float(np.sin(t))) for t in turns]
    color = style.tone(item.tone)
    pen.line(arc[:-3], style.ARROW, color, zorder=7)
    _arrow(pen, arc[-5], arc[-1], color)
    pen.keep_clear(arc, 4.0, 1.5)
    tail = (arc[0][0] - spot[0], arc[0][1] - spot[1])
    pen.words(item.name, arc[0], 4.0, tail, color=color, fontsize=style.SMALL, fontweight="bold")


def _pair(pen: Pen, item: Item) -> None:
    pen.line(item.spots, style.OUTLINE, style.SOFT, linestyle=(0, (3, 2)), zorder=2.6)
    pen.keep_clear(item.spots)


def _weight(pen: Pen, item: Item) -> None:
    (spot,) = item.spots
    pen.ax.plot(*spot, "o", ms=style.PIN, mfc=style.tone("weight"), mec=style.PAPER, mew=0.5, zorder=5.5)


def _contact(pen: Pen, item: Item) -> None:
    """A small open square round the point that comes against the face."""
    (spot,) = item.spots
    pen.ax.plot(*spot, "s", ms=style.PIN * 0.8, mfc=style.PAPER, mec=style.INK, mew=style.OUTLINE, zorder=5.5)
    pen.keep_clear(item.spots, style.PIN)
    if item.name:
        pen.words(item.name, spot, style.BAR, pen.away(spot), fontsize=style.SMALL)


def _face(pen: Pen, item: Item) -> None:
    """The face of a workpiece or stop, hatched on its solid side, to the right of the line."""
    (ax, ay), (bx, by) = item.spots
    length = float(np.hypot(bx - ax, by - ay)) or 1.0
    pen.line(item.spots, style.OUTLINE * 1.5, style.INK, zorder=2.6)
    _hatch(pen, (ax, ay), (bx, by), ((by - ay) / length, -(bx - ax) / length))
    pen.keep_clear(item.spots, weight=0.5)


SHAPES: dict[str, Callable[[Pen, Item], None]] = {
    "bar": _bar,
    "stem": _stem,
    "path": _path,
    "pin": _pin,
    "guide": _guide,
    "slot": _slot,
    "slide": _slide,
    "weld": _weld,
    "footing": _footing,
    "point": _point,
    "arrow": _arrow_at,
    "couple": _couple,
    "force": _told_by_arrow,
    "torque": _told_by_arrow,
    "pair": _pair,
    "weight": _weight,
    "round of rope": _wheel,
    "rope": _rope,
    "line of rope": _line_of_rope,
    "track": _slot,
    "line of track": _line_of_track,
    "contact": _contact,
    "line of contact": _face,
    "haul": _told_by_arrow,
    **GEAR_SHAPES,
    **SPRING_SHAPES,
    **DIAGRAM_SHAPES,
    **LOAD_SHAPES,
}
