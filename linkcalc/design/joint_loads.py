"""Joint by joint what it carries: extremes over all cases from one search, directions in their poses, roses."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import replace

import numpy as np

from linkcalc.design.answer import Event, Felt
from linkcalc.design.curves import Curves, Found
from linkcalc.design.diameters import Diameters
from linkcalc.design.events import carries_nothing
from linkcalc.design.felt import felt, felt_beside
from linkcalc.design.footing import ASKED, RESULTANT
from linkcalc.design.guides import guide_reversals
from linkcalc.design.over_cases import Asked, worst_cases
from linkcalc.design.pin_stacks import BENDING, SHEAR
from linkcalc.design.pins_answer import Footing, JointLoad, Peak, Reversal, RopeLoad, SideLoad, Swing
from linkcalc.design.roses import rose
from linkcalc.design.shoes import NEEDED, PRESSURE, shoes

NO_PEAK = Peak(0.0, "", float("nan"))


class JointLoads:
    """Joint by joint, from one search for all their extremes."""

    def __init__(
        self, curves: Curves, found: Sequence[Event], swings: Mapping[str, tuple[Swing, ...]], sized: Diameters
    ):
        self._curves, self._swings, self._sized = curves, swings, sized
        survey = curves.survey
        self._turned = (*_two_force_reversals(found), *guide_reversals(curves))
        names = [n for n in survey.quantities if n.startswith("force at ")]
        names = [n for n in names if not carries_nothing(curves, n)]
        asked = [Asked(n, sense) for n in names for sense in ((1, -1) if " on " not in n else (1,))]
        asked += [Asked(n, 1, True) for n in survey.quantities if n.startswith("moment at ") and " on " not in n]
        asked += [Asked(n) for n in survey.quantities if n.startswith((BENDING, SHEAR))]
        asked += [] if carries_nothing(curves, RESULTANT) else ASKED
        asked += [Asked(f"tension of {rope}", sense) for rope in survey.ropes for sense in (1, -1)]
        asked += [Asked(kind + name) for name in shoes(survey.ready) for kind in (PRESSURE, NEEDED)
                  if kind + name in survey.quantities]  # fmt: skip
        self._found = dict(zip(asked, worst_cases(curves, asked), strict=True))

    def joints(self) -> tuple[JointLoad, ...]:
        return tuple(self._joint(name) for name in dict.fromkeys(s.joint for s in self._curves.survey.sides))

    def ropes(self) -> tuple[RopeLoad, ...]:
        names = [(rope, f"tension of {rope}") for rope in self._curves.survey.ropes]
        return tuple(RopeLoad(n, self.peak(Asked(t)), self.peak(Asked(t, -1))) for n, t in names)

    def _joint(self, joint: str) -> JointLoad:
        survey = self._curves.survey
        sides = [side for side in survey.sides if side.joint == joint]
        name, members = f"force at {joint}", [survey.side_name(s) for s in sides]
        turning = Asked(f"moment at {joint}", 1, True)
        return JointLoad(
            joint, sides[0].word, self.peak(Asked(name), joint), self.peak(Asked(name, -1)),
            self.peak(turning) if turning in self._found else None,
            tuple(self._side(joint, member) for member in members), self._swings.get(joint, ()),
            tuple(r for r in self._turned if r.of in (joint, *members)),
            self._sized.of(joint) if sides[0].word == "pin" else float("nan"),
        )  # fmt: skip

    def _side(self, joint: str, member: str) -> SideLoad:
        shown, drawing = self._curves.shown, self._curves.survey.ready.drawing
        peak = self.peak(Asked(f"force at {joint} on {member}"), joint)
        if member not in drawing.members:
            return SideLoad(member, peak, None)
        side = next(s for s in shown.sides if s.joint == joint and self._curves.survey.side_name(s) == member)
        shape = shown.solved.balance.status.shape
        fine = shown.solved.balance.status == 0
        fx, fy = (np.where(fine, np.broadcast_to(v, shape), np.nan)[:, 0] for v in (side.fx, side.fy))
        at = shown.solved.closed.at
        turn = np.arctan2(at.s[side.member], at.c[side.member]) + drawing.own_axis(member)
        return SideLoad(member, peak, rose(fx, fy, np.broadcast_to(turn, shape)[:, 0]))

    def pin_poses(self, joint: JointLoad) -> list[Peak]:
        """Where its pin is loaded, bent or sheared most, with what the members feel there."""
        besides = [Asked(kind + joint.joint) for kind in (BENDING, SHEAR)]
        return [joint.largest, *(self.peak(a, joint.joint) for a in besides if a in self._found)]

    def footing(self, about: tuple[float, float]) -> Footing | None:
        """What the ground feels; None where nothing is held by it."""
        if ASKED[0] not in self._found:
            return None
        force, right, left, up, down, turning, back = (self.peak(a) for a in ASKED)
        return Footing(about, force, right, _minus(left), up, _minus(down), turning, _minus(back))

    def peak(self, asked: Asked, joint: str = "") -> Peak:
        if asked not in self._found:
            return NO_PEAK
        return peak_at(self._curves, *self._found[asked], joint)


def _minus(peak: Peak) -> Peak:
    return replace(peak, value=-peak.value)


def peak_at(curves: Curves, case: int, found: Found, joint: str = "", variant: int | None = None) -> Peak:
    """An extreme that was found, with what the members of its joint feel there."""
    told: tuple[Felt, ...] = ()
    if joint and not np.isnan(found.value):
        told = (felt if np.isfinite(found.value) else felt_beside)(curves, joint, case, found.drive)
    return Peak(found.value, curves.survey.ready.pushing.cases[case], found.drive, variant, told)


def _two_force_reversals(found: Sequence[Event]) -> Iterator[Reversal]:
    for e in found:
        if e.kind == "reversal":
            yield Reversal(e.quantity, e.case, e.drive)
