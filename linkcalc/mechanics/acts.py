"""What acts on one member, place by place, in a batch of poses: joints, loads, weights, spread loads."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.pushing import sized_pushers
from linkcalc.mechanics.reactions import Side
from linkcalc.mechanics.solved import Solved
from linkcalc.parts.contract import Spread
from linkcalc.parts.pose import Poses, Value


@dataclass(frozen=True, eq=False)
class Act:
    """A force or couple on a member, in the member's own axes; batch (case, variant, pose).

    name    of the joint or load
    tone    "joint", or the word of the load
    u, v    [m] where
    fu, fv  [N]
    moment  [N m] about that place
    pinned  True for a force at a point of the member, without a couple but for friction of a pin
    spread  how it is spread along the member, None for one at its place
    """

    name: str
    tone: str
    u: Value
    v: Value
    fu: Value
    fv: Value
    moment: Value
    pinned: bool = False
    spread: Spread | None = None


def _strengths(solved: Solved) -> tuple[Value, Value, list[Value]]:
    return solved.balance.effort, solved.balance.load, solved.balance.seals


def acts(ready: Ready, solved: Solved, sides: Sequence[Side]) -> dict[int, list[Act]]:
    """Index of a moving member -> everything that acts on it (on one plate of it): joints, loads, weights."""
    at, pins, plates = solved.closed.at, ready.drawing.pins, ready.plates
    out: dict[int, list[Act]] = {k: [] for k in range(1, len(ready.drawing.members))}
    for side in sides:
        if side.member > 0:
            x, y = side.x - at.x[side.member], side.y - at.y[side.member]
            moment = 0.0 if side.own_point and isinstance(side.moment, float) else side.moment
            one = _own(at, side.member, side.joint, "joint", x, y, side.fx, side.fy, moment, side.own_point)
            out[side.member].append(one)
    for acting, whole in sized_pushers(ready.pushing, at, *_strengths(solved)):
        pusher: Any = acting.pusher
        if hasattr(pusher, "through"):
            continue  # the joint has told it
        moves = hasattr(pusher, "arms")
        arms = pusher.arms(at) if moves else [at.arm(site) for site in pusher.sites]
        spreads = getattr(pusher, "spread", None) or (None,) * len(arms)
        for push, (a, b), pin, spread in zip(pusher.push(at), arms, pusher.on_pins, spreads, strict=True):
            member, fx, fy, turning = push
            if member == 0 or pin in pins:
                continue
            # a couple has no arm; what a force leaves of its moment about its own place is rounding
            force, size = pusher.kind == "force", whole / plates[member]
            moment, pinned = (0.0 if force else turning * size), force and not moves
            one = _own(at, member, pusher.name, pusher.word, a, b, fx * size, fy * size, moment, pinned, spread)
            out[member].append(one)
    return out


def _own(
    at: Poses, member: int, name: str, tone: str, x: Value, y: Value, fx: Value, fy: Value, moment: Value,
    pinned: bool, spread: Spread | None = None,
) -> Act:  # fmt: skip
    """From ground axes to the member's own."""
    c, s = at.c[member], at.s[member]
    return Act(name, tone, c * x + s * y, c * y - s * x, c * fx + s * fy, c * fy - s * fx, moment, pinned, spread)


def ends(member: str, found: Sequence[Act], near: float) -> tuple[tuple[float, float], tuple[float, float]] | None:
    """The two places (own frame) [m] that a member is loaded at without a couple, but for its own weight and for the
    friction of its pins; None if there are other than two. near: places closer together are one [m]."""
    spots: list[tuple[float, float]] = []
    for act in found:
        if act.name == f"weight of {member}":
            continue
        if not act.pinned or act.spread is not None:
            return None
        u, v = (float(np.ravel(w)[0]) for w in (act.u, act.v))
        if all(np.hypot(u - x, v - y) > near for x, y in spots):
            spots.append((u, v))
    return (spots[0], spots[1]) if len(spots) == 2 else None
