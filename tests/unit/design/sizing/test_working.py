"""The record of a calculation: what was reckoned is what is written, and checks sum up as they should."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.design.sizing.working import Sheet
from linkcalc.faults import Faults


def _sheet() -> Sheet:
    sheet = Sheet("bar")
    sheet.given("F", 12e3, "force", "pull")
    sheet.given("A", 4e-4, "area", "section")
    sheet.given("limit", 60e6, "stress", "allowed")
    sheet.step("sigma", "F/A", "stress", "definition")
    return sheet


def test_a_step_is_its_formula() -> None:
    """12 kN over 4 cm² is 30 MPa; its dimension follows from those of what goes in."""
    working = _sheet().working()
    step = working.entry("sigma")
    assert working["sigma"] == pytest.approx(30e6, rel=1e-12)
    assert (step.formula, step.source, step.dims) == ("F/A", "definition", (-1, 1, -2, 0))
    assert [e.symbol for e in working.inputs] == ["F", "A", "limit"]
    assert [e.symbol for e in working.steps] == ["sigma"]


def test_the_worst_check_governs() -> None:
    sheet = _sheet()
    sheet.given("least", 40e6, "stress", "wanted at least")
    sheet.at_most("not too much", "sigma", "limit")
    assert sheet.working().utilisation == pytest.approx(0.5)
    assert sheet.working().passes
    sheet.at_least("enough", "sigma", "least")
    working = sheet.working()
    assert working.utilisation == pytest.approx(4 / 3)
    assert (working.governs, working.passes) == ("enough", False)


def test_arrays_go_through() -> None:
    sheet = Sheet("bar")
    sheet.given("F", np.array([[1.0, -4.0], [2.0, 3.0]]), "force", "pull")
    sheet.given("Fmax", 8.0, "force", "allowed")
    sheet.step("twice", "2*F", "twice")
    sheet.at_most("pull", "twice", "Fmax")
    np.testing.assert_allclose(sheet.working().utilisation, [[0.25, 1.0], [0.5, 0.75]])
    assert sheet.working().passes


def test_dimensions_must_fit() -> None:
    with pytest.raises(Faults, match="cannot be added"):
        _sheet().step("wrong", "F + A", "nonsense")


@pytest.mark.parametrize("value", [0.0, -1.0, float("nan"), float("inf")])
def test_what_must_be_more_than_nothing(value: float) -> None:
    with pytest.raises(Faults, match="more than nothing is wanted"):
        Sheet("bar").positive("S", value, "number", "factor")


def test_nothing_checked() -> None:
    working = _sheet().working()
    assert (working.utilisation, working.governs, working.passes) == (0.0, "", True)
    with pytest.raises(KeyError):
        working["none"]
