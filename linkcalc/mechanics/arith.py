"""Sums and products that leave out what is exactly nothing: half of all entries are, and an array costs time."""

from __future__ import annotations

from linkcalc.parts.pose import Value, zero


def times(a: Value, b: Value) -> Value:
    if zero(a) or zero(b):
        return 0.0
    return b if isinstance(a, float) and a == 1.0 else a * b


def plus(a: Value, b: Value) -> Value:
    if zero(a):
        return b
    return a if zero(b) else a + b


def less(a: Value, b: Value) -> Value:
    return a if zero(b) else a - b
