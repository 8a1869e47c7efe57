"""Rolling bearings: mean loads in closed form, life of a swing, choice from a list, lists with broken rows."""

from __future__ import annotations

import math
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad

from linkcalc.design.sizing.bearing_list import Bearing, bearing, bearings, kinds
from linkcalc.design.sizing.rolling import (
    Duty,
    choose_bearing,
    mean_load,
    needed_rating,
    rolling_bearing,
    stepped_load,
)
from linkcalc.faults import Faults
from linkcalc.model.mechanism import Units

BALL = Bearing("A1", 0.02, 0.042, 0.012, 9000.0, 5000.0, "ball")
HEAD = "designation,bore [mm],outside [mm],width [mm],C [kN],C0 [kN],kind\n"


@pytest.mark.parametrize("exponent", [3.0, 10 / 3])
def test_a_load_that_rises_evenly(exponent: float) -> None:
    """Mean of P^p over a straight rise from a to b: (b^(p+1) - a^(p+1))/((p+1)(b-a)); two poses are enough."""
    a, b, n = 200.0, 900.0, exponent + 1
    closed = ((b**n - a**n) / (n * (b - a))) ** (1 / exponent)
    assert float(mean_load(np.array([a, b]), np.array([0.0, 1.0]), exponent)) == pytest.approx(closed, rel=1e-12)
    many = np.linspace(a, b, 400)
    assert float(mean_load(many, np.linspace(3, 2, 400), exponent)) == pytest.approx(closed, rel=1e-9)


def test_mean_load_against_an_integral() -> None:
    """A load that changes along a motion with a halt and a return, against scipy's integral over the turned path."""
    s = np.linspace(0, 1, 4001)
    turn, force = np.sin(2 * np.pi * s), 1000 + 600 * np.cos(3 * s)
    path = quad(lambda x: abs(2 * np.pi * np.cos(2 * np.pi * x)), 0, 1, limit=200)[0]
    whole = quad(lambda x: (1000 + 600 * np.cos(3 * x)) ** 3 * abs(2 * np.pi * np.cos(2 * np.pi * x)), 0, 1, limit=200)
    assert float(mean_load(force, turn, 3.0)) == pytest.approx((whole[0] / path) ** (1 / 3), rel=1e-5)


@given(st.lists(st.floats(0, 1e5), min_size=2, max_size=12), st.floats(3, 10 / 3))
def test_the_mean_lies_between_the_smallest_and_the_largest(forces: list[float], exponent: float) -> None:
    mean = float(mean_load(np.array(forces), np.arange(len(forces)), exponent))
    assert min(forces) * (1 - 1e-9) <= mean <= max(forces) * (1 + 1e-9)


def test_batches_and_joints_that_do_not_turn() -> None:
    force = np.array([[1.0, 3.0, 2.0], [4.0, 4.0, 4.0]])
    turn = np.array([0.0, 1.0, 1.5])
    found = mean_load(force, turn, 3.0)
    assert found[0] == pytest.approx(float(mean_load(force[0], turn, 3.0)))
    assert found[1] == pytest.approx(4.0)
    assert float(mean_load(force[0], np.zeros(3), 3.0)) == 3.0


def test_steps_are_shares_of_the_turns() -> None:
    assert stepped_load(np.array([1.0, 2.0]), np.array([3.0, 1.0]), 3.0) == pytest.approx((11 / 4) ** (1 / 3))


def test_life_of_a_swing() -> None:
    """A half swing of beta to each side rolls 4 beta a stroke there and back: 90 deg to each side is one turn, so that
    life in strokes is life in turns times 90 deg/beta. C/P = 3 with balls: 27 million turns."""
    for half in (10.0, 45.0, 90.0):
        found = rolling_bearing(BALL, Duty(3000.0, swing=math.radians(2 * half)))
        assert found["L10"] == pytest.approx(27e6)
        assert found["strokes"] == pytest.approx(27e6 * 90 / half)


def test_reliability_and_static_safety() -> None:
    sure = rolling_bearing(BALL, Duty(2500.0, swing=1.0, reliability=99))
    assert sure["L10"] == pytest.approx(0.25 * (9000 / 2500) ** 3 * 1e6)  # ISO 281: a1 of 99 % is 0.25
    assert sure["s0"] == pytest.approx(2.0)
    assert rolling_bearing(BALL, Duty(2500.0, operation="shock", running="high"))["s0_min"] == 2.0
    assert rolling_bearing(replace(BALL, kind="roller"), Duty(2500.0, operation="smooth", running="still"))[
        "s0_min"
    ] == pytest.approx(0.8)
    assert rolling_bearing(BALL, Duty(2500.0, safety=3.0)).utilisation == pytest.approx(1.5)


@given(st.floats(100, 1e4), st.floats(1e4, 1e9), st.floats(0.1, 3.0), st.sampled_from(sorted(kinds())))
def test_the_needed_rating_lasts_just_as_long(force: float, strokes: float, swing: float, kind: str) -> None:
    turns = strokes * swing / math.pi
    rating = needed_rating(force, turns, kinds()[kind])
    one = replace(BALL, C=rating, C0=1e9, kind=kind)
    found = rolling_bearing(one, Duty(force, swing=swing, strokes=strokes))
    assert found["strokes"] == pytest.approx(strokes, rel=1e-9)
    assert found.utilisation == pytest.approx(1.0, rel=1e-9)


@given(st.floats(50, 8e3), st.floats(1, 4))
def test_a_larger_load_asks_for_no_smaller_bearing(force: float, more: float) -> None:
    def outside(load: float) -> float:
        choice = choose_bearing(bearings(), Duty(load, swing=1.0, strokes=1e6))
        return bearing(choice.chosen, bearings()).outside if choice.chosen else math.inf

    assert outside(force * more) >= outside(force)


def test_the_choice_and_why_the_next_smaller_fails() -> None:
    own = [
        replace(BALL, designation="small", outside=0.03, C=4000.0),
        BALL,
        replace(BALL, designation="big", outside=0.05),
    ]
    choice = choose_bearing(own, Duty(3000.0, swing=math.pi, strokes=20e6))
    assert (choice.chosen, choice.smaller) == ("A1", "small")
    # C needed 3000 x 20^(1/3) = 8143 N, of 4000 N
    assert choice.why == "life of the bearing at 204 %"
    assert choose_bearing(own, Duty(3000.0, swing=1.0), least_bore=0.02).chosen == "small"


def test_none_will_do_and_none_fits() -> None:
    choice = choose_bearing([BALL], Duty(30e3, swing=1.0))
    assert choice.chosen == ""
    assert choice.why == "none of the list does; the best, rolling bearing A1: static safety of the bearing at 600 %"
    with pytest.raises(Faults, match="no bearing of the list is of the kind roller and a bore of 25 mm"):
        choose_bearing([BALL], Duty(1.0), kind="roller", bore=0.025)


def test_small_swings_are_warned_of() -> None:
    assert any("fretting" in c for c in rolling_bearing(BALL, Duty(1e3, swing=math.radians(4))).cautions)
    assert not any("fretting" in c for c in rolling_bearing(BALL, Duty(1e3, swing=math.radians(6))).cautions)


def test_the_sample_says_that_it_is_one() -> None:
    assert len(bearings()) > 20
    assert all(b.sample and b.designation.startswith("sample") for b in bearings())
    choice = choose_bearing(bearings(), Duty(1e3, swing=1.0))
    assert any("Sample bearings" in c for c in choice.working.cautions)


def test_a_list_of_ones_own(tmp_path: Path) -> None:
    file = tmp_path / "own.csv"
    file.write_text(HEAD + "B2,25,52,15,14,7.8,ball\nB1,20,47,14,12.7,6.6,ball\n", encoding="utf-8")
    small, large = bearings(file)
    assert (small.designation, large.designation) == ("B1", "B2")
    assert small == Bearing("B1", *(pytest.approx(x) for x in (0.02, 0.047, 0.014, 12700.0, 6600.0)), "ball")  # type: ignore[arg-type]
    bare = tmp_path / "inch.csv"
    bare.write_text("designation;bore;outside;width;C;C0;kind\nI1;1;2;0.5;1000;500;needle\n", encoding="utf-8")
    (one,) = bearings(bare, Units(length="in", force="lbf"))
    assert (one.bore, one.C) == (pytest.approx(0.0254), pytest.approx(4448.22, abs=0.01))


def test_broken_rows_are_told_together(tmp_path: Path) -> None:
    file = tmp_path / "own.csv"
    rows = ["a,20,47,14,12,6,ball", "b,20,47,14,many,6,ball", "c,20,18,14,12,6,ball", "d,20,47,14,12,6,bal",
            "e,20,47,14,12,,ball", "a,25,52,15,-14,7,ball"]  # fmt: skip
    file.write_text(HEAD + "\n".join(rows) + "\n", encoding="utf-8")
    with pytest.raises(Faults) as found:
        bearings(file)
    assert [str(f).removeprefix(f"{file}:") for f in found.value.faults] == [
        "3: row 2 (b).C: 'many' is no number; a number is wanted",
        "4: row 3 (c).outside: 18 is not larger than the bore, 20",
        "5: row 4 (d).kind: unknown kind 'bal'; did you mean 'ball'?",
        "6: row 5 (e).C0: nothing stands there; a number is wanted",
        "7: row 6 (a): 'a' stands in row 1 already; another designation is wanted",
        "7: row 6 (a).C: -14 cannot stand here; more than nothing is wanted",
    ]


@pytest.mark.parametrize(
    ("text", "says"),
    [
        ("", "an empty list"),
        ("designation,bore\nx,1\n", "1: outside: is missing among the columns"),
        (HEAD.replace("kind", "sort") + "a,20,47,14,12,6,ball\n", "1: sort: is no column of this list"),
        (HEAD.replace("[kN]", "[kg]") + "a,20,47,14,12,6,ball\n", "1: C: 'kg' is a unit of mass"),
        (HEAD + "a,20,47,14,12,6\n", "2: row 1 (a): 6 cells; 7 are wanted, as in the head"),
        (HEAD + ",20,47,14,12,6,ball\n", "2: row 1.designation: nothing stands there"),
    ],
)
def test_lists_that_are_none(tmp_path: Path, text: str, says: str) -> None:
    file = tmp_path / "own.csv"
    file.write_text(text, encoding="utf-8")
    with pytest.raises(Faults) as found:
        bearings(file)
    assert says in str(found.value).replace(f"{file}:", "")


def test_no_file(tmp_path: Path) -> None:
    with pytest.raises(Faults, match="cannot be read: no such file"):
        bearings(tmp_path / "none.csv")


def test_unknown_words() -> None:
    with pytest.raises(Faults, match="did you mean 'shock'"):
        rolling_bearing(BALL, Duty(1.0, operation="shok"))
    with pytest.raises(Faults, match="did you mean 'still'"):
        rolling_bearing(BALL, Duty(1.0, running="stil"))
    with pytest.raises(Faults, match="no life factor for 91 %; one of 90, 95, 96, 97, 98, 99 is wanted"):
        rolling_bearing(BALL, Duty(1.0, swing=1.0, reliability=91))
    with pytest.raises(Faults, match="unknown bearing '62004'; did you mean '6204'"):
        bearing("62004", [replace(BALL, designation="6204")])
