"""What a drawing is assembled from: pins, everything that pushes, and what each load case makes of it."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field, replace
from typing import TYPE_CHECKING, cast

import numpy as np

from linkcalc.faults import Fault, Faults, fault
from linkcalc.model.mechanism import GROUND, Case, Mechanism, Pin
from linkcalc.model.poises import balancers
from linkcalc.parts.contract import Joint, Pusher, Site, Value
from linkcalc.parts.joints.pin import PinJoint, StretchJoint
from linkcalc.parts.lines import exact
from linkcalc.parts.loads.weight import WeightPush
from linkcalc.parts.stiff import shares

if TYPE_CHECKING:
    from linkcalc.model.sketch import Drawing

EFFORT, LOAD = "effort", "load"
Key = tuple[str, str]


@dataclass(frozen=True)
class PinGroup:
    """The members that one pin joins.

    point   name of the pin
    hub     the member that stands for the pin: the ground if it carries the point, else the first that names it
    others  the members pinned to it; of members welded together here only one is named
    links   other -> the member that stretches at its joint with the hub
    """

    point: str
    hub: str
    others: tuple[str, ...]
    links: Mapping[str, str] = field(default_factory=dict)

    @property
    def members(self) -> tuple[str, ...]:
        return (self.hub, *self.others)

    def joints(self, drawing: Drawing) -> Iterator[Joint]:
        """One joint for each of the others against the hub; its force is the one on the other."""
        hub, radius = drawing.site(self.point, self.hub), drawing.friction_radius(self.point)
        own = drawing.mechanism.pins.get(self.point, Pin()).stiffness
        stiffness = None if own is None else drawing.value(own, "stiffness")
        share = None
        if shares(drawing.mechanism.joints):
            stiffness, share = None, stiffness
        for other in self.others:
            site = drawing.site(self.point, other)
            if other in self.links:
                yield cast("Joint", self._stretching(drawing, site, hub, radius, self.links[other]))
            else:
                pin = PinJoint(self.point, site, hub, friction_radius=radius, stiffness=stiffness, share=share)
                yield cast("Joint", pin)

    def _stretching(self, drawing: Drawing, a: Site, b: Site, radius: Value, link: str) -> StretchJoint:
        member = drawing.mechanism.members[link]
        far = next(p for p in member.points if p in drawing.pins and p != self.point)
        (x0, y0), (x1, y1) = drawing.point(far), drawing.point(self.point)
        length = np.hypot(x1 - x0, y1 - y0)
        tx, ty = exact((x1 - x0) / length), exact((y1 - y0) / length)
        assert member.stiffness is not None
        stiffness = member.copies * drawing.value(member.stiffness, "stiffness")
        return StretchJoint(
            self.point, a, b, friction_radius=radius, stiffness=stiffness, link=drawing.member(link), tx=tx, ty=ty
        )


@dataclass(frozen=True)
class CaseLoads:
    """A load case in numbers.

    name     "" if the model has no cases
    down     [-] direction of gravity (x, y), float or (1, variant, 1)
    field    [m/s2] strength of gravity, float or (1, variant, 1)
    effort   key of its effort among the pushers, None for a frame
    factors  key of a pusher -> factor on it, for every load that acts in this case; the effort is not among them
    """

    name: str
    down: tuple[Value, Value]
    field: Value
    effort: Key | None
    factors: Mapping[Key, float]


@dataclass(frozen=True)
class Assembly:
    """pushers: everything that pushes, by (case, name), case "" in every case; cases: in the order of the file."""

    pushers: dict[Key, Pusher]
    cases: tuple[CaseLoads, ...]


def pin_groups(mechanism: Mechanism, carriers: Mapping[str, tuple[str, ...]]) -> dict[str, PinGroup]:
    """The pins, in the order of the points. Members welded together at a point are one there."""
    groups: dict[str, PinGroup] = {}
    for point in mechanism.points:
        pinned = _unwelded(mechanism, point, carriers.get(point, ()))
        if len(pinned) > 1:
            # a link that stretches stands for no pin if another can: the pin is where the others have it
            firm = [m for m in pinned if not _stretches(mechanism, m)] or pinned
            hub = GROUND if GROUND in pinned else firm[0]
            groups[point] = PinGroup(point, hub, tuple(m for m in pinned if m != hub))
    return _linked(mechanism, groups)


def _stretches(mechanism: Mechanism, member: str) -> bool:
    return mechanism.members[member].stiffness is not None


def _linked(mechanism: Mechanism, groups: dict[str, PinGroup]) -> dict[str, PinGroup]:
    """Choose for each link that stretches the end where it gives: a joint gives for one link only.

    Raises Faults: none is left, or the link is not held by two pins.
    """
    taken: dict[tuple[str, str], str] = {}
    firm = {p: group for p, group in groups.items() if mechanism.pins.get(p, Pin()).stiffness is None}
    for link, member in mechanism.members.items():
        if member.stiffness is None:
            continue
        ends = [p for p in member.points if p in groups and link in groups[p].members]
        if len(ends) != 2:
            what = f"it stretches along the line of two pins, and has {len(ends)}"
            raise fault(("members", link, "stiffness"), what, "a member that two pins hold is wanted")
        if not firm.keys() & set(ends):
            wanted = "leave the stiffness of one of its pins out, or its own"
            raise fault(("members", link, "stiffness"), "both its pins give already", wanted)
        if not _placed(link, firm, [p for p in ends if p in firm], taken, set()):
            wanted = "name one of the members there that do not stretch before them, or leave one stiff"
            raise fault(("members", link, "stiffness"), "too many links that stretch meet at its pins", wanted)
    return {
        point: replace(group, links={other: link for (p, other), link in taken.items() if p == point})
        for point, group in groups.items()
    }


def _placed(
    link: str, groups: Mapping[str, PinGroup], ends: list[str], taken: dict[tuple[str, str], str], seen: set[str]
) -> bool:  # fmt: skip
    """Give a link a joint of its own, others moving to their other end if they must."""
    seen.add(link)
    for point in ends:
        group = groups[point]
        if group.hub == link and len(group.others) > 1:
            continue  # several are joined to it there: none of those joints alone is its end
        place = (point, group.others[0] if group.hub == link else link)
        if place not in taken:
            taken[place] = link
            return True
    for point in ends:
        place = (point, groups[point].others[0] if groups[point].hub == link else link)
        other = taken.get(place)
        if other is None or other in seen:
            continue
        rest = [p for p in groups if other in groups[p].members and p != point]
        if _placed(other, groups, rest, taken, seen):
            taken[place] = link
            return True
    return False


def _unwelded(mechanism: Mechanism, point: str, members: tuple[str, ...]) -> list[str]:
    """Of every cluster welded together at the point the member that stands for it: the ground, else the first."""
    clusters = [{m} for m in members]
    for weld in mechanism.joints.get("weld", {}).values():
        if weld.at == point and set(weld.members) <= set(members):
            joined = [c for c in clusters if c & set(weld.members)]
            clusters = [c for c in clusters if not c & set(weld.members)] + [set().union(*joined)]
    stand = {GROUND if GROUND in c else min(c, key=members.index) for c in clusters}
    return [m for m in members if m in stand]


def assemble(drawing: Drawing) -> Assembly:
    """All pushers and cases. Raises Faults."""
    mechanism = drawing.mechanism
    pushers: dict[Key, Pusher] = {}

    def add(case: str, name: str, load: object, *item: str) -> None:
        try:
            pushers[case, name] = load.pusher(name, drawing)  # type: ignore[attr-defined]
        except Faults as found:
            raise Faults([Fault(item + f.item, f.what, f.wanted) for f in found.faults]) from None

    for name, load in ((EFFORT, mechanism.effort), (LOAD, mechanism.load)):
        if load is not None:
            add("", name, load, name)
    for name, load in mechanism.loads.items():
        add("", name, load, "loads", name)
    for name, member in mechanism.members.items():
        if member.mass is not None and name != GROUND:
            full = f"weight of {name}"
            mass = member.copies * drawing.value(member.mass, "mass")
            weight = WeightPush(full, drawing.mass_site(name), mass, lines=drawing.mass_lines(name))
            pushers["", full] = cast("Pusher", weight)
    pushers |= balancers(drawing)
    for case_name, case in mechanism.cases.items():
        if case.effort is not None:
            add(case_name, EFFORT, case.effort, "cases", case_name, EFFORT)
        for name, load in case.add.items():
            add(case_name, name, load, "cases", case_name, "add", name)
    cases = mechanism.cases or {"": Case()}
    return Assembly(pushers, tuple(_case(drawing, name, case, pushers) for name, case in cases.items()))


def _case(drawing: Drawing, name: str, case: Case, pushers: Mapping[Key, Pusher]) -> CaseLoads:
    mechanism = drawing.mechanism
    warm = drawing.value(mechanism.temperature if case.temperature is None else case.temperature, "temperature")
    factors = {
        key: float(case.scale.get(key[1], 1.0)) * _warmth(pusher, float(warm))
        for key, pusher in pushers.items()
        if key[0] in ("", name) and key[1] != EFFORT and not (key[0] == "" and key[1] in case.drop)
    }
    own: Key = (name, EFFORT) if (name, EFFORT) in pushers else ("", EFFORT)
    gravity = mechanism.gravity
    angle = drawing.value(gravity.direction, "angle") + drawing.value(case.gravity.turn, "angle")
    down = exact(np.cos(angle)), exact(np.sin(angle))
    field = drawing.value(gravity.size, "acceleration") * case.gravity.scale
    return CaseLoads(name, down, field, own if own in pushers else None, factors)


def _warmth(pusher: Pusher, temperature: float) -> float:
    """How much stronger it is at a temperature [K] than at the one at which it is told: the ideal gas keeps p/T."""
    told: float | None = getattr(pusher, "temperature", None)
    return 1.0 if told is None else temperature / told
