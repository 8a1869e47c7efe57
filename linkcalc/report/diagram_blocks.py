"""The diagrams along one member in words and numbers: what a terminal takes of them."""

from __future__ import annotations

import numpy as np

from linkcalc.design.diagram import Diagram, Stretch
from linkcalc.report.blocks import Block, Cell, Column, Heading, Note, Table
from linkcalc.report.drawing import caption_at
from linkcalc.report.edge import Edge
from linkcalc.report.member_places import SIGNS, spoken
from linkcalc.report.numbers import plain


def diagram_blocks(found: Diagram) -> list[Block]:
    """Where N, V and M are largest in that pose, then the values along the member."""
    edge = Edge(found.stroke)
    title = f"{found.stroke.mechanism.title or 'Mechanism'}: inner forces of {found.member}"
    lines = [
        f"{name} {edge.text(peak.value, peak.kind)}, {spoken(peak.place, edge)}"
        for name, peak in found.peaks.items()
        if abs(peak.value) > nothing(found, peak.kind)
    ]
    where = caption_at(found.stroke, found.drive, found.case)
    told: list[Block] = [Heading(title, 1)]
    if where:
        told.append(Note(f"{where[0].upper()}{where[1:]}."))
    if not found.stretches:
        return [*told, Note("It has no body: it carries one point only.")]
    return [
        *told,
        Note("Largest in this pose: " + ("; ".join(lines) or "nothing") + "."),
        diagram_table(found),
        Note(SIGNS),
    ]


def diagram_table(found: Diagram) -> Table:
    """A row for each place: both ends of every stretch, and places between where it is not straight."""
    edge = Edge(found.stroke)
    length, force, moment = (edge.unit(k) for k in ("length", "force", "moment"))
    zero = {k: edge.one(nothing(found, k), k) for k in ("force", "moment")}
    columns = (
        Column("from"), Column("to"), Column("way from there", length), Column("way along the member", length),
        Column("N", force, zero=zero["force"]), Column("V", force, zero=zero["force"]),
        Column("M", moment, zero=zero["moment"]),
    )  # fmt: skip
    rows: list[tuple[Cell, ...]] = []
    for one in found.stretches:
        for k in _told(one):
            numbers = (
                edge.one(one.way[k], "length"), edge.one(one.along[k], "length"),
                edge.one(one.axial[k], "force"), edge.one(one.shear[k], "force"), edge.one(one.bending[k], "moment"),
            )  # fmt: skip
            rows.append((one.start, one.stop, *numbers))
    return Table(columns, tuple(rows), f"Along {found.member} ({plain(length)} from its first point)", keys=2)


def nothing(found: Diagram, kind: str) -> float:
    """[N] or [N m] what is smaller is rounding: of the largest force on the member, for a moment times its extent."""
    force = max((float(np.hypot(*a.force)) for a in found.acts), default=0.0)
    reach = float(np.max(np.ptp(np.concatenate([s.spots for s in found.stretches]), axis=0), initial=0.0))
    moment = max((abs(a.moment) for a in found.acts), default=0.0)
    return 1e-9 * (max(force, moment / reach) if kind == "force" else max(force * reach, moment))


def _told(one: Stretch) -> list[int]:
    """Places of a stretch that a table tells: its ends, and where it is curved the quarters between."""
    last = len(one.way) - 1
    return sorted({int(k) for k in np.linspace(0, last, 5)}) if last > 1 else [0, last]
