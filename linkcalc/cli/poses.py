"""A pose as an option names it."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Annotated

import typer

from linkcalc.cli.files import option_fault
from linkcalc.faults import Fault, Faults
from linkcalc.model.mechanism import DRAWN, Mechanism
from linkcalc.words import nearest

Poses = Annotated[int | None, typer.Option("--poses", help="Number of poses instead of the model's.", metavar="N")]
_MOST = 100_000


def check_poses(poses: int | None) -> None:
    """Raises Faults: too few or too many."""
    if poses is not None and not 2 <= poses <= _MOST:
        raise option_fault("--poses", f"{poses} poses", f"from 2 to {_MOST} are wanted")


def pose_value(mechanism: Mechanism, text: str, ends: Mapping[str, float]) -> float:
    """[rad or m] the value of the stroke that ``--at`` names: "30 deg", "start", "end" or "drawn".

    Raises Faults.
    """
    from linkcalc.design.poses import stroke_value

    if text in ends:
        return ends[text]
    if text.isidentifier() and text != DRAWN and text not in mechanism.dimensions:
        words = nearest(text, (*ends, DRAWN))
        raise option_fault("--at", f"unknown pose {text!r}", f'{words}, or a value of the stroke ("30 deg")')
    try:
        return stroke_value(mechanism, text)
    except Faults as found:
        raise Faults([Fault((), f"--at: {f.what}", f.wanted) for f in found.faults]) from None
