"""What the foundation must bear: the force at each place on the ground, all of them together, and what would tip it."""

from __future__ import annotations

import math

import numpy as np

from linkcalc.design.pins_answer import Peak, PinsAnswer
from linkcalc.model.mechanism import GROUND
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import plain
from linkcalc.report.sections.pins_worst import where_cells, where_columns

_NOTE = (
    "Forces on the ground, the weight of the frame itself not among them. If the frame just stands, its weight must"
    " hold it against the upward force and the moments about the edges of its feet: ask with the point set there."
)


def pins_ground(answer: PinsAnswer) -> list[Block]:
    """Anchors a row each, then the sum."""
    footing = answer.footing
    if footing is None:
        return []
    edge = Edge(answer.stroke)
    force = edge.unit("force")
    where = where_columns(answer, edge)
    rows = [
        (
            j.joint,
            j.word,
            edge.one(s.largest.value, "force"),
            *where_cells(answer, edge, s.largest),
            _direction(s, edge),
        )
        for j in answer.joints
        for s in j.sides
        if s.member == GROUND and s.largest.value
    ]
    columns = (
        Column("on the ground at"), Column("kind"), Column("largest force", force, zero=edge.zero("force")), *where,
        Column("direction from x", edge.unit("angle"), places=1),
    )  # fmt: skip
    anchors = [Table(columns, tuple(rows), "Anchors in the ground")] if rows else []
    x, y = (edge.one(v, "length") for v in footing.about)
    unit = plain(edge.unit("length"))
    sums: list[tuple[Cell, ...]] = [
        _row(answer, edge, text, peak, kind)
        for text, peak, kind in (
            ("resultant", footing.force, "force"),
            ("to the right", footing.right, "force"), ("to the left", footing.left, "force"),
            ("upward", footing.up, "force"), ("downward", footing.down, "force"),
            ("turning left (counter-clockwise)", footing.left_turning, "moment"),
            ("turning right (clockwise)", footing.right_turning, "moment"),
        )
    ]  # fmt: skip
    title = f"All on the ground together, moments about ({x:.6g}, {y:.6g}) {unit}"
    return [*anchors, Table((Column("largest"), Column("size"), *where), tuple(sums), title), Note(_NOTE)]


def _direction(side, edge: Edge) -> float | None:  # type: ignore[no-untyped-def]
    felt = next((f for f in side.largest.felt if f.member == GROUND), None)
    return edge.one(felt.direction, "angle") if felt else None


def _row(answer: PinsAnswer, edge: Edge, text: str, peak: Peak, kind: str) -> tuple[Cell, ...]:
    """A gap where it never goes that way."""
    if not math.isnan(peak.value) and edge.one(peak.value, kind) <= edge.zero(kind):
        return (text, "never", *(np.full(len(where_cells(answer, edge, peak)), None)))
    return (text, edge.text(peak.value, kind), *where_cells(answer, edge, peak))
