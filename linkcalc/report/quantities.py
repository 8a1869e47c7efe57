"""Units for what a working reckons with: by dimension, from the units of the model."""

from __future__ import annotations

import numpy as np

from linkcalc.model.mechanism import Units
from linkcalc.model.units import Dims, kind_of, unit
from linkcalc.parts.contract import Value
from linkcalc.report.numbers import number, plain

_DIGITS = 5
_SYMBOLS = ("m", "kg", "s", "rad")
_RATE, _TIME = (0, 0, -1, 0), (0, 0, 1, 0)
_SPEED, _PRESSURE_SPEED = (1, 0, -1, 0), (0, 1, -3, 0)
_LINE_LOAD = (0, 1, -2, 0)
_FEET = ("in", "inch", "ft", "foot", "feet")


def unit_of(dims: Dims, units: Units) -> tuple[str, float]:
    """The unit of a dimension as a file would write it, and how much of SI it is.

    >>> unit_of((2, 0, 0, 0), Units()), unit_of((0, 0, -1, 0), Units())[0]
    (('mm^2', 1e-06), '1/min')
    """
    length, mass, time, angle = dims
    if dims == _RATE:
        return "1/min", 1 / 60
    if dims == _TIME:
        return "h", 3600.0
    speed = "ft/min" if units.length in _FEET else "m/s"
    if (mass, time, angle) == (0, 0, 0):
        text = {0: "", 1: units.length}.get(int(length), f"{units.length}^{length}")
    elif dims == _SPEED:
        text = speed
    elif dims == _PRESSURE_SPEED:
        text = f"{units.stress}*{speed}"
    elif dims == _LINE_LOAD:
        text = f"{units.force}/{units.length}"
    elif kind := kind_of(dims):
        text = units.of(kind)
    else:
        text = "*".join(f"{s}^{p}" if p != 1 else s for s, p in zip(_SYMBOLS, dims, strict=True) if p)
    return text, unit(text).factor if text else 1.0


def out(value: Value, dims: Dims, units: Units) -> Value:
    """SI -> that unit."""
    found = np.asarray(value, dtype=float) / unit_of(dims, units)[1]
    return float(found) if found.ndim == 0 else found


def shown(value: Value, dims: Dims, units: Units) -> str:
    """A quantity for reading, with its unit; of an array its smallest and largest.

    >>> shown(0.0125, (1, 0, 0, 0), Units())
    '12.5 mm'
    >>> shown(0.5, (0, 0, -1, 0), Units())
    '30/min'
    """
    found = out(value, dims, units)
    ends = [found] if isinstance(found, float) else [float(np.nanmin(found)), float(np.nanmax(found))]
    texts = list(dict.fromkeys(_trimmed(number(end, _DIGITS, trim=True)) for end in ends))
    unit_text = plain(unit_of(dims, units)[0])
    return f"{' to '.join(texts)}{unit_text[1:] if unit_text.startswith('1/') else f' {unit_text}'}".strip()


def _trimmed(text: str) -> str:
    """A power of ten without the zeros that say nothing: 5e7 for 5.0000e7."""
    head, power, exponent = text.partition("e")
    return f"{head.rstrip('0').rstrip('.')}e{exponent}" if power and "." in head else text
