"""Axial force, shear and bending moment along one member in one pose and case."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.design.curves import Wanted
from linkcalc.design.inner import AXIAL, BENDING, FORCES, KINDS, STRESS, inner
from linkcalc.design.inside import Inside
from linkcalc.design.members import MembersAnswer
from linkcalc.design.passages import worst
from linkcalc.design.peaks import Peak, where
from linkcalc.faults import fault
from linkcalc.mechanics.internal import Pieces
from linkcalc.parts.pose import Array
from linkcalc.words import nearest

_FINE = 25  # places on a piece that is not straight


@dataclass(frozen=True, eq=False)
class Stretch:
    """A part of the body between two places where something acts or the body bends.

    start, stop  names of the ends of the straight part of the body that it is on
    arm          True if that is no part of the path but holds a point beside it
    along        (place) [m] way along the body from its first point
    way          (place) [m] from start
    spots        (place, 2) [m] in ground axes
    left         (2) [-] to the left, ground axes
    axial, shear, bending  (place) [N], [N m]
    """

    start: str
    stop: str
    arm: bool
    along: Array
    way: Array
    spots: Array
    left: Array
    axial: Array
    shear: Array
    bending: Array


@dataclass(frozen=True)
class Acting:
    """What acts on the member in that pose: place, force and couple in ground axes [m], [N], [N m]."""

    name: str
    tone: str
    spot: tuple[float, float]
    force: tuple[float, float]
    moment: float
    spread: bool


@dataclass(frozen=True, eq=False)
class Diagram:
    """Inner forces along one member in one pose.

    stroke     the stroke that the pose is one of
    case       number of its load case
    drive      [rad or m] the pose; nan without a stroke
    stretches  the body, stretch by stretch
    acts       all that acts on it
    peaks      quantity -> its largest along the member in this pose
    """

    stroke: StrokeAnswer
    member: str
    case: int
    drive: float
    stretches: tuple[Stretch, ...]
    acts: tuple[Acting, ...]
    peaks: dict[str, Peak]


def diagram(answer: MembersAnswer, member: str, *, case: str | None = None, drive: float | None = None) -> Diagram:
    """The inner forces along a member in one pose.

    case   name of a case of the answer; if left out, the one where its stress (if no section is told its bending
           moment, of a member that is not bent its axial force) is largest
    drive  [rad or m] value of the stroke; if left out, the pose where that is largest

    Raises Faults: unknown member or case, a pose outside the stroke or without an answer.
    """
    curves = answer.curves
    survey = curves.survey
    inside, cases = survey.inside, survey.ready.pushing.cases
    if member not in inside.members:
        raise fault(("members",), f"there is no moving member {member!r}", nearest(member, inside.members))
    if case is not None and case not in cases:
        raise fault(("cases",), f"there is no case {case!r}", nearest(case, cases))
    place, number = _worst(answer, member, case, drive)
    low, high = min(curves.drive[0], curves.drive[-1]), max(curves.drive[0], curves.drive[-1])
    if not np.isnan(low) and not low - 1e-9 * (high - low) <= place <= high + 1e-9 * (high - low):
        raise fault(("stroke",), "the pose is outside the stroke", "choose one between its ends")
    shown = survey.show(curves.solve(np.array([place])))
    if shown.solved.balance.status[number, 0, 0]:
        raise fault(("stroke",), "the pose has no answer", "choose another")
    at, body, index = shown.solved.closed.at, inside.body(member), survey.ready.drawing.member(member)
    c, s, x, y = (float(np.ravel(v[index])[0]) for v in (at.c, at.s, at.x, at.y))
    turn = np.array([[c, s], [-s, c]])  # own axes to ground axes, of row vectors
    stretches = _stretches(inside, member, inside.pieces(shown, member), number)
    ground = tuple(_turned(one, turn, np.array([x, y])) for one in stretches)
    acts = []
    for act in inside.acts(shown, member):
        u, v, fu, fv, moment = (_one(value, number) for value in (act.u, act.v, act.fu, act.fv, act.moment))
        spot, force = np.array([u, v]) @ turn + (x, y), np.array([fu, fv]) @ turn
        if not (fu or fv or moment):
            continue  # a load of another case
        acts.append(
            Acting(act.name, act.tone, tuple(spot.tolist()), tuple(force.tolist()), moment, act.spread is not None)
        )
    peaks = {}
    for quantity in FORCES if body.starts else ():
        top = inside.largest(shown, member, quantity)
        value, edge, way = (float(a[number, 0, 0]) for a in (top.value, top.edge, top.way))
        peaks[quantity] = Peak(value, KINDS[quantity], cases[number], place, where(body, int(edge), way))
    return Diagram(answer.stroke, member, number, place, ground, tuple(acts), peaks)


def _worst(answer: MembersAnswer, member: str, case: str | None, drive: float | None) -> tuple[float, int]:
    """Pose and number of the case that are asked for; where they are left open, the worst."""
    curves = answer.curves
    cases, entry = curves.survey.ready.pushing.cases, answer.member(member)
    name = inner(STRESS if entry.stress else BENDING if entry.bending else AXIAL, member)
    if drive is None and case is None:
        peak = entry.worst
        return (peak.drive, cases.index(peak.case)) if peak else (float(curves.drive[0]), 0)
    if name not in curves.survey.quantities:
        return (float(curves.drive[0]) if drive is None else drive), 0
    if drive is None:
        number = cases.index(case or cases[0])
        found = worst(curves, [Wanted(name, number, 1)])[0]
        return (float(curves.drive[0]) if np.isnan(found.value) else found.drive), number
    values = curves.at([name], np.array([drive]))[0, :, 0]
    number = int(np.nanargmax(values)) if case is None and not np.isnan(values).all() else cases.index(case or cases[0])
    return drive, number


def _one(value: float | Array, case: int) -> float:
    """Of a batch of one pose the entry of a case."""
    flat = np.ravel(value)
    return float(flat[case if flat.size > 1 else 0])


def _stretches(inside: Inside, member: str, found: Pieces, case: int) -> list[Stretch]:
    body = inside.body(member)
    pick = [
        tuple(min(k, n - 1) for k, n in zip((case, 0, 0), a.shape[1:], strict=True))
        for a in (found.edge, found.axial[0])
    ]
    still, entry = pick
    edge, start, long, real = (a[(slice(None), *still)] for a in (found.edge, found.start, found.long, found.real))
    out, seen = [], set()
    for k in sorted(range(len(edge)), key=lambda k: (edge[k], start[k])):
        # two loads at one place begin the same piece
        if not real[k] or (int(edge[k]), float(start[k])) in seen:
            continue
        seen.add((int(edge[k]), float(start[k])))
        powers = [q[(slice(None), k, *entry)] for q in (found.axial, found.shear, found.bending)]
        curved = any(np.any(p[2:]) for p in powers)
        x = np.linspace(0.0, float(long[k]), _FINE if curved else 2)
        values = [np.asarray(np.polynomial.polynomial.polyval(x, p), np.float64) for p in powers]
        e, way = int(edge[k]), start[k] + x
        t = body.along[e]
        spots = body.nodes[body.starts[e]] + way[:, None] * t
        left = np.array([-t[1], t[0]])
        names = body.names[body.starts[e]], body.names[body.stops[e]]
        out.append(Stretch(*names, body.arms[e], body.before[e] + way, way, spots, left, *values))
    return out


def _turned(one: Stretch, turn: Array, origin: Array) -> Stretch:
    return replace(one, spots=one.spots @ turn + origin, left=one.left @ turn)
