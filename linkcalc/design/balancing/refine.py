"""The sampled poses made exact: the worst poses of what was found join the rows until nothing worse lies between them;
and what friction or settling makes of the effort joins in until it no longer changes."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace

import numpy as np

from linkcalc.design.balancing.convex import NoSolution
from linkcalc.design.balancing.influence import Influence
from linkcalc.design.balancing.problem import Problem
from linkcalc.design.balancing.search import End, descend
from linkcalc.mechanics.pipeline import solve_stroke
from linkcalc.mechanics.prepare import prepare
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import drawn
from linkcalc.parts.pose import Array

_FINE, _POSES = 721, 61
_ROUNDS = 8
_AGREES = 1e-9  # of the largest effort: no pose between the rows is worse by more
_SETTLED = 1e-7  # of the largest effort: what friction makes of it no longer changes
_HUMPS = 3  # of each case that are looked at


def refined(
    problem: Problem, end: End, make: Callable[[End], Mechanism] | None, *, square: bool
) -> tuple[Problem, End]:
    """Rows at the exact worst poses; for the mean square even poses are right as they are.

    make  the model with what was found in, where its effort is not linear in that; None: it is
    """
    fine = problem.by.at_poses(np.linspace(problem.by.path.start, problem.by.path.stop, _FINE))
    for _ in range(_ROUNDS):
        there = replace(problem, by=fine, base=_base(problem, fine, end, make))
        effort = np.abs(np.where(there.rows, there.efforts(end.t, end.z), 0.0)).reshape(-1, _FINE)
        top = max(float(np.abs(there.base[there.rows]).max(initial=0.0)), 1e-300)
        changed = float(np.abs(_base(problem, problem.by, end, make) - problem.base)[problem.rows].max(initial=0.0))
        exact = square or effort.max(initial=0.0) <= end.value + (_SETTLED if make else _AGREES) * top
        if exact and changed <= _SETTLED * top:
            break
        by = problem.by
        if not exact:
            drive = np.unique([*by.drive, *_peaks(fine.drive, effort)])
            by = by.at_poses(drive if by.forward > 0 else drive[::-1])
        problem = replace(problem, by=by, base=_base(problem, by, end, make))
        try:
            end = descend(problem, end.t, square=square)
        except NoSolution:
            break
    return problem, end


def _base(problem: Problem, by: Influence, end: End, make: Callable[[End], Mechanism] | None) -> Array:
    """(case, pose) what the effort would be without what is put in, if that added to it by virtual work alone."""
    if make is None:
        return by.effort
    there = replace(problem, by=by, base=by.effort)
    base = by.effort + _effort_of(make(end), by) - there.efforts(end.t, end.z)[0]
    return np.where(np.isfinite(base), base, by.effort)


def _effort_of(mechanism: Mechanism, by: Influence) -> Array:
    """(case, pose) effort of the model with something in, new, at the same poses and cases."""
    ready = prepare(drawn(mechanism))
    solved, path = solve_stroke(ready, _POSES)
    found = Influence(ready, path, solved).at_poses(by.drive)
    cases, times = by.shape[0], len(ready.pushing.cases) // max(len(mechanism.cases), 1)
    ages = found.shape[0] // cases
    # of cases that come new and aged the new ones
    return found.effort[[ages * times * (k // times) + k % times for k in range(cases)]]


def _peaks(drive: Array, effort: Array) -> list[float]:
    """Where each case has its humps, by the parabola through three neighbours."""
    out: list[float] = []
    for row in effort:
        humps = np.flatnonzero((row[1:-1] >= row[:-2]) & (row[1:-1] >= row[2:])) + 1
        for k in humps[np.argsort(-row[humps])][:_HUMPS]:
            a, b, c = row[k - 1 : k + 2]
            bend = a - 2 * b + c
            shift = 0.5 * (a - c) / bend if bend else 0.0
            out.append(float(drive[k] + np.clip(shift, -1, 1) * (drive[k + 1] - drive[k])))
    return out
