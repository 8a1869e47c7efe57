"""Places and lengths, which the effort is not linear in: from many starts, each going down by linear programmes.

At every step the effort is taken as linear in all unknowns near by, the best within a trust region is found (a linear
programme, or least squares for the mean square), and the region grows or shrinks by how well that foretold what came
out. Ends are local optima; how many starts come to the best of them is told.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace

import numpy as np

from linkcalc.design.balancing.convex import Linear, NoSolution, least_peak, least_square, nearest_square
from linkcalc.design.balancing.problem import Problem
from linkcalc.parts.pose import Array

Progress = Callable[[int, int], None]
_PENALTY = 100.0  # of the largest effort, for each size of the mechanism by which a limit is passed
_STEPS = 40
_FIRST, _LONGEST, _LEAST = 0.2, 0.5, 1e-7  # trust region, parts of the bounds
_DIFFERENCE = 1e-5  # of the bounds: step of the central difference
_WORTH = 1e-9  # a gain smaller than this part of the effort ends it
_TIE = 1e-5
_ELSEWHERE = 0.02  # of the bounds: two ends are at different places
SAME = 1e-3  # of the best: two starts came to the same end
PASSED = 1e-6  # of the size of the mechanism: a limit that is passed by less is kept


@dataclass(frozen=True, eq=False)
class End:
    """Where a start came to.

    t, z   the unknowns
    value  [N] or [N m] the goal: peak, or root mean square
    past   how far the worst limit is passed
    """

    t: Array
    z: Array
    value: float
    past: float


@dataclass(frozen=True, eq=False)
class Outcome:
    """The best end of a search.

    starts, alike  how many there were, and how many came to an end as good
    elsewhere      some of those are at other places
    others         ends as good at other places
    """

    best: End
    starts: int
    alike: int
    elsewhere: bool
    others: tuple[End, ...] = ()


def value_of(linear: Linear, z: Array, *, square: bool) -> float:
    """The goal: the largest effort, or the root of its mean square."""
    effort = linear.effort(z)
    return float(np.sqrt(np.mean(effort**2))) if square else float(np.abs(effort).max(initial=0.0))


def settle_linear(problem: Problem, t: Array, *, square: bool) -> End:
    """The best z for one t. Raises NoSolution."""
    linear = problem.linear(t.reshape(-1, 1))[0]
    z = (least_square if square else least_peak)(linear)
    return End(t, z, value_of(linear, z, square=square), linear.past(z))


def search(problem: Problem, *, square: bool, starts: int, seed: int, progress: Progress | None = None) -> Outcome:
    """The best end of all starts; one that is nothing but linear needs no search. Raises NoSolution."""
    low, high = _bounds(problem)
    if not low.size:
        return Outcome(settle_linear(problem, np.zeros(0), square=square), 1, 1, False)
    rng = np.random.default_rng(seed)
    places = np.concatenate([np.full((1, low.size), 0.5), rng.uniform(size=(max(starts, 1) - 1, low.size))])
    ends: list[End] = []
    for k, place in enumerate(places):
        ends.append(descend(problem, low + place * (high - low), square=square))
        if progress is not None:
            progress(k + 1, len(places))
    kept = [e for e in ends if e.past <= PASSED]
    if not kept:
        raise NoSolution
    least = min(e.value for e in kept)
    top = float(np.abs(problem.base[problem.rows]).max(initial=0.0))
    # of ends as good but for rounding the one with the smallest rates, forces and masses
    best = min(
        (e for e in kept if e.value <= least * (1 + _TIE) + _WORTH * top), key=lambda e: float(problem.price @ e.z)
    )
    alike = [e for e in kept if e.value <= least * (1 + SAME) + 1e-6 * top]
    others: list[End] = []
    for end in sorted(alike, key=lambda e: e.value):
        if all(float(np.abs((end.t - e.t) / (high - low)).max()) > _ELSEWHERE for e in (best, *others)):
            others.append(end)
    return Outcome(best, len(places), len(alike), bool(others), tuple(others))


def _bounds(problem: Problem) -> tuple[Array, Array]:
    return np.array([u.low for u in problem.searched], float), np.array([u.high for u in problem.searched], float)


def descend(problem: Problem, t: Array, *, square: bool, turns: int = _STEPS) -> End:
    """From a start down to a local optimum."""
    low, high = _bounds(problem)
    if not low.size:
        return settle_linear(problem, t, square=square)
    width = high - low
    here = problem.linear(t.reshape(-1, 1))[0]
    z = _first(here, square=square)
    top = max(float(np.abs(problem.base[problem.rows]).max(initial=0.0)), 1e-300)

    def merit(linear: Linear, at: Array) -> float:
        return value_of(linear, at, square=square) / top + _PENALTY * linear.past(at)

    now, trust = merit(here, z), _FIRST
    model = _model(problem, t, z, width)
    for _ in range(turns):
        lowest, highest = np.maximum(-trust, (low - t) / width), np.minimum(trust, (high - t) / width)
        step, z_new = _best_near(model, lowest, highest, square=square, top=top)
        foretold = now - merit(model.linear, np.concatenate([step, z_new]))
        if foretold <= _WORTH or trust < _LEAST:
            break
        t_new = np.clip(t + step * width, low, high)
        there = problem.linear(t_new.reshape(-1, 1))[0]
        gain = now - merit(there, z_new)
        if gain > 0.05 * foretold:
            t, z, now = t_new, z_new, now - gain
            model = _model(problem, t, z, width)
            trust = min(2 * trust, _LONGEST) if gain > 0.7 * foretold else trust
        else:
            trust = 0.3 * min(trust, float(np.abs(step).max()))
        if gain < 0.3 * foretold:
            trust = min(trust, 0.5 * float(np.abs(step).max()) + _LEAST / 2)
    try:
        return settle_linear(problem, t, square=square)
    except NoSolution:
        linear = problem.linear(t.reshape(-1, 1))[0]
        return End(t, z, value_of(linear, z, square=square), linear.past(z))


@dataclass(frozen=True, eq=False)
class _Near:
    """All that is linear near by, in steps of t (parts of the bounds) and in z itself; count of t."""

    linear: Linear
    count: int


def _model(problem: Problem, t: Array, z: Array, width: Array) -> _Near:
    n = t.size
    near = np.concatenate([np.zeros((n, 1)), np.eye(n), -np.eye(n)], axis=1) * _DIFFERENCE
    each = problem.linear(t[:, None] + near * width[:, None])
    here = each[0]
    effort = np.stack([one.effort(z) for one in each], axis=-1)
    limits = np.stack([one.g + one.G @ z for one in each], axis=-1)
    J, C = ((v[:, 1 : n + 1] - v[:, n + 1 :]) / (2 * _DIFFERENCE) for v in (effort, limits))
    open_t = np.full(n, -np.inf)
    return _Near(
        Linear(np.hstack([J, here.A]), here.b, np.hstack([C, here.G]), here.g,
               np.concatenate([open_t, here.low]), np.concatenate([-open_t, here.high]),
               np.concatenate([0.0 * J[0], here.price])), n,
    )  # fmt: skip


def _best_near(model: _Near, low: Array, high: Array, *, square: bool, top: float) -> tuple[Array, Array]:
    n, whole = model.count, model.linear
    whole = replace(whole, low=np.concatenate([low, whole.low[n:]]), high=np.concatenate([high, whole.high[n:]]))
    if square:
        try:
            x = nearest_square(whole)
            return x[:n], x[n:]
        except NoSolution:
            pass
    x = _elastic(whole, top)
    return x[:n], x[n:]


def _elastic(whole: Linear, top: float) -> Array:
    """Least peak, where limits may be passed at a price."""
    from scipy.optimize import linprog

    part, loose, x = whole.open()
    size = np.abs(part.A).max(axis=0, initial=0.0)
    unit = np.where(size > 0, top / np.where(size > 0, size, 1.0), 1.0)
    A, G, rows = part.A * unit / top, part.G * unit, part.b.size
    ones = np.ones((rows, 1))
    M = np.block([[A, -ones, 0 * ones], [-A, -ones, 0 * ones],
                  [-G, np.zeros((part.g.size, 1)), -np.ones((part.g.size, 1))]])  # fmt: skip
    c = np.concatenate([np.zeros(loose.size), [1.0, _PENALTY]])
    bounds = [*zip(part.low / unit, part.high / unit, strict=True), (0, None), (0, None)]
    found = linprog(c, M, np.concatenate([-part.b / top, part.b / top, part.g]), bounds=bounds, method="highs")
    if found.x is None:
        raise NoSolution
    x[loose] = found.x[: loose.size] * unit
    return x


def _first(linear: Linear, *, square: bool) -> Array:
    try:
        return (least_square if square else least_peak)(linear)
    except NoSolution:
        free = np.linalg.lstsq(linear.A, -linear.b, rcond=1e-9)[0]
        return np.clip(free, linear.low, linear.high)
