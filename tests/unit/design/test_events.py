"""What happens along the stroke is found exactly, against closed forms, and does not hang on the poses of the table."""

from __future__ import annotations

import numpy as np
import pytest

from tests.unit.design.models import FOUR_BAR, LEVER, PRESS, ask, degrees, happened, only
from tests.unit.mechanics.linkages import FourBar

ANGLE = 1e-9
"""[deg] roots are found to 1e-14 of the stroke; closing to 1e-12 leaves the rest."""
WORST = 1e-9
"""Relative: what is promised of a worst value, whatever the number of poses."""
PEAK = 1e-5
"""[deg] where a smooth top is: the value is flat there, so rounding 1e-15 of it hides its root of the place."""


def test_the_dead_point_of_a_toggle_pressed_through() -> None:
    """At a = 0 the load stands still: the ratio has no bound, the effort passes through nothing."""
    answer = ask(PRESS.replace("to = 5", "to = -40"))
    assert degrees(only(answer, "dead point", "load")) == pytest.approx(0.0, abs=ANGLE)
    assert only(answer, "largest", "force ratio").value == np.inf
    assert degrees(only(answer, "largest", "ideal ratio")) == pytest.approx(0.0, abs=ANGLE)
    least = only(answer, "smallest", "effort")
    assert least.value == pytest.approx(0.0, abs=1e-9) and degrees(least) == pytest.approx(0.0, abs=1e-7)


def test_a_dead_point_of_the_effort() -> None:
    """Driven by the load side: at a = 0 the push at C does no work, the moment that holds it has no answer."""
    text = PRESS.replace('at = "B"\non = "upper"\ndirection = -90', 'at = "C"\ndirection = 180')
    text = text.replace('[load]\nat = "C"\ndirection = 180\nsize = 1000', '[load]\ntorque_on = "upper"\nsize = 7')
    answer = ask(text.replace("to = 5", "to = -40"))
    assert degrees(only(answer, "dead point", "effort")) == pytest.approx(0.0, abs=ANGLE)
    assert np.isinf(only(answer, "largest", "effort").value)
    assert np.isinf(only(answer, "largest", "force at A").value)


def test_dead_points_of_a_crank_rocker_are_those_of_its_triangles() -> None:
    """The rocker stands still where crank and coupler are in line: two closed-form angles of the crank, a turn each."""
    linkage = FourBar(30, 90, 70, 100)
    text = FOUR_BAR.replace('at = "tip"\ndirection = -90\nsize = 100', 'torque_on = "rocker"\nsize = -10')
    found = sorted(degrees(e) for e in happened(ask(text), "dead point", "load"))
    wanted = []
    for reach, beyond in ((linkage.b + linkage.a, 0.0), (linkage.b - linkage.a, 180.0)):
        cosine = (reach**2 + linkage.d**2 - linkage.c**2) / (2 * reach * linkage.d)
        wanted.append(float(np.degrees(np.arccos(cosine)) + beyond))
    assert found == pytest.approx(sorted(w + 360 * (w < 60) for w in wanted), abs=ANGLE)


def test_a_link_turns_from_pushed_to_pulled_where_its_moments_say() -> None:
    """A lever on a stay: the weight at the end has no moment about the pivot when it stands above it, 90 degrees."""
    text = """
[points]
A = [0, 0]
P = { from = "A", distance = 80, angle = 40 }
Q = { from = "A", distance = 200, angle = 40 }
S = { from = "P", distance = 150, angle = -60 }
U = { from = "S", distance = 60, angle = 200 }
[members]
ground = ["A", "U"]
lever = ["A", "P", "Q"]
stay = ["P", "S"]
crank = ["U", "S"]
[effort]
torque_on = "crank"
[load]
at = "Q"
direction = -90
size = 250
[stroke]
turn = "lever"
from = 60
to = 120
poses = 14
"""
    answer = ask(text)
    assert degrees(only(answer, "reversal", "stay")) == pytest.approx(90.0, abs=ANGLE)
    assert only(answer, "smallest", "force at S").value == pytest.approx(0.0, abs=1e-9)


def test_a_true_maximum_between_poses() -> None:
    """Effort square to the lever is 200 N x cos(a): drawn from -37 to 52 degrees its top is at 0, between poses."""
    text = LEVER.replace("from = 10", "from = -37").replace("to = 70", "to = 52").replace("poses = 13", "poses = 8")
    top = only(ask(text), "largest", "effort")
    assert top.value == pytest.approx(200.0, rel=1e-14)
    assert degrees(top) == pytest.approx(0.0, abs=PEAK)


def test_ends_of_the_stroke_are_told_as_written() -> None:
    answer = ask(LEVER)
    assert only(answer, "largest", "effort").drive == answer.drive[0, 0, 0]
    assert only(answer, "smallest", "effort").drive == answer.drive[0, 0, -1]
    assert np.degrees(answer.drive[0, 0, [0, -1]]) == pytest.approx([10, 70], rel=1e-15)
    assert only(answer, "largest", "effort").value == pytest.approx(200 * np.cos(np.radians(10)), rel=1e-14)


@pytest.mark.parametrize("poses", [2, 7, 181, 721])
def test_the_worst_values_do_not_hang_on_the_number_of_poses(poses: int) -> None:
    """Also those that a coarse table would not show at all."""
    few, usual = (ask(FOUR_BAR.replace("poses = 61", f"poses = {count}")) for count in (poses, 361))
    assert few.effort.shape[2] == poses
    key = [(e.kind, e.quantity, e.case) for e in usual.events]
    assert [(e.kind, e.quantity, e.case) for e in few.events] == key
    for a, b in zip(few.events, usual.events, strict=True):
        assert a.value == pytest.approx(b.value, rel=WORST, abs=1e-6, nan_ok=True)
        if a.kind not in ("largest", "smallest", "opposite peak"):
            assert degrees(a) == pytest.approx(degrees(b), abs=ANGLE)


def test_no_pose_of_a_dense_table_is_worse() -> None:
    """A hundred times as many poses: none above the largest, none below the smallest, and the top is that of the
    parabola through the three highest."""
    answer = ask(FOUR_BAR)
    dense = ask(FOUR_BAR, poses=6001)
    curves = {f"force at {j}": dense.joint_force(j)[0, 0] for j in dense.joints}
    curves |= {"effort": np.abs(dense.effort[0, 0]), "axial force in coupler": dense.axial_in("coupler")[0, 0]}
    for name, curve in curves.items():
        top, least = only(answer, "largest", name), only(answer, "smallest", name)
        high, low = (abs(e.value) if name == "effort" else e.value for e in (top, least))
        assert high >= np.max(curve) * (1 - 1e-12) and low <= np.min(curve) + 1e-9 * np.max(np.abs(curve))
        k = int(np.argmax(curve))
        if 0 < k < curve.size - 1:
            left, middle, right = curve[k - 1 : k + 2]
            bend = left - 2 * middle + right
            summit = middle - (right - left) ** 2 / (8 * bend)
            assert high == pytest.approx(summit, rel=1e-8)


def test_every_extreme_is_the_value_at_its_pose() -> None:
    """Asked for again at that very pose, the table says the same."""
    answer = ask(FOUR_BAR)
    found = [e for e in answer.events if e.kind in ("largest", "smallest") and np.isfinite(e.value)]
    again = ask(FOUR_BAR, at=[e.drive for e in found])
    for k, event in enumerate(found):
        told = {
            "effort": again.effort, "force ratio": again.force_ratio, "ideal ratio": again.ideal_ratio,
            "axial force in coupler": again.axial,
            **{f"force at {j}": again.joint_force(j) for j in again.joints},
        }[event.quantity]  # fmt: skip
        assert event.value == pytest.approx(float(told.reshape(-1, len(found))[0, k]), rel=1e-9, abs=1e-6)


def test_a_limit_of_motion_is_an_event() -> None:
    """Coupler and rocker in line: cos a = (60^2 + 50^2 - 95^2) / (2 x 60 x 50)."""
    text = FourBar(60, 40, 55, 50).text('[stroke]\nturn = "crank"\nto = "upper limit"')
    limit = np.degrees(np.arccos((60**2 + 50**2 - 95**2) / (2 * 60 * 50)))
    assert degrees(only(ask(text), "limit", "stroke")) == pytest.approx(limit, abs=1e-7)


def test_events_that_are_of_one_case_only_say_so() -> None:
    """A hand that pulls down has no grip on a lever that stands upright, one that pushes aside none on a level one."""
    text = LEVER.replace('square_to = ["hand", "A"]', "direction = -90").replace("from = 10", "from = -30")
    text = (
        text.replace("to = 70", "to = 120")
        + """
[cases.down]
[cases.aside.effort]
at = "hand"
direction = 180
"""
    )
    answer = ask(text)
    assert degrees(only(answer, "dead point", "effort", "down")) == pytest.approx(90.0, abs=ANGLE)
    assert degrees(only(answer, "dead point", "effort", "aside")) == pytest.approx(0.0, abs=ANGLE)
    assert not happened(answer, "dead point", "effort", "")
    assert degrees(only(answer, "dead point", "load")) == pytest.approx(90.0, abs=ANGLE), "the same in all cases"


def test_a_pose_of_the_table_on_a_dead_point_does_not_hide_it() -> None:
    """The effort has no answer there; its dead point is told, and the curves beside it are judged as unbounded."""
    text = LEVER.replace('square_to = ["hand", "A"]', "direction = -90").replace("from = 10", "from = 60")
    for poses in (7, 61, 121):
        answer = ask(text.replace("to = 70", "to = 120").replace("poses = 13", f"poses = {poses}"))
        assert degrees(only(answer, "dead point", "effort")) == pytest.approx(90.0, abs=ANGLE)
