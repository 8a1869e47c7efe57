"""Limits of loads: the poses between which they are passed, found exactly and told once."""

from __future__ import annotations

import math

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.design.answer import StrokeAnswer
from linkcalc.mechanics.state import Status

SWING = """
[points]
A = [0, 0]
S = [0, 300]
R = { from = "A", distance = 100, angle = 0 }
[members]
ground = ["A", "S"]
arm = ["A", "R"]
[effort]
torque_on = "arm"
[loads.s]
LOAD
[stroke]
turn = "arm"
from = 0
to = 180
poses = 31
"""
"""Length of S to R: sqrt(0.10 - 0.06 sin(turn)) m, shortest at 90 deg (200 mm), longest at both ends (316.2 mm)."""


def told(load: str, model: str = SWING) -> tuple[StrokeAnswer, list[str]]:
    answer = stroke(parse(model.replace("LOAD", load)))
    return answer, [c.text for c in answer.caveats if c.item == "s"]


def turn_at(length: float) -> float:
    """[deg] the first turn at which S and R are so many metres apart."""
    return math.degrees(math.asin((0.10 - length**2) / 0.06))


SPRING = 'spring = ["S", "R"]\nrate = 1\nfree_length = 250\n'


def test_too_short_in_the_middle() -> None:
    first = turn_at(0.22)
    text = f"shorter than its shortest, 220 mm, from {first:.4g} deg to {180 - first:.1f} deg"
    assert told(SPRING + "shortest = 220")[1] == [text]


def test_too_long_at_both_ends() -> None:
    first = turn_at(0.3)
    text = f"longer than its longest, 300 mm, up to {first:.4g} deg and from {180 - first:.1f} deg on"
    assert told(SPRING + "longest = 300")[1] == [text]


def test_a_limit_touched_between_two_poses() -> None:
    """Passed over 0.13 deg on either side of 90 deg: no pose of the table is beyond it but the one at 90 deg itself."""
    model = SWING.replace("poses = 31", "poses = 30").replace("to = 180", "to = 179")
    (text,) = told(SPRING + 'shortest = "200.0004 mm"', model)[1]
    assert text.startswith("shorter than its shortest, 200 mm, ")
    assert " 90" in text or " 89" in text


@pytest.mark.parametrize("limit", ["shortest = 200", "longest = 320", "shortest = 150\nlongest = 400"])
def test_a_limit_that_is_met_is_no_warning(limit: str) -> None:
    """At 90 deg the spring is 200 mm long but for rounding."""
    assert told(SPRING + limit)[1] == []


def test_passed_all_the_way() -> None:
    assert told(SPRING + "longest = 199")[1] == ["longer than its longest, 199 mm, over the whole stroke"]


def test_a_spring_that_acts_one_way_goes_slack() -> None:
    first = turn_at(0.25)
    answer, texts = told(SPRING + 'acts = "tension"')
    assert texts == [f"slack, from {first:.4g} deg to {180 - first:.1f} deg"]
    force = answer.reading("force of s")[0, 0]
    slack = (np.degrees(answer.drive[0, 0]) > first) & (np.degrees(answer.drive[0, 0]) < 180 - first)
    assert (force[slack] == 0).all()
    assert (force[~slack] < 0).all()
    assert told(SPRING + 'acts = "compression"')[1] == [
        f"loose between its seats, up to {first:.4g} deg and from {180 - first:.1f} deg on"
    ]


def test_outside_a_table_there_is_no_answer() -> None:
    """NaN and a status there, a warning with the pose where it begins, and the answer elsewhere as it is."""
    first = turn_at(0.3)
    answer, texts = told('force_over = ["S", "R"]\ntable = [[200, 10], [250, 5], [300, 0]]')
    assert texts == [
        f"beyond the last row of its table, 300 mm, up to {first:.4g} deg and from {180 - first:.1f} deg on"
    ]
    turn = np.degrees(answer.drive[0, 0])
    beyond = (turn < first) | (turn > 180 - first)
    status = answer.status[0, 0]
    assert (status[beyond] == Status.NO_FORCE).all()
    assert (status[~beyond] == Status.FINE).all()
    assert np.isnan(answer.effort[0, 0][beyond]).all()
    assert np.isfinite(answer.effort[0, 0][~beyond]).all()
    assert np.isfinite(answer.x).all(), "where the members are is known all the same"
    assert any("a load has no force there" in c.text for c in answer.caveats if c.item == "stroke")


def test_a_case_without_the_load_has_an_answer_everywhere() -> None:
    cases = '[cases.with]\n[cases.without]\ndrop = ["s"]\n'
    answer, texts = told('gas_spring = ["S", "R"]\nforce = 100\nlength = 300\nstroke = 110\nrise = 1.2', SWING + cases)
    first = turn_at(0.3)
    # the case without it has no limit to pass
    assert texts == [f"longer than its longest, 300 mm, up to {first:.4g} deg and from {180 - first:.1f} deg on"]
    assert (answer.status[1] == Status.FINE).all()
    assert (answer.effort[1] == 0).all()
    assert np.isnan(answer.reading("force of s")[1]).all()
    assert (answer.status[0] == Status.NO_FORCE).any()


def test_a_cylinder_cannot_draw_by_pushing() -> None:
    model = SWING.replace('torque_on = "arm"', 'cylinder = ["S", "R"]\nbore = 20').replace("[loads.s]\nLOAD", """
[load]
at = "R"
direction = -90
size = 50""")  # fmt: skip
    answer = stroke(parse(model.replace("from = 0", "from = 10").replace("to = 180", "to = 80")))
    assert [(c.item, c.text) for c in answer.caveats] == [
        ("effort", "asked to draw, with a pressure below nothing: it can only push, over the whole stroke")
    ]


def test_a_torsion_spring_near_half_a_turn() -> None:
    model = SWING.replace("to = 180", "to = 300")
    (text,) = told('torsion_spring = "arm"\nrate = 1\nfree_angle = 0', model)[1]
    wrong = (
        "near half a turn from the drawing pose: turns are told within half a turn, and beyond it the torque is wrong"
    )
    assert text == f"{wrong}, from 170 deg to 190 deg"


def test_cautions_name_the_loads_once() -> None:
    load = SPRING + '[loads.t]\nspring = ["S", "R"]\nrate = 1\nfree_length = 90'
    answer, _ = told(load)
    assert [(c.item, c.text.partition(":")[0]) for c in answer.cautions] == [
        ("s, t", "a loaded spring flies apart when it is let go")
    ]
