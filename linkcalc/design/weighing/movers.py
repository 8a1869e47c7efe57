"""What is moved or put on to balance a load: poises on their bars, weights on hangers."""

from __future__ import annotations

import itertools
from dataclasses import dataclass

import numpy as np

from linkcalc.design.weighing.scale import Scale, Terms
from linkcalc.faults import fault
from linkcalc.model.poises import ZERO
from linkcalc.model.units import show
from linkcalc.parts.contract import Size
from linkcalc.parts.pose import Array

EDGE = 1e-9
"""Of its way: a poise that is but for rounding at a notch or at its end is there."""
_MOST_NOTCHES = 5000
_MOST_SETS = 14  # weights whose every choice is looked at


@dataclass(frozen=True, eq=False)
class Slide:
    """A poise on its bar, as drawn.

    start, stop  [m] places at nothing and at the most
    notches      [m] places of its notches, from nothing on; None: it slides freely
    worth        [kg/m] load for each metre of its way from start to stop
    """

    name: str
    use: str
    start: float
    stop: float
    notches: Array | None
    worth: float

    @property
    def way(self) -> float:
        """+1 or -1: how its place changes from start to stop"""
        return 1.0 if self.stop > self.start else -1.0

    @property
    def length(self) -> float:
        """[m] how far it goes"""
        return abs(self.stop - self.start)

    @property
    def span(self) -> float:
        """[kg] the most that it balances"""
        return self.worth * self.length

    def slid(self, wanted: Array) -> Array:
        """The places nearest to the wanted ones [m] that are not too far."""
        gone = np.clip(self.way * (wanted - self.start), 0.0, self.length)
        if self.notches is None:
            return self.start + self.way * gone
        marks = np.abs(self.notches - self.start)
        pick = np.searchsorted(marks, gone + EDGE * self.length, side="right") - 1
        return np.asarray(self.notches[np.maximum(pick, 0)])


@dataclass(frozen=True, eq=False)
class Hanger:
    """A hanger for weights.

    sums   [kg] what can be put on it, from nothing on; None: any number of steps up to `most`
    ratio  [-] load that a mass on it balances, over that mass
    """

    name: str
    sums: Array | None
    step: float
    most: float
    ratio: float

    def put_on(self, wanted: Array) -> Array:
        """[kg] the most that can be put on and is not too much."""
        wanted = np.clip(wanted, 0.0, self.most)
        if self.sums is None:
            return self.step * np.floor(wanted / self.step * (1 + EDGE) + EDGE)
        return np.asarray(self.sums[np.searchsorted(self.sums, wanted + EDGE * self.most, side="right") - 1])


def slides(scale: Scale, terms: Terms) -> tuple[Slide, ...]:
    """Raises Faults: one slides the wrong way, or has too few or too many notches."""
    return tuple(_slide(scale, name, terms, k) for k, name in enumerate(scale.poises))


def hangers(scale: Scale, terms: Terms) -> tuple[Hanger, ...]:
    """Raises Faults: one hangs on the side of the load, or has no end of weights."""
    return tuple(_hanger(scale, name, terms, k) for k, name in enumerate(scale.counterpoises))


def _one(scale: Scale, size: Size, kind: str) -> float:
    return float(np.ravel(scale.drawing.value(size, kind))[0])


def _slide(scale: Scale, name: str, terms: Terms, k: int) -> Slide:
    poise = scale.poises[name]
    start, stop = (float(np.ravel(e)[0]) for e in poise.ends(scale.drawing))
    worth = -(1.0 if stop > start else -1.0) * float(terms.slope[k, 0, 0] / terms.load[0, 0])
    if worth < 0 and poise.use != ZERO:
        what = "it slides the wrong way: further on it balances less load, not more"
        raise fault(("poises", name), what, "swap 'from' and 'to', or the two points of 'along'")
    return Slide(name, poise.use, start, stop, _notches(scale, name, start, stop, worth), worth)


def _notches(scale: Scale, name: str, start: float, stop: float, worth: float) -> Array | None:
    poise = scale.poises[name]
    way, span = (1.0 if stop > start else -1.0), abs(stop - start)
    if isinstance(poise.notches, tuple):
        if poise.notches:
            places = np.array([_one(scale, p, "length") for p in poise.notches])
            return np.asarray(start + way * np.sort(np.abs(places - start)), np.float64)
        if poise.notch_load is None:
            return None
        step = _one(scale, poise.notch_load, "mass") / worth
    else:
        step = _one(scale, poise.notches, "length")
    count = int(span / step * (1 + EDGE)) + 1
    if count < 2 or count > _MOST_NOTCHES:
        units = scale.mechanism.units
        spread = f"{show(step, 'length', units)} on a way of {show(span, 'length', units)}"
        what = f"{count} notch{'es' * (count != 1)} at {spread}"
        raise fault(("poises", name), what, f"2 to {_MOST_NOTCHES} are wanted")
    return np.asarray(start + way * step * np.arange(count), np.float64)


def _hanger(scale: Scale, name: str, terms: Terms, k: int) -> Hanger:
    part, item = scale.counterpoises[name], ("counterpoises", name)
    ratio = -float(terms.hung[k, 0, 0] / terms.load[0, 0])
    if ratio < 0:
        what = "it hangs on the wrong side: a weight on it acts as the load does"
        raise fault((*item, "at"), what, "hang it on the other arm")
    most = None if part.most is None else _one(scale, part.most, "mass")
    if not isinstance(part.weights, tuple):
        step = _one(scale, part.weights, "mass")
        if most is None:
            what = f"weights in steps of {show(step, 'mass', scale.mechanism.units)} without an end"
            raise fault(item, what, "tell with 'most' how much may be put on, or list the weights")
        return Hanger(name, None, step, step * int(most / step * (1 + EDGE)), ratio)
    weights = [_one(scale, w, "mass") for w in part.weights]
    if len(weights) > _MOST_SETS:
        raise fault((*item, "weights"), f"{len(weights)} weights", f"up to {_MOST_SETS} are wanted")
    sums = sorted({round(sum(c), 12) for r in range(len(weights) + 1) for c in itertools.combinations(weights, r)})
    found = np.array([s for s in sums if most is None or s <= most * (1 + EDGE)])
    return Hanger(name, found, 0.0, float(found[-1]), ratio)
