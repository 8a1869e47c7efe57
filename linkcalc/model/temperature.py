"""Temperatures: a number with its scale -> kelvin.

A scale with a zero of its own is no unit: twice 10 degC is nothing that a formula could reckon with. So a temperature
is a number and its scale, never a formula.
"""

from __future__ import annotations

import re
from typing import Any

from linkcalc.faults import fault
from linkcalc.model.mechanism import Units

TEMPERATURE = "temperature"
# kelvin = step x (number + zero); 273.15 for degC and 459.67 for degF by definition (NIST SP 811, appendix B.8)
_SCALES = {"K": (0.0, 1.0), "degC": (273.15, 1.0), "degF": (459.67, 5 / 9)}
_SPELT = {"°C": "degC", "°F": "degF"}
_TEXT = re.compile(r"\s*(?P<number>[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?)\s*(?P<scale>[A-Za-z°]+)\s*")
_HOTTEST = 1e6
_WANTED = "a number with its scale is wanted: degC, degF or K (e.g. 20 degC)"


def kelvin(size: Any, units: Units) -> float:
    """A temperature as written -> [K]; a bare number is on the file's scale.

    >>> kelvin("20 degC", Units()), kelvin(-40, Units(temperature="degF"))
    (293.15, 233.15)

    Raises Faults: no temperature, below absolute zero.
    """
    if isinstance(size, (int, float)) and not isinstance(size, bool):
        number, scale = float(size), units.temperature
    else:
        match = _TEXT.fullmatch(size) if isinstance(size, str) and len(size) < 50 else None
        scale = _SPELT.get(match["scale"], match["scale"]) if match else ""
        if match is None or scale not in _SCALES:
            raise fault((), f"{size!r} is no temperature", _WANTED)
        number = float(match["number"])
    zero, step = _SCALES[scale]
    found = step * (number + zero)
    if not 0 < found < _HOTTEST:
        what = "at or below absolute zero" if found <= 0 else "no temperature that a machine could have"
        raise fault((), f"{number:g} {scale} is {what}", _WANTED)
    return found
