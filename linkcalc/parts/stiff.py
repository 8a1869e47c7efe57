"""Stiffness of joints: by it they share a force that more of them hold than are needed."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from linkcalc.parts import fields
from linkcalc.parts.contract import Sketch

_TEXT = "how stiff it is, by which it shares a force with others that hold the same"


def shares(joints: Mapping[str, Mapping[str, Any]]) -> bool:
    """True if some joint of a model has a stiffness to share by; then pins share by theirs too, and do not give."""
    return any(
        f.metadata["text"] == _TEXT and getattr(part, f.name) is not None
        for parts in joints.values()
        for part in parts.values()
        for f in fields.part_fields(part)
    )


def stiffness_field() -> Any:
    """The key of a joint for its forces."""
    return fields.size("stiffness", _TEXT, None, sign="plus")


def turning_field() -> Any:
    """The key of a joint for its moment."""
    text = "the same for its moment, if not by the length of its guide"
    return fields.size("torsion stiffness", text, None, sign="plus")


def stiff(part: Any, sketch: Sketch) -> dict[str, Any]:
    """What the numeric joint of a part is told of its stiffness, in SI; nothing that is not given."""
    keys = {"stiffness": ("share", "stiffness"), "torsion_stiffness": ("turning_stiffness", "torsion stiffness")}
    given = {key: getattr(part, key, None) for key in keys}
    return {keys[key][0]: sketch.value(size, keys[key][1]) for key, size in given.items() if size is not None}
