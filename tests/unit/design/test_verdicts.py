"""Requirements are judged at their worst pose over all cases, on the right side, and at the place they name."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc import Faults
from linkcalc.design.answer import StrokeAnswer, Verdict
from tests.unit.design.models import FOUR_BAR, LEVER, PRESS, ask

EXACT = 1e-12
"""Relative: formulas of a lever, a few roundings."""


def judged(text: str, requirement: str, **more: object) -> Verdict:
    (verdict,) = ask(f'{text}\n[requirements]\nit = "{requirement}"\n', **more).verdicts
    assert verdict.text == requirement
    return verdict


def lever(degrees: float) -> float:
    """[N] effort of the lever"""
    return float(200 * np.cos(np.radians(degrees)))


@pytest.mark.parametrize(
    ("requirement", "worst", "place"),
    [
        ("effort <= 197 N", lever(10), 10),
        ("effort < 197 N", lever(10), 10),
        ("effort >= 60 N", lever(70), 70),
        ("effort > 60 N", lever(70), 70),
        ("effort >= 60 N at start", lever(10), 10),
        ("effort <= 100 N at end", lever(70), 70),
        ("effort <= 130 N at 60 deg", lever(60), 60),
        ("effort <= 130 N at 60", lever(60), 60),
        ("force ratio >= 3", 600 / lever(10), 10),
        ("force ratio <= 9", 600 / lever(70), 70),
        ("ideal ratio >= 3", 600 / lever(10), 10),
        ("load <= 0.6 kN", 600, None),
        ("load >= 600 N", 600, None),
    ],
)
def test_what_holds_and_where_it_is_worst(requirement: str, worst: float, place: float | None) -> None:
    verdict = judged(LEVER, requirement)
    assert verdict.holds
    assert verdict.worst == pytest.approx(worst, rel=EXACT)
    if place is not None:
        assert np.degrees(verdict.drive) == pytest.approx(place, abs=1e-9)


@pytest.mark.parametrize(
    "requirement",
    [
        "effort <= 196 N", "effort >= 70 N", "effort >= 200 N at start", "effort <= 60 N at end",
        "effort <= 90 N at 60 deg", "force ratio >= 3.1", "force ratio <= 8", "load <= 599 N", "load > 600 N",
        "load < 600 N",
    ],
)  # fmt: skip
def test_what_fails(requirement: str) -> None:
    answer = ask(f'{LEVER}\n[requirements]\nit = "{requirement}"\n')
    assert not answer.verdicts[0].holds and not answer.holds


@pytest.mark.parametrize(("relation", "holds"), [("<=", True), (">=", True), ("<", False), (">", False)])
def test_a_limit_that_is_just_met(relation: str, holds: bool) -> None:
    """To rounding: the worst value of a formula is never the printed one to the last bit."""
    limit = lever(10) if relation in ("<=", "<") else lever(70)
    assert judged(LEVER, f"effort {relation} {limit!r} N").holds == holds


@pytest.mark.parametrize("sign", [1, -1])
def test_sizes_are_judged_whichever_sense_they_have(sign: int) -> None:
    """An effort that pulls is as large as one that pushes; a torque against the clock as one with it."""
    text = LEVER.replace("size = 600", f"size = {sign * 600}")
    assert judged(text, "effort <= 197 N").worst == pytest.approx(lever(10), rel=EXACT)
    assert not judged(text, "effort <= 196 N").holds
    assert judged(text, "load <= 600 N").holds


def test_an_effort_that_changes_its_sense_is_smallest_at_nothing() -> None:
    """cos(a) passes through zero at 90 degrees: no effort of 1 N is kept up throughout."""
    text = LEVER.replace("to = 70", "to = 120")
    verdict = judged(text, "effort >= 1 N")
    assert not verdict.holds
    assert verdict.worst == pytest.approx(0.0, abs=1e-8)
    assert np.degrees(verdict.drive) == pytest.approx(90.0, abs=1e-7)


def test_a_ratio_without_bound_fails_an_upper_limit_only() -> None:
    text = PRESS.replace("to = 5", "to = -40")
    assert not judged(text, "force ratio <= 1000").holds
    assert judged(text, "force ratio <= 1000").worst == np.inf


def test_a_ratio_at_least_so_large_is_judged_on_both_sides_of_a_dead_point() -> None:
    """Beyond the dead point of a press the knee must be held back: its ratio is minus there, and no ratio of 0.2."""
    text = PRESS.replace("to = 5", "to = -40")
    assert not judged(text, "force ratio >= 0.2").holds
    assert judged(text.replace("to = -40", "to = 1"), "force ratio >= 0.2").holds


@pytest.mark.parametrize(
    ("requirement", "worst"),
    [
        ("force at A on lever <= 800 N", 794.7055850502293),
        ("force at A on ground <= 800 N", 794.7055850502293),
        ("force at A <= 800 N", 794.7055850502293),
    ],
)
def test_forces_of_a_joint(requirement: str, worst: float) -> None:
    """The pivot carries the load, plumb, and the effort P square to the lever at a: root of (600 + P cos a)^2 +
    (P sin a)^2, largest at 10 degrees."""
    p, a = lever(10), np.radians(10)
    by_hand = np.hypot(600 + p * np.cos(a), p * np.sin(a))
    assert by_hand == pytest.approx(worst, rel=EXACT)
    assert judged(LEVER, requirement).worst == pytest.approx(by_hand, rel=EXACT)


def test_tension_and_compression_are_the_two_senses_of_a_link() -> None:
    """A coupler that is pulled with 43.3 N at most, and pushed with 100.2 N at most: each limit has its own side."""
    answer = ask(FOUR_BAR, poses=2001)
    pulled, pushed = float(answer.axial.max()), float(-answer.axial.min())
    assert pulled > 0 and pushed > 0
    assert judged(FOUR_BAR, "tension in coupler <= 1 kN").worst == pytest.approx(pulled, rel=1e-6)
    assert judged(FOUR_BAR, "compression in coupler <= 1 kN").worst == pytest.approx(pushed, rel=1e-6)
    assert judged(FOUR_BAR, f"tension in coupler <= {pulled * 1.01!r} N").holds
    assert not judged(FOUR_BAR, f"tension in coupler <= {pulled * 0.99!r} N").holds
    assert not judged(FOUR_BAR, f"compression in coupler <= {pushed * 0.99!r} N").holds


def test_travel_is_the_largest_way_from_the_start() -> None:
    """The hand, 300 mm out, turned by 60 degrees: a chord of 300 mm. The knee pressed flat: the toggle grows to 200."""
    assert judged(LEVER, "travel of hand <= 301 mm").worst == pytest.approx(0.3, rel=EXACT)
    assert not judged(LEVER, "travel of hand >= 301 mm").holds
    assert judged(PRESS.replace("to = 5", "to = -40"), "travel of way >= 99 mm").worst == pytest.approx(0.1, rel=1e-9)


CASES = """
[cases.light]
scale = { load = 0.5 }
[cases.heavy]
scale = { load = 1.5 }
[cases.usual]
"""


def test_the_worst_case_is_the_one_that_is_judged() -> None:
    high, low = judged(LEVER + CASES, "effort <= 300 N"), judged(LEVER + CASES, "effort >= 10 N")
    assert (high.case, low.case) == ("heavy", "light")
    assert high.worst == pytest.approx(1.5 * lever(10), rel=EXACT)
    assert low.worst == pytest.approx(0.5 * lever(70), rel=EXACT)
    assert judged(LEVER + CASES, "effort <= 300 N at end").case == "heavy"
    assert judged(LEVER + CASES, "effort >= 10 N at start").case == "light"


def test_one_case_alone_is_judged_alone() -> None:
    verdict = judged(LEVER + CASES, "effort <= 100 N", case="light")
    assert verdict.case == "light" and verdict.holds


def test_several_requirements_in_the_order_of_the_file() -> None:
    text = LEVER + '[requirements]\nsecond = "effort <= 1 N"\nfirst = "load <= 1 kN"\n'
    answer: StrokeAnswer = ask(text)
    assert [(v.name, v.holds) for v in answer.verdicts] == [("second", False), ("first", True)]
    assert not answer.holds


def test_without_a_stroke_the_drawing_pose_is_judged() -> None:
    text = LEVER.partition("[stroke]")[0]
    verdict = judged(text, "effort <= 197 N")
    assert verdict.worst == pytest.approx(lever(10), rel=EXACT)
    assert np.isnan(verdict.drive)


@pytest.mark.parametrize(
    ("requirement", "told"),
    [
        ("force at Z <= 1 N", "Z"),
        ("force at A on handle <= 1 N", "handle"),
        ("moment at A <= 1 N*m", "'A' takes no moment"),
        ("tension in lever <= 1 N", "lever is no two-force member"),
        ("effort <= 1 N at 200 deg", "200 deg is outside the stroke"),
        ("travel of Z <= 1 mm", "Z"),
    ],
)
def test_what_is_not_there_cannot_be_required(requirement: str, told: str) -> None:
    with pytest.raises(Faults, match=told) as faults:
        judged(LEVER, requirement)
    assert str(faults.value.faults[0].item[:2]) == "('requirements', 'it')"


def test_a_pose_without_an_answer_is_no_pass() -> None:
    """Required at the very dead point of the effort: there is no number, so it does not hold."""
    text = LEVER.replace('square_to = ["hand", "A"]', "direction = -90").replace("to = 70", "to = 90")
    verdict = judged(text, "effort <= 1 MN at end")
    assert not verdict.holds
