"""Materials by their standards' classes, the user's own first; what a model says of a pin."""

from __future__ import annotations

import pytest

from linkcalc import data
from linkcalc.design.sizing.lug import Lug
from linkcalc.design.sizing.materials import material
from linkcalc.design.sizing.model_pins import USUAL_FACTOR, USUAL_MATERIAL, located, needed_stack, pin_spec
from linkcalc.design.sizing.stack import StackPlate
from linkcalc.faults import Faults, fault
from linkcalc.model.read import parse
from linkcalc.model.sketch import drawn

MODEL = """
[units]
stress = "ksi"
length = "in"
[dimensions]
wall = "6 mm"
[points]
A = [0, 0]
C = [8, 0]
[members]
ground = ["A"]
arm = ["A", "C"]
rod = ["C"]
[materials.S355]
yield = 50
[materials.plain]
yield = "235 MPa"
modulus = "210 GPa"
[friction]
diameter = "3/4 in"
[pins.A]
material = "S355"
factor = 1.5
stack = [["ground", "wall"], ["arm", 0.5, "1 mm"], { plate = "ground", thickness = "wall", width = 2, edge = 1 }]
bush = "nylon"
length = "1 in"
[load]
at = "C"
direction = -90
size = 1
[welds.root]
members = ["arm", "ground"]
at = "A"
[welds.tip]
members = ["arm", "rod"]
at = "C"
"""


@pytest.mark.parametrize(
    ("name", "thickness", "yields"),
    [
        # EN 10025-2: S355 16 / 40 / 63 / 100 mm: 355, 345, 335, 315; S235 16 / 40 mm: 235, 225 (from memory)
        ("S355", 0.0, 355), ("S355", 0.016, 355), ("S355", 0.0161, 345), ("S355", 0.04, 345), ("S355", 0.063, 335),
        ("S355", 0.1, 315), ("S235", 0.01, 235), ("S235", 0.03, 225), ("42CrMo4+QT", 0.015, 900),
    ],
)  # fmt: skip
def test_yield_by_thickness(name: str, thickness: float, yields: float) -> None:
    found = material(name, thickness=thickness)
    assert found.yields == yields * 1e6
    assert found.source.startswith(data.table("materials.toml")[name]["source"])


def test_every_row_of_the_table_is_in_order() -> None:
    for name, row in data.table("materials.toml").items():
        assert row["source"] and row["text"], name
        for key in ("yield", "ultimate"):
            ends = [up_to for up_to, _ in row[key]]
            assert ends == sorted(set(ends)), name
        assert material(name).ultimate > material(name).yields, name  # type: ignore[operator]
        assert 50e9 < material(name).modulus < 250e9, name  # type: ignore[operator]


def test_the_users_own_comes_first() -> None:
    model = parse(MODEL)
    own = material("S355", model, 0.05)
    assert own.yields == pytest.approx(50 * 6.894757e6, rel=1e-6)
    assert (own.source, own.modulus) == ("given", None)
    assert material("plain", model).modulus == 210e9
    assert material("S235", model).yields == 235e6


def test_unknown_and_too_thick() -> None:
    with pytest.raises(Faults, match="unknown material 'S335'; did you mean 'S355' or 'S235'"):
        material("S335")
    with pytest.raises(Faults, match="C45\\+QT of 120 mm is beyond the classes of its standard \\(100 mm\\)"):
        material("C45+QT", thickness=0.12)
    with pytest.raises(Faults, match="did you mean 'plain'"):
        material("plein", parse(MODEL))


def test_what_the_model_says_of_a_pin() -> None:
    model = parse(MODEL)
    spec = pin_spec("A", model, drawn(model))
    assert (spec.material, spec.factor, spec.chosen, spec.given) == ("S355", 1.5, True, True)
    assert spec.diameter == pytest.approx(0.01905)
    assert spec.stack == (
        StackPlate("ground", 0.006), StackPlate("arm", 0.0127, 0.001), StackPlate("ground", 0.006),
    )  # fmt: skip
    assert spec.lugs == {"ground": Lug(spec.diameter, 0.006, pytest.approx(0.0508), pytest.approx(0.0254))}  # type: ignore[arg-type]
    assert (spec.bush, spec.length, spec.bearing, spec.life) == ("nylon", 0.0254, None, None)


def test_where_the_model_is_silent() -> None:
    model = parse(MODEL)
    spec = pin_spec("C", model, drawn(model))
    assert (spec.material, spec.factor, spec.chosen, spec.given) == (USUAL_MATERIAL, USUAL_FACTOR, False, False)
    with pytest.raises(Faults, match=r"pins\.C: 'stack' is missing; .* stack = \[\[\"arm\", 10\], \[\"rod\", 10\]\]"):
        needed_stack("C", spec, ("arm", "rod"))


def test_a_fault_is_told_of_its_pin() -> None:
    assert str(located("C", fault("stack", "no plates"))) == "pins.C.stack: no plates"
