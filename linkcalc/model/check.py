"""Faults between the items of a model, gathered in one pass: names, sizes, joints, loads, and the drawing itself.

Whether the whole can move or stand is for the mechanics to say.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from typing import Any

from linkcalc.model.check_drawing import check_drawing
from linkcalc.model.check_joints import check_joints, check_members
from linkcalc.model.check_loads import check_cases, check_loads, check_stroke, check_unknown
from linkcalc.model.check_names import Known, check_clashes, check_names
from linkcalc.model.check_pins import check_pins
from linkcalc.model.check_poises import check_poises
from linkcalc.model.check_requirements import check_requirements
from linkcalc.model.check_sizes import check_sizes
from linkcalc.model.gather import Gather
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import Drawing
from linkcalc.model.tree import from_tree, to_tree
from linkcalc.words import kinds

_SHAPE = ("points", "members", *(f"{word}s" for word in kinds("joint")), "dimensions", "units")
_BALANCERS = ("poises", "counterpoises")
_LOADS = ("effort", "load", "loads", "cases")


def check(mechanism: Mechanism) -> Mechanism:
    """The mechanism as a file would give it (tuples for lists, parts for short forms), if nothing is wrong with it.

    What is built in Python goes through here; what is read from a file has been through here already.

    Raises Faults: everything that is wrong, each with its item.
    """
    if mechanism.checked:
        return mechanism
    gather = Gather()
    found = checked(to_tree(mechanism), gather)
    gather.raise_any()
    return in_order(found, mechanism.source)


def in_order(mechanism: Mechanism, source: str) -> Mechanism:
    """A mechanism that nothing is wrong with, marked so: it need not be looked over again."""
    found = replace(mechanism, source=source)
    object.__setattr__(found, "checked", True)  # frozen for everybody else
    return found


def checked(tree: Mapping[str, Any], gather: Gather) -> Mechanism:
    """The mechanism that tables say; all that is wrong with it goes into `gather`."""
    mechanism = from_tree(tree, gather)
    drawing: Drawing | None = None
    known = Known.of(tree)
    check_names(mechanism, known, gather)
    check_sizes(mechanism, known, gather)
    # the rest takes names and parts as they are, so it looks only where those are in order
    if _clean(gather, *_SHAPE):
        check_members(mechanism, gather)
        check_clashes(mechanism, gather)
    if _clean(gather, *_SHAPE):
        check_joints(mechanism, gather)
    if _clean(gather, *_SHAPE, "pins"):
        check_pins(mechanism, gather)
    if _clean(gather, "effort", "load", "loads"):
        check_unknown(mechanism, gather)
        check_cases(mechanism, gather)
    if _clean(gather, *_SHAPE, *_LOADS):
        check_loads(mechanism, gather)
    if _clean(gather, *_SHAPE, *_BALANCERS):
        check_poises(mechanism, gather)
    if _clean(gather, *_SHAPE, "stroke"):
        check_stroke(mechanism, gather)
    if _clean(gather, *_SHAPE, *_LOADS, *_BALANCERS, "stroke", "gravity", "friction", "pins"):
        drawing = check_drawing(mechanism, gather)
    check_requirements(mechanism, known, drawing, gather)
    return mechanism


def _clean(gather: Gather, *tables: str) -> bool:
    return not any(gather.touches(table) for table in tables)
