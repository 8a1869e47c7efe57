"""Is the model sound: freedoms, range of motion, warnings, requirements."""

from __future__ import annotations

from collections import Counter
from dataclasses import dataclass

import numpy as np

from linkcalc.design.answer import Caveat, StrokeAnswer, Verdict
from linkcalc.design.stroke import stroke
from linkcalc.mechanics.freedom import freedom
from linkcalc.mechanics.pipeline import reach
from linkcalc.mechanics.prepare import Ready, prepare
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import drawn


@dataclass(frozen=True)
class Range:
    """How far the stepped coordinate goes from the drawing pose, [rad or m].

    lower, upper  limits of motion; nan where it goes round without one
    drawn         its value in the drawing pose
    start, stop   ends of the stroke
    """

    lower: float
    upper: float
    drawn: float
    start: float
    stop: float


@dataclass(frozen=True)
class CheckAnswer:
    """What a look at the model tells before any number is trusted.

    members    names of the moving members
    joints     kind of joint -> how many; a pin of three members counts once
    freedoms   degrees of freedom, from the rank of the constraints
    asked      "effort" or "load": which of them is the unknown; "" for a frame
    motion     None without a stroke
    stroke     the stroke itself, with caveats and verdicts
    """

    mechanism: Mechanism
    members: tuple[str, ...]
    joints: dict[str, int]
    freedoms: int
    asked: str
    motion: Range | None
    stroke: StrokeAnswer

    @property
    def verdicts(self) -> tuple[Verdict, ...]:
        return self.stroke.verdicts

    @property
    def caveats(self) -> tuple[Caveat, ...]:
        return self.stroke.caveats


def check_model(mechanism: Mechanism, *, case: str | None = None) -> CheckAnswer:
    """Look a model over. Raises Faults: whatever keeps it from being solved."""
    answer = stroke(mechanism, case=case)
    drawing = drawn(answer.mechanism)
    ready = prepare(drawing)
    joints = Counter(word for word, _ in dict.fromkeys((j.word, j.name) for j in drawing.joints))
    asked = "effort" if ready.pushing.effort_asked else "load" if ready.pushing.load_asked else ""
    found = freedom(ready.chain, ready.start.at)
    return CheckAnswer(
        answer.mechanism, drawing.members[1:], dict(joints), found.free, asked, _range(ready, answer), answer
    )


def _range(ready: Ready, answer: StrokeAnswer) -> Range | None:
    if not ready.steps:
        return None
    lower, drawn, upper = reach(ready)
    ends = answer.drive[0, 0]
    # a turn is told in the winding that the stroke is written in
    shift = 2 * np.pi * round((ends[0] - drawn) / (2 * np.pi)) if answer.kinds["drive"] == "angle" else 0.0
    return Range(lower + shift, upper + shift, drawn + shift, float(ends[0]), float(ends[-1]))
