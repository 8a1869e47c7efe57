"""What was assumed of the members' bodies, and what a designer must not miss in their inner forces."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.answer import Caveat
from linkcalc.design.curves import Curves
from linkcalc.mechanics.acts import Act
from linkcalc.mechanics.body import Body
from linkcalc.mechanics.internal import off_body
from linkcalc.model.units import show


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
        if entry.mass is not None and entry.centre is not None:
            yield Caveat(name, f"its weight is taken as acting at {entry.centre} alone, its centre; without 'centre' it"
                         " is spread evenly along the path")  # fmt: skip
        for act in inside.acts(curves.shown, name):
            yield from _act(curves, name, body, act)


def _act(curves: Curves, name: str, body: Body, act: Act) -> Iterator[Caveat]:
    """Where an act goes into the body, if that is not plain."""
    if act.spread is None:
        off = off_body(body, (act.u, act.v))
        most = float(np.max(off, initial=0.0, where=np.isfinite(off)))
        if most > 10 * body.slack:
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
