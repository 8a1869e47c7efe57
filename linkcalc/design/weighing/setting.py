"""Where the poises stand for a load, and the load for where they stand: linear in the places, so exact."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from linkcalc.design.weighing.movers import EDGE, hangers, slides
from linkcalc.design.weighing.scale import Scale, Terms
from linkcalc.faults import fault
from linkcalc.model.poises import LOAD, TARE, ZERO
from linkcalc.model.units import show
from linkcalc.parts.pose import Array

_ROUNDS = 60
_NOTHING = 1e-10  # of the capacity: a load that is left by rounding


@dataclass(frozen=True, eq=False)
class Setting:
    """What stands where for some loads.

    loads   (n) [kg]
    places  (poises, n) [m]
    hung    (counterpoises, n) [kg]
    left    (n) [kg] load that stays unbalanced, because only notches or weights are there; or because it is too large
            (plus) or too small (minus)
    """

    loads: Array
    places: Array
    hung: Array
    left: Array

    def at(self, scale: Scale) -> Mapping[str, Array]:
        """Places [m] and masses [kg] by name."""
        names = (*scale.poises, *scale.counterpoises)
        return dict(zip(names, (*self.places, *self.hung), strict=True))


class Balancing:
    """How a scale is balanced.

    slides, hangers  poises and counterpoises in the order of the file
    zero     [m] place of the zero poise at which the empty scale balances; nan without one; tare_place likewise
    least    [kg] load that balances with everything at nothing
    most     [kg] load that balances with everything at the most: the capacity
    """

    def __init__(self, scale: Scale, tare: float = 0.0):
        """tare: [kg] of the container, which the tare poise balances. Raises Faults."""
        self.scale, self.tare = scale, tare
        terms = scale.terms(np.zeros(1))
        self.slides, self.hangers = slides(scale, terms), hangers(scale, terms)
        self._base = np.array([s.start for s in self.slides])
        self._bare = np.zeros(len(self.hangers))
        self.zero = self._set(ZERO, 0.0)
        self.tare_place = self._set(TARE, tare)
        if tare and np.isnan(self.tare_place):
            raise fault("poises", f"no poise is there for a tare of {self._mass(tare)}", 'give one use = "tare"')
        stop = np.array([s.stop if s.use == LOAD else b for s, b in zip(self.slides, self._base, strict=True)])
        self.least = self.load(self._base, self._bare)
        self.most = self.load(stop, np.array([h.most for h in self.hangers]))

    @property
    def base(self) -> Array:
        """(poises) [m] places with no load on"""
        return self._base

    def load(self, places: Array, hung: Array) -> float:
        """[kg] the load that balances with the poises at places [m] and masses on the hangers [kg]."""
        found = last = 0.0
        for _ in range(_ROUNDS):
            terms = self.scale.terms(np.array([found + self.tare]))
            found, last = -float((self._moment(terms, places, hung) / terms.load)[0, 0]) - self.tare, found
            if not self.scale.settles or abs(found - last) <= 1e-13 * abs(found):
                break
        return found

    def setting(self, loads: Array) -> Setting:
        """Where everything stands for some loads [kg]: hangers first, then poises in the order of the file, notched
        ones at the last notch that is not too far."""
        loads = np.asarray(loads, float)
        terms = self.scale.terms(loads + self.tare)
        p = terms.load[:, 0]
        moment = self._moment(terms, self._base, self._bare)[:, 0] + (loads + self.tare) * p
        places, hung = np.repeat(self._base[:, None], loads.size, 1), np.zeros((len(self.hangers), loads.size))
        for k, hanger in enumerate(self.hangers):
            unit = terms.hung[k, :, 0]
            hung[k] = hanger.put_on(-moment / unit)
            moment = moment + unit * hung[k]
        for k, slide in enumerate(self.slides):
            if slide.use == LOAD:
                slope = terms.slope[k, :, 0]
                places[k] = slide.slid(slide.start - moment / slope)
                moment = moment + slope * (places[k] - slide.start)
        left = moment / p
        most = max(abs(self.most), abs(self.least), float(np.max(np.abs(loads), initial=0.0)))
        return Setting(loads, places, hung, np.where(np.abs(left) <= _NOTHING * most, 0.0, left))

    def alone(self, k: int, loads: Array) -> Array:
        """(n) [m] places of one poise for loads [kg], all others at nothing; off its bar if they are too large."""
        terms = self.scale.terms(loads + self.tare)
        moment = self._moment(terms, self._base, self._bare)[:, 0] + (loads + self.tare) * terms.load[:, 0]
        out: Array = self._base[k] - moment / terms.slope[k, :, 0]
        return out

    @property
    def fine(self) -> int | None:
        """Number of the poise that takes what the others leave: the last that slides freely. None: there is none."""
        free = [k for k, s in enumerate(self.slides) if s.use == LOAD and s.notches is None]
        return free[-1] if free else None

    def check(self, setting: Setting) -> None:
        """Raises Faults: loads that cannot be balanced, and what would balance them."""
        over, under = setting.loads[setting.left > 0], setting.loads[setting.left < 0]
        if over.size and over.max() > self.most * (1 + EDGE):
            top = float(over.max())
            what = f"{self._mass(top)} is over the capacity of {self._mass(self.most)} ({self._full()})"
            raise fault(*self._longer(top, what))
        if under.size:
            what = f"{self._mass(float(under.min()))} cannot be balanced: with everything at nothing it balances "
            cure = 'let the bar begin nearer to the fulcrum, or set the empty scale with a poise of use = "zero"'
            raise fault("load", what + self._mass(self.least), cure)

    def _moment(self, terms: Terms, places: Array, hung: Array) -> Array:
        """[N m] of everything but the load, (case, variant)."""
        way = places - np.array([s.start for s in self.slides])
        moment = terms.rest + terms.start.sum(axis=0) + np.einsum("k,kcv->cv", way, terms.slope)
        out: Array = moment + np.einsum("k,kcv->cv", hung, terms.hung)
        return out

    def _set(self, use: str, load: float) -> float:
        """[m] place of the poise for the empty scale, or for a tare [kg]; it stays there. nan without one."""
        found = [k for k, s in enumerate(self.slides) if s.use == use]
        if not found:
            return float("nan")
        k, slide = found[0], self.slides[found[0]]
        terms = self.scale.terms(np.array([load]))
        moment = load * terms.load[0, 0]
        if use == ZERO:
            moment = moment + self._moment(terms, self._base, self._bare)[0, 0]
        place = slide.start - float(moment / terms.slope[k, 0, 0])
        low, high = sorted((slide.start, slide.stop))
        if not low - EDGE * slide.length <= place <= high + EDGE * slide.length:
            what = "the empty scale" if use == ZERO else f"a tare of {self._mass(load)}"
            where = f"to balance {what} it would have to stand at {self._length(place)}"
            cure = "move it, or make its way longer or its mass larger" if use == ZERO else (
                f"up to {self._mass(slide.span)} goes; a longer bar or a heavier poise takes more")  # fmt: skip
            ends = f"it goes from {self._length(low)} to {self._length(high)}"
            raise fault(("poises", slide.name), f"{where}, and {ends}", cure)
        self._base[k] = place if slide.notches is None else float(slide.slid(np.array([place]))[0])
        return float(self._base[k])

    def _full(self) -> str:
        ends = [f"{s.name} at {self._length(s.stop)}" for s in self.slides if s.use == LOAD]
        return ", ".join(ends + [f"{self._mass(h.most)} on {h.name}" for h in self.hangers])

    def _longer(self, top: float, what: str) -> tuple[tuple[str, ...], str, str]:
        """The item that ends too soon, what is wrong, and how much more of it would do."""
        main = max((s for s in self.slides if s.use == LOAD), key=lambda s: s.span, default=None)
        more = top - self.most
        hanger = max(self.hangers, key=lambda h: h.ratio * h.most, default=None)
        if hanger is not None and (main is None or hanger.ratio * hanger.most > main.span):
            cure = f"{self._mass(hanger.most + more / hanger.ratio)} on {hanger.name} would do"
            return ("counterpoises", hanger.name), what, cure
        assert main is not None
        place = main.start + main.way * (main.length + more / main.worth)
        mass = float(np.ravel(self.scale.drawing.value(self.scale.poises[main.name].mass, "mass"))[0])
        heavier = self._mass(mass * (1 + more / main.span))
        cure = f"a bar that goes on to {self._length(place)}, or a poise of about {heavier}, would do"
        return ("poises", main.name), what, cure

    def _mass(self, value: float) -> str:
        return show(value, "mass", self.scale.mechanism.units, 6)

    def _length(self, value: float) -> str:
        return show(value, "length", self.scale.mechanism.units, 5)
