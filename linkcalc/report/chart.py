"""A stroke as curves: effort and load, ratios, joint forces, each with its largest values marked."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.faults import fault
from linkcalc.parts.pose import Array
from linkcalc.report.blocks import Axis, Chart, Curve, Flag, Panel
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import plain
from linkcalc.report.worst import largest

# curves further apart than this in size would press one another flat on one axis
_APART = 12.0
# more curves than this in one panel cannot be told apart
CROWD = 8
_LINES = ("dead point", "limit", "change point")


def stroke_chart(answer: StrokeAnswer) -> Chart:
    """The chart of a stroke: panels for effort and load, for the ratios, for the joint forces.

    Raises Faults if there is no stroke to draw over.
    """
    must_step(answer)
    edge = Edge(answer)
    panels = [*_efforts(answer, edge), *_ratios(answer, edge), *_joints(answer, edge), *axial_panels(answer, edge)]
    return chart_of(answer, edge, panels)


def must_step(answer: StrokeAnswer) -> None:
    """Raises Faults if there is only one pose."""
    if answer.drive.shape[-1] < 2 or not np.isfinite(answer.drive).any():
        raise fault(("stroke",), "there is only one pose, so no curve over a stroke", "give the model a [stroke]")


def chart_of(answer: StrokeAnswer, edge: Edge, panels: Sequence[Panel]) -> Chart:
    """A chart over the stroke, with what happens to the whole mechanism across all its panels."""
    lines = {
        (e.kind, round(edge.one(e.drive, "drive"), 9)): Flag(e.kind, edge.one(e.drive, "drive"), math.nan, e.kind)
        for e in answer.events
        if e.kind in _LINES and math.isfinite(e.drive)
    }
    return Chart(
        title=answer.mechanism.title or "Stroke",
        axis=Axis(answer.drive_name, plain(edge.unit("drive"))),
        drive=floats(edge.out(answer.drive[0, 0], "drive")),
        cases=case_labels(answer, edge),
        panels=tuple(p for p in panels if p.curves),
        lines=tuple(lines.values()),
    )


def floats(values: Array) -> tuple[float, ...]:
    return tuple(float(v) for v in values)


def curves_of(edge: Edge, name: str, values: Array, what: str, hue: int) -> list[Curve]:
    """A curve a case; one only where all cases agree, and none where there is nothing to see."""
    out = edge.out(values[:, 0], what)
    if not np.any(np.isfinite(out)):
        return []
    if len(out) > 1 and np.allclose(out, out[:1], rtol=1e-9, atol=edge.zero(what), equal_nan=True):
        out = out[:1]
    return [Curve(name, floats(row), hue, case) for case, row in enumerate(out)]


def flag_largest(
    answer: StrokeAnswer, edge: Edge, name: str, quantity: str, values: Array, what: str, hue: int
) -> list[Flag]:
    worst = largest(answer, quantity, values, by_size=True)
    if worst is None or abs(edge.one(worst.value, what)) <= edge.zero(what):
        return []
    value = edge.one(worst.value, what)
    return [Flag("largest", edge.one(worst.drive, "drive"), value, f"{name} {edge.text(worst.value, what)}", hue)]


def case_labels(answer: StrokeAnswer, edge: Edge) -> tuple[str, ...]:
    """Names of the cases, each with its load if that is steady, so that it needs no curve."""
    labels = []
    for i, case in enumerate(answer.cases):
        name = [f"case {case}"] if case else []
        if _steady(answer):
            name.append(f"load {edge.text(float(np.nanmax(answer.load[i, 0])), 'load')}")
        labels.append(", ".join(name))
    return tuple(labels)


def _steady(answer: StrokeAnswer) -> bool:
    """True if there is a load and it stays the same over the stroke in every case."""
    if "load" not in answer.kinds or not np.isfinite(answer.load[:, 0]).any(axis=-1).all():
        return False
    least, most = np.nanmin(answer.load[:, 0], axis=-1), np.nanmax(answer.load[:, 0], axis=-1)
    return bool(np.allclose(least, most, rtol=1e-9, atol=0))


def _efforts(answer: StrokeAnswer, edge: Edge) -> list[Panel]:
    """Effort, with the effort that is there without load; a load that varies, on the same axis if of like size."""
    panels = []
    if "effort" in answer.kinds:
        curves = curves_of(edge, "effort", answer.effort, "effort", 0)
        if np.nanmax(np.abs(answer.tare_effort), initial=0.0) > 1e-6 * np.nanmax(np.abs(answer.effort), initial=0.0):
            curves += curves_of(edge, "tare effort", answer.tare_effort, "effort", 2)
        flags = flag_largest(answer, edge, "largest", "effort", answer.effort, "effort", 0)
        panels.append(Panel(Axis("effort", plain(edge.unit("effort"))), tuple(curves), tuple(flags)))
    if "load" in answer.kinds and not _steady(answer):
        flags = flag_largest(answer, edge, "largest", "load", answer.load, "load", 1)
        load = Panel(
            Axis("load", plain(edge.unit("load"))), tuple(curves_of(edge, "load", answer.load, "load", 1)), tuple(flags)
        )
        if panels and _alike(panels[0], load):
            first = panels.pop()
            axis = Axis("effort, load", first.axis.unit)
            load = Panel(axis, first.curves + load.curves, first.flags + load.flags)
        panels.append(load)
    return panels


def _alike(first: Panel, second: Panel) -> bool:
    if first.axis.unit != second.axis.unit or not first.curves or not second.curves:
        return False
    a, b = (max(np.nanmax(np.abs(c.values)) for c in p.curves) for p in (first, second))
    return bool(a * _APART > b and b * _APART > a)


def _ratios(answer: StrokeAnswer, edge: Edge) -> list[Panel]:
    """Where everything counted gives the ratio of the geometry, one curve says it."""
    ideal = np.broadcast_to(answer.ideal_ratio, answer.force_ratio.shape)
    if np.allclose(answer.force_ratio, ideal, rtol=1e-6, equal_nan=True):
        curves = curves_of(edge, "force ratio = ideal ratio", answer.force_ratio, "number", 0)
    else:
        curves = [replace(c, broad=True) for c in curves_of(edge, "ideal ratio", answer.ideal_ratio, "number", 3)]
        curves += curves_of(edge, "force ratio", answer.force_ratio, "number", 0)
    return [Panel(Axis("force ratio", plain(edge.unit("ratio"))), tuple(curves))]


def _joints(answer: StrokeAnswer, edge: Edge) -> list[Panel]:
    """A curve a joint and case; where that would be too many, the largest of all cases for each joint."""
    curves: list[Curve] = []
    flags: list[Flag] = []
    groups = like_forces(answer)
    crowded = len(answer.cases) > 1 and len(groups) * len(answer.cases) > CROWD
    for hue, (joints, values) in enumerate(groups):
        name = ", ".join(joints)
        shown = np.max(values, axis=0, keepdims=True) if crowded else values
        curves += curves_of(edge, name, shown, "force", hue)
        flags += flag_largest(answer, edge, name, f"force at {joints[0]}", values, "force", hue)
    text = "joint force, worst case" if crowded else "joint force"
    return [Panel(Axis(text, plain(edge.unit("force"))), tuple(curves), tuple(flags))]


def like_forces(answer: StrokeAnswer) -> list[tuple[list[str], Array]]:
    """Joints with their forces; those that carry the same at every pose (both ends of a link) share one curve."""
    found: list[tuple[list[str], Array]] = []
    for joint in answer.joints:
        values = answer.joint_force(joint)
        twin = next((n for n, v in found if np.allclose(v, values, rtol=1e-7, atol=0, equal_nan=True)), None)
        if twin is None:
            found.append(([joint], values))
        else:
            twin.append(joint)
    return found


def axial_panels(answer: StrokeAnswer, edge: Edge) -> list[Panel]:
    """Two-force members only where one of them changes from pull to push: else the joint forces say it all."""
    turning = {e.quantity: e for e in answer.events if e.kind == "reversal" and e.quantity in answer.two_force}
    curves: list[Curve] = []
    flags: list[Flag] = []
    for hue, member in enumerate(m for m in answer.two_force if m in turning):
        curves += curves_of(edge, member, answer.axial_in(member), "force", hue)
        flags += [
            Flag(e.kind, edge.one(e.drive, "drive"), 0.0, f"{member} reverses", hue)
            for e in answer.events
            if e.kind == "reversal" and e.quantity == member
        ]
    return [Panel(Axis("tension (plus)", plain(edge.unit("force"))), tuple(curves), tuple(flags))]
