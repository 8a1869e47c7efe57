"""Requirements judged at the exact worst pose over all cases."""

from __future__ import annotations

import operator
from collections.abc import Callable, Sequence
from typing import TYPE_CHECKING

import numpy as np

from linkcalc.design.answer import Verdict
from linkcalc.design.curves import Curves, Wanted
from linkcalc.design.inner import MARGIN, inner
from linkcalc.design.passages import worst
from linkcalc.design.strengths import life
from linkcalc.design.travel import travel
from linkcalc.faults import fault
from linkcalc.model.dimensions import evaluate
from linkcalc.model.requirements import END, INNER, START, Requirement, requirements
from linkcalc.model.units import show
from linkcalc.words import nearest

if TYPE_CHECKING:
    from linkcalc.design.sizing.bearing_list import Bearing

_HOLDS: dict[str, Callable[[float, float], bool]] = {
    "<=": operator.le,
    ">=": operator.ge,
    "<": operator.lt,
    ">": operator.gt,
}
_SIZES = ("effort", "load", "tare effort", "frictionless effort", "force", "moment", "torque", *INNER)
_RATIOS = ("force ratio", "ideal ratio")
_ROUNDING = 1e-9  # of the limit: a value that meets it but for rounding holds


def verdicts(curves: Curves, bearings: Sequence[Bearing] | None = None) -> tuple[Verdict, ...]:
    """All requirements of the model, in its order.

    bearings  the list that bearings of the model are of; None: the sample

    Raises Faults for one that asks for what is not there.
    """
    mechanism = curves.survey.ready.drawing.mechanism
    if not mechanism.requirements:
        return ()
    names = evaluate(mechanism)
    return tuple(
        _judge(curves, r, r.limit(mechanism, names), r.place(mechanism, names), bearings)
        for r in requirements(mechanism)
    )


def _judge(
    curves: Curves, requirement: Requirement, limit: float, place: float | None, bearings: Sequence[Bearing] | None
) -> Verdict:
    mechanism = curves.survey.ready.drawing.mechanism
    text = mechanism.requirements[requirement.name]
    kind = requirement.kind(mechanism)
    if requirement.quantity == "travel":
        value, drive, case = travel(curves, requirement.of), float("nan"), ""
    elif requirement.quantity == "life":
        value, drive, case = life(curves, requirement.of, bearings), float("nan"), ""
    else:
        value, drive, case = _worst(curves, requirement, place)
    holds = _HOLDS[requirement.relation](value, limit) and value != float("-inf")
    if requirement.relation in ("<=", ">=") and abs(value - limit) <= _ROUNDING * abs(limit):
        holds = True
    return Verdict(requirement.name, text, holds and not np.isnan(value), value, limit, kind, case, drive)


def _worst(curves: Curves, requirement: Requirement, place: float | None) -> tuple[float, float, str]:
    _asked(curves, requirement)
    name, sign = _quantity(curves, requirement)
    upward = requirement.relation in ("<=", "<")
    cases = curves.survey.ready.pushing.cases
    size = requirement.quantity in _SIZES
    if requirement.at:
        drive = {START: curves.drive[0], END: curves.drive[-1]}.get(requirement.at, place)
        assert drive is not None
        _inside(curves, requirement, drive)
        values = sign * curves.at([name], np.array([drive]))[0, :, 0]
        if requirement.quantity in _RATIOS:
            values = values * [_way(curves, name, c) for c in range(len(cases))]
        seen = np.abs(values) if size else values
        if np.isnan(seen).all():
            return float("nan"), float(drive), ""
        k = int(np.nanargmax(seen) if upward else np.nanargmin(seen))
        return float(seen[k]), float(drive), cases[k]
    sense = 1 if upward else -1
    signs = [sign * (_way(curves, name, c) if requirement.quantity in _RATIOS else 1) for c in range(len(cases))]
    found = worst(curves, [Wanted(name, c, sense * s, size) for c, s in enumerate(signs)])
    values = np.array([f.value for f in found])
    seen = np.abs(values) if size else np.array(signs) * values
    if np.isnan(seen).all():
        return float("nan"), float("nan"), ""
    # a case without the load has no ratio, and is not judged by it
    k = int(np.nanargmax(seen) if upward else np.nanargmin(seen))
    return float(seen[k]), found[k].drive, cases[k]


def _way(curves: Curves, name: str, case: int) -> int:
    """The sign a ratio begins the stroke with: it counts as plus, for which way the arrows were drawn is no merit."""
    samples = curves.samples(name)[case]
    first = samples[np.isfinite(samples) & (samples != 0)]
    return -1 if first.size and first[0] < 0 else 1


def _inside(curves: Curves, requirement: Requirement, drive: float) -> None:
    """Raises Faults for a pose outside the stroke: what holds there was never walked to."""
    start, end = float(curves.drive[0]), float(curves.drive[-1])
    slack = 1e-9 * abs(end - start)
    if min(start, end) - slack <= drive <= max(start, end) + slack:
        return
    units = curves.survey.ready.drawing.mechanism.units
    place, first, last = (show(v, curves.survey.ready.drive_kind, units) for v in (drive, start, end))
    what = f"{place} is outside the stroke, which goes from {first} to {last}"
    raise fault(("requirements", requirement.name), what, "name a pose between its ends, or make the stroke longer")


def _quantity(curves: Curves, requirement: Requirement) -> tuple[str, int]:
    """Name of the quantity in the survey, and the sign it is told with."""
    q = requirement
    if q.inside:
        return inner(q.quantity, q.of), 1
    if q.quantity == "tension" and f"tension of {q.of}" in curves.survey.quantities:
        return f"tension of {q.of}", 1
    if q.quantity in ("tension", "compression"):
        return f"axial force in {q.of}", 1 if q.quantity == "tension" else -1
    return " ".join([q.quantity, *((q.word, q.of) if q.word else ()), *(("on", q.on) if q.on else ())]), 1


def _asked(curves: Curves, requirement: Requirement) -> None:
    """Raises Faults for a quantity that the model has not."""
    name = _quantity(curves, requirement)[0]
    if name in curves.survey.quantities:
        return
    if requirement.quantity == MARGIN:
        what = (
            f"{requirement.of} is not loaded at two places of a straight body only, so it does not buckle as a column"
        )
        cure = f'hold its stress down: "stress in {requirement.of}"'
    elif requirement.quantity in ("tension", "compression"):
        what = f"{requirement.of} is no two-force member: it is not loaded at two pins only"
        cure = "name the force of its joint: " + f'"force at PIN on {requirement.of}"'
    else:
        what, cure = f"there is no {name!r} here", nearest(name, curves.survey.quantities)
    raise fault(("requirements", requirement.name), what, cure)
