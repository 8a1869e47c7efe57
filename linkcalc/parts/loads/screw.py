"""Screw: a spindle with its nut between two points, turned by a torque."""

from __future__ import annotations

from dataclasses import MISSING, dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Limit, Size, Sketch, Told, Value
from linkcalc.parts.law_push import TELLS_FORCE, LawPush, sure
from linkcalc.parts.laws.steady import Steady
from linkcalc.parts.paths.straight import straight
from linkcalc.words import word

RAISING, LOWERING, TURNING = "raising torque", "lowering torque", "turning torque"
EFFICIENCY, HOLDING = "thread efficiency", "holding ratio"


@word("load", "screw")
@dataclass(frozen=True)
class Screw:
    """A screw between two points: plus pushes them apart. It tells the torque that moves it against the force, and
    the one that moves it with the force; minus there: it runs back by itself unless it is held. The one of these that
    its motion asks for is its turning torque."""

    screw: tuple[str, str] = fields.names("point", "the two points")
    diameter: Size = fields.size("length", "mean diameter of the thread", sign="plus")
    lead: Size = fields.size("length", "travel for one turn", sign="plus")
    friction: Size = fields.friction("in the thread, over its flank", MISSING)
    size: Size | None = fields.size("force", "how large; left out for the one unknown", None)
    on: tuple[str, str] | None = fields.names("member", "the members they are on, if several carry the points", None)

    tells = TELLS_FORCE | {
        RAISING: "moment", LOWERING: "moment", TURNING: "moment", EFFICIENCY: "number", HOLDING: "number",
    }  # fmt: skip

    @property
    def ends(self) -> tuple[str, str]:
        return self.screw

    def pusher(self, name: str, sketch: Sketch) -> LawPush:
        diameter, lead = sketch.value(self.diameter, "length"), sketch.value(self.lead, "length")
        friction = sketch.value(self.friction, "number")
        rise = lead / (np.pi * diameter)
        if sure(friction * rise >= 1):
            raise fault(("friction",), "with this lead no torque however large turns the screw", "less is wanted")
        arm, back = _arms(diameter, rise, friction)
        size = None if self.size is None else sketch.value(self.size, "force")
        told = (
            Told(RAISING, "moment", lambda _, strength, __: np.abs(strength) * arm),
            Told(LOWERING, "moment", lambda _, strength, __: np.abs(strength) * back),
            # it drives where it moves along its push
            Told(
                TURNING, "moment", lambda _, strength, way: np.abs(strength) * np.where(strength * way < 0, back, arm)
            ),
            Told(EFFICIENCY, "number", lambda *_: diameter / 2 * rise / arm),
            Told(HOLDING, "number", lambda *_: friction / rise),
        )
        runs_back = Limit(
            "not held by its own friction: it runs back unless a brake holds it", lambda *_: friction - rise
        )
        path = straight(sketch, self.screw, self.on)
        return LawPush(name, "screw", Steady(size), path, more=told, edges=(runs_back,))


def _arms(diameter: Value, rise: Value, friction: Value) -> tuple[Value, Value]:
    """[m] torque over force, against the force and with it.

    Square thread, an incline of slope `rise` wound up: torque = F d/2 (rise + µ)/(1 - µ rise), and
    F d/2 (µ - rise)/(1 + µ rise) the other way (common practice of every textbook of machine elements).
    """
    half = diameter / 2
    return half * (rise + friction) / (1 - friction * rise), half * (friction - rise) / (1 + friction * rise)
