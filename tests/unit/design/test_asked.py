"""Effort for a load, load for an effort: the one question is the other backwards. Tare effort, and zero gravity."""

from __future__ import annotations

import numpy as np
import pytest

from tests.property.resum import unbalanced
from tests.unit.design.models import FOUR_BAR, LEVER, PRESS, ask, only

ROUND_TRIP = 1e-12
"""Relative, away from dead points: one division by the velocity ratio and back."""


@pytest.mark.parametrize("pose", range(3))
def test_the_load_asked_for_an_effort_is_the_effort_asked_for_that_load(pose: int) -> None:
    """Weights are there both times, so the ratio alone would not do."""
    angles = np.radians([20.0, 45.0, 130.0])
    text = FOUR_BAR.replace("from = 60", "from = 20").replace("to = 420", "to = 150")
    there = ask(text, at=[angles[pose]])
    effort = float(there.effort[0, 0, 0])
    back = text.replace('torque_on = "crank"\n', f'torque_on = "crank"\nsize = "{effort!r} N*m"\n').replace(
        "size = 100\n", ""
    )
    answer = ask(back, at=[angles[pose]])
    assert float(answer.load[0, 0, 0]) == pytest.approx(100.0, rel=ROUND_TRIP)
    assert float(answer.effort[0, 0, 0]) == pytest.approx(effort, rel=ROUND_TRIP)
    np.testing.assert_allclose(answer.force, there.force, rtol=1e-11, atol=1e-9)
    np.testing.assert_allclose(answer.force_ratio, there.force_ratio, rtol=1e-11)
    np.testing.assert_allclose(answer.ideal_ratio, there.ideal_ratio, rtol=1e-11)
    assert max(unbalanced(answer).values()) < ROUND_TRIP


def test_a_lever_asked_backwards() -> None:
    text = LEVER.replace('square_to = ["hand", "A"]', 'square_to = ["hand", "A"]\nsize = 50').replace(
        "size = 600\n", ""
    )
    answer = ask(text)
    np.testing.assert_allclose(answer.load[0, 0], 150 / np.cos(answer.drive[0, 0]), rtol=ROUND_TRIP)
    assert only(answer, "largest", "load").value == pytest.approx(150 / np.cos(np.radians(70)), rel=ROUND_TRIP)
    assert "tare effort" not in {e.quantity for e in answer.events}


def test_the_load_has_no_answer_where_it_does_not_move() -> None:
    """The press asked for its clamping force, pressed through flat: no finite load is in balance at a = 0."""
    text = PRESS.replace("direction = -90", "direction = -90\nsize = 100").replace("size = 1000\n", "")
    answer = ask(text.replace("to = 5", "to = -40"))
    np.testing.assert_allclose(answer.load[0, 0], 50 / np.tan(answer.drive[0, 0]), rtol=1e-10)
    at = ask(text.replace("to = 5", "to = -40"), at=[0.0])
    assert at.status[0, 0, 0] == 4 and np.isnan(at.load[0, 0, 0])


def test_tare_effort_is_the_effort_without_the_load() -> None:
    """A lever of 2 kg, its centre 100 mm from the pivot on the hand's side: 2 x 9.80665 x 100/300 x cos a less."""
    text = LEVER.replace('lever = ["hook", "A", "hand"]', 'lever = { points = ["hook", "A", "hand"], mass = 2 }')
    answer = ask(text)
    a = answer.drive[0, 0]
    np.testing.assert_allclose(answer.tare_effort[0, 0], -2 * 9.80665 / 3 * np.cos(a), rtol=1e-12)
    np.testing.assert_allclose(answer.effort[0, 0] - answer.tare_effort[0, 0], 200 * np.cos(a), rtol=1e-12)
    unloaded = ask(text.partition("[load]")[0] + "[stroke]" + text.partition("[stroke]")[2])
    np.testing.assert_allclose(unloaded.effort, answer.tare_effort, rtol=1e-12)
    assert "load" not in unloaded.kinds and np.isnan(unloaded.force_ratio).all()


def test_a_load_of_nothing_is_lifted_by_the_tare_effort() -> None:
    answer = ask(FOUR_BAR.replace("size = 100", "size = 0"))
    np.testing.assert_allclose(answer.effort, answer.tare_effort, rtol=1e-12)
    assert np.isnan(answer.force_ratio).all(), "there is nothing whose ratio to the effort could be told"


def test_the_ratios_agree_where_nothing_else_pushes() -> None:
    """Weightless, the force ratio is the velocity ratio; with weight it is not."""
    text = FOUR_BAR.replace("to = 420", "to = 85")
    weightless, heavy = ask(text.replace(", mass = 2", "")), ask(text.replace("mass = 2", "mass = 40"))
    np.testing.assert_allclose(weightless.force_ratio, weightless.ideal_ratio, rtol=1e-10)
    np.testing.assert_allclose(heavy.ideal_ratio, weightless.ideal_ratio, rtol=1e-12)
    assert np.abs(heavy.force_ratio / heavy.ideal_ratio - 1).max() > 0.1


def test_the_ideal_ratio_is_the_way_of_the_effort_over_the_way_of_the_load() -> None:
    """From places alone: the turn of the crank over the fall of the tip, by central differences."""
    step = 1e-5
    angles = np.array([1.2, 1.4, 2.5])
    answer = ask(FOUR_BAR, at=angles)
    ahead, behind = (ask(FOUR_BAR, at=angles + by) for by in (step, -step))
    drawn = np.radians(80)
    rise = [0.11 * np.sin(drawn + a.turn[3, 0, 0]) for a in (ahead, behind)]
    speed = (rise[0] - rise[1]) / (2 * step)
    np.testing.assert_allclose(answer.ideal_ratio[0, 0], 1 / speed, rtol=1e-7)
