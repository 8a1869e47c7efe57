"""Members joined to nothing, and points that are not where a joint wants them."""

from __future__ import annotations

from collections.abc import Iterator
from functools import singledispatch
from typing import Any

from linkcalc.model import walk
from linkcalc.model.gather import Gather, Item
from linkcalc.model.mechanism import GROUND, Mechanism
from linkcalc.parts.joints.contact import Contact
from linkcalc.parts.joints.gear import Gear
from linkcalc.parts.joints.rack import Rack
from linkcalc.parts.joints.rope import HAULING, Rope
from linkcalc.parts.joints.rope_steps import Pulley
from linkcalc.parts.joints.slide import Slide
from linkcalc.parts.joints.slot import Slot
from linkcalc.parts.joints.track import Track
from linkcalc.parts.joints.weld import Weld


class Carried:
    """Which member carries which point."""

    def __init__(self, mechanism: Mechanism):
        self.mechanism = mechanism

    def by(self, point: str) -> tuple[str, ...]:
        """Members that name the point."""
        return tuple(name for name, member in self.mechanism.members.items() if point in member.points)

    def text(self, point: str) -> str:
        """Who carries it, for a message."""
        return " and ".join(self.by(point)) or "no member"

    def elsewhere(self, point: str, member: str) -> bool:
        """True if others carry the point and this member does not; a point of nobody may be used by all."""
        carriers = self.by(point)
        return bool(carriers) and member not in carriers

    def check(self, points: tuple[str, ...], member: str, item: Item, gather: Gather) -> None:
        """Points that a member is said to have, but others carry."""
        for point in points:
            if self.elsewhere(point, member):
                gather.add(
                    item,
                    f"{point} is a point of {self.text(point)}, not of {member}",
                    f"take a point that {member} or no member carries",
                )


def check_members(mechanism: Mechanism, gather: Gather) -> None:
    """Members without points, without joints; no ground."""
    carried = Carried(mechanism)
    if GROUND not in mechanism.members:
        gather.add(("members",), "'ground' is missing", 'the points that do not move are wanted: ground = ["A", "B"]')
    if not mechanism.members.keys() - {GROUND}:
        gather.add(("members",), "there is no member but the ground", "at least one is wanted")
    joined = {name for joint in walk.joints(mechanism) for name in _joined(joint, carried)}
    for name, member in mechanism.members.items():
        item = ("members", name)
        twice = sorted({point for point in member.points if member.points.count(point) > 1}, key=member.points.index)
        if twice:
            gather.add((*item, "points"), f"{twice[0]} is named twice", "each point once; a closed body is for 'path'")
        carried.check(tuple(dict.fromkeys(member.path)), name, (*item, "path"), gather)
        if member.centre is not None:
            carried.check((member.centre,), name, (*item, "centre"), gather)
        if name == GROUND:
            if member.copies > 1:
                gather.add((*item, "copies"), "there is one ground only", "leave it out")
            continue
        if not member.points:
            gather.add(item, "it has no points", f'the points it carries are wanted: {name} = ["A", "B"]')
        elif name not in joined and all(len(carried.by(point)) < 2 for point in member.points):
            wanted = "a point that another member names too is wanted, or a slot, slide or weld"
            gather.add(item, "it is joined to nothing", wanted)


def check_joints(mechanism: Mechanism, gather: Gather) -> None:
    """Slots, slides and welds that join a member to itself or to a point it does not have; keys that lack another."""
    carried = Carried(mechanism)
    for item, joint in walk.joints(mechanism):
        _check(joint, item, carried, gather)
        for key, others in getattr(joint, "goes_with", ()):
            lacking = [other for other in others if getattr(joint, other) is None]
            if getattr(joint, key) is not None and lacking and not gather.touches(*item):
                names = " and ".join(map(repr, lacking))
                gather.add((*item, key), f"it goes with {names} only", f"give {names} too, or leave it out")


def _joined(joint: walk.Part, carried: Carried) -> Iterator[str]:
    """Members that a joint takes hold of: those it names, and those that carry the point it names."""
    for _, entry, value in joint.fields():
        names = value if isinstance(value, tuple) else (value,)
        if entry.metadata.get("of") == "member":
            yield from names
        elif entry.metadata["kind"] == "name":
            yield from carried.by(value)


@singledispatch
def _check(joint: Any, item: Item, carried: Carried, gather: Gather) -> None:
    """What a kind of joint asks of its members and points; one without an entry here asks nothing."""


@_check.register
def _slot(joint: Slot | Track | Contact, item: Item, carried: Carried, gather: Gather) -> None:
    carriers = carried.by(joint.point)
    if not carriers:
        gather.add((*item, "point"), f"no member carries {joint.point}", f"name {joint.point} in a member")
    elif joint.of is not None and joint.of not in carriers:
        wanted = f"one of {', '.join(carriers)}" if len(carriers) > 1 else f"{carriers[0]}, or left out"
        gather.add((*item, "of"), f"{joint.of} does not carry {joint.point}", f"{wanted} is wanted")
    elif joint.on in carriers and joint.of in (None, joint.on):
        gather.add((*item, "on"), f"{joint.point} is a point of {joint.on} itself", "another member is wanted")
    for key in ("along", "arc", "through"):
        line = getattr(joint, key, None)
        if isinstance(line, tuple):
            carried.check(line, joint.on, (*item, key), gather)


@_check.register
def _slide(joint: Slide, item: Item, carried: Carried, gather: Gather) -> None:
    if joint.member == joint.on:
        gather.add(item, f"{joint.on} cannot slide on itself", "another member is wanted for 'member' or 'on'")
    if joint.member == GROUND:
        gather.add((*item, "member"), "the ground does not slide", "name the ground in 'on'")
    if joint.at is not None:
        carried.check((joint.at,), joint.member, (*item, "at"), gather)


@_check.register
def _rope(joint: Rope, item: Item, carried: Carried, gather: Gather) -> None:
    if item[-1] in carried.mechanism.members:
        gather.add(item, f"{item[-1]!r} is a member already", "another name is wanted")
    last = len(joint.path)
    for k, step in enumerate(joint.path, 1):
        where, carriers = (*item, "path", str(k)), carried.by(step.point)
        if not carriers:
            gather.add(where, f"no member carries {step.point}", f"name {step.point} in a member")
        elif step.on is not None and step.on not in carriers:
            wanted = f"one of {', '.join(carriers)}" if len(carriers) > 1 else f"{carriers[0]}, or left out"
            gather.add((*where, "on"), f"{step.on} does not carry {step.point}", f"{wanted} is wanted")
        elif step.fixed and step.on is None and len(carriers) > 1:
            gather.add(where, f"{' and '.join(carriers)} carry {step.point}", "name in 'on' which of them the drum is")
        ends, pulley = k in (1, last), isinstance(step, Pulley)
        if ends and pulley:
            what = f"the rope has one end only: it {'begins' if k == 1 else 'ends'} at the pulley at {step.point}"
            gather.add((*item, "path"), what, "a point or drum is wanted at both ends")
        elif not ends and not pulley:
            wanted = f'{{ pulley = "{step.point}", radius = 30, wrap = "left" }} is wanted between the ends'
            gather.add((*item, "path"), f"{step.point} is an end in the middle of the rope", wanted)
        if pulley:
            _losses(step, where, gather)
    if joint.end == HAULING and joint.path[-1].fixed:
        gather.add((*item, "end"), "a drum is no hauling end: it winds by its turn", "a point is wanted there")


def _losses(step: Pulley, where: Item, gather: Gather) -> None:
    """One kind of friction at most, and what goes with it."""
    told = [key for key in step.losses if getattr(step, key) is not None]
    if len(told) > 1:
        what = f"{' and '.join(repr(key) for key in told)} are two ways to tell its friction"
        gather.add((*where, told[1]), what, "one of them is wanted")
    if step.turns and step.friction is None:
        gather.add((*where, "turns"), "it goes with 'friction' only", "a rope is wound round a post that does not turn")
    if (step.pin_friction is None) != (step.pin_diameter is None):
        there, other = (
            ("pin_diameter", "pin_friction") if step.pin_friction is None else ("pin_friction", "pin_diameter")
        )
        gather.add((*where, there), f"it goes with {other!r}", "both are wanted, or neither")


@_check.register
def _gear(joint: Gear, item: Item, carried: Carried, gather: Gather) -> None:
    first, second = joint.members
    if first == second:
        gather.add((*item, "members"), f"{first} cannot mesh with itself", "two members are wanted")
        return
    for centre, member in zip(joint.centres, joint.members, strict=True):
        _check_centre(centre, member, (*item, "centres"), carried, gather)


@_check.register
def _rack(joint: Rack, item: Item, carried: Carried, gather: Gather) -> None:
    if joint.pinion == joint.on:
        wanted = "another member is wanted for 'pinion' or 'on'"
        gather.add(item, f"{joint.on} cannot roll along itself", wanted)
        return
    _check_centre(joint.centre, joint.pinion, (*item, "centre"), carried, gather)
    carried.check(joint.along, joint.on, (*item, "along"), gather)


def _check_centre(centre: str, member: str, item: Item, carried: Carried, gather: Gather) -> None:
    """A pitch circle turns with its member, so that must carry the centre."""
    if member in carried.mechanism.members and member not in carried.by(centre):
        gather.add(item, f"{member} does not carry {centre}", f"name {centre} in {member}")


@_check.register
def _weld(joint: Weld, item: Item, carried: Carried, gather: Gather) -> None:
    first, second = joint.members
    if first == second:
        gather.add((*item, "members"), f"{first} cannot be welded to itself", "two members are wanted")
    elif carried.elsewhere(joint.at, first) and carried.elsewhere(joint.at, second):
        wanted = f"name it in {first} or {second}"
        gather.add((*item, "at"), f"{joint.at} is a point of {carried.text(joint.at)}", wanted)
