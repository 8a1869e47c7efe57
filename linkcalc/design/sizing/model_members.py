"""What a model file says of a member for its sizing, in SI."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from linkcalc.design.sizing.column import two_force_member
from linkcalc.design.sizing.materials import Material, material
from linkcalc.design.sizing.model_pins import USUAL_FACTOR
from linkcalc.design.sizing.section import SECTIONS, Section, curved_more
from linkcalc.faults import Fault, Faults
from linkcalc.model.mechanism import Member
from linkcalc.model.sketch import Drawing
from linkcalc.parts.fields import part_fields


@dataclass(frozen=True)
class MemberSpec:
    """A member as the model has it, None where the model is silent.

    material     with the yield stress of its thickness
    factor       [-] against yield and buckling, USUAL_FACTOR if the model names none; given: True if it names it
    bend_radius  [m] of the middle line at the corners of its path
    ends, ends_across  word or length factor K, in the plane and out of it
    """

    section: Section | None
    material: Material | None
    factor: float
    given: bool
    bend_radius: float | None
    ends: str | float
    ends_across: str | float | None

    @cached_property
    def area(self) -> float:
        """[m2]"""
        return self._figure("A")

    @cached_property
    def modulus(self) -> float:
        """[m3] section modulus in the plane"""
        return self._figure("W")

    @cached_property
    def depth(self) -> float:
        """[m] depth of the section in the plane: twice the distance of its outermost fibre"""
        return 2 * self._figure("c")

    def _figure(self, symbol: str) -> float:
        assert self.section is not None
        return float(self.section.working[symbol])

    @cached_property
    def curved(self) -> float:
        """[-] how much more than a straight bar the inner fibre carries where it is bent."""
        if self.section is None or self.bend_radius is None:
            return 1.0
        return curved_more(self.section, self.bend_radius)

    def buckling_load(self, length: float) -> float:
        """[N] the lower one of both planes. Raises Faults: a material without modulus."""
        assert self.section is not None and self.material is not None
        working = two_force_member(
            -1.0, length, self.section, self.material, 1.0, ends=self.ends, ends_across=self.ends_across
        )
        return float(min(working["Pcr"], working["Pcra"]))


def member_spec(name: str, drawing: Drawing) -> MemberSpec:
    """What the model says of a member. Raises Faults, told of the member."""
    member = drawing.mechanism.members[name]
    try:
        return _spec(member, drawing)
    except Faults as found:
        raise Faults([Fault(("members", name, *f.item), f.what, f.wanted) for f in found.faults]) from None


def _spec(member: Member, drawing: Drawing) -> MemberSpec:
    def size(value: object, kind: str) -> float | None:
        # the middle copy of a toleranced drawing: a bar is bought once
        return None if value is None else float(np.ravel(drawing.value(value, kind))[0])  # type: ignore[arg-type]

    def ends(value: object) -> str | float | None:
        return value if isinstance(value, str) and not _number(value) else size(value, "number")

    section, thin = None, 0.0
    if member.section is not None:
        sizes: list[float | None] = []
        for entry in part_fields(member.section):
            given = getattr(member.section, entry.name)
            sizes += [size(one, entry.metadata["unit"]) for one in (given if isinstance(given, tuple) else (given,))]
        section = SECTIONS[member.section.shape](*sizes)
        thin = min((value for _, _, value, kind in section.sizes if kind == "length"), default=0.0)
    of = None if member.material is None else material(member.material, drawing.mechanism, thin)
    factor = size(member.factor, "number")
    held = ends(member.ends)
    assert held is not None
    return MemberSpec(
        section, of, factor or USUAL_FACTOR, factor is not None, size(member.bend_radius, "length"), held,
        ends(member.ends_across),
    )  # fmt: skip


def _number(text: str) -> bool:
    return not text.replace(" ", "").isalpha()
