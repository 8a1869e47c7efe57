"""Rope or chain: from end to end over fixed and moving pulleys; pull only, the same all along but for friction.

A rope with two dead ends has one length, which does not change: one equation, whose multiplier is the tension. A rope
with a hauling end is drawn in there by an effort or a load, whose size is the tension; it holds nothing by itself.
With friction the tension steps at each pulley; that of the last part is the multiplier, or the pull at the hauling end.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Any

import numpy as np

from linkcalc.faults import Fault, Faults
from linkcalc.parts import fields
from linkcalc.parts.contract import (
    TURN,
    Contact,
    Drag,
    Entry,
    Limit,
    Mark,
    Poses,
    Push,
    Row,
    Rub,
    Site,
    Size,
    Sketch,
    Value,
    X,
    Y,
)
from linkcalc.parts.joints.rope_steps import Pulley
from linkcalc.parts.paths.drag_at import Loss
from linkcalc.parts.paths.over_pulleys import OverPulleys, Wheel, over_pulleys
from linkcalc.parts.paths.room import check_room
from linkcalc.parts.paths.shape import line_of
from linkcalc.parts.stiff import stiff, stiffness_field
from linkcalc.words import word

DEAD, HAULING = "dead", "hauling"


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
    breaking_load: Size | None = fields.size("force", "least breaking load, by its maker", None, sign="plus")
    factor: Size | None = fields.size("number", "factor against breaking", None, sign="plus")

    goes_with = (("factor", ("breaking_load",)),)

    def joints(self, name: str, sketch: Sketch) -> Iterator[RopeJoint]:
        wheels, losses, contacts = [], list[Loss | None](), dict[tuple[Site, str], tuple[str, list[int]]]()
        for k, step in enumerate(self.path):
            site = sketch.site(step.point, step.on)
            radius = sketch.value(step.radius, "length") if step.radius else 0.0
            wheels.append(Wheel(site, radius, step.side, step.fixed))
            losses.append(_loss(step, k, sketch))
            # a drum is part of a member, so it does not sit on the pin of several
            on_pin = step.on is None and not step.fixed and len(sketch.carriers(step.point)) > 1
            key = site, step.point if on_pin else ""
            contacts.setdefault(key, (f"{name} at {step.point}", []))[1].append(k)
        with np.errstate(all="ignore"):
            path = over_pulleys(wheels, sketch.drawn)
            check_room(path, sketch, [step.point for step in self.path])
            places = tuple(Place(where, site, pin, tuple(which)) for (site, pin), (where, which) in contacts.items())
            whole, limits = path.length(sketch.drawn), _limits(self.path, path, sketch)
            hauled = self.end == HAULING
            breaks = None if self.breaking_load is None else sketch.value(self.breaking_load, "force")
            factor = None if self.factor is None else sketch.value(self.factor, "number")
            yield RopeJoint(
                name, path, whole, places, hauled, tuple(losses[1:-1]), limits, breaks, factor, **stiff(self, sketch)
            )


def _loss(step: Any, k: int, sketch: Sketch) -> Loss | None:
    """What it loses on a step of its way. Raises Faults, with the step named."""
    try:
        return step.loss(sketch) if isinstance(step, Pulley) else None
    except Faults as found:
        raise Faults([Fault(("path", str(k + 1), *f.item), f.what, f.wanted) for f in found.faults]) from None


def _limits(steps: Sequence[Any], path: OverPulleys, sketch: Sketch) -> tuple[Limit, ...]:
    """It must lie on each of its pulleys: over the arc that is left, with the whole turns beside it."""

    def room(k: int, more: Value) -> Limit:
        text = f"off the pulley at {steps[k].point}: it would have to pass it on the other side"
        return Limit(text, lambda at, _: path.arcs(at, path.run(at))[k] + more)

    pulleys = [(k, step) for k, step in enumerate(steps) if isinstance(step, Pulley)]
    return tuple(room(k, 2 * np.pi * sketch.value(step.turns, "number")) for k, step in pulleys)


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
    losses  for each pulley between its ends what it loses there, None: nothing
    edges   what should hold of it in every pose
    breaks  [N] its breaking load, None if it is not told; factor [-] against that, None if none is told
    """

    name: str
    path: OverPulleys
    whole: Value
    places: tuple[Place, ...]
    hauled: bool
    losses: tuple[Loss | None, ...] = ()
    edges: tuple[Limit, ...] = ()
    breaks: Value | None = None
    factor: Value | None = None
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

    def contacts(self, at: Poses, parts: Sequence[Value] = ()) -> tuple[Contact, ...]:
        with np.errstate(all="ignore"):
            pulls = self.path.pulls(self.path.run(at), parts)
        out = []
        for place in self.places:
            fx, fy, moment = (sum((pulls[k][i] for k in place.wheels[1:]), pulls[place.wheels[0]][i]) for i in range(3))
            out.append(Contact(place.name, place.site, place.pin, fx, fy, moment))
        return tuple(out)

    def rubs(self) -> tuple[Rub, ...]:
        return ()

    def drag(self) -> Drag | None:
        return Drag(self._spans, self._ratios) if any(loss is not None for loss in self.losses) else None

    def _spans(self, at: Poses) -> tuple[tuple[Push, ...], ...]:
        with np.errstate(all="ignore"):
            ends = self.path.ends(self.path.run(at))
        return tuple(
            tuple(_push(at, wheel.site, *pull) for wheel, pull in zip(wheels, pulls, strict=True))
            for wheels, pulls in zip(pairwise(self.path.wheels), ends, strict=True)
        )

    def _ratios(self, at: Poses) -> tuple[Value, ...]:
        with np.errstate(all="ignore"):
            run = self.path.run(at)
            arcs = self.path.arcs(at, run)[1:-1]
            ways = pairwise(run.ways)
            return tuple(
                1.0 if loss is None else loss(before, after, arc)
                for loss, (before, after), arc in zip(self.losses, ways, arcs, strict=True)
            )

    def limits(self) -> tuple[Limit, ...]:
        return self.edges

    def mark(self, at: Poses) -> Mark:
        spots = [at.spot(w.site) for w in self.path.wheels]
        places = tuple((float(x), float(y)) for x, y in spots)
        rounds = tuple(
            (x, y, float(w.radius)) for (x, y), w in zip(places, self.path.wheels, strict=True) if float(w.radius)
        )
        return Mark("rope", places, name=self.name, line=line_of(self.path, at), rounds=rounds)


def _push(at: Poses, site: Site, fx: Value, fy: Value, moment: Value) -> Push:
    return site.member, fx, fy, _about_origin(at, site, fx, fy, moment)


def _about_origin(at: Poses, site: Site, fx: Value, fy: Value, moment: Value) -> Value:
    a, b = at.arm(site)
    if isinstance(a, float) and isinstance(b, float) and a == 0.0 and b == 0.0:
        return moment
    return a * fy - b * fx + moment
