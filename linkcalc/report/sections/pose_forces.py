"""Every joint force of one pose by components, member by member: what a frame is asked for."""

from __future__ import annotations

from linkcalc.design.answer import StrokeAnswer, plate
from linkcalc.report.bearings import direction, own_direction, resultant
from linkcalc.report.blocks import Block, Column, Table
from linkcalc.report.edge import Edge


def pose_forces(answer: StrokeAnswer, pose: int) -> list[Block]:
    """A table a load case: a row for each member at each joint; another for two-force members."""
    edge = Edge(answer)
    size, points, own = resultant(answer), direction(answer), own_direction(answer)
    force, zero, angle = edge.unit("force"), edge.zero("force"), edge.unit("angle")
    turning = bool((abs(edge.out(answer.moment[..., pose], "moment")) > edge.zero("moment")).any())
    columns = (
        Column("joint"), Column("kind"), Column("on member"),
        Column("Fx", force, zero=zero), Column("Fy", force, zero=zero), Column("force", force, zero=zero),
        Column("direction from x", angle, places=1), Column("from own axis", angle, places=1),
        *((Column("moment", edge.unit("moment"), zero=edge.zero("moment")),) if turning else ()),
    )  # fmt: skip
    blocks: list[Block] = []
    for case, name in enumerate(answer.cases):
        at = (case, 0, pose)
        rows = []
        for i, b in enumerate(answer.bearings):
            numbers = (*(answer.force[(i, axis, *at)] for axis in (0, 1)), size[(i, *at)])
            turn = (edge.one(answer.moment[(i, *at)], "moment"),) if turning else ()
            angles = (edge.one(a[(i, *at)], "angle") for a in (points, own))
            rows.append((b.joint, b.word, b.text, *(edge.one(n, "force") for n in numbers), *angles, *turn))
        of_case = f", case {name}" if len(answer.cases) > 1 else ""
        if rows:
            blocks.append(Table(columns, tuple(rows), f"Force of each joint on each member{of_case}", keys=3))
        axial = tuple(
            (plate(m, answer.mechanism.members[m].copies), edge.one(answer.axial_in(m)[at], "force"))
            for m in answer.two_force
        )
        if axial:
            heads = (Column("two-force member"), Column("tension (plus) or compression (minus)", force, zero=zero))
            blocks.append(Table(heads, axial, f"Two-force members{of_case}"))
    return blocks
