"""Requirements judged at their worst pose, with what is left of the limit."""

from __future__ import annotations

import math

from linkcalc.design.answer import StrokeAnswer, Verdict
from linkcalc.report.blocks import Block, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number


def requirements(answer: StrokeAnswer) -> list[Block]:
    """A row a requirement, and one sentence on the whole."""
    if not answer.verdicts:
        return []
    edge = Edge(answer)
    several, stepped = len(answer.cases) > 1, bool(answer.drive_name)
    columns = (
        Column("requirement"), Column("says"), Column("worst"), Column("limit"), Column("margin"), Column(""),
        *((Column("case"),) if several else ()),
        *((Column(f"at {answer.drive_name}", edge.unit("drive"), places=edge.drive_places(answer.drive)),) * stepped),
    )  # fmt: skip
    rows = tuple(
        (
            v.name, v.text, edge.text(v.worst, v.kind, 5), edge.text(v.limit, v.kind, 5), margin(v),
            "holds" if v.holds else "FAILS", *((v.case or "all",) if several else ()),
            *((edge.one(v.drive, "drive"),) * stepped),
        )
        for v in answer.verdicts
    )  # fmt: skip
    failed = sum(not v.holds for v in answer.verdicts)
    n = len(answer.verdicts)
    text = f"{failed} of {n} requirements FAIL." if failed else f"All {n} requirements hold." if n > 1 else "It holds."
    return [Table(columns, rows, "Requirements, at the worst pose"), Note(text)]


def margin(verdict: Verdict) -> str:
    """What is left of the limit, as a part of it; minus is beyond it, "" if the limit is zero or the worst unknown.

    >>> margin(Verdict("hand", "effort <= 150 N", True, 120.0, 150.0, "force", "", 0.0))
    '+20 %'
    """
    if not math.isfinite(verdict.worst) or not verdict.limit:
        return ""
    left = abs(verdict.limit - verdict.worst) / abs(verdict.limit) * 100
    sign = "+" if verdict.holds else "-"
    return f"{sign}{number(left, 2, trim=True) if left < 10 else f'{left:.0f}'} %"
