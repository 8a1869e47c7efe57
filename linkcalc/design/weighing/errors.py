"""How wrong a scale indicates: its marks stand where the drawing wants them, its levers and masses are a little off.

With the poises at the marks for a load, a copy of the scale with other sizes is out of balance by a moment r; the poise
that is shifted until it balances goes by r over its own moment for each metre, and that way is worth so much load on
the marks: error = r (B/p of the drawing) / (B of the copy), B and p being moments for a metre of poise and a kilogram.
"""

from __future__ import annotations

from collections.abc import Callable, Collection, Iterator, Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.design.weighing.movers import EDGE
from linkcalc.design.weighing.scale import Scale, Terms, probe
from linkcalc.design.weighing.setting import Balancing, Setting
from linkcalc.faults import fault
from linkcalc.mechanics.scales import holding
from linkcalc.model.dimensions import evaluate, tolerances
from linkcalc.model.mechanism import Mechanism
from linkcalc.parts.pose import Array

BLOCK = 8192
"""Copies that are laid out together."""
FRICTION = "friction"
_TAIL = 0.00135  # part of the copies beyond each bound: three standard deviations of a normal scatter
Progress = Callable[[int, int], None]


@dataclass(frozen=True, eq=False)
class Cause:
    """One reason for errors. low, high: (n) [kg] error of the indication with it at its lower and its upper end."""

    name: str
    kind: str
    lower: float
    upper: float
    low: Array
    high: Array

    @property
    def size(self) -> Array:
        """(n) [kg] the larger of both, whichever sense it has"""
        return np.asarray(np.maximum(np.abs(self.low), np.abs(self.high)))


@dataclass(frozen=True, eq=False)
class Scatter:
    """Errors of many copies, (n) [kg]: mean, standard deviation, and the bounds between which 99.73 % lie.

    failed  copies that cannot be drawn or do not weigh; they are counted in nothing else
    within  (n) part of the copies within the limits of the class; nan without one
    """

    copies: int
    failed: int
    mean: Array
    deviation: Array
    low: Array
    high: Array
    within: Array

    @property
    def size(self) -> Array:
        return np.asarray(np.maximum(np.abs(self.low), np.abs(self.high)))


def likely(causes: Sequence[Cause], n: int) -> Array:
    """(n) [kg] root of the sum of squares of all causes, friction added plainly."""
    squares = sum((c.size**2 for c in causes if c.name != FRICTION), start=np.zeros(n))
    return np.asarray(np.sqrt(squares) + sum((c.size for c in causes if c.name == FRICTION), start=np.zeros(n)))


def largest(causes: Sequence[Cause], n: int) -> Array:
    """(n) [kg] all causes at their worst together."""
    return np.asarray(sum((c.size for c in causes), start=np.zeros(n)))


def judged(causes: Sequence[Cause], scatter: Scatter | None, dimensions: Collection[str], n: int) -> Array:
    """(n) [kg] the error that is held against a class: the bounds of the copies and what these do not count; without
    copies the likely one."""
    if scatter is None:
        return likely(causes, n)
    others = sum((c.size for c in causes if c.name not in dimensions), start=np.zeros(n))
    return np.asarray(scatter.size + others)


class Judge:
    """What a scale as drawn indicates, and so how wrong another one is.

    zeroed  the empty scale is set to zero on each copy
    """

    def __init__(self, balancing: Balancing, setting: Setting, *, zeroed: bool):
        self.balancing, self.setting, self.zeroed = balancing, setting, zeroed
        self._nominal = balancing.scale.terms(setting.loads + balancing.tare)
        self._empty = balancing.setting(np.array([max(0.0, balancing.least)]))

    def coefficients(self, scale: Scale) -> tuple[Array, Array]:
        """(unknowns + 2, copies) moments for a metre of each poise, a kilogram on each hanger and of load, and of the
        rest; (copies) load on the marks for a moment of 1, of a scale whose pose does not hang on the load."""
        terms = scale.terms(np.zeros(1))
        rows = [*terms.slope[:, 0], *terms.hung[:, 0], terms.load[0], self._still(scale, terms)[0]]
        return np.array(np.broadcast_arrays(*rows)), np.broadcast_to(self._worth(terms)[0], np.shape(rows[-1]))

    def weighed(self, coefficients: Array, worth: Array, pick: slice) -> Array:
        """(loads, copies) [kg] errors at some of the loads."""
        on = self._settings(self.setting)[pick] - (self._settings(self._empty) if self.zeroed else 0.0)
        out: Array = (on @ coefficients) * worth
        return out

    def errors(self, scale: Scale) -> Array:
        """(n, copies) [kg] errors at all loads."""
        if not scale.settles:
            coefficients, worth = self.coefficients(scale)
            return self.weighed(coefficients, worth, slice(None))
        terms = scale.terms(self.setting.loads + self.balancing.tare)
        left = self._left(scale, terms, self.setting)
        if self.zeroed:
            empty = scale.terms(self._empty.loads + self.balancing.tare)
            left = left - self._left(scale, empty, self._empty)
            scale.terms(self.setting.loads + self.balancing.tare)
        out: Array = left * self._worth(terms)
        return out

    def _settings(self, setting: Setting) -> Array:
        """(n, unknowns + 2) what the coefficients are multiplied with."""
        rows = [*setting.places, *setting.hung, setting.loads + self.balancing.tare - setting.left]
        return np.array([*rows, np.ones(setting.loads.size)]).T

    def _left(self, scale: Scale, terms: Terms, setting: Setting) -> Array:
        on = self._settings(setting)
        rows = [*terms.slope, *terms.hung, terms.load, self._still(scale, terms)]
        left: Array = sum((on[:, k, None] * row for k, row in enumerate(rows)), start=np.zeros((1, 1)))
        return left

    def _still(self, scale: Scale, terms: Terms) -> Array:
        """[N m] of the rest and of every poise at the first point of its bar."""
        total = terms.rest
        for k, poise in enumerate(scale.poises.values()):
            start = np.reshape(poise.ends(scale.drawing)[0], (1, -1))
            total = total + terms.start[k] - terms.slope[k] * start
        return total

    def _worth(self, terms: Terms) -> Array:
        """[kg/(N m)]"""
        k = self.balancing.fine
        if k is None:
            return 1.0 / self._nominal.load
        return np.asarray(self._nominal.slope[k] / self._nominal.load / terms.slope[k])


def causes(judge: Judge, bare: Mechanism, *, turned: float, mark_error: float, band: Array) -> Iterator[Cause]:
    """Every reason by itself: tolerances, out of level, marks a little off, friction.

    bare        the ``probe`` as drawn
    turned      [rad] out of level, either way; mark_error [m] either way
    band        (n) [kg] half of the dead band of friction
    """
    beam, nominal = judge.balancing.scale.beam_name, judge.balancing.scale
    found = tolerances(bare)
    if found:
        sizes = evaluate(bare)
        names = list(found)
        own = {n: np.full(2 * len(names), float(np.ravel(sizes[n].value)[0])) for n in names}
        for k, name in enumerate(names):
            own[name][2 * k : 2 * k + 2] += [found[name].lower, found[name].upper]
        many = Scale(bare, beam, {n: v.reshape(1, -1, 1) for n, v in own.items()}, like=nominal)
        errors = np.broadcast_to(judge.errors(many), (judge.setting.loads.size, 2 * len(names)))
        for k, name in enumerate(names):
            t = found[name]
            yield Cause(name, t.kind, t.lower, t.upper, errors[:, 2 * k], errors[:, 2 * k + 1])
    if turned:
        ways = [judge.errors(Scale(probe(bare, beam, turned=s * turned), beam))[:, 0] for s in (-1, 1)]
        yield Cause("out of level", "angle", -turned, turned, *ways)
    for k, slide in enumerate(judge.balancing.slides if mark_error else ()):
        if slide.use == "load":
            # at nothing it rests against its stop
            off = np.abs(judge.setting.places[k] - slide.start) > EDGE * slide.length
            way = np.where(off, slide.worth * mark_error, 0.0)
            yield Cause(f"marks of {slide.name}", "length", -mark_error, mark_error, -way, way)
    if np.any(band > 0):
        yield Cause(FRICTION, "", np.nan, np.nan, -band, band)


def dead_band(mechanism: Mechanism, balancing: Balancing, setting: Setting) -> Array:
    """(n) [kg] load that may be added or taken away before the beam moves, by friction of the edges."""
    beam = balancing.scale.beam_name
    rubbing = Scale(probe(mechanism, beam, rubs=True), beam)
    if not rubbing.ready.pushing.rubbing:
        return np.zeros(setting.loads.size)
    loads = setting.loads + balancing.tare - setting.left
    pushing = rubbing.pushing(loads, setting.at(balancing.scale), both_ways=True)
    # the settled pose is that without friction
    still = balancing.scale.pushing(np.concatenate([loads, loads]), {})
    closed = balancing.scale.closed(still) if rubbing.settles else rubbing.closed(pushing)
    held = holding(rubbing.ready, closed, pushing)[:, 0, 0].reshape(2, -1)
    p = np.broadcast_to(balancing.scale.terms(loads).load[:, 0], loads.shape)
    return np.asarray(np.abs(held[0] - held[1]) / 2 / np.abs(p))


def drawn_sizes(mechanism: Mechanism, count: int, seed: int) -> dict[str, Array]:
    """Dimension -> (count) [SI] sizes of copies that scatter within the tolerances."""
    rng, sizes = np.random.default_rng(seed), evaluate(mechanism)
    out = {}
    for name, t in tolerances(mechanism).items():
        middle, half = (t.lower + t.upper) / 2, (t.upper - t.lower) / 2
        draws = {
            "normal": lambda: rng.normal(scale=1 / 3, size=count),
            "uniform": lambda: rng.uniform(-1, 1, count),
            "triangular": lambda: rng.triangular(-1, 0, 1, count),
        }
        out[name] = float(np.ravel(sizes[name].value)[0]) + middle + half * draws[t.distribution]()
    return out


def scatter(
    judge: Judge, bare: Mechanism, sizes: Mapping[str, Array], limit: Array | None, progress: Progress | None = None
) -> Scatter:
    """Errors of copies with the sizes given, block after block; of a rigid scale only a few numbers a copy are kept."""
    beam, nominal = judge.balancing.scale.beam_name, judge.balancing.scale
    count, n = next(iter(sizes.values())).size, judge.setting.loads.size
    kept: list[tuple[Array, Array]] = []
    whole: list[Array] = []
    # what settles does so under every load by itself
    block = max(1, BLOCK // n) if nominal.settles else BLOCK
    for first in range(0, count, block):
        part = {name: v[first : first + block].reshape(1, -1, 1) for name, v in sizes.items()}
        copies = Scale(bare, beam, part, like=nominal)
        width = next(iter(part.values())).size
        if copies.settles:
            whole.append(np.broadcast_to(judge.errors(copies), (n, width)))
        else:
            rows, worth = judge.coefficients(copies)
            kept.append((np.broadcast_to(rows, (rows.shape[0], width)), np.broadcast_to(worth, width)))
        if progress is not None:
            progress(min(first + block, count), count)
    rows = np.concatenate([k[0] for k in kept], 1) if kept else np.zeros((0, 0))
    worth = np.concatenate([k[1] for k in kept]) if kept else np.zeros(0)
    sound = np.isfinite(worth) & np.isfinite(rows).all(axis=0) if kept else np.isfinite(np.hstack(whole)).all(axis=0)
    if not sound.any():
        raise fault("dimensions", "none of the copies can be drawn and weighs", "give smaller tolerances")
    step = max(1, 4_000_000 // count)
    told: list[Sequence[Array]] = []
    for start in range(0, n, step):
        pick = slice(start, start + step)
        errors = judge.weighed(rows, worth, pick) if kept else np.concatenate([w[pick] for w in whole], 1)
        told.append(_told(errors if sound.all() else errors[:, sound], None if limit is None else limit[pick]))
    return Scatter(count, int(count - sound.sum()), *(np.concatenate(column) for column in zip(*told, strict=True)))


def _told(errors: Array, limit: Array | None) -> Sequence[Array]:
    count = errors.shape[1]
    mean, deviation = errors.mean(axis=1), errors.std(axis=1)
    within = np.full(mean.shape, np.nan) if limit is None else (np.abs(errors) <= limit[:, None]).mean(axis=1)
    k = int(_TAIL * count)
    ordered = np.partition(errors, (k, count - 1 - k), axis=1)
    return mean, deviation, ordered[:, k], ordered[:, count - 1 - k], within
