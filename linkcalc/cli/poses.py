"""A pose as an option names it."""

from __future__ import annotations

from collections.abc import Mapping

from linkcalc.cli.files import option_fault
from linkcalc.faults import Fault, Faults
from linkcalc.model.mechanism import DRAWN, Mechanism
from linkcalc.words import nearest


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
