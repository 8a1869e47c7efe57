"""The inner forces over the whole stroke as one table, a row for each case and pose: what CSV is written from."""

from __future__ import annotations

import numpy as np

from linkcalc.design.inner import KINDS
from linkcalc.design.members import MembersAnswer
from linkcalc.mechanics.state import Status
from linkcalc.report.blocks import Cell, Column, Table
from linkcalc.report.edge import Edge


def members_table(answer: MembersAnswer) -> Table:
    """For each member the largest axial force, shear and bending moment along it, with their signs, at every pose."""
    stroke, edge = answer.stroke, Edge(answer.stroke)
    shape = stroke.status.shape
    columns = [Column("case")]
    cells: list[list[Cell]] = [[name for name in stroke.cases for _ in range(shape[1] * shape[2])]]
    if stroke.drive_name:
        columns.append(Column(stroke.drive_name, edge.unit("drive")))
        cells.append([float(v) for v in np.broadcast_to(edge.out(stroke.drive, "drive"), shape).ravel()])
    for one in answer.members:
        for quantity, values in one.over.items():
            columns.append(Column(f"{quantity} in {one.member}", edge.unit(KINDS[quantity])))
            cells.append([float(v) for v in edge.out(values, KINDS[quantity]).ravel()])
    columns.append(Column("status"))
    cells.append([Status(int(s)).text for s in stroke.status.ravel()])
    return Table(tuple(columns), tuple(zip(*cells, strict=True)), "Inner forces")
