"""Random poses to hold parts against, and ways to change them."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import Any

import numpy as np

from linkcalc.parts.contract import TURN, Joint, Push
from linkcalc.parts.pose import Poses, Value

SHAPE = (1, 3, 5)
"""(case, variant, pose) of the batches"""
STEP = 1e-5
"""[m] and [rad] of a central difference"""
SLOPE_TOLERANCE = 1e-8
"""Truncation is of the order of the step to the fourth over a length to the fourth, of some mm at the least: 1e-11;
rounding 1e-16 / STEP = 1e-11; with three figures to spare."""
ROUNDING = 1e-12
"""Sums of a few dozen products of sizes near 1."""


def random_poses(members: int, *, seed: int = 7, still: bool = True) -> Poses:
    """Members anywhere within 0.3 m, turned anyhow; the ground stands still, or is a member like any other."""
    rng = np.random.default_rng(seed)
    x, y = (list(v) for v in rng.uniform(-0.3, 0.3, (2, members, *SHAPE)))
    turn = rng.uniform(-np.pi, np.pi, (members, *SHAPE))
    c, s = list(np.cos(turn)), list(np.sin(turn))
    if still:
        x[0], y[0], c[0], s[0] = 0.0, 0.0, 1.0, 0.0
    return Poses(x, y, c, s)


def nudged(at: Poses, member: int, which: int, by: float) -> Poses:
    """One coordinate of one member changed."""
    x, y, c, s = (list(v) for v in (at.x, at.y, at.c, at.s))
    if which == TURN:
        cb, sb = np.cos(by), np.sin(by)
        c[member], s[member] = at.c[member] * cb - at.s[member] * sb, at.s[member] * cb + at.c[member] * sb
    else:
        (x, y)[which][member] = (at.x, at.y)[which][member] + by
    return Poses(x, y, c, s, at.down, at.field)


def difference(f: Callable[[Poses], Any], at: Poses, member: int, which: int) -> Any:
    """Derivative of a value by one coordinate of one member, from two central differences."""
    near, far = (np.subtract(f(nudged(at, member, which, n * STEP)), f(nudged(at, member, which, -n * STEP)))
                 for n in (1, 2))  # fmt: skip
    return (8 * near - far) / (12 * STEP)


def closed(joint: Joint, at: Poses) -> Poses:
    """The nearest poses in which the joint holds, by the shortest Newton steps on its own equations. Gears whose
    centres a third member carries are put on it first, and then turned only."""
    carried = getattr(joint, "carried", None)
    for _ in range(60):
        for own, place in zip((joint.site, joint.other), carried, strict=True) if carried else ():
            (px, py), (u, v) = at.spot(place), at.arm(own)
            x, y = list(at.x), list(at.y)
            x[own.member], y[own.member] = px - u, py - v
            at = Poses(x, y, at.c, at.s, at.down, at.field)
        gaps = np.stack([np.broadcast_to(g, SHAPE) for g in joint.gap(at)], axis=-1)
        if np.abs(gaps).max() < 1e-15:
            return at
        jacobian = dense(joint.slope(at), len(at.x), SHAPE)
        if carried:
            jacobian[:, [k for k in range(jacobian.shape[1]) if k % 3 != TURN]] = 0.0
        step = np.einsum("...cr,...r->...c", np.linalg.pinv(np.moveaxis(jacobian, (0, 1), (-2, -1))), gaps)
        for k in range(step.shape[-1]):
            # no step beyond half a radian: far from closed the slope of an angle is not that of its gap
            at = nudged(at, k // 3, k % 3, np.clip(-step[..., k], -0.5, 0.5))
    assert np.abs(gaps).max() < ROUNDING, "the slope does not lead to a closed pose"
    return at


def dense(rows: Sequence[Sequence[tuple[int, int, Value]]], members: int, shape: tuple[int, ...]) -> np.ndarray:
    """(rows, 3 members, case, variant, pose): sparse entries laid out, entries of one place summed."""
    out = np.zeros((len(rows), 3 * members, *shape))
    for i, row in enumerate(rows):
        for member, which, value in row:
            out[i, 3 * member + which] += value
    return out


def totals(at: Poses, pushes: Sequence[Push]) -> tuple[Any, Any, Any]:
    """Sums of forces x, y and of moments about the ground's origin."""
    fx: Any = 0.0
    fy: Any = 0.0
    moment: Any = 0.0
    for member, px, py, about in pushes:
        fx, fy = fx + px, fy + py
        moment = moment + about + at.x[member] * py - at.y[member] * px
    return fx, fy, moment


def one(at: Poses, entry: tuple[int, ...]) -> Poses:
    """One pose of the batch in plain floats."""
    x, y, c, s = ([float(np.broadcast_to(v, SHAPE)[entry]) for v in values] for values in (at.x, at.y, at.c, at.s))
    return Poses(x, y, c, s, at.down, at.field)


def rotated(at: Poses, by: float) -> Poses:
    """All members but the ground carried round the origin, and gravity with them."""
    c, s = np.cos(by), np.sin(by)

    def carried(u: Sequence[Value], v: Sequence[Value]) -> tuple[list[Value], list[Value]]:
        new_u = [u[0], *(c * a - s * b for a, b in zip(u[1:], v[1:], strict=True))]
        new_v = [v[0], *(s * a + c * b for a, b in zip(u[1:], v[1:], strict=True))]
        return new_u, new_v

    x, y = carried(at.x, at.y)
    down = at.down[0] * c - at.down[1] * s, at.down[0] * s + at.down[1] * c
    # members of a turned drawing are parallel to its axes as drawn: their turns are the same
    return Poses(x, y, at.c, at.s, down, at.field)
