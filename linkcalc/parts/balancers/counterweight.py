"""Counterweight: a mass on a member, its size or its place or both to be found."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from linkcalc.parts import fields
from linkcalc.parts.contract import Size
from linkcalc.words import word


@word("balancer", "mass_on")
@dataclass(frozen=True)
class Counterweight:
    """A mass to be found on a member: how heavy, where, or both."""

    mass_on: str = fields.name("member", "the member that carries it")
    place: Any = fields.part(
        "room", "where on the member; left out: as far from its first point as its points go", None
    )
    mass: Any = fields.span("mass", "how heavy: a size, or [least, most]", None)
    mass_step: Size | None = fields.size("mass", "it comes in whole steps of this", None, sign="plus")
    place_step: Size | None = fields.size("length", "its place is rounded to this", None, sign="plus")
    instead_of: str | None = fields.name("load", "a load of the model that it takes the place of", None)

    called = "counterweight"
