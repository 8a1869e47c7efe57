"""Loads that act on nothing, more or less than one unknown, cases and strokes that do not fit the model."""

from __future__ import annotations

from functools import singledispatch
from typing import Any

from linkcalc.model import walk
from linkcalc.model.check_joints import Carried
from linkcalc.model.gather import Gather, Item
from linkcalc.model.mechanism import GROUND, Mechanism, asked_by, strength_kind
from linkcalc.parts.coordinates.distance import Distance
from linkcalc.parts.coordinates.haul import Haul
from linkcalc.parts.coordinates.place import Place
from linkcalc.parts.coordinates.turn import Turn
from linkcalc.parts.joints.rope import DEAD, HAULING
from linkcalc.parts.loads.force import Force
from linkcalc.parts.loads.haul import HaulForce
from linkcalc.parts.loads.moving import MovingForce, MovingMass
from linkcalc.parts.loads.pair import Pair
from linkcalc.parts.loads.spread import SpreadForce
from linkcalc.parts.loads.torque import Torque
from linkcalc.parts.loads.weight import Weight


def unsized(load: Any) -> bool:
    """True if the size of an effort or load is left out, so that it is asked for."""
    return getattr(load, asked_by(load), 0) is None


def check_loads(mechanism: Mechanism, gather: Gather) -> None:
    """Loads on points and members that do not go together."""
    carried = Carried(mechanism)
    for item, load in walk.loads(mechanism):
        _check(load, item, carried, gather)
    pulled = {getattr(load, "haul", "") for _, load in walk.loads(mechanism)}
    for name, rope in mechanism.joints.get("rope", {}).items():
        if rope.end == HAULING and name not in pulled:
            cure = f'an effort or load with haul = "{name}" is wanted, or end = "{DEAD}"'
            gather.add(("ropes", name, "end"), "nothing pulls at its hauling end", cure)


def check_unknown(mechanism: Mechanism, gather: Gather) -> None:
    """One size is asked for, no more: the effort's or the load's. A frame asks for none."""
    effort, load = mechanism.effort, mechanism.load
    for item, other in walk.loads(mechanism):
        if unsized(other) and item[-1:] != ("effort",) and item != ("load",):
            gather.add(
                item, f"{asked_by(other)!r} is missing", "only the size of the effort or of the load may be left out"
            )
    if effort is None:
        if unsized(load):
            gather.add(("load",), "it has no size and there is no effort", "give it a size, or give an effort")
    elif unsized(effort) and unsized(load):
        gather.add(("load",), "neither effort nor load has a size", "leave out one of the two sizes, not both")
    elif not unsized(effort) and load is None:
        gather.add(("effort",), "it has a size and there is no load", "leave its size out, or name a load to be found")
    elif not unsized(effort) and not unsized(load):
        gather.add(("effort",), "effort and load both have a size", "leave one of them out: it is what is asked for")


def check_cases(mechanism: Mechanism, gather: Gather) -> None:
    """Cases that replace what is not there, or change what is asked for."""
    asked = ("load",) if unsized(mechanism.load) else ()
    for name, case in mechanism.cases.items():
        item = ("cases", name)
        if gather.touches(*item):
            continue
        for key, names in (("drop", case.drop), ("scale", tuple(case.scale))):
            for load in names:
                if load in asked:
                    gather.add((*item, key), f"{load!r} is what is asked for", "it cannot be scaled or left out")
        for load in case.drop:
            if load in case.scale:
                gather.add((*item, "scale"), f"{load!r} is left out by 'drop'", "one of the two is wanted")
        if case.effort is not None:
            _check_effort(mechanism, case.effort, (*item, "effort"), gather)


def _check_effort(mechanism: Mechanism, effort: Any, item: Item, gather: Gather) -> None:
    model = mechanism.effort
    if model is None:
        gather.add(item, "the model has no effort that it could stand in for", "give the model an [effort]")
    elif unsized(effort) != unsized(model):
        wanted = "leave its size out, as the model does" if unsized(model) else "give it a size, as the model does"
        gather.add(item, "it has a size" if unsized(model) else "it has no size", wanted)
    elif strength_kind(effort) != strength_kind(model):
        gather.add(
            item, f"its size is a {strength_kind(effort)}", f"a {strength_kind(model)} is wanted, as in the model"
        )


def check_stroke(mechanism: Mechanism, gather: Gather) -> None:
    """A stroke of something that cannot change."""
    if mechanism.stroke is not None:
        _check(mechanism.stroke.along, ("stroke",), Carried(mechanism), gather)


@singledispatch
def _check(part: Any, item: Item, carried: Carried, gather: Gather) -> None:
    """What a kind of load or coordinate asks of points and members. One without an entry of its own may say that it
    reaches from point to point (`ends`), or turns one member against another (`turned`); else it asks nothing."""
    if hasattr(part, "ends"):
        _ends(part.ends, part.on, part.word, item, carried, gather)
    if hasattr(part, "turned"):
        _turned(part.turned, part.word, item, gather)


def _on(point: str, member: str | None, item: Item, carried: Carried, gather: Gather) -> None:
    """A load at a point, on one of the members that carry it."""
    carriers = carried.by(point)
    if not carriers:
        gather.add(item, f"no member carries {point}", f"name {point} in a member")
    elif member is not None and member not in carriers:
        wanted = f"{' or '.join(carriers)} is wanted, or name {point} in {member}"
        gather.add((*item, "on"), f"{member} does not carry {point}", wanted)


def _line(points: tuple[str, ...] | None, item: Item, gather: Gather) -> None:
    if points and points[0] == points[1]:
        gather.add(item, f"{points[0]} to {points[1]} is no line", "two points are wanted")


@_check.register
def _force(load: Force, item: Item, carried: Carried, gather: Gather) -> None:
    _on(load.at, load.on, item, carried, gather)
    _line(load.along, (*item, "along"), gather)
    _line(load.square_to, (*item, "square_to"), gather)
    if load.turns_with is not None and load.direction is None:
        gather.add((*item, "turns_with"), "there is no direction to be turned", "it goes with 'direction' only")


@_check.register
def _weight(load: Weight, item: Item, carried: Carried, gather: Gather) -> None:
    _on(load.mass_at, load.on, item, carried, gather)


@_check.register(MovingForce)
@_check.register(MovingMass)
@_check.register(SpreadForce)
def _moving(load: Any, item: Item, carried: Carried, gather: Gather) -> None:
    if getattr(load, "turns_with", None) is not None and load.direction is None:
        gather.add((*item, "turns_with"), "there is no direction to be turned", "it goes with 'direction' only")
    if load.way[0] == load.way[1]:
        _line(load.way, (*item, load.word), gather)
        return
    both = [m for m in carried.by(load.way[0]) if m in carried.by(load.way[1])]
    first, second = load.way
    if load.on is not None and load.on not in both:
        wanted = f"{' or '.join(both)} is wanted" if both else "take two points of one member"
        gather.add((*item, "on"), f"{load.on} does not carry both {first} and {second}", wanted)
    elif not both:
        gather.add((*item, load.word), f"no member carries both {first} and {second}", "take two points of one member")
    elif load.on is None and len(both) > 1:
        gather.add(item, f"{' and '.join(both)} carry both {first} and {second}", "name one of them in 'on'")
    elif (load.on or both[0]) == GROUND:
        gather.add((*item, load.word), "it stands on the ground, and loads nothing", "take two points of a member")


@_check.register
def _torque(load: Torque, item: Item, carried: Carried, gather: Gather) -> None:  # noqa: ARG001
    _turned((load.torque_on, load.against), "torque", item, gather)


def _turned(members: tuple[str, str], what: str, item: Item, gather: Gather) -> None:
    if members[0] == members[1]:
        gather.add(item, f"a {what.replace('_', ' ')} of {members[0]} on itself does nothing", "two members are wanted")


@_check.register
def _pair(load: Pair, item: Item, carried: Carried, gather: Gather) -> None:
    _ends(load.between, load.on, "between", item, carried, gather)


def _ends(
    points: tuple[str, str], on: tuple[str, str] | None, key: str, item: Item, carried: Carried, gather: Gather
) -> None:
    """A load between two points, which must be able to come nearer or to part."""
    first, second = points
    if first == second:
        gather.add((*item, key), f"{first} to {second} is no line", "two points are wanted")
        return
    ends = on or (None, None)
    for point, member in zip(points, ends, strict=True):
        _on(point, member, item, carried, gather)
    alone = [{member} if member else set(carried.by(point)) for point, member in zip(points, ends, strict=True)]
    if alone[0] == alone[1] and len(alone[0]) == 1:
        gather.add(item, f"both points are on {alone[0].pop()}: it does nothing", "points of two members are wanted")


@_check.register
def _haul(part: Haul | HaulForce, item: Item, carried: Carried, gather: Gather) -> None:
    rope = carried.mechanism.joints.get("rope", {}).get(part.haul)
    if rope is not None and rope.end != HAULING:
        cure = f'end = "{HAULING}" is wanted in [ropes.{part.haul}]'
        gather.add((*item, "haul"), f"{part.haul} has no hauling end: both are made fast", cure)


@_check.register
def _turn(stroke: Turn, item: Item, carried: Carried, gather: Gather) -> None:
    if stroke.turn == GROUND:
        gather.add((*item, "turn"), "the ground does not turn", "another member is wanted")
    elif stroke.turn == stroke.against:
        gather.add((*item, "against"), f"{stroke.turn} does not turn against itself", "another member is wanted")
    if stroke.line:
        _line(stroke.line, (*item, "line"), gather)
        carried.check(stroke.line, stroke.turn, (*item, "line"), gather)


@_check.register
def _place(stroke: Place, item: Item, carried: Carried, gather: Gather) -> None:
    m = carried.mechanism
    load = {"effort": m.effort, "load": m.load, **m.loads}.get(stroke.place)
    if load is not None and not hasattr(load, "place"):
        wanted = "a load of the kind 'moves_along' or 'mass_along' is wanted"
        gather.add((*item, "place"), f"{stroke.place} does not move along a line", wanted)


@_check.register
def _distance(stroke: Distance, item: Item, carried: Carried, gather: Gather) -> None:
    first, second = stroke.distance
    if first == second:
        gather.add((*item, "distance"), f"{first} to {second} is no line", "two points are wanted")
        return
    both = [member for member in carried.by(first) if member in carried.by(second)]
    if both:
        what = f"{first} and {second} are both on {both[0]}: their distance does not change"
        gather.add((*item, "distance"), what, "points of two members are wanted")
