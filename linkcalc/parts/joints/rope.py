"""Rope or chain: from end to end over fixed and moving pulleys; one tension throughout, pull only.

A rope with two dead ends has one length, which does not change: one equation, whose multiplier is the tension. A rope
with a hauling end is drawn in there by an effort or a load, whose size is the tension; it holds nothing by itself.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Any

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Contact, Entry, Mark, Poses, Row, Rub, Site, Size, Sketch, Value, X, Y
from linkcalc.parts.paths.over_pulleys import OverPulleys, Wheel, over_pulleys
from linkcalc.parts.paths.room import check_room
from linkcalc.parts.paths.shape import line_of
from linkcalc.parts.stiff import stiff, stiffness_field
from linkcalc.words import word

DEAD, HAULING = "dead", "hauling"
_SIDES = {"left": -1.0, "right": 1.0}
_WRAP = "the side of the centre on which the rope passes, looking along the path"


@word("rope step", "point")
@dataclass(frozen=True)
class Anchor:
    """An end that is made fast at a point."""

    point: str = fields.name("point", "the point it is made fast to; where several members meet the pin itself")
    on: str | None = fields.name("member", "the member that takes the pull, if several carry the point", None)

    short = "point"
    radius = 0.0
    side = 1.0
    fixed = False


@word("rope step", "pulley")
@dataclass(frozen=True)
class Pulley:
    """A pulley that turns freely about a point."""

    pulley: str = fields.name("point", "its centre; where several members meet it sits on the pin itself")
    radius: Size = fields.size("length", "to the middle of the rope", sign="not minus")
    wrap: str = fields.choice(tuple(_SIDES), _WRAP)
    on: str | None = fields.name("member", "the member that takes the pull, if several carry the point", None)

    fixed = False

    @property
    def point(self) -> str:
        return self.pulley

    @property
    def side(self) -> float:
        return _SIDES[self.wrap]


@word("rope step", "drum")
@dataclass(frozen=True)
class Drum:
    """An end that winds on a drum or sector fixed to a member, within half a turn of the drawing pose."""

    drum: str = fields.name("point", "its centre")
    radius: Size = fields.size("length", "to the middle of the rope", sign="plus")
    wrap: str = fields.choice(tuple(_SIDES), _WRAP)
    on: str | None = fields.name("member", "the member that the drum is part of, if several carry the point", None)

    fixed = True

    @property
    def point(self) -> str:
        return self.drum

    @property
    def side(self) -> float:
        return _SIDES[self.wrap]


@word("joint", "rope")
@dataclass(frozen=True)
class Rope:
    """A rope or chain: one length from end to end, over pulleys; the same pull everywhere along it."""

    path: tuple[Any, ...] = fields.parts(
        "rope step",
        "its way in order: an end, pulleys, an end",
        'both ends and the pulleys between are wanted, e.g. ["A", { pulley = "P", radius = 30, wrap = "left" }, "B"]',
    )
    end: str = fields.choice(
        (DEAD, HAULING), "its last end: made fast, or drawn in there by an effort or load with 'haul'", DEAD
    )
    stiffness: Size | None = stiffness_field()

    def joints(self, name: str, sketch: Sketch) -> Iterator[RopeJoint]:
        wheels, contacts = [], dict[tuple[Site, str], tuple[str, list[int]]]()
        for k, step in enumerate(self.path):
            site = sketch.site(step.point, step.on)
            radius = sketch.value(step.radius, "length") if step.radius else 0.0
            wheels.append(Wheel(site, radius, step.side, step.fixed))
            # a drum is part of a member, so it does not sit on the pin of several
            on_pin = step.on is None and not step.fixed and len(sketch.carriers(step.point)) > 1
            key = site, step.point if on_pin else ""
            contacts.setdefault(key, (f"{name} at {step.point}", []))[1].append(k)
        with np.errstate(all="ignore"):
            path = over_pulleys(wheels, sketch.drawn)
            check_room(path, sketch, [step.point for step in self.path])
            places = tuple(Place(where, site, pin, tuple(which)) for (site, pin), (where, which) in contacts.items())
            yield RopeJoint(name, path, path.length(sketch.drawn), places, self.end == HAULING, **stiff(self, sketch))


@dataclass(frozen=True, eq=False)
class Place:
    """Where a rope acts: the name of that side, its place, the pin that takes it, and its wheels there."""

    name: str
    site: Site
    pin: str
    wheels: tuple[int, ...]


@dataclass(frozen=True, eq=False)
class RopeJoint:
    """The equation of a rope; gap = what it has in hand, its own length less that of its way [m].

    whole   [m] its own length, but for what is on drums
    hauled  True if it has a hauling end: then its length may change, and there is no equation
    """

    name: str
    path: OverPulleys
    whole: Value
    places: tuple[Place, ...]
    hauled: bool
    on_pin: str = ""
    share: Value | None = None
    word = "rope"

    @property
    def angular(self) -> tuple[bool, ...]:
        return () if self.hauled else (False,)

    @property
    def members(self) -> tuple[int, ...]:
        return tuple(dict.fromkeys(w.site.member for w in self.path.wheels))

    @property
    def site(self) -> Site:
        return self.path.wheels[0].site

    @property
    def pins(self) -> tuple[str, ...]:
        return tuple(place.pin for place in self.places)

    @property
    def sites(self) -> tuple[Site, ...]:
        return tuple(place.site for place in self.places)

    def gap(self, at: Poses) -> tuple[Value, ...]:
        return () if self.hauled else (self.haul(at),)

    def slope(self, at: Poses) -> tuple[Row, ...]:
        return () if self.hauled else (self.haul_slope(at),)

    def haul(self, at: Poses) -> Value:
        """[m] how much of it is in hand: drawn in since the drawing pose, if it has a hauling end."""
        with np.errstate(all="ignore"):
            return self.whole - self.path.length(at)

    def haul_slope(self, at: Poses) -> Row:
        with np.errstate(all="ignore"):
            pulls = self.path.pulls(self.path.run(at))
        row: list[Entry] = []
        for wheel, (fx, fy, moment) in zip(self.path.wheels, pulls, strict=True):
            member = wheel.site.member
            row += [(member, X, fx), (member, Y, fy), (member, TURN, _about_origin(at, wheel.site, fx, fy, moment))]
        return row

    def contacts(self, at: Poses) -> tuple[Contact, ...]:
        with np.errstate(all="ignore"):
            pulls = self.path.pulls(self.path.run(at))
        out = []
        for place in self.places:
            fx, fy, moment = (sum((pulls[k][i] for k in place.wheels[1:]), pulls[place.wheels[0]][i]) for i in range(3))
            out.append(Contact(place.name, place.site, place.pin, fx, fy, moment))
        return tuple(out)

    def rubs(self) -> tuple[Rub, ...]:
        return ()

    def mark(self, at: Poses) -> Mark:
        spots = [at.spot(w.site) for w in self.path.wheels]
        places = tuple((float(x), float(y)) for x, y in spots)
        rounds = tuple(
            (x, y, float(w.radius)) for (x, y), w in zip(places, self.path.wheels, strict=True) if float(w.radius)
        )
        return Mark("rope", places, name=self.name, line=line_of(self.path, at), rounds=rounds)


def _about_origin(at: Poses, site: Site, fx: Value, fy: Value, moment: Value) -> Value:
    a, b = at.arm(site)
    if isinstance(a, float) and isinstance(b, float) and a == 0.0 and b == 0.0:
        return moment
    return a * fy - b * fx + moment
