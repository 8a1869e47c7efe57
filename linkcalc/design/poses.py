"""A pose as a person writes it: a value of the stroke, or the drawing pose."""

from __future__ import annotations

import numpy as np

from linkcalc.mechanics.pipeline import path_of
from linkcalc.mechanics.prepare import prepare
from linkcalc.model.mechanism import DRAWN, Mechanism
from linkcalc.model.sketch import drawn


def stroke_value(mechanism: Mechanism, text: str) -> float:
    """[rad or m] the value of the stroke that a text says: "30 deg", "12" (the file's unit), a formula, "drawn".

    Raises Faults: no size, or one of the wrong kind.
    """
    drawing = drawn(mechanism)
    assert mechanism.stroke is not None
    if text == DRAWN:
        return path_of(prepare(drawing)).drawn
    try:
        size: float | str = float(text)
    except ValueError:
        size = text
    return float(np.ravel(drawing.value(size, mechanism.stroke.along.kind))[0])
