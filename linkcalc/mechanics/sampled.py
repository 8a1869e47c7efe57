"""Peaks and roots of sampled curves: located on the polynomial through seven neighbouring samples, evaluated there.

Over seven even steps of a smooth curve the polynomial is nearly exact, so one evaluation of all of them in one batch
confirms the place; those that it does not confirm (a kink, a pole near by) are refined in brackets.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.polynomial import chebyshev
from numpy.typing import NDArray

from linkcalc.mechanics.refine import Curve, peaks, roots, summit_of
from linkcalc.parts.pose import Array

_WIDE = 7
_EVEN = np.linspace(-1, 1, _WIDE)
_TO_SERIES = np.linalg.inv(chebyshev.chebvander(_EVEN, _WIDE - 1))
_ZERO = 1e-13  # of the curve's size: a sample that is nothing but rounding
_AGREES = 1e-9  # of the curve's size: how well the polynomial must foretell what is found


@dataclass(frozen=True, eq=False)
class Samples:
    """Curves sampled at evenly spread places.

    where  (samples)          values (curves, samples)
    """

    where: Array
    values: Array

    @property
    def step(self) -> float:
        return float(self.where[1] - self.where[0])


def sampled_peaks(f: Curve, samples: Samples) -> tuple[Array, Array]:
    """The largest value of each curve and where it is: (places, values), each (curves)."""
    count = samples.where.size
    every = np.arange(len(samples.values))
    if count == 1 or not len(every):
        return np.full(every.shape, samples.where[0] if count else np.nan), samples.values[
            :, 0
        ] if count else every * 0.0
    y = np.where(np.isfinite(samples.values), samples.values, -np.inf)
    top = np.argmax(y, axis=1)
    low, high = np.maximum(top - 1, 0), np.minimum(top + 1, count - 1)
    if count < _WIDE:
        return peaks(f, samples.where[low], samples.where[high])
    place, foretold = _on_polynomial(samples, top, low, high)
    found = f(place, every)
    size = np.maximum(np.abs(samples.values).max(axis=1, initial=0.0, where=np.isfinite(samples.values)), 1e-300)
    best = samples.values[every, top]
    sure = (np.abs(found - foretold) <= _AGREES * size) & (found >= best - 1e-14 * size)
    # a peak at the very end of the stroke needs no search
    end = ((top == 0) | (top == count - 1)) & (place == samples.where[top])
    value = np.where(end, best, found)
    doubt = np.nonzero(~(sure | end))[0]
    if doubt.size:
        place[doubt], value[doubt] = peaks(
            lambda x, which: f(x, doubt[which]), samples.where[low[doubt]], samples.where[high[doubt]]
        )
    return place, value


def _on_polynomial(samples: Samples, top: Array, low: Array, high: Array) -> tuple[Array, Array]:
    count = samples.where.size
    first = np.clip(top - _WIDE // 2, 0, count - _WIDE)
    window = np.take_along_axis(samples.values, first[:, None] + np.arange(_WIDE), axis=1)
    series = np.where(np.isfinite(window), window, 0.0) @ _TO_SERIES.T
    half = (_WIDE - 1) / 2
    t = summit_of(series, (low - first) / half - 1, (high - first) / half - 1)
    place = samples.where[0] + samples.step * (first + (t + 1) * half)
    # exactly the sample where it is the sample: the ends of the stroke are told as given
    nearest = np.clip(np.round(first + (t + 1) * half).astype(int), 0, count - 1)
    place = np.where(np.abs(place - samples.where[nearest]) < 1e-12 * abs(samples.step), samples.where[nearest], place)
    return place, chebyshev.chebval(t, series.T, tensor=False)


def sampled_roots(f: Curve, samples: Samples) -> tuple[Array, NDArray[np.intp]]:
    """All passages through zero between samples: (places, number of the curve), in the order of the curves."""
    y, count = samples.values, samples.where.size
    none = np.zeros(0), np.zeros(0, np.intp)
    if count < 2 or not len(y):
        return none
    # a sample that is zero to rounding counts with the side before it, so the bracket reaches back to that side
    size = np.abs(y).max(axis=1, initial=0.0, where=np.isfinite(y))[:, None]
    y = np.where(np.abs(y) <= _ZERO * size, 0.0, y)
    start = np.where(y != 0.0, np.arange(count), 0)
    start = np.maximum.accumulate(start, axis=1)
    sign = np.sign(np.take_along_axis(y, start, axis=1))
    with np.errstate(invalid="ignore"):
        curve, at = np.nonzero(sign[:, :-1] * sign[:, 1:] < 0)
    if not curve.size:
        return none
    low, high = start[curve, at], at + 1
    if count < _WIDE:
        return _bracketed(f, samples, y, curve, low, high), curve
    place, steep = _root_of_polynomial(samples, curve, low, high)
    found = f(place, curve)
    # one step of Newton with the polynomial's slope squares what error is left
    with np.errstate(all="ignore"):
        better = place - found / steep
    ends = np.sort(samples.where[np.stack([low, high])], axis=0)
    sure = (np.abs(found) <= _AGREES * size[curve, 0]) & (better >= ends[0]) & (better <= ends[1])
    doubt = np.nonzero(~sure)[0]
    if doubt.size:
        better[doubt] = _bracketed(f, samples, y, curve[doubt], low[doubt], high[doubt])
    return better, curve


def _bracketed(
    f: Curve, samples: Samples, y: Array, curve: NDArray[np.intp], low: NDArray[np.intp], high: NDArray[np.intp]
) -> Array:
    return roots(
        lambda x, which: f(x, curve[which]), samples.where[low], samples.where[high], y[curve, low], y[curve, high]
    )


def _root_of_polynomial(
    samples: Samples, curve: NDArray[np.intp], low: NDArray[np.intp], high: NDArray[np.intp]
) -> tuple[Array, Array]:
    """Place of the root on the polynomial through seven samples, and the polynomial's slope there."""
    first = np.clip(low - _WIDE // 2 + 1, 0, samples.where.size - _WIDE)
    window = samples.values[curve[:, None], first[:, None] + np.arange(_WIDE)]
    series = (np.where(np.isfinite(window), window, 0.0) @ _TO_SERIES.T).T
    slope = chebyshev.chebder(series)
    half = (_WIDE - 1) / 2
    t_low, t_high = (low - first) / half - 1, (high - first) / half - 1
    y_low, y_high = samples.values[curve, low], samples.values[curve, high]
    t = t_low + (t_high - t_low) * y_low / (y_low - y_high)
    for _ in range(6):
        with np.errstate(all="ignore"):
            step = chebyshev.chebval(t, series, tensor=False) / chebyshev.chebval(t, slope, tensor=False)
        t = np.clip(t - np.nan_to_num(step), t_low, t_high)
    place = samples.where[0] + samples.step * (first + (t + 1) * half)
    return place, chebyshev.chebval(t, slope, tensor=False) / (samples.step * half)
