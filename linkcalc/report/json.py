"""A stroke as JSON, whole: every array with its unit, its axes and all its digits. ``docs/json.md`` describes it."""

from __future__ import annotations

import json
import math
from typing import Any

import numpy as np

from linkcalc.design.answer import SCHEMA, Felt, StrokeAnswer, quantities
from linkcalc.mechanics.state import Status
from linkcalc.model.sketch import drawn
from linkcalc.parts.pose import Array
from linkcalc.report.bearings import direction, own_direction, resultant
from linkcalc.report.edge import Edge

Tree = dict[str, Any]
BATCH = ["case", "variant", "pose"]


def as_json(answer: StrokeAnswer) -> str:
    """The text of ``stroke_tree``: valid JSON, keys always in the same order."""
    return laid_out(stroke_tree(answer)) + "\n"


def laid_out(tree: Any, indent: str = "") -> str:
    """JSON text that can be read: a line a key, but the numbers along one axis on one line."""
    deeper = indent + " "
    if isinstance(tree, dict) and tree:
        inner = [f"{json.dumps(k, ensure_ascii=False)}: {laid_out(v, deeper)}" for k, v in tree.items()]
        return "{\n" + ",\n".join(deeper + line for line in inner) + f"\n{indent}}}"
    if isinstance(tree, list) and any(isinstance(item, (dict, list)) for item in tree):
        return "[\n" + ",\n".join(deeper + laid_out(item, deeper) for item in tree) + f"\n{indent}]"
    return json.dumps(tree, ensure_ascii=False, allow_nan=False)


def stroke_tree(answer: StrokeAnswer) -> Tree:
    """A stroke as plain dicts and lists, in the units of the model file; nan is None."""
    edge = Edge(answer)
    mechanism = answer.mechanism
    members = list(drawn(mechanism).members)
    return {
        "schema": SCHEMA,
        "answer": "stroke",
        "title": mechanism.title,
        "note": mechanism.note,
        "drive": answer.drive_name,
        "axes": {
            "case": list(answer.cases),
            "variant": answer.status.shape[1],
            "pose": answer.status.shape[2],
            "member": members,
            "joint": list(answer.joints),
        },
        "quantities": _quantities(answer, edge),
        "joints": _bearings(answer, edge),
        "two-force members": [
            {"member": m, "axial": array_tree(edge, answer.axial_in(m), "force", BATCH)} for m in answer.two_force
        ],
        "ropes": [
            {
                "rope": rope,
                "tension": array_tree(edge, answer.tension_of(rope), "force", BATCH),
                # of a rope whose pulleys rub those at its ends too
                **{r.quantity: array_tree(edge, r.values, r.kind, BATCH) for r in answer.readings if r.load == rope},
            }
            for rope in answer.ropes
        ],
        "loads": [
            {"load": r.load, "quantity": r.quantity, **array_tree(edge, r.values, r.kind, BATCH)}
            for r in answer.readings
            if r.load not in answer.ropes
        ],
        "members": [
            {
                "member": member,
                **{
                    key: array_tree(edge, getattr(answer, key)[i], what, _placed_axes(answer))
                    for key, what in (("x", "length"), ("y", "length"), ("turn", "angle"))
                },
            }
            for i, member in enumerate(members)
        ],
        "events": [
            {
                "kind": e.kind, "quantity": e.quantity, "case": e.case or None,
                "drive": one_tree(edge, e.drive, "drive"), "value": one_tree(edge, e.value, e.value_kind),
                **({"felt": [felt_tree(edge, f) for f in e.felt]} if e.felt else {}),
            }
            for e in answer.events
        ],
        **told_tree(answer, edge),
    }  # fmt: skip


def told_tree(answer: StrokeAnswer, edge: Edge) -> Tree:
    """What stands at the end of every answer: verdicts, warnings, checks, status."""
    return {
        "requirements": [
            {
                "name": v.name, "text": v.text, "holds": v.holds, "case": v.case or None,
                "worst": one_tree(edge, v.worst, v.kind), "limit": one_tree(edge, v.limit, v.kind),
                "drive": one_tree(edge, v.drive, "drive"),
            }
            for v in answer.verdicts
        ],
        "holds": answer.holds,
        "balances": [
            {
                "case": r.case or None, "balance": r.text,
                "turns": [{"member": m, **one_tree(edge, turn, "angle")} for m, turn in r.turns.items()],
            }
            for r in answer.rests
        ],
        "warnings": [{"item": c.item, "text": c.text} for c in answer.caveats],
        "cautions": [{"item": c.item, "text": c.text} for c in answer.cautions],
        "checks": {
            "closure": real(answer.checks.closure),
            "equilibrium": real(answer.checks.equilibrium),
            "virtual work": real(answer.checks.virtual_work),
        },
        "status": {
            "axes": BATCH,
            "values": answer.status.tolist(),
            "meaning": {str(int(s)): s.text for s in Status},
        },
    }  # fmt: skip


def _placed_axes(answer: StrokeAnswer) -> list[str]:
    """Free members stand elsewhere in each case; all others in the same place in all."""
    return BATCH if answer.loose else ["one", "variant", "pose"]


def _quantities(answer: StrokeAnswer, edge: Edge) -> Tree:
    """The arrays that have no component but the batch: drive, effort, load, ratios."""
    tree: Tree = {}
    for name, meta in quantities(answer).items():
        if meta["when"] and not getattr(answer, meta["when"]):
            continue
        if meta["axes"] in (tuple(BATCH), ("one", "variant", "pose")):
            found = array_tree(edge, getattr(answer, name), meta["quantity"], list(meta["axes"]))
            tree[name.replace("_", " ")] = {"text": meta["text"], **found}
    return tree


def _bearings(answer: StrokeAnswer, edge: Edge) -> list[Tree]:
    """What each member feels at each joint."""
    size, points, own = resultant(answer), direction(answer), own_direction(answer)
    return [
        {
            "joint": b.joint,
            "kind": b.word,
            "member": b.member,
            "copies": b.copies,
            "x": array_tree(edge, answer.force[i, 0], "force", BATCH),
            "y": array_tree(edge, answer.force[i, 1], "force", BATCH),
            "resultant": array_tree(edge, size[i], "force", BATCH),
            "direction": array_tree(edge, points[i], "angle", BATCH),
            "direction from own axis": array_tree(edge, own[i], "angle", BATCH),
            "moment": array_tree(edge, answer.moment[i], "moment", BATCH),
        }
        for i, b in enumerate(answer.bearings)
    ]


def felt_tree(edge: Edge, felt: Felt) -> Tree:
    """What one member feels at a joint in one pose."""
    return {
        "member": felt.member,
        "force": one_tree(edge, felt.force, "force"),
        "direction": one_tree(edge, felt.direction, "angle"),
        "direction from own axis": one_tree(edge, felt.own_direction, "angle"),
    }


def array_tree(edge: Edge, values: Array, what: str, axes: list[str]) -> Tree:
    return {"unit": edge.unit(what), "axes": axes, "values": _nulls(edge.out(values, what))}


def _nulls(values: Array) -> Any:
    """Nested lists; JSON knows no nan and no infinity."""
    return np.where(np.isfinite(values), values, None).tolist()  # type: ignore[call-overload]


def one_tree(edge: Edge, value: float, what: str) -> Tree:
    unbounded = {"unbounded": True} if math.isinf(value) else {}
    return {"unit": edge.unit(what), "value": real(edge.one(value, what)), **unbounded}


def real(value: float) -> float | None:
    return float(value) if math.isfinite(value) else None
