"""Roots and peaks found exactly, many at a time: every round evaluates all of them in one batch.

Roots by Chandrupatla's method (inverse quadratic interpolation where it is safe, else bisection; T. R. Chandrupatla,
Advances in Engineering Software 28, 1997, pp. 145-149). Peaks by interpolation on Chebyshev points, the bracket
shrinking round the peak of the polynomial, or round the best point where the curve has a kink.
"""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from linkcalc.parts.pose import Array, Mask, Numbers

Curve = Callable[[Array, Numbers], Array]
"""f(where, which) -> values: at each place the curve of that number."""

_NODES = np.cos(np.pi * np.arange(7) / 6)[::-1]  # -1 .. 1
_TO_SERIES = np.linalg.inv(np.cos(np.arange(7) * np.arccos(_NODES)[:, None]))  # Chebyshev series through the nodes
_TO_POWERS = np.linalg.inv(np.vander(_NODES, increasing=True))  # powers of the polynomial through the nodes
_POWERS = np.arange(1.0, 7.0)[:, None]
_FINE = np.linspace(-1, 1, 97)
_FINE_POWERS = np.vander(_FINE, 7, increasing=True).T
_SHRINK = 0.1
_ROUNDS = 30


def roots(f: Curve, low: Array, high: Array, f_low: Array, f_high: Array, tolerance: float = 1e-14) -> Array:
    """Where curves pass through zero between two places of opposite sign: (curves).

    tolerance  of the width of each bracket
    """
    a, b, fa, fb = high.astype(float), low.astype(float), f_high.astype(float), f_low.astype(float)
    c, fc = a.copy(), fa.copy()
    t = np.full(a.shape, 0.5)
    width = np.abs(high - low)
    which = np.arange(a.size)
    best = np.where(np.abs(fa) < np.abs(fb), a, b)
    for _ in range(60):
        x = a + t * (b - a)
        fx = np.full(a.shape, np.nan)
        live = (np.abs(b - a) > tolerance * width) & (fa != 0) & (fb != 0)
        if not live.any():
            break
        fx[live] = f(x[live], which[live])
        same = live & (np.sign(fx) == np.sign(fa))
        other = live & ~same
        c = np.where(same, a, np.where(other, b, c))
        fc = np.where(same, fa, np.where(other, fb, fc))
        b = np.where(other, a, b)
        fb = np.where(other, fa, fb)
        a = np.where(live, x, a)
        fa = np.where(live, fx, fa)
        best = np.where(np.abs(fa) < np.abs(fb), a, b)
        with np.errstate(all="ignore"):
            xi, phi = (a - b) / (c - b), (fa - fb) / (fc - fb)
            quadratic = (phi * phi < xi) & ((1 - phi) ** 2 < 1 - xi)
            t = np.where(
                quadratic,
                fa / (fb - fa) * fc / (fb - fc) + (c - a) / (b - a) * fa / (fc - fa) * fb / (fc - fb),
                0.5,
            )
            edge = np.clip(0.5 * tolerance * width / np.abs(b - a), 0, 0.5)
        t = np.clip(np.where(np.isfinite(t), t, 0.5), edge, 1 - edge)
    return best


def peaks(f: Curve, low: Array, high: Array, tolerance: float = 1e-9) -> tuple[Array, Array]:
    """Largest values of curves within brackets, ends included, and where they are: (places, values).

    tolerance  of the width of each bracket, for the place; the value is then as exact as the curve
    """
    low, high = low.astype(float), high.astype(float)
    first_low, first_high = low.copy(), high.copy()
    which = np.arange(low.size)
    width = np.abs(high - low)
    place, value = low.copy(), np.full(low.shape, -np.inf)
    live = np.ones(low.shape, bool)
    for _ in range(_ROUNDS):
        k = which[live]
        middle, half = (low[k] + high[k]) / 2, (high[k] - low[k]) / 2
        x = middle[:, None] + half[:, None] * _NODES
        x[:, 0], x[:, -1] = low[k], high[k]  # without rounding: an end is told as it was given
        y = f(x.ravel(), np.repeat(k, _NODES.size)).reshape(x.shape)
        y = np.where(np.isnan(y), -np.inf, y)
        top = np.argmax(y, axis=1)
        rows = np.arange(k.size)
        better = y[rows, top] > value[k]
        place[k] = np.where(better, x[rows, top], place[k])
        value[k] = np.where(better, y[rows, top], value[k])
        at, smooth = _summit(y)
        around = np.where(smooth, _SHRINK, 1.0)
        new_low = np.where(smooth, at - around, _NODES[np.maximum(top - 1, 0)])
        new_high = np.where(smooth, at + around, _NODES[np.minimum(top + 1, _NODES.size - 1)])
        low[k] = np.clip(
            middle + half * new_low, np.minimum(first_low, first_high)[k], np.maximum(first_low, first_high)[k]
        )
        high[k] = np.clip(
            middle + half * new_high, np.minimum(first_low, first_high)[k], np.maximum(first_low, first_high)[k]
        )
        done = np.abs(high[k] - low[k]) <= tolerance * width[k]
        # the value cannot gain any more than rounding: the parabola's rise over the bracket is below it
        best = y[rows, top]
        boundless = np.isinf(best)
        with np.errstate(invalid="ignore"):
            flat = smooth & (best - y.min(axis=1) <= 1e-15 * np.abs(best))
        live[k[done | flat | boundless]] = False
        if not live.any():
            break
    return place, value


def _summit(y: Array) -> tuple[Array, Mask]:
    """Peak of the polynomial through the nodes, on -1..1, and whether the polynomial is to be believed."""
    with np.errstate(all="ignore"):
        series = y @ _TO_SERIES.T
        spread = np.max(np.abs(series[:, 1:]), axis=1)
        smooth = np.isfinite(spread) & (np.abs(series[:, -2:]).max(axis=1) <= 0.02 * spread)
    power = _TO_POWERS @ np.where(np.isfinite(spread)[:, None], y, 0.0).T
    return summit_of(power, np.full(len(y), -1.0), np.full(len(y), 1.0)), smooth


def horner(t: Array, power: Array) -> Array:
    """Values at t (curves) of polynomials, (powers, curves), lowest power first."""
    total = power[-1]
    for coefficient in power[-2::-1]:
        total = total * t + coefficient
    return total


def summit_of(power: Array, low: Array, high: Array) -> Array:
    """Where polynomials of degree 6, (powers, curves), are largest between two places of -1..1 each: (curves)."""
    inside = (low[:, None] - 1e-12 <= _FINE) & (high[:, None] + 1e-12 >= _FINE)
    x = _FINE[np.argmax(np.where(inside, power.T @ _FINE_POWERS, -np.inf), axis=1)]
    first = power[1:] * _POWERS
    second = first[1:] * _POWERS[:-1]
    with np.errstate(all="ignore"):
        for _ in range(3):
            slope, bend = horner(x, first), horner(x, second)
            step = np.where(bend < 0, slope / bend, 0.0)
            step = np.minimum(np.maximum(step, -0.05), 0.05)
            x = np.minimum(np.maximum(x - step, low), high)
    return x
