"""What a guide bears on: the face of the block in it, and the pressure that this is allowed."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from linkcalc.parts import fields
from linkcalc.parts.contract import Sketch, Value

WHOLE = (("width", ("length",)), ("allowed_pressure", ("length", "width")))
"""Keys of a face that stand with others only."""


@dataclass(frozen=True, eq=False)
class Shoe:
    """The face of a guided block, about the place where the force of its joint is told.

    length   [m] along the guide; width [m] across it
    allowed  [Pa] pressure at its edge; None: none is told
    """

    length: Value
    width: Value
    allowed: Value | None


def length_field() -> Any:
    """The key of a point's guide for the block that the point turns in."""
    return fields.size("length", "length along it of the block that slides, for its pressure", None, sign="plus")


def width_field() -> Any:
    return fields.size("length", "width of that face across the guide, for its pressure", None, sign="plus")


def allowed_field() -> Any:
    return fields.size("stress", "pressure allowed at the edge of that face", None, sign="plus")


def shoe(part: Any, sketch: Sketch) -> Shoe | None:
    """The face that a part tells of, in SI; None if it tells of none."""
    if part.length is None or part.width is None:
        return None
    allowed = None if part.allowed_pressure is None else sketch.value(part.allowed_pressure, "stress")
    return Shoe(sketch.value(part.length, "length"), sketch.value(part.width, "length"), allowed)
