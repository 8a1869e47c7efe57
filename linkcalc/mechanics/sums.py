"""Sums over the coordinates where most entries are an exact nothing, and small systems over a batch."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.mechanics.eliminate import solve_each
from linkcalc.mechanics.pushing import Column
from linkcalc.parts.pose import Array, Value, zero


def dot(way: Sequence[Value], push: Column) -> Value:
    total: Value = 0.0
    for v, q in zip(way, push, strict=True):
        if not (zero(v) or zero(q)):
            total = total + v * q
    return total


def plus(known: Column, size: Value, unit: Column) -> Column:
    return [k if zero(u) else k + size * u for k, u in zip(known, unit, strict=True)]


def small(a: Array, b: Array) -> Array:
    """x of a x = b, (..., n, n) and (..., n); by hand for the smallest, which are most."""
    n = a.shape[-1]
    with np.errstate(all="ignore"):
        if n == 1:
            return np.asarray(b / a[..., 0])
        if n == 2:
            d = a[..., 0, 0] * a[..., 1, 1] - a[..., 0, 1] * a[..., 1, 0]
            x = (b[..., 0] * a[..., 1, 1] - a[..., 0, 1] * b[..., 1]) / d
            y = (a[..., 0, 0] * b[..., 1] - b[..., 0] * a[..., 1, 0]) / d
            return np.stack([x, y], -1)
    return solve_each(a.reshape(-1, n, n), b.reshape(-1, n, 1)).reshape(b.shape)
