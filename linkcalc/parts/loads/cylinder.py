"""Cylinder: a piston under pressure, pushing or drawing its rod."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Limit, Size, Sketch, Told, Value
from linkcalc.parts.law_push import ROD_FORCE, TELLS_FORCE, LawPush, between, nominal, sure
from linkcalc.parts.laws.steady import Steady
from linkcalc.parts.paths.straight import straight
from linkcalc.words import word

PUSH, PULL = "push", "pull"


@word("load", "cylinder")
@dataclass(frozen=True)
class Cylinder:
    """A cylinder between two points: force = pressure x area of the piston, less that of the rod when it draws.

    Without a pressure it is what is asked for, in force and in pressure.
    """

    cylinder: tuple[str, str] = fields.names("point", "the two points it is pinned to")
    bore: Size = fields.size("length", "diameter of the piston", sign="plus")
    rod: Size | None = fields.size("length", "diameter of the rod; needed if it draws", None, sign="plus")
    pressure: Size | None = fields.size(
        "pressure", "over that around it; left out for the unknown", None, sign="not minus"
    )
    acts: str = fields.choice((PUSH, PULL), "which way the pressure acts", PUSH)
    shortest: Size | None = fields.size("length", "length between its pins fully in", None, sign="plus")
    longest: Size | None = fields.size("length", "length between its pins fully out", None, sign="plus")
    seal_friction: Size | None = fields.size(
        "force", "friction of its seals, against its motion", None, sign="not minus"
    )
    on: tuple[str, str] | None = fields.names("member", "the members they are on, if several carry the points", None)

    asked = "pressure"
    tells = TELLS_FORCE | {ROD_FORCE: "force", "pressure": "pressure"}

    @property
    def ends(self) -> tuple[str, str]:
        return self.cylinder

    def pusher(self, name: str, sketch: Sketch) -> LawPush:
        area = self._area(sketch)
        size = None if self.pressure is None else sketch.value(self.pressure, "pressure") * area
        path = straight(sketch, self.cylinder, self.on)
        shortest, longest = (None if v is None else sketch.value(v, "length") for v in (self.shortest, self.longest))
        can, other = ("push", "draw") if self.acts == PUSH else ("draw", "push")
        wrong = f"asked to {other}, with a pressure below nothing: it can only {can}"
        edges = (*between(path, sketch, shortest, longest, "its"), Limit(wrong, lambda _, strength: strength))
        told = Told("pressure", "pressure", lambda _, strength, __: strength / area)
        sense = 1.0 if self.acts == PUSH else -1.0
        seal = 0.0 if self.seal_friction is None else sketch.value(self.seal_friction, "force")
        return LawPush(name, "cylinder", Steady(size), path, sense, (told,), edges, (_CAUTION,), seal=seal)

    def _area(self, sketch: Sketch) -> Value:
        """[m2] that the pressure acts on. Raises Faults."""
        bore = sketch.value(self.bore, "length")
        rod = None if self.rod is None else sketch.value(self.rod, "length")
        if rod is not None and sure(rod >= bore):
            what = f"{sketch.shown(nominal(rod))}, not thinner than the bore, {sketch.shown(nominal(bore))}"
            raise fault(("rod",), what, "a thinner rod is wanted")
        if self.acts == PUSH:
            return np.pi / 4 * bore**2
        if rod is None:
            raise fault(("rod",), "it is missing", "a cylinder that draws needs the diameter of its rod")
        return np.pi / 4 * (bore**2 - rod**2)


_CAUTION = (
    "stored pressure moves it without warning: let the pressure off and prop what it holds before anybody reaches in"
)
