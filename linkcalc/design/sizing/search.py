"""The smallest size that passes, and the next size of a series."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence

import numpy as np

from linkcalc.design.sizing.working import Choice, Working
from linkcalc.faults import Faults, fault

_LEAST, _MOST = 1e-5, 10.0  # [m] no machine part of this kind is smaller or larger
_TRIES, _CLOSE, _FAR, _STEP = 200, 1e-13, 100.0, 1.25


def smallest(check: Callable[[float], Working], least: float = _LEAST, most: float = _MOST) -> float:
    """[m] the size at which a check comes out at a utilisation of 1; the utilisation must fall as the size grows.

    least  where it passes already, it is the answer

    Raises Faults: not even the largest passes.
    """
    low, high = math.log(least), math.log(_largest(check, least, most))
    over, under = _excess(check, low), _excess(check, high)
    if under > 0:
        raise fault((), f"no size up to {math.exp(high) * 1e3:.4g} mm would do", "look at the load and at the factor")
    if over <= 0:
        return least
    # the utilisation falls by a power of the size, so that in logarithms a chord hits it in a few steps; the middle
    # is taken in turn, in case it does not
    for k in range(_TRIES):
        chord = (low * under - high * over) / (under - over)
        at = chord if k % 3 and low < chord < high else (low + high) / 2
        found = _excess(check, at)
        if found > 0:
            low, over = at, found
        else:
            high, under = at, found
        if high - low < _CLOSE or under > -_CLOSE:
            break
    return math.exp(high)


def _largest(check: Callable[[float], Working], least: float, most: float) -> float:
    """The largest size that can be checked at all: the table of a material ends at some thickness. Raises Faults."""
    while True:
        try:
            check(most)
        except Faults:
            if most <= least:
                raise
            most = max(most / _STEP, least)
        else:
            return most


def _excess(check: Callable[[float], Working], size: float) -> float:
    """Logarithm of the largest utilisation at exp(size), finite whatever it is; much more than all where there is no
    value (a hole as wide as its plate)."""
    try:
        used = float(np.max(check(math.exp(size)).utilisation))
    except Faults:
        return _FAR
    return min(max(math.log(used), -_FAR), _FAR) if used > 0 else -_FAR


def from_series(check: Callable[[float], Working], series: Sequence[tuple[float, str]], of: str = "") -> Choice:
    """The first of a series of sizes that passes, why the one before it does not, and the smallest of any size.

    series  (size [m], what it is called), rising; of: whose series it is

    Raises Faults: not even the first can be checked.
    """
    below, tried, why = _LEAST, "", ""
    working: Working | None = None
    for size, name in series:
        try:
            working = check(size)
        except Faults:
            if working is None:
                raise
            break  # the table of a material ends here
        if working.passes:
            # looked for between these two: the yield stress of a material falls by steps as it gets thicker, so that a
            # larger size may do less well
            return Choice(smallest(check, below, size), name, working, tried, why, of)
        below, tried, why = size, name, told(working)
    assert working is not None
    try:
        required = smallest(check, below)
    except Faults:
        required = None
    return Choice(required, "", working, "", f"the largest, {tried}, does not do: {why}", of)


def told(working: Working) -> str:
    """What governs a working that does not pass, in words: "bending of the pin at 131 %"."""
    used = 100 * float(np.max(working.utilisation))
    # near the limit a rounded 100 % would look as if it did
    return f"{working.governs} at {used:.{1 if used < 110 else 0}f} %"
