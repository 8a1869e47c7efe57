"""What requirements may ask of a joint besides its force: stress, pressure and life of a pin, pressure of a guide,
safety of a rope.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from typing import TYPE_CHECKING

import numpy as np

from linkcalc.faults import Faults
from linkcalc.model.requirements import SAFETY, requirements
from linkcalc.parts.pose import Array

if TYPE_CHECKING:
    from linkcalc.design.curves import Curves
    from linkcalc.design.sizing.bearing_list import Bearing
    from linkcalc.design.sizing.model_pins import PinSpec
    from linkcalc.design.sizing.rolling import Duty
    from linkcalc.design.sizing.stack import PinStack
    from linkcalc.design.sizing.working import Working
    from linkcalc.design.survey import Quantity, Shown, Survey
    from linkcalc.design.swings import Pair

Along = Callable[["PinStack"], Array]
"""From a pin in a batch of poses to a value in each of them."""


def strength_quantities(survey: Survey) -> Iterator[Quantity]:
    """Quantities of a survey for the requirements of its model that ask for them; none where no requirement does."""
    mechanism = survey.ready.drawing.mechanism
    asked = {(r.quantity, r.of) for r in requirements(mechanism) if r.strength}
    if not asked:
        return
    # most models ask for none of this, and start without what it takes
    from linkcalc.design.shoes import pressure, safety, shoes
    from linkcalc.design.sizing.model_pins import pin_spec
    from linkcalc.design.survey import Quantity
    from linkcalc.design.swings import speeds

    for quantity, pin in sorted(asked):
        if quantity == SAFETY:
            yield safety(survey.ready, pin, survey.quantities[f"tension of {pin}"].of)
            continue
        if pin in shoes(survey.ready):
            yield pressure(survey.ready, pin)
            continue
        spec = pin_spec(pin, mechanism, survey.ready.drawing)
        if quantity == "stress":
            yield Quantity(f"stress in pin {pin}", "stress", _stress(survey, pin, spec))
        if quantity == "pressure":
            yield Quantity(f"pressure at {pin}", "stress", _pressure(survey, pin, spec))
        if quantity == "life":
            yield from speeds(_pairs(survey, pin))


def life(curves: Curves, pin: str, bearings: Sequence[Bearing] | None = None) -> float:
    """[-] strokes, there and back, that the bearing of a pin lasts; infinite where it does not turn.

    bearings  the list it is of; None: the sample. Of a kind of bearing the smallest that does is meant

    Raises Faults: no such bearing.
    """
    from linkcalc.design.sizing.bearing_list import bearings as sample
    from linkcalc.design.sizing.model_pins import located, pin_spec
    from linkcalc.design.sizing.rolling import Duty
    from linkcalc.design.swings import Swings

    drawing = curves.survey.ready.drawing
    spec = pin_spec(pin, drawing.mechanism, drawing)
    pairs = _pairs(curves.survey, pin)
    if curves.drive.size < 2 or not pairs:
        return float("inf")
    swings = Swings(curves, pairs)
    pair, swing = max(
        ((p, swings.swing(p, radius=float("nan"), time=float("nan"))) for p in pairs), key=lambda each: each[1].path
    )
    worst = curves.size(f"force at {pin}")
    duty = Duty(worst, lambda p: swings.mean(pair, p)[0], swing.path, spec.life)
    try:
        working = _borne(spec, duty, sample() if bearings is None else bearings)
    except Faults as found:
        raise located(pin, found) from None
    return float(working["strokes"]) if swing.path > 0 else float("inf")


def _borne(spec: PinSpec, duty: Duty, among: Sequence[Bearing]) -> Working:
    from linkcalc.design.sizing.bearing_list import bearing, kinds
    from linkcalc.design.sizing.rolling import choose_bearing, rolling_bearing

    name = spec.bearing or ""
    if name in kinds():
        return choose_bearing(among, duty, kind=name, least_bore=spec.diameter).working
    return rolling_bearing(bearing(name, among), duty)


def _pairs(survey: Survey, pin: str) -> list[Pair]:
    from linkcalc.design.swings import pairs_of

    moves = survey.ready.steps and survey.first.solved.closed.speed
    return [p for p in pairs_of(survey.ready.chain) if p.pin and p.joint == pin] if moves else []


def _stress(survey: Survey, pin: str, spec: PinSpec) -> Callable[[Shown], Array]:
    diameter = spec.diameter
    assert diameter is not None  # the check of the model has seen to it
    return _over_stack(survey, pin, spec, lambda stack: stack.equivalent(diameter).value)


def _pressure(survey: Survey, pin: str, spec: PinSpec) -> Callable[[Shown], Array]:
    diameter, length = spec.diameter, spec.length
    assert diameter is not None
    if spec.bush is not None and length is not None:
        force = survey.quantities[f"force at {pin}"].of
        return lambda shown: np.asarray(force(shown)) / (diameter * length)
    return _over_stack(survey, pin, spec, lambda stack: stack.line_load.max(axis=0) / diameter)


def _over_stack(survey: Survey, pin: str, spec: PinSpec, along: Along) -> Callable[[Shown], Array]:
    from linkcalc.design.pin_stacks import StackCurve, in_step
    from linkcalc.design.sizing.stack import pin_stack

    if not in_step(survey, pin):
        return StackCurve(survey, pin, spec.stack, along)
    # of two members all forces grow together: what 1 N does, times the force
    sides = [side for side in survey.sides if side.joint == pin]
    first, second = (survey.side_name(side) for side in sides)
    unit = float(along(pin_stack(spec.stack, {first: np.array([1.0, 0.0]), second: np.array([-1.0, 0.0])})))
    force, copies = survey.quantities[f"force at {pin} on {first}"].of, sides[0].copies
    return lambda shown: unit * copies * np.asarray(force(shown))
