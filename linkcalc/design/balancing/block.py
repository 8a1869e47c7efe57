"""What is put in, in numbers: a block for each kind says what its unknowns do to the effort and what limits them.

Some sizes the effort is linear in (a mass, a mass times its place, a rate, a force): z. The rest are searched: t. For
given t all is linear in z.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace
from typing import Any, Protocol

import numpy as np

from linkcalc.design.balancing.influence import Influence
from linkcalc.parts.pose import Array
from linkcalc.parts.rooms import Room


@dataclass(frozen=True)
class Unknown:
    """A size to be found.

    name  "mass", "rate", "x of the first end"; kind of it
    low, high  [SI] its bounds, infinite if open; alike where it is settled
    step       [SI] it is rounded to whole steps of this, 0.0 not at all
    """

    name: str
    kind: str
    low: float
    high: float
    step: float = 0.0

    @property
    def settled(self) -> bool:
        return self.low >= self.high


class Block(Protocol):
    """One counterweight or one lot of springs.

    name     what it is called
    part     what the model file says of it
    loss     part of its force that it loses with age
    """

    @property
    def name(self) -> str: ...
    @property
    def part(self) -> Any: ...
    @property
    def loss(self) -> float: ...
    @property
    def on(self) -> tuple[str, ...]:
        """the members that it is on"""

    @property
    def sizes(self) -> tuple[Unknown, ...]:
        """everything that is to be found, settled sizes too, in the order in which it is told and rounded"""

    @property
    def searched(self) -> tuple[Unknown, ...]:
        """those of the open sizes that are t"""

    @property
    def linear(self) -> tuple[tuple[float, float], ...]:
        """bounds of each z"""

    def columns(self, t: Array, by: Influence) -> list[Array]:
        """for each z (case, variant, pose): what 1 of it does to the effort; t (unknowns, variant)"""

    def limits(self, t: Array, by: Influence) -> tuple[Array, Array]:
        """(limits, z, variant) and (limits, variant): the sum of the first times z, and the second, is not minus"""

    def found(self, t: Array, z: Array) -> dict[str, float]:
        """sizes by name [SI], for one t (unknowns) and z"""

    def start(self, values: dict[str, float]) -> list[float]:
        """t of sizes by name"""

    def settled(self, name: str, value: float) -> Block:
        """the same with one size settled"""

    def written(self, values: dict[str, float]) -> Written:
        """what the model gets for these sizes"""


Writer = Callable[[float, str], float]
"""A size [SI] of a kind as the model file writes it"""


@dataclass(frozen=True)
class Written:
    """What is put into a model.

    places  (part of the name, member or "" for the point itself, point of the model or "", (x, y) [m]) of each end
    load    from the names of the points, those of their members and a Writer: the load as the file would give it
    number  how many of it, 0 where nothing is better than any
    """

    places: tuple[tuple[str, str, str, tuple[float, float]], ...]
    load: Callable[[tuple[str, ...], tuple[str, ...], Writer], Any]
    number: int = 1


def place_of(room: Room, t: dict[int, float]) -> tuple[float, float]:
    """[m] the place in the drawing for the open axes at t, by number of the axis."""
    x, y = room.base
    for axis, value in t.items():
        u, v = room.axes[axis]
        x, y = x + value * u, y + value * v
    return x, y


def room_sizes(room: Room, label: str, step: float) -> tuple[Unknown, ...]:
    """The axes of a room as sizes: "x", "from P of the first end"."""
    return tuple(
        Unknown(f"{name} {label}".strip(), "length", low, high, step)
        for name, low, high in zip(room.names, room.low, room.high, strict=True)
    )


def settle_room(room: Room, label: str, name: str, value: float) -> Room | None:
    """The room with the axis of that name settled; None if it has none."""
    names = [f"{n} {label}".strip() for n in room.names]
    return room.settled(names.index(name), value) if name in names else None


def settle(unknown: Unknown, value: float) -> Unknown:
    return replace(unknown, low=value, high=value)


def nothing(z: int, variants: int) -> tuple[Array, Array]:
    """No limits at all."""
    return np.zeros((0, z, variants)), np.zeros((0, variants))
