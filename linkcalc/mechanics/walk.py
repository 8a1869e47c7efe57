"""Walk one mechanism through its stroke: steps as large as the motion is smooth, never onto another branch.

A step is taken only if Newton arrives and the two ends agree with their speeds (trapezoid rule); so the curve that is
followed is resolved, and a jump to another way of assembling is turned down. Where no step is small enough the
drive has come to a limit of motion, which is then found exactly.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.limit import limit_beyond
from linkcalc.mechanics.motion import Closed, along, between, close, single, table
from linkcalc.mechanics.plan import NoPlan
from linkcalc.parts.pose import Array

_SMOOTH = 0.03  # how far a step may depart from the trapezoid rule, over its length
_STRICT = 0.003  # the same where a loop turns over: only straight through a change point
_OVER = -0.9  # a direction that has turned over, and not merely far
_SMALLEST = 1e-7  # of the whole way
_FIRST = 1 / 6
_GROWTH = 1.6
_CLOSE = 1e-5  # nodes only guide the poses between them, which are closed for themselves
_FAST = 10.0  # times the speed of the drive itself: a limit of motion is near
_ROUNDING = 1e-13  # of the drive: no way to go
_STEPS = 5000


@dataclass(frozen=True, eq=False)
class Node:
    """One closed pose of the walk.

    drive  [rad or m]
    over   -1 if a change point was passed on the last step, about +1 if none was near
    """

    drive: float
    pose: Closed
    over: float = 1.0


@dataclass(frozen=True)
class Walk:
    """The nodes of a walk in the order walked.

    stopped  "" if it came where it should; else why not: "limit" or "change point" or "stuck"
    limit    drive at the limit of motion, nan if none was met
    passed   drives between which change points were passed straight through
    """

    nodes: tuple[Node, ...]
    stopped: str
    limit: float
    passed: tuple[tuple[float, float], ...]


def walk(chain: Chain, start: Node, stop: float) -> Walk:
    """From a closed pose to a value of the drive, or to the limit of motion if that comes first."""
    nodes = [start]
    passed: list[tuple[float, float]] = []
    whole = stop - start.drive
    if abs(whole) <= _ROUNDING * max(abs(stop), abs(start.drive)):
        return Walk((start,), "", np.nan, ())
    step = whole * _FIRST
    for _ in range(_STEPS):
        here = nodes[-1]
        left = stop - here.drive
        if abs(left) <= abs(whole) * 1e-14:
            return Walk(tuple(nodes), "", np.nan, tuple(passed))
        last = abs(step) >= abs(left) * (1 - 1e-9)
        there = _step(chain, nodes, stop if last else here.drive + step)
        if there is not None:
            if there.over < _OVER:
                passed.append((here.drive, there.drive))
            nodes.append(there)
            step = _GROWTH * (there.drive - here.drive)
            continue
        step = (left if last else step) / 4
        if abs(step) < _SMALLEST * abs(whole):
            met = limit_beyond(chain, here.drive, here.pose, 1 if whole > 0 else -1)
            return Walk(tuple(nodes), "stuck" if np.isnan(met) else "limit", met, tuple(passed))
    return Walk(tuple(nodes), "stuck", np.nan, tuple(passed))


def _step(chain: Chain, nodes: list[Node], drive: float) -> Node | None:
    """The next node, or None if the step was too large."""
    here = nodes[-1]
    assert chain.coordinate is not None
    step = drive - here.drive
    if len(nodes) > 1:
        before = nodes[-2]
        span = here.drive - before.drive
        guess = between(before.pose, here.pose, 1 + step / span, span)
    else:
        guess = along(here.pose, step)
    try:
        there = close(chain, guess, chain.coordinate.hold(drive), steps=6, within=_CLOSE)
    except NoPlan:
        return None
    speed = single(there.speed) * chain.column_size
    if not there.fine.all() or not np.isfinite(speed).all():
        return None
    if np.abs(speed).max() > _FAST * (chain.size if chain.coordinate.kind == "angle" else 1.0):
        # close to a limit of motion a small gap hides a large way: it could even seem to go beyond
        there = close(chain, there.at, chain.coordinate.hold(drive), steps=6)
        if not there.fine.all():
            return None
    over = _turned_over(chain, here.pose, there)
    if _departure(chain, here.pose, there, step) > (_STRICT if over < 0.0 else _SMOOTH):
        return None
    return Node(drive, there, over)


def _turned_over(chain: Chain, a: Closed, b: Closed) -> float:
    """-1 if the step goes through a change point, about +1 if it keeps clear of all.

    Of one loop the sign of the determinant tells. Of several the signs could change together, as those of parallel
    linkages one upon the other do; but with every one of them a direction of the polar factor turns over, and the
    least cosine of a turn from one factor to the other shows it.
    """
    if a.factored.negative.flat[0] != b.factored.negative.flat[0]:
        return -1.0
    before, after = a.factored.polar, b.factored.polar
    if len(chain.joints) - chain.moving < 2 or before is None or after is None:
        return 1.0
    turn = before.T @ after
    return float(np.linalg.eigvalsh(turn + turn.T)[0]) / 2


def _departure(chain: Chain, a: Closed, b: Closed, step: float) -> float:
    """How far the way from a to b is from the mean of their speeds times the step, over the longer of the two ways."""
    ua, ub = single(a.speed) * chain.column_size, single(b.speed) * chain.column_size
    apart = _way(a, b) * chain.column_size - step * (ua + ub) / 2
    longest = abs(step) * max(float(np.abs(ua).max()), float(np.abs(ub).max()))
    return float(np.abs(apart).max()) / max(longest, 1e-12 * chain.size)


def _way(a: Closed, b: Closed) -> Array:
    """(columns) coordinates of b less those of a."""
    (xa, ya, ca, sa, _), (xb, yb, cb, sb, _) = table(a), table(b)
    turn = np.arctan2(sb * ca - cb * sa, cb * ca + sb * sa)
    return np.array([xb - xa, yb - ya, turn]).T.ravel()
