"""The whole stroke as one table, a row for each case and pose: what CSV is written from."""

from __future__ import annotations

import numpy as np

from linkcalc.design.answer import StrokeAnswer, plate
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array
from linkcalc.report.bearings import direction, own_direction, resultant
from linkcalc.report.blocks import Cell, Column, Table
from linkcalc.report.edge import Edge


def stroke_table(answer: StrokeAnswer) -> Table:
    """Every pose of every case (and of every variant, if there are several), all quantities, in the file's units."""
    edge = Edge(answer)
    cases, variants, poses = answer.status.shape
    columns: list[Column] = []
    cells: list[list[Cell]] = []

    def add(head: str, values: Array, what: str) -> None:
        columns.append(Column(head, edge.unit(what)))
        out = np.broadcast_to(edge.out(values, what), answer.status.shape)
        cells.append([float(v) for v in out.ravel()])

    columns.append(Column("case"))
    cells.append([name for name in answer.cases for _ in range(variants * poses)])
    if variants > 1:
        columns.append(Column("variant"))
        cells.append([v for _ in range(cases) for v in range(variants) for _ in range(poses)])
    if answer.drive_name:
        add(answer.drive_name, answer.drive, "drive")
    for head, values, what in (
        ("effort", answer.effort, "effort"), ("tare effort", answer.tare_effort, "effort"),
        ("load", answer.load, "load"),
    ):  # fmt: skip
        if what in answer.kinds:
            add(head, values, what)
    add("force ratio", answer.force_ratio, "ratio")
    add("ideal ratio", answer.ideal_ratio, "ratio")
    if answer.rubs:
        add("frictionless effort", answer.frictionless_effort, "effort")
        add("efficiency", answer.efficiency, "number")
    size, points, own = resultant(answer), direction(answer), own_direction(answer)
    for i, b in enumerate(answer.bearings):
        on = f"{b.joint} on {b.text}"
        add(f"{on} x", answer.force[i, 0], "force")
        add(f"{on} y", answer.force[i, 1], "force")
        add(f"{on} resultant", size[i], "force")
        add(f"{on} direction", points[i], "angle")
        add(f"{on} direction from own axis", own[i], "angle")
        if np.any(answer.moment[i]):
            add(f"{on} moment", answer.moment[i], "moment")
    for member in answer.two_force:
        add(f"axial in {plate(member, answer.mechanism.members[member].copies)}", answer.axial_in(member), "force")
    for rope in answer.ropes:
        add(f"tension of {rope}", answer.tension_of(rope), "force")
    for reading in answer.readings:
        add(reading.name, reading.values, reading.kind)
    columns.append(Column("status"))
    cells.append([Status(int(s)).text for s in answer.status.ravel()])
    return Table(tuple(columns), tuple(zip(*cells, strict=True)), keys=2)
