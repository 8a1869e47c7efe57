"""Is a mechanism held more often than needed in every pose, so that its joints share forces? And what if not."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.faults import Fault, Faults
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.freedom import beside, freedom
from linkcalc.mechanics.motion import Closed
from linkcalc.mechanics.redundancy import Sharing, stiffness
from linkcalc.model.sketch import Drawing, drawn
from linkcalc.parts.contract import Joint
from linkcalc.parts.pose import Array

CURE = "turn one of these pins into a slot along the line, or leave one joint out"


def sharing(drawing: Drawing, wanted: int) -> Sharing | None:
    """How the joints share forces; None: they are no more than needed, or fit in the drawing pose only.

    wanted  freedoms that the mechanism must have

    Raises Faults: stiffness is given for some of the joints that share, and not for others.
    """
    nominal = drawn(drawing.mechanism)
    chain = Chain(len(nominal.members) - 1, nominal.joints, None, nominal.size)
    found = freedom(chain, nominal.drawn)
    if found.free != wanted or not found.excess or found.special:
        return None
    names = found.repeated
    if wanted:  # a joint that happens to share nothing as drawn may do so in other poses
        near = beside(chain, nominal.drawn)
        if near is None or freedom(chain, near).excess != found.excess:
            return None
        names = tuple(dict.fromkeys([*names, *freedom(chain, near).repeated]))
    faults = [*_lacking(drawing.joints, names), *idle(drawing, names)]
    if faults:
        raise Faults(faults)
    return Sharing(drawing.joints, names, found.excess, drawing.size)


def _lacking(joints: tuple[Joint, ...], names: tuple[str, ...]) -> Iterator[Fault]:
    """Joints without a stiffness among others that have one."""
    sharers = [joint for joint in joints if joint.name in names]
    known = [joint.name for joint in sharers if stiffness(joint) is not None]
    told = set[str]()
    for joint in sharers:
        if known and stiffness(joint) is None and joint.name not in told:
            told.add(joint.name)
            what = f"{joint.name} has no stiffness, but shares forces with {known[0]}, which has one"
            yield Fault((f"{joint.word}s", joint.name), what, "give it a 'stiffness', or leave out that of all")


def idle(drawing: Drawing, names: tuple[str, ...] = ()) -> Iterator[Fault]:
    """Joints with a stiffness that share nothing; names: those that do."""
    told = set[str]()
    for joint in drawing.joints:
        given = stiffness(joint) is not None or getattr(joint, "turning_stiffness", None) is not None
        if given and joint.name not in (*names, *told):
            told.add(joint.name)
            what = "it shares its force with no other joint: none holds again what it holds"
            yield Fault((f"{joint.word}s", joint.name, "stiffness"), what, "leave it out")


def no_fit(drawing: Drawing, chain: Chain, closed: Closed, drive: Array) -> Faults:
    """Joints that are held more often than needed and do not fit in some pose that the others come to.

    closed  poses as near as they come; drive (poses) [rad or m] their values of the stroke
    """
    assert chain.sharing is not None and chain.coordinate is not None
    gaps, _ = chain.equations(closed.at, chain.coordinate.hold(drive.reshape(1, 1, -1)))
    each = chain.worst_each(gaps)[0, 0]
    k = int(np.argmax(np.where(np.isfinite(each), each, -1.0)))
    times = "once" if chain.sharing.excess == 1 else f"{chain.sharing.excess} times"
    at = drawing.shown(float(drive[k]), chain.coordinate.kind)
    apart = drawing.shown(float(each[k]) * chain.size)
    names = ", ".join(chain.sharing.names)
    what = f"held {times} more than needed, among joints {names}, which come apart by {apart} at {at} of the stroke"
    return Faults(Fault(("members",), what, f"draw them so that they fit in every pose, or {CURE}"))
