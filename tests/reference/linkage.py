"""A planar linkage as plain data: what every independent solution and every peer of the benchmark starts from.

SI units, radians, counter-clockwise plus. Places are ground axes as drawn. The body "ground" does not move.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from math import atan2

import numpy as np

Place = tuple[float, float]
End = tuple[str, str]
"""(body, place)"""


@dataclass(frozen=True)
class Slot:
    """A place of one body kept on a straight line of another; the line passes through the place as drawn."""

    of: str
    at: str
    along: Place
    on: str = "ground"


@dataclass(frozen=True)
class Slide:
    """A body kept on a straight line of another, and kept from turning on it."""

    of: str
    at: str
    along: Place
    on: str = "ground"


@dataclass(frozen=True)
class Force:
    """A force on a body; as the effort (fx, fy) is one unit of it. It keeps its direction, or turns with the body."""

    body: str
    at: str
    fx: float
    fy: float
    turns: bool = False


@dataclass(frozen=True)
class Torque:
    """A couple on a body, counter-clockwise plus, taken up by another."""

    body: str
    size: float = 1.0
    against: str = "ground"


@dataclass(frozen=True)
class Pair:
    """Two opposite forces that push two places apart (minus: draw together)."""

    ends: tuple[End, End]
    size: float = 1.0


@dataclass(frozen=True)
class Turn:
    """Driven by the angle of a body: of the line from its first to its last place, from the x axis."""

    body: str


@dataclass(frozen=True)
class Distance:
    """Driven by the distance of two places."""

    ends: tuple[End, End]


Load = Force | Torque | Pair


@dataclass(frozen=True)
class Linkage:
    """Bodies that carry the same place are pinned there.

    places  name -> (x, y) [m] as drawn
    bodies  name -> the places it carries; "ground" is one of them
    effort  what is unknown, for one unit; None (with no drive) for a frame
    """

    places: Mapping[str, Place]
    bodies: Mapping[str, tuple[str, ...]]
    slots: tuple[Slot, ...] = ()
    slides: tuple[Slide, ...] = ()
    loads: tuple[Load, ...] = ()
    effort: Load | None = None
    drive: Turn | Distance | None = None

    def moving(self) -> list[str]:
        return [body for body in self.bodies if body != "ground"]

    def pins(self) -> list[tuple[str, str, str]]:
        """(place, first body, other body), one for every further body at a shared place."""
        found = []
        for place in self.places:
            first, *others = [b for b, carried in self.bodies.items() if place in carried] or [""]
            found += [(place, first, other) for other in others]
        return found

    def frame(self, body: str) -> tuple[float, float, float]:
        """Where a body is as drawn: (x, y) of its first place, angle of the line from there to its last place."""
        if body == "ground":
            return 0.0, 0.0, 0.0
        (x, y), (xe, ye) = self.places[self.bodies[body][0]], self.places[self.bodies[body][-1]]
        return x, y, atan2(ye - y, xe - x)


@dataclass(frozen=True)
class Solution:
    """All poses of a run.

    bodies  names, ground first
    poses   (pose, moving body, 3)  x, y [m] of the first place, angle [rad] of the line to the last place
    effort  (pose,)  [N] or [N m]; NaN for a frame
    forces  (place, body a, body b) -> (pose, 3)  force x, y [N] and couple [N m] that a feels from b
    """

    bodies: tuple[str, ...]
    poses: np.ndarray
    effort: np.ndarray
    forces: dict[tuple[str, str, str], np.ndarray]

    def force(self, place: str, body: str) -> np.ndarray:
        """(pose, 3): all that a body feels at a place, whichever bodies meet there."""
        felt = [f if a == body else -f for (p, a, b), f in self.forces.items() if p == place and body in (a, b)]
        if not felt:
            raise KeyError(f"no joint at {place} on {body}")
        return np.sum(felt, axis=0)
