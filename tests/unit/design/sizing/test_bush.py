"""Plain bushes: pressure, speed and their product by hand, ranges of materials, choice from the series, own lists."""

from __future__ import annotations

import math
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from linkcalc.design.sizing.bush import bush, bush_life, choose_bush
from linkcalc.design.sizing.bush_materials import BushMaterial, bush_material, bush_materials
from linkcalc.design.sizing.series import bush_bores, bush_lengths
from linkcalc.faults import Faults

BRONZE = BushMaterial("bronze", static=(60e6, 60e6), p=(25e6, 25e6), v=(1.0, 1.0), pv=(1.75e6, 1.75e6))
MOTION = {"swing": math.radians(60), "rate": 0.5}


def test_by_hand() -> None:
    """6 kN on 20 x 30 mm: 10 MPa. 60 degrees there and back at 30 strokes a minute: pi 20 mm x 120/360 x 0.5/s =
    10.47 mm/s; p v = 0.1047 MPa m/s."""
    found = bush(6e3, 0.02, 0.03, BRONZE, **MOTION)
    assert [found[s] for s in ("p", "v", "pv")] == pytest.approx([10e6, 10.47e-3, 0.1047e6], rel=1e-3)
    assert found.utilisation == pytest.approx(10 / 25)
    assert found.governs == "pressure"


def test_the_mean_force_wears_and_the_worst_presses() -> None:
    found = bush(6e3, 0.02, 0.03, BRONZE, mean_force=3e3, **MOTION)
    whole = bush(6e3, 0.02, 0.03, BRONZE, **MOTION)
    assert found["p"] == whole["p"]
    assert found["pv"] == pytest.approx(whole["pv"] / 2)  # type: ignore[operator]


def test_at_rest_only_the_static_pressure_counts() -> None:
    found = bush(6e3, 0.02, 0.03, BRONZE)
    assert [c.name for c in found.checks] == ["pressure"]
    assert found.utilisation == pytest.approx(10 / 60)


def test_above_the_lower_end_of_a_range_is_told() -> None:
    plastic = BushMaterial("plastic", p=(10e6, 14e6))
    within, beyond = bush(12e3, 0.03, 0.0333, plastic, **MOTION), bush(20e3, 0.03, 0.0333, plastic, **MOTION)
    assert not within.passes
    assert any("within it" in note for note in within.notes)
    assert any("beyond its upper end" in note for note in beyond.notes)


@given(st.floats(10, 1e5), st.floats(1, 3), st.floats(0.1, 2.5), st.floats(0.01, 1))
def test_a_larger_load_asks_for_no_smaller_bush(force: float, more: float, swing: float, rate: float) -> None:
    def area(load: float) -> float:
        choice = choose_bush(load, BRONZE, bore=0.04, swing=swing, rate=rate)
        return float(choice.working["b"]) if choice.chosen else math.inf

    assert area(force * more) >= area(force)


def test_the_choice_and_why_the_next_smaller_fails() -> None:
    """12 kN on a bore of 20 mm: 25 MPa ask for 24 mm; the series has 20 and 25."""
    choice = choose_bush(12e3, BRONZE, bore=0.02, **MOTION)
    assert (choice.chosen, choice.smaller) == ("20 x 23 x 25 mm", "20 x 23 x 20 mm")
    assert choice.why == "pressure at 120 %"


def test_a_bore_is_looked_for_where_none_is_given() -> None:
    choice = choose_bush(12e3, BRONZE, **MOTION)
    bores = [round(bore * 1e3, 6) for bore, _ in bush_bores()]
    bore = float(choice.chosen.split()[0])
    assert choice.working.passes
    smaller = bores[bores.index(bore) - 1] * 1e-3
    assert choose_bush(12e3, BRONZE, bore=smaller, **MOTION).chosen == ""


def test_none_will_do() -> None:
    choice = choose_bush(1e6, BRONZE, bore=0.02, **MOTION)
    assert choice.chosen == ""
    assert choice.why.startswith("the largest, 20 x 23 x 30 mm, does not do: pressure at ")


def test_wear_life() -> None:
    """0.1 mm at 1e-14 1/Pa, 5 MPa and 0.02 m/s: 1e-4/(1e-14 x 5e6 x 0.02) = 1e5 s."""
    assert bush_life(1e-4, 1e-14, 5e6, 0.02)["t"] == pytest.approx(1e5)
    with pytest.raises(Faults, match="wear factor"):
        bush_life(1e-4, 0.0, 5e6, 0.02)


def test_the_table_is_whole() -> None:
    found = bush_materials()
    assert len(found) >= 6
    for one in found.values():
        assert one.source != "given"
        assert any(one.limits(moving=True))
    assert [size for size, _ in bush_lengths()] == sorted(size for size, _ in bush_lengths())
    # the figures of the Tribology Handbook for PTFE in sintered bronze on steel
    assert bush_material("PTFE strip").p == (140e6, 140e6)
    assert bush_material("PTFE strip").pv == (1.75e6, 1.75e6)
    assert bush_material("thermoplastic").pv == pytest.approx((0.035e6, 0.11e6))


def test_an_unknown_material() -> None:
    with pytest.raises(Faults, match="unknown bush material 'filled PTF'; did you mean 'filled PTFE'"):
        bush_material("filled PTF")


def test_a_list_of_ones_own(tmp_path: Path) -> None:
    file = tmp_path / "own.csv"
    file.write_text("name,p,v,pv,source\n# a remark\nours,10-14,1.5,0.5,works test\n", encoding="utf-8")
    found = bush_materials(file)
    assert list(found) == ["ours"]
    assert found["ours"] == BushMaterial(
        "ours", p=(10e6, 14e6), v=(1.5, 1.5), pv=(0.5e6, 0.5e6), source="works test"
    )  # fmt: skip
    toml = tmp_path / "own.toml"
    toml.write_text('[ours]\np = [10, 14]\nv = 1.5\npv = 0.5\nsource = "works test"\n', encoding="utf-8")
    assert bush_materials(toml) == found


def test_broken_rows_are_told_together(tmp_path: Path) -> None:
    file = tmp_path / "own.csv"
    file.write_text("name,p,pv\none,ten,1\ntwo,5,-3\nthree,5,1\ntwo,5,1\nfour,,\n", encoding="utf-8")
    with pytest.raises(Faults) as found:
        bush_materials(file)
    assert [str(f).removeprefix(str(file)) for f in found.value.faults] == [
        ":2: row 1 (one).p: 'ten' is no number; a number is wanted",
        ":3: row 2 (two).pv: '-3' is no range; a figure, or two rising ones, is wanted",
        ":6: row 5 (four): it bears nothing; one of static, p, v, pv is wanted",
    ]


def test_arrays_of_forces() -> None:
    found = bush(np.array([[1e3], [6e3]]), 0.02, 0.03, BRONZE, **MOTION)
    np.testing.assert_allclose(found.utilisation, [[10 / 25 / 6], [10 / 25]])


@pytest.mark.parametrize("changed", [{"bore": 0.0}, {"length": -0.01}, {"factor": 0.0}])
def test_impossible_sizes(changed: dict[str, float]) -> None:
    given = {"bore": 0.02, "length": 0.02, "factor": 1.0} | changed
    with pytest.raises(Faults, match="more than nothing is wanted"):
        bush(1e3, given["bore"], given["length"], BRONZE, factor=given["factor"])
