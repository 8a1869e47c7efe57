"""A plate on a pin."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Size
from linkcalc.words import word


@word("layer", "plate")
@dataclass(frozen=True)
class Plate:
    """One plate of a member on a pin; a member with several plates there (a fork) has one of these for each.

    gap    between it and the plate before it
    width  of the plate across the hole, edge: from the middle of the hole to its end; both for its eye
    """

    plate: str = fields.name("member", "the member whose plate it is")
    thickness: Size = fields.size("length", "its thickness", sign="plus")
    gap: Size = fields.size("length", "between it and the plate before it", 0, sign="not minus")
    width: Size | None = fields.size("length", "its width across the hole", None, sign="plus")
    edge: Size | None = fields.size("length", "from the middle of the hole to its end", None, sign="plus")
