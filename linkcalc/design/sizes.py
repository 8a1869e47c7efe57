"""A size that a person writes beside a model: in the file's unit, with its own, or a formula over the dimensions."""

from __future__ import annotations

import numpy as np

from linkcalc.faults import fault
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import drawn


def length_of(mechanism: Mechanism, text: str) -> float:
    """[m] "16", "5/8 in", "2*web". Raises Faults: no length, or not more than nothing."""
    try:
        size: float | str = float(text)
    except ValueError:
        size = text
    value = float(np.ravel(drawn(mechanism).value(size, "length"))[0])
    if not (np.isfinite(value) and value > 0):
        raise fault((), f"{text} is not more than nothing", "a length is wanted, e.g. 16 mm")
    return value
