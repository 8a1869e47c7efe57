"""Guides and ropes under what they must carry: edge pressure at its worst, tension against the breaking load."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from linkcalc.design.curves import Curves
from linkcalc.design.joint_loads import JointLoads
from linkcalc.design.over_cases import Asked
from linkcalc.design.pins_answer import GUIDE, ROPE, Peak, RopeLoad, Sized
from linkcalc.design.shoes import NEEDED, PRESSURE, on_shoe, rope_of, shoes
from linkcalc.design.sizing.guide import guide
from linkcalc.design.sizing.rope import rope
from linkcalc.design.sizing.working import Working

_ROUNDING = 1e-12  # of the largest force of all: what an exact nothing comes out as


def guide_sized(curves: Curves, loads: JointLoads, name: str) -> tuple[Sized, ...]:
    """A guide in the pose that presses its edge most; none without the size of its face, or where it has no bound."""
    ready = curves.survey.ready
    shoe = shoes(ready).get(name)
    if shoe is None:
        return ()
    worst = loads.peak(Asked(PRESSURE + name))
    if not np.isfinite(worst.value):
        return ()
    shown, pose = curves.seen(worst.drive)
    case = ready.pushing.cases.index(worst.case)
    shape = shown.solved.balance.status.shape
    normal, moment = (float(np.broadcast_to(v, shape)[case, 0, pose]) for v in on_shoe(ready, name)(shown))
    least = _ROUNDING * curves.largest_force
    normal, moment = (v if abs(v) > of else 0.0 for v, of in ((normal, least), (moment, least * ready.drawing.size)))
    length, width, allowed = (None if v is None else float(v) for v in (shoe.length, shoe.width, shoe.allowed))
    assert length is not None and width is not None
    working = guide(normal, moment, length, width, allowed)
    needed = None if allowed is None else loads.peak(Asked(NEEDED + name)).value
    return (_told(name, GUIDE, needed, length, working, worst),)


def rope_sized(curves: Curves, load: RopeLoad) -> tuple[Sized, ...]:
    """A rope where it is pulled most; none without its breaking load, where it hangs slack, or without bound."""
    one, worst = rope_of(curves.survey.ready, load.rope), load.largest
    if one.breaks is None or not np.isfinite(worst.value) or worst.value <= 0:
        return ()
    breaks = float(one.breaks)
    working = rope(worst.value, breaks, None if one.factor is None else float(one.factor))
    needed = worst.value * float(working["S"])
    return (replace(_told(load.rope, ROPE, needed, breaks, working, worst), kind="force"),)


def _told(name: str, item: str, required: float | None, size: float, working: Working, worst: Peak) -> Sized:
    titled = replace(working, title=f"{name}: {working.title}")
    return Sized(item, required, "", size, titled, None, worst=worst)
