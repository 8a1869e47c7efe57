"""Sizes rounded to steps: forces, rates and masses first, places last, the rest found anew after each.

Rounding to the nearest one by one may leave nothing that keeps to the limits, so several ways are kept in hand at every
stage, the best of them, and the best that is left in the end is taken.
"""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.design.balancing.block import Unknown
from linkcalc.design.balancing.convex import NoSolution
from linkcalc.design.balancing.problem import Problem
from linkcalc.design.balancing.search import PASSED, End, descend
from linkcalc.faults import fault

_KEPT, _NEAR, _NEAR_LAST, _OTHERS = 4, 3, 7, 4
_TURNS = 12  # steps of the search after a size was rounded: it starts close to its end

Way = tuple[Problem, End]


def rounded(problem: Problem, end: End, others: Sequence[End], *, square: bool) -> Way:
    """The problem with all sizes that have a step settled on whole steps. Raises Faults: no whole steps will do.

    others  ends as good at other places: where the best is in a corner of its bounds, rounding may begin there
    """
    todo = [(k, size) for k, block in enumerate(problem.blocks) for size in reversed(block.sizes)]
    todo = [(k, size) for k, size in todo if size.step and not size.settled]
    ways: list[Way] = [(problem, one) for one in (end, *others[:_OTHERS])] if todo else [(problem, end)]
    for stage, (k, size) in enumerate(todo):
        near = _NEAR_LAST if stage == len(todo) - 1 else _NEAR
        tried = [way for old in ways for way in _settled(old, k, size, near, square=square)]
        if not tried:
            item = ("balance", "find", problem.blocks[k].name)
            what = f"no whole steps near the best sizes keep to the limits (the {size.name} was the last to be rounded)"
            raise fault(item, what, "smaller steps, wider bounds or smaller margins are wanted")
        tried.sort(key=lambda way: way[1].value)
        ways = tried[:_KEPT]
    return ways[0]


def _settled(way: Way, k: int, size: Unknown, near: int, *, square: bool) -> list[Way]:
    """The ways on from one, with a size on each of the whole steps next to where it is."""
    problem, end = way
    values = problem.found(end.t, end.z)
    out: list[Way] = []
    for value in _steps(size, values[k][size.name], near):
        blocks = list(problem.blocks)
        blocks[k] = blocks[k].settled(size.name, value)
        tried = problem.with_blocks(tuple(blocks))
        start = [t for b, v in zip(blocks, values, strict=True) for t in b.start(v)]
        try:
            there = descend(tried, np.array(start, float), square=square, turns=_TURNS)
        except NoSolution:
            continue
        if there.past <= PASSED:
            out.append((tried, there))
    return out


def _steps(size: Unknown, value: float, count: int) -> list[float]:
    """Whole steps within the bounds, those nearest to a value."""
    whole = np.floor(value / size.step + 1e-9)
    near = [float(whole + k) * size.step for k in range(-count, count + 1)]
    slack = 1e-9 * size.step
    kept = [v for v in near if size.low - slack <= v <= size.high + slack]
    return sorted(kept, key=lambda v: abs(v - value))[:count]
