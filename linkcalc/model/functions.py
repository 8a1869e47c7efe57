"""The functions that formulas know, each with what it asks of the dimensions of what it is given."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from fractions import Fraction
from typing import NamedTuple

import numpy as np

from linkcalc.faults import fault
from linkcalc.model import units as u
from linkcalc.parts.contract import Array, Value


class Quantity(NamedTuple):
    """value: SI, float or (1, variant, 1); dims: exponents of length, mass, time, angle."""

    value: Value
    dims: u.Dims


Function = Callable[[str, Sequence[Quantity], str], Quantity]


def settled(value: Value | np.floating, dims: u.Dims, text: str) -> Quantity:
    """A result that is a number. Copies that have none become NaN, as one copy is no fault of the drawing; if
    none has one, it is.

    Raises Faults.
    """
    if np.ndim(value) == 0:
        number = float(value)
        if not np.isfinite(number):
            raise fault((), f"{text!r} has no finite value")
        return Quantity(number, dims)
    copies: Array = np.where(np.isfinite(value), value, np.nan)
    if np.all(np.isnan(copies)):
        raise fault((), f"{text!r} has no finite value")
    return Quantity(copies, dims)


def _function(
    apply: Callable[..., Value], least: int, most: int, wants: u.Dims | None, gives: Callable[[u.Dims], u.Dims]
) -> Function:
    """wants: dimension of each thing given, None: any, but all alike; gives: dimension of the result."""

    def call(word: str, given: Sequence[Quantity], text: str) -> Quantity:
        if not least <= len(given) <= most:
            count = str(least) if least == most else f"{least} or more"
            raise fault((), f"{word} is given {len(given)} in {text!r}", f"it takes {count}")
        first = given[0].dims if wants is None else wants
        for one in given:
            if one.dims != first:
                wanted = f"{u.a(first)} is wanted" + (", e.g. sin(30 deg)" if first == u.ANGLE else "")
                raise fault((), f"{word} is given {u.a(one.dims)} in {text!r}", wanted)
        return settled(apply(*(one.value for one in given)), gives(first), text)

    return call


def _over(apply: Callable[[Value, Value], Value]) -> Callable[..., Value]:
    """A function of two made one of many."""

    def apply_all(first: Value, *rest: Value) -> Value:
        for other in rest:
            first = apply(first, other)
        return first

    return apply_all


def _same(dims: u.Dims) -> u.Dims:
    return dims


def _half(dims: u.Dims) -> u.Dims:
    return u.raised(dims, Fraction(1, 2))


def _number(dims: u.Dims) -> u.Dims:  # noqa: ARG001
    return u.NUMBER


def _angle(dims: u.Dims) -> u.Dims:  # noqa: ARG001
    return u.ANGLE


_MANY = 20
FUNCTIONS: dict[str, Function] = {
    "sqrt": _function(np.sqrt, 1, 1, None, _half),
    "hypot": _function(_over(np.hypot), 2, _MANY, None, _same),
    "abs": _function(np.abs, 1, 1, None, _same),
    "min": _function(_over(np.minimum), 2, _MANY, None, _same),
    "max": _function(_over(np.maximum), 2, _MANY, None, _same),
    "ln": _function(np.log, 1, 1, u.NUMBER, _number),
    "sin": _function(np.sin, 1, 1, u.ANGLE, _number),
    "cos": _function(np.cos, 1, 1, u.ANGLE, _number),
    "tan": _function(np.tan, 1, 1, u.ANGLE, _number),
    "asin": _function(np.arcsin, 1, 1, u.NUMBER, _angle),
    "acos": _function(np.arccos, 1, 1, u.NUMBER, _angle),
    "atan": _function(np.arctan, 1, 1, u.NUMBER, _angle),
    "atan2": _function(np.arctan2, 2, 2, None, _angle),
}
