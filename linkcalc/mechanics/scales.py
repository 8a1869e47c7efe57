"""Statics of a scale: one member, the beam, is held where it is drawn, and what everything does to it is told.

With the speeds v = dq/d(turn of the beam), the power v·Q of a weight is its moment at the beam, however many levers
stand between. The moments of all that acts must sum to nothing. How the sum changes as the beam tilts, everything that
hangs on it following, is its stiffness: the joint forces count in it, so heights of edges and of centres of mass do.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from linkcalc.mechanics.balance import balance
from linkcalc.mechanics.held import Work
from linkcalc.mechanics.loose import Loose
from linkcalc.mechanics.motion import Closed, fastest
from linkcalc.mechanics.plan import NoPlan
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.pushing import Acting, Pushing, add_pushes, column
from linkcalc.mechanics.settle import settle
from linkcalc.mechanics.sums import dot, small
from linkcalc.mechanics.tangent import tangent_of
from linkcalc.parts.contract import TURN
from linkcalc.parts.pose import Array, Codes, Value, zero

_IDLE = 1e-9  # turn of the beam over the fastest motion: it does not move


@dataclass(frozen=True, eq=False)
class Tilting:
    """How a balanced beam tilts; arrays (case, variant, pose).

    stiffness  [N m/rad] moment that tilts the beam, members that hang free following
    steady     +1 stable, 0 neutral, -1 unstable
    turning    [rad/(N m)] tilt for a moment of 1 that acts as each of the pushers does, one entry each
    """

    stiffness: Array
    steady: Codes
    turning: list[Array]


def level(ready: Ready, pushing: Pushing, beam: int) -> Closed:
    """The pose with the beam as drawn, what hangs free settled, in every case of the pushing; speeds per rad of beam.

    Raises ArithmeticError: the beam does not move.
    """
    closed = ready.start
    if ready.loose is not None:
        places, coordinate = ready.loose.places(closed.at), ready.loose.coordinate
        assert places is not None and coordinate is not None
        asked = replace(pushing, effort=ready.pushing.effort)
        closed = settle(ready.loose, places, closed.at, coordinate.value(closed.at), asked, ready.unknown).closed
    turn = closed.speed[3 * beam - 1]
    top = np.max(np.asarray(fastest(ready.chain, closed.speed), float))
    if np.all(np.abs(turn) * ready.chain.size <= _IDLE * top):
        raise ArithmeticError("the beam does not move")
    speed = [v if zero(v) else v / turn for v in closed.speed]
    return replace(closed, speed=speed)


def moments(ready: Ready, closed: Closed, acting: Sequence[Acting], *, unit: bool = False) -> list[Value]:
    """[N m] what each does to the beam in a pose.

    unit  [m] the same for a strength of 1 N
    """
    n = ready.chain.columns
    return [dot(closed.speed, column([a], closed.at, n, unit=unit)) for a in acting]


def given_moment(ready: Ready, closed: Closed) -> Value:
    """[N m] what links, pins and contacts that give do to the beam."""
    if not ready.chain.gives:
        return 0.0
    out: list[Value] = [0.0] * ready.chain.columns
    add_pushes(out, 1.0, ready.chain.given(closed.at)[1])
    return dot(closed.speed, out)


def tilting(ready: Ready, closed: Closed, pushing: Pushing, beam: int, loads: Sequence[Acting]) -> Tilting | None:
    """Stiffness of the balanced beam. None: the free freedoms cannot be told apart there.

    pushing  everything that acts, in balance
    loads    pushers whose tilt is asked
    """
    loose = Loose(ready.chain.moving, ready.chain.joints, None, ready.chain.size)
    # joints that hold more than needed leave no coordinate that would tell the tilt
    places = loose.places(closed.at) if loose.count > 0 else None
    if places is None:
        return None
    work = Work(loose, places, replace(pushing, effort=()), None)
    p = np.stack(np.broadcast_arrays(*(place.value(closed.at) for place in places)), -1)
    try:
        state = work.state(closed.at, p, 0.0)
    except NoPlan:
        return None
    tangent = tangent_of(work, state)
    shape = work.shape(state.closed.at)
    matrix = -np.moveaxis(tangent.free, (0, 1), (-2, -1))
    turns = np.stack([np.broadcast_to(rate[3 * (beam - 1) + TURN], shape) for rate in state.rates], -1)
    # a moment of 1 at the beam, and each load, pushes along every free freedom
    pushes = [turns] + [
        np.stack([np.broadcast_to(dot(rate, column([a], state.closed.at, loose.bare.columns, unit=True)), shape)
                  for rate in state.rates], -1)
        for a in loads
    ]  # fmt: skip
    with np.errstate(all="ignore"):
        turned = [np.einsum("...i,...i->...", turns, small(matrix, push)) for push in pushes]
        stiffness = 1.0 / turned[0]
    return Tilting(stiffness, tangent.steady(), turned[1:])


def tilted(ready: Ready, closed: Closed, pushing: Pushing, beam: int) -> Array:
    """[rad] (case, variant, pose) where a beam comes to rest near the drawn pose; NaN where it does not."""
    loose = Loose(ready.chain.moving, ready.chain.joints, None, ready.chain.size)
    places = loose.places(closed.at)
    assert places is not None
    found = settle(loose, places, closed.at, None, replace(pushing, effort=()), 0.0).closed
    turn = np.arctan2(found.at.s[beam], found.at.c[beam])
    sound = found.fine & (np.ones(found.fine.shape) if found.steady is None else found.steady >= 0).astype(bool)
    return np.where(sound, turn, np.nan)


def holding(ready: Ready, closed: Closed, pushing: Pushing) -> Array:
    """[N m] (case, variant, pose) the moment that would hold or move the beam, with friction in the case's sense."""
    found = balance(ready.chain, closed, replace(pushing, effort=ready.pushing.effort, forward=1.0), checked=False)
    return np.asarray(np.broadcast_to(found.effort, found.status.shape), float)
