"""Inner forces of the members of a mechanism, in every case and pose of a solved batch."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from functools import partial
from typing import TYPE_CHECKING

import numpy as np

from linkcalc.mechanics.acts import Act, acts
from linkcalc.mechanics.body import Body, body
from linkcalc.mechanics.internal import Largest, Pieces, largest, pieces
from linkcalc.mechanics.prepare import Ready
from linkcalc.model.mechanism import GROUND
from linkcalc.model.requirements import INNER, requirements
from linkcalc.parts.pose import Array

if TYPE_CHECKING:
    from linkcalc.design.survey import Shown

AXIAL, SHEAR, BENDING = "axial force", "shear force", "bending moment"
KINDS = {AXIAL: "force", SHEAR: "force", BENDING: "moment"}


class Inside:
    """What goes on in the members.

    members  those that are looked at: all that move
    asked    those that requirements ask about
    """

    def __init__(self, ready: Ready):
        self._ready = ready
        mechanism = ready.drawing.mechanism
        self.members = tuple(m for m in ready.drawing.members if m != GROUND)
        about = [r.of for r in requirements(mechanism) if r.quantity in INNER]
        self.asked = tuple(m for m in self.members if m in about)
        self._bodies: dict[str, Body] = {}
        self._last: tuple[Shown, dict[int, list[Act]], dict[str, Pieces]] | None = None

    def body(self, member: str) -> Body:
        if member not in self._bodies:
            self._bodies[member] = body(self._ready.drawing, member)
        return self._bodies[member]

    def acts(self, shown: Shown, member: str) -> list[Act]:
        return self._kept(shown)[1][self._ready.drawing.member(member)]

    def pieces(self, shown: Shown, member: str) -> Pieces:
        found = self._kept(shown)[2]
        if member not in found:
            shape = shown.solved.balance.status.shape
            with np.errstate(invalid="ignore"):
                found[member] = pieces(self.body(member), self.acts(shown, member), shape)
        return found[member]

    def largest(self, shown: Shown, member: str, quantity: str) -> Largest:
        """Where along the member a quantity is largest, in every case and pose."""
        found = self.pieces(shown, member)
        return largest(found, {AXIAL: found.axial, SHEAR: found.shear, BENDING: found.bending}[quantity])

    def of(self, member: str) -> Iterator[tuple[str, Callable[[Shown], Array]]]:
        """What there is of a member: name of the quantity, and its largest size along the member."""
        if len(self.body(member).starts):
            for quantity in KINDS:
                yield quantity, partial(self._size, member, quantity)

    def _size(self, member: str, quantity: str, shown: Shown) -> Array:
        return np.asarray(np.abs(self.largest(shown, member, quantity).value))

    def _kept(self, shown: Shown) -> tuple[Shown, dict[int, list[Act]], dict[str, Pieces]]:
        """What was worked out for a batch last: every quantity of a member begins with the same pieces."""
        if self._last is None or self._last[0] is not shown:
            self._last = shown, acts(self._ready, shown.solved, shown.sides), {}
        return self._last
