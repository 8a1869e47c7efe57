"""What every member must carry within: axial force, shear and bending moment at their worst, and where that is."""

from __future__ import annotations

from collections.abc import Iterator
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
    inside, cases = curves.survey.inside, curves.survey.ready.pushing.cases
    asked = [(m, q) for m in inside.members for q in KINDS if _carries(curves, m, q)]
    senses = {MARGIN: -1}
    wanted = [Wanted(inner(q, m), c, senses.get(q, 1)) for m, q in asked for c in range(len(cases))]
    found = iter(worst(curves, wanted))
    top: dict[tuple[str, str], tuple[int, Found]] = {}
    for key in asked:
        each = [next(found) for _ in cases]
        values = [-np.inf if np.isnan(f.value) else senses.get(key[1], 1) * f.value for f in each]
        k = int(np.argmax(values))
        if values[k] > -np.inf or key[1] == MARGIN:
            top[key] = k, _earliest(curves, inner(key[1], key[0]), k, each[k])
    return dict(_placed(curves, top))


def _earliest(curves: Curves, name: str, case: int, found: Found) -> Found:
    """A worst that stands all along is told of the beginning of the stroke, not of where rounding puts it."""
    first = float(curves.samples(name)[case, 0])
    if np.isfinite(found.value) and abs(first - found.value) <= _NOTHING * abs(found.value):
        return Found(float(curves.drive[0]), found.value)
    return found


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
