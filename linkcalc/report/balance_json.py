"""A balance as JSON and as the table that CSV is written from. ``docs/json.md`` describes it."""

from __future__ import annotations

from typing import Any

import numpy as np

from linkcalc.design.answer import SCHEMA, STEADY, StrokeAnswer
from linkcalc.design.balance_answer import BalanceAnswer, Peak
from linkcalc.design.positions import Positions
from linkcalc.parts.pose import Array
from linkcalc.report.blocks import Cell, Column, Table
from linkcalc.report.edge import Edge
from linkcalc.report.json import laid_out, one_tree, stroke_tree
from linkcalc.report.sections.positions import stiffness_kind

Tree = dict[str, Any]


def balance_json(answer: BalanceAnswer) -> str:
    """The text: valid JSON, keys always in the same order."""
    edge = Edge(answer.before)
    return laid_out({
        "schema": SCHEMA,
        "answer": "balance",
        "title": answer.before.mechanism.title,
        "goal": answer.goal,
        "cases": list(answer.cases),
        "found": [
            {
                "name": f.name, "kind": f.word, "on": list(f.on), "number": f.number,
                "sizes": [
                    {"size": s.name, **one_tree(edge, s.value, s.kind), "found": s.open, "rounded": s.rounded}
                    for s in f.sizes
                ],
            }
            for f in answer.found
        ],
        "largest effort": {"before": _peak(edge, answer.peak_before), "after": _peak(edge, answer.peak_after)},
        "root mean square of the effort": _change(edge, answer.square_before, answer.square_after, "effort"),
        "foretold": one_tree(edge, answer.foretold, "effort"),
        "geometry": one_tree(edge, answer.geometry, "effort"),
        "balanced at every pose": answer.exact,
        "search": {
            "linear": answer.linear, "starts": answer.starts, "ended as well as the best": answer.alike,
            "at other places": answer.elsewhere, "seed": answer.seed,
        },
        "stays": [
            {
                "end": s.end, "wanted": one_tree(edge, s.wanted, "effort"),
                "takes": one_tree(edge, s.takes, "effort"), "case": s.case or None, "holds": s.holds,
            }
            for s in answer.stays
        ],
        "joints": [{"joint": j.joint, **_change(edge, j.before, j.after, "force")} for j in answer.joints],
        "moving mass": _change(edge, answer.mass_before, answer.mass_after, "mass"),
        "positions": {
            "before": positions_tree(answer.positions_before, answer.before),
            "after": positions_tree(answer.positions_after, answer.after),
        },
        "holds": answer.holds,
        "warnings": [{"item": c.item, "text": c.text} for c in answer.caveats],
        "before": stroke_tree(answer.before),
        "after": stroke_tree(answer.after),
    }) + "\n"  # fmt: skip


def positions_json(found: Positions, answer: StrokeAnswer) -> str:
    """Balance positions alone."""
    tree = {
        "schema": SCHEMA, "answer": "balance positions", "title": answer.mechanism.title,
        "positions": positions_tree(found, answer), "stroke": stroke_tree(answer),
    }  # fmt: skip
    return laid_out(tree) + "\n"


def positions_tree(found: Positions, answer: StrokeAnswer) -> Tree:
    edge, kind = Edge(answer), stiffness_kind(answer)
    return {
        "effort": one_tree(edge, found.effort, "effort"),
        "places": [
            {
                "case": p.case or None, "drive": one_tree(edge, p.drive, "drive"), "balance": STEADY[p.steady],
                "stiffness": one_tree(edge, p.stiffness, kind),
            }
            for p in found.places
        ],
        "balanced at every pose": [name or None for name in found.neutral],
        "held by friction": [
            {"case": h.case or None, "from": one_tree(edge, h.start, "drive"), "to": one_tree(edge, h.stop, "drive")}
            for h in found.held
        ],
    }  # fmt: skip


def _peak(edge: Edge, peak: Peak) -> Tree:
    return {
        **one_tree(edge, peak.value, "effort"), "case": peak.case or None,
        "drive": one_tree(edge, peak.drive, "drive"),
    }  # fmt: skip


def _change(edge: Edge, before: float, after: float, what: str) -> Tree:
    return {"before": one_tree(edge, before, what), "after": one_tree(edge, after, what)}


def balance_table(answer: BalanceAnswer) -> Table:
    """A row for each case and pose: the effort and the largest joint force, before and after."""
    edge = Edge(answer.before)
    told = (("effort", "effort"), ("largest joint force", "force"))
    columns = (
        Column("case"), Column(answer.after.drive_name, edge.unit("drive")),
        *(Column(f"{what} {when}", edge.unit(kind)) for what, kind in told for when in ("before", "after")),
    )  # fmt: skip
    drive = edge.out(answer.after.drive[0, 0], "drive")
    before, after = (_top(a) for a in (answer.before, answer.after))
    rows: list[tuple[Cell, ...]] = []
    for k, (case, old) in enumerate(zip(answer.after.cases, answer.lasting, strict=True)):
        efforts = [edge.out(a.effort[c, 0], "effort") for a, c in ((answer.before, old), (answer.after, k))]
        forces = [edge.out(top[c], "force") for top, c in ((before, old), (after, k))]
        rows += [(case, float(drive[p]), *(float(v[p]) for v in (*efforts, *forces))) for p in range(drive.size)]
    return Table(columns, tuple(rows), keys=2)


def positions_table(found: Positions, answer: StrokeAnswer) -> Table:
    """A row a balance position."""
    edge, kind = Edge(answer), stiffness_kind(answer)
    columns = (
        Column("case"), Column(answer.drive_name, edge.unit("drive")), Column("balance"),
        Column("stiffness", edge.unit(kind)),
    )  # fmt: skip
    rows = tuple(
        (p.case, edge.one(p.drive, "drive"), STEADY[p.steady], edge.one(p.stiffness, kind)) for p in found.places
    )
    return Table(columns, rows)


def _top(answer: StrokeAnswer) -> Array:
    return np.asarray(np.max([answer.joint_force(j)[:, 0] for j in answer.joints], axis=0))
