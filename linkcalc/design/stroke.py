"""The main question: effort, force ratio and every joint force over the stroke, with the poses that matter."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.design.answer import Bearing, Caveat, Checks, Reading, StrokeAnswer
from linkcalc.design.caveats import caveats
from linkcalc.design.curves import Curves
from linkcalc.design.events import events
from linkcalc.design.reach import located
from linkcalc.design.rests import rests
from linkcalc.design.survey import Shown, Survey, bounded, efficiency
from linkcalc.design.told import spoken
from linkcalc.design.verdicts import verdicts
from linkcalc.mechanics.motion import alone
from linkcalc.mechanics.path import Path
from linkcalc.mechanics.pipeline import solve_at, solve_drawn, solve_stroke
from linkcalc.mechanics.prepare import Ready, prepare
from linkcalc.mechanics.solved import Solved
from linkcalc.mechanics.state import Status
from linkcalc.model.check import check
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.select import only_case
from linkcalc.model.sketch import Drawing, drawn
from linkcalc.model.told import cautions_of
from linkcalc.parts.pose import Array, Codes, Value

_WATCHED = 61
"""Poses at the least that events are looked for between: the worst does not hang on how many a table shows."""


def stroke(
    mechanism: Mechanism,
    *,
    case: str | None = None,
    poses: int | None = None,
    at: Sequence[float] | None = None,
    sizes: Mapping[str, Array] | None = None,
) -> StrokeAnswer:
    """Step a mechanism through its stroke (or solve it in its drawing pose) and answer for every pose.

    case   only this load case
    poses  number of poses, instead of the model's
    at     [rad or m] poses at these values of the stroke instead of evenly spread ones
    sizes  name of a dimension -> (variants) [SI] sizes, to solve many copies at once; events and verdicts are then
           those of the mechanism as drawn

    Raises Faults: everything wrong with the model, its freedoms or its stroke.
    """
    return study(mechanism, case=case, poses=poses, at=at, sizes=sizes).answer


@dataclass(frozen=True, eq=False)
class Study:
    """A stroke with what it was found from, for questions that go on from there.

    curves  every quantity over the stroke, with its exact values anywhere
    shown   the poses that the answer shows
    """

    answer: StrokeAnswer
    curves: Curves
    shown: Shown


def study(
    mechanism: Mechanism,
    *,
    case: str | None = None,
    poses: int | None = None,
    at: Sequence[float] | None = None,
    sizes: Mapping[str, Array] | None = None,
    inside: bool = False,
) -> Study:
    """What ``stroke`` does, and what it came from; inside: with the inner forces of every member among the curves.

    Raises Faults, as ``stroke`` does.
    """
    mechanism = only_case(check(mechanism), case)
    ready = prepare(drawn(mechanism))
    with located(ready):
        if not ready.steps:
            solved, path = solve_drawn(ready), None
        else:
            assert mechanism.stroke is not None
            poses = poses or mechanism.stroke.poses
            solved, path = solve_stroke(ready, max(poses, _WATCHED))
    survey = Survey(ready, solved, inside=inside)
    shown = survey.first
    curves = Curves(survey, shown, path.limits if path else ())
    found = events(curves, path) if path is not None else ()
    judged = verdicts(curves)
    drive = _asked(path, poses, at, solved)
    if path is not None and drive is not None:
        shown = survey.show(solve_at(ready, path.mesh, drive))
    if sizes is not None:
        copies, shown = _copies(mechanism, sizes, path, shown.solved.drive)
        ready = copies
    warned = caveats(curves, path, found)
    checks = _checks(shown.solved)
    told = _answer(ready, survey, shown, checks=checks, found=found, judged=judged, warned=warned)
    return Study(told, curves, shown)


def _asked(path: Path | None, poses: int | None, at: Sequence[float] | None, solved: Solved) -> Array | None:
    """Values of the stroke that the answer is to show, if others than those that were watched."""
    if path is None or poses is None:
        return None
    drive = path.poses(poses) if at is None else np.asarray(at, float)
    return None if at is None and drive.size == solved.drive.size else drive


def _copies(mechanism: Mechanism, sizes: Mapping[str, Array], path: Path | None, drive: Array) -> tuple[Ready, Shown]:
    from linkcalc.design.copies import copies_in  # one mechanism alone does not need them
    from linkcalc.mechanics.copies import solve_copies

    copies_in(mechanism, sizes)
    drawing = Drawing(mechanism, {k: np.reshape(v, (1, -1, 1)) for k, v in sizes.items()})
    ready = prepare(drawing)
    solved = solve_drawn(ready) if path is None else solve_copies(ready, path, drive[0, 0])
    return ready, Survey(ready, solved).first


def _answer(ready: Ready, survey: Survey, shown: Shown, *, checks, found, judged, warned) -> StrokeAnswer:  # type: ignore[no-untyped-def]
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
        checks=checks,
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
