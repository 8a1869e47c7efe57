"""The same machine seen otherwise: turned, moved, scaled, in other units, in another order.

What a designer measures (effort, ratios, joint forces) must follow in a known way, whatever the machine. Sizes are
worked out by the drawing and written back with their SI units, so a transformed model is a plain model again.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import fields, is_dataclass, replace
from math import cos, radians, sin
from typing import Any

from linkcalc.model.mechanism import DRAWN, LOWER, UPPER, Mechanism, Stroke, Units
from linkcalc.model.sketch import Drawing
from linkcalc.parts.points.coordinates import Coordinates

SI_OF = {"mm": 1e-3, "in": 0.0254, "deg": radians(1), "rad": 1.0, "N": 1.0, "lbf": 4.4482216152605,
         "kg": 1.0, "lb": 0.45359237, "N*m": 1.0, "lbf*in": 4.4482216152605 * 0.0254}  # fmt: skip
"""Exact by definition: 1 in = 25.4 mm, 1 lb = 0.45359237 kg, 1 lbf = 1 lb x 9.80665 m/s2 (international agreement
of 1959)."""

INCH_POUND = Units(length="in", angle="rad", force="lbf", mass="lb", moment="lbf*in")


def placed(mechanism: Mechanism, to: Callable[[float, float], tuple[float, float]]) -> Mechanism:
    """Every point drawn by coordinates, somewhere else."""
    points = {}
    for name, (x, y) in Drawing(mechanism).points.items():
        px, py = to(float(x), float(y))
        points[name] = Coordinates(f"{px!r} m", f"{py!r} m")
    return replace(mechanism, points=points)


def moved(mechanism: Mechanism, dx: float, dy: float) -> Mechanism:
    """Shifted by so many metres."""
    return placed(mechanism, lambda x, y: (x + dx, y + dy))


def turned(mechanism: Mechanism, by: float) -> Mechanism:
    """The whole drawing with its field of gravity turned counter-clockwise about the origin [rad]."""
    drawing, c, s = Drawing(mechanism), cos(by), sin(by)

    def angle(size: Any) -> str:
        return f"{float(drawing.value(size, 'angle')) + by!r} rad"

    def load(part: Any) -> Any:
        if getattr(part, "direction", None) is not None:
            return replace(part, direction=angle(part.direction))
        return part

    def guide(part: Any) -> Any:
        return replace(part, along=angle(part.along)) if hasattr(part, "along") and _angle(part.along) else part

    stroke = mechanism.stroke
    if stroke is not None and stroke.along.kind == "angle" and stroke.along.against is None:
        ends = [end if end in (DRAWN, LOWER, UPPER) else angle(end) for end in (stroke.start, stroke.stop)]
        stroke = replace(stroke, start=ends[0], stop=ends[1])
    cases = {
        name: replace(case, add={key: load(part) for key, part in case.add.items()}, effort=load(case.effort))
        for name, case in mechanism.cases.items()
    }
    return replace(
        placed(mechanism, lambda x, y: (c * x - s * y, s * x + c * y)),
        joints={word: {n: guide(p) for n, p in parts.items()} for word, parts in mechanism.joints.items()},
        gravity=replace(mechanism.gravity, direction=angle(mechanism.gravity.direction)),
        effort=load(mechanism.effort),
        load=load(mechanism.load),
        loads={name: load(part) for name, part in mechanism.loads.items()},
        stroke=stroke,
        cases=cases,
    )


def scaled(mechanism: Mechanism, by: float) -> Mechanism:
    """Every length so many times as large, and with it every torque; forces and masses as they are."""
    drawing = Drawing(mechanism)

    def load(part: Any) -> Any:
        if hasattr(part, "torque_on") and part.size is not None:
            return replace(part, size=f"{float(drawing.value(part.size, 'moment')) * by!r} N*m")
        return part

    stroke = mechanism.stroke
    if stroke is not None and stroke.along.kind == "length":
        stroke = replace(stroke, **{key: _longer(drawing, getattr(stroke, key), by) for key in ("start", "stop")})
    return replace(
        placed(mechanism, lambda x, y: (by * x, by * y)),
        effort=load(mechanism.effort),
        load=load(mechanism.load),
        loads={name: load(part) for name, part in mechanism.loads.items()},
        stroke=stroke,
    )


def in_units(mechanism: Mechanism, units: Units) -> Mechanism:
    """The same sizes as bare numbers of other units; texts with units stay as they are."""
    old = mechanism.units

    def number(size: Any, kind: str) -> Any:
        bare = isinstance(size, (int, float)) and not isinstance(size, bool) and kind in ("length", "angle", "force",
                                                                                          "mass", "moment")  # fmt: skip
        return size * SI_OF[old.of(kind)] / SI_OF[units.of(kind)] if bare else size

    def part(item: Any) -> Any:
        if isinstance(item, Mapping):
            return {key: part(value) for key, value in item.items()}
        if not is_dataclass(item):
            return item
        new = {}
        for f in fields(item):
            kind, value = f.metadata.get("kind"), getattr(item, f.name)
            if kind == "size":
                unit = f.metadata["unit"] or (item.along.kind if isinstance(item, Stroke) else "")
                new[f.name] = number(value, unit)
            elif kind == "sizes":
                new[f.name] = tuple(number(one, f.metadata["unit"]) for one in value)
            elif kind == "line":
                new[f.name] = number(value, "angle")
            elif kind == "arcs":
                new[f.name] = tuple((centre, number(radius, "length")) for centre, radius in value)
            elif kind is not None and f.name != "units":
                new[f.name] = part(value)
        return replace(item, **new)

    whole: Mechanism = replace(part(mechanism), units=units)
    return whole


def reordered(mechanism: Mechanism, points: Sequence[str], members: Sequence[str]) -> Mechanism:
    """The same items in another order of the file; which member stands for a pin changes with it."""
    return replace(
        mechanism,
        points={name: mechanism.points[name] for name in points},
        members={name: mechanism.members[name] for name in members},
    )


def _angle(line: Any) -> bool:
    return not isinstance(line, tuple)


def _longer(drawing: Drawing, size: Any, by: float) -> Any:
    if size in (DRAWN, LOWER, UPPER):
        return size
    return f"{float(drawing.value(size, 'length')) * by!r} m"
