"""A balance as curves: the effort before and after, and the largest joint force."""

from __future__ import annotations

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.design.balance_answer import BalanceAnswer, Peak
from linkcalc.parts.pose import Array
from linkcalc.report.blocks import Axis, Chart, Curve, Flag, Panel
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import plain

_BEFORE, _AFTER = 1, 0
_FEW = 2


def balance_chart(answer: BalanceAnswer) -> Chart:
    """Panels for the effort and for the largest joint force; of many cases the greatest and the least."""
    edge = Edge(answer.before)
    many = len(answer.after.cases) > _FEW
    parts = ((answer.before, "before", _BEFORE), (answer.after, "after", _AFTER))
    efforts, forces = [], []
    for one, name, hue in parts:
        efforts += _curves(edge, one.effort[:, 0], name, hue, "effort", many)
        top = np.max([one.joint_force(j)[:, 0] for j in one.joints], axis=0)
        forces += _curves(edge, np.max(top, axis=0, keepdims=True), name, hue, "force", False)
    flags = [
        Flag("largest", edge.one(p.drive, "drive"), edge.one(p.value, "effort"), _largest(edge, p), hue)
        for p, hue in ((answer.peak_before, _BEFORE), (answer.peak_after, _AFTER))
        if abs(p.value) > 1e-9 * abs(answer.peak_before.value)
    ]  # fmt: skip
    panels = (
        Panel(Axis("effort", plain(edge.unit("effort"))), tuple(efforts), tuple(flags)),
        Panel(Axis("largest joint force", plain(edge.unit("force"))), tuple(forces)),
    )
    return Chart(
        title=f"{answer.before.mechanism.title or 'Balance'}: before and after",
        axis=Axis(answer.after.drive_name, plain(edge.unit("drive"))),
        drive=tuple(float(d) for d in edge.out(answer.after.drive[0, 0], "drive")),
        cases=_labels(answer.after, many),
        panels=panels,
    )


def _largest(edge: Edge, peak: Peak) -> str:
    return f"largest {edge.text(abs(peak.value), 'effort')}"


def _labels(answer: StrokeAnswer, many: bool) -> tuple[str, ...]:
    if many:
        return ("the greatest and the least of all cases",)
    if len(answer.cases) == 1:
        return ("",)
    return tuple(f"case {c}" if answer.mechanism.cases else c for c in answer.cases)


def _curves(edge: Edge, values: Array, name: str, hue: int, what: str, many: bool) -> list[Curve]:
    rows = edge.out(values, what)
    if many:
        with np.errstate(invalid="ignore"):
            rows = np.array([np.max(rows, axis=0), np.min(rows, axis=0)])
    return [Curve(name, tuple(float(v) for v in row), hue, 0 if many else k) for k, row in enumerate(rows)]
