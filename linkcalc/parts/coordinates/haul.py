"""Haul: how much rope has been drawn in at its hauling end since the drawing pose."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Hauled, Poses, Row, Sketch, Value
from linkcalc.parts.held_length import HeldLength
from linkcalc.words import word


@word("coordinate", "haul")
@dataclass(frozen=True)
class Haul:
    """Length of rope drawn in at its hauling end, from the drawing pose on; minus where it has been paid out."""

    haul: str = fields.name("rope", "the rope that is drawn in")

    kind = "length"

    def coordinate(self, sketch: Sketch) -> HaulCoordinate:
        return HaulCoordinate(sketch.hauled(self.haul))


@dataclass(frozen=True, eq=False)
class HaulCoordinate:
    """Rope in hand [m]."""

    rope: Hauled
    kind = "length"

    def value(self, at: Poses) -> Value:
        return self.rope.haul(at)

    def hold(self, target: Value) -> HeldLength:
        return HeldLength(self, target)

    def slope(self, at: Poses) -> Row:
        return self.rope.haul_slope(at)
