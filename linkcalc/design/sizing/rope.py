"""Ropes: the worst tension against the breaking load."""

from __future__ import annotations

from linkcalc.design.sizing.pin import LIFTING
from linkcalc.design.sizing.working import Sheet, Working
from linkcalc.parts.contract import Value


def rope(tension: Value, breaking: float, factor: float) -> Working:
    """A rope or chain.

    tension  [N] worst, float or array; breaking [N] least breaking load by its maker; factor [-] against breaking

    Symbols: T, T_allow.

    Raises Faults: breaking load or factor not more than nothing.
    """
    sheet = Sheet("rope")
    sheet.given("T", tension, "force", "worst tension")
    sheet.positive("B", breaking, "force", "least breaking load, by its maker")
    sheet.positive("S", factor, "number", "factor against breaking")
    sheet.step("T_allow", "B/S", "allowed tension")
    sheet.at_most("tension of the rope", "T", "T_allow")
    sheet.caution("Bending over pulleys, wear and end fittings take their share of the breaking load: see the maker.")
    sheet.caution(LIFTING)
    return sheet.working()
