"""Joint forces as each member feels them: components, resultant, direction in ground and in the member's own axes."""

from __future__ import annotations

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.design.felt import NOTHING, within_half_a_turn
from linkcalc.model.sketch import drawn
from linkcalc.parts.pose import Array


def resultant(answer: StrokeAnswer) -> Array:
    """(bearing, case, variant, pose) [N] size of each force."""
    return np.hypot(answer.force[:, 0], answer.force[:, 1])


def direction(answer: StrokeAnswer) -> Array:
    """(bearing, case, variant, pose) [rad] where each force points, from the x axis; nan where there is no force."""
    size = resultant(answer)
    most = np.max(size, initial=0.0, where=np.isfinite(size))
    angle = np.arctan2(answer.force[:, 1], answer.force[:, 0])
    return within_half_a_turn(np.where(size > most * NOTHING, angle, np.nan))


def own_direction(answer: StrokeAnswer) -> Array:
    """(bearing, case, variant, pose) [rad] the same from the member's own x axis (first point to last), which turns
    with it; the ground's own axes are the ground axes. A pin itself has none."""
    sketch = drawn(answer.mechanism)
    angle = direction(answer)
    for i, bearing in enumerate(answer.bearings):
        if bearing.member in sketch.members:
            angle[i] -= answer.turn[sketch.member(bearing.member)] + sketch.own_axis(bearing.member)
        else:
            angle[i] = np.nan
    return within_half_a_turn(angle)
