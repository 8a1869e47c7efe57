"""Distance: how far two points are apart, as a cylinder or screw sets it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Poses, Row, Site, Sketch, Value, X, Y
from linkcalc.parts.held_length import HeldLength
from linkcalc.words import word


@word("coordinate", "distance")
@dataclass(frozen=True)
class Distance:
    """The distance between two points."""

    distance: tuple[str, str] = fields.names("point", "the two points")

    kind = "length"

    def coordinate(self, sketch: Sketch) -> DistanceCoordinate:
        return DistanceCoordinate(sketch.site(self.distance[0]), sketch.site(self.distance[1]))


@dataclass(frozen=True, eq=False)
class DistanceCoordinate:
    """Length from the first point to the second [m]."""

    first: Site
    second: Site
    kind = "length"

    def value(self, at: Poses) -> Value:
        (ax, ay), (bx, by) = at.spot(self.first), at.spot(self.second)
        length: Value = np.hypot(bx - ax, by - ay)
        return length

    def hold(self, target: Value) -> HeldLength:
        return HeldLength(self, target)

    def slope(self, at: Poses) -> Row:
        first, second = self.first, self.second
        (ax, ay), (bx, by) = at.spot(first), at.spot(second)
        length = np.hypot(bx - ax, by - ay)
        nx, ny = (bx - ax) / length, (by - ay) / length
        (ua, va), (ub, vb) = at.arm(first), at.arm(second)
        a, b = first.member, second.member
        return (
            (b, X, nx), (b, Y, ny), (b, TURN, ub * ny - vb * nx),
            (a, X, -nx), (a, Y, -ny), (a, TURN, va * nx - ua * ny),
        )  # fmt: skip
