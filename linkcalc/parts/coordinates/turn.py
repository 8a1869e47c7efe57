"""Turn: the angle of a member, or of a line on it, against the ground or another member."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Poses, Row, Sketch, Value
from linkcalc.words import word


@word("coordinate", "turn")
@dataclass(frozen=True)
class Turn:
    """The turn of a member: the angle of its own axis (or a line on it) from the x axis, or from another member's."""

    turn: str = fields.name("member", "the member that turns")
    line: tuple[str, str] | None = fields.names(
        "point", "the line on it that is measured; else first to last point", None
    )
    against: str | None = fields.name("member", "the member whose axis it is measured from; else the x axis", None)

    kind = "angle"

    def coordinate(self, sketch: Sketch) -> TurnCoordinate:
        if self.line:
            (ax, ay), (bx, by) = (sketch.point(p) for p in self.line)
            drawn: Value = np.arctan2(by - ay, bx - ax)
        else:
            drawn = sketch.own_axis(self.turn)
        other = 0
        if self.against and self.against != "ground":
            other = sketch.member(self.against)
            drawn = drawn - sketch.own_axis(self.against)
        return TurnCoordinate(sketch.member(self.turn), other, drawn)


@dataclass(frozen=True, eq=False)
class TurnCoordinate:
    """Angle = drawn angle + turn of the member - turn of the other [rad]."""

    member: int
    other: int
    drawn: Value
    kind = "angle"

    def value(self, at: Poses) -> Value:
        c, s = _relative(self, at)
        angle: Value = self.drawn + np.arctan2(s, c)
        return angle

    @cached_property
    def _compass(self) -> tuple[Value, Value]:
        return np.cos(self.drawn), np.sin(self.drawn)

    def hold(self, target: Value) -> HeldTurn:
        # cosine and sine of target - drawn; of many copies only `drawn` is an array, and it is the same at every pose
        (cd, sd), ct, st = self._compass, np.cos(target), np.sin(target)
        return HeldTurn(self, ct * cd + st * sd, st * cd - ct * sd)


@dataclass(frozen=True, eq=False)
class HeldTurn:
    """gap = sin(turn less wanted turn): no winding to keep count of, and a slope of 1 where it holds."""

    turn: TurnCoordinate
    c: Value
    s: Value
    angular = True

    def gap(self, at: Poses) -> Value:
        c, s = _relative(self.turn, at)
        return s * self.c - c * self.s

    def slope(self, at: Poses) -> Row:  # noqa: ARG002
        return (self.turn.member, TURN, 1.0), (self.turn.other, TURN, -1.0)


def _relative(turn: TurnCoordinate, at: Poses) -> tuple[Value, Value]:
    ca, sa = at.c[turn.member], at.s[turn.member]
    if turn.other == 0:
        return ca, sa
    cb, sb = at.c[turn.other], at.s[turn.other]
    return ca * cb + sa * sb, sa * cb - ca * sb
