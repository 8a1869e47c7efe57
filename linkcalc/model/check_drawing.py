"""What only the drawing shows: lines of no length, joints that do not close, a stroke that goes nowhere."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.faults import Faults, fault
from linkcalc.model import walk
from linkcalc.model.check_poises import check_bars
from linkcalc.model.gather import Gather, Item
from linkcalc.model.mechanism import DRAWN, GROUND, LOWER, UPPER, Mechanism, Stroke
from linkcalc.model.sketch import Drawing, drawn
from linkcalc.model.units import show
from linkcalc.parts.contract import Coordinate, Poses
from linkcalc.parts.coordinates.distance import Distance

_NEAR = 1e-9
_CLOSED = 1e-6


def check_drawing(mechanism: Mechanism, gather: Gather) -> Drawing | None:
    """Lay the mechanism out and look at it. The drawing, if lines and points are in order."""
    try:
        drawing = drawn(mechanism)
    except Faults as found:
        gather.faults += found.faults
        return None
    if _short_lines(drawing, gather):
        return None
    try:
        _joints(drawing, gather)
    except Faults as found:  # what pushes through a joint, or is stepped along it, need not be told of it again
        gather.faults += found.faults
        return None
    check_bars(drawing, gather)
    with gather.at():
        drawing.assembly()
    if mechanism.stroke is not None:
        with gather.at("stroke"):
            _stroke(drawing, mechanism.stroke)
    return drawing


def drawn_poses(drawing: Drawing) -> Poses:
    """All members in the drawing pose."""
    x, y = zip(*drawing.origins, strict=True)
    count = len(drawing.members)
    return Poses(x, y, [1.0] * count, [0.0] * count)


def _short_lines(drawing: Drawing, gather: Gather) -> bool:
    """Lines whose two points are drawn at one place."""
    before = len(gather.faults)
    for item, first, second in _lines(drawing.mechanism):
        (ax, ay), (bx, by) = drawing.point(first), drawing.point(second)
        if np.hypot(bx - ax, by - ay) <= _NEAR * drawing.size:
            gather.add(item, f"{first} and {second} are drawn at one place", "a line needs two places")
    return len(gather.faults) > before


def _lines(mechanism: Mechanism) -> Iterator[tuple[Item, str, str]]:
    """Every line of two points: own axes of members, and those that joints, loads and the stroke name."""
    for name, member in mechanism.members.items():
        if name != GROUND and len(member.points) > 1:
            yield ("members", name, "points"), member.points[0], member.points[-1]
    parts = [*walk.joints(mechanism), *walk.loads(mechanism), *walk.balancers(mechanism)]
    if mechanism.stroke is not None:
        parts.append(walk.Part(("stroke",), mechanism.stroke.along))
    for part in parts:
        for item, entry, value in part.fields():
            meta = entry.metadata
            two_points = (meta["kind"] == "names" and meta["of"] == "point") or meta["kind"] == "line"
            if two_points and isinstance(value, tuple):
                yield item, value[0], value[1]


def _joints(drawing: Drawing, gather: Gather) -> None:
    """A joint must hold as drawn: the drawing is the first pose."""
    at = drawn_poses(drawing)
    items = {item[-1]: item for item, _ in walk.joints(drawing.mechanism)}
    for joint in drawing.joints:
        gives = joint.gives if hasattr(joint, "gives") else [None] * len(joint.angular)
        for gap, angular, law in zip(joint.gap(at), joint.angular, gives, strict=True):
            if law is None and not angular and abs(float(gap)) > _CLOSED * drawing.size:
                off = show(abs(float(gap)), "length", drawing.mechanism.units)
                wanted = "draw its point on its line"
                gather.add(items[joint.name], f"it does not hold as drawn, by {off}", wanted)


def _stroke(drawing: Drawing, stroke: Stroke) -> None:
    along: Coordinate = stroke.along.coordinate(drawing)
    start, stop = (_end(end, along, drawing) for end in (stroke.start, stroke.stop))
    for end, key in ((start, "from"), (stop, "to")):
        if isinstance(stroke.along, Distance) and isinstance(end, float) and end <= 0:
            text = show(end, "length", drawing.mechanism.units)
            raise fault((key,), f"a distance of {text} cannot be", "more than nothing is wanted")
    scale = 1.0 if along.kind == "angle" else drawing.size
    same = start == stop if isinstance(start, str) or isinstance(stop, str) else abs(start - stop) <= _NEAR * scale
    if same:
        raise fault(("to",), "the stroke ends where it begins", "another end is wanted")


def _end(end: float | str, along: Coordinate, drawing: Drawing) -> float | str:
    """An end of the stroke in SI; the word of a limit as it is."""
    if end in (LOWER, UPPER):
        return str(end)
    return float(along.value(drawn_poses(drawing)) if end == DRAWN else drawing.value(end, along.kind))
