"""Load roses of all joints: the force on each member as that member sees it."""

from __future__ import annotations

import math

import numpy as np

from linkcalc.design.pins_answer import JointLoad, PinsAnswer, SideLoad
from linkcalc.faults import fault
from linkcalc.report.blocks import Rose, Roses
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import plain, round_the_clock
from linkcalc.report.sectors import free_text

_CAPTION = (
    "Force of the joint on the member, all cases and poses; the member's own axis (first point to last) points to the"
    " right. Bars: the largest into each ten degrees. Band outside: no load points there."
)


def load_roses(answer: PinsAnswer) -> Roses:
    """A rose for each member at each joint that carries anything.

    Raises Faults if no joint does.
    """
    edge = Edge(answer.stroke)
    nothing = edge.zero("force")
    found = tuple(
        _rose(edge, joint, side)
        for joint in answer.joints
        for side in joint.sides
        if side.rose is not None
        and side.rose.free_angle
        and edge.one(float(side.rose.sectors.max()), "force") > nothing
    )
    if not found:
        raise fault((), "no joint carries anything, so there are no load roses", "give the model a load")
    return Roses(answer.stroke.mechanism.title or "Load roses", _CAPTION, found)


def _rose(edge: Edge, joint: JointLoad, side: SideLoad) -> Rose:
    rose = side.rose
    assert rose is not None
    felt = next((f for f in side.largest.felt if f.member == side.member), None)
    size, points = (felt.force, felt.own_direction) if felt else (math.nan, math.nan)
    unit = plain(edge.unit("angle"))
    force = edge.out(rose.force, "force")
    x, y = force * np.cos(rose.direction), force * np.sin(rose.direction)
    angle = "" if math.isnan(points) else f" at {edge.text(round_the_clock(points), 'angle')}"
    free = free_text(rose, edge)
    return Rose(
        f"{joint.joint} on {side.member}",
        tuple(float(v) for v in edge.out(rose.sectors, "force")),
        tuple(tuple(zip(a.tolist(), b.tolist(), strict=True)) for a, b in zip(x, y, strict=True)),
        (edge.one(size * math.cos(points), "force"), edge.one(size * math.sin(points), "force")),
        rose.free,
        (
            f"{edge.text(side.largest.value, 'force')}{angle}",
            "loaded all round" if free == "-" else f"no load: {free} {unit}",
        ),
    )
