"""The worst of all load cases: only the cases that could be it are looked at exactly."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.design.curves import Curves, Extremes, Found, Wanted
from linkcalc.design.passages import at_passages

_RIVAL = 0.02
"""Part of its size by which the foretold extreme of a case may stay behind the worst and still be looked at."""


@dataclass(frozen=True)
class Asked:
    """Something whose extreme over all cases is looked for: name, sense and size as in Wanted."""

    name: str
    sense: int = 1
    size: bool = False


def worst_cases(curves: Curves, asked: Sequence[Asked]) -> list[tuple[int, Found]]:
    """(case, extreme) of each, over all cases; nan and case 0 where none has a value."""
    cases = range(len(curves.survey.ready.pushing.cases))
    wanted = [Wanted(a.name, case, a.sense, a.size) for a in asked for case in cases]
    if not wanted:
        return []
    known = at_passages(curves, wanted)
    extremes = Extremes(curves, wanted)
    foretold = extremes.foretold.reshape(len(asked), len(cases))
    best = foretold.max(axis=1, keepdims=True)
    with np.errstate(invalid="ignore"):
        rivals = (foretold >= best - _RIVAL * np.abs(best)) & (foretold > -np.inf)
    chosen = {w for w, could in zip(wanted, rivals.ravel(), strict=True) if could and w not in known}
    if curves.drive.size > 1:
        curves.at([], extremes.places_of(chosen))  # all in one batch
    found = extremes.found(besides=known, only=chosen) | known
    return [_worst(a, [(case, found.get(Wanted(a.name, case, a.sense, a.size))) for case in cases]) for a in asked]


def _worst(asked: Asked, each: Sequence[tuple[int, Found | None]]) -> tuple[int, Found]:
    told = [(case, one) for case, one in each if one is not None and not np.isnan(one.value)]
    if not told:
        return 0, Found(float("nan"), float("nan"))
    return max(told, key=lambda t: asked.sense * (abs(t[1].value) if asked.size else t[1].value))
