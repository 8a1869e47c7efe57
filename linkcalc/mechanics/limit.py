"""Find the limit of motion of a drive exactly: where its coordinate turns back.

Near such a pose the drive no longer tells where the mechanism is, so another coordinate, the one that moves
fastest, is stepped instead; the drive's speed against it passes through zero at the limit.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.motion import Closed, along, close, single, wound
from linkcalc.mechanics.plan import NoPlan
from linkcalc.parts.contract import TURN, Drive, Row
from linkcalc.parts.pose import Poses, Value

_FIRST = 1e-3
_STEPS = 200


@dataclass(frozen=True, eq=False)
class Place:
    """One coordinate (x, y or turn) of one member, as something to step or to hold."""

    member: int
    which: int

    @property
    def kind(self) -> str:
        return "angle" if self.which == TURN else "length"

    def value(self, at: Poses) -> Value:
        if self.which == TURN:
            turn: Value = np.arctan2(at.s[self.member], at.c[self.member])
            return turn
        return (at.x, at.y)[self.which][self.member]

    def hold(self, target: Value) -> HeldPlace:
        return HeldPlace(self, target)


@dataclass(frozen=True, eq=False)
class HeldPlace:
    """Gap: the coordinate less its target."""

    place: Place
    target: Value

    @property
    def angular(self) -> bool:
        return self.place.which == TURN

    def gap(self, at: Poses) -> Value:
        value = self.place.value(at)
        return np.sin(value - self.target) if self.angular else value - self.target

    def slope(self, at: Poses) -> Row:  # noqa: ARG002
        return ((self.place.member, self.place.which, 1.0),)


def limit_beyond(chain: Chain, drive: float, near: Closed, sense: int) -> float:
    """Value of the drive at the limit that lies a little beyond a pose; nan if there is none.

    sense  +1 or -1: which way the drive was going
    """
    speed = single(near.speed) * chain.column_size
    fast = int(np.argmax(np.abs(speed)))
    place = Place(fast // 3 + 1, fast % 3)
    other = chain.driven_by(place)
    try:
        p, pose = float(np.asarray(place.value(near.at)).flat[0]), near
        pose = close(other, near.at, _held(place, p))
        rate = _drive_rate(chain, drive, pose)
        way = sense * np.sign(rate)
        step = way * _FIRST * (1.0 if place.kind == "angle" else chain.size)
        for _ in range(_STEPS):
            there = close(other, along(pose, step), _held(place, p + step), steps=6)
            if not there.fine.all():
                step /= 4
                if abs(step) < 1e-12:
                    return float("nan")
                continue
            beyond = _drive_rate(chain, drive, there)
            if beyond * rate <= 0:
                return _turning_point(chain, other, place, drive, (p, pose, rate), (p + step, there, beyond))
            p, pose, rate, step = p + step, there, beyond, step * 1.3
    except NoPlan:
        pass
    return float("nan")


def _held(place: Place, target: float) -> Drive:
    return place.hold(target)


def _drive_rate(chain: Chain, drive: float, pose: Closed) -> float:
    """Speed of the drive's coordinate, for a speed of 1 of the coordinate that is stepped."""
    assert chain.coordinate is not None
    held = chain.coordinate.hold(drive)
    total: Value = 0.0
    for member, which, value in held.slope(pose.at):
        if member:
            total = total + value * pose.speed[3 * (member - 1) + which]
    return float(np.asarray(total).flat[0])


def _turning_point(
    chain: Chain,
    other: Chain,
    place: Place,
    drive: float,
    low: tuple[float, Closed, float],
    high: tuple[float, Closed, float],
) -> float:
    """The zero of the drive's rate between two poses, by false position with the stale end's rate halved."""
    assert chain.coordinate is not None
    (pa, pose, ra), (pb, _, rb) = low, high
    stale = 0
    for _ in range(100):
        p = pb - rb * (pb - pa) / (rb - ra)
        pose = close(other, along(pose, p - float(np.asarray(place.value(pose.at)).flat[0])), _held(place, p))
        rate = _drive_rate(chain, drive, pose)
        if rate * rb < 0:
            pa, ra, stale = pb, rb, 0
        else:
            stale += 1
            if stale > 1:
                ra /= 2
        pb, rb = p, rate
        if abs(rate) < 1e-13 or abs(pb - pa) < 1e-14:
            break
    value = float(np.asarray(chain.coordinate.value(pose.at)).flat[0])
    if chain.coordinate.kind == "angle":
        value = float(wound(value, drive))
    return value
