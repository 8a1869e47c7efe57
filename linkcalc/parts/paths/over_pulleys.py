"""Over pulleys: the way of a rope from end to end, straight between pulleys and round them.

A rope passes a pulley on one side: with its centre to the right of the rope (the rope passes on the left, and turns
clockwise) or to the left. Two wheels one after the other give one tangent for each choice of sides, the crossed one
where the sides differ. With centres a and b, c = b - a, and k = s_b r_b - s_a r_a (s = +1 where the centre lies to
the left of the rope, -1 to the right), the straight part is sqrt(c² - k²) long and runs along
(length c - k c⊥) / c², where c⊥ is c turned a quarter counter-clockwise.

A shift of the wheels changes the whole length by what the straight parts gain: where a tangent rolls off an arc, the
arc gives what the straight part takes. So the pull on a wheel is tension times the sum of its two directions.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from linkcalc.parts.contract import Poses, Site, Value

Way = tuple[Value, Value]
Pull = tuple[Value, Value, Value]
"""force x, y and moment about the centre of a wheel, for a tension of 1"""


@dataclass(frozen=True, eq=False)
class Wheel:
    """What a rope runs round or ends at.

    site    its centre, as a member carries it
    radius  [m] of the pitch line of the rope; 0.0 for an end that is made fast at a point
    side    +1.0 if the centre lies to the left of the rope, -1.0 to the right
    fixed   True for a drum: it turns with its member, and the end of the rope is fixed to its rim
    """

    site: Site
    radius: Value = 0.0
    side: float = 1.0
    fixed: bool = False


@dataclass(frozen=True, eq=False)
class Run:
    """The straight parts of a rope in a batch of poses, in order: directions [-] and lengths [m]."""

    ways: tuple[Way, ...]
    lengths: tuple[Value, ...]


@dataclass(frozen=True, eq=False)
class OverPulleys:
    """The way of a rope.

    wheels  in order, both ends included
    middle  [rad] for each pulley between: the arc that other windings of the arc are measured from
    drawn   directions of the first and last straight part in the drawing pose: where drums begin to wind
    """

    wheels: tuple[Wheel, ...]
    middle: tuple[Value, ...]
    drawn: tuple[Way, Way]

    def run(self, at: Poses) -> Run:
        """Tangents from wheel to wheel."""
        centres = [at.spot(w.site) for w in self.wheels]
        parts = [_tangent(a, b, v, w) for (a, v), (b, w) in pairwise(zip(centres, self.wheels, strict=True))]
        return Run(tuple(way for way, _ in parts), tuple(length for _, length in parts))

    def length(self, at: Poses) -> Value:
        """[m] straight parts and arcs; of a drum what it has unwound since the drawing pose."""
        run = self.run(at)
        total: Value = 0.0
        for length in run.lengths:
            total = total + length
        for wheel, arc in zip(self.wheels, self.arcs(at, run), strict=True):
            if not _point(wheel):
                total = total + wheel.radius * arc
        return total

    def arcs(self, at: Poses, run: Run) -> tuple[Value, ...]:
        """[rad] arc of contact on each wheel: of a pulley the whole, below zero where the rope would have to leave
        it; of a drum what it has wound off since the drawing pose, minus where it has wound up."""
        arcs: list[Value] = [self._off(at, self.wheels[0], run.ways[0], self.drawn[0])]
        for wheel, before, after, middle in zip(self.wheels[1:-1], run.ways, run.ways[1:], self.middle, strict=False):
            arc = wheel.side * _angle(before, after)
            arcs.append(arc + 2 * np.pi * np.round((middle - arc) / (2 * np.pi)))
        arcs.append(-self._off(at, self.wheels[-1], run.ways[-1], self.drawn[1]))
        return tuple(arcs)

    def _off(self, at: Poses, wheel: Wheel, way: Way, drawn: Way) -> Value:
        if not wheel.fixed:
            return 0.0
        turn = np.arctan2(at.s[wheel.site.member], at.c[wheel.site.member])
        off: Value = wheel.side * (_angle(drawn, way) - turn)
        return off

    def pulls(self, run: Run, parts: Sequence[Value] = ()) -> list[Pull]:
        """What a tension of 1 does to each wheel; with parts: tensions in the straight parts that are not the same."""
        if parts:
            ends = [[tuple(_times(part, v) for v in pull) for pull in both]
                    for part, both in zip(parts, self.ends(run), strict=True)]  # fmt: skip
            first, last = ends[0][0], ends[-1][1]
            between = []
            for j, (before, after) in enumerate(pairwise(ends)):
                even = parts[j] is parts[j + 1]  # what it takes on one side it gives on the other
                fx, fy, moment = (a + b for a, b in zip(before[1], after[0], strict=True))
                between.append((fx, fy, 0.0 if even else moment))
            return [first, *between, last]  # type: ignore[list-item]
        out: list[Pull] = []
        last_wheel = len(self.wheels) - 1
        for k, wheel in enumerate(self.wheels):
            fx, fy = run.ways[k] if k < last_wheel else (0.0, 0.0)
            moment = wheel.side * wheel.radius if wheel.fixed else 0.0
            if k:
                bx, by = run.ways[k - 1]
                fx, fy = (fx - bx, fy - by) if k < last_wheel else (-bx, -by)
                moment = -moment
            out.append((fx, fy, moment))
        return out

    def ends(self, run: Run) -> list[tuple[Pull, Pull]]:
        """What a tension of 1 in each straight part alone does to the wheels at both its ends, acting at their rims."""
        return [
            ((dx, dy, _lever(v)), (-dx, -dy, -_lever(w)))
            for (dx, dy), (v, w) in zip(run.ways, pairwise(self.wheels), strict=True)
        ]


def over_pulleys(wheels: Sequence[Wheel], at: Poses) -> OverPulleys:
    """The way of a rope whose arcs are those that lie nearest in the drawing pose: from nothing up to a whole turn."""
    bare = OverPulleys(tuple(wheels), tuple(np.pi for _ in wheels[2:]), ((1.0, 0.0), (1.0, 0.0)))
    run = bare.run(at)
    middle = []
    for wheel, before, after in zip(wheels[1:-1], run.ways, run.ways[1:], strict=False):
        arc = wheel.side * _angle(before, after) % (2 * np.pi)
        # an arc can grow and shrink over the stroke: the jump from a whole turn to nothing is put where it is far from
        middle.append(np.where(arc < 1.5 * np.pi, 0.75 * np.pi, 1.5 * np.pi) if np.ndim(arc) else _middle(float(arc)))
    return OverPulleys(bare.wheels, tuple(middle), (run.ways[0], run.ways[-1]))


def _middle(arc: float) -> float:
    return 0.75 * np.pi if arc < 1.5 * np.pi or 2 * np.pi - arc < 1e-9 else 1.5 * np.pi


def _tangent(a: Way, b: Way, v: Wheel, w: Wheel) -> tuple[Way, Value]:
    """Direction and length of the straight part from one wheel to the next; NaN where one lies within the other."""
    cx, cy = b[0] - a[0], b[1] - a[1]
    if _point(v) and _point(w):
        length: Value = np.hypot(cx, cy)
        return (cx / length, cy / length), length
    k = w.side * w.radius - v.side * v.radius
    square = cx * cx + cy * cy
    length = np.sqrt(square - k * k)
    return ((length * cx + k * cy) / square, (length * cy - k * cx) / square), length


def _angle(before: Way, after: Way) -> Value:
    """From one direction to another, within half a turn."""
    (ax, ay), (bx, by) = before, after
    angle: Value = np.arctan2(ax * by - ay * bx, ax * bx + ay * by)
    return angle


def _lever(wheel: Wheel) -> Value:
    return 0.0 if _point(wheel) else wheel.side * wheel.radius


def _times(part: Value, value: Value) -> Value:
    return 0.0 if isinstance(value, float) and value == 0.0 else part * value


def _point(wheel: Wheel) -> bool:
    return isinstance(wheel.radius, float) and wheel.radius == 0.0
