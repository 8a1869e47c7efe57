"""Joint forces over the stroke, the largest of each marked."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from linkcalc.design.pins_answer import PinsAnswer
from linkcalc.report.blocks import Axis, Chart, Curve, Flag, Panel
from linkcalc.report.chart import CROWD, axial_panels, chart_of, curves_of, flag_largest, like_forces, must_step
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import plain

_MOST = 6  # curves that can be told apart in a panel


def pins_chart(answer: PinsAnswer) -> Chart:
    """Panels of a few joints each, those that carry most first; two-force members that change their sense below.

    Raises Faults if there is no stroke to draw over.
    """
    stroke = answer.stroke
    must_step(stroke)
    edge = Edge(stroke)
    groups = sorted(like_forces(stroke), key=lambda g: -float(np.nanmax(g[1], initial=0.0)))
    crowded = len(stroke.cases) > 1 and min(len(groups), _MOST) * len(stroke.cases) > CROWD
    count = -(-len(groups) // _MOST)
    each = -(-len(groups) // max(count, 1))
    panels = []
    for first in range(0, len(groups), each or 1):
        curves: list[Curve] = []
        flags: list[Flag] = []
        for hue, (joints, values) in enumerate(groups[first : first + each]):
            name = ", ".join(joints)
            shown = np.max(values, axis=0, keepdims=True) if crowded else values
            curves += curves_of(edge, name, shown, "force", hue)
            flags += flag_largest(stroke, edge, name, f"force at {joints[0]}", values, "force", hue)
        text = "joint force, worst case" if crowded else "joint force"
        panels.append(Panel(Axis(text, plain(edge.unit("force"))), tuple(curves), tuple(flags)))
    chart = chart_of(stroke, edge, [*panels, *axial_panels(stroke, edge)])
    # one curve for all cases needs no key of them
    return replace(chart, cases=(f"cases {', '.join(stroke.cases)}",)) if crowded else chart
