"""Take the effort out of the hand: a counterweight or springs found for the whole stroke and all load cases."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from typing import Any

import numpy as np

from linkcalc.design.balance_answer import (
    BalanceAnswer,
)
from linkcalc.design.balancing.blocks import blocks as blocks_of
from linkcalc.design.balancing.built import without
from linkcalc.design.balancing.convex import NoSolution
from linkcalc.design.balancing.influence import Influence
from linkcalc.design.balancing.judge import Judge
from linkcalc.design.balancing.problem import Problem, Stay
from linkcalc.design.balancing.search import Progress, search
from linkcalc.design.positions import needs_stroke
from linkcalc.design.reach import located
from linkcalc.design.stroke import stroke
from linkcalc.faults import Fault, Faults, fault
from linkcalc.mechanics.pipeline import solve_stroke
from linkcalc.mechanics.prepare import prepare
from linkcalc.model.check import check
from linkcalc.model.mechanism import LEAST_SQUARE, Balancing, Mechanism
from linkcalc.model.sketch import drawn
from linkcalc.parts.law_push import nominal

STARTS = 24
_POSES = 61
_IDLE = 1e-12


def balance(
    mechanism: Mechanism,
    find: Mapping[str, Any] | None = None,
    *,
    goal: str | None = None,
    effort: float = 0.0,
    starts: int = STARTS,
    seed: int = 1,
    progress: Progress | None = None,
) -> BalanceAnswer:
    """Find what takes most of the effort away, put it into the model, and judge that by a stroke of its own.

    find      name -> Counterweight, Coil or GasStrut in place of those of the model
    goal      "least peak" or "least mean square" in place of the model's
    effort    [N or N m] the effort whose balance positions are told
    starts    of the search of places and lengths, the first in the middle of the bounds, the others by the seed
    progress  called with (starts done, starts)

    Raises Faults: what is wrong with the model or the bounds; nothing to balance; no solution within the bounds.
    """
    mechanism = check(_asked(check(mechanism), find, goal))
    needs_stroke(mechanism)
    plan = mechanism.balance
    if plan is None or not plan.find:
        what = "the model does not say what may be put in"
        raise fault("balance", what, "give it [balance.find.NAME] with mass_on, spring or gas_spring")
    before = stroke(replace(mechanism, balance=None))
    problem = _problem(mechanism, plan)
    square = plan.goal == LEAST_SQUARE
    try:
        outcome = search(problem, square=square, starts=starts, seed=seed, progress=progress)
    except NoSolution:
        raise _no_solution(problem) from None
    return Judge(mechanism, plan, before, problem, outcome, square=square, seed=seed, effort=effort).answer()


def _asked(mechanism: Mechanism, find: Mapping[str, Any] | None, goal: str | None) -> Mechanism:
    if find is None and goal is None:
        return mechanism
    plan = mechanism.balance or Balancing()
    plan = replace(plan, find=plan.find if find is None else dict(find), goal=goal or plan.goal)
    return replace(mechanism, balance=plan)


def _problem(mechanism: Mechanism, plan: Balancing) -> Problem:
    """Raises Faults."""
    bare = check(replace(without(mechanism, plan.find), requirements={}))
    ready = prepare(drawn(bare))
    with located(ready):
        solved, path = solve_stroke(ready, _POSES)
    by = Influence(ready, path, solved)
    found = blocks_of(ready, plan.find)
    own = {name: k for k, name in enumerate(bare.cases)}
    times = len(ready.pushing.cases) // max(len(own), 1)
    chosen = [own[c] for c in plan.cases] or list(range(max(len(own), 1)))
    cases = np.zeros(len(ready.pushing.cases), bool)
    for c in chosen:
        cases[times * c : times * (c + 1)] = True
    kind = ready.pushing.effort[0].pusher.kind
    stays = tuple(
        Stay(pose, nominal(ready.drawing.value(size, kind)))
        for pose, size in ((0, plan.stays_at_start), (-1, plan.stays_at_end))
        if size is not None
    )
    problem = Problem(by, found, cases, stays, by.effort)
    if not problem.rows.any():
        raise fault("stroke", "no pose of the stroke has an effort to be balanced", "keep it off the dead points")
    _moves(problem)
    return problem


def _moves(problem: Problem) -> None:
    """Raises Faults: something on members that do not move, so that it does nothing."""
    wrong, start = [], 0
    t = np.array([[(u.low + u.high) / 2] for u in problem.searched]).reshape(-1, 1)
    for block in problem.blocks:
        part = t[start : start + len(block.searched)]
        start += len(block.searched)
        columns = block.columns(part, problem.by)
        most = [
            np.abs(np.broadcast_to(c, (problem.by.shape[0], 1, problem.by.shape[1]))[:, 0][problem.rows]).max()
            for c in columns
        ]
        if max(most) <= _IDLE:
            what = f"nothing that is put there does work over the stroke: {' and '.join(block.on)} does not move so"
            moving = ", ".join(m for m in problem.by.ready.drawing.members[1:] if m not in block.on)
            cure = f"another member or place is wanted{f': {moving}' if moving else ''}"
            wrong.append(Fault(("balance", "find", block.name), what, cure))
    if wrong:
        raise Faults(wrong)


def _no_solution(problem: Problem) -> Faults:
    """Which of the wishes cannot be met: staying put, or the bounds."""
    item = ("balance", "find", problem.blocks[0].name) if len(problem.blocks) == 1 else ("balance", "find")
    if problem.stays:
        eased = replace(problem, stays=())
        try:
            search(eased, square=False, starts=8, seed=1)
        except NoSolution:
            pass
        else:
            what = "nothing within the bounds lets it stay at the ends of its stroke as wanted"
            return fault("balance", what, "smaller margins (stays_at_start, stays_at_end) or wider bounds are wanted")
    what = "nothing within the bounds keeps to all limits of length and place"
    return fault(item, what, "wider places, another length, a longer stroke of a gas spring are wanted")
