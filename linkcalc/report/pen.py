"""A sheet to draw on: measures in points at any scale, and remembers what words must keep clear of."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import TYPE_CHECKING, Any

import numpy as np

from linkcalc.parts.pose import Array
from linkcalc.report import labels, style

if TYPE_CHECKING:
    from matplotlib.axes import Axes

Spot = tuple[float, float]


@dataclass(frozen=True)
class _Words:
    text: str
    wish: labels.Wish
    look: dict[str, Any]


class Pen:
    """Draws on axes whose scale is known.

    ax     axes with the limits set, equal scale
    point  how much of the drawing's unit one point of the page is
    centre of the drawing: words and arrows rather stand away from it
    """

    def __init__(self, ax: Axes, point: float, centre: Spot):
        self.ax, self.point, self.centre = ax, point, centre
        self._clear: list[Array] = []
        self._words: list[_Words] = []

    def away(self, spot: Spot) -> Spot:
        """Direction from the middle of the drawing to a spot, (0, 0) in the middle."""
        dx, dy = spot[0] - self.centre[0], spot[1] - self.centre[1]
        length = float(np.hypot(dx, dy))
        return (dx / length, dy / length) if length > 5 * self.point else (0.0, 0.0)

    def line(self, spots: Sequence[Spot], width: float, color: str, **look: Any) -> None:
        """A line through places, so many points wide."""
        x, y = zip(*spots, strict=True)
        look = {"solid_capstyle": "round", "solid_joinstyle": "round", **look}
        self.ax.plot(x, y, lw=width, color=color, **look)

    def shape(self, corners: Sequence[Spot], **look: Any) -> None:
        """A closed area."""
        x, y = zip(*corners, strict=True)
        self.ax.fill(x, y, **look)

    def keep_clear(self, spots: Sequence[Spot], across: float = 0.0, weight: float = 1.0) -> None:
        """Words shall not stand on this line, so many points across."""
        at = self._page(spots)
        pairs = list(pairwise(at)) or [(at[0], at[0])]
        for a, b in pairs:
            span = b - a
            length = float(np.hypot(*span))
            square = np.array([-span[1], span[0]]) / length if length else np.array([0.0, 1.0])
            for off in np.arange(-across / 2, across / 2 + 0.1, 2.5) if across else (0.0,):
                self._clear.append(labels.along(a + off * square, b + off * square, weight))

    def covers(self, spots: Sequence[Spot], across: float) -> float:
        """How much already drawn a line so many points across would cover."""
        if not self._clear:
            return 0.0
        known = np.concatenate(self._clear)
        total = 0.0
        for a, b in pairwise(self._page(spots)):
            span = b - a
            length = float(np.hypot(*span)) or 1.0
            along = (known[:, :2] - a) @ span / length
            beside = np.abs((known[:, :2] - a) @ np.array([-span[1], span[0]]) / length)
            total += float(known[(along > 0) & (along < length) & (beside < across / 2), 2].sum())
        return total

    def words(self, text: str, spot: Spot, near: float, toward: Spot = (0.0, 0.0), **look: Any) -> None:
        """A label for a spot; it finds its place when all is drawn."""
        look = {"fontsize": style.TEXT, "color": style.INK, **look}
        x, y = self._page([spot])[0]
        width, height = text_size(self.ax, text, look["fontsize"], look.get("fontweight", "normal"))
        self._words.append(_Words(text, labels.Wish(float(x), float(y), width, height, near, toward), look))

    def write(self) -> None:
        """Place all labels and write them, with a hair line to those that had to stand far off."""
        left, bottom, right, top = (float(v) / self._pixel for v in self.ax.bbox.extents)
        clear = np.concatenate(self._clear) if self._clear else np.zeros((0, 3))
        found = labels.place([w.wish for w in self._words], clear, (left, bottom, right, top))
        for words, at in zip(self._words, found, strict=True):
            x, y = self._drawn((at.x, at.y))
            self.ax.text(x, y, words.text, ha="center", va="center", zorder=9, **words.look)
            if at.far:
                self._leader(words.wish, at)

    def _leader(self, wish: labels.Wish, at: labels.Placed) -> None:
        """From the nearest edge of the words to their spot."""
        edge = (
            float(np.clip(wish.x, at.x - wish.width / 2, at.x + wish.width / 2)),
            float(np.clip(wish.y, at.y - wish.height / 2, at.y + wish.height / 2)),
        )
        self.line([self._drawn(edge), self._drawn((wish.x, wish.y))], 0.4, style.SOFT, zorder=8)

    @property
    def _pixel(self) -> float:
        """Pixels of the figure in a point."""
        return float(self.ax.get_figure(root=True).dpi) / 72.0  # type: ignore[union-attr]

    def _page(self, spots: Sequence[Spot]) -> Array:
        """(n, 2) places in points of the page."""
        return np.asarray(self.ax.transData.transform(np.asarray(spots, dtype=np.float64))) / self._pixel

    def _drawn(self, at: Spot) -> Spot:
        x, y = self.ax.transData.inverted().transform((at[0] * self._pixel, at[1] * self._pixel))
        return float(x), float(y)


def text_size(ax: Axes, text: str, size: float, weight: str = "normal") -> tuple[float, float]:
    """Width and height of text in points; lines are parted by a line feed."""
    from matplotlib.font_manager import FontProperties

    canvas: Any = ax.figure.canvas
    renderer, pixel = canvas.get_renderer(), float(ax.get_figure(root=True).dpi) / 72.0  # type: ignore[union-attr]
    type_ = FontProperties(size=size, weight=weight)
    lines = [renderer.get_text_width_height_descent(t, type_, False) for t in text.splitlines()]
    return max(w for w, _, _ in lines) / pixel, sum(h for _, h, _ in lines) / pixel + 2.5 * (len(lines) - 1)
