"""Ropes: the worst tension against the breaking load."""

from __future__ import annotations

from linkcalc.design.sizing.pin import LIFTING
from linkcalc.design.sizing.working import Sheet, Working
from linkcalc.parts.contract import Value

USUAL_FACTOR = 5.0
"""Against breaking where none is told: common practice for slings and hoist ropes of wire that carry no people; always
shown. The codes for lifting ask for more or less, by the rope, the drive and the duty."""


def rope(tension: Value, breaking: float, factor: float | None = None) -> Working:
    """A rope or chain.

    tension  [N] worst, float or array; breaking [N] least breaking load by its maker; factor [-] against breaking,
    None: the usual one

    Symbols: T, T_allow.

    Raises Faults: breaking load or factor not more than nothing.
    """
    sheet = Sheet("rope")
    sheet.given("T", tension, "force", "worst tension")
    sheet.positive("B", breaking, "force", "least breaking load, by its maker")
    usual = "the usual one: common practice; the codes for lifting govern" if factor is None else ""
    sheet.positive("S", USUAL_FACTOR if factor is None else factor, "number", "factor against breaking", usual)
    sheet.step("T_allow", "B/S", "allowed tension")
    sheet.at_most("tension of the rope", "T", "T_allow")
    sheet.caution("Bending over pulleys, wear and end fittings take their share of the breaking load: see the maker.")
    sheet.caution(LIFTING)
    return sheet.working()
