"""Where a counterweight or the end of a spring may be: rooms, in numbers."""

from __future__ import annotations

from dataclasses import dataclass, replace

from linkcalc.parts.contract import Sketch
from linkcalc.parts.law_push import nominal


@dataclass(frozen=True)
class Room:
    """Places a + t1 d1 + t2 d2 in the drawing, each t within its bounds; all in [m], ground axes of the drawing.

    start   (x, y) the place for t = 0
    axes    (x, y) directions of length 1, none, one or two of them
    names   what each t is called: "x", "along P Q"
    low, high  bounds of each t; alike where it is settled
    circle  (x, y, radius) that the place must be within besides, or None
    point   name of the point that it is, "" if it is no point of the model
    """

    start: tuple[float, float]
    axes: tuple[tuple[float, float], ...] = ()
    names: tuple[str, ...] = ()
    low: tuple[float, ...] = ()
    high: tuple[float, ...] = ()
    circle: tuple[float, float, float] | None = None
    point: str = ""

    @property
    def free(self) -> tuple[int, ...]:
        """Numbers of the axes along which the place is open."""
        return tuple(k for k, (a, b) in enumerate(zip(self.low, self.high, strict=True)) if b > a)

    @property
    def base(self) -> tuple[float, float]:
        """The place with all open t at nothing, the settled ones where they are."""
        x, y = self.start
        for k, (u, v) in enumerate(self.axes):
            if k not in self.free:
                x, y = x + self.low[k] * u, y + self.low[k] * v
        return x, y

    def settled(self, axis: int, value: float) -> Room:
        """The same with the place along one axis settled."""
        low, high = list(self.low), list(self.high)
        low[axis] = high[axis] = value
        return replace(self, low=tuple(low), high=tuple(high))


def spot(sketch: Sketch, point: str) -> tuple[float, float]:
    """[m] the drawn place of a point."""
    x, y = sketch.point(point)
    return nominal(x), nominal(y)
