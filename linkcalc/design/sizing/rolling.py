"""Rolling bearings at joints that swing: static safety (ISO 76), life (ISO 281), the smallest of a list that passes."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import dataclass

import numpy as np

from linkcalc import data
from linkcalc.design.sizing.bearing_list import SAMPLE, Bearing
from linkcalc.design.sizing.search import told
from linkcalc.design.sizing.working import Choice, Sheet, Working
from linkcalc.faults import fault
from linkcalc.parts.pose import Array
from linkcalc.words import nearest

SMALL_SWING = np.deg2rad(5.0)
"""[rad] from end to end; below it the raceways wear by fretting, which no life formula tells. Bearing handbooks."""
_MILLION = 1e6


@dataclass(frozen=True)
class Duty:
    """What a bearing must bear.

    force      [N] worst radial force
    mean       [N] mean load of the life, see ``mean_load``; the worst if None. It hangs on the exponent of the bearing:
               a function of the exponent may stand there instead
    swing      [rad] from one end of the stroke to the other
    strokes    there and back, that it must last; None: not asked
    operation  "smooth", "normal" or "shock"
    running    what is asked of running: "still" (it hardly turns), "quiet_not_needed", "normal" or "high"
    safety     [-] least C0/P0, in place of the guide value
    reliability  [%] 90, 95, ...: the share of bearings that last so long
    """

    force: float
    mean: float | Callable[[float], float] | None = None
    swing: float = 0.0
    strokes: float | None = None
    operation: str = "normal"
    running: str = "normal"
    safety: float | None = None
    reliability: int = 90


def mean_load(force: Array, turn: Array, exponent: float) -> Array:
    """[N] the steady load that wears a bearing as a load does that varies over its turn (ISO 281).

    force  [N] sizes at the poses of the stroke, (..., pose)
    turn   [rad] angle between the rings there, (..., pose), or the same for all

    Pm = (integral of P^p over the turned angle / turned angle)^(1/p); between poses the force is taken as straight,
    so that the integral is exact for that. Without any turn it is the largest force.
    """
    size = np.abs(np.asarray(force, dtype=float))
    a, b = size[..., :-1], size[..., 1:]
    path = np.abs(np.diff(np.asarray(turn, dtype=float), axis=-1))
    top = np.maximum(size.max(axis=-1, keepdims=True), np.finfo(float).tiny)
    a, b, n = a / top, b / top, exponent + 1
    with np.errstate(all="ignore"):
        straight = (b**n - a**n) / (n * (b - a))
    # nearly the same load at both ends: the middle is as good, and nothing is divided by nothing
    each = np.where(np.abs(b - a) > 1e-4 * (a + b), straight, ((a + b) / 2) ** exponent)
    whole = path.sum(axis=-1)
    with np.errstate(all="ignore"):
        mean = (np.sum(each * path, axis=-1) / whole) ** (1 / exponent)
    return top[..., 0] * np.where(whole > 0, mean, 1.0)


def stepped_load(forces: Array, shares: Array, exponent: float) -> float:
    """[N] the same for loads that each act over a share of all turns (ISO 281).

    forces  [N], shares [-] of the turns, of any sum
    """
    force, share = np.asarray(forces, dtype=float), np.asarray(shares, dtype=float)
    return float((np.sum(force**exponent * share) / np.sum(share)) ** (1 / exponent))


def rolling_bearing(one: Bearing, duty: Duty) -> Working:
    """A bearing against its duty.

    Symbols: s0 (static safety), L10 (turns), strokes (there and back that it lasts), if it swings.

    Raises Faults: a force, swing or number of strokes of less than nothing, unknown operation or reliability.
    """
    sheet = Sheet(f"rolling bearing {one.designation}")
    sheet.given("F", abs(duty.force), "force", "worst radial force")
    sheet.given("C", one.C, "force", "dynamic load rating", "list")
    sheet.given("C0", one.C0, "force", "static load rating", "list")
    _static(sheet, one, duty)
    if duty.swing > 0:
        _life(sheet, one, duty)
    else:
        sheet.note("It does not turn: only the static safety counts.")
    if one.sample:
        sheet.caution(SAMPLE)
    sheet.caution("Radial load only; lubrication, seals and fits are not looked at. The maker's figures come first.")
    return sheet.working()


def needed_rating(mean: float, turns: float, exponent: float) -> float:
    """[N] dynamic load rating C that a life of so many turns asks for: P (L/1e6)^(1/p), ISO 281."""
    return float(mean * (turns / _MILLION) ** (1 / exponent))


def choose_bearing(
    among: Iterable[Bearing], duty: Duty, *, kind: str = "", bore: float | None = None, least_bore: float | None = None
) -> Choice:
    """The smallest of a list (by outside diameter, then width) that passes, and why the next smaller does not.

    kind        "ball", "roller" or "needle" only
    bore        [m] of that bore only; least_bore: of that or more

    Raises Faults: none of the list is of that kind and bore.
    """
    fit = [
        b
        for b in sorted(among, key=lambda b: (b.outside, b.width, b.bore, b.C))
        if kind in ("", b.kind)
        and (bore is None or abs(b.bore - bore) < 1e-6)
        and (least_bore is None or b.bore > least_bore - 1e-6)
    ]
    if not fit:
        sizes = f" and a bore of {(bore or least_bore or 0) * 1e3:g} mm" if bore or least_bore else ""
        raise fault((), f"no bearing of the list is of the kind {kind or 'asked for'}{sizes}", "add one to the list")
    smaller = why = ""
    for one in fit:
        working = rolling_bearing(one, duty)
        if working.passes:
            return Choice(None, one.designation, working, smaller, why)
        smaller, why = one.designation, told(working)
    best = min((rolling_bearing(one, duty) for one in fit), key=lambda w: w.utilisation)
    return Choice(None, "", best, "", f"none of the list does; the best, {best.title}: {told(best)}")


def _static(sheet: Sheet, one: Bearing, duty: Duty) -> None:
    guide = data.table("bearings.toml")["static_safety"]
    known = [name for name in guide if name != "source"]
    if duty.operation not in known:
        raise fault((), f"unknown operation {duty.operation!r}", nearest(duty.operation, known))
    if duty.running not in guide[duty.operation]:
        raise fault((), f"unknown running {duty.running!r}", nearest(duty.running, guide[duty.operation]))
    least = guide[duty.operation][duty.running][one.kind != "ball"] if duty.safety is None else duty.safety
    told_by = guide["source"] if duty.safety is None else "given"
    text = f"least static safety, {one.kind}, {duty.operation} operation, running {duty.running}".replace("_", " ")
    sheet.positive("s0_min", least, "number", "least static safety" if duty.safety else text, told_by)
    if duty.force:
        sheet.step("s0", "C0/F", "static safety", "ISO 76; P0 = F for a radial load")
        sheet.at_least("static safety of the bearing", "s0", "s0_min")


def _life(sheet: Sheet, one: Bearing, duty: Duty) -> None:
    table = data.table("bearings.toml")["reliability"]
    if str(duty.reliability) not in table:
        known = ", ".join(key for key in table if key != "source")
        raise fault((), f"no life factor for {duty.reliability} %", f"one of {known} is wanted")
    mean = duty.mean(one.exponent) if callable(duty.mean) else duty.force if duty.mean is None else duty.mean
    sheet.positive("P", abs(mean), "force", "mean load over the motion", "ISO 281, by the exponent of the life")
    sheet.given("p", one.exponent, "number", f"exponent, {one.kind}", "ISO 281")
    sheet.given("a1", float(table[str(duty.reliability)]), "number", f"for {duty.reliability} %", table["source"])
    sheet.given("swing", duty.swing, "angle", "swing, from one end to the other")
    sheet.step("L10", "a1*(C/P)^p*1000000", "life in turns", "ISO 281")
    sheet.step("strokes", "L10*(180 deg)/swing", "life in strokes, there and back",
               "equal rolled path: a stroke there and back rolls twice the swing")  # fmt: skip
    if duty.strokes is not None:
        sheet.positive("strokes_min", duty.strokes, "number", "strokes that it must last")
        sheet.step("C_needed", "P*(strokes_min*swing/(180 deg)/(a1*1000000))^(1/p)",
                   "load rating that so many strokes ask for", "ISO 281")  # fmt: skip
        sheet.at_most("life of the bearing", "C_needed", "C")
    if duty.swing < SMALL_SWING:
        sheet.caution("Swings below about 5 deg wear the raceways by fretting, whatever the reckoned life; a plain bush"
                      " is usual there.")  # fmt: skip
    elif duty.swing < np.deg2rad(60.0):
        sheet.note("Small swing: where it is less than the spacing of the rolling elements they run in tracks of their"
                   " own and the life is less certain; turn the bearing full round at each greasing.")  # fmt: skip
