"""Closing the loops: Newton's order, the order of the guesses, speeds, and entries that do not arrive."""

from __future__ import annotations

from itertools import pairwise

import numpy as np
import pytest

from linkcalc.mechanics.motion import CLOSED, Closed, alone, along, between, close, fastest, moved
from linkcalc.mechanics.prepare import Ready
from linkcalc.parts.pose import Poses
from tests.unit.mechanics.linkages import FourBar, ready

LINKAGE = FourBar(30, 90, 70, 100)
TURN = LINKAGE.text('[stroke]\nturn = "crank"\nto = 200')
EXACT = 1e-13
"""[m] and [-] on lengths of 0.1: closed to 2e-15 of the size, through angles of transmission above 30 degrees."""


@pytest.fixture(scope="module")
def model() -> Ready:
    return ready(TURN)


def held(model: Ready, degrees: float | np.ndarray) -> object:
    assert model.chain.coordinate is not None
    value = np.radians(degrees)
    return model.chain.coordinate.hold(float(value) if np.ndim(value) == 0 else value.reshape(1, 1, -1))


def batch(model: Ready, degrees: np.ndarray) -> Closed:
    """Closed poses at crank angles, from one to the next."""
    here, at = batched(model.start.at, 1), []
    for angle in degrees:
        here = close(model.chain, here, held(model, np.array([angle]))).at
        at.append(here)
    joined = [
        [v if isinstance(v, float) else np.concatenate([getattr(a, name)[k] for a in at], axis=2)
         for k, v in enumerate(getattr(here, name))]
        for name in ("x", "y", "c", "s")
    ]  # fmt: skip
    return close(model.chain, Poses(*joined, here.down, here.field), held(model, degrees))


def batched(at: Poses, count: int) -> Poses:
    """One pose as so many alike."""
    x, y, c, s = (
        [v[0], *(np.full((1, 1, count), float(np.ravel(w)[0])) for w in v[1:])] for v in (at.x, at.y, at.c, at.s)
    )
    return Poses(x, y, c, s, at.down, at.field)


def knee(closed: Closed) -> np.ndarray:
    """Where the rocker's end is: member 3 is the rocker, 70 mm long, its frame turned from the drawn direction."""
    drawn = LINKAGE.rocker_angle(np.radians(LINKAGE.drawn))
    u, v = 0.07 * np.cos(drawn), 0.07 * np.sin(drawn)
    at = closed.at
    return np.array([at.x[3] + at.c[3] * u - at.s[3] * v, at.y[3] + at.s[3] * u + at.c[3] * v]).reshape(2, -1)


def test_closed_poses_are_those_of_the_triangles(model: Ready) -> None:
    angles = np.arange(60.0, 420.0, 3.0)
    closed = batch(model, angles)
    assert closed.fine.all() and closed.worst < CLOSED
    np.testing.assert_allclose(knee(closed), LINKAGE.knee(np.radians(angles)), atol=EXACT)


def test_newton_doubles_the_figures_of_each_step(model: Ready) -> None:
    """Order measured: log(e3/e2) over log(e2/e1) is 2 for Newton, 1 for anything with a stale or wrong Jacobian."""
    target = 110.0
    exact = LINKAGE.knee(np.radians(target)).reshape(2, 1)
    e1, e2, e3 = (
        float(np.abs(knee(close(model.chain, model.start.at, held(model, target), steps=k)) - exact).max())
        for k in (1, 2, 3)
    )
    assert e1 < 0.02 and e3 > 1e3 * EXACT, "from a fair guess, and not yet down to rounding"
    assert np.log(e3 / e2) / np.log(e2 / e1) > 1.8


@pytest.mark.parametrize(("guess", "order"), [("along", 2), ("between", 4)])
def test_a_guess_is_as_good_as_its_order(model: Ready, guess: str, order: int) -> None:
    """Halving the step divides the error by two to the order."""
    errors = []
    for step in (8.0, 4.0, 2.0):
        a, b = batch(model, np.array([70.0])), batch(model, np.array([70.0 + step]))
        if guess == "along":
            turn, exact = along(a, np.radians(step)), b
        else:
            turn, exact = between(a, b, 0.5, np.radians(step)), batch(model, np.array([70.0 + step / 2]))
        errors.append(max(abs(float(np.ravel(turn.s[k] - exact.at.s[k])[0])) for k in (2, 3)))
    for coarse, fine in pairwise(errors):
        assert np.log2(coarse / fine) == pytest.approx(order, abs=0.35)


def test_speed_is_the_slope_of_closed_poses(model: Ready) -> None:
    step = 1e-5
    angles = np.array([65.0, 110.0, 150.0])
    closed = batch(model, angles)
    ahead, behind = (batch(model, angles + np.degrees(by)) for by in (step, -step))
    for member in (1, 2, 3):
        s, c = (np.array([getattr(p.at, n)[member] for p in (ahead, behind)]) for n in ("s", "c"))
        turned = np.arctan2(s[0] * c[1] - c[0] * s[1], c[0] * c[1] + s[0] * s[1]) / (2 * step)
        for which, change in ((0, ahead.at.x[member] - behind.at.x[member]),
                              (1, ahead.at.y[member] - behind.at.y[member])):  # fmt: skip
            speed = np.broadcast_to(closed.speed[3 * (member - 1) + which], (1, 1, 3))
            np.testing.assert_allclose(speed, change / (2 * step), atol=1e-9)
        np.testing.assert_allclose(np.broadcast_to(closed.speed[3 * member - 1], (1, 1, 3)), turned, atol=1e-8)
    np.testing.assert_allclose(np.ravel(closed.speed[8]), LINKAGE.velocity_ratio(np.radians(angles)), atol=1e-12)


def test_one_pose_in_floats_is_the_same_as_in_a_batch(model: Ready) -> None:
    closed = batch(model, np.array([80.0]))
    single = close(model.chain, alone(closed.at), held(model, 95.0))
    together = close(model.chain, closed.at, held(model, np.array([95.0])))
    np.testing.assert_allclose(knee(single), knee(together), atol=EXACT)
    np.testing.assert_allclose(np.array(single.speed), [float(np.ravel(v)[0]) for v in together.speed], atol=1e-10)
    assert single.factored.negative.flat[0] == together.factored.negative.flat[0]


@pytest.mark.parametrize("count", [3, 2000])
def test_what_is_out_of_reach_is_told_and_holds_up_no_other(count: int) -> None:
    """A crank that does not come round: coupler and rocker are stretched at 108.2 degrees."""
    linkage = FourBar(60, 40, 55, 50)
    model = ready(linkage.text('[stroke]\nturn = "crank"\nto = 80'))
    (limit, *_) = linkage.crank_limits()
    angles = np.full(count, 70.0)
    angles[count // 2] = np.degrees(limit) + 5
    closed = close(model.chain, batched(model.start.at, count), held(model, angles))
    np.testing.assert_array_equal(np.flatnonzero(~closed.fine[0, 0]), [count // 2])
    others = np.delete(np.ravel(closed.at.s[3]), count // 2)
    np.testing.assert_allclose(others, others[0], atol=EXACT)


@pytest.mark.parametrize("count", [1, 5, 3000])
def test_a_step_turns_by_its_arc_tangent_and_keeps_the_norm(count: int) -> None:
    """Short batches and long ones take different ways through the code to the same poses."""
    rng = np.random.default_rng(3)
    turn = rng.uniform(-3, 3, (3, 1, 1, count))
    x, y = rng.normal(size=(2, 3, 1, 1, count))
    down, field = (np.zeros((2, 1, 1)), np.ones((2, 1, 1))), np.array([[[1.0]], [[2.0]]])
    at = Poses([0.0, *x], [0.0, *y], [1.0, *np.cos(turn)], [0.0, *np.sin(turn)], down, field)
    step = list(rng.normal(size=(9, 1, 1, count)))
    step[4] = 0.25  # a constant among the arrays
    there = moved(at, step)
    for k in range(3):
        np.testing.assert_allclose(there.x[k + 1], x[k] - step[3 * k], atol=1e-15)
        np.testing.assert_allclose(there.y[k + 1], y[k] - step[3 * k + 1], atol=1e-15)
        angle = turn[k] - np.arctan(step[3 * k + 2])
        np.testing.assert_allclose(there.c[k + 1], np.cos(angle), atol=1e-14)
        np.testing.assert_allclose(there.s[k + 1], np.sin(angle), atol=1e-14)
    assert (there.x[0], there.y[0], there.c[0], there.s[0]) == (0.0, 0.0, 1.0, 0.0)
    assert there.down is down and there.field is field, "gravity is that of the case, wherever the members go"


def test_the_fastest_motion_counts_turns_at_the_size_of_the_mechanism(model: Ready) -> None:
    """Crank at 1 rad per rad: of a mechanism 0.13 m large that is 0.13 m; nothing is faster in this pose."""
    closed = batch(model, np.array([60.0]))
    speeds = [abs(float(np.ravel(v)[0])) for v in closed.speed]
    sizes = [1.0, 1.0, model.chain.size] * 3
    wanted = max(v * s for v, s in zip(speeds, sizes, strict=True))
    assert float(np.ravel(fastest(model.chain, closed.speed))[0]) == pytest.approx(wanted, rel=1e-14)
