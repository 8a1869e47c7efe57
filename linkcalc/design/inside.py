"""Inner forces of the members of a mechanism, in every case and pose of a solved batch."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from functools import partial
from typing import TYPE_CHECKING

import numpy as np

from linkcalc.design.inner import AXIAL, BENDING, FORCES, MARGIN, SHEAR, STRESS, USED
from linkcalc.design.sizing.model_members import MemberSpec, member_spec
from linkcalc.mechanics.acts import Act, acts, ends
from linkcalc.mechanics.body import Body, body, straight
from linkcalc.mechanics.internal import Largest, Pieces, fibre_stress, largest, pieces
from linkcalc.mechanics.prepare import Ready
from linkcalc.model.mechanism import GROUND
from linkcalc.parts.pose import Array

if TYPE_CHECKING:
    from linkcalc.design.survey import Shown


_Kept = tuple["Shown", dict[int, list[Act]], dict[str, Pieces], dict[tuple[str, str], Largest]]


class Inside:
    """What goes on in the members.

    members  all that move
    """

    def __init__(self, ready: Ready, first: Shown):
        self._ready, self._first = ready, first
        self.members = tuple(m for m in ready.drawing.members if m != GROUND)
        self._bodies: dict[str, Body] = {}
        self._specs: dict[str, MemberSpec] = {}
        self._columns: dict[str, float | None] = {}
        self._buckling: dict[str, float] = {}
        self._last: _Kept | None = None

    def body(self, member: str) -> Body:
        if member not in self._bodies:
            self._bodies[member] = body(self._ready.drawing, member)
        return self._bodies[member]

    def spec(self, member: str) -> MemberSpec:
        """Section, material and ends of a member. Raises Faults."""
        if member not in self._specs:
            self._specs[member] = member_spec(member, self._ready.drawing)
        return self._specs[member]

    def column(self, member: str) -> float | None:
        """[m] length between the two places that a straight member is loaded at, but for its own weight; None for
        any other member."""
        if member not in self._columns:
            of = self.body(member)
            places = ends(member, self.acts(self._first, member), of.slack)
            self._columns[member] = None if places is None or not of.starts else straight(of, *places)
        return self._columns[member]

    def buckling(self, member: str) -> float | None:
        """[N] compression that a column buckles at; None for what is none, or whose section or material is not told."""
        spec, long = self.spec(member), self.column(member)
        if long is None or spec.section is None or spec.material is None or spec.material.modulus is None:
            return None
        if member not in self._buckling:
            self._buckling[member] = spec.buckling_load(long)
        return self._buckling[member]

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
        """Where along the member a quantity is largest, in every case and pose; worked out once a batch."""
        kept = self._kept(shown)[3]
        if (member, quantity) not in kept:
            kept[member, quantity] = self._largest(shown, member, quantity)
        return kept[member, quantity]

    def _largest(self, shown: Shown, member: str, quantity: str) -> Largest:
        found = self.pieces(shown, member)
        if quantity == STRESS:
            spec = self.spec(member)
            return fibre_stress(self.body(member), found, spec.area, spec.modulus, spec.curved)
        if quantity == MARGIN:
            return largest(found, found.axial, sense=-1)
        return largest(found, {AXIAL: found.axial, SHEAR: found.shear, BENDING: found.bending}[quantity])

    def of(self, member: str) -> Iterator[tuple[str, Callable[[Shown], Array]]]:
        """What there is of a member: name of the quantity, and its worst along the member."""
        if not self.body(member).starts:
            return
        for quantity in FORCES:
            yield quantity, partial(self._size, member, quantity)
        spec = self.spec(member)
        if spec.section is not None:
            yield STRESS, partial(self._size, member, STRESS)
            if self.buckling(member) is not None:
                yield MARGIN, partial(self._margin, member)
            if spec.material is not None:
                yield USED, partial(self._used, member)

    def _size(self, member: str, quantity: str, shown: Shown) -> Array:
        return np.asarray(np.abs(self.largest(shown, member, quantity).value))

    def _margin(self, member: str, shown: Shown) -> Array:
        """Buckling load over compression; without bound where it is not pressed."""
        load = self.buckling(member)
        assert load is not None
        push = -self.largest(shown, member, MARGIN).value
        with np.errstate(divide="ignore", invalid="ignore"):
            return np.where(push > 0, load / push, np.where(np.isnan(push), np.nan, np.inf))

    def _used(self, member: str, shown: Shown) -> Array:
        """Used part of what is allowed: fibre stress, mean shear stress, buckling, whichever is used most."""
        spec = self.spec(member)
        assert spec.material is not None
        allowed = spec.material.yields / spec.factor
        used = np.maximum(
            self._size(member, STRESS, shown) / allowed,
            self._size(member, SHEAR, shown) / spec.area / (allowed / np.sqrt(3.0)),
        )
        if self.buckling(member) is not None:
            used = np.maximum(used, spec.factor / self._margin(member, shown))
        return np.asarray(used)

    def _kept(self, shown: Shown) -> _Kept:
        """What was worked out for a batch last: every quantity of a member begins with the same pieces."""
        if self._last is None or self._last[0] is not shown:
            self._last = shown, acts(self._ready, shown.solved, shown.sides), {}, {}
        return self._last
