"""Extremes that stand where something passes through zero: without bound at a dead point, or nothing at a reversal."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.design.curves import Curves, Found, Wanted
from linkcalc.parts.pose import Array

_POLE = 1e-7  # of the stroke: how near a dead point is looked at to see whether a curve has a bound there
_RISE = 1e3  # times the largest of its usual values: without bound
_NOTHING = 1e-9  # of the largest value: nothing but rounding


def at_passages(curves: Curves, wanted: Sequence[Wanted]) -> dict[Wanted, Found]:
    """Extremes that stand where something passes through zero: at a dead point some curves have no bound, and where
    a force turns round, its size (and that of others that hang on it) is nothing. Neither is a smooth peak."""
    dead, zero = curves.dead, curves.zero
    if not zero or curves.drive.size < 2 or not wanted:
        return {}
    names = list(dict.fromkeys(w.name for w in wanted))
    near = beside(curves, dead)
    values = curves.at(names, np.concatenate([near, zero]))
    sizes = np.abs(values)
    largest = sizes[:, :, : near.size].max(axis=2, initial=0.0)
    smallest = sizes[:, :, near.size :].min(axis=2)
    out: dict[Wanted, Found] = {}
    for w in wanted:
        row, top = (names.index(w.name), w.case), curves.size(w.name)
        at = int(np.argmax(sizes[row][: near.size])) if near.size else 0
        rises = largest[row] > top and largest[row] > _RISE * _usual(curves, w)
        # a size has no bound at its largest only; a force with a sign runs off one way
        if rises and (w.sense > 0 if w.size else w.sense * values[row][at] > 0):
            out[w] = Found(dead[at // 2], w.sense * np.inf)
        elif w.sense < 0 and smallest[row] <= _NOTHING * top and (w.size or np.min(curves.samples(w.name)) >= 0):
            out[w] = Found(zero[int(np.argmin(sizes[row][near.size :]))], 0.0)
    return out


def beside(curves: Curves, dead: list[float]) -> Array:
    """Two places close to each dead point, one on either side."""
    low, high = min(curves.drive[0], curves.drive[-1]), max(curves.drive[0], curves.drive[-1])
    near = (high - low) * _POLE
    return np.clip(np.add.outer(dead, [-near, near]).ravel(), low, high)


def _usual(curves: Curves, w: Wanted) -> float:
    samples = curves.samples(w.name)[w.case]
    # the median, by sorting: numpy's own loads masked arrays when first called
    finite = np.sort(np.abs(samples[np.isfinite(samples)]))
    return float(finite[finite.size // 2]) if finite.size else 0.0


def worst(curves: Curves, wanted: Sequence[Wanted]) -> list[Found]:
    """Extremes found exactly, those without bound included."""
    known = at_passages(curves, wanted)
    left = [w for w in wanted if w not in known]
    found = dict(zip(left, curves.extremes(left), strict=True)) | known
    return [found[w] for w in wanted]
