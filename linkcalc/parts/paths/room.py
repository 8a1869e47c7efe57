"""Is there room for a rope as drawn: no end within a pulley, no pulleys in one another, no rope across a pulley."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts.contract import Sketch
from linkcalc.parts.paths.over_pulleys import OverPulleys, Wheel

_NEAR = 1e-9  # of the drawing
_ROUND = np.radians(315.0)
"""An arc beyond this is one on the wrong side: the two straight parts would cross each other beside the pulley."""


def check_room(path: OverPulleys, sketch: Sketch, names: Sequence[str]) -> None:
    """Looked at with the mechanism's own sizes; a copy that has no room is not a number.

    names  of the points, in order. Raises Faults.
    """
    places = [sketch.point(name) for name in names]
    if any(np.ndim(v) for place in places for v in place) or any(np.ndim(w.radius) for w in path.wheels):
        return
    spots = [np.array(place, float) for place in places]
    for a, b in pairwise(zip(names, spots, path.wheels, strict=True)):
        _neighbours(sketch, a, b)
    _arcs(path, sketch, names)
    _crossings(path, sketch, names, spots)


def _neighbours(sketch: Sketch, a: tuple[str, np.ndarray, Wheel], b: tuple[str, np.ndarray, Wheel]) -> None:
    """Two wheels one after the other must leave room for a tangent."""
    (first, p, v), (second, q, w) = a, b
    apart = float(np.hypot(*(q - p)))
    needs = abs(w.side * float(w.radius) - v.side * float(v.radius))
    if apart > needs + _NEAR * sketch.size:
        return
    if first == second or apart <= _NEAR * sketch.size:
        raise fault(("path",), f"it goes from {first} to {second}, which is the same place", "a way is wanted between")
    if v.radius and w.radius:
        what = f"pulleys {first} and {second} overlap: the centres are {sketch.shown(apart)} apart"
        raise fault(("path",), what, f"more than {sketch.shown(needs)} is wanted")
    end, pulley, radius = (first, second, w.radius) if w.radius else (second, first, v.radius)
    what = f"{end} lies within the pulley at {pulley}: {sketch.shown(apart)} from its centre"
    raise fault(("path",), what, f"more than its radius of {sketch.shown(float(radius))} is wanted")


def _arcs(path: OverPulleys, sketch: Sketch, names: Sequence[str]) -> None:
    run = path.run(sketch.drawn)
    for name, wheel, arc in zip(names, path.wheels, path.arcs(sketch.drawn, run), strict=True):
        if not wheel.fixed and float(arc) > _ROUND:
            other = "left" if wheel.side > 0 else "right"
            what = f"it crosses the pulley at {name}, and would go round it by {np.degrees(float(arc)):.0f} deg"
            raise fault(("path",), what, f"wrap = {other!r} is wanted there")


def _crossings(path: OverPulleys, sketch: Sketch, names: Sequence[str], spots: Sequence[np.ndarray]) -> None:
    """A straight part across another pulley of the rope. Sheaves on one axle lie side by side, so they may."""
    run = path.run(sketch.drawn)
    for k, (way, length) in enumerate(zip(run.ways, run.lengths, strict=True)):
        d = np.array(way, float)
        wheel = path.wheels[k]
        start = spots[k] - wheel.side * float(wheel.radius) * np.array([-d[1], d[0]])
        for j, (name, centre, other) in enumerate(zip(names, spots, path.wheels, strict=True)):
            own = [spots[k], spots[k + 1]]
            if j in (k, k + 1) or min(float(np.hypot(*(centre - s))) for s in own) <= _NEAR * sketch.size:
                continue
            along = float(np.clip((centre - start) @ d, 0.0, float(length)))
            clear = float(np.hypot(*(centre - start - along * d)))
            if clear < float(other.radius) - _NEAR * sketch.size:
                what = f"from {names[k]} to {names[k + 1]} it crosses the pulley at {name}"
                raise fault(("path",), what, "another order, another side or a smaller pulley is wanted")
