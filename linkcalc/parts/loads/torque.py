"""Torque: a couple on a member, against the ground or another member."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Mark, Poses, Push, Site, Size, Sketch, Value
from linkcalc.parts.shaft import shaft
from linkcalc.words import word


@word("load", "torque_on")
@dataclass(frozen=True)
class Torque:
    """A torque on a member, counter-clockwise plus; with `against` the other member takes it the other way."""

    torque_on: str = fields.name("member", "the member that is turned")
    against: str = fields.name("member", "the member that takes it the other way", "ground")
    shaft: str | None = fields.name(
        "point", "where it goes in, for inner forces; else where the two members meet", None
    )
    size: Size | None = fields.size("moment", "how large; left out for the one unknown", None)

    def pusher(self, name: str, sketch: Sketch) -> TorquePush:
        size = None if self.size is None else sketch.value(self.size, "moment")
        sites = shaft(sketch, self.torque_on, self.against, self.shaft)
        return TorquePush(name, sketch.member(self.torque_on), sketch.member(self.against), size, sites)


@dataclass(frozen=True, eq=False)
class TorquePush:
    """What a torque does, for 1 N m."""

    name: str
    member: int
    against: int
    size: Value | None
    sites: tuple[Site, Site]
    on_pins: tuple[str, str] = ("", "")
    kind = "moment"
    word = "torque"

    def strength(self, at: Poses) -> Value:  # noqa: ARG002
        assert self.size is not None
        return self.size

    def push(self, at: Poses) -> tuple[Push, ...]:  # noqa: ARG002
        return (self.member, 0.0, 0.0, 1.0), (self.against, 0.0, 0.0, -1.0)

    def mark(self, at: Poses) -> Mark:
        x, y = at.spot(self.sites[0])
        return Mark("torque", ((float(x), float(y)),), name=self.name)
