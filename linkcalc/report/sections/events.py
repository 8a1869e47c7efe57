"""What happens at exact poses: largest and smallest values, reversals, dead points, limits of motion."""

from __future__ import annotations

import math

from linkcalc.design.answer import StrokeAnswer
from linkcalc.report.blocks import Block, Cell, Column, Table
from linkcalc.report.edge import Edge

_EXTREMES = ("largest", "smallest")
_ELSEWHERE = ("force at", "moment at", "axial force in")


def events(answer: StrokeAnswer) -> list[Block]:
    """A row an event, in the order of the answer; extremes of joint forces stand in the table of joints."""
    told = [e for e in answer.events if not (e.kind in _EXTREMES and e.quantity.startswith(_ELSEWHERE))]
    if not told:
        return []
    edge = Edge(answer)
    several = len(answer.cases) > 1
    columns = (
        Column("what happens"), Column("to"), *((Column("case"),) if several else ()),
        Column(f"at {answer.drive_name}", edge.unit("drive"), places=edge.drive_places(answer.drive)),
        Column("value"),
    )  # fmt: skip
    rows: dict[tuple[Cell, ...], list[str]] = {}
    for e in told:
        value = edge.text(e.value, e.value_kind, 5) if not math.isnan(e.value) else ""
        rows.setdefault((e.kind, e.quantity, edge.one(e.drive, "drive"), value), []).append(e.case)
    return [
        Table(
            columns,
            tuple((*row[:2], *((_cases(cases, answer),) if several else ()), *row[2:]) for row, cases in rows.items()),
            "What happens at exact poses",
        )
    ]


def _cases(cases: list[str], answer: StrokeAnswer) -> str:
    """Cases in which the same happens at the same place, told once."""
    return "all" if "" in cases or set(cases) == set(answer.cases) else ", ".join(dict.fromkeys(cases))
