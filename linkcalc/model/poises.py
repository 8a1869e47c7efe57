"""What balances a load on a scale: poises that slide along a bar, counterpoises that are put on a hanger."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, Any, cast

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Pusher, Site, Size, Value
from linkcalc.parts.loads.weight import WeightPush

if TYPE_CHECKING:
    from linkcalc.model.sketch import Drawing

LOAD, TARE, ZERO = "load", "tare", "zero"


@dataclass(frozen=True)
class Poise:
    """A mass that slides along a bar of a member.

    along       line of the bar: places count from its first point towards the second
    start, stop places at which it balances least and most ("from" and "to" in a file); the ends of the line if left out
    at          where it stands when nothing is asked about it; `start` if left out
    use         "load": it balances what is weighed; "tare": the container; "zero": the empty scale
    notches     places of its notches: a spacing from `start` on, or a list; () if it slides freely
    notch_load  load between two notches, instead
    """

    along: tuple[str, str] = fields.names("point", "line of its bar: places count from the first point")
    mass: Size = fields.size("mass", "how much", sign="plus")
    on: str | None = fields.name("member", "the member it slides on, if several carry the line", None)
    offset: Size = fields.size("length", "its centre of mass to the left of the line; minus: right", 0)
    start: Size = fields.size("length", "its place at nothing", 0, sign="not minus")
    stop: Size | None = fields.size("length", "its place at the most; the end of the line if left out", None)
    at: Size | None = fields.size("length", "where it stands otherwise; 'from' if left out", None)
    use: str = fields.choice((LOAD, TARE, ZERO), "what it balances", LOAD)
    notches: Any = fields.places("length", "places of its notches: a spacing, or a list", ())
    notch_load: Size | None = fields.size("mass", "load between two notches", None, sign="plus")

    keys = {"start": "from", "stop": "to"}  # noqa: RUF012

    def member(self, drawing: Drawing) -> str:
        """The member it slides on: checked before that there is one."""
        both = [m for m in drawing.carriers(self.along[0]) if m in drawing.carriers(self.along[1])]
        return self.on or next(m for m in both if m != "ground")

    def length(self, drawing: Drawing) -> Value:
        """[m] length of the line"""
        (x0, y0), (x1, y1) = (drawing.point(p) for p in self.along)
        return np.hypot(x1 - x0, y1 - y0)

    def ends(self, drawing: Drawing) -> tuple[Value, Value]:
        """[m] its places at nothing and at the most"""
        stop = self.length(drawing) if self.stop is None else drawing.value(self.stop, "length")
        return drawing.value(self.start, "length"), stop

    def resting(self, drawing: Drawing) -> Value:
        """[m] its place when nothing is asked about it"""
        return drawing.value(self.start if self.at is None else self.at, "length")

    def spot(self, drawing: Drawing, place: Value) -> tuple[Value, Value]:
        """[m] where its centre of mass is drawn at some place on its bar"""
        (x0, y0), (x1, y1) = (drawing.point(p) for p in self.along)
        length, off = self.length(drawing), drawing.value(self.offset, "length")
        tx, ty = (x1 - x0) / length, (y1 - y0) / length
        return x0 + tx * place - ty * off, y0 + ty * place + tx * off

    def pusher(self, name: str, drawing: Drawing, place: Value | None = None) -> WeightPush:
        """Its weight at a place [m]; where it rests if none is given."""
        at = self.spot(drawing, self.resting(drawing) if place is None else place)
        site: Site = drawing.carried(self.member(drawing), at)
        return WeightPush(name, site, drawing.value(self.mass, "mass"))


@dataclass(frozen=True)
class Counterpoise:
    """A hanger on which weights are put.

    hanger  mass of the hanger itself
    weights the weights there are to put on; or the least step, if they are of all sizes
    put_on  mass on it when nothing is asked about it
    """

    at: str = fields.name("point", "the point it hangs from")
    weights: Any = fields.places("mass", "the weights that there are: a list; or the step, if any may be put on")
    on: str | None = fields.name("member", "the member it hangs on, if several carry the point", None)
    hanger: Size = fields.size("mass", "mass of the hanger itself", 0, sign="not minus")
    put_on: Size = fields.size("mass", "mass on it otherwise", 0, sign="not minus")
    most: Size | None = fields.size("mass", "the most that may be put on", None, sign="plus")

    def pusher(self, name: str, drawing: Drawing, mass: Value | None = None) -> WeightPush:
        """The weight of the hanger with some mass [kg] on it."""
        on = drawing.value(self.put_on, "mass") if mass is None else mass
        return WeightPush(name, drawing.site(self.at, self.on), drawing.value(self.hanger, "mass") + on)


def balancers(drawing: Drawing) -> dict[tuple[str, str], Pusher]:
    """Weights of all poises and counterpoises where they rest, by (case "", name)."""
    both: dict[str, Any] = {**drawing.mechanism.poises, **drawing.mechanism.counterpoises}
    return {("", name): cast("Pusher", part.pusher(name, drawing)) for name, part in both.items()}
