"""What joints must carry as JSON, whole: units and all digits. ``docs/json.md`` describes it."""

from __future__ import annotations

import math

import numpy as np

from linkcalc.design.answer import SCHEMA
from linkcalc.design.pins_answer import JointLoad, Peak, PinsAnswer, Rose, Sized, Swing
from linkcalc.model.mechanism import Units
from linkcalc.model.sketch import drawn
from linkcalc.report.edge import Edge
from linkcalc.report.json import Tree, array_tree, felt_tree, laid_out, one_tree, real, told_tree
from linkcalc.report.sections.working import working_tree


def pins_json(answer: PinsAnswer) -> str:
    """The text of ``pins_tree``."""
    return laid_out(pins_tree(answer)) + "\n"


def pins_tree(answer: PinsAnswer) -> Tree:
    """What joints must carry as plain dicts and lists, in the units of the model file; nan is None."""
    stroke, edge = answer.stroke, Edge(answer.stroke)
    mechanism = stroke.mechanism
    return {
        "schema": SCHEMA,
        "answer": "pins",
        "title": mechanism.title,
        "note": mechanism.note,
        "drive": stroke.drive_name,
        "axes": {
            "case": list(stroke.cases),
            "pose": stroke.status.shape[2],
            "member": list(drawn(mechanism).members),
            "joint": [j.joint for j in answer.joints],
            "copy": answer.variants,
        },
        "poses": {"unit": edge.unit("drive"), "values": _numbers(edge.out(stroke.drive[0, 0], "drive"))},
        "time of a stroke": {"unit": "s", "value": real(answer.time)},
        "goes round": answer.rounds,
        "joints": [_joint(edge, j, mechanism.units) for j in answer.joints],
        "ropes": [
            {
                "rope": r.rope,
                "largest": _peak(edge, r.largest, "force"),
                "smallest": _peak(edge, r.smallest, "force"),
                "sizes": [_sized(edge, s, mechanism.units) for s in r.sized],
            }
            for r in answer.ropes
        ],
        "foundation": _foundation(edge, answer),
        **told_tree(stroke, edge),
    }


def _joint(edge: Edge, joint: JointLoad, units: Units) -> Tree:
    return {
        "joint": joint.joint,
        "kind": joint.word,
        "largest": _peak(edge, joint.largest, "force"),
        "smallest": _peak(edge, joint.smallest, "force"),
        "moment": _peak(edge, joint.moment, "moment") if joint.moment else None,
        "diameter": one_tree(edge, joint.diameter, "length"),
        "members": [
            {
                "member": s.member,
                "largest": _peak(edge, s.largest, "force"),
                "rose": _rose(edge, s.rose) if s.rose else None,
            }
            for s in joint.sides
        ],
        "swings": [_swing(edge, s) for s in joint.swings],
        "sizes": [_sized(edge, s, units) for s in joint.sized],
        "reversals": [
            {"of": r.of, "case": r.case or None, "drive": one_tree(edge, r.drive, "drive")} for r in joint.reversals
        ],
    }


def _sized(edge: Edge, sized: Sized, units: Units) -> Tree:
    tree = working_tree(sized.working, units)
    return {
        "part": sized.item,
        "needed": one_tree(edge, math.nan if sized.required is None else sized.required, sized.kind),
        "chosen": sized.chosen or None,
        "size": one_tree(edge, sized.size, sized.kind),
        "utilisation": real(sized.utilisation),
        "why not smaller": sized.choice.why or None if sized.choice else None,
        "worst": _peak(edge, sized.worst, "force" if sized.kind == "force" else "stress") if sized.worst else None,
        "working": tree,
    }


def _peak(edge: Edge, peak: Peak, kind: str) -> Tree:
    return {
        "case": peak.case or None,
        "copy": peak.variant,
        "drive": one_tree(edge, peak.drive, "drive"),
        "value": one_tree(edge, peak.value, kind),
        **({"felt": [felt_tree(edge, f) for f in peak.felt]} if peak.felt else {}),
    }


def _rose(edge: Edge, rose: Rose) -> Tree:
    axes = ["case", "pose"]
    free = None
    if rose.free:
        begin, end = (real(edge.one(v, "angle")) for v in rose.free)
        free = {"unit": edge.unit("angle"), "from": begin, "to": end}
    return {
        "direction from own axis": array_tree(edge, rose.direction, "angle", axes),
        "force": array_tree(edge, rose.force, "force", axes),
        "sectors": {"unit": edge.unit("force"), "values": _numbers(edge.out(rose.sectors, "force"))},
        "free": free,
    }


def _swing(edge: Edge, swing: Swing) -> Tree:
    kind = swing.kind
    return {
        "member": swing.member,
        "against": swing.against,
        "kind": "turn" if kind == "angle" else "slide",
        "low": one_tree(edge, swing.low, kind),
        "high": one_tree(edge, swing.high, kind),
        "swing": one_tree(edge, swing.reach, kind),
        "path": one_tree(edge, swing.path, kind),
        "turns back": {"unit": edge.unit("drive"), "values": [edge.one(t, "drive") for t in swing.turns]},
        "mean load": {"case": swing.mean_case or None, **one_tree(edge, swing.mean_load, "force")},
        "path of rubbing": one_tree(edge, swing.way, "length"),
        "mean speed": {"unit": edge.speed_unit, "value": real(edge.speed(swing.mean_speed))},
        "largest speed": {
            "unit": edge.speed_unit,
            "value": real(edge.speed(swing.speed)),
            "drive": one_tree(edge, swing.fastest_at, "drive"),
        },
    }


def _foundation(edge: Edge, answer: PinsAnswer) -> Tree | None:
    footing = answer.footing
    if footing is None:
        return None
    forces = {"resultant": footing.force, "right": footing.right, "left": footing.left, "up": footing.up,
              "down": footing.down}  # fmt: skip
    turning = {"counter-clockwise": footing.left_turning, "clockwise": footing.right_turning}
    return {
        "about": {"unit": edge.unit("length"), "values": [edge.one(v, "length") for v in footing.about]},
        **{key: _peak(edge, peak, "force") for key, peak in forces.items()},
        **{key: _peak(edge, peak, "moment") for key, peak in turning.items()},
    }


def _numbers(values: np.ndarray) -> list[float | None]:
    return [real(float(v)) for v in values]
