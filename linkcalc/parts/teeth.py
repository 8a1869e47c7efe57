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
TEETH = 20
"""Beyond so many a tooth is too small to be told from its neighbour: guesses of turns, by a cubic over less than half a
turn, are off by 5 degrees at most, and half a tooth of 20 is 9."""
_WHOLE = 1e-9


def slant(sketch: Sketch, angle: float | int | str) -> Value:
    """[-] tangent of the pressure angle: force apart over force along the pitch line. Raises Faults."""
    value = sketch.value(angle, "angle")
    if np.ndim(value) == 0 and not 0.0 < float(value) < _STEEPEST:
        shown, most = (sketch.shown(size, "angle") for size in (float(value), _STEEPEST))
        wanted = f"more than 0 and less than {most} is wanted"
        raise fault(("pressure_angle",), f"a pressure angle of {shown} cannot be", wanted)
    tangent = np.tan(value)
    return tangent if np.ndim(tangent) else float(tangent)


def pitch(radii: tuple[Value, Value], teeth: int = TEETH) -> Value:
    """[m] after how much rolling two gears stand as before, both turns told within half a turn only.

    That is one turn of the smaller gear where the larger turns by whole numbers of its turns or not beyond half a turn;
    of radii in the ratio of other whole numbers, up to so many for the smaller, one tooth of gears with so few.
    """
    first, second = (np.abs(radius) for radius in radii)
    small, large = np.minimum(first, second), np.maximum(first, second)
    for count in range(1, teeth + 1):
        number = large / small * count
        if np.all(np.abs(number - np.round(number)) <= _WHOLE * number):
            return 2 * np.pi * small / count
    whole: Value = 2 * np.pi * small
    return whole


def wound(gap: Value, pitch: Value) -> Value:
    """A gap that is known but for whole pitches, as the nearest to nothing."""
    near: Value = gap - pitch * np.round(gap / pitch)
    return near
