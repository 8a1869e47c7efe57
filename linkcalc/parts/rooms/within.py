"""A place within reach of a point."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch
from linkcalc.parts.law_push import nominal
from linkcalc.parts.rooms import Room, spot
from linkcalc.words import word


@word("room", "within")
@dataclass(frozen=True)
class Within:
    """Anywhere no farther than a reach from a point."""

    within: Size = fields.size("length", "the largest distance", sign="plus")
    of: str = fields.name("point", "the point that it is measured from, as drawn")
    on: str | None = fields.name("member", "the member that has it, if it is not the only one with this point", None)

    @property
    def points(self) -> tuple[str, ...]:
        return (self.of,)

    def room(self, sketch: Sketch) -> Room:
        (x, y), reach = spot(sketch, self.of), nominal(sketch.value(self.within, "length"))
        low, high = (x - reach, y - reach), (x + reach, y + reach)
        return Room((0.0, 0.0), ((1.0, 0.0), (0.0, 1.0)), ("x", "y"), low, high, (x, y, reach))
