"""The main question: effort, force ratio and every joint force over the stroke, with the poses that matter."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.design.assemble import assembled
from linkcalc.design.caveats import caveats
from linkcalc.design.curves import Curves
from linkcalc.design.events import events
from linkcalc.design.reach import located
from linkcalc.design.survey import Shown, Survey
from linkcalc.design.verdicts import verdicts
from linkcalc.mechanics.path import Path
from linkcalc.mechanics.pipeline import solve_at, solve_drawn, solve_stroke
from linkcalc.mechanics.prepare import Ready, prepare
from linkcalc.mechanics.solved import Solved
from linkcalc.model.check import check
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.select import only_case
from linkcalc.model.sketch import Drawing, drawn
from linkcalc.parts.pose import Array

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
    if mechanism.stroke is not None:
        poses = poses or mechanism.stroke.poses
    solved, path = walked(ready, poses)
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
    told = assembled(ready, survey, shown, found=found, judged=judged, warned=warned)
    return Study(told, curves, shown)


def walked(ready: Ready, poses: int | None = None) -> tuple[Solved, Path | None]:
    """The stroke at even poses, and its path; without a stroke the drawing pose, and none.

    poses  how many at the least, instead of the model's

    Raises Faults where the stroke is out of reach.
    """
    stroke = ready.drawing.mechanism.stroke
    with located(ready):
        if not ready.steps or stroke is None:
            return solve_drawn(ready), None
        return solve_stroke(ready, max(poses or stroke.poses, _WATCHED))


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
