"""Pins across their stack of plates, over the whole stroke: what bends and shears each pin in any pose."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping, Sequence
from types import MappingProxyType

import numpy as np

from linkcalc.design.answer import Felt
from linkcalc.design.sizing.model_pins import located
from linkcalc.design.sizing.stack import PinStack, StackPlate, pin_stack
from linkcalc.design.survey import Quantity, Shown, Survey
from linkcalc.faults import Faults
from linkcalc.parts.pose import Array

BENDING, SHEAR = "bending moment in pin ", "shear force in pin "


def stack_quantities(survey: Survey, stacks: dict[str, tuple[StackPlate, ...]]) -> Iterator[Quantity]:
    """Largest bending moment and shear along each pin of three or more members, as quantities of a survey.

    With two members all forces grow together, so that the worst of the joint is the worst of its pin.
    """
    for pin, plates in stacks.items():
        if not in_step(survey, pin):
            bending = StackCurve(survey, pin, plates, lambda stack: stack.peak_moment.value)
            shear = StackCurve(survey, pin, plates, lambda stack: stack.peak_shear.value)
            yield Quantity(BENDING + pin, "moment", bending)
            yield Quantity(SHEAR + pin, "force", shear)


def in_step(survey: Survey, pin: str) -> bool:
    """True for a pin of two members: what they feel is one force and its opposite."""
    return sum(side.joint == pin for side in survey.sides) == 2


def stack_of(
    plates: Sequence[StackPlate], poses: Sequence[tuple[Felt, ...]], copies: Mapping[str, int] = MappingProxyType({})
) -> PinStack:
    """The pin in some poses, each told by what the members of the joint feel there; a batch of (pose).

    copies  member -> how many equal plates it stands for, if several: what it feels is then told of one of them

    Raises Faults: forces that do not balance, because something pushes on the pin itself.
    """
    forces = {}
    for k, first in enumerate(poses[0]):
        each = [felt[k] for felt in poses]
        size = np.array([f.force for f in each])
        angle = np.nan_to_num(np.array([f.direction for f in each]))
        # the pin feels the opposite of what the member feels
        forces[first.member] = -copies.get(first.member, 1) * size * np.stack([np.cos(angle), np.sin(angle)])
    return pin_stack(plates, forces)


class StackCurve:
    """What is largest along a pin, in every case and pose: (case, variant, pose), nan where there is no answer."""

    def __init__(self, survey: Survey, pin: str, plates: tuple[StackPlate, ...], along: Callable[[PinStack], Array]):
        self._survey, self._pin, self._plates, self._along = survey, pin, plates, along

    def __call__(self, shown: Shown) -> Array:
        status = shown.solved.balance.status
        fine = status == 0
        out: Array = np.full(status.shape, np.nan)
        if not fine.any():
            return out
        forces = {}
        for side in shown.sides:
            if side.joint == self._pin:
                both = np.stack([np.broadcast_to(v, status.shape)[fine] for v in (side.fx, side.fy)])
                forces[self._survey.side_name(side)] = -side.copies * both
        try:
            out[fine] = self._along(pin_stack(self._plates, forces))
        except Faults as found:
            raise located(self._pin, found) from None
        return out
