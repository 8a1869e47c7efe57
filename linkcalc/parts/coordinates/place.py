"""Place: where a load stands along its line, stepped while the mechanism stands still as drawn."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.along import Moved
from linkcalc.parts.contract import Poses, Sketch, Value
from linkcalc.words import word


@word("coordinate", "place")
@dataclass(frozen=True)
class Place:
    """Where a load stands along its line, from its first point; the mechanism stands as drawn, held by its effort."""

    place: str = fields.name("pusher", "the load that moves, of the kind 'moves_along' or 'mass_along'")

    kind = "length"
    stands = True

    def coordinate(self, sketch: Sketch) -> PlaceCoordinate:
        return PlaceCoordinate(self.place, sketch.moved(self.place))


@dataclass(frozen=True, eq=False)
class PlaceCoordinate:
    """Place of a load [m]."""

    name: str
    load: Moved
    kind = "length"
    stands = True

    @property
    def span(self) -> Value:
        return self.load.span

    def value(self, at: Poses) -> Value:
        return at.places.get(self.name, self.load.place)

    def put(self, at: Poses, place: Value) -> Poses:
        """The same poses with the load elsewhere."""
        return Poses(at.x, at.y, at.c, at.s, at.down, at.field, {**at.places, self.name: place})
