"""Walk a mechanism with free members through its stroke: all load cases together, each along its own balance.

A step is taken if every case settles there, its balance is no worse than it was, and the two ends agree with their
speeds. Where no step is small enough a case's balance ends: it snaps through, to the balance that it falls into from
there, and goes on from that.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.loose import Loose, Places
from linkcalc.mechanics.motion import along, moved, turn_from
from linkcalc.mechanics.plan import NoPlan
from linkcalc.mechanics.pushing import Pushing
from linkcalc.mechanics.settle import Settled, come_to_rest, settle_well
from linkcalc.parts.pose import Array

_SMOOTH = 0.03  # how far a step may depart from the trapezoid rule, over its length
_TINY = 1e-3  # of the whole way: a step this small may go round a corner, where a contact is made or lost
_CORNER = 3e-3  # of the size or a radian: how far it may go then
_SMALLEST = 1e-12  # of the whole way
_FIRST = 1 / 12
_GROWTH = 1.6
_LARGEST = 1 / 12
_PUSH = 0.02  # of the size or a radian: how far a case is put beyond the end of its balance, to see where it falls
_BACK = 6  # nodes back: where the way it came is taken from
_STEPS = 2000


@dataclass(frozen=True, eq=False)
class LooseNode:
    """One settled pose of the walk, all cases: (case, variant, 1)."""

    drive: float
    settled: Settled
    places: Places


@dataclass(frozen=True)
class Jump:
    """Where the balance of a case ends and it snaps through to another.

    case    its number
    drive   [rad or m]
    member  index of the member that moves most
    turn    [rad] how far that turns;  way [m] how far its first point goes
    """

    case: int
    drive: float
    member: int
    turn: float
    way: float


@dataclass(frozen=True, eq=False)
class LooseWalk:
    """The nodes in the order walked; stopped "" if it came where it should, else "limit"."""

    nodes: tuple[LooseNode, ...]
    jumps: tuple[Jump, ...]
    stopped: str


def walk_loose(loose: Loose, pushing: Pushing, start: LooseNode, stop: float) -> LooseWalk:
    """From a settled pose to a value of the drive, or as far as all cases go."""
    with np.errstate(all="ignore"):  # what finds no balance is not a number on the way, and told by its status
        return _walked(loose, pushing, start, stop)


def _walked(loose: Loose, pushing: Pushing, start: LooseNode, stop: float) -> LooseWalk:
    nodes, jumps = [start], list[Jump]()
    whole = stop - start.drive
    step = whole * _FIRST
    for _ in range(_STEPS):
        here = nodes[-1]
        left = stop - here.drive
        if abs(left) <= abs(whole) * 1e-14:
            return LooseWalk(tuple(nodes), tuple(jumps), "")
        last = abs(step) >= abs(left) * (1 - 1e-9)
        drive = stop if last else here.drive + step
        there = _step(loose, pushing, here, drive, abs(whole))
        if there is not None:
            nodes.append(there)
            step = np.clip(_GROWTH * (there.drive - here.drive), -_LARGEST * abs(whole), _LARGEST * abs(whole))
            continue
        step = (left if last else step) / 4
        if abs(step) < _SMALLEST * abs(whole):
            drive = here.drive + np.sign(whole) * 4 * _SMALLEST * abs(whole)
            fallen = _fall(loose, pushing, nodes, float(drive))
            if fallen is None:
                return LooseWalk(tuple(nodes), tuple(jumps), "limit")
            there, found = fallen
            nodes.append(there)
            jumps += found
            step = whole * _TINY
    return LooseWalk(tuple(nodes), tuple(jumps), "limit")


def _step(loose: Loose, pushing: Pushing, here: LooseNode, drive: float, whole: float) -> LooseNode | None:
    """The next node; None if the step was too large."""
    step = drive - here.drive
    a = here.settled
    target = np.full((1, 1, 1), drive)
    try:
        b, places = settle_well(
            loose, here.places, along(a.closed, step), target, pushing, a.unknown,
            near=a.closed.at, along=a.closed.speed, steps=12,
        )  # fmt: skip
    except NoPlan:
        return None
    if not (b.closed.fine & (b.steady >= np.minimum(a.steady, 0))).all():
        return None
    apart, way = _departure(loose, a, b, step)
    corner = (abs(step) <= _TINY * whole) & (way <= _CORNER)
    return LooseNode(drive, b, places) if ((apart <= _SMOOTH) | corner).all() else None


def _departure(loose: Loose, a: Settled, b: Settled, step: float) -> tuple[Array, Array]:
    """How far the way from a to b is from the mean of their speeds times the step, over the longer of the two; and
    that way, in sizes of the mechanism or radians: both (case, variant, 1)."""
    scale = (loose.bare.column_size / loose.bare.size)[:, None, None, None]
    shape = b.closed.fine.shape
    ua, ub = (np.stack([np.broadcast_to(v, shape) for v in s.closed.speed]) * scale for s in (a, b))
    way = _way(a, b, shape) * scale
    apart = np.abs(way - step * (ua + ub) / 2).max(axis=0)
    longest = abs(step) * np.maximum(np.abs(ua).max(axis=0), np.abs(ub).max(axis=0))
    return apart / np.maximum(longest, 1e-12), np.abs(way).max(axis=0)


def _way(a: Settled, b: Settled, shape: tuple[int, ...]) -> Array:
    """(columns, case, variant, 1) coordinates of b less those of a."""
    pa, pb = a.closed.at, b.closed.at
    rows: list[Array] = []
    for m in range(1, len(pa.x)):
        turn = turn_from(pa, pb, m)
        rows += [np.broadcast_to(v, shape) for v in (pb.x[m] - pa.x[m], pb.y[m] - pa.y[m], turn)]
    return np.stack(rows)


def _fall(
    loose: Loose, pushing: Pushing, nodes: Sequence[LooseNode], drive: float
) -> tuple[LooseNode, list[Jump]] | None:  # fmt: skip
    """The balance that a case falls into where its own ends; None if there is none."""
    here = nodes[-1]
    a, before = here.settled, nodes[max(len(nodes) - _BACK, 0)].settled
    # the way it came, for its speed may have turned round already
    way = _way(before, a, a.closed.fine.shape)
    scale = (loose.bare.column_size / loose.bare.size)[:, None, None, None]
    top = np.maximum(np.abs(way * scale).max(axis=0), 1e-300)
    push = list(-_PUSH * way / top)
    target = np.full((1, 1, 1), drive)
    try:
        fallen = come_to_rest(loose, moved(a.closed.at, push), target, pushing, a.unknown)
    except NoPlan:
        return None
    if fallen is None:
        return None
    b, places = fallen
    if not (b.closed.fine & (b.steady >= np.minimum(a.steady, 0))).all():
        return None
    return LooseNode(drive, b, places), _jumps(loose, a, b, drive)


def _jumps(loose: Loose, a: Settled, b: Settled, drive: float) -> list[Jump]:
    way = _way(a, b, b.closed.fine.shape)[:, :, 0, 0].reshape(-1, 3, b.closed.fine.shape[0])
    size = loose.bare.size
    found = []
    for case in range(way.shape[2]):
        far = np.hypot(way[:, 0, case], way[:, 1, case]) / size + np.abs(way[:, 2, case])
        m = int(np.argmax(far))
        if far[m] > _CORNER:
            x, y, turn = (float(v) for v in way[m, :, case])
            found.append(Jump(case, drive, m + 1, turn, float(np.hypot(x, y))))
    return found
