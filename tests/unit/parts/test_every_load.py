"""The laws of what pushes, over every load of the registry and the weights of members."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.model.sketch import Drawing
from linkcalc.parts.contract import Pusher
from linkcalc.parts.loads.pair import PairPush
from linkcalc.parts.loads.torque import TorquePush
from tests.property.transform import turned
from tests.samples import Sample, samples
from tests.unit.parts.batch import ROUNDING, SHAPE, STEP, nudged, one, random_poses, rotated, totals

ANGLE = 0.7
WORK_TOLERANCE = 1e-8
"""Central differences over STEP: 1e-10, with two figures to spare."""


def pusher(sample: Sample, by: float | None = None) -> tuple[Pusher, int]:
    """The numeric part of a sample's load, of the drawing turned by an angle if one is given; number of members."""
    mechanism = sample.mechanism
    if by is not None:
        mechanism = turned(mechanism, by)
    drawing = Drawing(mechanism)
    return drawing.pushers()["", sample.name], len(drawing.members)


def loads() -> list[Sample]:
    """Those of the registry, and a member's own weight, which needs no word."""
    ram = samples("load")[0]
    return [*samples("load"), Sample("load", "", "weight of ram", ram.text)]


every_load = pytest.mark.parametrize("sample", loads(), ids=str)


@every_load
def test_turning_the_drawing_turns_the_push(sample: Sample) -> None:
    """Forces turn with it; moments about the members' own origins and the strength are what they were."""
    (before, members), (after, _) = pusher(sample), pusher(sample, ANGLE)
    at = random_poses(members)
    c, s = np.cos(ANGLE), np.sin(ANGLE)
    for (m0, fx, fy, moment), (m1, gx, gy, turned_moment) in zip(
        before.push(at), after.push(rotated(at, ANGLE)), strict=True
    ):
        assert m0 == m1
        np.testing.assert_allclose(np.broadcast_to(gx, SHAPE), c * fx - s * fy, atol=ROUNDING)
        np.testing.assert_allclose(np.broadcast_to(gy, SHAPE), s * fx + c * fy, atol=ROUNDING)
        np.testing.assert_allclose(np.broadcast_to(turned_moment, SHAPE), moment, atol=ROUNDING)
    if before.size is not None:
        assert before.strength(at) == pytest.approx(
            after.strength(rotated(at, ANGLE)), rel=1e-9, abs=ROUNDING, nan_ok=True
        )


@every_load
def test_a_force_of_one_newton_is_one_newton(sample: Sample) -> None:
    part, members = pusher(sample)
    pushes = part.push(random_poses(members))
    # of a rope only the ends feel the pull itself
    for _, fx, fy, moment in (pushes[0], pushes[-1]) if hasattr(part, "through") else pushes:
        size = np.hypot(fx, fy)
        np.testing.assert_allclose(size if part.kind == "force" else np.abs(moment), 1.0, atol=ROUNDING)


@every_load
def test_a_batch_is_its_poses_one_by_one(sample: Sample) -> None:
    part, members = pusher(sample)
    at = random_poses(members)
    pushes = part.push(at)
    for entry in np.ndindex(SHAPE):
        for whole, single in zip(pushes, part.push(one(at, entry)), strict=True):
            assert whole[0] == single[0]
            np.testing.assert_allclose(
                single[1:], [np.broadcast_to(v, SHAPE)[entry] for v in whole[1:]], rtol=0, atol=ROUNDING
            )


@every_load
def test_a_plain_float_in_a_push_never_changes(sample: Sample) -> None:
    part, members = pusher(sample)
    for first, second in zip(*(part.push(random_poses(members, seed=seed)) for seed in (1, 2)), strict=True):
        for a, b in zip(first[1:], second[1:], strict=True):
            assert isinstance(a, float) == isinstance(b, float)
            assert not isinstance(a, float) or a == b


@every_load
def test_there_is_one_bearer_for_each_push(sample: Sample) -> None:
    part, members = pusher(sample)
    assert len(part.on_pins) == len(part.push(random_poses(members)))


@every_load
def test_the_moment_is_that_of_the_force_at_its_place(sample: Sample) -> None:
    """The work of a small motion: force times way of the place, for every coordinate of the member it acts on."""
    part, members = pusher(sample)
    if not hasattr(part, "site") or isinstance(part, TorquePush):
        pytest.skip("told of one place only: pairs and torques have tests of their own")
    at = random_poses(members)
    ((member, fx, fy, moment),) = part.push(at)
    if member == 0:
        pytest.skip("it acts on the ground")
    for which, generalised in enumerate((fx, fy, moment)):
        (ax, ay), (bx, by) = (nudged(at, member, which, step).spot(part.site) for step in (STEP, -STEP))
        work = (fx * (ax - bx) + fy * (ay - by)) / (2 * STEP)
        np.testing.assert_allclose(np.broadcast_to(generalised, SHAPE), np.broadcast_to(work, SHAPE),
                                   atol=WORK_TOLERANCE)  # fmt: skip


@every_load
def test_each_entry_of_a_push_acts_at_its_site(sample: Sample) -> None:
    """A force has the moment of its arm about the origin of its member, and a couple has no force."""
    part, members = pusher(sample)
    at = random_poses(members)
    for (member, fx, fy, moment), site in zip(part.push(at), part.sites, strict=True):
        assert site.member == member
        if part.kind == "moment":
            assert (fx, fy) == (0.0, 0.0)
        elif not hasattr(part, "through"):  # a rope on a drum turns it besides
            a, b = at.arm(site)
            np.testing.assert_allclose(np.broadcast_to(moment, SHAPE), np.broadcast_to(a * fy - b * fx, SHAPE),
                                       atol=WORK_TOLERANCE)  # fmt: skip


def closed_in_themselves() -> list[Sample]:
    return [s for s in loads() if s.word and isinstance(pusher(s)[0], (PairPush, TorquePush))]


@pytest.mark.parametrize("sample", closed_in_themselves(), ids=str)
def test_pairs_and_torques_sum_to_nothing(sample: Sample) -> None:
    part, members = pusher(sample)
    at = random_poses(members, still=False)
    for total in totals(at, part.push(at)):
        np.testing.assert_allclose(np.broadcast_to(total, SHAPE), 0.0, atol=ROUNDING)


@pytest.mark.parametrize("sample", [s for s in samples("load") if s.word == "between"], ids=str)
def test_a_pair_works_with_the_distance_of_its_points(sample: Sample) -> None:
    """Push apart times growth of the distance, for every coordinate of both members."""
    part, members = pusher(sample)
    at = random_poses(members)

    def length(poses: object) -> np.ndarray:
        (ax, ay), (bx, by) = poses.spot(part.first), poses.spot(part.second)
        return np.hypot(bx - ax, by - ay)

    for member, *generalised in part.push(at):
        if member:
            for which, value in enumerate(generalised):
                growth = (length(nudged(at, member, which, STEP)) - length(nudged(at, member, which, -STEP))) / (
                    2 * STEP
                )
                np.testing.assert_allclose(np.broadcast_to(value, SHAPE), growth, atol=WORK_TOLERANCE)


def test_a_weight_follows_the_field_of_its_case() -> None:
    """Strength = mass x field, direction = that of gravity, case by case."""
    part, members = pusher(next(s for s in samples("load") if s.word == "mass_at"))
    at = random_poses(members)
    down = np.array([0.0, 1.0]).reshape(2, 1, 1), np.array([-1.0, 0.0]).reshape(2, 1, 1)
    field = np.array([9.80665, 1.62]).reshape(2, 1, 1)
    tilted = type(at)(at.x, at.y, at.c, at.s, down, field)
    ((_, fx, fy, _),) = part.push(tilted)
    np.testing.assert_array_equal(np.ravel(fx), [0.0, 1.0])
    np.testing.assert_array_equal(np.ravel(fy), [-1.0, 0.0])
    np.testing.assert_allclose(np.ravel(part.strength(tilted)), part.size * np.array([9.80665, 1.62]), rtol=ROUNDING)
    first = one(tilted, (0, 0, 0))
    assert part.mark(first).along == (0.0, -1.0), "drawn as the first case has it"


@every_load
def test_a_mark_points_the_way_of_the_push(sample: Sample) -> None:
    part, members = pusher(sample)
    at = one(random_poses(members), (0, 0, 0))
    mark, push = part.mark(at), part.push(at)
    assert mark.name == part.name
    if len(push) == 1:
        np.testing.assert_allclose(mark.along, push[0][1:3], atol=ROUNDING)
        np.testing.assert_allclose(mark.spots[0], at.spot(part.site), atol=ROUNDING)
