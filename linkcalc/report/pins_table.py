"""What joints must carry as one table, a row for each member at each joint: what CSV is written from."""

from __future__ import annotations

import math

from linkcalc.design.pins_answer import JointLoad, Peak, PinsAnswer, SideLoad, Swing
from linkcalc.report.blocks import Cell, Column, Table
from linkcalc.report.edge import Edge


def pins_table(answer: PinsAnswer) -> Table:
    """Every joint and member with all its figures, in the file's units; a gap where there is none."""
    edge = Edge(answer.stroke)
    force, angle, length = (edge.unit(kind) for kind in ("force", "angle", "length"))
    drive = Column(answer.stroke.drive_name or "pose", edge.unit("drive"))
    columns = (
        Column("joint"), Column("kind"), Column("member"),
        Column("largest force", force), Column("case"), Column(f"at {drive.head}", drive.unit), Column("copy"),
        Column("feels there", force), Column("direction", angle), Column("direction from own axis", angle),
        Column("smallest force", force), Column("smallest in case"), Column(f"smallest at {drive.head}", drive.unit),
        Column("most on this member", force), Column("no load from", angle), Column("no load to", angle),
        Column("largest moment", edge.unit("moment")), Column("turns against"), Column("swing", angle),
        Column("path turned", angle), Column("slides on"), Column("travel", length), Column("path slid", length),
        Column("mean load", force), Column("diameter", length), Column("path of rubbing", length),
        Column("mean speed", edge.speed_unit), Column("largest speed", edge.speed_unit),
    )  # fmt: skip
    rows = [_row(edge, joint, side, k) for joint in answer.joints for k, side in enumerate(joint.sides)]
    return Table(columns, tuple(rows), "Joints", keys=3)


def _row(edge: Edge, joint: JointLoad, side: SideLoad, number: int) -> tuple[Cell, ...]:
    felt = joint.largest.felt[number] if joint.largest.felt else None
    free = side.rose.free if side.rose and side.rose.free else (math.nan, math.nan)
    turning, sliding = (
        next((s for s in joint.swings if s.member == side.member and s.kind == kind), None)
        for kind in ("angle", "length")
    )
    rubbing = turning if turning and not math.isnan(turning.way) else sliding or turning
    return (
        joint.joint, joint.word, side.member,
        edge.one(joint.largest.value, "force"), *_where(edge, joint.largest), joint.largest.variant,
        *(_of(edge, felt, name, kind) for name, kind in (
            ("force", "force"), ("direction", "angle"), ("own_direction", "angle"))),
        edge.one(joint.smallest.value, "force"), *_where(edge, joint.smallest),
        edge.one(side.largest.value, "force"), *(edge.one(v, "angle") for v in free),
        edge.one(abs(joint.moment.value), "moment") if joint.moment else None,
        *_motion(edge, turning), *_motion(edge, sliding),
        _of(edge, rubbing, "mean_load", "force"), edge.one(joint.diameter, "length"),
        _of(edge, rubbing, "way", "length"),
        *(edge.speed(getattr(rubbing, name)) if rubbing else None for name in ("mean_speed", "speed")),
    )  # fmt: skip


def _where(edge: Edge, peak: Peak) -> tuple[Cell, ...]:
    return (peak.case, edge.one(peak.drive, "drive"))


def _motion(edge: Edge, swing: Swing | None) -> tuple[Cell, ...]:
    if swing is None:
        return (None, None, None)
    return (swing.against, edge.one(swing.reach, swing.kind), edge.one(swing.path, swing.kind))


def _of(edge: Edge, thing: object, name: str, kind: str) -> float | None:
    return None if thing is None else edge.one(getattr(thing, name), kind)
