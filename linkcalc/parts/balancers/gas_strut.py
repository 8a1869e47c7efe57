"""Gas spring: force, length and both ends to be found."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from linkcalc.parts import fields
from linkcalc.parts.balancers.coil import ENDS
from linkcalc.parts.contract import Size
from linkcalc.words import word


@word("balancer", "gas_spring")
@dataclass(frozen=True)
class GasStrut:
    """A gas spring to be found: its force, its length, where its ends are."""

    gas_spring: tuple[Any, ...] = fields.parts("room", "where its two ends may be", ENDS)
    length: Any = fields.span("length", "length fully extended, between its pins: a size, or [least, most]")
    stroke: Size = fields.size("length", "how far the rod goes in", sign="plus")
    force: Any = fields.span("force", "force fully extended: a size, or [least, most]", None)
    rise: Size = fields.size("number", "force fully in over force fully extended", 1.3, sign="plus")
    exponent: Size = fields.size("number", "of the gas law: 1 moved slowly, up to 1.4 moved fast", 1, sign="plus")
    temperature: Size = fields.size("temperature", "at which its force is told", "20 degC")
    spare: Size = fields.size("length", "way that is left at both ends of its stroke", 0, sign="not minus")
    number: int = fields.count("how many alike, side by side", 1, most=12)
    loss: Size = fields.size("number", "part of its force that it loses with age: 0.1", 0, sign="not minus")
    force_step: Size | None = fields.size("force", "forces come in whole steps of this", None, sign="plus")
    length_step: Size | None = fields.size("length", "lengths come in whole steps of this", None, sign="plus")
    place_step: Size | None = fields.size("length", "the places of its ends are rounded to this", None, sign="plus")
    instead_of: str | None = fields.name("load", "a load of the model that it takes the place of", None)

    called = "gas spring"
