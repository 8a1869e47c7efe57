"""What happens along the stroke: dead points, limits, reversals, and the extremes of effort, ratio and joint forces."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.answer import Event, Felt
from linkcalc.design.curves import Curves, Extremes, Found, Wanted, Zeros
from linkcalc.design.felt import felt, felt_beside
from linkcalc.design.passages import at_passages, beside
from linkcalc.design.survey import EFFORT_SPEED, LOAD_SPEED
from linkcalc.mechanics.path import Path

SLACK = "slack"
"""Kind of the event where the tension of a rope passes through nothing."""
_BOTH_WAYS = ("effort", "load", "force ratio", "ideal ratio")

_FORCE = "force at "
_POLE = 1e-6  # of the stroke: a change of sign as near to a dead point is that of the dead point
_NOTHING = 1e-9  # of the largest force: a joint that carries nothing has no extremes to tell


def events(curves: Curves, path: Path, *, extremes: bool = True) -> tuple[Event, ...]:
    """All events, limits and dead points first, then reversals, then extremes in the order of the quantities.

    extremes  False: none of these, which take the longest where there are many cases
    """
    out = [Event("limit", "stroke", "", limit, np.nan, "number") for limit in path.limits]
    out += [Event("change point", "stroke", "", (a + b) / 2, np.nan, "number") for a, b in path.passed]
    out += _snaps(curves, path)
    zeros = Zeros(curves, _turning(curves))
    listed = [w for w in _wanted(curves) if not carries_nothing(curves, w.name)] if extremes else []
    wanted = Extremes(curves, listed)
    _solve_ahead(curves, zeros, wanted)
    out += _passages(curves, zeros)
    curves.dead = sorted({e.drive for e in out if e.kind == "dead point"})
    curves.zero = sorted({e.drive for e in out if e.kind in ("dead point", "reversal", SLACK)})
    out += _extremes(curves, wanted)
    return tuple(out)


def _solve_ahead(curves: Curves, zeros: Zeros, wanted: Extremes) -> None:
    """All the places that the samples foretell go into one batch: the cost is in the number of batches."""
    if curves.drive.size < 2 or not wanted.wanted:
        return
    dead = [p for n, p in zip(zeros.names(), zeros.places, strict=True) if n in _SPEEDS]
    places = [zeros.places, wanted.places, beside(curves, dead)]
    curves.at([], np.concatenate(places))


_SPEEDS = {EFFORT_SPEED: "effort", LOAD_SPEED: "load"}


def _turning(curves: Curves) -> list[str]:
    """What is looked at for a change of sign; nothing where no pose has an answer."""
    if curves.nowhere:
        return []
    axial = [f"axial force in {m}" for m in _members(curves)]
    return [
        *(name for name in _SPEEDS if name in curves.survey.quantities),
        *(name for name in axial if not carries_nothing(curves, name)),
        *(["effort"] if curves.survey.ready.pushing.effort_asked else []),
        *(f"room at {name}" for name in curves.survey.contacts),
        *(name for name in _tensions(curves) if not carries_nothing(curves, name)),
    ]


def _passages(curves: Curves, zeros: Zeros) -> Iterator[Event]:
    """Dead points, where the speed of effort or load passes through zero, and reversals of two-force members."""
    dead: list[float] = []
    near = _POLE * float(np.ptp(curves.drive))
    for name, case, drive in zeros.found():
        of = "" if name in zeros.alike else _case(curves, case)
        if name in _SPEEDS:
            dead.append(drive)
            yield Event("dead point", _SPEEDS[name], of, drive, np.nan, "number")
        elif name.startswith("room at "):
            contact = name.removeprefix("room at ")
            yield Event(_making(curves, name, case, drive), contact, of, drive, 0.0, "force")
        elif name == "effort" and any(abs(drive - d) <= near for d in dead):
            continue  # it changes sign without bound there, not through nothing
        elif name == "effort" and not curves.survey.ready.pushing.rubbing:
            yield Event("reversal", "effort", of, drive, 0.0, curves.survey.quantities[name].kind)
        elif name == "effort":
            # no effort is on the edge of the band between moving on and moving back
            yield Event("self-locking edge", "effort", of, drive, 0.0, curves.survey.quantities[name].kind)
        elif name in _tensions(curves):
            rope = name.removeprefix("tension of ")
            yield Event(SLACK, rope, _case(curves, case), drive, 0.0, "force")
        else:
            member = name.removeprefix("axial force in ")
            yield Event("reversal", member, of, drive, 0.0, "force")


def _snaps(curves: Curves, path: Path) -> Iterator[Event]:
    """Where the balance of free members ends; the value is how far the member turns that turns or goes farthest."""
    drawing = curves.survey.ready.drawing
    for jump in getattr(path, "jumps", ()):
        by_turn = abs(jump.turn) * drawing.size > jump.way
        value, kind = (jump.turn, "angle") if by_turn else (jump.way, "length")
        yield Event("snap-through", drawing.members[jump.member], _case(curves, jump.case), jump.drive, value, kind)


def _making(curves: Curves, name: str, case: int, drive: float) -> str:
    """Whether a contact is made or lost as the stroke goes on."""
    samples, forward = curves.samples(name)[case], curves.drive[-1] > curves.drive[0]
    after = np.searchsorted(curves.drive if forward else -curves.drive, drive if forward else -drive, side="right")
    return "contact made" if samples[min(int(after), samples.size - 1)] < 0 else "contact lost"


def _extremes(curves: Curves, wanted: Extremes) -> Iterator[Event]:
    other = set(_other_way(curves))
    found = at_passages(curves, wanted.wanted)
    found |= wanted.found(besides=found)
    for w in wanted.wanted:
        if not np.isnan(found[w].value):
            kind = "opposite peak" if w in other else "largest" if w.sense > 0 else "smallest"
            value_kind = curves.survey.quantities[w.name].kind
            told = felt_at(curves, w, found[w])
            yield Event(kind, w.name, _case(curves, w.case), found[w].drive, found[w].value, value_kind, told)


def felt_at(curves: Curves, w: Wanted, found: Found) -> tuple[Felt, ...]:
    """What each member feels there, if it is a joint's largest force."""
    joint = w.name.removeprefix(_FORCE)
    if w.sense < 0 or joint == w.name:
        return ()
    return (felt if np.isfinite(found.value) else felt_beside)(curves, joint, w.case, found.drive)


def _wanted(curves: Curves) -> Iterator[Wanted]:
    pushing = curves.survey.ready.pushing
    given = {"effort"} if pushing.load_asked else {"load"}
    joints = dict.fromkeys(s.joint for s in curves.survey.sides)
    for case in range(len(pushing.cases)):
        for name in _BOTH_WAYS:
            if name in curves.survey.quantities and name not in given:
                yield Wanted(name, case, 1, True)
                yield Wanted(name, case, -1, True)
        yield from (w for w in _other_way(curves) if w.case == case)
        if "efficiency" in curves.survey.quantities:
            yield Wanted("efficiency", case, 1)
            yield Wanted("efficiency", case, -1)
        for joint in joints:
            yield Wanted(f"force at {joint}", case, 1)
            yield Wanted(f"force at {joint}", case, -1)
            if f"moment at {joint}" in curves.survey.quantities:
                yield Wanted(f"moment at {joint}", case, 1, True)
        for name in _tensions(curves):
            yield Wanted(name, case, 1)
            yield Wanted(name, case, -1)
        for member in _members(curves):
            yield Wanted(f"axial force in {member}", case, 1)
            yield Wanted(f"axial force in {member}", case, -1)
        for one in curves.survey.spoken:
            if _idle(curves, one.name):
                continue
            size = one.kind in ("force", "moment")
            yield Wanted(one.name, case, 1, size)
            yield Wanted(one.name, case, -1, size)


def _other_way(curves: Curves) -> list[Wanted]:
    """Of an effort that changes its sense along the stroke the largest of the lesser sense, case by case."""
    if "effort" not in curves.survey.quantities or not curves.survey.ready.pushing.effort_asked:
        return []
    out = []
    for case, samples in enumerate(curves.samples("effort")):
        sound = samples[np.isfinite(samples)]
        low, high = (float(sound.min()), float(sound.max())) if sound.size == samples.size else (0.0, 0.0)
        if low < -_NOTHING * high and high > -_NOTHING * low:
            out.append(Wanted("effort", case, -1 if high > -low else 1))
    return out


def _idle(curves: Curves, name: str) -> bool:
    """True for what a load tells and never changes: it has no extremes."""
    samples = curves.samples(name)
    return bool(np.all(np.abs(samples - samples[:, :1]) <= _NOTHING * curves.size(name)))


def carries_nothing(curves: Curves, name: str) -> bool:
    """True for a force that is zero but for rounding, all the way and in all cases."""
    if curves.survey.quantities[name].kind not in ("force", "moment"):
        return False
    quantity = curves.survey.quantities[name]
    arm = curves.survey.ready.chain.size if quantity.kind == "moment" else 1.0
    return curves.size(name) <= _NOTHING * curves.largest_force * arm


def _tensions(curves: Curves) -> list[str]:
    return [f"tension of {rope}" for rope in curves.survey.ropes]


def _members(curves: Curves) -> list[str]:
    return [curves.survey.ready.drawing.members[two.member] for two in curves.survey.two_force]


def _case(curves: Curves, case: int) -> str:
    return curves.survey.ready.pushing.cases[case]
