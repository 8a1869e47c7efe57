"""Segments and racks are drawn as far as they come into mesh over the stroke."""

from __future__ import annotations

import math

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.report.blocks import Item
from linkcalc.report.drawing import draw_mechanism
from linkcalc.report.free_body import free_body
from tests.samples import TRAIN

PAIR = """
[points]
P = [0, 0]
Q = [50, 0]
a = [0, 30]
b = [50, 40]
near = [-100, -20]
far = [100, -20]
[members]
ground = ["P", "Q"]
first = ["P", "a"]
second = ["Q", "b"]
bar = ["near", "far"]
[gears.mesh]
members = ["first", "second"]
centres = ["P", "Q"]
radii = [20, 30]
[slides.ways]
member = "bar"
along = 0
[racks.teeth]
pinion = "first"
centre = "P"
radius = 20
along = ["near", "far"]
on = "bar"
[effort]
torque_on = "first"
[load]
torque_on = "second"
size = 5
[stroke]
turn = "first"
from = 90
to = {to}
poses = 31
"""
BESIDE = math.radians(12)


def _items(drawing: object, shape: str) -> list[Item]:
    return [item for item in drawing.items if item.shape == shape]  # type: ignore[attr-defined]


def _angles(item: Item) -> np.ndarray:
    (x, y), *rim = item.spots
    return np.unwrap([math.atan2(v - y, u - x) for u, v in rim])


def test_segments_reach_as_far_as_they_mesh() -> None:
    """60 degrees of the first are 40 of the second; at the start the place of contact is at one end of each."""
    first, second, pinion = _items(draw_mechanism(stroke(parse(PAIR.format(to=150)))), "segment")
    assert np.ptp(_angles(first)) == pytest.approx(math.radians(60) + 2 * BESIDE)
    assert np.ptp(_angles(second)) == pytest.approx(math.radians(40) + 2 * BESIDE)
    assert np.ptp(_angles(pinion)) == pytest.approx(math.radians(60) + 2 * BESIDE)
    # the first turns counter-clockwise, so what comes to the right of P later lies clockwise of it now
    assert _angles(first).max() == pytest.approx(BESIDE)
    assert np.hypot(*np.subtract(first.spots[5], first.spots[0])) == pytest.approx(20)


def test_a_rack_has_teeth_where_its_pinion_rolls() -> None:
    """60 degrees on 20 mm are 20.944 mm; the bar goes to the right, so the rest of it lies to the left."""
    (rim,) = _items(draw_mechanism(stroke(parse(PAIR.format(to=150)))), "rim")
    (ax, ay), (bx, by) = sorted(rim.spots)
    assert (ay, by) == pytest.approx((-20, -20))
    assert (ax, bx) == pytest.approx((-20 * math.pi / 3 - 20 * BESIDE, 20 * BESIDE))


def test_a_wheel_that_turns_round_is_drawn_whole() -> None:
    first, second, _ = _items(draw_mechanism(stroke(parse(PAIR.format(to=470)))), "segment")
    for item, (x, radius) in ((first, (0, 20)), (second, (50, 30))):
        far = [math.hypot(u - x, v) for u, v in item.spots]
        assert far == pytest.approx([radius] * len(far)) or item is second
    assert np.ptp(_angles(second)) == pytest.approx(math.radians(380 * 20 / 30) + 2 * BESIDE)


def test_a_member_cut_free_keeps_its_teeth() -> None:
    answer = stroke(parse(PAIR.format(to=150)))
    drawing = free_body(answer, "first")
    assert len(_items(drawing, "segment")) == 2
    spots = [item.spots[0] for item in (*_items(drawing, "gear"), *_items(drawing, "rack"))]
    assert spots == [pytest.approx((20, 0)), pytest.approx((0, -20))]
    assert len(_items(free_body(answer, "bar"), "rim")) == 1
    (told,) = free_body(stroke(parse(TRAIN)), "drum").tables
    assert [row[0] for row in told.rows] == ["R", "side", "load", "sum"]
