"""How springs, cylinders and the like look: one function a shape, as in ``shapes.py``. All sizes in points of the page,
so that a short spring is as plain as a long one."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from linkcalc.report import style
from linkcalc.report.blocks import Item
from linkcalc.report.pen import Pen, Spot

_HALF = 5.0  # half the breadth of a coil or tube
_LEAD = 9.0  # straight wire at the ends of a coil
_PITCH = 5.0  # of its windings
_TUBE = 0.55  # part of the length between the pins


class _Line:
    """A frame along the line of two spots: so far along it, so far to the left of it, in points."""

    def __init__(self, pen: Pen, item: Item):
        (ax, ay), (bx, by) = item.spots
        self.start, self.unit = (ax, ay), pen.point
        self.length = float(np.hypot(bx - ax, by - ay)) / pen.point
        self.u, self.v = (bx - ax, by - ay) if self.length else (1.0, 0.0)
        norm = float(np.hypot(self.u, self.v))
        self.u, self.v = self.u / norm, self.v / norm

    def at(self, along: float, left: float = 0.0) -> Spot:
        x, y = along * self.unit, left * self.unit
        return self.start[0] + x * self.u - y * self.v, self.start[1] + x * self.v + y * self.u

    def box(self, first: float, last: float, half: float) -> list[Spot]:
        return [self.at(first, half), self.at(last, half), self.at(last, -half), self.at(first, -half)]


def _coil(pen: Pen, item: Item) -> None:
    """A wire that goes to and fro between two straight ends."""
    line = _Line(pen, item)
    lead = min(_LEAD, 0.2 * line.length)
    turns = max(3, round((line.length - 2 * lead) / _PITCH))
    step = (line.length - 2 * lead) / turns
    sides = [_HALF if k % 2 else -_HALF for k in range(turns)]
    wire = [line.at(lead + (k + 0.5) * step, side) for k, side in enumerate(sides)]
    spots = [line.at(0), line.at(lead), *wire, line.at(line.length - lead), line.at(line.length)]
    pen.line(spots, style.OUTLINE, style.INK, zorder=3.5)
    pen.keep_clear(item.spots, 2 * _HALF)


def _tube(pen: Pen, item: Item, half: float, rod: float, fill: str) -> tuple[_Line, float]:
    """A tube from the first spot, and a rod out of it to the second."""
    line = _Line(pen, item)
    end = _TUBE * line.length
    look = {"edgecolor": style.INK, "lw": style.OUTLINE}
    pen.shape(line.box(end, line.length, rod), facecolor=style.PAPER, zorder=3.4, **look)
    pen.shape(line.box(0.0, end, half), facecolor=fill, zorder=3.5, **look)
    pen.keep_clear(item.spots, 2 * half)
    return line, end


def _gas_spring(pen: Pen, item: Item) -> None:
    _tube(pen, item, 3.6, 1.0, style.HAIR)


def _cylinder(pen: Pen, item: Item) -> None:
    line, end = _tube(pen, item, _HALF, 1.8, style.PAPER)
    for along in (0.62 * end, 0.62 * end + 2.5):  # the piston, as seen through the wall
        pen.line([line.at(along, _HALF), line.at(along, -_HALF)], style.THIN, style.INK, zorder=3.6)


def _screw(pen: Pen, item: Item) -> None:
    """A spindle with slanting threads, and its nut."""
    line = _Line(pen, item)
    half = 2.4
    for side in (half, -half):
        pen.line([line.at(0, side), line.at(line.length, side)], style.THIN, style.INK, zorder=3.4)
    for along in np.arange(2.0, line.length - 2.0, 3.2):
        pen.line([line.at(along, -half), line.at(along + 1.4, half)], style.THIN, style.SOFT, zorder=3.4)
    nut = _TUBE * line.length
    pen.shape(
        line.box(nut - 4, nut + 4, _HALF), facecolor=style.PAPER, edgecolor=style.INK, lw=style.OUTLINE, zorder=3.5
    )
    pen.keep_clear(item.spots, 2 * _HALF)


def _strip(pen: Pen, item: Item) -> None:
    """A drum with its coil at the first spot, and the strip drawn out of it."""
    line = _Line(pen, item)
    pen.line([line.at(0, _HALF), line.at(line.length)], style.OUTLINE, style.INK, zorder=3.4)
    _spiral(pen, line.at(0), _HALF, 1.75)
    pen.keep_clear(item.spots, 2 * _HALF)


def _torsion_spring(pen: Pen, item: Item) -> None:
    """A coil wound round its pin."""
    _spiral(pen, item.spots[0], 10.0, 2.25)
    pen.keep_clear(item.spots, 20.0)


def _spiral(pen: Pen, spot: Spot, radius: float, turns: float) -> None:
    angle = np.linspace(0, 2 * np.pi * turns, 60)
    out = radius * pen.point * (0.45 + 0.55 * angle / angle[-1])
    spots = [(spot[0] + r * float(np.cos(t)), spot[1] + r * float(np.sin(t))) for r, t in zip(out, angle, strict=True)]
    pen.line(spots, style.OUTLINE, style.INK, zorder=3.5)


def _dashes(pen: Pen, item: Item) -> None:
    """A force that is only written down has no body: its line."""
    pen.line(item.spots, style.OUTLINE, style.SOFT, linestyle=(0, (3, 2)), zorder=2.6)
    pen.keep_clear(item.spots)


def _nothing(pen: Pen, item: Item) -> None:
    """A torque that is only written down is told by its arrow."""


SPRING_SHAPES: dict[str, Callable[[Pen, Item], None]] = {
    "spring": _coil,
    "torsion spring": _torsion_spring,
    "gas spring": _gas_spring,
    "constant spring": _strip,
    "cylinder": _cylinder,
    "screw": _screw,
    "force over length": _dashes,
    "torque over angle": _nothing,
}
