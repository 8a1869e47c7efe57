"""A stroke that cannot be gone through, told as a fault of the model: where it stops, and why."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager

import numpy as np

from linkcalc.faults import Fault, Faults
from linkcalc.mechanics.path import OutOfReach
from linkcalc.mechanics.prepare import Ready
from linkcalc.model.mechanism import LOWER, UPPER
from linkcalc.model.units import show

_VERBS = {"from": "begin", "to": "end"}


@contextmanager
def located(ready: Ready) -> Iterator[None]:
    """Turn OutOfReach raised inside into Faults that name the end of the stroke."""
    try:
        yield
    except OutOfReach as stop:
        raise Faults(_fault(ready, stop)) from None


def _fault(ready: Ready, stop: OutOfReach) -> Fault:
    units = ready.drawing.mechanism.units
    assert ready.chain.coordinate is not None
    kind = ready.chain.coordinate.kind
    what = f"{show(stop.wanted, kind, units)} cannot be reached: "
    if np.isnan(stop.limit):
        what += f"beyond {show(stop.last, kind, units)} the motion is not determined"
        return Fault(
            ("stroke", stop.end), what, "two ways of assembling meet there: step another coordinate through it"
        )
    what += f"the limit of motion is {show(stop.limit, kind, units)}" + (f", where {stop.why}" if stop.why else "")
    word = UPPER if stop.wanted > stop.last else LOWER
    return Fault(("stroke", stop.end), what, f'{_VERBS[stop.end]} the stroke before it, or write "{word}"')
