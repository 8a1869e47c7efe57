"""Torsion spring: at the pin of a member, wound against another member or the ground."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Limit, Size, Sketch
from linkcalc.parts.law_push import TELLS_TORQUE, LawPush
from linkcalc.parts.laws.linear import Linear
from linkcalc.parts.paths.turning import turning
from linkcalc.words import word

LOST = "near half a turn from the drawing pose: turns are told within half a turn, and beyond it the torque is wrong"


@word("load", "torsion_spring")
@dataclass(frozen=True)
class TorsionSpring:
    """A torsion spring: torque on the member = rate (free angle - angle), counter-clockwise plus."""

    torsion_spring: str = fields.name("member", "the member it turns")
    rate: Size = fields.size("torsion stiffness", "torque for each angle it is wound", sign="plus")
    free_angle: Size | None = fields.size("angle", "angle without torque, of the member's own axis", None)
    preload: Size | None = fields.size("moment", "torque in the drawing pose, counter-clockwise plus", None)
    against: str = fields.name("member", "the member it is wound against; angles count from its own axis", "ground")

    one_of = ("free_angle", "preload")
    tells = TELLS_TORQUE
    gives = "moment"

    @property
    def turned(self) -> tuple[str, str]:
        return self.torsion_spring, self.against

    def pusher(self, name: str, sketch: Sketch) -> LawPush:
        path = turning(sketch, self.torsion_spring, self.against)
        rate = sketch.value(self.rate, "torsion stiffness")
        if self.preload is not None:
            free = path.angle.drawn + sketch.value(self.preload, "moment") / rate
        else:
            assert self.free_angle is not None  # one of the two is there
            free = sketch.value(self.free_angle, "angle")
        caution = "a wound spring whips round when it is let go: unwind it before its ends are loosened"
        edges = (Limit(LOST, path.room),)
        return LawPush(name, "torsion spring", Linear(rate, free), path, edges=edges, cautions=(caution,))
