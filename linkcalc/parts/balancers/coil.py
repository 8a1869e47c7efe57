"""Coil spring: rate, free length and both ends to be found."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from linkcalc.parts import fields
from linkcalc.parts.contract import Size
from linkcalc.parts.laws.linear import BOTH, COMPRESSION, TENSION
from linkcalc.words import word

ENDS = 'two places are wanted: ["A", { line = ["P", "Q"], on = "arm" }]'


@word("balancer", "spring")
@dataclass(frozen=True)
class Coil:
    """A coil spring to be found: its rate, its free length, where its ends are."""

    spring: tuple[Any, ...] = fields.parts("room", "where its two ends may be", ENDS)
    rate: Any = fields.span("stiffness", "its rate: a size, or [least, most]", None)
    free_length: Any = fields.span("length", "length without force: a size, or [least, most]", 0)
    acts: str = fields.choice((BOTH, TENSION, COMPRESSION), "which way it can act, and may never be slack", BOTH)
    shortest: Size | None = fields.size("length", "length it must not go below", None, sign="plus")
    longest: Size | None = fields.size("length", "length it must not go beyond", None, sign="plus")
    number: int = fields.count("how many alike, side by side", 1, most=12)
    loss: Size = fields.size("number", "part of its force that it loses with age: 0.1", 0, sign="not minus")
    rate_step: Size | None = fields.size("stiffness", "rates come in whole steps of this", None, sign="plus")
    length_step: Size | None = fields.size("length", "free lengths come in whole steps of this", None, sign="plus")
    place_step: Size | None = fields.size("length", "the places of its ends are rounded to this", None, sign="plus")
    instead_of: str | None = fields.name("load", "a load of the model that it takes the place of", None)

    called = "spring"
