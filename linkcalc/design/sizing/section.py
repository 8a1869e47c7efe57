"""Sections of members: area, second moment, section modulus; stress of axial force and bending; curved bars."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from linkcalc.design.sizing.materials import Material
from linkcalc.design.sizing.search import smallest
from linkcalc.design.sizing.working import Sheet, Working
from linkcalc.faults import fault
from linkcalc.parts.contract import Value

SHARP = 5.0
"""Radius of the middle line over depth below which a bar is to be taken as curved: at 5 the inner fibre of a rectangle
carries 7 % more than a straight bar. R. J. Roark, Formulas for Stress and Strain, curved beams (from memory: 8)."""


@dataclass(frozen=True)
class Section:
    """A section of a member; "in the plane" is about the axis square to the plane of the mechanism.

    name     "round 20 mm"
    sizes    symbol, text, [m] of what it was made from
    area     formula of A over the sizes; "" if A was given
    second   formula of I in the plane, across formula of I out of it
    edge     formula of the distance of the outermost fibre in the plane
    depth    formula of its depth in the plane
    """

    name: str
    sizes: tuple[tuple[str, str, float, str], ...]
    area: str
    second: str
    across: str
    edge: str
    depth: str = ""
    curved: str = ""

    def write(self, sheet: Sheet) -> None:
        """Put A, I, Ia (out of the plane), c and W into a sheet. Raises Faults: sizes not more than nothing."""
        for symbol, text, value, kind in self.sizes:
            sheet.positive(symbol, value, kind, text)
        sheet.step("A", self.area, "area of the section")
        sheet.step("I", self.second, "second moment, bending in the plane")
        sheet.step("Ia", self.across, "second moment, bending out of the plane")
        sheet.step("c", self.edge, "middle to the outermost fibre in the plane")
        sheet.step("W", "I/c", "section modulus in the plane")

    @property
    def working(self) -> Working:
        """A [m2], I, Ia [m4], c [m], W [m3] of the section. Raises Faults."""
        sheet = Sheet(self.name)
        self.write(sheet)
        return sheet.working()


def round_bar(diameter: float) -> Section:
    """A solid round bar [m]."""
    second = "pi*D^4/64"
    return Section(f"round {_mm(diameter)}", (("D", "diameter", diameter, "length"),), "pi*D^2/4", second, second,
                   "D/2", "D", curved="round")  # fmt: skip


def tube(outside: float, wall: float) -> Section:
    """A round tube [m]. Raises Faults: a wall of more than half the outside."""
    _hollow(outside, wall)
    sizes = (("D", "outside diameter", outside, "length"), ("s", "wall", wall, "length"))
    second = "pi*(D^4 - (D - 2*s)^4)/64"
    return Section(f"tube {_mm(outside, wall)}", sizes, "pi*(D^2 - (D - 2*s)^2)/4", second, second, "D/2", "D")


def flat(depth: float, thick: float) -> Section:
    """A flat bar [m]: its depth in the plane of the mechanism, its thickness across."""
    sizes = (("h", "depth in the plane", depth, "length"), ("b", "thickness", thick, "length"))
    return Section(f"flat {_mm(depth, thick)}", sizes, "b*h", "b*h^3/12", "h*b^3/12", "h/2", "h", curved="flat")


def rectangular_tube(depth: float, width: float, wall: float) -> Section:
    """A rectangular tube [m], its corners taken as sharp. Raises Faults: a wall of more than half a side."""
    _hollow(min(depth, width), wall)
    sizes = (("h", "depth in the plane", depth, "length"), ("b", "width", width, "length"),
             ("s", "wall", wall, "length"))  # fmt: skip
    inner = "(h - 2*s)", "(b - 2*s)"
    return Section(
        f"rectangular tube {_mm(depth, width, wall)}", sizes, f"b*h - {inner[1]}*{inner[0]}",
        f"(b*h^3 - {inner[1]}*{inner[0]}^3)/12", f"(h*b^3 - {inner[0]}*{inner[1]}^3)/12", "h/2", "h",
    )  # fmt: skip


def general(area: float, second: float, edge: float, across: float | None = None) -> Section:
    """Any section by its A [m2], I in the plane [m4], c [m] to the outermost fibre, and I out of the plane [m4], which
    is that in the plane if left out.
    """
    sizes = (
        ("Ag", "area, given", area, "area"), ("Ig", "second moment in the plane, given", second, "second moment"),
        ("Iag", "second moment out of the plane, given", second if across is None else across, "second moment"),
        ("cg", "outermost fibre, given", edge, "length"),
    )  # fmt: skip
    return Section("general section", sizes, "Ag", "Ig", "Iag", "cg")


SECTIONS: dict[str, Callable[..., Section]] = {
    "round": round_bar, "tube": tube, "flat": flat, "rectangular tube": rectangular_tube, "general": general,
}  # fmt: skip
"""Word for a section -> function that makes it; the names of its parameters say which sizes it takes [SI]."""


def stressed(section: Section, axial: Value, moment: Value, material: Material, factor: float, *, shear: Value = 0.0,
             radius: float | None = None) -> Working:  # fmt: skip
    """Axial force and bending at one section of a member: the largest fibre stress, and the section modulus needed.

    axial   [N] tension plus; moment [N m]; shear [N]; floats or arrays alike
    radius  [m] of the middle line of a bent bar; round and flat sections are then reckoned as curved

    Symbols: sigma_N, sigma_M, sigma, W_needed (where the axial stress leaves room).

    Raises Faults: sizes, radius or factor not more than nothing, a radius that the section does not fit.
    """
    sheet = Sheet(f"section of a member: {section.name}")
    section.write(sheet)
    sheet.given("N", axial, "force", "axial force, tension plus")
    sheet.given("V", shear, "force", "shear force")
    sheet.given("M", moment, "moment", "bending moment")
    material.allowed(sheet, factor)
    sheet.step("sigma_N", "abs(N)/A", "stress of the axial force")
    more = ""
    if radius is not None:
        sheet.positive("R", radius, "length", "radius of the middle line")
        more = _curve(sheet, section, radius)
    sheet.step("sigma_M", f"{more}abs(M)/W", "largest bending stress")
    sheet.step("sigma", "sigma_N + sigma_M", "largest stress", "at the fibre where both act the same way")
    sheet.at_most("axial force and bending", "sigma", "sigma_allow")
    sheet.step("tau", "abs(V)/A", "mean shear stress")
    sheet.at_most("shear of the member", "tau", "tau_allow")
    if np.all(np.less(sheet["sigma_N"], sheet["sigma_allow"])):
        sheet.step("W_needed", f"{more}abs(M)/(sigma_allow - sigma_N)", "section modulus that would do",
                   "with the area as it is")  # fmt: skip
    sheet.note("Shear and bending are not combined: the one is largest where the other is nothing.")
    sheet.caution("Static strength only: no fatigue, no notches, no buckling sideways of deep flats.")
    return sheet.working()


def needed_modulus(moment: float, material: Material, factor: float) -> float:
    """[m3] section modulus that a moment alone asks for: |M| S/Re. Raises Faults: a factor not more than nothing."""
    sheet = Sheet("section modulus")
    sheet.given("M", moment, "moment", "bending moment")
    material.allowed(sheet, factor, shear=False)
    return float(sheet.step("W", "abs(M)/sigma_allow", "section modulus that would do"))


def least_size(make: Callable[[float], Section], axial: float, moment: float, material: Material, factor: float
               ) -> float:  # fmt: skip
    """[m] the size at which a section is used to the full: ``make`` gives the section of a size, e.g. ``round_bar`` or
    ``lambda h: flat(h, 0.010)``. Raises Faults: none is large enough.
    """
    return smallest(lambda size: stressed(make(size), axial, moment, material, factor))


def _curve(sheet: Sheet, section: Section, radius: float) -> str:
    """What goes before the bending stress of a bent bar, "" if nothing does; writes what it needs."""
    if not section.depth:
        sheet.note("A section of this kind is reckoned as straight: where it is bent the inner fibre carries more.")
        return ""
    depth = sheet.step("h_R", section.depth, "depth of the section")
    if not radius > float(np.max(depth)) / 2:
        what = f"a middle line of radius {_mm(radius)} does not hold a section {_mm(float(np.max(depth)))} deep"
        raise fault((), what, "a radius of more than half the depth is wanted")
    if section.curved not in _NEUTRAL:
        if radius / float(np.max(depth)) < SHARP:
            sheet.caution(f"Sharply bent: radius over depth is below {SHARP:g}; reckoned as straight, the inner fibre"
                          " carries more than this (Winkler and Bach).")  # fmt: skip
        return ""
    source = "Winkler and Bach; R. J. Roark, Formulas for Stress and Strain, curved beams"
    sheet.step("r_n", _NEUTRAL[section.curved], "radius of the neutral line", source)
    sheet.step("e_n", "R - r_n", "middle line to neutral line")
    sheet.step("k_i", "W*(r_n - R + h_R/2)/(A*e_n*(R - h_R/2))", "how much more the inner fibre carries", source)
    return "k_i*"


_NEUTRAL = {
    "flat": "h/ln((R + h/2)/(R - h/2))",
    "round": "(D/2)^2/(2*(R - sqrt(R^2 - (D/2)^2)))",
}


def curved_more(section: Section, radius: float) -> float:
    """How much more than straight the inner fibre of a bent bar carries, by Winkler and Bach; 1.0 for a section that is
    reckoned as straight. radius: [m] of the middle line. Raises Faults: one that the section does not fit.
    """
    sheet = Sheet("bend")
    section.write(sheet)
    sheet.positive("R", radius, "length", "radius of the middle line")
    return float(sheet.working()["k_i"]) if _curve(sheet, section, radius) else 1.0


def _hollow(outside: float, wall: float) -> None:
    if wall > outside / 2 * (1 + 1e-12):
        raise fault((), f"a wall of {_mm(wall)} does not fit into {_mm(outside)}", "at most half of it is wanted")


def _mm(*sizes: float) -> str:
    return " x ".join(f"{round(size * 1e3, 6):g}" for size in sizes) + " mm"
