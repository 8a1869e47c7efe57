"""Every word of the registry has a sample, and every joint keeps the laws of joints."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc import stroke
from linkcalc.parts.contract import Joint
from linkcalc.parts.joints.pin import PinJoint
from linkcalc.parts.pose import Site
from linkcalc.words import kinds
from tests.property.resum import unbalanced
from tests.samples import SAMPLES, Sample, samples
from tests.unit.parts.batch import (
    ROUNDING,
    SHAPE,
    SLOPE_TOLERANCE,
    closed,
    dense,
    difference,
    nudged,
    one,
    random_poses,
)

FAMILIES = ("joint", "load", "coordinate", "construction", "section")


@pytest.mark.parametrize("family", FAMILIES)
def test_every_word_has_a_sample(family: str) -> None:
    assert set(kinds(family)) == {sample.word for sample in samples(family)}


@pytest.mark.parametrize("sample", SAMPLES, ids=str)
def test_a_sample_is_of_the_word_it_is_for(sample: Sample) -> None:
    m = sample.mechanism
    found = {
        "joint": lambda: m.joints[sample.word][sample.name],
        "load": lambda: {"effort": m.effort, "load": m.load, **m.loads}[sample.name],
        "coordinate": lambda: m.stroke.along,
        "construction": lambda: m.points[sample.name],
        "section": lambda: m.members[sample.name].section,
    }
    assert type(found[sample.family]()) is kinds(sample.family)[sample.word]


@pytest.mark.parametrize("text", list(dict.fromkeys(sample.text for sample in SAMPLES)))
def test_a_sample_is_in_equilibrium(text: str) -> None:
    answer = stroke(Sample("", "", "", text).mechanism)
    assert not answer.status.any()
    assert max(unbalanced(answer).values()) < ROUNDING


def joints() -> list[tuple[str, Joint, int]]:
    """Name, joint and number of members; pins, which need no word, among them."""
    found = []
    for sample in samples("joint"):
        drawing = sample.drawing
        mine = [j for j in drawing.joints if j.name == sample.name]
        found += [(str(sample), joint, len(drawing.members)) for joint in mine]
    pin = PinJoint("P", Site(1, 0.04, -0.07), Site(2, -0.03, 0.0))
    return [*found, ("pin", pin, 3), ("pin on the ground", PinJoint("Q", Site(1, 0.0, 0.02), Site(0, 0.1, 0.2)), 2)]


JOINTS = joints()
every_joint = pytest.mark.parametrize(("joint", "members"), [j[1:] for j in JOINTS], ids=[j[0] for j in JOINTS])


@every_joint
def test_slope_is_the_derivative_of_the_gap(joint: Joint, members: int) -> None:
    at = closed(joint, random_poses(members, still=False))
    slope = dense(joint.slope(at), members, SHAPE)
    for k in range(3 * members):
        for row in range(len(joint.angular)):
            by = difference(lambda there, row=row: joint.gap(there)[row], at, k // 3, k % 3)
            np.testing.assert_allclose(slope[row, k], np.broadcast_to(by, SHAPE), atol=SLOPE_TOLERANCE)


@every_joint
def test_action_equals_reaction_on_a_closed_pose(joint: Joint, members: int) -> None:
    """Each row's multiplier puts forces on the members that sum to nothing, and moments that do."""
    at = closed(joint, random_poses(members, still=False))
    for row in dense(joint.slope(at), members, SHAPE):
        fx, fy, about = row[0::3], row[1::3], row[2::3]
        x, y = (np.stack([np.broadcast_to(v, SHAPE) for v in values]) for values in (at.x, at.y))
        np.testing.assert_allclose(fx.sum(axis=0), 0.0, atol=ROUNDING)
        np.testing.assert_allclose(fy.sum(axis=0), 0.0, atol=ROUNDING)
        np.testing.assert_allclose((about + x * fy - y * fx).sum(axis=0), 0.0, atol=ROUNDING)


@every_joint
def test_only_the_members_it_names_feel_it(joint: Joint, members: int) -> None:
    entries = [entry for row in joint.slope(random_poses(members)) for entry in row]
    assert {member for member, _, _ in entries} <= set(joint.members)
    assert joint.site.member == joint.members[0]
    assert len(joint.gap(random_poses(members))) == len(joint.slope(random_poses(members))) == len(joint.angular)


@every_joint
def test_a_batch_is_its_poses_one_by_one(joint: Joint, members: int) -> None:
    at = random_poses(members)
    gap, slope = joint.gap(at), dense(joint.slope(at), members, SHAPE)
    for entry in np.ndindex(SHAPE):
        alone = one(at, entry)
        np.testing.assert_allclose(
            joint.gap(alone), [np.broadcast_to(g, SHAPE)[entry] for g in gap], rtol=0, atol=ROUNDING
        )
        np.testing.assert_allclose(dense(joint.slope(alone), members, ()), slope[(..., *entry)], rtol=0, atol=ROUNDING)


@every_joint
def test_a_plain_float_in_a_slope_never_changes(joint: Joint, members: int) -> None:
    """The whole interface to the folding of constants: the engine takes a float for the same in every pose."""
    seen = [joint.slope(random_poses(members, seed=seed)) for seed in (1, 2)]
    for first, second in zip(*([entry for row in rows for entry in row] for rows in seen), strict=True):
        assert first[:2] == second[:2]
        assert isinstance(first[2], float) == isinstance(second[2], float)
        if isinstance(first[2], float):
            assert first[2] == second[2]


@every_joint
def test_a_mark_stands_at_the_joint(joint: Joint, members: int) -> None:
    at = one(closed(joint, random_poses(members)), (0, 1, 2))
    mark = joint.mark(at)
    told = joint.place(at) if hasattr(joint, "place") else at.spot(joint.site)
    np.testing.assert_allclose(mark.spots[0], told, atol=ROUNDING)
    assert mark.name == joint.name
    assert mark.along == (0.0, 0.0) or np.hypot(*mark.along) == pytest.approx(1.0)


TRAVELLED = [(name, j, n) for name, j, n in JOINTS if hasattr(j, "travel")]


@pytest.mark.parametrize(("joint", "members"), [j[1:] for j in TRAVELLED], ids=[j[0] for j in TRAVELLED])
def test_travel_is_the_way_along_the_line(joint: Joint, members: int) -> None:
    """Its slope is its derivative, and a shift of the joint along its own line is travel and no gap."""
    at = closed(joint, random_poses(members))
    slope = dense([joint.travel_slope(at)], members, SHAPE)[0]
    for k in range(3, 3 * members):
        by = difference(joint.travel, at, k // 3, k % 3)
        np.testing.assert_allclose(slope[k], np.broadcast_to(by, SHAPE), atol=SLOPE_TOLERANCE)
    if not hasattr(joint, "line"):
        return  # a curve: its travel is held against its length in test_track.py
    tx, ty = at.turned(joint.line.member, joint.line.tx, joint.line.ty)
    far = nudged(nudged(at, joint.site.member, 0, 0.05 * tx), joint.site.member, 1, 0.05 * ty)
    np.testing.assert_allclose(joint.travel(far) - joint.travel(at), 0.05, atol=ROUNDING)
    np.testing.assert_allclose(np.stack([np.broadcast_to(g, SHAPE) for g in joint.gap(far)]), 0.0, atol=ROUNDING)
