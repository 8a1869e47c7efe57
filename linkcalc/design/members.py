"""What every member must carry within: axial force, shear and bending moment at their worst, and where that is."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

import numpy as np

from linkcalc.design.answer import Caveat, StrokeAnswer
from linkcalc.design.curves import Curves, Found, Wanted
from linkcalc.design.inner import AXIAL, BENDING, KINDS, MARGIN, SHEAR, STRESS, USED, inner
from linkcalc.design.inside import Inside
from linkcalc.design.member_caveats import member_caveats
from linkcalc.design.member_strength import needed, workings
from linkcalc.design.passages import worst
from linkcalc.design.peaks import Peak, where
from linkcalc.design.sizing.model_members import MemberSpec
from linkcalc.design.sizing.working import Working
from linkcalc.design.stroke import study
from linkcalc.design.survey import Shown
from linkcalc.mechanics.internal import unbalance
from linkcalc.model.mechanism import Mechanism
from linkcalc.parts.pose import Array

_RIVAL = 0.1
"""Of the largest sample of all cases: a case whose own is smaller by more cannot hold the worst."""
_NOTHING = 1e-9
"""Of the largest force in the mechanism (times its size): rounding."""


@dataclass(frozen=True, eq=False)
class MemberForces:
    """What goes on within one member.

    member     its name
    two_force  True if it is loaded at two pins only
    axial, shear, bending  the worst of each; None if it has none: no body, or nothing but rounding
    stress     the worst stress of axial force and bending at an outermost fibre; None without a section
    margin     the smallest buckling load over compression, of a straight member loaded at two places whose section and
               material are told; no bound if it is never pressed
    used       the largest used part of what is allowed; None without section and material
    spec       what the model says of section, material, factor and ends
    needed     [m3] section modulus that would do; None without a material, or if nothing bends it
    strength   the working of its worst stress; buckling that of its worst compression
    over       quantity -> (case, variant, pose) [SI] the worst along the member, forces with their sign, at each pose
    unbalance  what its diagrams end with instead of nothing, over the largest force (times the size of the mechanism)
    """

    member: str
    two_force: bool
    axial: Peak | None
    shear: Peak | None
    bending: Peak | None
    stress: Peak | None
    margin: Peak | None
    used: Peak | None
    spec: MemberSpec
    needed: float | None
    strength: Working | None
    buckling: Working | None
    over: dict[str, Array]
    unbalance: float

    @property
    def worst(self) -> Peak | None:
        """The stress, if it is told; else the bending moment; of a member that is not bent the axial force."""
        return self.stress or self.bending or self.axial


@dataclass(frozen=True, eq=False)
class MembersAnswer:
    """The inner forces of all members.

    stroke   the stroke they belong to: poses, cases, requirements
    caveats  what was assumed, and what a designer must not miss
    curves   what it was found from, for what is asked further (``diagram``)
    """

    stroke: StrokeAnswer
    members: tuple[MemberForces, ...]
    caveats: tuple[Caveat, ...]
    curves: Curves

    def member(self, name: str) -> MemberForces:
        """One of them; KeyError with the known ones."""
        for one in self.members:
            if one.member == name:
                return one
        raise KeyError(f"no member {name}; known: {', '.join(m.member for m in self.members)}")


def members(mechanism: Mechanism, *, case: str | None = None, poses: int | None = None) -> MembersAnswer:
    """Axial force, shear and bending moment of every member at their worst.

    case   only this load case
    poses  number of poses, instead of the model's

    Raises Faults, as ``stroke`` does.
    """
    studied = study(mechanism, case=case, poses=poses, inside=True)
    curves = studied.curves
    inside = curves.survey.inside
    peaks = _peaks(curves)
    found = []
    for name in inside.members:
        mine = {q: peaks.get((name, q)) for q in KINDS}
        over = {q: _over(inside, studied.shown, name, q) for q, peak in mine.items() if peak}
        strength, buckling = workings(curves, name, mine[STRESS], mine[MARGIN])
        found.append(
            MemberForces(
                name,
                name in studied.answer.two_force,
                axial=mine[AXIAL],
                shear=mine[SHEAR],
                bending=mine[BENDING],
                stress=mine[STRESS],
                margin=mine[MARGIN],
                used=mine[USED],
                spec=inside.spec(name),
                needed=needed(inside.spec(name), mine[BENDING], strength),
                strength=strength,
                buckling=buckling,
                over=over,
                unbalance=_unbalance(curves, name),
            )
        )
    return MembersAnswer(studied.answer, tuple(found), tuple(member_caveats(curves)), curves)


def _peaks(curves: Curves) -> dict[tuple[str, str], Peak]:
    """(member, quantity) -> its worst, of those that are more than rounding."""
    asked = [(m, q) for m in curves.survey.inside.members for q in KINDS if _carries(curves, m, q)]
    wanted = {key: _wanted(curves, inner(key[1], key[0]), -1 if key[1] == MARGIN else 1) for key in asked}
    search = [w for each in wanted.values() for w in each if not _still(curves, w)]
    found = dict(zip(search, worst(curves, search), strict=True))
    top: dict[tuple[str, str], tuple[int, Found]] = {}
    for key, each in wanted.items():
        every = [(w.case, _known(curves, w, found)) for w in each]
        if every:
            top[key] = max(every, key=lambda one: each[0].sense * one[1].value)
    return dict(_placed(curves, top))


def _wanted(curves: Curves, name: str, sense: int) -> list[Wanted]:
    """The worst in each case that could be the worst of all: whose samples come near to it."""
    samples = sense * curves.samples(name)
    best = np.max(samples, axis=1, initial=-np.inf, where=~np.isnan(samples))
    reach = _RIVAL * abs(best.max()) if np.isfinite(best.max()) else 0.0
    return [Wanted(name, c, sense) for c, value in enumerate(best) if value >= best.max() - reach]


def _still(curves: Curves, w: Wanted) -> bool:
    """True if it stands all along but for rounding, or nowhere has a bound: then there is nothing to look for."""
    samples = curves.samples(w.name)[w.case]
    with np.errstate(invalid="ignore"):
        return bool(np.all(samples == samples[0]) or np.ptp(samples) <= _NOTHING * np.max(np.abs(samples)))


def _known(curves: Curves, w: Wanted, found: Mapping[Wanted, Found]) -> Found:
    """What stands all along is told of the beginning of the stroke, not of where rounding puts it; so is what has its
    worst there among other places."""
    first = float(curves.samples(w.name)[w.case, 0])
    if w not in found:
        return Found(float(curves.drive[0]), first)
    value = found[w].value
    if np.isfinite(value) and abs(first - value) <= _NOTHING * abs(value):
        return Found(float(curves.drive[0]), value)
    return found[w]


def _over(inside: Inside, shown: Shown, member: str, quantity: str) -> Array:
    if quantity in (MARGIN, USED):
        return dict(inside.of(member))[quantity](shown)
    return inside.largest(shown, member, quantity).value


def _carries(curves: Curves, member: str, quantity: str) -> bool:
    name = inner(quantity, member)
    if name not in curves.survey.quantities:
        return False
    if KINDS[quantity] not in ("force", "moment"):
        return True
    arm = curves.survey.ready.chain.size if KINDS[quantity] == "moment" else 1.0
    return curves.size(name) > _NOTHING * curves.largest_force * arm


def _placed(curves: Curves, top: dict[tuple[str, str], tuple[int, Found]]) -> Iterator[tuple[tuple[str, str], Peak]]:
    """Each worst with its sign and place, all their poses solved together."""
    if not top:
        return
    inside, cases = curves.survey.inside, curves.survey.ready.pushing.cases
    shown = curves.survey.show(curves.solve(np.array([f.drive for _, f in top.values()])))
    for column, ((member, quantity), (case, found)) in enumerate(top.items()):
        if quantity == USED:
            yield (member, quantity), Peak(found.value, "number", cases[case], found.drive, None)
            continue
        at = inside.largest(shown, member, quantity)
        column = min(column, at.value.shape[2] - 1)
        value, edge = float(at.value[case, 0, column]), int(at.edge[case, 0, column])
        way = float(at.way[case, 0, column])
        place = None if edge < 0 or np.isinf(found.value) else where(inside.body(member), edge, way)
        signed = found.value * (-1.0 if value < 0 and quantity != MARGIN else 1.0)
        yield (member, quantity), Peak(signed, KINDS[quantity], cases[case], found.drive, place)


def _unbalance(curves: Curves, member: str) -> float:
    survey = curves.survey
    shape = curves.shown.solved.balance.status.shape
    force, moment = unbalance(survey.inside.acts(curves.shown, member), shape)
    top = curves.largest_force or 1.0
    left = np.fmax(force / top, moment / (top * survey.ready.chain.size))
    return float(np.max(left, initial=0.0, where=np.isfinite(left)))
