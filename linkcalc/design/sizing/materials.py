"""Materials in SI: the user's own first, then the table of the package by the standard's thickness classes."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from linkcalc import data
from linkcalc.design.sizing.working import Sheet, must_be_positive
from linkcalc.faults import fault
from linkcalc.model.formulas import to_si
from linkcalc.model.materials import TABLE, material_names
from linkcalc.model.mechanism import Mechanism
from linkcalc.words import nearest

_MM, _MPA = 1e-3, 1e6


@dataclass(frozen=True)
class Material:
    """What a part is made of, at one thickness.

    name      as the file calls it
    yields    [Pa] yield stress, or 0.2 % proof stress
    ultimate  [Pa] tensile strength; None if it is not told
    modulus   [Pa] of elasticity; None if it is not told
    source    the standard and its thickness class, or "given"
    """

    name: str
    yields: float
    ultimate: float | None = None
    modulus: float | None = None
    source: str = "given"

    def allowed(self, sheet: Sheet, factor: float, *, of: str = "", shear: bool = True) -> None:
        """Write the allowed stresses into a sheet: sigma_allow = Re/S and tau_allow = sigma_allow/sqrt(3).

        of  set behind the symbols and the name, where a sheet has several materials: "1"

        Raises Faults: a factor or a yield stress that is not more than nothing.
        """
        symbol, behind = f"Re{of}", f" {of}" if of else ""
        sheet.positive(symbol, self.yields, "stress", f"yield stress of {self.name}", self.source)
        if "S" not in sheet:
            sheet.positive("S", factor, "number", "factor against yield")
        sheet.step(f"sigma_allow{of}", f"{symbol}/S", f"allowed stress{behind}")
        if shear:
            text = f"allowed shear stress{behind}"
            sheet.step(f"tau_allow{of}", f"sigma_allow{of}/sqrt(3)", text, "greatest distortion energy (von Mises)")


def material(name: str, mechanism: Mechanism | None = None, thickness: float = 0.0) -> Material:
    """A material by its name, the model's own [materials.NAME] first.

    thickness  [m] of the plate, or diameter of the bar: the yield stress of the table falls with it

    Raises Faults: unknown name (nearest ones told), thicker than the standard goes.
    """
    own = mechanism.materials if mechanism else {}
    if mechanism and name in own:
        return _own(name, mechanism)
    rows = data.table(TABLE)
    if name not in rows:
        raise fault((), f"unknown material {name!r}", nearest(name, material_names(own)))
    return _of_table(name, rows[name], thickness)


def _own(name: str, mechanism: Mechanism) -> Material:
    given = mechanism.materials[name]

    def stress(key: str) -> float | None:
        size = getattr(given, key)
        # a material's strength does not scatter with the drawing, so that dimensions have no say in it
        return None if size is None else float(to_si(size, "stress", mechanism.units))

    yields = stress("yield_")
    assert yields is not None
    return Material(name, yields, stress("ultimate"), stress("modulus"), "given")


def _of_table(name: str, row: Mapping[str, Any], thickness: float) -> Material:
    yields, up_to = _class(name, row["yield"], thickness)
    ultimate, _ = _class(name, row["ultimate"], thickness)
    source = f"{row['source']}, up to {up_to:g} mm"
    return Material(name, yields * _MPA, ultimate * _MPA, float(row["modulus"]) * _MPA, source)


def _class(name: str, classes: list[list[float]], thickness: float) -> tuple[float, float]:
    """The value of the first class that the thickness does not pass, and how far that goes [mm]."""
    for up_to, value in classes:
        if thickness <= up_to * _MM * (1 + 1e-9):
            return float(value), float(up_to)
    what = f"{name} of {thickness / _MM:g} mm is beyond the classes of its standard ({classes[-1][0]:g} mm)"
    raise fault((), what, "give its yield stress in [materials]")


def must_have_modulus(of: Material) -> float:
    """[Pa] its modulus. Raises Faults: it has none."""
    if of.modulus is None:
        raise fault(("materials", of.name), "'modulus' is missing", "buckling asks for the modulus of elasticity")
    must_be_positive("modulus of elasticity", of.modulus)
    return of.modulus
