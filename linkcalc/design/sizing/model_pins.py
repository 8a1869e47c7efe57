"""What a model file says of a pin for its sizing, in SI."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.design.sizing.lug import Lug
from linkcalc.design.sizing.stack import StackPlate
from linkcalc.faults import Faults, fault
from linkcalc.model.mechanism import Mechanism, Pin
from linkcalc.model.sketch import Drawing

USUAL_FACTOR = 2.0
"""Against yield where the model names none: common practice for static loads that are well known; always shown."""
USUAL_MATERIAL = "S355"


@dataclass(frozen=True)
class PinSpec:
    """A pin as the model has it, None where the model is silent.

    diameter     [m], its own or that of all pins
    material     its name, USUAL_MATERIAL if the model names none; chosen: True if the model names it
    factor       [-] against yield, USUAL_FACTOR if the model names none; given: True if the model names it
    stack        plates in order across it, () if it is not told
    lugs         member -> Lug, of plates whose width and edge are told; only with a diameter
    bush         material of its bush; length [m] of the bush
    bearing      designation of a list, or kind, of its rolling bearing
    life         strokes that this must last
    """

    diameter: float | None
    material: str
    factor: float
    stack: tuple[StackPlate, ...]
    lugs: dict[str, Lug]
    bush: str | None
    length: float | None
    bearing: str | None
    life: float | None
    chosen: bool
    given: bool


def pin_spec(point: str, mechanism: Mechanism, drawing: Drawing) -> PinSpec:
    """What the model says of the pin at a point. Raises Faults."""
    pin = mechanism.pins.get(point, Pin())

    def size(value: object, kind: str) -> float | None:
        # the middle copy of a toleranced drawing: a pin is bought once
        return None if value is None else float(drawing.value(value, kind))  # type: ignore[arg-type]

    diameter = size(mechanism.friction.diameter if pin.diameter is None else pin.diameter, "length")
    stack, lugs = list[StackPlate](), dict[str, Lug]()
    for one in pin.stack:
        thick, gap = size(one.thickness, "length") or 0.0, size(one.gap, "length") or 0.0
        stack.append(StackPlate(one.plate, thick, gap))
        width, edge = size(one.width, "length"), size(one.edge, "length")
        if width and edge and diameter:
            lugs[one.plate] = Lug(diameter, thick, width, edge)
    factor = size(pin.factor, "number")
    return PinSpec(
        diameter, pin.material or USUAL_MATERIAL, factor or USUAL_FACTOR, tuple(stack), lugs, pin.bush,
        size(pin.length, "length"), pin.bearing, size(pin.life, "number"), pin.material is not None, factor is not None,
    )  # fmt: skip


def needed_stack(point: str, spec: PinSpec, members: tuple[str, ...]) -> tuple[StackPlate, ...]:
    """The stack of a pin. Raises Faults: it is not told."""
    if not spec.stack:
        example = ", ".join(f'["{m}", 10]' for m in members)
        raise fault(("pins", point), "'stack' is missing", f"the plates across it in order: stack = [{example}]")
    return spec.stack


def located(point: str, found: Faults) -> Faults:
    """Faults of a sizing method, told of the pin they were found at."""
    return Faults(type(f)(("pins", point, *f.item), f.what, f.wanted, f.file, f.line) for f in found.faults)
