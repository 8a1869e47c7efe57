"""From multipliers to forces: what each joint does to each member, three members on a pin included.

Every side of a joint is told as force and moment about the joint's place, on the member that feels it. For a pin of
several members the hub's force follows from the balance of the pin itself, which may carry loads of its own.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from linkcalc.mechanics.balance import Balance
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.pushing import Acting, Pushing, sized_pushers
from linkcalc.parts.contract import TURN, Joint, Push, X, Y
from linkcalc.parts.pose import Poses, Value


@dataclass(frozen=True, eq=False)
class Side:
    """One member's side of a joint.

    joint, word  name and kind of the joint
    member       index of the member that feels it; -1 if the pin itself does
    pin          name of that pin, "" otherwise
    fx, fy       [N] force on it, ground axes
    moment       [N m] moment on it, about the joint's place
    x, y         [m] that place
    own_point    True if the place is a fixed point of the member, and no moment can act there
    part_of      name of the joint that this is one of several sides of, each with its own name ("hoist" of a side
                 "hoist at P"); "" otherwise
    carried      [N] of such a joint what it carries: the tension of a rope, from part to part, or one throughout
    copies       how many equal plates the member stands for; the force is that on one of them
    """

    joint: str
    word: str
    member: int
    pin: str
    fx: Value
    fy: Value
    moment: Value
    x: Value
    y: Value
    own_point: bool
    part_of: str = ""
    carried: tuple[Value, ...] = ()
    copies: int = 1


def reactions(chain: Chain, at: Poses, told: Balance, pushing: Pushing) -> list[Side]:
    """All sides of all joints, in the order of the joints."""
    multipliers = told.multipliers
    rubbed = _rubbed(chain, at, told.friction)
    parts = {number: part for (number, _), part in zip(chain.drags, told.parts, strict=False)}
    sides: list[Side] = []
    on_pin: dict[str, list[tuple[Value, Value]]] = {}
    hubs: dict[str, tuple[int, Joint]] = {}
    pins = {joint.name for joint in chain.joints if joint.word == "pin"}
    turning: dict[str, Value] = {}
    pushers = list(sized_pushers(pushing, at, told.effort, told.load, told.seals))
    for number, (joint, first) in enumerate(zip(chain.joints, chain.first_row, strict=True)):
        if hasattr(joint, "contacts"):
            if joint.angular:
                carried = multipliers[first]
            else:  # what fails is not a number throughout
                carried = np.where(np.isfinite(multipliers[0]), _passed_on(joint.name, pushers), np.nan)
            for side, passed in _spread(joint, at, carried, parts.get(number, ()), pins):
                if side.pin:
                    on_pin.setdefault(side.pin, []).append((side.fx, side.fy))
                    turning[side.pin] = _sum(turning.get(side.pin, 0.0), passed)
                sides.append(side)
            continue
        placed = getattr(joint, "place", None)
        x, y = placed(at) if placed else at.spot(joint.site)
        pushes = rubbed.get(number, [])
        forces = _on_members(joint, at, multipliers[first : first + len(joint.angular)], pushes)
        hub = joint.word == "pin"
        for member in dict.fromkeys(joint.members):
            fx, fy, about_origin = forces.get(member, (0.0, 0.0, 0.0))
            # where all that meet are welded together there is no pin: the member that stands for it takes the force
            pin = joint.on_pin if member == joint.members[0] and joint.on_pin in pins else ""
            if pin:
                on_pin.setdefault(pin, []).append((fx, fy))
                sides.append(Side(joint.name, joint.word, -1, pin, fx, fy, 0.0, x, y, False))
            elif hub and member == joint.members[1]:
                hubs.setdefault(joint.name, (member, joint))
                on_pin.setdefault(joint.name, []).append((fx, fy))
                if pushes:
                    turning[joint.name] = _sum(turning.get(joint.name, 0.0), pushes[-1][3])
            else:
                turnable = not any(joint.angular)
                moment: Value = pushes[0][3] if hub and pushes else 0.0
                if not turnable:
                    moment = about_origin - ((x - at.x[member]) * fy - (y - at.y[member]) * fx)
                own = turnable and not placed and (hub or member == joint.members[0])
                sides.append(Side(joint.name, joint.word, member, "", fx, fy, moment, x, y, own))
    for acting, size in pushers:
        if hasattr(acting.pusher, "through"):
            continue  # the joint has told it
        for name, (_, fx, fy, _) in zip(acting.pusher.on_pins, acting.pusher.push(at), strict=False):
            if name:
                on_pin.setdefault(name, []).append((size * fx, size * fy))
    for name, (member, joint) in hubs.items():
        x, y = at.spot(joint.site)
        fx, fy = 0.0, 0.0
        for gx, gy in on_pin[name]:
            fx, fy = _sum(fx, gx), _sum(fy, gy)
        last = max(k for k, s in enumerate(sides) if s.joint == name)
        moment = turning.get(name, 0.0)
        sides.insert(last + 1, Side(name, joint.word, member, "", fx, fy, moment, x, y, True))
    return sides


def on_one(sides: Sequence[Side], copies: Sequence[int]) -> list[Side]:
    """Sides as one plate of each member feels them; copies: how many each stands for, the ground first."""
    return [
        side
        if side.member < 0 or copies[side.member] == 1
        else replace(
            side,
            fx=side.fx / copies[side.member],
            fy=side.fy / copies[side.member],
            moment=side.moment / copies[side.member],
            copies=copies[side.member],
        )
        for side in sides
    ]


def _rubbed(chain: Chain, at: Poses, friction: Sequence[Value]) -> dict[int, list[Push]]:
    """Number of a joint -> what its friction does to its members."""
    out: dict[int, list[Push]] = {}
    if friction:
        for (number, rub), size in zip(chain.rubs, friction, strict=True):
            for member, *parts in rub.push(at):
                fx, fy, moment = (_times(p, size) if not isinstance(p, float) or p else 0.0 for p in parts)
                out.setdefault(number, []).append((member, fx, fy, moment))
    return out


def _passed_on(joint: str, strong: Sequence[tuple[Acting, Value]]) -> Value:
    """[N] what all that push through a joint give it together: at the hauling end of a rope its tension."""
    total: Value = 0.0
    for acting, size in strong:
        if getattr(acting.pusher, "through", "") == joint:
            total = total + size
    return total


def _spread(
    joint: Any, at: Poses, carried: Value, parts: Sequence[Value], pins: set[str]
) -> Iterator[tuple[Side, Value]]:
    """The sides of a joint that acts at several places, each told by itself; and the moment that a pin passes on to the
    member that stands for it."""
    pulls = tuple(_times(part, carried) for part in parts) or (carried,)
    for c in joint.contacts(at, parts):
        x, y = at.spot(c.site)
        fx, fy = carried * c.fx, carried * c.fy
        turned = not (isinstance(c.moment, float) and c.moment == 0.0)
        moment = carried * c.moment if turned else 0.0
        pin = c.on_pin if c.on_pin in pins else ""
        member = -1 if pin else c.site.member
        yield Side(c.name, joint.word, member, pin, fx, fy, 0.0 if pin else moment, x, y,
                   not (pin or turned), joint.name, pulls), moment  # fmt: skip


def _on_members(
    joint: Joint, at: Poses, multipliers: Sequence[Value], pushes: Sequence[Push]
) -> dict[int, tuple[Value, Value, Value]]:
    """Force and moment about its origin, on each member; the moment only where the joint can give one."""
    moments = any(joint.angular)
    out: dict[int, list[Value]] = {}
    for row, m in zip(joint.slope(at), multipliers, strict=True):
        for member, which, value in row:
            if which == TURN and not moments:
                continue
            total = out.setdefault(member, [0.0, 0.0, 0.0])
            total[which] = _sum(total[which], _times(value, m))
    for member, *parts in pushes:
        total = out.setdefault(member, [0.0, 0.0, 0.0])
        for which, part in enumerate(parts):
            total[which] = _sum(total[which], part)
    return {member: (v[X], v[Y], v[TURN]) for member, v in out.items()}


def _times(value: Value, m: Value) -> Value:
    if isinstance(value, float) and abs(value) == 1.0:
        return m if value > 0 else -m
    return value * m


def _sum(a: Value, b: Value) -> Value:
    return b if isinstance(a, float) and a == 0.0 else a + b
