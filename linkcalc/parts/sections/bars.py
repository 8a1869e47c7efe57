"""Sections of bars. The first size of each lies in the plane of the mechanism, where it takes the bending.

``shape`` is its word in ``design.sizing.section``, which reckons with it.
"""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Size
from linkcalc.words import word


@word("section", "round")
@dataclass(frozen=True)
class Round:
    """A round bar."""

    shape = "round"
    round: Size = fields.size("length", "its diameter", sign="plus")


@word("section", "tube")
@dataclass(frozen=True)
class Tube:
    """A round tube."""

    shape = "tube"
    tube: tuple[Size, ...] = fields.named_sizes("length", ("outside", "wall"), "outside diameter and wall")


@word("section", "flat")
@dataclass(frozen=True)
class Flat:
    """A flat bar or a plate."""

    shape = "flat"
    flat: tuple[Size, ...] = fields.named_sizes(
        "length", ("depth", "thickness"), "depth in the plane, thickness across it"
    )


@word("section", "rectangular_tube")
@dataclass(frozen=True)
class RectangularTube:
    """A rectangular tube."""

    shape = "rectangular tube"
    rectangular_tube: tuple[Size, ...] = fields.named_sizes(
        "length", ("depth", "width", "wall"), "depth in the plane, width across it, wall"
    )


@word("section", "area")
@dataclass(frozen=True)
class General:
    """Any section by its figures, as a table of a rolled section has them."""

    shape = "general"
    area: Size = fields.size("area", "its area", sign="plus")
    second_moment: Size = fields.size("second moment", "its second moment for bending in the plane", sign="plus")
    edge_distance: Size = fields.size("length", "from its middle to the outermost fibre in the plane", sign="plus")
    second_moment_across: Size | None = fields.size(
        "second moment", "that for bending out of the plane; if left out, buckling is looked at in the plane only",
        None, sign="plus",
    )  # fmt: skip
