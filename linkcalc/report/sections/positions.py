"""Where it balances along the stroke."""

from __future__ import annotations

from linkcalc.design.answer import STEADY, StrokeAnswer
from linkcalc.design.positions import Positions
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import plain


def positions(found: Positions, answer: StrokeAnswer, title: str) -> list[Block]:
    """A row a balance, and what friction holds; a sentence where there is none, or nothing but balances."""
    edge = Edge(answer)
    several = len(answer.mechanism.cases) > 1
    hand = f", with an effort of {edge.text(found.effort, 'effort')}" if found.effort else ", without effort"
    places = edge.drive_places(answer.drive)
    drive = Column(f"at {answer.drive_name}", edge.unit("drive"), places=places)
    kind = stiffness_kind(answer)
    case = (Column("case"),) if several else ()
    blocks: list[Block] = []
    rows: tuple[tuple[Cell, ...], ...] = tuple(
        (*((p.case,) if several else ()), edge.one(p.drive, "drive"), STEADY[p.steady], edge.one(p.stiffness, kind))
        for p in found.places
    )
    if rows:
        columns = (*case, drive, Column("balance"), Column("stiffness at the effort", edge.unit(kind)))
        blocks.append(Table(columns, rows, title + hand))
    if found.neutral:
        which = f" in case {', '.join(found.neutral)}" if several else ""
        blocks.append(Note(f"balanced at every pose{which}, neutral: it stays where it is left.", title + hand))
    if not rows and not found.neutral:
        blocks.append(
            Note(
                f"none between the ends of the stroke{'; what friction holds see below' if found.held else ''}.",
                title + hand,
            )
        )
    if found.held:
        unit = plain(edge.unit("drive"))
        held: tuple[tuple[Cell, ...], ...] = tuple(
            (*((h.case,) if several else ()), edge.one(h.start, "drive"), edge.one(h.stop, "drive")) for h in found.held
        )
        columns = (*case, Column("from", unit, places=places), Column("to", unit, places=places))
        blocks.append(Table(columns, held, f"Friction holds it{hand}"))
    return blocks


def stiffness_kind(answer: StrokeAnswer) -> str:
    """Kind of the stiffness of a balance at the effort: of a hand that pushes, or one that turns."""
    return "torsion stiffness" if answer.kinds.get("effort") == "moment" else "stiffness"
