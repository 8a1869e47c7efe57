"""What happens along the stroke: dead points, limits, reversals, and the extremes of effort, ratio and joint forces."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.answer import Event
from linkcalc.design.curves import Curves, Found, Wanted
from linkcalc.design.survey import EFFORT_SPEED, LOAD_SPEED
from linkcalc.mechanics.path import Path

_BOTH_WAYS = ("effort", "load", "force ratio", "ideal ratio")
_POLE = 1e-7  # of the stroke: how near a dead point is looked at to see whether a curve has a bound there
_RISE = 30.0  # times the largest sample, at that distance: no bound


def events(curves: Curves, path: Path) -> tuple[Event, ...]:
    """All events, dead points and limits first, then reversals, then extremes in the order of the quantities."""
    out = [Event("limit", "stroke", "", limit, np.nan, "number") for limit in path.limits]
    out += [Event("change point", "stroke", "", (a + b) / 2, np.nan, "number") for a, b in path.passed]
    dead = list(_dead_points(curves))
    out += dead
    out += _reversals(curves)
    out += _extremes(curves, sorted({e.drive for e in dead}))
    return tuple(out)


def _dead_points(curves: Curves) -> Iterator[Event]:
    known = curves.survey.quantities
    for name, text in ((EFFORT_SPEED, "effort"), (LOAD_SPEED, "load")):
        if name in known:
            for case, drive in curves.zeros(name):
                label = _case(curves, case) if curves.samples(name).shape[0] > 1 and case else ""
                yield Event("dead point", text, label, drive, np.nan, "number")


def _reversals(curves: Curves) -> Iterator[Event]:
    for two in curves.survey.two_force:
        name = curves.survey.ready.drawing.members[two.member]
        for case, drive in curves.zeros(f"axial force in {name}"):
            yield Event("reversal", name, _case(curves, case), drive, 0.0, "force")


def _extremes(curves: Curves, dead: list[float]) -> Iterator[Event]:
    wanted = list(_wanted(curves))
    for w, found in zip(wanted, curves.extremes(wanted), strict=True):
        quantity = curves.survey.quantities[w.name]
        pole = _pole(curves, w, dead) if w.sense > 0 or not w.size else None
        found = pole if pole is not None else found
        if np.isnan(found.value):
            continue
        kind = "largest" if w.sense > 0 else "smallest"
        yield Event(kind, w.name, _case(curves, w.case), found.drive, found.value, quantity.kind)


def _wanted(curves: Curves) -> Iterator[Wanted]:
    pushing = curves.survey.ready.pushing
    given = {"load"} if pushing.effort_asked else {"effort"}
    joints = dict.fromkeys(s.joint for s in curves.survey.sides)
    members = [curves.survey.ready.drawing.members[t.member] for t in curves.survey.two_force]
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
        for member in members:
            yield Wanted(f"axial force in {member}", case, 1)
            yield Wanted(f"axial force in {member}", case, -1)


def _pole(curves: Curves, wanted: Wanted, dead: list[float]) -> Found | None:
    """At a dead point inside the stroke some curves have no bound."""
    if not dead or curves.drive.size < 2:
        return None
    near = abs(curves.drive[-1] - curves.drive[0]) * _POLE
    low, high = min(curves.drive[0], curves.drive[-1]), max(curves.drive[0], curves.drive[-1])
    samples = curves.samples(wanted.name)[wanted.case]
    usual = float(np.median(np.abs(samples[np.isfinite(samples)]))) if np.isfinite(samples).any() else 0.0
    for drive in dead:
        beside = np.clip(np.array([drive - near, drive + near]), low, high)
        values = curves.at([wanted.name], beside)[0, wanted.case] * wanted.sense
        values = np.abs(values) if wanted.size else values
        if np.max(values) > max(_RISE * usual, 1e-300) / np.sqrt(_POLE) * 1e-2:
            return Found(drive, wanted.sense * np.inf)
    return None


def _case(curves: Curves, case: int) -> str:
    return curves.survey.ready.pushing.cases[case]
