"""The mechanism as drawn, in SI: sizes reckoned, points drawn, members with their frames and sites.

This is what parts ask (`parts.contract.Sketch`), and what the mechanics start from.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from contextlib import contextmanager
from functools import cached_property
from typing import Any

import numpy as np

from linkcalc.faults import Fault, Faults, fault
from linkcalc.model.body_lines import body_lines, middle
from linkcalc.model.dimensions import Overrides, evaluate
from linkcalc.model.drafting import Place, draw, plain
from linkcalc.model.formulas import to_si
from linkcalc.model.functions import Quantity
from linkcalc.model.mechanism import GROUND, Mechanism, Member, Pin
from linkcalc.model.parts_list import Assembly, PinGroup, assemble, pin_groups
from linkcalc.model.units import KINDS, show
from linkcalc.parts.along import Moved
from linkcalc.parts.contract import Hauled, Joint, Poses, Pusher, Site, Size, Travelled, Value
from linkcalc.words import nearest


class Drawing:
    """A mechanism laid out in its drawing pose; everything in SI.

    Values are Python floats, or (1, variant, 1) where they hang on an override given as an array.

    mechanism  what is drawn
    members    names of the members, "ground" first (index 0), the others as in the file
    origins    [m] for each member the drawn place (x, y) of its first point, where its frame has its origin; the
               frame is parallel to the ground axes in the drawing pose. (0.0, 0.0) for the ground
    points     [m] name -> drawn place (x, y)
    size       [m] the largest extent of the drawing with all dimensions at their own sizes
    pins       point -> PinGroup, for every point where members are pinned together
    joints     the numeric joints: pins first, then slots, slides, welds by name
    """

    def __init__(self, mechanism: Mechanism, overrides: Overrides | None = None):
        """Lay out a mechanism; `overrides` puts other values [SI] in place of dimensions.

        Raises Faults, each telling its item: sizes or constructions that give nothing, unknown names.
        """
        self.mechanism = mechanism
        self._dimensions = evaluate(mechanism, overrides)
        self.members: tuple[str, ...] = (GROUND, *(m for m in mechanism.members if m != GROUND))
        self._index = {name: index for index, name in enumerate(self.members)}
        self._carriers: dict[str, tuple[str, ...]] = {}
        for name, member in mechanism.members.items():
            for point in dict.fromkeys(member.points):
                self._carriers[point] = (*self._carriers.get(point, ()), name)
        self._sites: dict[tuple[str, int], Site] = {}
        self._centres: dict[str, Site] = {}
        self._joint_list: tuple[Joint, ...] | None = None
        self._assembly: Assembly | None = None
        self.points: dict[str, Place] = {}
        draw(mechanism.points, self, self.points)
        self.points = {name: self.points[name] for name in mechanism.points}
        self.origins: list[Place] = [(0.0, 0.0)]
        for name in self.members[1:]:
            with _located("members", name):
                self.origins.append(self.point(self.first_point(name)))
        self.pins: dict[str, PinGroup] = pin_groups(mechanism, self._carriers)
        self.size: float = drawn(mechanism).size if overrides else self._extent()

    # what parts ask

    def value(self, size: Size, kind: str) -> Value:
        """A size as written -> SI. Raises Faults."""
        return to_si(size, kind, self.mechanism.units, self._dimensions)

    def point(self, name: str) -> Place:
        """[m] the drawn place of a point. Raises Faults."""
        if name not in self.points:
            raise fault((), f"unknown point {name!r}", nearest(name, self.mechanism.points))
        return self.points[name]

    def coefficient(self, kind: str, own: Size | None) -> Value:
        """[-] coefficient of friction: a joint's own, else the one for its kind, else 0.0. Raises Faults."""
        size = own if own is not None else getattr(self.mechanism.friction, kind)
        return 0.0 if size is None else self.value(size, "number")

    def sheave_efficiency(self) -> Value:
        """[-] efficiency of all pulleys that say nothing of their own. Raises Faults."""
        size = self.mechanism.friction.sheave_efficiency
        return 1.0 if size is None else self.value(size, "number")

    def friction_radius(self, point: str) -> Value:
        """[m] radius of the friction circle of a pin: its radius times the sine of the angle of friction.

        Raises Faults: a pin that rubs, but has no diameter.
        """
        own = self.mechanism.pins.get(point, Pin())
        if own.friction_radius is not None:
            return self.value(own.friction_radius, "length")
        mu = self.coefficient("pins", own.friction)
        if isinstance(mu, float) and mu == 0.0:
            return 0.0
        diameter = own.diameter if own.diameter is not None else self.mechanism.friction.diameter
        if diameter is None:
            raise fault(("pins", point), "it rubs, but has no diameter", "give it one, or [friction] diameter for all")
        return self.value(diameter, "length") / 2 * mu / np.hypot(1.0, mu)

    def shown(self, size: float, kind: str = "length") -> str:
        """A size [SI] for a message, in the file's unit."""
        return show(size, kind, self.mechanism.units)

    def formula(self, text: str, kind: str, of: str) -> Callable[[Value], Value]:
        """A formula over one size more, named by its kind ("length", "angle"), and over the dimensions. Where it has no
        value it gives NaN. Raises Faults when it is no formula of that kind at all."""
        unit, names = KINDS[of], self._dimensions

        def reckon(way: Value) -> Value:
            return to_si(text, kind, self.mechanism.units, {**names, of: Quantity(way, unit)})

        with _located("formula"):
            reckon(1.0)

        def force(way: Value) -> Value:
            try:
                return reckon(way)
            except Faults:
                return float("nan") if np.ndim(way) == 0 else np.full(np.shape(way), np.nan)

        return force

    def site(self, point: str, member: str | None = None) -> Site:
        """A point as a member carries it, always the same object for the same two. Without a member: the pin
        itself, by its hub; a point that nobody carries belongs to the ground. Raises Faults."""
        index = self.member(self.hub(point) if member is None else member)
        if (point, index) not in self._sites:
            self._sites[point, index] = self._local(index, self.point(point), point)
        return self._sites[point, index]

    def member(self, name: str) -> int:
        """Index of a member, 0 for "ground". Raises Faults."""
        if name not in self._index:
            raise fault((), f"unknown member {name!r}", nearest(name, self.members))
        return self._index[name]

    def carriers(self, point: str) -> tuple[str, ...]:
        """Members that name the point, in the order of the file."""
        return self._carriers.get(point, ())

    def hub(self, point: str) -> str:
        """The member that stands for a pin: the ground if it carries the point, else the first that names it."""
        carriers = self.carriers(point)
        return GROUND if GROUND in carriers or not carriers else carriers[0]

    def first_point(self, member: str) -> str:
        """The point at the origin of the member's frame. Raises Faults: the member has none."""
        self.member(member)
        entry = self.mechanism.members.get(member)
        if entry is None or not entry.points:
            raise fault((), f"member {member!r} has no points", "name the points it carries")
        return entry.points[0]

    def shared_point(self, member: str, other: str) -> str | None:
        """The first point of a member that another carries too, None if there is none. Raises Faults."""
        for name in (member, other):
            self.member(name)
        entry = self.mechanism.members.get(member)
        carried = entry.points if entry else ()
        return next((p for p in carried if other in self._carriers.get(p, ())), None)

    def own_axis(self, member: str) -> Value:
        """[rad] direction of the member's own x axis, first to last point as drawn; 0.0 for the ground."""
        if member == GROUND:
            return 0.0
        (ax, ay), (bx, by) = (self.point(p) for p in (self.first_point(member), self._entry(member).points[-1]))
        return plain(np.arctan2(by - ay, bx - ax))

    def travelled(self, name: str) -> Travelled:
        """The slot or slide of that name. Raises Faults."""
        able: dict[str, Any] = {j.name: j for j in self.joints if hasattr(j, "travel")}
        if name not in able:
            raise fault((), f"unknown slot, slide or track {name!r}", nearest(name, able))
        found: Travelled = able[name]
        return found

    def hauled(self, name: str) -> Hauled:
        """The rope of that name. Raises Faults."""
        able: dict[str, Any] = {j.name: j for j in self.joints if hasattr(j, "haul")}
        if name not in able:
            raise fault((), f"unknown rope {name!r}", nearest(name, able))
        found: Hauled = able[name]
        return found

    def moved(self, name: str) -> Moved:
        """The load of that name that moves along a line. Raises Faults."""
        able: dict[str, Any] = {of: p for (_, of), p in self.pushers().items() if hasattr(p, "span")}
        if name not in able:
            raise fault((), f"unknown load {name!r}", nearest(name, able))
        found: Moved = able[name]
        return found

    @cached_property
    def variants(self) -> int:
        """How many copies it is laid out for, 1 if it is one mechanism."""
        return max((int(np.size(q.value)) for q in self._dimensions.values()), default=1)

    @cached_property
    def drawn(self) -> Poses:
        """All members in the drawing pose."""
        x, y = zip(*self.origins, strict=True)
        count = len(self.members)
        return Poses(x, y, [1.0] * count, [0.0] * count)

    # what the engine asks

    @property
    def joints(self) -> tuple[Joint, ...]:
        if self._joint_list is None:
            self._joint_list = tuple(self._joints())
        return self._joint_list

    def pushers(self) -> dict[tuple[str, str], Pusher]:
        """Everything that pushes, by (case, name); case "" is there in every case.

        Names: "effort", "load", the names of [loads], "weight of handle". A case brings its own effort under
        (case, "effort") and what it adds under (case, name). Raises Faults.
        """
        return self.assembly().pushers

    def assembly(self) -> Assembly:
        """Pushers, and what each load case makes of them. Raises Faults."""
        if self._assembly is None:
            self._assembly = assemble(self)
        return self._assembly

    def mass_site(self, member: str) -> Site:
        """The centre of mass of a member: the point named for it, else the middle of its path. Raises Faults."""
        entry = self._entry(member)
        if entry.centre is not None:
            return self.site(entry.centre, member)
        if member not in self._centres:
            place = middle([(self.point(a), self.point(b)) for a, b in body_lines(entry)])
            self._centres[member] = self._local(self.member(member), place)
        return self._centres[member]

    def mass_lines(self, member: str) -> tuple[tuple[Site, Site], ...]:
        """The lines that a member's mass is spread along, evenly; empty if its centre is given, and lies elsewhere than
        the middle of them. Raises Faults."""
        lines = body_lines(self._entry(member))
        centre, (x, y) = self.mass_site(member), middle([(self.point(a), self.point(b)) for a, b in lines])
        even = self._local(self.member(member), (x, y))
        off = np.hypot(np.subtract(centre.u, even.u), np.subtract(centre.v, even.v))
        if np.any(off > 1e-9 * drawn(self.mechanism).size):
            return ()
        return tuple((self.site(a, member), self.site(b, member)) for a, b in lines if a != b)

    def carried(self, member: str, place: Place) -> Site:
        """A drawn place [m] as a member carries it. Raises Faults."""
        return self._local(self.member(member), place)

    def _entry(self, member: str) -> Member:
        self.first_point(member)
        return self.mechanism.members[member]

    def _local(self, index: int, place: Place, point: str = "") -> Site:
        """A place in a member's frame. Its first point is exactly at (0.0, 0.0), so that it folds away."""
        if index == 0:
            return Site(0, *place)
        if point == self.first_point(self.members[index]):
            return Site(index, 0.0, 0.0)
        x, y = self.origins[index]
        return Site(index, plain(place[0] - x), plain(place[1] - y))

    def _joints(self) -> Iterator[Joint]:
        for group in self.pins.values():
            yield from group.joints(self)
        for word, parts in self.mechanism.joints.items():
            for name, part in parts.items():
                with _located(f"{word}s", name), np.errstate(all="ignore"):
                    yield from part.joints(name, self)

    def _extent(self) -> float:
        places = np.array(list(self.points.values()), float).reshape(-1, 2)
        extent = float(np.max(np.ptp(places, axis=0), initial=0.0))
        return extent or 1.0


def drawn(mechanism: Mechanism) -> Drawing:
    """A mechanism with its own sizes, laid out once and kept with it: frozen as it is, it will not change.

    Raises Faults.
    """
    kept = mechanism.__dict__.get("_drawn")
    if kept is None:
        kept = Drawing(mechanism)
        object.__setattr__(mechanism, "_drawn", kept)
    found: Drawing = kept
    return found


@contextmanager
def _located(*item: str) -> Iterator[None]:
    """Tell faults raised inside from this item."""
    try:
        yield
    except Faults as found:
        raise Faults([Fault(item + f.item, f.what, f.wanted) for f in found.faults]) from None
