"""Graduations: the marks of every poise on its bar, where they are cut."""

from __future__ import annotations

import numpy as np

from linkcalc.design.weighing.answer import Bar
from linkcalc.design.weighing.movers import Slide
from linkcalc.design.weighing.setting import Balancing
from linkcalc.faults import fault
from linkcalc.model.poises import LOAD, ZERO
from linkcalc.parts.pose import Array

_EDGE = 1e-9
_MOST = 5001


def bars(balancing: Balancing, step: float) -> tuple[Bar, ...]:
    """One bar a poise. step: [kg] between the lines of a poise that slides freely. Raises Faults: too many lines."""
    own = [s for s in balancing.slides if s.use == LOAD]
    # a poise that is alone shows the whole load; of several each shows its share
    base = balancing.least if len(own) == 1 and not balancing.hangers else 0.0
    out = []
    for k, slide in enumerate(balancing.slides):
        if slide.use == ZERO:
            loads, places = np.zeros(1), np.array([balancing.zero])
        elif slide.notches is not None:
            places = slide.notches
            loads = (base if slide.use == LOAD else 0.0) + slide.worth * np.abs(places - slide.start)
        else:
            loads = _lines(slide, base if slide.use == LOAD else 0.0, step)
            places = _places(balancing, k, slide, loads, base)
        out.append(_bar(balancing, slide, loads, places))
    return tuple(out)


def _lines(slide: Slide, base: float, step: float) -> Array:
    first, last = np.ceil(base / step * (1 - _EDGE) - _EDGE), np.floor((base + slide.span) / step * (1 + _EDGE) + _EDGE)
    if last - first + 1 > _MOST:
        what = f"{last - first + 1:.0f} lines on the bar of {slide.name}"
        raise fault(("poises", slide.name), what, f"a step that gives up to {_MOST} is wanted")
    return np.asarray(step * np.arange(first, last + 1))


def _places(balancing: Balancing, k: int, slide: Slide, loads: Array, base: float) -> Array:
    if slide.use == LOAD and balancing.scale.settles:
        return balancing.alone(k, loads - base + balancing.least)
    return np.asarray(slide.start + slide.way * (loads - (base if slide.use == LOAD else 0.0)) / slide.worth)


def _bar(balancing: Balancing, slide: Slide, loads: Array, places: Array) -> Bar:
    drawing = balancing.scale.drawing
    poise = balancing.scale.poises[slide.name]
    (x0, y0), (x1, y1) = ([float(np.ravel(v)[0]) for v in drawing.point(p)] for p in poise.along)
    fx, fy = (float(np.ravel(v)[0]) for v in drawing.point(balancing.scale.fulcrum()))
    length = float(np.hypot(x1 - x0, y1 - y0))
    x, y = x0 + (x1 - x0) * places / length - fx, y0 + (y1 - y0) * places / length - fy
    even = places if places.size < 2 else np.interp(
        np.arange(places.size), [0, places.size - 1], [places[0], places[-1]])  # fmt: skip
    # of notches that are not evenly spaced in load, evenness is that of their loads
    if places.size > 2 and loads[-1] != loads[0]:
        even = places[0] + (places[-1] - places[0]) * (loads - loads[0]) / (loads[-1] - loads[0])
    departure = np.where(np.abs(places - even) <= 1e-12 * length, 0.0, places - even)
    return Bar(
        slide.name, slide.use, slide.notches is not None, loads, places, x, y, departure, slide.worth,
        (slide.start, slide.stop), length, poise.along,
    )  # fmt: skip
