"""Two-force members: loaded at two places only, so that the force runs along the line between them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.pushing import Pushing
from linkcalc.mechanics.reactions import Side
from linkcalc.parts.pose import Poses, Value


@dataclass(frozen=True)
class TwoForce:
    """A two-force member: its index, and which sides of the list hold it at its ends."""

    member: int
    first: int
    second: int


def two_force_members(sides: Sequence[Side], at: Poses, pushing: Pushing) -> tuple[TwoForce, ...]:
    """Members that feel two joints without a moment, at two of their own points, and nothing else."""
    pushed = {
        entry[0]
        for acting in pushing.all
        for entry, pin in zip(acting.pusher.push(at), acting.pusher.on_pins, strict=True)
        if not pin and not hasattr(acting.pusher, "through")
    }
    held: dict[int, list[int]] = {}
    for k, side in enumerate(sides):
        held.setdefault(side.member, []).append(k)
    return tuple(
        TwoForce(member, *ends)
        for member, ends in sorted(held.items())
        if member > 0 and member not in pushed and len(ends) == 2 and all(sides[k].own_point for k in ends)
    )


def axial(two: TwoForce, sides: Sequence[Side]) -> Value:
    """(case, variant, pose) [N] force along the line of the two places, tension plus."""
    a, b = sides[two.first], sides[two.second]
    dx, dy = b.x - a.x, b.y - a.y
    along: Value = (b.fx * dx + b.fy * dy) / np.hypot(dx, dy)
    return along
