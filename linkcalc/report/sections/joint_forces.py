"""What each joint carries at its worst: how much, where in the stroke, in which direction on each member."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.design.answer import Felt, StrokeAnswer, plate
from linkcalc.report.bearings import direction, own_direction, resultant
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.worst import Worst, largest

_DIRECTIONS = (
    "Directions are those of the force on the member, counter-clockwise plus, from the x axis and from the member's"
    " own axis (first point to last), in that very pose."
)


def joint_forces(answer: StrokeAnswer) -> list[Block]:
    """Worst force of each joint with its directions; worst moments of guides and welds; range in two-force members."""
    if not answer.joints:
        return []
    blocks: list[Block] = [_forces(answer)]
    if answer.drive.shape[-1] > 1:
        blocks.append(Note(_DIRECTIONS))
    return [*blocks, *_moments(answer), *_two_force(answer)]


def _forces(answer: StrokeAnswer) -> Table:
    edge = Edge(answer)
    rows: list[tuple[Cell, ...]] = []
    shared = False
    for joint in answer.joints:
        sides = [i for i, b in enumerate(answer.bearings) if b.joint == joint]
        worst = largest(answer, f"force at {joint}", answer.joint_force(joint))
        lead = (joint, answer.bearings[sides[0]].word, *_worst_cells(answer, edge, worst, "force"))
        told = _felt(answer, worst, sides)
        most = max((f.force for f in told), default=0.0)
        for n, i in enumerate(sides):
            part = told[n].force / most if worst and most > 0 else 1.0 if worst else float("nan")
            shared = shared or part < 0.999
            feels = edge.one(worst.value, "force") * part if worst else None
            angles = (told[n].direction, told[n].own_direction) if worst else (float("nan"),) * 2
            cells = (answer.bearings[i].text, feels, *(edge.one(a, "angle") for a in angles))
            rows.append((*(lead if n == 0 else ("",) * len(lead)), *cells))
    columns = [
        Column("joint"), Column("kind"), Column("largest force", edge.unit("force"), zero=edge.zero("force")),
        *_where(answer, edge), Column("on member"), Column("feels", edge.unit("force"), zero=edge.zero("force")),
        Column("direction from x", edge.unit("angle"), places=1),
        Column("from own axis", edge.unit("angle"), places=1),
    ]  # fmt: skip
    drop = None if shared else columns.index(next(c for c in columns if c.head == "feels"))
    return Table(
        tuple(c for i, c in enumerate(columns) if i != drop),
        tuple(tuple(c for i, c in enumerate(row) if i != drop) for row in rows),
        "Joint forces at their worst",
    )


def _felt(answer: StrokeAnswer, worst: Worst | None, sides: Sequence[int]) -> tuple[Felt, ...]:
    """What each side feels in that very pose; of a worst among the computed poses, what was computed there."""
    if worst is None or worst.felt:
        return worst.felt if worst else ()
    size, points, own = (of(answer)[sides][(slice(None), *worst.index)] for of in (resultant, direction, own_direction))
    members = [answer.bearings[i].member for i in sides]
    return tuple(Felt(*each) for each in zip(members, size.tolist(), points.tolist(), own.tolist(), strict=True))


def _moments(answer: StrokeAnswer) -> list[Block]:
    """Guides and welds only: a pin or slot takes no moment."""
    edge = Edge(answer)
    rows = []
    for joint in answer.joints:
        sides = [answer.moment[i] for i, b in enumerate(answer.bearings) if b.joint == joint]
        moment = np.max(np.abs(np.nan_to_num(sides)), axis=0)
        worst = largest(answer, f"moment at {joint}", moment)
        if worst and edge.one(worst.value, "moment") > edge.zero("moment"):
            rows.append((joint, *_worst_cells(answer, edge, worst, "moment")))
    columns = (Column("joint"), Column("largest moment", edge.unit("moment")), *_where(answer, edge))
    return [Table(columns, tuple(rows), "Moments at joints at their worst")] if rows else []


def _two_force(answer: StrokeAnswer) -> list[Block]:
    """Largest tension and compression of each two-force member; a gap where it never has one."""
    edge = Edge(answer)
    rows = []
    for member in answer.two_force:
        axial = answer.axial_in(member)
        pull, push = (largest(answer, f"axial force in {member}", axial, sense) for sense in (1, -1))
        sides = (pull if pull and pull.value > 0 else None, push if push and push.value < 0 else None)
        rows.append(
            (
                plate(member, answer.mechanism.members[member].copies),
                *(cell for side in sides for cell in _worst_cells(answer, edge, side, "force")),
            )
        )
    unit, zero = edge.unit("force"), edge.zero("force")
    columns = (
        Column("two-force member"), Column("largest tension", unit, zero=zero), *_where(answer, edge),
        Column("largest compression", unit, zero=zero), *_where(answer, edge),
    )  # fmt: skip
    return [Table(columns, tuple(rows), "Two-force members")] if rows else []


def _where(answer: StrokeAnswer, edge: Edge) -> tuple[Column, ...]:
    """Columns that tell case and pose, as far as there are several."""
    case = (Column("case"),) if len(answer.cases) > 1 else ()
    pose = (
        (Column(f"at {answer.drive_name}", edge.unit("drive"), places=edge.drive_places(answer.drive)),)
        if answer.drive_name
        else ()
    )
    return case + pose


def _worst_cells(answer: StrokeAnswer, edge: Edge, worst: Worst | None, kind: str) -> tuple[Cell, ...]:
    if worst is None:
        return (None,) * (1 + len(_where(answer, edge)))
    case = (worst.case,) if len(answer.cases) > 1 else ()
    pose = (edge.one(worst.drive, "drive"),) if answer.drive_name else ()
    return (edge.one(abs(worst.value), kind), *case, *pose)
