"""What the loads of a model tell of themselves, and their limits, in every case and pose of a solved batch."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.pushing import Acting, Column, Pushing, add_pushes, strength
from linkcalc.mechanics.solved import Solved
from linkcalc.mechanics.sums import dot
from linkcalc.model.told import limits_of, told_by
from linkcalc.parts.contract import Joint, Limit
from linkcalc.parts.pose import Poses, Value

Of = Callable[[Poses, Value, Value], Value]


@dataclass(frozen=True, eq=False)
class Spoken:
    """Something that a load tells, put together from all loads of its name: each case may have its own.

    load, quantity  "return", "length"
    kind            kind of its size
    parts           the loads of that name, each with what it goes by
    """

    load: str
    quantity: str
    kind: str
    parts: Sequence[tuple[Acting, Of]]

    @property
    def name(self) -> str:
        return f"{self.quantity} of {self.load}"

    def of(self, solved: Solved, pushing: Pushing) -> Value:
        """Its value in every case and pose; NaN in a case that is without it."""
        at = solved.closed.at
        total: Value = np.nan
        with np.errstate(all="ignore"):
            for acting, told in self.parts:
                value = told(at, _strength(acting, solved, pushing), _motion(acting, solved, pushing))
                here = np.not_equal(acting.factor, 0.0)
                total = np.where(here, value, total)
        return total


@dataclass(frozen=True, eq=False)
class Watched:
    """A limit of a load: its room, below nothing where it is passed, as ``name`` among the quantities."""

    load: str
    text: str
    name: str
    room: Spoken | Fitting


@dataclass(frozen=True, eq=False)
class Fitting:
    """The room of a joint's own limit: that of a rope on its pulley."""

    limit: Limit

    def of(self, solved: Solved, pushing: Pushing) -> Value:  # noqa: ARG002
        with np.errstate(all="ignore"):
            return self.limit.room(solved.closed.at, 0.0)


def spoken(pushing: Pushing) -> list[Spoken]:
    """Everything that loads tell, in the order of the file."""
    found: dict[tuple[str, str], tuple[str, list[tuple[Acting, Of]]]] = {}
    for acting in pushing.all:
        for told in told_by(acting.pusher):
            _, parts = found.setdefault((acting.pusher.name, told.name), (told.kind, []))
            parts.append((acting, told.value))
    return [Spoken(load, quantity, kind, parts) for (load, quantity), (kind, parts) in found.items()]


def watched(pushing: Pushing, joints: Sequence[Joint]) -> list[Watched]:
    """Every limit of every load, and of every joint."""
    out: list[Watched] = []
    for acting in pushing.all:
        for limit in limits_of(acting.pusher):
            out.append(_watched(acting, limit, len(out)))
    for joint in joints:
        for limit in limits_of(joint):
            out.append(Watched(joint.name, limit.text, f"room {len(out)} of {joint.name}", Fitting(limit)))
    return out


def _watched(acting: Acting, limit: Limit, number: int) -> Watched:
    load = acting.pusher.name
    room = Spoken(load, f"room {number}", "number", [(acting, lambda at, strength, _: limit.room(at, strength))])
    return Watched(load, limit.text, room.name, room)


def _motion(acting: Acting, solved: Solved, pushing: Pushing) -> Value:
    """Which way it moves along its push: +1, -1, or 0.0 where it stands."""
    speed, columns = solved.closed.speed, len(solved.closed.speed)
    if not speed or not hasattr(acting.pusher, "told"):
        return 0.0
    push: Column = [0.0] * columns
    add_pushes(push, 1.0, acting.pusher.push(solved.closed.at))
    # without a stroke the drive counts the way that the effort pushes
    forward = pushing.forward or np.sign(solved.balance.effort_speed)
    return np.sign(pushing.sense * forward * dot(speed, push))


def _strength(acting: Acting, solved: Solved, pushing: Pushing) -> Value:
    """How strong it is: what was found, if that was asked for."""
    if acting in pushing.effort:
        return solved.balance.effort
    if acting in pushing.load:
        return solved.balance.load
    return strength([acting], solved.closed.at)
