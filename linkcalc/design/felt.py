"""What the members of a joint feel in one exact pose: sizes and directions, in ground axes and in the member's own."""

from __future__ import annotations

import math

import numpy as np

from linkcalc.design.answer import Felt
from linkcalc.design.curves import Curves
from linkcalc.design.passages import beside
from linkcalc.design.survey import Shown
from linkcalc.parts.pose import Array, Value

NOTHING = 1e-9
"""Part of the largest force below which a direction is that of rounding, and there is none."""


def felt(curves: Curves, joint: str, case: int, drive: float) -> tuple[Felt, ...]:
    """What each member feels at a joint at a value of the drive [rad or m], in the order of the joint's sides."""
    shown, pose = curves.seen(drive)
    return _felt(curves, joint, case, shown, pose)


def felt_beside(curves: Curves, joint: str, case: int, drive: float) -> tuple[Felt, ...]:
    """The same where the forces have no bound: the directions they run off in, read close beside that pose."""
    places = beside(curves, [drive]).tolist() if curves.drive.size > 1 else [drive]
    near = [felt(curves, joint, case, place) for place in places]
    known = [f for f in near if all(np.isfinite(one.force) for one in f)]
    return max(known or near, key=lambda f: max(one.force for one in f))


def _felt(curves: Curves, joint: str, case: int, shown: Shown, pose: int) -> tuple[Felt, ...]:
    survey = curves.survey
    at, drawing = shown.solved.closed.at, survey.ready.drawing
    nothing = NOTHING * curves.largest_force
    told = []
    for side in shown.sides:
        if side.joint != joint:
            continue
        fx, fy = one_of(side.fx, case, pose), one_of(side.fy, case, pose)
        size = math.hypot(fx, fy)
        points = math.atan2(fy, fx) if size > nothing else math.nan
        own = math.nan
        if side.member >= 0:
            turn = math.atan2(one_of(at.s[side.member], case, pose), one_of(at.c[side.member], case, pose))
            own = points - turn - one_of(drawing.own_axis(drawing.members[side.member]), 0, 0)
        told.append(Felt(survey.side_name(side), size, _wound(points), _wound(own)))
    return tuple(told)


def one_of(value: Value, case: int, pose: int) -> float:
    """One entry of a value over (case, 1, pose), whichever of these axes it has."""
    if np.ndim(value) == 0:
        return float(value)
    array = np.asarray(value)
    return float(array[min(case, array.shape[0] - 1), 0, min(pose, array.shape[2] - 1)])


def within_half_a_turn(angle: Array) -> Array:
    """[rad] straight back is plus half a turn, whichever side of it rounding fell."""
    wound = np.arctan2(np.sin(angle), np.cos(angle))
    return np.where(wound < -np.pi + NOTHING, np.pi, wound)


def _wound(angle: float) -> float:
    """The same of one angle, without an array for it."""
    wound = math.atan2(math.sin(angle), math.cos(angle))
    return math.pi if wound < -math.pi + NOTHING else wound
