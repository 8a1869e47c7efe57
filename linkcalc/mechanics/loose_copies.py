"""Many copies of a mechanism with free members, each with its own sizes, walked through the stroke together."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

import numpy as np

from linkcalc.mechanics.balance import failed
from linkcalc.mechanics.loose_path import LoosePath, settled_balance
from linkcalc.mechanics.motion import Closed, along, cubic, placed_between, turned_between, wound
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.settle import Settled, settle, settle_well
from linkcalc.mechanics.solved import Solved
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array, Poses, Value


def each_loose_pose(ready: Ready, path: LoosePath, drive: Array, *, checked: bool) -> Iterator[Solved]:
    """All copies at one value of the drive after the other, (case, variant, 1) each; nothing is kept.

    The steps are those of the nominal mechanism's walk. A copy that finds no balance is told by its status.
    """
    loose, coordinate = ready.loose, ready.chain.coordinate
    assert loose is not None and coordinate is not None
    places = loose.places(ready.start.at)
    assert places is not None
    drawn = np.asarray(coordinate.value(ready.start.at), float)[:1]
    if coordinate.kind == "angle":
        drawn = np.asarray(wound(drawn, path.drawn))
    here: Settled = settle(loose, places, ready.start.at, drawn, ready.pushing, ready.unknown)
    last: Value = drawn
    before, span = here, 0.0
    for target, wanted in _targets(path, drawn, drive):
        step = target - last
        even = float(np.ptp(step)) == 0.0 and 2 * abs(span) >= abs(float(step.flat[0])) > 0.0
        guess = (
            onward(before.closed, here.closed, 1 + float(step.flat[0]) / span, span)
            if even
            else along(here.closed, step)
        )
        settled, places = settle_well(
            loose, places, guess, target, ready.pushing, here.unknown, along=here.closed.speed, matrix=here.matrix
        )
        span = float(step.flat[0]) if float(np.ptp(step)) == 0.0 else 0.0
        before, here, last = here, settled, target
        if wanted:
            told = settled_balance(ready, places, settled.closed, checked=checked)
            if ready.undrawn is not None:
                told = failed(told, ready.undrawn, Status.NOT_DRAWN)
            yield Solved(np.broadcast_to(target, (1, *settled.closed.fine.shape[1:])), settled.closed, told)


def onward(a: Closed, b: Closed, t: float, span: float) -> Poses:
    """Poses on the cubic through two settled poses and their speeds, beyond the second: places as well as turns."""
    weights = cubic(t, span)
    pa, pb = a.at, b.at
    x, y, c, s = [pa.x[0]], [pa.y[0]], [pa.c[0]], [pa.s[0]]
    for k in range(1, len(pa.x)):
        (ua, va, wa), (ub, vb, wb) = a.speed[3 * k - 3 : 3 * k], b.speed[3 * k - 3 : 3 * k]
        x.append(placed_between(weights, (pa.x[k], ua), (pb.x[k], ub)))
        y.append(placed_between(weights, (pa.y[k], va), (pb.y[k], vb)))
        turned = turned_between(weights, (pa.c[k], pa.s[k], wa), (pb.c[k], pb.s[k], wb))
        c.append(turned[0])
        s.append(turned[1])
    return Poses(x, y, c, s, pa.down, pa.field)


def _targets(path: LoosePath, drawn: Array, drive: Array) -> Iterator[tuple[Array, bool]]:
    """Values of the drive to go to, each copy from its own drawing pose, and whether the answer wants them."""
    nodes = np.array([n.drive for n in path.settled])
    whole = float(drive[0]) - path.drawn
    if abs(whole) > 0:
        for node in _between(nodes, path.drawn, float(drive[0])):
            yield drawn + (drive[0] - drawn) * ((node - path.drawn) / whole), False
    yield np.full(drawn.shape, drive[0]), True
    for a, b in pairwise(drive.tolist()):
        inside = _between(nodes, a, b)
        if len(inside) > 1:
            yield from ((np.full(drawn.shape, n), False) for n in inside)
        yield np.full(drawn.shape, b), True


def _between(nodes: Array, a: float, b: float) -> list[float]:
    inside = np.sort(nodes[(nodes - a) * (nodes - b) < 0])
    found: list[float] = (inside if b > a else inside[::-1]).tolist()
    return found
