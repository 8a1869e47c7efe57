"""Teeth in mesh: their pressure angle, which turn of several it is, and how they push each other apart."""

from __future__ import annotations

import math

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts.contract import Sketch
from linkcalc.parts.pose import Value

PRESSURE_ANGLE = "20 deg"
"""Of ISO 53 basic rack tooth profiles, what teeth are cut to unless somebody says otherwise."""
TOUCHING = 1e-3
"""Of the distance wanted: how far gears may be drawn from touching; teeth have more play than that."""
_STEEPEST = math.radians(45.0)
_TEETH = 20
_WHOLE = 1e-9


def slant(sketch: Sketch, angle: float | int | str) -> Value:
    """[-] tangent of the pressure angle: force apart over force along the pitch line. Raises Faults."""
    value = sketch.value(angle, "angle")
    if np.ndim(value) == 0 and not 0.0 < float(value) < _STEEPEST:
        what = f"a pressure angle of {sketch.shown(float(value), 'angle')} cannot be"
        raise fault(("pressure_angle",), what, f"more than 0 and less than {sketch.shown(_STEEPEST, 'angle')} is wanted")
    tangent = np.tan(value)
    return tangent if np.ndim(tangent) else float(tangent)


def pitch(radii: tuple[Value, Value]) -> Value:
    """[m] after how much rolling two gears stand as before, both turns told within half a turn only.

    That is one turn of the smaller gear where the larger turns by whole numbers of its turns or not beyond half a turn;
    of radii in the ratio of other whole numbers, up to 20 for the smaller, one tooth of gears with so many.
    """
    small, large = np.minimum(*radii), np.maximum(*radii)
    for teeth in range(1, _TEETH + 1):
        number = large / small * teeth
        if np.all(np.abs(number - np.round(number)) <= _WHOLE * number):
            return 2 * np.pi * small / teeth
    whole: Value = 2 * np.pi * small
    return whole


def wound(gap: Value, pitch: Value) -> Value:
    """A gap that is known but for whole pitches, as the nearest to nothing."""
    near: Value = gap - pitch * np.round(gap / pitch)
    return near
