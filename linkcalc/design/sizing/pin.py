"""Pins: shear, bending, both combined, and pressure on the plates; the least diameter and the next of the series."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from linkcalc.design.sizing.materials import Material
from linkcalc.design.sizing.search import from_series, smallest
from linkcalc.design.sizing.series import Series, clevis_pins, source
from linkcalc.design.sizing.stack import PinStack
from linkcalc.design.sizing.stack_sheet import PLACE, plain, section_forces
from linkcalc.design.sizing.working import Choice, Sheet, Working
from linkcalc.faults import fault
from linkcalc.parts.contract import Value
from linkcalc.words import nearest

LIFTING = (
    "Parts of lifting, safety or pressure equipment: the codes for these govern (for lifting e.g. EN 13001 or"
    " ASME BTH-1), with their own factors; this is no design to them."
)
STATIC = "Static strength only: no fatigue, no wear, no shock."


BENDING: dict[str, tuple[str, str]] = {
    "even pressure": (
        "F/2*(t1/2 + t2/4 + gap)",
        "even pressure in fork and rod; NASA TM X-73305, section B2 (from memory), or the balance of half the pin",
    ),
    "loads at middles": (
        "F/4*(t1 + t2 + 2*gap)",
        "a single force in the middle of every plate: more than even pressure gives; common practice",
    ),
    "tight in fork": ("F*t2/8", "pin held in the fork, no gap; common practice in German textbooks (from memory)"),
    "tight in rod": ("F*t1/4", "pin held in the rod, no gap; common practice in German textbooks (from memory)"),
}
"""Name of a clevis formula -> largest moment of the pin, and who says so."""


@dataclass(frozen=True)
class Clevis:
    """A rod in a fork [m].

    fork   thickness of each plate of the fork
    rod    thickness of the plate between them
    gap    between fork and rod, on each side
    method a key of BENDING
    """

    fork: float
    rod: float
    gap: float = 0.0
    method: str = "even pressure"


def shear_stress(sheet: Sheet, planes: int) -> None:
    """Write the mean shear stress of a solid pin d under F into a sheet."""
    sheet.given("n", float(planes), "number", "sections that shear")
    sheet.step("A", "pi*d^2/4", "section of the pin")
    sheet.step("tau", "F/(n*A)", "mean shear stress", "even over the section; at its middle it is 4/3 of that")


def clevis_pin(force: Value, diameter: float, clevis: Clevis, material: Material, factor: float,
               plate: Material | None = None) -> Working:  # fmt: skip
    """A pin that holds a rod in a fork (double shear).

    force     [N] of the rod, float or array
    diameter  [m] of the solid pin
    plate     material of fork and rod, for the pressure; the pin's if not given

    Symbols: tau, M, sigma, combined, p1 (fork), p2 (rod).

    Raises Faults: sizes or factor not more than nothing, unknown method.
    """
    sheet = Sheet("pin in a fork")
    sheet.given("F", np.abs(force), "force", "force of the rod")
    sheet.positive("d", diameter, "length", "diameter of the pin")
    sheet.positive("t1", clevis.fork, "length", "thickness of each fork plate")
    sheet.positive("t2", clevis.rod, "length", "thickness of the rod")
    if not clevis.gap >= 0:
        raise fault((), f"gap: {clevis.gap:g} cannot stand here", "nothing or more is wanted")
    sheet.given("gap", clevis.gap, "length", "gap between fork and rod, each side")
    if clevis.method not in BENDING:
        raise fault((), f"unknown formula {clevis.method!r} for the bending of a pin", nearest(clevis.method, BENDING))
    material.allowed(sheet, factor)
    shear_stress(sheet, planes=2)
    formula, source = BENDING[clevis.method]
    sheet.step("M", formula, f"bending moment, {clevis.method}", source)
    _bending(sheet)
    sheet.step(
        "combined", "sqrt(sigma^2 + 3*tau^2)", "equivalent stress",
        "von Mises, of the largest bending stress and the mean shear stress as if they met in one section: safe side",
    )  # fmt: skip
    _judged(sheet)
    _pressure(sheet, {"1": ("F/(2*d*t1)", "fork"), "2": ("F/(d*t2)", "rod")}, plate or material)
    return _closed(sheet)


def sheared_pin(force: Value, diameter: float, planes: int, material: Material, factor: float) -> Working:
    """A pin of which only the shear is looked at: one section (single shear) or two.

    force  [N] float or array; symbols: tau

    Raises Faults: sizes or factor not more than nothing.
    """
    sheet = Sheet("pin in single shear" if planes == 1 else "pin in double shear")
    sheet.given("F", np.abs(force), "force", "force on the pin")
    sheet.positive("d", diameter, "length", "diameter of the pin")
    material.allowed(sheet, factor)
    shear_stress(sheet, planes)
    sheet.at_most("shear of the pin", "tau", "tau_allow")
    sheet.note("Shear alone: a pin through plates with thickness or gaps bends too.")
    return _closed(sheet)


def stacked_pin(stack: PinStack, diameter: float, material: Material, factor: float,
                plate: Material | None = None) -> Working:  # fmt: skip
    """A pin across a stack of plates under their true forces; float or array as the forces of the stack.

    plate  material of the plates, for the pressure; the pin's if not given

    Symbols: V, M, tau, sigma, combined, places z_V, z_M, z_c [m], and F1x, F1y, t1, a1, q1, p1, F2x, ... of the plates.

    Raises Faults: sizes or factor not more than nothing.
    """
    sheet = Sheet("pin across a stack of plates")
    sheet.positive("d", diameter, "length", "diameter of the pin")
    sheet.take(section_forces(stack))
    material.allowed(sheet, factor)
    both = stack.equivalent(diameter)
    sheet.step("A", "pi*d^2/4", "section of the pin")
    sheet.step("tau", "V/A", "mean shear stress", "even over the section; at its middle it is 4/3 of that")
    _bending(sheet)
    sheet.found("combined", plain(both.value), "stress", "largest equivalent stress", "along the pin",
                "von Mises, of bending and mean shear of the same section")  # fmt: skip
    sheet.found("z_c", plain(both.place), "length", "where that is", PLACE)
    _judged(sheet)
    names = {str(k): one.member for k, one in enumerate(stack.plates, 1)}
    _pressure(sheet, {n: (f"q{n}/d", f"plate {n}, {member}") for n, member in names.items()}, plate or material)
    sheet.note(
        "The pin is stiff against the plates: even pressure on each, the plates of one member share by thickness, and"
        " what would tip the pin is taken by a pressure that rises evenly across each member's plates."
    )
    return _closed(sheet)


def least_diameter(check: Callable[[float], Working]) -> float:
    """[m] the diameter at which a pin is used to the full: check(d) is one of the workings above."""
    return smallest(check)


def choose_pin(check: Callable[[float], Working], *, inch: bool = False, series: Series | None = None) -> Choice:
    """The smallest pin of the series that passes: ISO 2340/2341 diameters, or inch sizes on request.

    check  diameter [m] -> its working: ``lambda d: clevis_pin(force, d, clevis, material("S355", thickness=d), 2.0)``

    Raises Faults: what ``check`` raises of the smallest.
    """
    of = "" if series else source("clevis_pins_inch" if inch else "clevis_pins")
    return from_series(check, series or clevis_pins(inch=inch), of)


def _bending(sheet: Sheet) -> None:
    sheet.step("W", "pi*d^3/32", "section modulus of the pin")
    sheet.step("sigma", "M/W", "bending stress")


def _judged(sheet: Sheet) -> None:
    sheet.at_most("shear of the pin", "tau", "tau_allow")
    sheet.at_most("bending of the pin", "sigma", "sigma_allow")
    sheet.at_most("bending and shear of the pin", "combined", "sigma_allow")


def _pressure(sheet: Sheet, places: dict[str, tuple[str, str]], plate: Material) -> None:
    """Pressure on the projected area of each place: what follows the p -> (formula, name)."""
    sheet.positive("Rep", plate.yields, "stress", f"yield stress of the plates, {plate.name}", plate.source)
    sheet.step("p_allow", "min(Re, Rep)/S", "allowed pressure", "yield of the softer one over the factor, a pin at"
               " rest; one that turns under load takes what its bush takes")  # fmt: skip
    for of, (formula, name) in places.items():
        sheet.step(f"p{of}", formula, f"pressure on {name}", "on the projected area")
        sheet.at_most(f"pressure on {name}", f"p{of}", "p_allow")


def _closed(sheet: Sheet) -> Working:
    sheet.caution(STATIC)
    sheet.caution(LIFTING)
    return sheet.working()
