"""Labels find places that cover nothing."""

import numpy as np
import pytest

from linkcalc.report.labels import Wish, along, place

FRAME = (0.0, 0.0, 400.0, 400.0)
NOTHING = np.zeros((0, 3))


def _boxes(wishes, placed):
    return [
        (p.x - w.width / 2, p.y - w.height / 2, p.x + w.width / 2, p.y + w.height / 2)
        for w, p in zip(wishes, placed, strict=True)
    ]


def test_twelve_labels_of_one_spot_do_not_overlap():
    wishes = [Wish(200, 200, 50, 10)] * 12
    boxes = _boxes(wishes, place(wishes, NOTHING, FRAME))
    for i, (l1, b1, r1, t1) in enumerate(boxes):
        for l2, b2, r2, t2 in boxes[:i]:
            assert r1 <= l2 or r2 <= l1 or t1 <= b2 or t2 <= b1


def test_labels_stay_inside_the_frame_and_off_a_line():
    line = along(np.array([0.0, 3.0]), np.array([400.0, 3.0]))
    wish = Wish(396, 3, 60, 10)
    ((left, bottom, right, top),) = _boxes([wish], place([wish], line, FRAME))
    assert left >= 0
    assert right <= 400
    assert not bottom < 3 < top


@pytest.mark.parametrize("toward", [(0.0, 1.0), (-1.0, 0.0), (0.6, -0.8)])
def test_a_label_stands_where_it_would_rather_if_nothing_is_there(toward):
    (found,) = place([Wish(200, 200, 30, 10, toward=toward)], NOTHING, FRAME)
    off = np.array([found.x - 200, found.y - 200])
    assert off @ toward > 0.9 * np.hypot(*off)
    assert not found.far


def test_a_label_driven_far_off_is_told_to_be_far():
    crowd = np.concatenate([along(np.array([150.0, y]), np.array([250.0, y]), 50.0) for y in range(170, 231, 2)])
    (found,) = place([Wish(200, 200, 30, 10)], crowd, FRAME)
    assert found.far
