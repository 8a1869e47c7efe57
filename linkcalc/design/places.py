"""Values of the stroke in words."""

from __future__ import annotations

from linkcalc.mechanics.prepare import Ready
from linkcalc.model.units import show


def place(ready: Ready, value: float) -> str:
    """A value of the stroke for a sentence: "35 deg"; the drawing pose, if that is all there is."""
    if not ready.steps:
        return "the drawing pose"
    return show(value, ready.drive_kind, ready.drawing.mechanism.units)
