"""Laws of what joints must carry, over random machines."""

from __future__ import annotations

import numpy as np
from hypothesis import assume, given
from hypothesis import strategies as st

from linkcalc import pins, stroke
from linkcalc.design.pins_answer import PinsAnswer
from linkcalc.faults import Faults
from linkcalc.model.mechanism import Mechanism
from tests.property.transform import turned
from tests.strategies import frames, machines

SAME = 1e-8
"""Of the largest force. Machines of three links with angles of transmission down to 30 degrees lose some figures, and
a turned drawing has its peaks a rounding of the drive away."""

either = st.one_of(machines(), frames())


def asked(machine: Mechanism) -> PinsAnswer:
    """What its joints carry; a machine that cannot go through its stroke is left out, as in the laws of strokes."""
    try:
        return pins(machine)
    except Faults:
        assume(False)
        raise


def largest(answer: PinsAnswer) -> float:
    return max((j.largest.value for j in answer.joints if np.isfinite(j.largest.value)), default=0.0)


@given(either)
def test_the_worst_is_no_less_than_any_pose_and_is_reached(machine: Mechanism) -> None:
    answer = asked(machine)
    top = largest(answer)
    several = 173 if answer.stroke.drive_name else None
    samples = stroke(machine, poses=several)
    for joint in answer.joints:
        seen = samples.joint_force(joint.joint)
        if not np.isfinite(joint.largest.value):
            continue
        assert np.nanmax(seen) <= joint.largest.value + SAME * top
        assert np.nanmin(seen) >= joint.smallest.value - SAME * top
        if not joint.largest.felt:
            continue
        # and the forces told with it are those of that very pose
        at = [joint.largest.drive] if answer.stroke.drive_name else None
        there = stroke(machine, at=at)
        case = there.cases.index(joint.largest.case)
        for felt in joint.largest.felt:
            x, y = there.force_on(joint.joint, felt.member)[:, case, 0, 0]
            assert abs(np.hypot(x, y) - felt.force) <= SAME * top
            if np.isfinite(felt.direction):
                assert abs(felt.force * np.cos(felt.direction) - x) <= SAME * top
                assert abs(felt.force * np.sin(felt.direction) - y) <= SAME * top


@given(machines(), st.floats(-3.0, 3.0))
def test_turning_the_model_turns_ground_directions_and_leaves_those_of_the_members(
    machine: Mechanism, by: float
) -> None:
    first, second = asked(machine), asked(turned(machine, by))
    top = largest(first)
    for a, b in zip(first.joints, second.joints, strict=True):
        if not np.isfinite(a.largest.value):
            continue
        assert abs(a.largest.value - b.largest.value) <= SAME * top
        assert a.swings == () or abs(a.swings[0].path - b.swings[0].path) <= 1e-7
        if a.largest.case != b.largest.case or abs(a.largest.drive - b.largest.drive) > 1e-6:
            continue  # two poses or cases that are worst alike: either may be told
        for one, other in zip(a.largest.felt, b.largest.felt, strict=True):
            # where the force is small its direction is only as sure as its size
            slack = 1e-5 + 1e-7 * top / max(one.force, 1e-300)
            assert _apart(other.direction - one.direction - by) <= slack
            if one.member != "ground":
                assert _apart(other.own_direction - one.own_direction) <= slack


def _apart(angle: float) -> float:
    return float(abs(np.arctan2(np.sin(angle), np.cos(angle)))) if np.isfinite(angle) else 0.0


@given(machines())
def test_no_force_points_into_the_free_sector(machine: Mechanism) -> None:
    for joint in asked(machine).joints:
        for side in joint.sides:
            rose = side.rose
            if rose is None or rose.free is None:
                continue
            begin, end = rose.free
            into = (rose.direction - begin) % (2 * np.pi)
            wide = end - begin
            inside = (into > 1e-9) & (into < wide - 1e-9)
            assert not np.any(inside)
            # the bars reach as far as the force does, each where it points
            told = np.isfinite(rose.direction)
            k = np.floor(rose.direction[told] / np.radians(10) + 0.5).astype(int) % 36
            assert np.all(rose.sectors[k] >= rose.force[told] * (1 - 1e-12))
