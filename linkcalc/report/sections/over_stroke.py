"""Effort, load, ratios and the largest joint force, pose by pose, thinned to what a page takes in."""

from __future__ import annotations

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import places_for

_FEWEST, _MOST = 13, 25


def over_stroke(answer: StrokeAnswer, *, all_joints: bool = False) -> list[Block]:
    """One table a load case over the stroke; in a frame one table, a row a case.

    all_joints  a column for each joint besides the largest of them
    """
    edge = Edge(answer)
    columns, values = _columns(answer, edge, all_joints)
    if answer.drive.shape[-1] == 1:
        several = len(answer.cases) > 1
        heads = (*((Column("case"),) if several else ()), *columns[1:])
        rows = tuple((*((c,) if several else ()), *(v[i][0] for v in values[1:])) for i, c in enumerate(answer.cases))
        return [Table(heads, rows, "In the pose as drawn"), *_failed(answer)] if columns[1:] else _failed(answer)
    picked = thinned(answer.drive.shape[-1])
    blocks: list[Block] = []
    for i, case in enumerate(answer.cases):
        title = f"Over the stroke, case {case}" if len(answer.cases) > 1 else "Over the stroke"
        blocks.append(Table(columns, tuple(tuple(v[i][p] for v in values) for p in picked), title))
    if len(picked) < answer.drive.shape[-1]:
        blocks.append(Note(f"{len(picked)} of {answer.drive.shape[-1]} poses; CSV and JSON give all of them."))
    return [*blocks, *_failed(answer)]


def _failed(answer: StrokeAnswer) -> list[Block]:
    """Why there are gaps: no entry goes missing without its reason."""
    codes = answer.status.ravel().tolist()
    return [
        Note(f"no answer at {codes.count(code)} of {len(codes)} poses: {Status(code).text}", "Gaps")
        for code in sorted(set(codes))
        if code != Status.FINE
    ]


def _columns(answer: StrokeAnswer, edge: Edge, all_joints: bool) -> tuple[tuple[Column, ...], list[list[list[Cell]]]]:
    """Columns and, for each, its cells by case and pose; idle columns are left out."""
    drive = [float(d) for d in edge.out(answer.drive[0, 0], "drive")]
    shown = [drive[p] for p in thinned(len(drive))]
    columns = [Column(answer.drive_name, edge.unit("drive"), places=places_for(shown))]
    cells: list[list[list[Cell]]] = [[list(drive) for _ in answer.cases]]

    def add(values: Array, head: str, what: str, *, always: bool = False) -> None:
        out = edge.out(values[:, 0], what)
        if always or np.any(np.abs(np.nan_to_num(out)) > edge.zero(what)):
            columns.append(Column(head, edge.unit(what), zero=edge.zero(what)))
            cells.append([[float(v) for v in row] for row in out])

    add(answer.effort, "effort", "effort", always="effort" in answer.kinds)
    add(answer.tare_effort, "tare effort", "effort")
    add(answer.load, "load", "load", always="load" in answer.kinds)
    add(answer.force_ratio, "force ratio", "ratio")
    add(answer.ideal_ratio, "ideal ratio", "ratio")
    if answer.rubs:
        add(answer.efficiency, "efficiency", "number")
    if answer.joints:
        each = np.array([answer.joint_force(j) for j in answer.joints])
        top = np.max(each, axis=0)
        add(top, "largest joint force", "force", always=True)
        columns.append(Column("at"))
        # of joints that carry the same but for rounding the first is named at every pose
        first = np.argmax(each >= top * (1 - 1e-9), axis=0)[:, 0]
        known = np.isfinite(top[:, 0])
        cells.append(
            [
                [answer.joints[j] if ok else "-" for j, ok in zip(*row, strict=True)]
                for row in zip(first, known, strict=True)
            ]
        )
        for joint, values in zip(answer.joints, each, strict=True) if all_joints else ():
            add(values, joint, "force", always=True)
    return tuple(columns), cells


def thinned(poses: int) -> list[int]:
    """Indices of the poses that are printed: both ends, evenly between, a whole step if one fits.

    >>> thinned(61)[:3], len(thinned(61)), len(thinned(131)), thinned(4)
    ([0, 3, 6], 21, 14, [0, 1, 2, 3])
    """
    if poses <= _MOST:
        return list(range(poses))
    wanted = (_FEWEST + _MOST) // 2
    whole = [n for n in range(_FEWEST, _MOST + 1) if (poses - 1) % (n - 1) == 0]
    rows = min(whole, key=lambda n: abs(n - wanted)) if whole else wanted
    return [round(i * (poses - 1) / (rows - 1)) for i in range(rows)]
