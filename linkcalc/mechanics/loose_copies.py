"""Many copies of a mechanism with free members, each with its own sizes, walked through the stroke together."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

import numpy as np

from linkcalc.mechanics.balance import failed
from linkcalc.mechanics.loose_path import LoosePath, settled_balance
from linkcalc.mechanics.motion import along
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.settle import Settled, settle
from linkcalc.mechanics.solved import Solved
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array, Value

_BAD = 30.0  # times the speed of the places: others would tell the pose better


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
        drawn = drawn + 2 * np.pi * np.round((path.drawn - drawn) / (2 * np.pi))
    here: Settled = settle(loose, places, ready.start.at, drawn, ready.pushing, ready.unknown)
    last: Value = drawn
    for target, wanted in _targets(path, drawn, drive):
        guess = along(here.closed, target - last)
        settled = settle(loose, places, guess, target, ready.pushing, here.unknown, along=here.closed.speed)
        if not settled.reach <= _BAD:
            better = loose.places(settled.closed.at)
            if better is not None and better != places:
                places = better
                settled = settle(loose, places, guess, target, ready.pushing, here.unknown, along=here.closed.speed)
        here, last = settled, target
        if wanted:
            told = settled_balance(ready, places, settled.closed, checked=checked)
            if ready.undrawn is not None:
                told = failed(told, ready.undrawn, Status.NOT_DRAWN)
            yield Solved(np.broadcast_to(target, (1, *settled.closed.fine.shape[1:])), settled.closed, told)


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
