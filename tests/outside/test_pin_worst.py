"""The worst pin of a stroke against fine sampling of a judge that shares no code with linkcalc.

Judge: the plain script of tests/reference (`scipy.optimize.root` and `numpy.linalg.solve`), half a degree a pose and a
hundredth of a degree about its highest. That the largest of many poses comes near the true largest, and never above
it, is an own law.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace

import numpy as np
import pytest

from linkcalc import pins
from linkcalc.model.mechanism import Mechanism
from tests.bench import mechanisms
from tests.bench.peers import linkages
from tests.reference import plain
from tests.reference.linkage import Linkage

COARSE, FINE = np.radians(0.5), np.radians(0.01)
NEAR = 1e-6
"""of the largest: half a fine step, 9e-5 rad, off a peak loses its square times the curvature, up to a hundred"""

LINKAGES: list[tuple[Callable[[], Mechanism], Callable[[], Linkage]]] = [
    (mechanisms.fourbar, linkages.fourbar),
    (mechanisms.sixbar, linkages.sixbar),
]


@pytest.mark.parametrize(("mechanism", "linkage"), LINKAGES, ids=["four-bar", "six-bar"])
def test_worst_pins_against_a_plain_script(mechanism: Callable[[], Mechanism], linkage: Callable[[], Linkage]) -> None:
    """A crank a quarter round, clear of its dead points."""
    model = mechanism()
    assert model.stroke is not None
    drawn = linkages.CRANK_DRAWN
    stop = f"{float(drawn)!r} rad + 90 deg"
    answer = pins(replace(model, stroke=replace(model.stroke, start="drawn", stop=stop, poses=31)))
    values = drawn + np.arange(0, np.radians(90) + 1e-12, COARSE)
    judge = plain.solve(linkage(), values)
    for joint in answer.joints:
        member = joint.sides[0].member
        sizes = np.hypot(*judge.force(joint.joint, member)[:, :2].T)
        top = int(np.argmax(sizes))
        about = np.arange(values[max(top - 1, 0)], values[min(top + 1, values.size - 1)] + 1e-12, FINE)
        # the judge walks from its drawing pose; the way to the peak is part of what it is given
        walk = np.concatenate([values[: max(top - 1, 0)], about])
        near = np.hypot(*plain.solve(linkage(), walk).force(joint.joint, member)[:, :2].T).max()
        assert near <= joint.largest.value * (1 + 1e-9), joint.joint
        assert near >= joint.largest.value * (1 - NEAR), joint.joint
