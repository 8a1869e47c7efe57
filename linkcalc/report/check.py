"""A check of the model as blocks and as JSON."""

from __future__ import annotations

import json
import math
from typing import Any

from linkcalc.design.answer import SCHEMA
from linkcalc.design.check import CheckAnswer
from linkcalc.report.blocks import Block, Note
from linkcalc.report.edge import Edge
from linkcalc.report.json import stroke_tree
from linkcalc.report.numbers import plain
from linkcalc.report.sections.head import head
from linkcalc.report.sections.requirements import requirements
from linkcalc.report.sections.trust import trust


def check_blocks(answer: CheckAnswer) -> list[Block]:
    """What it is, its freedoms and range, requirements, warnings."""
    return [
        *head(answer.stroke),
        Note(_made_of(answer), "Made of"),
        Note(_freedoms(answer), "Freedoms"),
        *([Note(_range(answer), "Range of motion")] if answer.motion else []),
        *([Note(", ".join(answer.stroke.two_force), "Two-force members")] if answer.stroke.two_force else []),
        *requirements(answer.stroke),
        *trust(answer.stroke),
    ]


def _made_of(answer: CheckAnswer) -> str:
    joints = ", ".join(f"{n} {word}{'s' if n > 1 else ''}" for word, n in answer.joints.items())
    many = len(answer.members)
    return f"{many} moving member{'s' if many > 1 else ''} ({', '.join(answer.members)}); {joints}."


def _freedoms(answer: CheckAnswer) -> str:
    if answer.stroke.loose:
        left = answer.freedoms - bool(answer.asked)
        settles = f"{left} settle{'s' if left == 1 else ''} in balance"
        taken = f"{'the stroke' if answer.motion else 'the effort'} takes one, {settles}" if answer.asked else settles
        return f"{answer.freedoms}; {taken}" + (f", and the {answer.asked} is what is asked." if answer.asked else ".")
    if not answer.asked:
        return "none: the frame stands, and every force is determined."
    taken = "the stroke takes it" if answer.motion else "the effort and the load hold it"
    return f"{answer.freedoms}; {taken}, and the {answer.asked} is what is asked."


def _range(answer: CheckAnswer) -> str:
    motion, edge = answer.motion, Edge(answer.stroke)
    assert motion is not None
    unit = plain(edge.unit("drive"))
    ends = []
    for side, limit in (("downward", motion.lower), ("upward", motion.upper)):
        ends.append(
            f"{side} no limit within reach" if math.isnan(limit) else f"{side} to {edge.text(limit, 'drive', 6)}"
        )
    stroke = f"stroke {edge.one(motion.start, 'drive'):.6g} to {edge.one(motion.stop, 'drive'):.6g} {unit}"
    return f"{answer.stroke.drive_name}: {', '.join(ends)}; drawn at {edge.text(motion.drawn, 'drive', 6)}; {stroke}."


def check_json(answer: CheckAnswer) -> str:
    """The check as JSON; what it shares with a stroke is named as there."""
    edge, motion = Edge(answer.stroke), answer.motion
    shared = stroke_tree(answer.stroke)
    names = ("lower", "upper", "drawn", "start", "stop")

    def out(value: float) -> float | None:
        return None if math.isnan(value) else edge.one(value, "drive")

    tree: dict[str, Any] = {
        "schema": SCHEMA,
        "answer": "check",
        "title": shared["title"],
        "members": list(answer.members),
        "joints": answer.joints,
        "freedoms": answer.freedoms,
        "asked": answer.asked or None,
        "motion": motion
        and {"coordinate": answer.stroke.drive_name, "unit": edge.unit("drive")}
        | {name: out(getattr(motion, name)) for name in names},
        "two-force members": list(answer.stroke.two_force),
        **{key: shared[key] for key in ("requirements", "holds", "warnings", "cautions", "checks")},
    }
    return json.dumps(tree, indent=1, ensure_ascii=False, allow_nan=False) + "\n"
