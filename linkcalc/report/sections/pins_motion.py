"""How the members of each joint move against one another: swing, path and speed of rubbing, mean load, reversals."""

from __future__ import annotations

import math

from linkcalc.design.pins_answer import PinsAnswer
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number

_MEAN = (
    "Mean load: the cube root of the mean of its cube over the way turned or slid, in the worst case{}. Swing and path"
    " are those of one stroke, one way."
)


def pins_motion(answer: PinsAnswer) -> list[Block]:
    """Nothing without a stroke."""
    swings = [(joint, s) for joint in answer.joints for s in joint.swings]
    if not swings:
        return []
    edge = Edge(answer.stroke)
    force = Column("mean load", edge.unit("force"), zero=edge.zero("force"))
    blocks: list[Block] = []
    for kind, title in (("angle", "Turning of the joints"), ("length", "Sliding in the guides")):
        found = [(joint, s) for joint, s in swings if s.kind == kind]
        if not found:
            continue
        rubs = any(not math.isnan(s.way) for _, s in found)
        timed = rubs and not math.isnan(answer.time)
        diameter = kind == "angle" and rubs
        columns = (
            Column("joint"), Column("member"), Column("against"),
            Column("swing" if kind == "angle" else "travel", edge.unit(kind), places=1),
            Column("path", edge.unit(kind), places=1), force,
            *((Column("diameter", edge.unit("length")), Column("path of rubbing", edge.unit("length"))) * diameter),
            *((Column("mean speed", edge.speed_unit), Column("largest speed", edge.speed_unit)) * timed),
        )  # fmt: skip
        rows = []
        for joint, s in found:
            cells: tuple[Cell, ...] = (joint.joint, s.member, s.against, edge.one(s.reach, kind))
            cells += (edge.one(s.path, kind), edge.one(s.mean_load, "force"))
            cells += (edge.one(joint.diameter, "length"), edge.one(s.way, "length")) if diameter else ()
            cells += (edge.speed(s.mean_speed), edge.speed(s.speed)) if timed else ()
            rows.append(cells)
        blocks.append(Table(columns, tuple(rows), title, keys=3))
    blocks.append(Note(_MEAN.format(" there and back" if answer.stroke.rubs else "")))
    return [*blocks, *_reversals(answer, edge)]


def rate_line(answer: PinsAnswer) -> str:
    """What the speeds rest on; "" if no rate was stated.

    A stroke that goes all the way round is not gone back.
    """
    if math.isnan(answer.time):
        return ""
    per_minute = 60.0 / answer.time / (1 if answer.rounds else 2)
    way = "all the way round each time" if answer.rounds else "there and back"
    return (
        f"Speeds: one stroke in {number(answer.time, trim=True)} s, {number(per_minute, trim=True)} a minute {way}; the"
        f" {answer.stroke.drive_name} goes at even speed, without stops at its ends."
    )


def _reversals(answer: PinsAnswer, edge: Edge) -> list[Block]:
    """A row for each place where what is carried turns round: play is taken up there with a knock."""
    stroke = answer.stroke
    found: dict[tuple[str, str, float], list[str]] = {}
    for joint in answer.joints:
        for r in joint.reversals:
            found.setdefault((r.of, r.case, r.drive), []).append(joint.joint)
    rows = tuple(
        (of, ", ".join(joints), *((case or "all",) if len(stroke.cases) > 1 else ()), edge.one(drive, "drive"))
        for (of, case, drive), joints in found.items()
    )
    columns = (
        Column("turns round in"), Column("at joints"), *((Column("case"),) if len(stroke.cases) > 1 else ()),
        Column(f"at {stroke.drive_name}", edge.unit("drive"), places=edge.drive_places(stroke.drive)),
    )  # fmt: skip
    return [Table(columns, rows, "Where forces turn round (play is taken up there)")] if rows else []
