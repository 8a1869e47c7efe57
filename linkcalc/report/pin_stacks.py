"""Pins across their plates: shear and bending along each, in the pose that uses it most."""

from __future__ import annotations

import numpy as np

from linkcalc.design.pins_answer import PinsAnswer, Sized
from linkcalc.design.sizing.stack import Peak
from linkcalc.faults import fault
from linkcalc.report.blocks import Axis, Curve, PinDiagram, PinDiagrams
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number, plain

_CAPTION = (
    "Each pin in the pose that uses it most. Thick: the resultant; thin: its parts along x (full) and along y (dashed)."
)


def pin_diagrams(answer: PinsAnswer) -> PinDiagrams:
    """A diagram for each pin that has a stack.

    Raises Faults if none has.
    """
    edge = Edge(answer.stroke)
    found = tuple(_diagram(edge, j.joint, s) for j in answer.joints for s in j.sized if s.stack is not None)
    if not found:
        what = "no pin has a stack of plates, so there is nothing to draw along it"
        raise fault(("pins",), what, 'give one its plates in order: stack = [["fork", 8], ["rod", 16], ["fork", 8]]')
    axes = (
        Axis("along the pin", plain(edge.unit("length"))), Axis("shear force", plain(edge.unit("force"))),
        Axis("bending moment", plain(edge.unit("moment"))),
    )  # fmt: skip
    return PinDiagrams(answer.stroke.mechanism.title or "Pins", _CAPTION, axes, found)


def _diagram(edge: Edge, joint: str, pin: Sized) -> PinDiagram:
    stack = pin.stack
    assert stack is not None
    z = stack.stations()
    diameter = float(pin.working["d"])
    size = f"{number(edge.one(diameter, 'length'), trim=True)} {plain(edge.unit('length'))}"
    plates = tuple(
        (plate.member, edge.one(float(start), "length"), edge.one(float(stop), "length"))
        for plate, start, stop in zip(stack.plates, stack.starts, stack.stops, strict=True)
    )
    places = tuple(float(v) for v in edge.out(z, "length"))
    shear = _curves(edge, stack.shear(z)[:, :, 0], "force")
    moment = _curves(edge, stack.moment(z)[:, :, 0], "moment")
    peaks = (_peak(edge, stack.peak_shear, "force"), _peak(edge, stack.peak_moment, "moment"))
    return PinDiagram(
        f"{joint}, {size}, used {100 * pin.utilisation:.0f} %", edge.one(diameter, "length"), plates, places, shear,
        moment, peaks,
    )  # fmt: skip


def _curves(edge: Edge, parts: np.ndarray, what: str) -> tuple[Curve, ...]:
    each = (("resultant", np.hypot(*parts)), ("along x", parts[0]), ("along y", parts[1]))
    return tuple(
        Curve(name, tuple(float(v) for v in edge.out(values, what)), hue=min(k, 1), case=max(k - 1, 0), broad=k == 0)
        for k, (name, values) in enumerate(each)
    )


def _peak(edge: Edge, peak: Peak, what: str) -> tuple[float, float, str]:
    value = float(peak.value[0])
    return edge.one(float(peak.place[0]), "length"), edge.one(value, what), edge.text(value, what)
