"""What was assumed of the members' bodies, and what a designer must not miss in their inner forces."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.answer import Caveat
from linkcalc.design.curves import Curves
from linkcalc.design.inner import MARGIN
from linkcalc.design.sizing.section import SHARP
from linkcalc.mechanics.acts import Act
from linkcalc.mechanics.body import Body
from linkcalc.mechanics.internal import off_body
from linkcalc.model.units import show

_STRETCH = 0.01  # of the size: a pin stands off the end of a link that stretches by no more
_PRESSED = 0.1
"""Of the buckling load of a straight bar as long as the body: more than so, bending grows with the compression."""


def member_caveats(curves: Curves) -> Iterator[Caveat]:
    """All of them, member by member."""
    inside = curves.survey.inside
    drawing = curves.survey.ready.drawing
    for name in inside.members:
        body, entry = inside.body(name), drawing.mechanism.members[name]
        if not body.starts:
            yield Caveat(name, "has one point only, so no body that forces could run along: name a path or more points")
            continue
        if body.ring:
            yield Caveat(name, "its path closes: within a ring forces do not follow from balance alone, so it is taken"
                         " as cut open where it closes; its inner forces are not those of the closed ring")  # fmt: skip
        arms = [body.names[stop] for stop, arm in zip(body.stops, body.arms, strict=True) if arm]
        if arms:
            what = "is" if len(arms) == 1 else "are"
            yield Caveat(name, f"{', '.join(arms)} {what} beside its path, taken as held by a straight arm from the"
                         " nearest place of it")  # fmt: skip
        if entry.centre is not None and any(
            act.name == f"weight of {name}" and act.spread is None for act in inside.acts(curves.shown, name)
        ):
            yield Caveat(name, f"its weight is taken as acting at {entry.centre} alone, its centre; without 'centre' it"
                         " is spread evenly along the path")  # fmt: skip
        for act in inside.acts(curves.shown, name):
            yield from _act(curves, name, body, act)
        yield from _bends(curves, name, body)
        yield from _columns(curves, name)


def _bends(curves: Curves, name: str, body: Body) -> Iterator[Caveat]:
    """What a bend does to the stress."""
    spec = curves.survey.inside.spec(name)
    corners = ", ".join(body.names[k] for k in body.corners())
    if spec.section is None or not corners:
        return
    if spec.bend_radius is None:
        yield Caveat(name, f"it bends at {corners} without a 'bend_radius': reckoned as straight bars that meet there;"
                     " a small radius or a sharp corner carries more at its inside than is told")  # fmt: skip
    elif spec.curved == 1.0 and spec.bend_radius < SHARP * spec.depth:
        yield Caveat(name, f"its bend radius is less than {SHARP:g} times its depth, and a section of this kind is"
                     " reckoned as straight: the inside of the bend carries more than is told")  # fmt: skip


def _columns(curves: Curves, name: str) -> Iterator[Caveat]:
    """Members that are pressed and of which buckling is not told."""
    inside = curves.survey.inside
    spec = inside.spec(name)
    if spec.section is None or spec.material is None or curves.nowhere:
        return
    if inside.column(name) is not None:
        if spec.material.modulus is None:
            yield Caveat(name, f"{spec.material.name} has no 'modulus', so buckling is not looked at")
        return
    least = inside.largest(curves.shown, name, MARGIN).value
    push = float(np.max(-least, initial=0.0, where=np.isfinite(least)))
    body = inside.body(name)
    pressed = (
        push / (float(body.long.sum()) and spec.buckling_load(float(body.long.sum()))) if spec.material.modulus else 0
    )
    if pressed > _PRESSED:
        yield Caveat(name, "it is pressed and bent at once, or not straight: buckling is not looked at, and its"
                     " compression is no small part of what it would buckle at")  # fmt: skip


def _act(curves: Curves, name: str, body: Body, act: Act) -> Iterator[Caveat]:
    """Where an act goes into the body, if that is not plain."""
    if act.spread is None:
        off = off_body(body, (act.u, act.v))
        most = float(np.max(off, initial=0.0, where=np.isfinite(off)))
        stretches = curves.survey.ready.drawing.mechanism.members[name].stiffness is not None
        if most > (_STRETCH * curves.survey.ready.chain.size if stretches else 10 * body.slack):
            far = show(most, "length", curves.survey.ready.drawing.mechanism.units)
            yield Caveat(name, f"{act.name} acts up to {far} beside its body, taken as held by a stiff arm from the"
                         " nearest place of it")  # fmt: skip
    if act.tone == "torque":
        yield Caveat(
            name, f"{act.name}, a torque, is taken as going in at {_at(body, act)}; 'shaft' names another point"
        )


def _at(body: Body, act: Act) -> str:
    """Name of the node that an act goes in at."""
    u, v = (float(np.ravel(w)[0]) for w in (act.u, act.v))
    return body.names[int(np.argmin(np.hypot(*(body.nodes - (u, v)).T)))]
