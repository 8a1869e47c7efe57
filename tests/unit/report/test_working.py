"""The sheet of a working: what is printed can be reckoned again, in the units of the model; so say CSV and JSON."""

from __future__ import annotations

import csv
import io
import json
import math

import numpy as np
import pytest

from linkcalc.design.sizing.bearing_list import bearings
from linkcalc.design.sizing.bush import bush
from linkcalc.design.sizing.bush_materials import bush_material
from linkcalc.design.sizing.column import two_force_member
from linkcalc.design.sizing.guide import guide
from linkcalc.design.sizing.lug import Lug, lug
from linkcalc.design.sizing.materials import material
from linkcalc.design.sizing.pin import Clevis, choose_pin, clevis_pin, stacked_pin
from linkcalc.design.sizing.rolling import Duty, choose_bearing
from linkcalc.design.sizing.section import flat, rectangular_tube, stressed
from linkcalc.design.sizing.stack import StackPlate, pin_stack
from linkcalc.design.sizing.working import Sheet, Working
from linkcalc.model.formulas import evaluate
from linkcalc.model.mechanism import Units
from linkcalc.report.csv import as_csv
from linkcalc.report.quantities import out, shown, unit_of
from linkcalc.report.sections.working import choice_text, put_in, working_blocks, working_table, working_tree
from linkcalc.report.text import as_text

STEEL = material("S355", thickness=0.02)
INCH = Units(length="in", force="lbf", stress="psi", moment="lbf*in")


def _workings() -> list[Working]:
    plates = [StackPlate("arm", 0.01), StackPlate("rod", 0.02, 0.001), StackPlate("strut", 0.01)]
    forces = {"arm": np.array([5e3, 0.0]), "rod": np.array([-5e3, 2e3]), "strut": np.array([0.0, -2e3])}
    return [
        clevis_pin(16e3, 0.016, Clevis(0.008, 0.016, 0.0005), STEEL, 2.0),
        stacked_pin(pin_stack(plates, forces), 0.02, STEEL, 2.0),
        lug(20e3, Lug(0.02, 0.01, 0.05, 0.03), STEEL, 2.0, planes="40 degrees"),
        bush(10e3, 0.02, 0.02, bush_material("thermoplastic"), swing=1.0, rate=0.5),
        two_force_member(-10e3, 1.0, rectangular_tube(0.04, 0.03, 0.003), STEEL, 3.0),
        stressed(flat(0.04, 0.01), -5e3, 200.0, STEEL, 1.5, shear=700.0, radius=0.1),
        guide(1e3, 20.0, 0.1, 0.02, 5e6),
        choose_bearing(bearings(), Duty(6000, swing=1, strokes=5e6)).working,
    ]


@pytest.mark.parametrize("units", [Units(), INCH])
@pytest.mark.parametrize("working", _workings(), ids=lambda w: w.title)
def test_the_numbers_put_in_come_to_the_result(working: Working, units: Units) -> None:
    """Each line of a sheet is a formula of its own, with five digits a number: reckoned again it gives its result."""
    for step in working.steps:
        if step.formula:
            text = put_in(step, working, units).replace("(30/min)", "(0.5 s^-1)")
            found = evaluate(text)
            assert found.dims == step.dims, text
            # what comes to nothing is left over of the largest of its kind
            least = 1e-4 * max(abs(float(e.value)) for e in working.entries if e.dims == step.dims)
            assert found.value == pytest.approx(step.value, rel=2e-3, abs=least), f"{step.symbol} = {text}"


def test_a_sheet_by_hand() -> None:
    sheet = Sheet("round bar")
    sheet.given("F", 12e3, "force", "pull")
    sheet.given("d", 0.02, "length", "diameter")
    sheet.positive("Re", 240e6, "stress", "yield stress", "a standard")
    sheet.step("A", "pi*d^2/4", "section")
    sheet.step("sigma", "F/A", "stress", "definition")
    sheet.at_most("tension", "sigma", "Re")
    sheet.note("Straight.")
    sheet.caution("Static.")
    lines = as_text(working_blocks(sheet.working(), Units())).splitlines()
    # 12 kN over pi 20²/4 = 314.16 mm² is 38.197 MPa, 15.9 % of 240
    for line in (
        "Round bar",
        "  Re = 240 MPa                      yield stress [a standard]",
        "  A = pi*d^2/4                      section",
        "    = pi*(20 mm)^2/4",
        "    = 314.16 mm^2",
        "  sigma = F/A                       stress [definition]",
        "        = 12000 N/(314.16 mm^2)",
        "        = 38.197 MPa",
        "  tension: sigma = 38.197 MPa, at most 240 MPa: used 15.9 %",
        "Result: tension governs, used 15.9 %",
        "Note: Straight.",
        "Caution: Static.",
    ):
        assert line in lines
    tree = working_tree(sheet.working(), Units())
    assert tree["steps"][1] == {
        "symbol": "sigma", "text": "stress", "formula": "F/A", "put in": "12000 N/(314.16 mm^2)",
        "value": pytest.approx(12e3 / (math.pi * 100)), "unit": "MPa", "source": "definition",
    }  # fmt: skip
    assert (tree["governs"], tree["passes"]) == ("tension", True)


@pytest.mark.parametrize("working", _workings(), ids=lambda w: w.title)
def test_no_line_is_too_wide(working: Working) -> None:
    assert max(map(len, as_text(working_blocks(working, Units())).splitlines())) <= 100


@pytest.mark.parametrize("working", _workings(), ids=lambda w: w.title)
def test_csv_and_json_say_the_same(working: Working) -> None:
    rows = list(csv.DictReader(io.StringIO(as_csv(working_table(working, INCH)))))
    tree = json.loads(json.dumps(working_tree(working, INCH), allow_nan=False))
    assert {e["symbol"]: e["value"] for e in tree["given"] + tree["steps"]} == pytest.approx(
        {row["symbol"]: float(row["value"]) for row in rows if row["what"] != "check"}
    )
    assert [c["utilisation"] for c in tree["checks"]] == [float(r["value"]) for r in rows if r["what"] == "check"]
    assert tree["utilisation"] == pytest.approx(float(working.utilisation))


def test_a_choice_in_words() -> None:
    choice = choose_pin(lambda d: clevis_pin(50e3, d, Clevis(0.01, 0.02, 0.001), STEEL, 2.0))
    told = choice_text(choice, Units())
    assert told.startswith("Needed: 26.")
    assert (
        "Chosen: 27 mm (ISO 2340 and ISO 2341). The next smaller, 24 mm, does not do: bending and shear of the pin at "
        in told
    )
    assert told in " ".join(as_text(working_blocks(choice.working, Units(), choice)).split())
    tree = working_tree(choice.working, Units(), choice)
    assert (tree["chosen"], tree["next smaller"]) == ("27 mm", "24 mm")
    assert tree["needed"]["value"] == pytest.approx(choice.required * 1e3)  # type: ignore[operator]
    none = choose_pin(lambda d: clevis_pin(50e6, d, Clevis(0.01, 0.02), STEEL, 2.0))
    assert "None of the series will do: the largest, 100 mm, does not do" in choice_text(none, Units())


def test_arrays_are_told_by_their_ends() -> None:
    found = clevis_pin(np.array([[1e3, 5e3]]), 0.016, Clevis(0.008, 0.016), STEEL, 2.0)
    text = as_text(working_blocks(found, Units()))
    assert "F = 1000 to 5000 N" in text
    assert working_tree(found, Units())["given"][0]["value"] == [[1000.0, 5000.0]]


@pytest.mark.parametrize(
    ("dims", "metric", "inch"),
    [
        ((1, 0, 0, 0), "mm", "in"), ((4, 0, 0, 0), "mm^4", "in^4"), ((-1, 1, -2, 0), "MPa", "psi"),
        ((0, 1, -2, 0), "N/mm", "lbf/in"), ((1, 0, -1, 0), "m/s", "ft/min"), ((0, 1, -3, 0), "MPa*m/s", "psi*ft/min"),
        ((0, 0, -1, 0), "1/min", "1/min"), ((0, 0, 0, 0), "", ""), ((1, -1, 2, 0), "m*kg^-1*s^2", "m*kg^-1*s^2"),
    ],
)  # fmt: skip
def test_units_of_dimensions(dims: tuple[int, int, int, int], metric: str, inch: str) -> None:
    assert unit_of(dims, Units())[0] == metric
    assert unit_of(dims, INCH)[0] == inch


def test_numbers_in_the_units_of_the_model() -> None:
    # 1 psi ft/min = 3.5025367e-5 MPa m/s (NIST SP 811: exact inch, pound and standard gravity)
    assert out(3.5025367e-5 * 1e6, (0, 1, -3, 0), INCH) == pytest.approx(1.0, rel=1e-7)
    assert shown(5e7, (0, 0, 0, 0), Units()) == "5e7"
