"""What happens along the stroke: dead points, limits, reversals, and the extremes of effort, ratio and joint forces."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.answer import Event
from linkcalc.design.curves import Curves, Found, Wanted, size_of
from linkcalc.design.survey import EFFORT_SPEED, LOAD_SPEED
from linkcalc.mechanics.path import Path

_BOTH_WAYS = ("effort", "load", "force ratio", "ideal ratio")
_POLE = 1e-7  # of the stroke: how near a dead point is looked at to see whether a curve has a bound there
_RISE = 1e3  # times the largest of its usual values: without bound
_NOTHING = 1e-9  # of the largest force: a joint that carries nothing has no extremes to tell


def events(curves: Curves, path: Path) -> tuple[Event, ...]:
    """All events, limits and dead points first, then reversals, then extremes in the order of the quantities."""
    out = [Event("limit", "stroke", "", limit, np.nan, "number") for limit in path.limits]
    out += [Event("change point", "stroke", "", (a + b) / 2, np.nan, "number") for a, b in path.passed]
    out += _passages(curves)
    dead = {e.drive for e in out if e.kind == "dead point"}
    zero = {e.drive for e in out if e.kind in ("dead point", "reversal")}
    out += _extremes(curves, sorted(dead), sorted(zero))
    return tuple(out)


def _passages(curves: Curves) -> Iterator[Event]:
    """Dead points, where the speed of effort or load passes through zero, and reversals of two-force members."""
    names = {EFFORT_SPEED: "effort", LOAD_SPEED: "load"}
    speeds = [name for name in names if name in curves.survey.quantities]
    axial = {f"axial force in {m}": m for m in _members(curves)}
    alone = {n for n in axial if _carries_nothing(curves, n)}
    for name, case, drive in curves.zeros([*speeds, *(n for n in axial if n not in alone)]):
        if name in names:
            label = _case(curves, case) if case else ""
            yield Event("dead point", names[name], label, drive, np.nan, "number")
        else:
            yield Event("reversal", axial[name], _case(curves, case), drive, 0.0, "force")


def _extremes(curves: Curves, dead: list[float], zero: list[float]) -> Iterator[Event]:
    wanted = [w for w in _wanted(curves) if not _carries_nothing(curves, w.name)]
    known = _at_passages(curves, wanted, dead, zero)
    left = [w for w in wanted if w not in known]
    found = dict(zip(left, curves.extremes(left), strict=True)) | known
    for w in wanted:
        if not np.isnan(found[w].value):
            kind = "largest" if w.sense > 0 else "smallest"
            value_kind = curves.survey.quantities[w.name].kind
            yield Event(kind, w.name, _case(curves, w.case), found[w].drive, found[w].value, value_kind)


def _wanted(curves: Curves) -> Iterator[Wanted]:
    pushing = curves.survey.ready.pushing
    given = {"load"} if pushing.effort_asked else {"effort"}
    joints = dict.fromkeys(s.joint for s in curves.survey.sides)
    for case in range(len(pushing.cases)):
        for name in _BOTH_WAYS:
            if name in curves.survey.quantities and name not in given:
                yield Wanted(name, case, 1, True)
                yield Wanted(name, case, -1, True)
        for joint in joints:
            yield Wanted(f"force at {joint}", case, 1)
            yield Wanted(f"force at {joint}", case, -1)
            if f"moment at {joint}" in curves.survey.quantities:
                yield Wanted(f"moment at {joint}", case, 1, True)
        for member in _members(curves):
            yield Wanted(f"axial force in {member}", case, 1)
            yield Wanted(f"axial force in {member}", case, -1)


def _at_passages(curves: Curves, wanted: list[Wanted], dead: list[float], zero: list[float]) -> dict[Wanted, Found]:
    """Extremes that stand where something passes through zero: at a dead point some curves have no bound, and where
    a force turns round, its size (and that of others that hang on it) is nothing. Neither is a smooth peak."""
    if not zero or curves.drive.size < 2 or not wanted:
        return {}
    low, high = min(curves.drive[0], curves.drive[-1]), max(curves.drive[0], curves.drive[-1])
    near = (high - low) * _POLE
    names = list(dict.fromkeys(w.name for w in wanted))
    beside = np.clip(np.add.outer(dead, [-near, near]).ravel(), low, high)
    values = curves.at(names, np.concatenate([beside, zero]))
    out: dict[Wanted, Found] = {}
    for w in wanted:
        there = values[names.index(w.name), w.case]
        top, usual = _size(curves, w.name), _usual(curves, w)
        rise = w.sense * (np.abs(there[: beside.size]) if w.size else there[: beside.size])
        small = np.abs(there[beside.size :])
        never_minus = w.size or np.min(curves.samples(w.name)[w.case]) >= 0
        if rise.size and np.max(rise) > max(_RISE * usual, 1e-300):
            out[w] = Found(dead[int(np.argmax(rise)) // 2], w.sense * np.inf)
        elif w.sense < 0 and never_minus and np.min(small) <= _NOTHING * top:
            out[w] = Found(zero[int(np.argmin(small))], 0.0)
    return out


def _usual(curves: Curves, w: Wanted) -> float:
    samples = curves.samples(w.name)[w.case]
    finite = np.abs(samples[np.isfinite(samples)])
    return float(np.median(finite)) if finite.size else 0.0


def _carries_nothing(curves: Curves, name: str) -> bool:
    """True for a force that is zero but for rounding, all the way and in all cases."""
    if curves.survey.quantities[name].kind not in ("force", "moment"):
        return False
    quantity = curves.survey.quantities[name]
    arm = curves.survey.ready.chain.size if quantity.kind == "moment" else 1.0
    return _size(curves, name) <= _NOTHING * curves.largest_force * arm


def _size(curves: Curves, name: str) -> float:
    return size_of(curves.samples(name))


def _members(curves: Curves) -> list[str]:
    return [curves.survey.ready.drawing.members[two.member] for two in curves.survey.two_force]


def _case(curves: Curves, case: int) -> str:
    return curves.survey.ready.pushing.cases[case]
