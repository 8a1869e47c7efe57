"""Balance positions along a stroke: where a given effort, or none, holds the load; stable or not; how stiffly."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.design.curves import Curves
from linkcalc.design.reach import located
from linkcalc.design.survey import EFFORT_SPEED, Survey
from linkcalc.faults import fault
from linkcalc.mechanics.pipeline import solve_stroke
from linkcalc.mechanics.prepare import prepare
from linkcalc.mechanics.sampled import Roots, Samples
from linkcalc.model.check import check
from linkcalc.model.check_loads import unsized
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.select import only_case
from linkcalc.model.sketch import drawn
from linkcalc.parts.pose import Array, Numbers

_POSES = 181
_SLOPE = 1e-5  # of the stroke: step of the difference
_POLE = 1e-6  # of the largest effort: what is more at a change of sign is no passage through the value
_NOTHING = 1e-9  # of the largest force: nothing but rounding
_NEUTRAL = 1e-7  # of the effort per stroke: no stiffness


@dataclass(frozen=True)
class BalancePosition:
    """A pose of the stroke in which it balances.

    case       name of the load case
    drive      [rad or m]
    steady     +1 stable: it comes back when it is moved a little; 0 neutral; -1 unstable: it runs away
    stiffness  [N/m or N m/rad] change of the effort over the way of the effort, plus where it is stable
    """

    case: str
    drive: float
    steady: int
    stiffness: float


@dataclass(frozen=True)
class HeldRange:
    """A part of the stroke, from drive to drive [rad or m], in which friction holds it."""

    case: str
    start: float
    stop: float


@dataclass(frozen=True)
class Positions:
    """Where it balances.

    effort   [N or N m] the effort that is applied, 0.0 for none
    places   in the order of the cases and of the stroke
    neutral  cases that balance at every pose
    held     where friction holds it, of a model that rubs
    """

    effort: float
    places: tuple[BalancePosition, ...]
    neutral: tuple[str, ...]
    held: tuple[HeldRange, ...]


def balance_positions(mechanism: Mechanism, *, effort: float = 0.0, case: str | None = None) -> Positions:
    """All poses along the stroke in which an effort of that size [N or N m] balances the mechanism.

    Stable where moving on along the stroke asks for more effort along the motion: with the effort e, its speed v per
    unit of the drive, and the effort f applied, (f - e) v pushes the drive, and e' v is the stiffness that it meets.

    Raises Faults: what is wrong with the model; it has no effort to be asked for, or no stroke.
    """
    mechanism = only_case(check(mechanism), case)
    needs_stroke(mechanism)
    ready = prepare(drawn(mechanism))
    with located(ready):
        solved, _ = solve_stroke(ready, _POSES)
    survey = Survey(ready, solved)
    curves = Curves(survey, survey.first)
    rubs = ready.pushing.rubbing
    name = "frictionless effort" if rubs else "effort"
    step = 2 if rubs else 1
    cases = np.arange(0, len(ready.pushing.cases), step)
    names = [ready.pushing.cases[c] if not rubs or ready.pushing.cases[c] != "forward" else "" for c in cases]
    samples = curves.samples(name)[cases] - effort
    arm = ready.chain.size if ready.pushing.effort[0].pusher.kind == "moment" else 1.0
    still = _NOTHING * curves.largest_force * arm
    neutral = [bool((np.abs(row) <= still).all()) for row in samples]
    places = [
        BalancePosition(names[k], drive, *_steady(curves, name, int(cases[k]), drive))
        for k, drive in _roots(curves, name, cases, effort)
        if not neutral[k]
    ]
    held = _held(curves, effort, names) if rubs else ()
    return Positions(effort, tuple(places), tuple(n for n, still in zip(names, neutral, strict=True) if still), held)


def needs_stroke(mechanism: Mechanism) -> None:
    """Raises Faults: no effort is asked for, or there is no stroke."""
    if mechanism.effort is None:
        cure = "give it an [effort] without a size: the hand, or a torque on the member whose moment is unbalanced"
        raise fault("effort", "the model has no effort, so nothing can be balanced", cure)
    if not unsized(mechanism.effort):
        raise fault("effort", "it has a size, and the load is what is asked for", "leave its size out")
    if mechanism.stroke is None:
        raise fault("stroke", "the model has no stroke to be balanced over", "give it a [stroke]")


def _roots(curves: Curves, name: str, cases: Numbers, effort: float) -> list[tuple[int, float]]:
    """(place in cases, drive) where the effort passes through its value; not where it passes without bound."""
    samples = curves.samples(name)[cases] - effort
    roots = Roots(Samples(curves.drive, np.where(np.isfinite(samples), samples, np.nan)))

    def f(x: Array, k: Numbers) -> Array:
        found: Array = curves.at([name], x)[0, cases[k], np.arange(x.size)] - effort
        return found

    places = roots.confirmed(f)
    if not places.size:
        return []
    left = np.abs(f(places, roots.curve))
    sound = left <= _POLE * max(curves.size(name), abs(effort))
    return [(int(k), float(d)) for k, d, ok in zip(roots.curve, places, sound, strict=True) if ok]


def _steady(curves: Curves, name: str, case: int, drive: float) -> tuple[int, float]:
    low, high = min(curves.drive[0], curves.drive[-1]), max(curves.drive[0], curves.drive[-1])
    h = _SLOPE * (high - low)
    ends = np.clip([drive - h, drive + h], low, high)
    values = curves.at([name], ends)[0, case]
    speed = float(curves.at([EFFORT_SPEED], np.array([drive]))[0, case, 0])
    slope = float((values[1] - values[0]) / (ends[1] - ends[0]))
    stiffness = slope / speed if speed else float("nan")
    if abs(slope) * (high - low) <= _NEUTRAL * curves.size(name):
        return 0, stiffness
    return int(np.sign(slope * speed)), stiffness


def _held(curves: Curves, effort: float, names: list[str]) -> tuple[HeldRange, ...]:
    """Where the effort lies between those of both senses of motion."""
    out: list[HeldRange] = []
    for k, name in enumerate(names):
        both = np.array([2 * k, 2 * k + 1])
        breaks = [d for _, d in _roots(curves, "effort", both, effort)]
        edges = np.unique([curves.drive[0], curves.drive[-1], *breaks])
        if edges.size < 2:
            continue
        middles = (edges[:-1] + edges[1:]) / 2
        sides = curves.at(["effort"], middles)[0, both] - effort
        for start, stop, inside in zip(edges[:-1], edges[1:], sides[0] * sides[1] <= 0, strict=True):
            if inside and out and out[-1].case == name and out[-1].stop == start:
                out[-1] = HeldRange(name, out[-1].start, float(stop))
            elif inside:
                out.append(HeldRange(name, float(start), float(stop)))
    return tuple(out)
