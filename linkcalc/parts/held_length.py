"""A length held at a target: the row that a distance, a travel or a haul puts on the motion."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

from linkcalc.parts.contract import Poses, Row, Value


class Length(Protocol):
    """A coordinate that is a length [m], with its row of slopes."""

    def value(self, at: Poses) -> Value: ...
    def slope(self, at: Poses) -> Row: ...


@dataclass(frozen=True, eq=False)
class HeldLength:
    """gap = length less target [m]."""

    length: Length
    target: Value
    angular = False

    def gap(self, at: Poses) -> Value:
        return self.length.value(at) - self.target

    def slope(self, at: Poses) -> Row:
        return self.length.slope(at)
