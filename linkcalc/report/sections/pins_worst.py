"""What each joint carries at its worst, a joint a row, and what each of its members feels there."""

from __future__ import annotations

import math

from linkcalc.design.answer import plate
from linkcalc.design.pins_answer import JointLoad, Peak, PinsAnswer
from linkcalc.design.roses import FAINT
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import round_the_clock
from linkcalc.report.sectors import free_text

_NOTE = (
    "Directions are those of the force on the member (in the first table, on the member that the second names first),"
    " counter-clockwise plus, in that very pose; own axis: from the"
    " member's first point to its last, counted all the way round from it. No load: the widest sector that no force"
    f" points into in any case and pose (less than {FAINT * 100:g} % of the joint's largest does not count). The joint"
    " presses on a bore where the force on its member points: holes and splits go where no load is."
)


def pins_worst(answer: PinsAnswer) -> list[Block]:
    """Two tables and how to read them."""
    if not answer.joints:
        return []
    return [_joints(answer), _members(answer), Note(_NOTE), *_moments(answer), *_ropes(answer)]


def where_columns(answer: PinsAnswer, edge: Edge) -> tuple[Column, ...]:
    """Columns that tell case, pose and copy, as far as there are several."""
    stroke = answer.stroke
    case = (Column("case"),) * (len(stroke.cases) > 1)
    pose = (Column(f"at {stroke.drive_name}", edge.unit("drive"), places=edge.drive_places(stroke.drive)),)
    return (*case, *(pose if stroke.drive_name else ()), *((Column("copy"),) * (answer.variants > 0)))


def where_cells(answer: PinsAnswer, edge: Edge, peak: Peak) -> tuple[Cell, ...]:
    """The cells under them."""
    case = (peak.case,) * (len(answer.stroke.cases) > 1)
    pose = (edge.one(peak.drive, "drive"),) * bool(answer.stroke.drive_name)
    copy = "" if peak.variant is None else str(peak.variant)
    return (*case, *pose, *((copy,) * (answer.variants > 0)))


def _force(edge: Edge, head: str) -> Column:
    return Column(head, edge.unit("force"), zero=edge.zero("force"))


def _joints(answer: PinsAnswer) -> Table:
    edge = Edge(answer.stroke)
    moves = bool(answer.stroke.drive_name)
    columns = (
        Column("joint"), Column("kind"), _force(edge, "largest force"), *where_columns(answer, edge),
        Column("direction from x", edge.unit("angle"), places=1),
        *((_force(edge, "smallest force"), Column("swing", edge.unit("angle"), places=1),
           _force(edge, "mean load")) if moves else ()),
    )  # fmt: skip
    rows = []
    for joint in answer.joints:
        felt = joint.largest.felt
        direction = edge.one(felt[0].direction, "angle") if felt else None
        cells: tuple[Cell, ...] = (joint.joint, joint.word, edge.one(joint.largest.value, "force"))
        cells += (*where_cells(answer, edge, joint.largest), direction)
        if moves:
            swing = joint.swing
            mean = max((s.mean_load for s in joint.swings if not math.isnan(s.mean_load)), default=math.nan)
            cells += (edge.one(joint.smallest.value, "force"), edge.one(swing.reach, "angle") if swing else None)
            cells += (edge.one(mean, "force"),)
        rows.append(cells)
    return Table(columns, tuple(rows), "What each joint carries")


def _members(answer: PinsAnswer) -> Table:
    edge = Edge(answer.stroke)
    angle = edge.unit("angle")
    columns = (
        Column("joint"), Column("on member"), _force(edge, "feels there"),
        Column("direction from x", angle, places=1), Column("from own axis", angle, places=1),
        _force(edge, "most it ever feels"), Column("no load from own axis", angle),
    )  # fmt: skip
    rows = [row for joint in answer.joints for row in _sides(answer, joint, edge)]
    return Table(columns, tuple(rows), "On each member, where its joint carries most", keys=2)


def _sides(answer: PinsAnswer, joint: JointLoad, edge: Edge) -> list[tuple[Cell, ...]]:
    rows = []
    for k, side in enumerate(joint.sides):
        felt = joint.largest.felt[k] if joint.largest.felt else None
        there: tuple[Cell, ...] = (None, None, None)
        if felt:
            angles = (edge.one(a, "angle") for a in (felt.direction, round_the_clock(felt.own_direction)))
            there = (edge.one(felt.force, "force"), *angles)
        most = edge.one(side.largest.value, "force")
        own = answer.stroke.mechanism.members.get(side.member)
        name = plate(side.member, own.copies if own else 1)
        rows.append((joint.joint if k == 0 else "", name, *there, most, free_text(side.rose, edge)))
    return rows


def _moments(answer: PinsAnswer) -> list[Block]:
    """Guides, welds, and pins that rub."""
    edge = Edge(answer.stroke)
    columns = (Column("joint"), Column("kind"), Column("largest moment", edge.unit("moment")),
               *where_columns(answer, edge))  # fmt: skip
    rows = tuple(
        (j.joint, j.word, abs(edge.one(j.moment.value, "moment")), *where_cells(answer, edge, j.moment))
        for j in answer.joints
        if j.moment is not None and abs(edge.one(j.moment.value, "moment")) > edge.zero("moment")
    )
    return [Table(columns, rows, "Moments at joints at their worst")] if rows else []


def _ropes(answer: PinsAnswer) -> list[Block]:
    edge = Edge(answer.stroke)
    where = where_columns(answer, edge)
    columns = (Column("rope"), _force(edge, "largest tension"), *where, _force(edge, "smallest tension"), *where)
    rows = tuple(
        (rope.rope, *(cell for p in (rope.largest, rope.smallest)
                      for cell in (edge.one(p.value, "force"), *where_cells(answer, edge, p))))
        for rope in answer.ropes
    )  # fmt: skip
    return [Table(columns, rows, "Ropes")] if rows else []
