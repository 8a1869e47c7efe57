"""The worst of axial force, shear and bending moment within each member."""

from __future__ import annotations

from linkcalc.design.answer import plate
from linkcalc.design.members import MembersAnswer
from linkcalc.design.peaks import Peak
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.member_places import SIGNS, spoken


def inner_forces(answer: MembersAnswer) -> list[Block]:
    """A row for each of the three in each member; what a member has none of is left out."""
    edge, stroke = Edge(answer.stroke), answer.stroke
    several, stepped = len(stroke.cases) > 1, bool(stroke.drive_name)
    columns = (
        Column("member"), Column("what"), Column("worst"), Column("where along the member"),
        *((Column("case"),) if several else ()),
        *((Column(f"at {stroke.drive_name}", edge.unit("drive"), places=edge.drive_places(stroke.drive)),) * stepped),
    )  # fmt: skip
    rows: list[tuple[Cell, ...]] = []
    for one in answer.members:
        lead = plate(one.member, stroke.mechanism.members[one.member].copies)
        for name, peak in (
            ("axial force N", one.axial),
            ("shear force V", one.shear),
            ("bending moment M", one.bending),
        ):
            if peak is None:
                continue
            rows.append((lead, name, *_cells(peak, edge, several, stepped)))
            lead = ""
        if lead:
            rows.append((lead, "carries nothing", *("",) * (len(columns) - 2 - stepped), *((None,) * stepped)))
    return [Table(columns, tuple(rows), "Inner forces of each member at their worst"), Note(SIGNS)]


def _cells(peak: Peak, edge: Edge, several: bool, stepped: bool) -> tuple[Cell, ...]:
    return (
        edge.text(peak.value, peak.kind), spoken(peak.place, edge),
        *((peak.case,) if several else ()), *((edge.one(peak.drive, "drive"),) * stepped),
    )  # fmt: skip
