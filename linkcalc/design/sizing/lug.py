"""Lugs: tension beside the hole, tearing out at its end, pressure in it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.design.sizing.materials import Material
from linkcalc.design.sizing.pin import LIFTING, STATIC
from linkcalc.design.sizing.working import Sheet, Working
from linkcalc.faults import fault
from linkcalc.parts.contract import Value


@dataclass(frozen=True)
class Lug:
    """The eye of a plate [m].

    hole   its diameter
    thick  thickness of the plate
    width  of the plate across the hole
    edge   from the middle of the hole to the end of the plate
    """

    hole: float
    thick: float
    width: float
    edge: float


def lug(force: Value, sizes: Lug, material: Material, factor: float, *, planes: str = "edge") -> Working:
    """A lug that is pulled along its middle line.

    force   [N] float or array
    planes  where it tears out: "edge", two planes from the sides of the pin as long as the plate stands before the
            hole (safe side), or "40 degrees", two planes from where the pin touches 40 degrees off its middle

    Symbols: sigma (beside the hole), tau (tearing out), p (pressure).

    Raises Faults: sizes or factor not more than nothing, a hole that leaves no plate.
    """
    if sizes.width <= sizes.hole or sizes.edge <= sizes.hole / 2:
        what = f"a hole of {sizes.hole * 1e3:g} mm leaves no plate"
        raise fault((), what, "a wider plate, or more of it before the hole, is wanted")
    length, why = _PLANES[planes]
    sheet = Sheet("lug")
    sheet.given("F", np.abs(force), "force", "pull")
    sheet.positive("d", sizes.hole, "length", "diameter of the hole")
    sheet.positive("t", sizes.thick, "length", "thickness")
    sheet.positive("w", sizes.width, "length", "width across the hole")
    sheet.positive("e", sizes.edge, "length", "middle of the hole to the end of the plate")
    material.allowed(sheet, factor)
    sheet.step("sigma", "F/(t*(w - d))", "mean tension beside the hole", "net section")
    sheet.at_most("tension beside the hole", "sigma", "sigma_allow")
    sheet.step("a", length, "length of each plane that shears", why)
    sheet.step("tau", "F/(2*t*a)", "mean shear stress where it tears out")
    sheet.at_most("tearing out", "tau", "tau_allow")
    sheet.step("p", "F/(d*t)", "pressure in the hole", "on the projected area")
    sheet.at_most("pressure in the hole", "p", "sigma_allow")
    sheet.note("Mean stresses: at the edge of the hole the stress is two to three times that beside it.")
    sheet.caution(STATIC)
    sheet.caution(LIFTING)
    return sheet.working()


_PLANES = {
    "edge": ("e - d/2", "two planes, to the edge of the hole; common practice, safe side"),
    "40 degrees": ("e - d/2*cos(40 deg)", "two planes from 40 degrees off the middle line; airframe practice"),
}
