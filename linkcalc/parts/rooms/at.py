"""A place that is settled: a point."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Sketch
from linkcalc.parts.rooms import Room, spot
from linkcalc.words import word


@word("room", "at")
@dataclass(frozen=True)
class At:
    """At a point, nowhere else."""

    at: str = fields.name("point", "the point")
    on: str | None = fields.name("member", "the member that has it, if several carry the point", None)

    short = "at"

    @property
    def points(self) -> tuple[str, ...]:
        return (self.at,)

    def room(self, sketch: Sketch) -> Room:
        return Room(spot(sketch, self.at), point=self.at)
