"""From solved arrays to the answer of a stroke: named, full in shape, failed entries not a number."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.design.answer import Bearing, Caveat, Checks, Event, Reading, StrokeAnswer, Verdict
from linkcalc.design.rests import rests
from linkcalc.design.survey import Shown, Survey, bounded, efficiency
from linkcalc.design.told import spoken
from linkcalc.mechanics.motion import alone
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.solved import Solved
from linkcalc.mechanics.state import Status
from linkcalc.model.told import cautions_of
from linkcalc.parts.pose import Array, Codes, Value


def assembled(
    ready: Ready, survey: Survey, shown: Shown, *,
    found: tuple[Event, ...], judged: tuple[Verdict, ...], warned: tuple[Caveat, ...],
) -> StrokeAnswer:  # fmt: skip
    """The answer over the poses that are shown.

    ready   what was solved there: the mechanism itself, or its copies
    survey  of the mechanism as drawn
    """
    solved, b, p = shown.solved, shown.solved.balance, ready.pushing
    shape = b.status.shape
    # free members settle in each case by themselves
    still = (shape[0] if ready.loose else 1, *shape[1:])
    at = solved.closed.at
    nominal = survey.ready
    drawn = alone(nominal.start.at)
    kinds = {}
    if ready.steps:
        kinds["drive"] = ready.drive_kind
    if p.effort:
        kinds["effort"] = p.effort[0].pusher.kind
    if p.load:
        kinds["load"] = p.load[0].pusher.kind
    axial = [survey.quantities[f"axial force in {name}"].of(shown) for name in _two_force(survey)]
    tension = [survey.quantities[f"tension of {rope}"].of(shown) for rope in survey.ropes]
    drive = solved.drive if ready.steps else np.full((1, *shape[1:]), np.nan)
    stroke_part = ready.drawing.mechanism.stroke
    return StrokeAnswer(
        mechanism=ready.drawing.mechanism,
        cases=p.cases,
        kinds=kinds,
        drive_name=drive_name(stroke_part.along) if stroke_part else "",
        bearings=tuple(Bearing(s.joint, s.word, survey.side_name(s), s.copies) for s in shown.sides),
        two_force=tuple(_two_force(survey)),
        ropes=survey.ropes,
        drive=_full(drive, (1, drive.shape[1], shape[2])),
        effort=_full(b.effort, shape),
        load=_full(b.load, shape),
        tare_effort=_full(b.tare, shape),
        frictionless_effort=_full(b.frictionless, shape),
        efficiency=_full(efficiency(b, p), shape),
        force_ratio=_full(bounded(b.force_ratio), shape),
        ideal_ratio=_full(bounded(b.ideal_ratio), shape),
        force=_solved(_stacked([f for s in shown.sides for f in (s.fx, s.fy)], shape), b.status).reshape(-1, 2, *shape),
        moment=_solved(_stacked([s.moment for s in shown.sides], shape), b.status),
        axial=_solved(_stacked(axial, shape), b.status),
        tension=_solved(_stacked(tension, shape), b.status),
        x=_placed(_stacked(at.x, still), b.status),
        y=_placed(_stacked(at.y, still), b.status),
        turn=_placed(np.arctan2(_stacked(at.s, still), _stacked(at.c, still)), b.status),
        status=b.status,
        loose=ready.loose is not None,
        steady=_full(np.nan if solved.closed.steady is None else solved.closed.steady.astype(float), shape),
        rests=rests(ready),
        rubs=ready.pushing.rubbing,
        checks=_checks(solved),
        events=found,
        verdicts=judged,
        caveats=warned,
        cautions=_cautions(survey),
        readings=tuple(Reading(s.load, s.quantity, s.kind, _full(s.of(solved, p), shape)) for s in spoken(p))
        + tuple(Reading(rope, end, "force", _full(q.of(shown), shape)) for rope, end, q in survey.rope_ends()),
        marks=tuple(j.mark(drawn) for j in nominal.chain.joints)
        + tuple(a.pusher.mark(drawn) for a in nominal.pushing.all),
    )


def drive_name(along: object) -> str:
    """How a stroke's coordinate is called: "turn of handle", "distance of A and B"."""
    word: str = along.word  # type: ignore[attr-defined]
    of = getattr(along, word)
    return f"{word} of {of if isinstance(of, str) else ' and '.join(of)}"


def _cautions(survey: Survey) -> tuple[Caveat, ...]:
    found = cautions_of(a.pusher for a in survey.ready.pushing.all)
    return tuple(Caveat(", ".join(names), text) for text, names in found.items())


def _two_force(survey: Survey) -> list[str]:
    return [survey.ready.drawing.members[t.member] for t in survey.two_force]


def _checks(solved: Solved) -> Checks:
    def worst(values: Array) -> float:
        finite = values[np.isfinite(values)]
        return float(finite.max()) if finite.size else 0.0

    b = solved.balance
    return Checks(solved.closed.worst, worst(b.unbalance), worst(b.disagreement))


def _solved(values: Array, status: Codes) -> Array:
    """Forces, not a number where there is no answer: those that are nothing in every pose too."""
    return np.where(status != Status.FINE, np.nan, values) if status.any() else values


def _placed(values: Array, status: Codes) -> Array:
    """Coordinates of members, not a number where there is no pose that could have some."""
    missing = np.isin(status[: values.shape[1]], [Status.NOT_DRAWN, Status.OUT_OF_REACH, Status.BRANCH_LOST])
    return np.where(missing, np.nan, values) if missing.any() else values


def _stacked(values: Sequence[Value], shape: tuple[int, ...]) -> Array:
    out: Array = np.empty((len(values), *shape))
    for row, value in zip(out, values, strict=True):
        row[...] = value
    return out


def _full(value: Value, shape: tuple[int, ...]) -> Array:
    return np.array(np.broadcast_to(value, shape), dtype=float)
