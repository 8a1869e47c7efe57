"""Peaks and roots of sampled curves: located on the polynomial through seven neighbouring samples, evaluated there.

Over seven even steps of a smooth curve the polynomial is nearly exact, so one evaluation of all of them in one batch
confirms the place; those that it does not confirm (a kink, a pole near by) are refined in brackets.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.refine import Curve, horner, peaks, roots, summit_of
from linkcalc.parts.pose import Array, Mask, Numbers

_WIDE = 7
_EVEN = np.linspace(-1, 1, _WIDE)
_TO_POWERS = np.linalg.inv(np.vander(_EVEN, increasing=True))
_POWERS = np.arange(1.0, _WIDE)[:, None]
_HALF = (_WIDE - 1) / 2
_DIFFERENCE = np.array([1.0, -7, 21, -35, 35, -21, 7, -1])  # what a polynomial of degree 6 has none of
_STILL = 1e-10  # of the step between samples: no correction worth making
_ZERO = 1e-13  # of the curve's size: a sample that is nothing but rounding
_RIVAL = 1e-3  # of the curve's size: humps foretold as close to the highest are looked at too
_FAINT = 1e-6  # of the curve's size: what is smaller need not be foretold better
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


class Peaks:
    """The largest value of each curve: foretold from the samples alone, then confirmed.

    Of a curve with several humps each that could be the highest is looked at: the samples may show another.

    place  (places) where the polynomials have them, in the order of the curves
    curve  (places) the curve of each
    """

    def __init__(self, samples: Samples):
        self._samples = samples
        # what is no number is no peak; what has no bound is the highest there is
        y = np.where(np.isnan(samples.values), -np.inf, samples.values)
        self.curve = np.arange(len(y))
        self._top = np.argmax(y, axis=1) if y.size else np.zeros(0, np.intp)
        self.place = samples.where[self._top]
        self._foretold = samples.values[self.curve, self._top]
        if samples.where.size >= _WIDE and len(y):
            self._look_at_humps(y)

    @property
    def foretold(self) -> Array:
        """(curves) the largest value of each as its polynomials have it; -inf where it has no number at all."""
        told = np.where(np.isnan(self._foretold), -np.inf, self._foretold)
        count = len(self._samples.values)
        return np.maximum.reduceat(told, np.searchsorted(self.curve, np.arange(count))) if count else told

    def _look_at_humps(self, y: Array) -> None:
        every, highest = self.curve, self._top
        humps = y > -np.inf
        humps[:, 1:] &= y[:, 1:] > y[:, :-1]
        humps[:, :-1] &= y[:, :-1] >= y[:, 1:]
        humps[every, highest] = True
        curve, top = np.nonzero(humps)
        place, foretold = self._foretell(curve, top)
        best = np.maximum.reduceat(foretold, np.searchsorted(curve, every))
        could = (foretold >= (best - _RIVAL * _sizes(self._samples.values))[curve]) | (top == highest[curve])
        self.curve, self._top, self.place, self._foretold = (v[could] for v in (curve, top, place, foretold))

    def _foretell(self, curve: Numbers, top: Numbers) -> tuple[Array, Array]:
        """Places and values of the summits beside some samples; where no number is near, of the samples."""
        samples, count = self._samples, self._samples.where.size
        low, high = self._beside(top)
        first, power = _polynomial(samples, curve, top - _WIDE // 2)
        t = summit_of(power, (low - first) / _HALF - 1, (high - first) / _HALF - 1)
        index = first + (t + 1) * _HALF
        # exactly the sample where it is the sample: the ends of the stroke are told as given
        nearest = np.minimum(np.maximum(np.rint(index).astype(int), 0), count - 1)
        place = np.where(
            np.abs(index - nearest) < 1e-12, samples.where[nearest], samples.where[0] + samples.step * index
        )
        best = samples.values[curve, top]
        sound = np.isfinite([samples.values[curve, low], best, samples.values[curve, high]]).all(axis=0)
        return np.where(sound, place, samples.where[top]), np.where(sound, horner(t, power), best)

    def _beside(self, top: Numbers) -> tuple[Numbers, Numbers]:
        return np.maximum(top - 1, 0), np.minimum(top + 1, self._samples.where.size - 1)

    def confirmed(self, f: Curve, only: Numbers) -> tuple[Array, Array]:
        """Places and values, both (only), of some of the curves, in rising order; they can be had anywhere."""
        asked = np.zeros(len(self._samples.values), bool)
        asked[only] = True
        k = np.nonzero(asked[self.curve])[0]
        place, value = self._each(f, k)
        rank = np.lexsort((np.where(np.isnan(value), -np.inf, value), self.curve[k]))
        best = rank[np.searchsorted(self.curve[k], only, side="right") - 1]
        return place[best], value[best]

    def _each(self, f: Curve, k: Numbers) -> tuple[Array, Array]:
        """Places and values of some of the humps."""
        where, values, count = self._samples.where, self._samples.values, self._samples.where.size
        curve, top, place = self.curve[k], self._top[k], self.place[k]
        best = values[curve, top]
        if count == 1 or not k.size:
            return place, best
        low, high = self._beside(top)
        if count < _WIDE:
            return peaks(lambda x, which: f(x, curve[which]), where[low], where[high])
        found = f(place, curve)
        # compared with what is near: beside a dead point the rest of a curve may be larger without bound
        near = np.max(np.abs([values[curve, low], best, values[curve, high]]), axis=0)
        size = np.maximum(np.where(np.isfinite(near), near, 0.0), _FAINT * _sizes(values)[curve])
        # a peak at the very end of the stroke needs no search, unless there is a kink before it
        at_end = ((top == 0) | (top == count - 1)) & (place == where[top])
        end = at_end & self._smooth_to_end(curve, top, size)
        with np.errstate(invalid="ignore"):
            sure = (np.abs(found - self._foretold[k]) <= _AGREES * size) & (found >= best - 1e-14 * size) & ~at_end
        sure |= ~np.isfinite(best)  # there is no such curve, or it has no bound
        value = np.where(end | ~np.isfinite(best), best, found)
        doubt = np.nonzero(~(sure | end))[0]
        if doubt.size:
            place[doubt], value[doubt] = peaks(
                lambda x, which: f(x, curve[doubt[which]]), where[low[doubt]], where[high[doubt]]
            )
        return place, value

    def _smooth_to_end(self, curve: Numbers, top: Numbers, size: Array) -> Mask:
        """Whether the last sample is where the seven before it foretell it: a kink between would throw it off, by no
        less than the peak stands above it."""
        values = self._samples.values
        if values.shape[1] <= _WIDE:
            return np.zeros(top.shape, bool)
        back = np.arange(_WIDE + 1)
        at = np.where(top[:, None] > 0, values.shape[1] - 1 - back, back)
        with np.errstate(invalid="ignore"):
            smooth: Mask = np.abs(values[curve[:, None], at] @ _DIFFERENCE) <= _FAINT * size
        return smooth


class Roots:
    """All passages of curves through zero between samples: foretold from the samples alone, then confirmed.

    place  (roots) where the polynomials have them
    curve  (roots) number of the curve of each, rising
    """

    def __init__(self, samples: Samples):
        self._samples = samples
        y, count = samples.values, samples.where.size
        self.place, self.curve = np.zeros(0), np.zeros(0, np.intp)
        self._low = self._high = self.curve
        if count < 2 or not len(y):
            return
        # a sample that is zero to rounding counts with the side before it, so the bracket reaches back to that side
        self._size = _sizes(y)
        self._y = y = np.where(np.abs(y) <= _ZERO * self._size[:, None], 0.0, y)
        start = np.maximum.accumulate(np.where(y != 0.0, np.arange(count), 0), axis=1)
        sign = np.sign(y[np.arange(len(y))[:, None], start])
        with np.errstate(invalid="ignore"):
            self.curve, at = np.nonzero(sign[:, :-1] * sign[:, 1:] < 0)
        self._low, self._high = start[self.curve, at], at + 1
        if count >= _WIDE and self.curve.size:
            self._foretell()
        else:
            self.place = (samples.where[self._low] + samples.where[self._high]) / 2

    def _foretell(self) -> None:
        samples, curve, low, high = self._samples, self.curve, self._low, self._high
        first, power = _polynomial(samples, curve, low - _WIDE // 2 + 1)
        slope = power[1:] * _POWERS
        t_low, t_high = (low - first) / _HALF - 1, (high - first) / _HALF - 1
        y_low, y_high = samples.values[curve, low], samples.values[curve, high]
        with np.errstate(all="ignore"):
            t = t_low + (t_high - t_low) * y_low / (y_low - y_high)
            for _ in range(3):
                step = horner(t, power) / horner(t, slope)
                t = np.minimum(np.maximum(t - step, t_low), t_high)
        t = np.where(np.isfinite(t), t, (t_low + t_high) / 2)
        self.place = samples.where[0] + samples.step * (first + (t + 1) * _HALF)
        self._steep = horner(t, slope) / (samples.step * _HALF)

    def confirmed(self, f: Curve) -> Array:
        """(roots) places, of curves that can be had anywhere."""
        samples, curve = self._samples, self.curve
        if not curve.size:
            return self.place
        every = np.arange(curve.size)
        if samples.where.size < _WIDE:
            return self._bracketed(f, every)
        found = f(self.place, curve)
        # one step of Newton with the polynomial's slope squares what error is left; a step too small is not made
        with np.errstate(all="ignore"):
            step = found / self._steep
        better = np.where(np.abs(step) <= _STILL * abs(samples.step), self.place, self.place - step)
        ends = np.sort(samples.where[np.stack([self._low, self._high])], axis=0)
        sure = (np.abs(found) <= _AGREES * self._size[curve]) & (better >= ends[0]) & (better <= ends[1])
        doubt = np.nonzero(~sure)[0]
        if doubt.size:
            better[doubt] = self._bracketed(f, doubt)
        return better

    def _bracketed(self, f: Curve, k: Numbers) -> Array:
        curve, low, high = self.curve[k], self._low[k], self._high[k]
        where = self._samples.where
        return roots(
            lambda x, which: f(x, curve[which]), where[low], where[high], self._y[curve, low], self._y[curve, high]
        )


def _sizes(values: Array) -> Array:
    """Largest of absolute values, (curves), what is not finite left out."""
    sizes: Array = np.abs(values).max(axis=1, initial=1e-300, where=np.isfinite(values))
    return sizes


def _polynomial(samples: Samples, curve: Numbers, first: Numbers) -> tuple[Numbers, Array]:
    """First sample of each window of seven, and the polynomial through it, (powers, windows), on -1..1."""
    first = np.minimum(np.maximum(first, 0), samples.where.size - _WIDE)
    window = samples.values[curve[:, None], first[:, None] + np.arange(_WIDE)]
    return first, np.asarray(_TO_POWERS @ np.where(np.isfinite(window), window, 0.0).T, np.float64)


def sampled_peaks(f: Curve, samples: Samples) -> tuple[Array, Array]:
    """The largest value of each curve and where it is: (places, values), each (curves)."""
    return Peaks(samples).confirmed(f, np.arange(len(samples.values)))
