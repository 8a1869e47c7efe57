"""Where free members balance that nothing drives."""

from __future__ import annotations

from linkcalc.design.answer import StrokeAnswer
from linkcalc.report.blocks import Block, Column, Table
from linkcalc.report.edge import Edge


def rests(answer: StrokeAnswer) -> list[Block]:
    """A row a balance: the turn of each member that has another turn in some other balance or in the drawing."""
    if not answer.rests:
        return []
    edge, unit = Edge(answer), Edge(answer).unit("angle")
    names = list(answer.rests[0].turns)
    moved = [n for n in names if any(abs(r.turns[n]) > 1e-9 for r in answer.rests)] or names
    several = len(answer.cases) > 1
    columns = (
        *((Column("case"),) if several else ()), Column("balance"),
        *(Column(f"turn of {n} from the drawing", unit, places=3) for n in moved),
    )  # fmt: skip
    rows = tuple(
        (*((r.case,) if several else ()), r.text, *(edge.one(r.turns[n], "angle") for n in moved)) for r in answer.rests
    )
    return [Table(columns, rows, "Where it balances, as far as was found")]
