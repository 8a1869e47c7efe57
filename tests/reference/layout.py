"""A linkage laid out in numbers for the plain script: which body carries what, in the axes of the body."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from math import cos, hypot, sin

from tests.reference.linkage import Force, Linkage, Load, Pair, Place, Slide, Slot, Torque

Local = tuple[int, float, float]
"""(index of a body, place in its own axes)"""
Wrench = tuple[int, float, float, float, float, float]
"""(index of a body, place x, y, force x, y, couple)"""


class At:
    """Where the bodies are in one pose, ground first."""

    def __init__(self, unknowns: list[float]):
        self.x, self.y = [0.0, *unknowns[0::3]], [0.0, *unknowns[1::3]]
        self.angle = [0.0, *unknowns[2::3]]
        self.c, self.s = [cos(t) for t in self.angle], [sin(t) for t in self.angle]

    def place(self, local: Local) -> Place:
        i, u, v = local
        return self.x[i] + self.c[i] * u - self.s[i] * v, self.y[i] + self.s[i] * u + self.c[i] * v

    def direction(self, body: int, u: float, v: float) -> Place:
        return self.c[body] * u - self.s[body] * v, self.s[body] * u + self.c[body] * v


@dataclass(frozen=True)
class Meeting:
    """Where two bodies are joined: (body, place in its own axes) of each.

    along  None for a pin; of a slot or slide its direction in the axes of the second body
    angle  of a slide: that of the first body against the second, else None
    """

    a: int
    ua: float
    va: float
    b: int
    ub: float
    vb: float
    along: Place | None = None
    angle: float | None = None


class Layout:
    """The joints in this order: pins, slots, slides; `keys` says (place, body a, body b) of each."""

    def __init__(self, linkage: Linkage):
        self.linkage = linkage
        self.bodies = ("ground", *linkage.moving())
        self.index = {body: i for i, body in enumerate(self.bodies)}
        self.start = [value for body in linkage.moving() for value in linkage.frame(body)]
        guides = (*linkage.slots, *linkage.slides)
        self.keys = [*linkage.pins(), *((g.at, g.of, g.on) for g in guides)]
        self.pins = [Meeting(*self.local(a, at), *self.local(b, at)) for at, a, b in linkage.pins()]
        self.guides = [
            Meeting(*self.local(g.of, g.at), *self.local(g.on, g.at), self.own(g.on, g.along), self._kept(g))
            for g in guides
        ]
        self.loads = [self.wrenches(load) for load in linkage.loads]
        self.effort = self.wrenches(linkage.effort) if linkage.effort else None

    def own(self, body: str, direction: Place) -> Place:
        """A direction as drawn, made one long, in the axes of the body."""
        angle, length = self.linkage.frame(body)[2], hypot(*direction)
        u, v = direction[0] / length, direction[1] / length
        return cos(angle) * u + sin(angle) * v, cos(angle) * v - sin(angle) * u

    def local(self, body: str, place: str) -> Local:
        """A place as a body carries it."""
        (x, y), (xo, yo, angle) = self.linkage.places[place], self.linkage.frame(body)
        dx, dy = x - xo, y - yo
        return self.index[body], cos(angle) * dx + sin(angle) * dy, cos(angle) * dy - sin(angle) * dx

    def _kept(self, guide: Slot | Slide) -> float | None:
        return self.linkage.frame(guide.of)[2] - self.linkage.frame(guide.on)[2] if isinstance(guide, Slide) else None

    def wrenches(self, load: Load) -> Callable[[At], list[Wrench]]:
        """What a load does to each body it acts on."""
        match load:
            case Torque(body, size, against):
                a, b = self.index[body], self.index[against]
                return lambda at: [(a, at.x[a], at.y[a], 0, 0, size), (b, at.x[b], at.y[b], 0, 0, -size)]
            case Pair((first, second), size):
                return self._pair(self.local(*first), self.local(*second), size)
            case Force(body, place, fx, fy, False):
                local = self.local(body, place)
                return lambda at: [(local[0], *at.place(local), fx, fy, 0)]
            case Force(body, place, fx, fy, True):
                local, size, own = self.local(body, place), hypot(fx, fy), self.own(body, (fx, fy))

                def turning(at: At) -> list[Wrench]:
                    dx, dy = at.direction(local[0], *own)
                    return [(local[0], *at.place(local), size * dx, size * dy, 0)]

                return turning
        raise TypeError(f"not a load: {load}")

    def _pair(self, first: Local, second: Local, size: float) -> Callable[[At], list[Wrench]]:
        def push(at: At) -> list[Wrench]:
            (ax, ay), (bx, by) = at.place(first), at.place(second)
            length = hypot(bx - ax, by - ay)
            fx, fy = size * (bx - ax) / length, size * (by - ay) / length
            return [(first[0], ax, ay, -fx, -fy, 0), (second[0], bx, by, fx, fy, 0)]

        return push
