"""A stroke as JSON, whole: every array with its unit, its axes and all its digits. ``docs/json.md`` describes it."""

from __future__ import annotations

import json
import math
from typing import Any

import numpy as np

from linkcalc.design.answer import SCHEMA, StrokeAnswer, quantities
from linkcalc.mechanics.state import Status
from linkcalc.model.sketch import drawn
from linkcalc.parts.pose import Array
from linkcalc.report.bearings import direction, own_direction, resultant
from linkcalc.report.edge import Edge

Tree = dict[str, Any]
_BATCH = ["case", "variant", "pose"]


def as_json(answer: StrokeAnswer) -> str:
    """The text of ``stroke_tree``: valid JSON, keys always in the same order."""
    return _laid_out(stroke_tree(answer)) + "\n"


def _laid_out(tree: Any, indent: str = "") -> str:
    """JSON text that can be read: a line a key, but the numbers along one axis on one line."""
    deeper = indent + " "
    if isinstance(tree, dict) and tree:
        inner = [f"{json.dumps(k, ensure_ascii=False)}: {_laid_out(v, deeper)}" for k, v in tree.items()]
        return "{\n" + ",\n".join(deeper + line for line in inner) + f"\n{indent}}}"
    if isinstance(tree, list) and any(isinstance(item, (dict, list)) for item in tree):
        return "[\n" + ",\n".join(deeper + _laid_out(item, deeper) for item in tree) + f"\n{indent}]"
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
            {"member": m, "axial": _array(edge, answer.axial_in(m), "force", _BATCH)} for m in answer.two_force
        ],
        "ropes": [
            {"rope": r, "tension": _array(edge, answer.tension_of(r), "force", _BATCH)} for r in answer.ropes
        ],
        "loads": [
            {"load": r.load, "quantity": r.quantity, **_array(edge, r.values, r.kind, _BATCH)} for r in answer.readings
        ],
        "members": [
            {
                "member": member,
                **{
                    key: _array(edge, getattr(answer, key)[i], what, _placed_axes(answer))
                    for key, what in (("x", "length"), ("y", "length"), ("turn", "angle"))
                },
            }
            for i, member in enumerate(members)
        ],
        "events": [
            {
                "kind": e.kind, "quantity": e.quantity, "case": e.case or None,
                "drive": _one(edge, e.drive, "drive"), "value": _one(edge, e.value, e.value_kind),
            }
            for e in answer.events
        ],
        "requirements": [
            {
                "name": v.name, "text": v.text, "holds": v.holds, "case": v.case or None,
                "worst": _one(edge, v.worst, v.kind), "limit": _one(edge, v.limit, v.kind),
                "drive": _one(edge, v.drive, "drive"),
            }
            for v in answer.verdicts
        ],
        "holds": answer.holds,
        "balances": [
            {
                "case": r.case or None, "balance": r.text,
                "turns": [{"member": m, **_one(edge, turn, "angle")} for m, turn in r.turns.items()],
            }
            for r in answer.rests
        ],
        "warnings": [{"item": c.item, "text": c.text} for c in answer.caveats],
        "cautions": [{"item": c.item, "text": c.text} for c in answer.cautions],
        "checks": {
            "closure": _real(answer.checks.closure),
            "equilibrium": _real(answer.checks.equilibrium),
            "virtual work": _real(answer.checks.virtual_work),
        },
        "status": {
            "axes": _BATCH,
            "values": answer.status.tolist(),
            "meaning": {str(int(s)): s.text for s in Status},
        },
    }  # fmt: skip


def _placed_axes(answer: StrokeAnswer) -> list[str]:
    """Free members stand elsewhere in each case; all others in the same place in all."""
    return _BATCH if answer.loose else ["one", "variant", "pose"]


def _quantities(answer: StrokeAnswer, edge: Edge) -> Tree:
    """The arrays that have no component but the batch: drive, effort, load, ratios."""
    tree: Tree = {}
    for name, meta in quantities(answer).items():
        if meta["when"] and not getattr(answer, meta["when"]):
            continue
        if meta["axes"] in (tuple(_BATCH), ("one", "variant", "pose")):
            array = _array(edge, getattr(answer, name), meta["quantity"], list(meta["axes"]))
            tree[name.replace("_", " ")] = {"text": meta["text"], **array}
    return tree


def _bearings(answer: StrokeAnswer, edge: Edge) -> list[Tree]:
    """What each member feels at each joint."""
    size, points, own = resultant(answer), direction(answer), own_direction(answer)
    return [
        {
            "joint": b.joint,
            "kind": b.word,
            "member": b.member,
            "x": _array(edge, answer.force[i, 0], "force", _BATCH),
            "y": _array(edge, answer.force[i, 1], "force", _BATCH),
            "resultant": _array(edge, size[i], "force", _BATCH),
            "direction": _array(edge, points[i], "angle", _BATCH),
            "direction from own axis": _array(edge, own[i], "angle", _BATCH),
            "moment": _array(edge, answer.moment[i], "moment", _BATCH),
        }
        for i, b in enumerate(answer.bearings)
    ]


def _array(edge: Edge, values: Array, what: str, axes: list[str]) -> Tree:
    return {"unit": edge.unit(what), "axes": axes, "values": _nulls(edge.out(values, what))}


def _nulls(values: Array) -> Any:
    """Nested lists; JSON knows no nan and no infinity."""
    return np.where(np.isfinite(values), values, None).tolist()  # type: ignore[call-overload]


def _one(edge: Edge, value: float, what: str) -> Tree:
    unbounded = {"unbounded": True} if math.isinf(value) else {}
    return {"unit": edge.unit(what), "value": _real(edge.one(value, what)), **unbounded}


def _real(value: float) -> float | None:
    return float(value) if math.isfinite(value) else None
