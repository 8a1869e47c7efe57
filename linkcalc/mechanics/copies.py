"""Many copies of one mechanism, each with its own sizes, walked through the stroke together.

The steps are those of the nominal mechanism's walk; a copy that leaves its branch or cannot come along is told by its
status and does not hold up the others.
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

import numpy as np

from linkcalc.mechanics.balance import balance, failed
from linkcalc.mechanics.loose_copies import each_loose_pose
from linkcalc.mechanics.loose_path import LoosePath
from linkcalc.mechanics.motion import Closed, along, between, close, rolled, turn_from, wound
from linkcalc.mechanics.path import Path
from linkcalc.mechanics.pipeline import solve_standing
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.solved import Solved, joined
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array, Mask, Value

_SAME = 1e-9  # of the way between two poses
_TOOTH = 0.15  # [rad] half the least tooth; the steps of the walk keep below


def solve_copies(ready: Ready, path: Path, drive: Array) -> Solved:
    """All copies at some values of the drive (values), in the order of the stroke; arrays (case, variant, pose)."""
    return joined(list(each_pose(ready, path, drive, checked=True)))


def each_pose(ready: Ready, path: Path, drive: Array, *, checked: bool) -> Iterator[Solved]:
    """The same, one pose after the other, (case, variant, 1) each: for streaming, nothing is kept.

    checked  put the forces back into the equations (see ``balance``)
    """
    if isinstance(path, LoosePath):
        yield from each_loose_pose(ready, path, drive, checked=checked)
        return
    if ready.standing is not None:
        yield from (solve_standing(ready, np.array([value]), checked=checked) for value in drive)
        return
    coordinate = ready.chain.coordinate
    assert coordinate is not None
    here, before, span = ready.start, ready.start, 0.0
    drawn = np.asarray(coordinate.value(here.at), float)
    if coordinate.kind == "angle":
        drawn = np.asarray(wound(drawn, path.drawn))
    branch = here.factored.negative
    live: Mask = here.fine
    lost: Mask = np.zeros_like(live)
    last: Value = drawn
    for target, wanted in _targets(path, drawn, drive, toothed=ready.chain.toothed):
        step = target - last
        even = isinstance(step, float) and span
        if ready.chain.toothed:
            # gears keep their ratio: even speeds are nearly where they are
            guess = rolled(here.at, [step * v for v in here.speed])
        else:
            guess = between(before, here, 1 + step / span, span) if even else along(here, step)
        all_live = bool(live.all())
        there = close(ready.chain, guess, coordinate.hold(target), sure=1, live=None if all_live else live)
        if not there.fine.all():
            live = live & there.fine
        kept = _kept(path, there, branch, live)
        if ready.chain.toothed:
            kept = kept & ~_slipped(here, there, step)
        if not kept.all():
            lost, live = lost | (live & ~kept), live & kept
        span = step if isinstance(step, float) else 0.0
        before, here, last = here, there, target
        if wanted:
            solved = balance(ready.chain, there, ready.pushing, checked=checked)
            if not live.all():
                solved = failed(solved, ~live, Status.NO_FIT if ready.chain.sharing else Status.OUT_OF_REACH)
                solved = failed(solved, lost, Status.BRANCH_LOST)
            if ready.undrawn is not None:
                solved = failed(solved, ready.undrawn, Status.NOT_DRAWN)
            yield Solved(np.full(there.fine.shape, target), there, solved)


def _targets(path: Path, drawn: Array, drive: Array, *, toothed: bool) -> Iterator[tuple[Value, bool]]:
    """Values of the drive to go to, and whether the answer wants them. On the way to the first each copy starts
    from its own drawing pose; then all go together, with nodes of the walk between poses that lie far apart: every one
    of them where a step too far would come out a tooth or a turn off."""
    whole = drive[0] - path.drawn
    for node in path.approach[1:-1]:
        yield drawn + (drive[0] - drawn) * ((node.drive - path.drawn) / whole), False
    yield np.full(drawn.shape, drive[0]), True
    nodes = np.array([n.drive for n in path.nodes])
    for a, b in pairwise(drive):
        # a node that is a pose but for rounding would make a step too short to foretell the next one by
        inside = nodes[(nodes - a) * (nodes - b) < -_SAME * (b - a) ** 2]
        if inside.size > (0 if toothed else 1):
            yield from ((float(n), False) for n in (inside if b > a else np.sort(inside)[::-1]))
        yield float(b), True


def _kept(path: Path, there: Closed, branch: Mask, live: Mask) -> Mask:
    """Copies that are still assembled as they were drawn."""
    if path.passed:
        return live
    same: Mask = there.factored.negative == branch
    return same


def _slipped(a: Closed, b: Closed, step: Value) -> Mask:
    """(1, variant, 1) copies in which some member has not turned as the mean of its speeds says: a tooth was lost."""
    slipped: Mask = np.zeros((1, 1, 1), bool)
    for k in range(1, len(a.at.x)):
        off = turn_from(a.at, b.at, k) - step * (a.speed[3 * k - 1] + b.speed[3 * k - 1]) / 2
        slipped = slipped | (np.abs((off + np.pi) % (2 * np.pi) - np.pi) > _TOOTH)
    return slipped
