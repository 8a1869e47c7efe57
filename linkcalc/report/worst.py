"""The worst of a quantity over the stroke and all cases: found exactly where the answer has it, else of its poses."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.design.answer import Felt, StrokeAnswer
from linkcalc.parts.pose import Array


@dataclass(frozen=True)
class Worst:
    """A largest or smallest value.

    value  SI
    case   name of its load case
    drive  [rad or m] where it is, nan without a stroke
    index  (case, variant, pose) of the computed pose nearest to it
    felt   of a joint's force what each member feels there; empty where the worst is one of the computed poses
    """

    value: float
    case: str
    drive: float
    index: tuple[int, int, int]
    felt: tuple[Felt, ...] = ()


def largest(
    answer: StrokeAnswer, quantity: str, values: Array, sense: int = 1, *, by_size: bool = False
) -> Worst | None:
    """The largest of (case, variant, pose) values, or with sense -1 the smallest; None if there are none.

    by_size  whichever sign it has

    An event of that quantity may lie between the computed poses; it stands in for them if it goes further.
    """
    if not np.isfinite(values).any():
        return None
    rank = np.abs(values) if by_size else sense * values
    case, variant, pose = (int(i) for i in np.unravel_index(np.nanargmax(rank), values.shape))
    index = (case, variant, pose)
    found = Worst(float(values[index]), answer.cases[case], float(answer.drive[0, variant, pose]), index)
    top, kind = float(rank[index]), "largest" if sense > 0 else "smallest"
    for e in answer.events:
        further = abs(e.value) if by_size else sense * e.value
        if (e.kind, e.quantity) == (kind, quantity) and further >= top:
            place = answer.cases.index(e.case) if e.case in answer.cases else case
            index = (place, variant, nearest_pose(answer, e.drive))
            found = Worst(e.value, answer.cases[place], e.drive, index, e.felt)
            top = further
    return found


def nearest_pose(answer: StrokeAnswer, drive: float) -> int:
    """Index of the computed pose nearest to a drive; 0 without a stroke."""
    off = np.abs(answer.drive[0, 0] - drive)
    return int(np.nanargmin(off)) if np.isfinite(off).any() else 0
