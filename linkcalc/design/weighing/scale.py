"""A mechanism taken as a scale: what loads, poises and counterpoises each do to its beam."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from typing import Any, cast

import numpy as np

from linkcalc.faults import fault
from linkcalc.mechanics.motion import Closed
from linkcalc.mechanics.prepare import Ready, prepare
from linkcalc.mechanics.pushing import Acting, Pushing
from linkcalc.mechanics.scales import given_moment, level, moments
from linkcalc.model.mechanism import Case, Friction, Mechanism
from linkcalc.model.poises import Counterpoise, Poise
from linkcalc.model.sketch import Drawing, drawn
from linkcalc.parts.contract import Pusher
from linkcalc.parts.loads.torque import Torque
from linkcalc.parts.loads.weight import Weight, WeightPush
from linkcalc.parts.pose import Array, Value

_IDLE = 1e-9  # moment of a unit over what it has at the size of the mechanism: it does nothing


@dataclass(frozen=True, eq=False)
class Terms:
    """Moments at the beam, in balance together; arrays (case, variant), the poises and counterpoises first.

    rest    [N m] all that is there without load and poises, hangers counted
    fixed   [N m] the part of it that gravity has no hand in: springs and forces
    load    [N m/kg] of the load
    start   [N m] of each poise at its place of nothing
    slope   [N] of each poise for a way of 1 m
    hung    [N m/kg] of a mass on each hanger
    """

    rest: Array
    fixed: Array
    load: Array
    start: Array
    slope: Array
    hung: Array


def beam_of(mechanism: Mechanism) -> str:
    """The member that the poises slide on. Raises Faults: nothing is there that balances."""
    drawing = drawn(mechanism)
    if not mechanism.poises and not mechanism.counterpoises:
        cure = "give it a poise: [poises.NAME] with along, mass; or a hanger: [counterpoises.NAME] with at, weights"
        raise fault("poises", "nothing is there that could balance a load", cure)
    sliding = {name: p.member(drawing) for name, p in mechanism.poises.items()}
    if sliding:
        return next(iter(sliding.values()))
    name, hanger = next(iter(mechanism.counterpoises.items()))
    carriers = [m for m in drawing.carriers(hanger.at) if m != "ground"]
    if hanger.on is None and len(carriers) > 1:
        what = f"{' and '.join(carriers)} both carry {hanger.at}"
        raise fault(("counterpoises", name), what, "tell with 'on' which of them is the beam")
    return hanger.on or carriers[0]


def probe(mechanism: Mechanism, beam: str, *, turned: float = 0.0, rubs: bool = False) -> Mechanism:
    """The same mechanism with a torque on the beam as all that drives it.

    turned  [rad] by how much gravity is turned: the scale stands out of level
    rubs    friction is left in
    """
    cases = {name: replace(case, effort=None) for name, case in mechanism.cases.items()}
    out = replace(
        mechanism, effort=Torque(beam), stroke=None, requirements={}, cases=cases,
        free=tuple(m for m in mechanism.free if m != beam),
    )  # fmt: skip
    if turned:
        direction = drawn(mechanism).value(mechanism.gravity.direction, "angle") + turned
        out = replace(out, gravity=replace(mechanism.gravity, direction=f"{float(direction)!r} rad"))
    return out if rubs else _smooth(out)


def _smooth(mechanism: Mechanism) -> Mechanism:
    """Without friction anywhere."""
    joints = {
        word: {n: replace(j, friction=None) if hasattr(j, "friction") else j for n, j in parts.items()}
        for word, parts in mechanism.joints.items()
    }
    pins = {point: replace(p, friction=None, friction_radius=None) for point, p in mechanism.pins.items()}
    return replace(mechanism, friction=Friction(), joints=joints, pins=pins)


class Scale:
    """A scale ready to be asked, one or many copies of it.

    beam      index of the beam
    poises    name -> Poise, counterpoises likewise, in the order of the file
    drawing   where it is laid out
    settles   True if something hangs free or gives: then the pose hangs on the load
    """

    def __init__(
        self, mechanism: Mechanism, beam: str, sizes: Mapping[str, Value] | None = None, *, like: Scale | None = None
    ):
        """mechanism: a ``probe``. Raises Faults."""
        self.mechanism = mechanism
        self.drawing = drawn(mechanism) if sizes is None else Drawing(mechanism, sizes)
        self.poises: Mapping[str, Poise] = mechanism.poises
        self.counterpoises: Mapping[str, Counterpoise] = mechanism.counterpoises
        self.beam_name, self.beam = beam, self.drawing.member(beam)
        self.ready: Ready = prepare(self.drawing, None if like is None else like.ready)
        self.settles = self.ready.loose is not None
        p = self.ready.pushing
        balancing = {*self.poises, *self.counterpoises}
        self._load = p.load[0]
        self._rest = tuple(a for a in p.rest if a.pusher.name not in balancing)
        self._weights = tuple(a for a in self._rest if isinstance(a.pusher, WeightPush))
        self._others = tuple(a for a in self._rest if not isinstance(a.pusher, WeightPush))
        self._known: Terms | None = None

    def acting(self, name: str, place: Value) -> Acting:
        """A poise at a place [m], or a hanger with a mass [kg] on it."""
        part: Any = self.poises[name] if name in self.poises else self.counterpoises[name]
        return Acting(cast("Pusher", part.pusher(name, self.drawing, place)), 1.0)

    def pushing(self, loads: Array, places: Mapping[str, Value], *, both_ways: bool = False) -> Pushing:
        """Everything that acts with some loads [kg] on, a case each, the poises at their places, (case) or one for all.

        both_ways  every case twice, the beam moving one way and the other
        """
        sense: Value = 1.0
        if both_ways:
            count = loads.size
            loads = np.concatenate([loads, loads])
            places = {n: np.concatenate([v, v]) if np.ndim(v) else v for n, v in places.items()}
            sense = np.repeat([1.0, -1.0], count).reshape(-1, 1, 1)
        extra = tuple(self.acting(n, v if np.ndim(v) == 0 else np.reshape(v, (-1, 1, 1))) for n, v in places.items())
        own = cast("WeightPush", self._load.pusher)
        hung = Acting(cast("Pusher", replace(own, size=1.0)), loads.reshape(-1, 1, 1))
        return replace(
            self.ready.pushing, cases=tuple(map(str, range(loads.size))), load=(hung,), rest=(*self._rest, *extra),
            sense=sense, effort=(), rubbing=both_ways,
        )  # fmt: skip

    def closed(self, pushing: Pushing) -> Closed:
        """The pose with the beam as drawn. Raises Faults: it does not move."""
        try:
            return level(self.ready, pushing, self.beam)
        except ArithmeticError:
            what = f"{self.beam_name} does not move when the load goes down"
            raise fault(("members", self.beam_name), what, "let the poises slide on the member that tilts") from None

    def terms(self, loads: Array) -> Terms:
        """What everything does to the beam with some loads [kg] on, a case each; one case if the pose is the same."""
        if self._known is None or self.settles:
            self._known = self._terms(loads if self.settles else np.zeros(1))
        return self._known

    def _terms(self, loads: Array) -> Terms:
        pushing = self.pushing(loads, {})
        closed = self.closed(pushing)
        field = pushing.field
        load = moments(self.ready, closed, pushing.load, unit=True)[0] * field
        weights = sum(moments(self.ready, closed, self._weights), start=given_moment(self.ready, closed))
        fixed = sum(moments(self.ready, closed, self._others), start=0.0)
        start, slope, hung = [], [], []
        for name, poise in self.poises.items():
            low, _ = poise.ends(self.drawing)
            length = poise.length(self.drawing)
            here, there = moments(self.ready, closed, [self.acting(name, low), self.acting(name, low + length)])
            start.append(here)
            slope.append((there - here) / length)
        for name in self.counterpoises:
            empty, full = moments(self.ready, closed, [self.acting(name, 0.0), self.acting(name, 1.0)])
            weights = weights + empty
            hung.append(full - empty)
        shape = np.broadcast_shapes((1, 1, 1), *(np.shape(v) for v in (weights, fixed, load, *start, *slope, *hung)))

        def flat(value: Value) -> Array:
            return np.array(np.broadcast_to(value, shape)[:, :, 0], float)

        def rows(values: Sequence[Value]) -> Array:
            return np.array([flat(v) for v in values]).reshape(-1, *shape[:2])

        return Terms(flat(weights + fixed), flat(fixed), flat(load), rows(start), rows(slope), rows(hung))

    def fulcrum(self) -> str:
        """The point that the beam turns about: its pin with the ground, else its first point."""
        points = self.mechanism.members[self.beam_name].points
        pinned = [p for p in points if p in self.drawing.pins and self.drawing.pins[p].hub == "ground"]
        return pinned[0] if pinned else points[0]


def hung_load(mechanism: Mechanism) -> Weight:
    """What is weighed. Raises Faults: nothing is, or it is no hung mass."""
    load = mechanism.load
    if not isinstance(load, Weight):
        what = "the model has no load to be weighed" if load is None else "what is weighed is a hung mass"
        raise fault("load", what, "[load] with mass_at and mass, the mass being the greatest that is to be weighed")
    return load


def one_case(mechanism: Mechanism, case: str | None) -> Mechanism:
    """As written, its cases left out, or with one of them. Raises Faults."""
    if case is None:
        return replace(mechanism, cases={})
    chosen: Case = mechanism.cases[case]
    if "load" in chosen.drop:
        raise fault(("cases", case, "drop"), "the load is what is weighed", "choose another case")
    return mechanism


def check_effect(scale: Scale, terms: Terms) -> None:
    """Raises Faults: a load or a poise that does nothing to the beam."""
    field = float(np.max(np.abs(scale.ready.pushing.field)))
    if field <= 0:
        raise fault("gravity", "without gravity nothing weighs anything", "give it a size")
    least = _IDLE * field * scale.drawing.size
    if np.all(np.abs(terms.load) <= least):
        what = "it does nothing to the beam: its point does not move up or down as the beam tilts"
        raise fault("load", what, "hang it on a point that does")
    for k, (name, poise) in enumerate(scale.poises.items()):
        mass = float(np.ravel(scale.drawing.value(poise.mass, "mass"))[0])
        if np.all(np.abs(terms.slope[k]) <= _IDLE * field * mass):
            what = "sliding it does nothing to the beam: its bar stands along gravity, or the member does not tilt"
            raise fault(("poises", name, "along"), what, "lay the bar level on a member that tilts")
    for k, name in enumerate(scale.counterpoises):
        if np.all(np.abs(terms.hung[k]) <= least):
            what = "a weight on it does nothing to the beam"
            raise fault(("counterpoises", name, "at"), what, "hang it on a point that moves up or down")
