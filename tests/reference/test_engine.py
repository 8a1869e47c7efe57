"""The physics engine against the plain script: its error is its softness, and goes with it."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from tests.bench.peers.clock import crank_angles
from tests.bench.peers.linkages import fourbar, lazy_tongs, sixbar
from tests.reference import engine, plain
from tests.reference.engine import GIVE
from tests.reference.linkage import Force, Linkage, Solution, Torque, Turn

RUNS = [pytest.param(fourbar(), 4e-4, 3e-7, id="four-bar"), pytest.param(sixbar(), 1.5e-3, 5e-6, id="six-bar")]
"""Linkage, bound on the error of the soft constraints (measured 2.7e-4 and 9.5e-4 of the largest force), and on what
remains once it is taken out (9e-8 and 1.5e-6)."""


def apart(one: Solution, other: Solution) -> tuple[float, float]:
    """Largest difference of a joint force and of the effort, as parts of the largest of its kind."""
    force = max(np.abs(one.force(p, a) - other.force(p, a)).max() for p, a, _ in other.forces)
    most = max(np.abs(f).max() for f in other.forces.values())
    return force / most, np.abs(one.effort - other.effort).max() / np.abs(other.effort).max()


@pytest.mark.parametrize(("linkage", "soft", "taken_out"), RUNS)
def test_joint_forces_all_the_way_round(linkage: Linkage, soft: float, taken_out: float) -> None:
    exact = plain.solve(linkage, crank_angles(360))
    once, twice = (engine.solve(linkage, exact.poses, give) for give in (GIVE, 2 * GIVE))
    assert max(apart(once, exact)) < soft
    straight = Solution(
        exact.bodies,
        exact.poses,
        2 * once.effort - twice.effort,
        {k: 2 * once.forces[k] - twice.forces[k] for k in once.forces},
    )
    assert max(apart(straight, exact)) < taken_out


def test_what_it_cannot_do_is_refused() -> None:
    with pytest.raises(ValueError, match="pins and a turning drive"):
        engine.Engine(lazy_tongs(1))
    with pytest.raises(ValueError, match="torque on the driven body"):
        engine.Engine(replace(fourbar(), drive=Turn("rocker")))
    with pytest.raises(ValueError, match="pinned to the ground"):
        engine.Engine(replace(fourbar(), drive=Turn("coupler"), effort=Torque("coupler")))
    with pytest.raises(ValueError, match="does not take this load"):
        engine.Engine(replace(fourbar(), loads=(Force("rocker", "tip", 1.0, 0.0, turns=True),)))
