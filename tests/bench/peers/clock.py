"""The peers, timed by themselves: seconds for one pose, effort and all joint forces told.

Laying out the linkage is not counted. Call several times and take the least: anything else running only adds.
"""

from __future__ import annotations

from collections.abc import Callable
from math import radians
from time import perf_counter

import numpy as np

from tests.bench.peers.by_hand import fourbar_by_hand
from tests.bench.peers.linkages import CRANK_DRAWN, fourbar, sixbar
from tests.reference import plain
from tests.reference.linkage import Linkage

STEP = radians(1)
"""Of the crank from pose to pose: the root finder starts from the pose before."""


def crank_angles(poses: int) -> np.ndarray:
    return CRANK_DRAWN + STEP * np.arange(poses)


def plain_fourbar(poses: int) -> float:
    """The plain script on general data: poses by a root finder, forces by a dense solve."""
    return _each(lambda: plain.solve(fourbar(), crank_angles(poses), None), poses)


def plain_sixbar(poses: int) -> float:
    return _each(lambda: plain.solve(sixbar(), crank_angles(poses), None), poses)


def by_hand_fourbar(poses: int) -> float:
    """The plain script typed in for this one four-bar."""
    return _each(lambda: fourbar_by_hand(crank_angles(poses)), poses)


def engine_fourbar(poses: int) -> float:
    """The physics engine's forward pass and pass for the forces between bodies.

    It is told the closed poses and finds none itself; reading the forces out is not counted.
    """
    return _engine(fourbar(), poses)


def engine_sixbar(poses: int) -> float:
    return _engine(sixbar(), poses)


def _engine(linkage: Linkage, poses: int) -> float:
    from mujoco import mj_forward, mj_rnePostConstraint  # slow to load: only where it is timed

    from tests.reference.engine import Engine

    engine = Engine(linkage)
    angles = engine.angles(plain.solve(linkage, crank_angles(min(poses, 360))).poses)
    angles = np.resize(angles, (poses, angles.shape[1]))
    model, data, place = engine.model, engine.data, engine.data.qpos

    def run() -> None:
        for pose in angles:
            place[:] = pose
            mj_forward(model, data)
            mj_rnePostConstraint(model, data)

    return _each(run, poses)


def _each(run: Callable[[], object], poses: int) -> float:
    start = perf_counter()
    run()
    return (perf_counter() - start) / poses
