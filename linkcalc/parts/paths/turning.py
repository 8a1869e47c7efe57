"""Turning: the angle of a member, and a couple that opens it, as of a torsion spring at a pin."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts.contract import Mark, Poses, Push, Site, Sketch, Value
from linkcalc.parts.coordinates.turn import Turn, TurnCoordinate
from linkcalc.parts.shaft import shaft

WIDEST = np.radians(170.0)
"""How far from the drawing pose a turn can be told from one the other way round."""


@dataclass(frozen=True, eq=False)
class Turning:
    """The angle of a member's own axis from the x axis, or from another member's, within half a turn of the drawing
    pose; and a couple that turns the one counter-clockwise against the other."""

    angle: TurnCoordinate
    sites: tuple[Site, ...]
    kind = "angle"
    strength = "moment"
    on_pins = ("", "")

    def value(self, at: Poses) -> Value:
        """[rad]"""
        return self.angle.value(at)

    def push(self, at: Poses) -> tuple[Push, ...]:  # noqa: ARG002
        """For 1 N m."""
        return (self.angle.member, 0.0, 0.0, 1.0), (self.angle.other, 0.0, 0.0, -1.0)

    def mark(self, at: Poses, shape: str, name: str) -> Mark:
        x, y = at.spot(self.sites[0])
        return Mark(shape, ((float(x), float(y)),), name=name)

    def room(self, at: Poses, strength: Value) -> Value:  # noqa: ARG002
        """[rad] what is left of the turn to either side that can be told."""
        return WIDEST - np.abs(self.angle.value(at) - self.angle.drawn)


def turning(sketch: Sketch, member: str, against: str) -> Turning:
    """The turn of one member against another, or against the ground."""
    return Turning(Turn(member, against=against).coordinate(sketch), shaft(sketch, member, against))
