"""A pose without an answer is not a number and says why; never one without the other."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.design.answer import StrokeAnswer, quantities
from linkcalc.mechanics.state import Status
from tests.unit.design.models import LEVER, ask
from tests.unit.mechanics.linkages import FourBar, SliderCrank

BEYOND = FourBar(60, 40, 55, 50)
"""Its crank goes up to 119.2 degrees."""


def consistent(answer: StrokeAnswer) -> None:
    """Every array of forces is a number where the status is fine, and nowhere else; places where there is a pose."""
    fine = answer.status == Status.FINE
    for name in ("effort", "force", "moment", "axial"):
        values = getattr(answer, name)
        wanted = np.broadcast_to(fine, values.shape)
        np.testing.assert_array_equal(np.isfinite(values), wanted, err_msg=name)
    posed = ~np.isin(answer.status[:1], [Status.NOT_DRAWN, Status.OUT_OF_REACH, Status.BRANCH_LOST])
    for name in ("x", "y", "turn"):
        values = getattr(answer, name)
        np.testing.assert_array_equal(np.isfinite(values), np.broadcast_to(posed, values.shape), err_msg=name)


def test_poses_beyond_the_limit_of_motion() -> None:
    answer = ask(BEYOND.text('[stroke]\nturn = "crank"\nto = 100'), at=np.radians([80, 125, 90]))
    assert answer.status[0, 0].tolist() == [Status.FINE, Status.OUT_OF_REACH, Status.FINE]
    consistent(answer)


def test_a_pose_in_a_dead_point_of_the_effort() -> None:
    text = LEVER.replace('square_to = ["hand", "A"]', "direction = -90")
    answer = ask(text.replace("to = 70", "to = 100"), at=np.radians([60, 90, 100]))
    assert answer.status[0, 0].tolist() == [Status.FINE, Status.DEAD_POINT, Status.FINE]
    consistent(answer)


def test_copies_that_fail_in_several_ways() -> None:
    text = BEYOND.text('[stroke]\nturn = "crank"\nto = 115\nposes = 9')
    answer = ask(text, sizes={"coupler": np.array([0.04, 0.3, 0.03]), "rocker": np.array([0.055, 0.055, 0.04])})
    assert (answer.status[0, 0] == Status.FINE).all()
    assert (answer.status[0, 1] == Status.NOT_DRAWN).all()
    assert answer.status[0, 2, 0] == Status.FINE and answer.status[0, 2, -1] != Status.FINE
    consistent(answer)


@pytest.mark.parametrize("status", Status)
def test_every_status_says_what_it_means(status: Status) -> None:
    assert len(status.text) > 3 and status.text == status.text.strip()


def test_every_array_has_the_axes_that_it_says() -> None:
    answer = ask(
        SliderCrank(40, 130).text(
            '[stroke]\nturn = "crank"\nto = 90\nposes = 5\n[cases.a]\n[cases.b]\nscale = { load = 2 }'
        )
    )
    sizes = {"one": 1, "case": 2, "variant": 1, "pose": 5, "xy": 2, "bearing": len(answer.bearings),
             "two-force member": len(answer.two_force), "rope": len(answer.ropes), "member": 3}  # fmt: skip
    for name, meta in quantities(answer).items():
        known = [axis for axis in meta["axes"] if axis in sizes]
        assert len(known) == len(meta["axes"]), f"{name} has an axis of an unknown name"
        assert getattr(answer, name).shape == tuple(sizes[axis] for axis in meta["axes"]), name


def test_names_that_are_not_there_say_which_are() -> None:
    answer = ask(LEVER)
    with pytest.raises(KeyError, match="A on lever"):
        answer.force_on("A", "handle")
    with pytest.raises(KeyError, match="known: A"):
        answer.joint_force("Z")
    with pytest.raises(KeyError, match="none"):
        answer.axial_in("lever")
