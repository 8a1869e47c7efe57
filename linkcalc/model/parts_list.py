"""What a drawing is assembled from: pins, everything that pushes, and what each load case makes of it."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import TYPE_CHECKING, cast

import numpy as np

from linkcalc.faults import Fault, Faults
from linkcalc.model.mechanism import GROUND, Case, Mechanism
from linkcalc.parts.contract import Joint, Pusher, Value
from linkcalc.parts.joints.pin import PinJoint
from linkcalc.parts.lines import exact
from linkcalc.parts.loads.weight import WeightPush

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
    """

    point: str
    hub: str
    others: tuple[str, ...]

    @property
    def members(self) -> tuple[str, ...]:
        return (self.hub, *self.others)

    def joints(self, drawing: Drawing) -> Iterator[Joint]:
        """One joint for each of the others against the hub; its force is the one on the other."""
        hub, radius = drawing.site(self.point, self.hub), drawing.friction_radius(self.point)
        for other in self.others:
            site = drawing.site(self.point, other)
            yield cast("Joint", PinJoint(self.point, site, hub, friction_radius=radius))


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
            hub = GROUND if GROUND in pinned else pinned[0]
            groups[point] = PinGroup(point, hub, tuple(m for m in pinned if m != hub))
    return groups


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
            weight = WeightPush(full, drawing.mass_site(name), drawing.value(member.mass, "mass"))
            pushers["", full] = cast("Pusher", weight)
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
