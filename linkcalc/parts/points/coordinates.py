"""A point by its coordinates: written ``[x, y]`` in a file."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch, Value
from linkcalc.words import word


@word("construction", "x")
@dataclass(frozen=True)
class Coordinates:
    """A point by its coordinates."""

    x: Size = fields.size("length", "to the right")
    y: Size = fields.size("length", "up")

    def needs(self) -> tuple[str, ...]:
        return ()

    def place(self, sketch: Sketch) -> tuple[Value, Value]:
        return sketch.value(self.x, "length"), sketch.value(self.y, "length")
