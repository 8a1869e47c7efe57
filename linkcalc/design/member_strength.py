"""Is a member strong enough where it is worst: its stress, its buckling, the section modulus that would do."""

from __future__ import annotations

import numpy as np

from linkcalc.design.curves import Curves
from linkcalc.design.inner import STRESS
from linkcalc.design.peaks import Peak
from linkcalc.design.sizing.column import two_force_member
from linkcalc.design.sizing.model_members import MemberSpec
from linkcalc.design.sizing.section import needed_modulus, stressed
from linkcalc.design.sizing.working import Working
from linkcalc.mechanics.internal import forces_at


def workings(
    curves: Curves, member: str, stress: Peak | None, margin: Peak | None
) -> tuple[Working | None, Working | None]:
    """The workings of the worst stress and of the worst compression; None for what is not told."""
    inside = curves.survey.inside
    spec = inside.spec(member)
    if spec.section is None or spec.material is None:
        return None, None
    strong = buckled = None
    if stress is not None and stress.place is not None:
        axial, shear, bending = _forces(curves, member, stress)
        corner = _corner(curves, member, stress)
        radius = spec.bend_radius if corner else None
        strong = stressed(spec.section, axial, bending, spec.material, spec.factor, shear=shear, radius=radius)
    long = inside.column(member)
    if margin is not None and long is not None and np.isfinite(margin.value) and margin.value > 0:
        load = inside.buckling(member)
        assert load is not None
        buckled = two_force_member(
            -load / margin.value, long, spec.section, spec.material, spec.factor,
            ends=spec.ends, ends_across=spec.ends_across,
        )  # fmt: skip
    return strong, buckled


def needed(spec: MemberSpec, bending: Peak | None, strength: Working | None) -> float | None:
    """[m3] section modulus that would do: with the area as it is, if the section is told; else for bending alone."""
    if spec.material is None:
        return None
    if strength is not None:
        known = {e.symbol for e in strength.entries}
        return float(strength["W_needed"]) if "W_needed" in known and strength["M"] else None
    if bending is None or not np.isfinite(bending.value):
        return None
    return needed_modulus(bending.value, spec.material, spec.factor)


def _forces(curves: Curves, member: str, peak: Peak) -> tuple[float, float, float]:
    """N, V and M at the place, pose and case of a peak."""
    inside, cases = curves.survey.inside, curves.survey.ready.pushing.cases
    shown = curves.survey.show(curves.solve(np.array([peak.drive])))
    at = inside.largest(shown, member, STRESS)
    return forces_at(inside.pieces(shown, member), at, cases.index(peak.case), 0)


def _corner(curves: Curves, member: str, peak: Peak) -> bool:
    """True if it is at a corner of the path."""
    body = curves.survey.inside.body(member)
    assert peak.place is not None
    near = 1e-9 * peak.place.long
    at = peak.place.start if peak.place.way <= near else peak.place.stop
    inside = near < peak.place.way < peak.place.long - near
    return not inside and at in {body.names[k] for k in body.corners()}
