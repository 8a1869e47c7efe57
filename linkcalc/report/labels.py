"""Where to write names and sizes so that nothing covers anything: each label tries places around its spot.

All in points of the page, x right, y up. Plain geometry: no drawing library in here.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.parts.pose import Array

_DIRECTIONS = 24
_RINGS = (1.0, 1.6, 2.4, 3.6, 5.2, 7.5, 10.5, 15.0, 21.0)
_GAP = 1.5
_LEADER = 12.0
_STEP = 2.0


@dataclass(frozen=True)
class Wish:
    """A label that wants a place.

    x, y           the spot it belongs to
    width, height  of its text
    near           how far its edge keeps from the spot
    toward         where it would rather stand, (0, 0) anywhere
    """

    x: float
    y: float
    width: float
    height: float
    near: float = 3.0
    toward: tuple[float, float] = (0.0, 0.0)


@dataclass(frozen=True)
class Placed:
    """Centre of a label; far = so far from its spot that a leader line is due."""

    x: float
    y: float
    far: bool


def along(a: Array, b: Array, weight: float = 1.0) -> Array:
    """(n, 3) a line as something to keep clear of: points on it a step apart, with their weight."""
    n = max(2, int(np.hypot(*(b - a)) / _STEP) + 1)
    return np.column_stack([np.linspace(a[0], b[0], n), np.linspace(a[1], b[1], n), np.full(n, weight)])


def place(wishes: Sequence[Wish], obstacles: Array, frame: tuple[float, float, float, float]) -> list[Placed]:
    """Find a place for each label, the first come first served.

    obstacles  (n, 3) x, y, weight of what should not be covered
    frame      (left, bottom, right, top) that labels keep inside
    """
    taken: list[tuple[float, float, float, float]] = []
    found = []
    for wish in wishes:
        centres, rings = _candidates(wish)
        boxes = np.column_stack([
            centres[:, 0] - wish.width / 2 - _GAP, centres[:, 1] - wish.height / 2 - _GAP,
            centres[:, 0] + wish.width / 2 + _GAP, centres[:, 1] + wish.height / 2 + _GAP,
        ])  # fmt: skip
        cost = _covered(boxes, obstacles) + 40.0 * _outside(boxes, frame) + 60.0 * _overlap(boxes, taken)
        cost += 1.2 * rings + _averse(centres, wish)
        far = (rings - 1) * wish.near > _LEADER
        cost += np.where(far, 15.0 * _crossed(centres, wish, taken), 0.0)
        best = int(np.argmin(cost))
        taken.append(tuple(boxes[best]))
        if far[best]:
            obstacles = np.concatenate([obstacles, along(np.array([wish.x, wish.y]), centres[best])])
        found.append(Placed(float(centres[best, 0]), float(centres[best, 1]), bool(far[best])))
    return found


def _candidates(wish: Wish) -> tuple[Array, Array]:
    """(n, 2) centres around the spot, and (n,) how far out each is: 1 touches the spot's clearance."""
    angle = np.arange(_DIRECTIONS) * (2 * np.pi / _DIRECTIONS)
    ux, uy = np.cos(angle), np.sin(angle)
    # from the centre of a box to its edge in a direction: the label touches with its edge, wherever it stands
    with np.errstate(divide="ignore"):
        reach = np.minimum(wish.width / 2 / np.abs(ux), wish.height / 2 / np.abs(uy))
    parts, rings = [], []
    for ring in _RINGS:
        out = reach + wish.near * ring
        parts.append(np.column_stack([wish.x + ux * out, wish.y + uy * out]))
        rings.append(np.full(_DIRECTIONS, ring))
    return np.concatenate(parts), np.concatenate(rings)


def _covered(boxes: Array, obstacles: Array) -> Array:
    """(n,) weight of the obstacles inside each box."""
    if not len(obstacles):
        return np.zeros(len(boxes))
    x, y, weight = obstacles.T
    inside = (x > boxes[:, :1]) & (x < boxes[:, 2:3]) & (y > boxes[:, 1:2]) & (y < boxes[:, 3:])
    total: Array = inside @ weight
    return total


def _outside(boxes: Array, frame: tuple[float, float, float, float]) -> Array:
    """(n,) how far each box sticks out of the frame."""
    left, bottom, right, top = frame
    low = np.maximum(left - boxes[:, 0], 0) + np.maximum(bottom - boxes[:, 1], 0)
    return np.asarray(low + np.maximum(boxes[:, 2] - right, 0) + np.maximum(boxes[:, 3] - top, 0), dtype=np.float64)


def _overlap(boxes: Array, taken: Sequence[tuple[float, float, float, float]]) -> Array:
    """(n,) how deep each box goes into labels that stand already."""
    depth = np.zeros(len(boxes))
    for left, bottom, right, top in taken:
        wide = np.minimum(boxes[:, 2], right) - np.maximum(boxes[:, 0], left)
        high = np.minimum(boxes[:, 3], top) - np.maximum(boxes[:, 1], bottom)
        depth += np.where((wide > 0) & (high > 0), 2.0 + np.minimum(wide, high), 0.0)
    return depth


def _crossed(centres: Array, wish: Wish, taken: Sequence[tuple[float, float, float, float]]) -> Array:
    """(n,) how many labels that stand already a leader line from the spot would cross."""
    part = np.linspace(0.0, 0.9, 19)
    x = wish.x + np.outer(centres[:, 0] - wish.x, part)
    y = wish.y + np.outer(centres[:, 1] - wish.y, part)
    count = np.zeros(len(centres))
    for left, bottom, right, top in taken:
        count += ((x > left) & (x < right) & (y > bottom) & (y < top)).any(axis=1)
    return count


def _averse(centres: Array, wish: Wish) -> Array:
    """(n,) a small price for standing on the other side than wished."""
    tx, ty = wish.toward
    length = np.hypot(tx, ty)
    if not length:
        return np.zeros(len(centres))
    off = centres - (wish.x, wish.y)
    away = 1 - (off[:, 0] * tx + off[:, 1] * ty) / (length * np.hypot(*off.T))
    return np.asarray(1.5 * away, dtype=np.float64)
