"""Warnings that a designer must not miss, and none where there is nothing to warn of."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.mechanics.state import Status
from tests.unit.design.models import FOUR_BAR, LEVER, PRESS, ask
from tests.unit.mechanics.linkages import FourBar


def warned(text: str, **more: object) -> list[str]:
    return [f"{c.item}: {c.text}" for c in ask(text, **more).caveats]


def test_a_dead_point_inside_the_stroke() -> None:
    (text,) = warned(PRESS.replace("to = 5", "to = -40"))
    assert text.startswith("load: dead point of the load at 0")
    assert "the force ratio grows without bound" in text


def test_a_dead_point_at_the_end_of_the_stroke() -> None:
    (text,) = warned(PRESS.replace("to = 5", "to = 0"))
    assert "the pose at 0 deg is at a dead point of the load" in text


def test_a_dead_point_at_the_start_of_the_stroke() -> None:
    (text,) = warned(PRESS.replace("from = 60", "from = 0").replace("to = 5", "to = 60"))
    assert "the pose at 0 deg is at a dead point of the load" in text


def test_close_to_a_dead_point_that_lies_ahead() -> None:
    (text,) = warned(PRESS.replace("to = 5", "to = 1"))
    assert "the pose at 1 deg is close to a dead point of the load" in text


def test_none_where_the_stroke_keeps_away() -> None:
    assert warned(PRESS.replace("to = 5", "to = 20")) == []
    assert warned(LEVER) == []


def test_none_for_a_slow_load_that_is_not_slowing_down() -> None:
    """A long lever: the load goes a twentieth as fast as the hand, all the way. That is its purpose, no dead point."""
    text = LEVER.replace("distance = 100, angle = 190", "distance = 12, angle = 190")
    assert warned(text) == []


def test_a_dead_point_of_the_effort_is_told_as_such() -> None:
    text = LEVER.replace('square_to = ["hand", "A"]', "direction = -90").replace("to = 70", "to = 130")
    told = warned(text)
    assert any(t.startswith("effort: dead point of the effort at 90") for t in told)
    assert any("no effort however large" in t for t in told)


def test_several_dead_points_are_listed() -> None:
    (text,) = warned(FOUR_BAR)
    assert text.startswith("load: dead point of the load at 90.27 deg, 223.5 deg, 348.9 deg, 395.7 deg")


def test_drawn_in_a_dead_point_without_a_stroke() -> None:
    text = (
        PRESS.partition("[stroke]")[0]
        .replace("angle = 60", "angle = 0")
        .replace('C = { mirror = "A", line = ["B", "foot"] }', "C = [200, 0]")
    )
    (told,) = warned(text)
    assert "the pose is at a dead point of the load" in told


PARALLEL = """
[points]
A = [0, 0]
D = [100, 0]
B = { from = "A", distance = 40, angle = -60 }
C = { from = "D", distance = 40, angle = -60 }
[members]
ground = ["A", "D"]
crank = ["A", "B"]
rod = ["B", "C"]
follower = ["D", "C"]
[effort]
torque_on = "crank"
[load]
torque_on = "follower"
size = 10
[stroke]
turn = "crank"
to = TO
poses = 61
"""
"""Equal cranks in parallel: flat, at 0 degrees, the follower could also go on against the crank."""


@pytest.mark.parametrize("to", [47.0, 60.0, 75.5])
def test_a_change_point_is_passed_straight_and_told(to: float) -> None:
    """The follower keeps with the crank: 10 N m for 10 N m on both sides of it."""
    answer = ask(PARALLEL.replace("TO", repr(to)))
    assert any("the stroke passes a change point" in c.text for c in answer.caveats)
    told = answer.status[0, 0] == Status.FINE
    np.testing.assert_allclose(answer.effort[0, 0, told], -10.0, rtol=1e-6)
    assert told.sum() >= 60


@pytest.mark.parametrize("poses", [61, 121, 13])
def test_no_answer_is_invented_at_the_change_point(poses: int) -> None:
    """At the very pose rounding decides how it moves: that is told, not some number."""
    answer = ask(PARALLEL.replace("TO", "60"), poses=poses)
    at = np.flatnonzero(answer.status[0, 0])
    np.testing.assert_allclose(answer.drive[0, 0, at], 0.0, atol=1e-12)
    assert (answer.status[0, 0, at] == Status.SINGULAR).all() and at.size == 1
    assert np.isnan(answer.effort[0, 0, at]).all() and np.isnan(answer.force[..., at]).all()
    assert np.isfinite(answer.turn[..., at]).all(), "the pose itself is known"
    assert any("without an answer" in c.text for c in answer.caveats)
    assert not [e for e in answer.events if e.kind == "dead point"]


STACKED = """
[points]
A = [0, 0]
D = [100, 0]
B = { from = "A", distance = 200, angle = -40 }
C = { from = "D", distance = 200, angle = -40 }
E = { from = "B", distance = 150, angle = -40 }
F = { from = "C", distance = 150, angle = -40 }
[members]
ground = ["A", "D"]
arm = ["A", "B"]
lower = ["D", "C"]
plate = ["B", "C"]
boom = ["B", "E"]
upper = ["C", "F"]
head = ["E", "F"]
[welds.shoulder]
members = ["arm", "boom"]
at = "B"
[effort]
torque_on = "arm"
[load]
at = "F"
direction = -90
size = 10
[stroke]
turn = "arm"
to = TO
"""
"""Two parallelograms one upon the other, flat together at 0 degrees: 10 N carried 350 mm out."""


def test_change_points_that_two_loops_pass_together_are_told() -> None:
    answer = ask(STACKED.replace("TO", "35.5"))
    assert any("the stroke passes a change point" in c.text for c in answer.caveats)
    told = answer.status[0, 0] == Status.FINE
    np.testing.assert_allclose(
        answer.effort[0, 0, told], 3.5 * np.cos(answer.drive[0, 0, told]), rtol=1e-6, err_msg="passed straight"
    )
    assert warned(STACKED.replace("TO", "-10")) == []


def test_none_for_a_parallelogram_that_stays_clear() -> None:
    assert warned(PARALLEL.replace("TO", "-20")) == []


def test_a_limit_of_motion_is_no_warning_by_itself() -> None:
    told = warned(FourBar(60, 40, 55, 50).text('[stroke]\nturn = "crank"\nto = "upper limit"'))
    assert not any("change point" in t or "without an answer" in t for t in told)
