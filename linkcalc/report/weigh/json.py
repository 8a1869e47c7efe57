"""A scale as JSON, whole; ``docs/json.md`` describes it."""

from __future__ import annotations

import math
from typing import Any

import numpy as np

from linkcalc.design.answer import SCHEMA
from linkcalc.design.weighing.answer import Bar, WeighAnswer
from linkcalc.parts.pose import Array
from linkcalc.report.json import laid_out
from linkcalc.report.weigh.edge import MassEdge

Tree = dict[str, Any]


def weigh_json(answer: WeighAnswer) -> str:
    """The text of ``weigh_tree``."""
    return laid_out(weigh_tree(answer)) + "\n"


def weigh_tree(answer: WeighAnswer) -> Tree:
    """Plain dicts and lists in the units of the model file; nan is None."""
    edge, tilt = MassEdge(answer), answer.tilt

    def many(values: Array, kind: str, over: str = "") -> Tree:
        found = edge.out(values, kind, over)
        listed = np.where(np.isfinite(found), found, None).tolist()  # type: ignore[call-overload]
        return {"unit": edge.unit(kind, over), "values": listed}

    def one(value: float, kind: str, over: str = "") -> Tree:
        found = edge.one(value, kind, over) if kind else value
        return {"unit": edge.unit(kind, over) if kind else "", "value": found if math.isfinite(found) else None}

    def bar(b: Bar) -> Tree:
        return {
            "poise": b.name, "use": b.use, "mark": "notch" if b.notched else "line", "along": list(b.along),
            "from": one(b.ends[0], "length"), "to": one(b.ends[1], "length"), "worth": one(b.worth, "mass", "length"),
            "load": many(b.loads, "mass"), "place": many(b.places, "length"), "spacing": many(b.spacing, "length"),
            "x": many(b.x, "length"), "y": many(b.y, "length"), "departure": many(b.departure, "length"),
        }  # fmt: skip

    scatter, accuracy, corners = answer.scatter, answer.accuracy, answer.corners
    return {
        "schema": SCHEMA, "answer": "weigh", "title": answer.mechanism.title, "note": answer.mechanism.note,
        "case": answer.case or None, "beam": answer.beam, "fulcrum": answer.fulcrum,
        "least": one(answer.least, "mass"), "capacity": one(answer.capacity, "mass"), "tare": one(answer.tare, "mass"),
        "zero place": one(answer.zero, "length"), "tare place": one(answer.tare_place, "length"),
        "load for places": one(answer.asked_load, "mass"),
        "load": many(answer.loads, "mass"),
        "poises": [{"poise": n, "place": many(v, "length")} for n, v in answer.places.items()],
        "counterpoises": [
            {"counterpoise": n, "ratio": answer.ratios[n], "on": many(v, "mass")} for n, v in answer.hung.items()
        ],
        "unbalanced": many(answer.left, "mass"),
        "bars": [bar(b) for b in answer.bars],
        "sensitivity": {
            "pointer": tilt.pointer, "arm": one(tilt.arm, "length"),
            "stiffness": many(tilt.stiffness, "torsion stiffness"), "steady": tilt.steady.tolist(),
            "tilt for load": many(tilt.per_load, "angle", "mass"),
            "way for load": many(tilt.per_load * tilt.arm, "length", "mass"),
            "tilt for place": many(tilt.per_place, "angle", "length"),
            "unstable from": one(tilt.unstable, "mass"), "dead band": many(answer.dead_band, "mass"),
        },
        "errors": {
            "zeroed": answer.zeroed,
            "causes": [
                {"cause": c.name, "from": one(c.lower, c.kind), "to": one(c.upper, c.kind),
                 "low": many(c.low, "mass"), "high": many(c.high, "mass")}
                for c in answer.causes
            ],
            "likely": many(answer.likely, "mass"), "largest": many(answer.largest, "mass"),
            "gravity": many(answer.gravity, "mass"),
            "copies": scatter and {
                "count": scatter.copies, "failed": scatter.failed, "mean": many(scatter.mean, "mass"),
                "deviation": many(scatter.deviation, "mass"), "low": many(scatter.low, "mass"),
                "high": many(scatter.high, "mass"),
                "within": np.where(np.isfinite(scatter.within), scatter.within, None).tolist(),  # type: ignore[call-overload]
            },
        },
        "accuracy": accuracy and {
            "class": accuracy.name, "interval": one(accuracy.interval, "mass"), "in use": accuracy.in_use,
            "source": accuracy.source,
            "bands": [
                {"over": one(b.low, "mass"), "up to": one(b.high, "mass"), "limit": one(b.limit, "mass"),
                 "error": one(b.error, "mass"), "at": one(b.at, "mass"),
                 "within": b.within if math.isfinite(b.within) else None,
                 "holds": None if math.isnan(b.error) else b.holds}
                for b in answer.bands
            ],
            "motion": [
                {"load": one(a.load, "mass"), "extra": one(a.extra, "mass"), "gives": one(a.gives, "length"),
                 "wanted": one(a.wanted, "length"), "holds": a.holds}
                for a in answer.asked
            ],
        },
        "corners": corners and {
            "load": one(corners.load, "mass"), "member": corners.member, "turn": corners.turn, "free": corners.free,
            "limit": one(corners.limit, "mass"), "holds": corners.holds,
            "points": [
                {"point": c.point, "multiple": c.multiple, "error": one(c.error, "mass")} for c in corners.corners
            ],
            "supports": [{"joint": s.joint, "on": s.on, "multiple": s.multiple} for s in corners.supports],
            "dimensions": [
                {"dimension": c.name, "size": one(c.size, c.kind), "slope": one(c.slope, "mass", c.kind),
                 "wanted": one(c.wanted, c.kind), "by tolerance": one(c.by_tolerance, "mass")}
                for c in corners.cures
            ],
        },
        "holds": answer.holds,
        "warnings": [{"item": c.item, "text": c.text} for c in answer.caveats],
        "cautions": [{"item": c.item, "text": c.text} for c in answer.cautions],
    }  # fmt: skip
