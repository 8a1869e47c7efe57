"""A pose as an option names it."""

from __future__ import annotations

from collections.abc import Mapping
from typing import TYPE_CHECKING, Annotated

import typer

from linkcalc.cli.files import of_option, option_fault
from linkcalc.model.mechanism import DRAWN, Mechanism
from linkcalc.words import nearest

if TYPE_CHECKING:
    from linkcalc.design.answer import StrokeAnswer

Poses = Annotated[int | None, typer.Option("--poses", help="Number of poses instead of the model's.", metavar="N")]
_MOST = 100_000


def check_poses(poses: int | None) -> None:
    """Raises Faults: too few or too many."""
    if poses is not None and not 2 <= poses <= _MOST:
        raise option_fault("--poses", f"{poses} poses", f"from 2 to {_MOST} are wanted")


def pose_within(answer: StrokeAnswer, text: str) -> float:
    """[rad or m] the value of the stroke that ``--at`` names: "30 deg", "start", "end" or "drawn".

    Raises Faults: no such pose, or one outside the stroke.
    """
    ends = {"start": float(answer.drive[0, 0, 0]), "end": float(answer.drive[0, 0, -1])}
    place = _pose_value(answer.mechanism, text, ends)
    if not min(ends.values()) - 1e-9 <= place <= max(ends.values()) + 1e-9:
        raise option_fault("--at", f"{text} is outside the stroke", "choose a pose between its ends")
    return place


def _pose_value(mechanism: Mechanism, text: str, ends: Mapping[str, float]) -> float:
    from linkcalc.design.poses import stroke_value

    if text in ends:
        return ends[text]
    if text.isidentifier() and text != DRAWN and text not in mechanism.dimensions:
        words = nearest(text, (*ends, DRAWN))
        raise option_fault("--at", f"unknown pose {text!r}", f'{words}, or a value of the stroke ("30 deg")')
    with of_option("--at"):
        return stroke_value(mechanism, text)
