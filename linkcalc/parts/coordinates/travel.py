"""Travel: how far a slot's point or a slide has gone along its line."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Poses, Row, Sketch, Travelled, Value
from linkcalc.parts.held_length import HeldLength
from linkcalc.words import word


@word("coordinate", "travel")
@dataclass(frozen=True)
class Travel:
    """Travel along a slot, slide or track: from its first point, or from the drawn place if the line is an angle."""

    travel: str = fields.name("guide", "the slot, slide or track")

    kind = "length"

    def coordinate(self, sketch: Sketch) -> TravelCoordinate:
        return TravelCoordinate(sketch.travelled(self.travel))


@dataclass(frozen=True, eq=False)
class TravelCoordinate:
    """Place along the line [m]."""

    joint: Travelled
    kind = "length"

    def value(self, at: Poses) -> Value:
        return self.joint.travel(at)

    def hold(self, target: Value) -> HeldLength:
        return HeldLength(self, target)

    def slope(self, at: Poses) -> Row:
        return self.joint.travel_slope(at)
