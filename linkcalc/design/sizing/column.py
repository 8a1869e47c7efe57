"""Members loaded at two pins: tension, compression, buckling by Euler or Johnson, in the plane and out of it."""

from __future__ import annotations

import numpy as np

from linkcalc.design.sizing.materials import Material, must_have_modulus
from linkcalc.design.sizing.section import Section
from linkcalc.design.sizing.working import Sheet, Working
from linkcalc.faults import fault
from linkcalc.parts.contract import Value
from linkcalc.words import nearest

ENDS: dict[str, tuple[float, str]] = {
    "pinned": (1.0, "both ends pinned: exact"),
    "fixed and pinned": (0.6991557, "one end fixed, one pinned: pi/4.4934, the root of tan x = x"),
    "fixed": (0.5, "both ends fixed: exact"),
    "fixed and free": (2.0, "one end fixed, one free: exact"),
}
"""How the ends are held -> length factor K of buckling, and why."""

_PLANES = (("", "I", "in the plane"), ("a", "Ia", "out of the plane"))


def two_force_member(
    force: Value,
    length: float,
    section: Section,
    material: Material,
    factor: float,
    *,
    ends: str | float = "pinned",
    ends_across: str | float | None = None,
) -> Working:
    """A straight member loaded at its two pins.

    force        [N] tension plus; float or array (poses, cases)
    length       [m] between the pins
    ends         how they are held in the plane: a key of ENDS, or a length factor K
    ends_across  out of the plane; as in the plane if not given. Between fork faces 0.5 to 0.7 is common practice

    Symbols: sigma (tension), sigma_c (compression), and if it is ever pressed slenderness, Pcr (in the plane),
    slenderness_a, Pcra (out of it). The Euler or the Johnson formula is taken by the slenderness.

    Raises Faults: sizes, factor or K not more than nothing, unknown ends, a material without modulus.
    """
    sheet = Sheet(f"two-force member, {section.name}")
    sheet.positive("L", length, "length", "length between the pins")
    section.write(sheet)
    pull, push = np.maximum(force, 0.0), np.maximum(np.negative(force), 0.0)
    sheet.given("T", _plain(pull), "force", "largest tension")
    sheet.given("P", _plain(push), "force", "largest compression")
    material.allowed(sheet, factor, shear=False)
    if np.any(pull > 0) or not np.any(push > 0):
        sheet.step("sigma", "T/A", "tensile stress")
        sheet.at_most("tension", "sigma", "sigma_allow")
    if np.any(push > 0):
        sheet.step("sigma_c", "P/A", "compressive stress")
        sheet.at_most("compression", "sigma_c", "sigma_allow")
        sheet.given("E", must_have_modulus(material), "stress", f"modulus of {material.name}", material.source)
        sheet.step("transition", "sqrt(2*pi^2*E/Re)", "slenderness where Euler and Johnson meet",
                   "both give half the yield stress there")  # fmt: skip
        for (of, second, where), held in zip(_PLANES, (ends, ends if ends_across is None else ends_across),
                                             strict=True):  # fmt: skip
            _buckling(sheet, of, second, where, held)
    sheet.note("Centred load on a straight bar; eyes and bends off the line of the pins bend it as well.")
    sheet.caution("Static strength only: no fatigue. Eyes and pins are checked apart.")
    return sheet.working()


def critical_load(length: float, section: Section, material: Material, ends: str | float = "pinned") -> float:
    """[N] at which it buckles in the plane, by Euler or Johnson. Raises Faults."""
    return float(two_force_member(-1.0, length, section, material, 1.0, ends=ends)["Pcr"])


def length_factor(ends: str | float) -> tuple[float, str]:
    """K and why. Raises Faults: unknown ends, a factor not more than nothing."""
    if isinstance(ends, str):
        if ends not in ENDS:
            raise fault("ends", f"unknown ends {ends!r}", nearest(ends, ENDS))
        return ENDS[ends]
    if not ends > 0:
        raise fault("ends", f"a length factor of {ends:g} cannot stand here", "more than nothing is wanted")
    return float(ends), "given"


def _buckling(sheet: Sheet, of: str, second: str, where: str, ends: str | float) -> None:
    factor, why = length_factor(ends)
    sheet.given(f"K{of}", factor, "number", f"length factor {where}", why)
    sheet.step(f"r{of}", f"sqrt({second}/A)", f"radius of gyration {where}")
    slender = sheet.step(f"slenderness{f'_{of}' if of else ''}", f"K{of}*L/r{of}", f"slenderness {where}")
    ratio = f"slenderness{f'_{of}' if of else ''}"
    if np.all(np.greater(slender, sheet["transition"])):
        sheet.step(f"Pcr{of}", f"pi^2*E*{second}/(K{of}*L)^2", f"buckling load {where}", "Euler, slender")
    else:
        sheet.step(f"Pcr{of}", f"A*Re*(1 - Re*{ratio}^2/(4*pi^2*E))", f"buckling load {where}",
                   "J. B. Johnson, below the transition")  # fmt: skip
    sheet.step(f"P_allow{of}", f"Pcr{of}/S", f"allowed compression {where}")
    sheet.at_most(f"buckling {where}", "P", f"P_allow{of}")


def _plain(value: Value) -> Value:
    return float(value) if np.ndim(value) == 0 else value
