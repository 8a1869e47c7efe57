"""Diameters of pins: those of the model, and those that are given beside it."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np

from linkcalc.faults import fault
from linkcalc.model.mechanism import Pin
from linkcalc.model.sketch import Drawing
from linkcalc.words import nearest


class Diameters:
    """[m] of the pins of a mechanism.

    Raises Faults: a name that is no pin, a diameter that is none.
    """

    def __init__(self, drawing: Drawing, given: Mapping[str, float] | float | None = None):
        self._drawing = drawing
        self._named = dict(given) if isinstance(given, Mapping) else {}
        self._rest = float("nan") if given is None or isinstance(given, Mapping) else float(given)
        for name in self._named:
            if name not in drawing.pins:
                raise fault((), f"there is no pin {name!r}", nearest(name, drawing.pins))
        for size in (*self._named.values(), *([] if np.isnan(self._rest) else [self._rest])):
            if not (np.isfinite(size) and size > 0):
                raise fault((), f"a pin cannot have a diameter of {size:g} m", "more than 0 is wanted")

    def of(self, pin: str) -> float:
        """[m] given by name, else the model's own, else given for all; nan if nobody says."""
        model = self._drawing.mechanism
        own = model.pins.get(pin, Pin()).diameter
        size = own if own is not None else model.friction.diameter
        if pin in self._named:
            return float(self._named[pin])
        if size is None:
            return self._rest
        return float(np.ravel(self._drawing.value(size, "length"))[0])
