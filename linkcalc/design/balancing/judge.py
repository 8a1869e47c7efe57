"""From what a search found to what a stroke of the model with it in confirms."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from linkcalc.design.answer import Caveat, StrokeAnswer
from linkcalc.design.balance_answer import BalanceAnswer, FoundPart, FoundSize, JointChange, Peak, StayTold
from linkcalc.design.balancing.built import AGED, built
from linkcalc.design.balancing.convex import Linear, least_peak, least_square, relaxed
from linkcalc.design.balancing.problem import Problem
from linkcalc.design.balancing.refine import refined
from linkcalc.design.balancing.rounding import rounded
from linkcalc.design.balancing.search import End, Outcome, value_of
from linkcalc.design.positions import balance_positions
from linkcalc.design.stroke import stroke
from linkcalc.faults import Faults
from linkcalc.model.mechanism import Balancing, Mechanism
from linkcalc.model.sketch import drawn
from linkcalc.parts.law_push import nominal

_KEPT = 2e-6  # of the effort: a margin that is kept but for what the search leaves is kept
_EXACT = 1e-9  # of the effort before: what is left is rounding


class Judge:
    """From what the search found to what a stroke of the model with it in confirms."""

    def __init__(
        self, mechanism: Mechanism, plan: Balancing, before: StrokeAnswer, problem: Problem, outcome: Outcome,
        *, square: bool, seed: int, effort: float,
    ):  # fmt: skip
        self.mechanism, self.plan, self.before, self.first = mechanism, plan, before, problem
        self.outcome, self.square, self.seed, self.effort = outcome, square, seed, effort
        self.problem = problem
        ready = problem.by.ready
        bent = ready.pushing.rubbing or ready.loose is not None
        self.problem, self.end = refined(problem, outcome.best, self._made if bent else None, square=square)
        self.problem, self.end = rounded(self.problem, self.end, outcome.others, square=square)

    def _made(self, end: End) -> Mechanism:
        return built(self.mechanism, self.plan.find, self.problem.blocks, self.problem.found(end.t, end.z))

    def _stroke(self) -> StrokeAnswer:
        """Raises Faults: a requirement no longer fits the model with what was found in."""
        made = self._made(self.end)
        try:
            return stroke(made)
        except Faults as found:
            raise Faults([replace(f, what=f"with what is put in, {f.what}") for f in found.faults]) from None

    def answer(self) -> BalanceAnswer:
        after = self._stroke()
        old, new = self._cases(self.before), self._cases(after)
        peak_before, peak_after = _peak(self.before, old), _peak(after, new)
        goal = self.problem.linear(self.end.t.reshape(-1, 1))[0]
        return BalanceAnswer(
            before=self.before,
            after=after,
            goal=self.plan.goal,
            cases=self.plan.cases or tuple(self.mechanism.cases),
            found=tuple(self._found()),
            peak_before=peak_before,
            peak_after=peak_after,
            square_before=_square(self.before, old),
            square_after=_square(after, new),
            foretold=value_of(goal, self.end.z, square=self.square),
            geometry=_geometry(self.problem, square=self.square),
            exact=abs(peak_after.value) <= _EXACT * abs(peak_before.value),
            starts=self.outcome.starts,
            alike=self.outcome.alike,
            elsewhere=self.outcome.elsewhere,
            seed=self.seed,
            stays=tuple(_stays(after, self.plan, self.problem, new)),
            joints=tuple(_joints(self.before, after)),
            mass_before=moving_mass(self.before.mechanism),
            mass_after=moving_mass(after.mechanism),
            positions_before=balance_positions(self.before.mechanism, effort=self.effort),
            positions_after=balance_positions(after.mechanism, effort=self.effort),
            caveats=self._caveats(),
        )

    def _cases(self, answer: StrokeAnswer) -> tuple[int, ...]:
        """Numbers of the cases that count, both senses of motion and aged ones among them."""
        own = list(answer.mechanism.cases) or [""]
        times = len(answer.cases) // len(own)
        wanted = {*self.plan.cases, *(f"{c} {AGED}" for c in self.plan.cases)}
        kept = [k for k, c in enumerate(own) if not self.plan.cases or c in wanted]
        return tuple(times * k + j for k in kept for j in range(times))

    def _found(self) -> Iterator[FoundPart]:
        values = self.problem.found(self.end.t, self.end.z)
        for block, first, each in zip(self.problem.blocks, self.first.blocks, values, strict=True):
            sizes = tuple(
                FoundSize(s.name, s.kind, each[s.name], not s.settled, bool(s.step) and not s.settled)
                for s in first.sizes
            )
            yield FoundPart(block.name, block.part.called, block.on, getattr(block, "number", 1), sizes)

    def _caveats(self) -> tuple[Caveat, ...]:
        out = []
        for part in self._found():
            for size, unknown in zip(
                part.sizes, next(b.sizes for b in self.first.blocks if b.name == part.name), strict=True
            ):
                if size.open and not unknown.settled and size.name in ("mass", "rate", "force") and size.value <= 0:
                    out.append(Caveat(part.name, "nothing is better than any: it is left at nothing"))
        return tuple(out)


def _peak(answer: StrokeAnswer, cases: tuple[int, ...]) -> Peak:
    effort = answer.effort[list(cases), 0]
    if not np.isfinite(effort).any():
        return Peak(float("nan"), "", float("nan"))
    case, pose = np.unravel_index(int(np.nanargmax(np.abs(effort))), effort.shape)
    best = Peak(float(effort[case, pose]), answer.cases[cases[case]], float(answer.drive[0, 0, pose]))
    names = [answer.cases[c] for c in cases]
    for e in answer.events:
        counts = e.kind == "largest" and e.quantity == "effort" and (e.case in names or not e.case)
        if counts and abs(e.value) > abs(best.value):
            best = Peak(e.value, e.case, e.drive)
    return best


def _square(answer: StrokeAnswer, cases: tuple[int, ...]) -> float:
    effort = answer.effort[list(cases), 0]
    return float(np.sqrt(np.nanmean(effort**2))) if np.isfinite(effort).any() else float("nan")


def _geometry(problem: Problem, *, square: bool) -> float:
    """[N or N m] what is outside of all that masses on these members could do."""
    if not all(hasattr(block, "anywhere") for block in problem.blocks):
        return float("nan")
    rows = problem.rows
    columns = [problem.whole(c, 1)[:, :, 0][rows] for block in problem.blocks for c in block.anywhere(problem.by)]  # type: ignore[attr-defined]
    A = np.array(columns).T
    n = A.shape[1]
    whole = relaxed(Linear(A, problem.base[rows], np.zeros((0, n)), np.zeros(0), np.zeros(n), np.zeros(n), np.zeros(n)))
    z = (least_square if square else least_peak)(whole)
    return value_of(whole, z, square=square)


def _stays(answer: StrokeAnswer, plan: Balancing, problem: Problem, cases: tuple[int, ...]) -> Iterator[StayTold]:
    """The least effort that it takes to leave an end, over the cases; less than nothing where it leaves by itself."""
    slack = _KEPT * float(np.abs(problem.base[problem.rows]).max(initial=0.0))
    named = [n for n, s in (("start", plan.stays_at_start), ("end", plan.stays_at_end)) if s is not None]
    for end, stay in zip(named, problem.stays, strict=True):
        way = (-1.0 if stay.pose else 1.0) * problem.by.forward
        speed = np.sign(problem.by.effort_speed[:, stay.pose])
        # which of the cases of the search a case of the answer is, new or aged
        share = max(len(answer.cases) // speed.size, 1)
        takes = [way * float(speed[min(c // share, speed.size - 1)] * answer.effort[c, 0, stay.pose]) for c in cases]
        k = int(np.argmin(takes))
        holds = takes[k] >= stay.margin - slack
        yield StayTold(end, stay.margin, takes[k], answer.cases[cases[k]], holds)


def _joints(before: StrokeAnswer, after: StrokeAnswer) -> Iterator[JointChange]:
    for joint in after.joints:
        values = [_largest(answer, joint) for answer in (before, after)]
        yield JointChange(joint, values[0], values[1])


def _largest(answer: StrokeAnswer, joint: str) -> float:
    if joint not in answer.joints:
        return float("nan")
    found = [float(np.nanmax(answer.joint_force(joint), initial=0.0))]
    found += [e.value for e in answer.events if e.kind == "largest" and e.quantity == f"force at {joint}"]
    return max(found)


def moving_mass(mechanism: Mechanism) -> float:
    """[kg] masses of the moving members and of what hangs on them."""
    pushers = drawn(mechanism).pushers().values()
    weights = (p.size for p in pushers if p.word == "weight" and any(site.member for site in p.sites))
    return sum(nominal(mass) for mass in weights if mass is not None)
