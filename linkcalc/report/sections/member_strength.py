"""Stress, utilisation and buckling of the members whose section is told, and the sheets they come from."""

from __future__ import annotations

import math

from linkcalc.design.members import MemberForces, MembersAnswer
from linkcalc.faults import fault
from linkcalc.model.requirements import EXAMPLES
from linkcalc.report.blocks import Block, Cell, Column, Heading, Note, Table
from linkcalc.report.drawing import caption_at
from linkcalc.report.edge import Edge
from linkcalc.report.member_places import spoken
from linkcalc.report.numbers import number
from linkcalc.report.sections.working import working_blocks, working_table


def member_strength(answer: MembersAnswer) -> list[Block]:
    """A row for each member with a section or a material."""
    edge = Edge(answer.stroke)
    told = [m for m in answer.members if m.spec.section is not None or m.spec.material is not None]
    if not told:
        return []
    columns = (
        Column("member"), Column("made of"), Column("worst stress"), Column("where"), Column("used"),
        Column("buckling margin"), Column("section modulus needed"),
    )  # fmt: skip
    rows = tuple(_row(one, edge) for one in told)
    blocks: list[Block] = [Table(columns, rows, "Strength of the members"), Note(_MEANS)]
    usual = [m.member for m in told if m.spec.material is not None and not m.spec.given]
    if usual:
        factor = number(
            told[0].spec.factor if told[0].member in usual else answer.member(usual[0]).spec.factor, trim=True
        )
        blocks.append(
            Note(f"No 'factor' is told for {', '.join(usual)}: {factor} against yield and buckling is taken.")
        )
    return blocks


_MEANS = (
    "Stress is that of axial force and bending at the outermost fibre. Used is the largest part of what is allowed, of"
    " that stress, of mean shear and of buckling; over 100 % the member does not do. --working NAME shows how."
)


def _row(one: MemberForces, edge: Edge) -> tuple[Cell, ...]:
    spec = one.spec
    made = [] if spec.section is None else [spec.section.name]
    made += [] if spec.material is None else [f"{spec.material.name}, factor {number(spec.factor, trim=True)}"]
    margin = (
        "" if one.margin is None else "not pressed" if math.isinf(one.margin.value) else number(one.margin.value, 3)
    )
    needed = "" if one.needed is None else edge.text(one.needed, "section modulus")
    return (
        one.member, ", ".join(made),
        "" if one.stress is None else edge.text(one.stress.value, "stress"),
        "" if one.stress is None else spoken(one.stress.place, edge),
        "" if one.used is None else f"{100 * one.used.value:.0f} %" if math.isfinite(one.used.value) else "no bound",
        margin, needed,
    )  # fmt: skip


def member_workings(answer: MembersAnswer, member: str) -> list[Block]:
    """The sheets of one member. Raises Faults: its section or material is not told."""
    one, edge = _told(answer, member), Edge(answer.stroke)
    blocks: list[Block] = [Heading(f"{answer.stroke.mechanism.title or 'Mechanism'}: strength of {member}", 1)]
    for peak, working in ((one.stress, one.strength), (one.margin, one.buckling)):
        if peak is None or working is None:
            continue
        where = [caption_at(answer.stroke, peak.drive, answer.stroke.cases.index(peak.case)), spoken(peak.place, edge)]
        said = "; ".join(w for w in where if w)
        blocks += [Note(f"Worst: {said}." if said else "Worst."), *working_blocks(working, edge.units)]
    return blocks


def workings_table(answer: MembersAnswer, member: str) -> Table:
    """The same as rows."""
    one, edge = _told(answer, member), Edge(answer.stroke)
    tables = [working_table(w, edge.units) for w in (one.strength, one.buckling) if w is not None]
    return Table(tables[0].columns, tuple(row for t in tables for row in t.rows), f"Strength of {member}", keys=2)


def _told(answer: MembersAnswer, member: str) -> MemberForces:
    one = answer.member(member)
    for key, known in (("section", one.spec.section), ("material", one.spec.material)):
        if known is None:
            raise fault(("members", member), f"{key!r} is missing", f"its strength asks for one: {EXAMPLES[key]}")
    if one.strength is None:
        raise fault(("members", member), "it carries nothing", "there is no strength to show")
    return one
