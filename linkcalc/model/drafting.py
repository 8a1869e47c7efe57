"""Drawing the points: each construction after those it hangs on."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import numpy as np

from linkcalc.faults import fault
from linkcalc.model.gather import Gather
from linkcalc.model.order import ordered
from linkcalc.parts.contract import Sketch, Value
from linkcalc.parts.points import NoPlace

Place = tuple[Value, Value]


def draw(points: Mapping[str, Any], sketch: Sketch, places: dict[str, Place]) -> None:
    """Place every point, in any order of the file.

    points  name -> construction
    sketch  what constructions ask; it finds places drawn so far in `places`
    places  filled: name -> (x, y) [m], floats, or (1, variant, 1) with NaN for copies that have no such place

    Raises Faults: circles, constructions that give no place.
    """
    gather = Gather()
    order, circles = ordered({name: construction.needs() for name, construction in points.items()})
    for circle in circles:
        gather.add(("points", circle[0]), f"hangs on itself: {' -> '.join(circle)}", "place one of them otherwise")
    for name in order:
        if any(need in points and need not in places for need in points[name].needs()):
            continue  # what it hangs on is told already
        with gather.at("points", name), np.errstate(all="ignore"):
            places[name] = _place(points[name], sketch)
    gather.raise_any()


def _place(construction: Any, sketch: Sketch) -> Place:
    try:
        x, y = (plain(value) for value in construction.place(sketch))
    except NoPlace as reason:
        raise fault((construction.word,), str(reason)) from None
    if not all(np.any(np.isfinite(value)) for value in (x, y)):
        raise fault((), "it comes to no place", "a line it is measured from has no length, or a size is beyond reach")
    return x, y


def plain(value: Value) -> Value:
    """A single number as a Python float: the sign that it does not change."""
    return value if np.ndim(value) else float(value)
