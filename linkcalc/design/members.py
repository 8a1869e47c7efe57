"""What every member must carry within: axial force, shear and bending moment at their worst, and where that is."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from linkcalc.design.answer import Caveat, StrokeAnswer
from linkcalc.design.curves import Curves, Found, Wanted
from linkcalc.design.inside import AXIAL, BENDING, KINDS, SHEAR
from linkcalc.design.member_caveats import member_caveats
from linkcalc.design.passages import worst
from linkcalc.design.stroke import study
from linkcalc.design.survey import inner
from linkcalc.mechanics.body import Body
from linkcalc.mechanics.internal import unbalance
from linkcalc.model.mechanism import Mechanism
from linkcalc.parts.pose import Array

_NOTHING = 1e-9
"""Of the largest force in the mechanism (times its size): rounding."""


@dataclass(frozen=True)
class Place:
    """A place along the body of a member.

    start, stop  names of the ends of the straight part that it is on
    way, long    [m] how far from start, and how long that part is
    along        [m] how far from the member's first point, along the body
    """

    start: str
    stop: str
    way: float
    long: float
    along: float


@dataclass(frozen=True)
class Peak:
    """The worst of something within a member, over the stroke and all cases.

    value  SI, with the sign it has there (see ``mechanics.internal``)
    kind   "force" or "moment"
    case   name of its load case
    drive  [rad or m] where in the stroke, found exactly; nan without a stroke
    place  where along the member; None where it has no bound
    """

    value: float
    kind: str
    case: str
    drive: float
    place: Place | None


@dataclass(frozen=True, eq=False)
class MemberForces:
    """What goes on within one member.

    member     its name
    two_force  True if it is loaded at two pins only
    axial, shear, bending  the worst of each; None if it has none: no body, or nothing but rounding
    over       quantity -> (case, variant, pose) [SI] the largest along the member, with its sign, at each pose
    unbalance  what its diagrams end with instead of nothing, over the largest force (times the size of the mechanism)
    """

    member: str
    two_force: bool
    axial: Peak | None
    shear: Peak | None
    bending: Peak | None
    over: dict[str, Array]
    unbalance: float

    @property
    def worst(self) -> Peak | None:
        """The bending moment; of a member that is not bent the axial force."""
        return self.bending or self.axial


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
    studied = study(mechanism, case=case, poses=poses, inner=True)
    curves = studied.curves
    inside = curves.survey.inside
    peaks = _peaks(curves)
    found = []
    for name in inside.members:
        over = {q: inside.largest(studied.shown, name, q).value for q in KINDS if (name, q) in peaks}
        axial, shear, bending = (peaks.get((name, q)) for q in (AXIAL, SHEAR, BENDING))
        two_force = name in studied.answer.two_force
        found.append(MemberForces(name, two_force, axial, shear, bending, over, _unbalance(curves, name)))
    return MembersAnswer(studied.answer, tuple(found), tuple(member_caveats(curves)), curves)


def _peaks(curves: Curves) -> dict[tuple[str, str], Peak]:
    """(member, quantity) -> its worst, of those that are more than rounding."""
    inside, cases = curves.survey.inside, curves.survey.ready.pushing.cases
    asked = [(m, q) for m in inside.members for q in KINDS if _carries(curves, m, q)]
    wanted = [Wanted(inner(q, m), c, 1) for m, q in asked for c in range(len(cases))]
    found = iter(worst(curves, wanted))
    top: dict[tuple[str, str], tuple[int, Found]] = {}
    for key in asked:
        each = [next(found) for _ in cases]
        values = [-np.inf if np.isnan(f.value) else f.value for f in each]
        k = int(np.argmax(values))
        if values[k] > -np.inf:
            top[key] = k, each[k]
    return dict(_placed(curves, top))


def _carries(curves: Curves, member: str, quantity: str) -> bool:
    name = inner(quantity, member)
    if name not in curves.survey.quantities:
        return False
    arm = curves.survey.ready.chain.size if KINDS[quantity] == "moment" else 1.0
    return curves.size(name) > _NOTHING * curves.largest_force * arm


def _placed(curves: Curves, top: dict[tuple[str, str], tuple[int, Found]]) -> Iterator[tuple[tuple[str, str], Peak]]:
    """Each worst with its sign and place, all their poses solved together."""
    if not top:
        return
    inside, cases = curves.survey.inside, curves.survey.ready.pushing.cases
    shown = curves.survey.show(curves.solve(np.array([f.drive for _, f in top.values()])))
    for column, ((member, quantity), (case, found)) in enumerate(top.items()):
        at = inside.largest(shown, member, quantity)
        column = min(column, at.value.shape[2] - 1)
        value, edge = float(at.value[case, 0, column]), int(at.edge[case, 0, column])
        way = float(at.way[case, 0, column])
        place = None if edge < 0 or np.isinf(found.value) else where(inside.body(member), edge, way)
        signed = found.value * (-1.0 if value < 0 else 1.0)
        yield (member, quantity), Peak(signed, KINDS[quantity], cases[case], found.drive, place)


def where(body: Body, edge: int, way: float) -> Place:
    """A place along an edge of a body, in words."""
    start, stop = (body.names[k[edge]] for k in (body.starts, body.stops))
    return Place(start, stop, way, float(body.long[edge]), float(body.before[edge]) + way)


def _unbalance(curves: Curves, member: str) -> float:
    survey = curves.survey
    shape = curves.shown.solved.balance.status.shape
    force, moment = unbalance(survey.inside.acts(curves.shown, member), shape)
    top = curves.largest_force or 1.0
    left = np.fmax(force / top, moment / (top * survey.ready.chain.size))
    return float(np.max(left, initial=0.0, where=np.isfinite(left)))
