"""The laws of what is stepped, over every coordinate of the registry."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.parts.contract import Coordinate, Poses, Value
from tests.samples import RAM, SLOTTED, Sample, samples
from tests.unit.parts.batch import ROUNDING, SHAPE, SLOPE_TOLERANCE, STEP, dense, difference, one, random_poses


def coordinates() -> list[tuple[str, Coordinate, int]]:
    found = []
    extra = [
        Sample("coordinate", "travel", "of a slot", SLOTTED.replace('distance = ["A", "low"]', 'travel = "in_arm"')),
        Sample("coordinate", "distance", "of two members", SLOTTED.replace('["A", "low"]', '["tip", "low"]')),
        Sample("coordinate", "turn", "of a member", RAM.replace('travel = "guide"', 'turn = "rod"')),
    ]
    for sample in (*samples("coordinate"), *extra):
        drawing = sample.drawing
        stroke = sample.mechanism.stroke
        assert stroke is not None
        if getattr(stroke.along, "stands", False):
            continue  # it moves no member: tests/unit/design/test_moving_loads.py
        found.append((str(sample), stroke.along.coordinate(drawing), len(drawing.members)))
    return found


FOUND = coordinates()
every_coordinate = pytest.mark.parametrize(("coordinate", "members"), [c[1:] for c in FOUND], ids=[c[0] for c in FOUND])


@every_coordinate
def test_held_at_its_value_there_is_no_gap(coordinate: Coordinate, members: int) -> None:
    at = random_poses(members)
    gap = coordinate.hold(coordinate.value(at)).gap(at)
    np.testing.assert_allclose(np.broadcast_to(gap, SHAPE), 0.0, atol=ROUNDING)


@every_coordinate
def test_a_small_step_beside_its_value_is_the_gap(coordinate: Coordinate, members: int) -> None:
    at = random_poses(members)
    gap = coordinate.hold(coordinate.value(at) - STEP).gap(at)
    np.testing.assert_allclose(np.broadcast_to(gap, SHAPE), STEP, rtol=SLOPE_TOLERANCE)


@every_coordinate
def test_slope_is_the_derivative_of_the_gap_and_of_the_value(coordinate: Coordinate, members: int) -> None:
    at = random_poses(members)
    held = coordinate.hold(coordinate.value(at))
    slope = dense([held.slope(at)], members, SHAPE)[0]
    assert held.angular == (coordinate.kind == "angle")
    for k in range(3, 3 * members):
        start = coordinate.value(at)

        def moved(there: Poses, start: Value = start) -> Value:
            by = coordinate.value(there) - start
            return (by + np.pi) % (2 * np.pi) - np.pi if held.angular else by

        for f in (held.gap, moved):
            by = difference(f, at, k // 3, k % 3)
            np.testing.assert_allclose(slope[k], np.broadcast_to(by, SHAPE), atol=SLOPE_TOLERANCE)


@every_coordinate
def test_a_batch_is_its_poses_one_by_one(coordinate: Coordinate, members: int) -> None:
    at = random_poses(members)
    target = 0.1
    held, value = coordinate.hold(target), np.broadcast_to(coordinate.value(at), SHAPE)
    gap, slope = np.broadcast_to(held.gap(at), SHAPE), dense([held.slope(at)], members, SHAPE)[0]
    for entry in np.ndindex(SHAPE):
        alone = one(at, entry)
        assert float(coordinate.value(alone)) == pytest.approx(value[entry], abs=ROUNDING)
        assert float(held.gap(alone)) == pytest.approx(gap[entry], abs=ROUNDING)
        np.testing.assert_allclose(dense([held.slope(alone)], members, ())[0], slope[(..., *entry)], atol=ROUNDING)


@every_coordinate
def test_a_plain_float_in_a_slope_never_changes(coordinate: Coordinate, members: int) -> None:
    held = coordinate.hold(0.1)
    for first, second in zip(*(held.slope(random_poses(members, seed=seed)) for seed in (1, 2)), strict=True):
        assert first[:2] == second[:2]
        assert isinstance(first[2], float) == isinstance(second[2], float)
        assert not isinstance(first[2], float) or first[2] == second[2]


@every_coordinate
def test_a_batch_of_targets_is_held_each_at_its_own(coordinate: Coordinate, members: int) -> None:
    at = random_poses(members)
    targets = np.linspace(0.05, 0.2, SHAPE[2]).reshape(1, 1, -1)
    together = np.broadcast_to(coordinate.hold(targets).gap(at), SHAPE)
    for k in range(SHAPE[2]):
        single = np.broadcast_to(coordinate.hold(float(targets[0, 0, k])).gap(at), SHAPE)
        np.testing.assert_allclose(together[..., k], single[..., k], atol=ROUNDING)


@pytest.mark.parametrize("turns", [-2, -1, 1, 3])
def test_a_turn_is_held_whatever_its_winding(turns: int) -> None:
    """359 degrees and -1 degree are one pose."""
    coordinate, members = next((c, n) for _, c, n in FOUND if c.kind == "angle")
    at = random_poses(members)
    gaps = [coordinate.hold(0.4 + 2 * np.pi * n).gap(at) for n in (0, turns)]
    np.testing.assert_allclose(gaps[0], gaps[1], atol=ROUNDING)


def test_in_the_drawing_pose_a_coordinate_is_what_the_drawing_shows() -> None:
    """Distance of A and low, and direction of the rocker's line against the crank's own axis, from drawn points."""
    from linkcalc.mechanics.prepare import prepare

    for sample in samples("coordinate"):
        drawing = sample.drawing
        start = prepare(drawing).start.at
        stroke = sample.mechanism.stroke
        assert stroke is not None
        value = float(np.ravel(stroke.along.coordinate(drawing).value(start))[0])
        p = {name: np.array(place) for name, place in drawing.points.items()}

        def direction(a: str, b: str, p: dict[str, np.ndarray] = p) -> float:
            return float(np.arctan2(*(p[b] - p[a])[::-1]))

        shown = {
            "haul": lambda: 0.0,
            "place": lambda: 0.0,
            "distance": lambda p=p: np.hypot(*(p["low"] - p["A"])),
            "turn": lambda d=direction: d("O", "grip") - d("A", "B"),
            "travel": lambda p=p: (p["nose"] - p["A"]) @ (p["C"] - p["A"]) / np.hypot(*(p["C"] - p["A"])),
        }
        assert value == pytest.approx(float(shown[sample.word]()), abs=ROUNDING)
