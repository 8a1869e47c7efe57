"""Gas spring: a rod that gas under pressure presses out of its tube."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch, Value
from linkcalc.parts.law_push import ROD_FORCE, TELLS_FORCE, LawPush, between, nominal, sure
from linkcalc.parts.laws.gas import Gas, taken_by_rise
from linkcalc.parts.paths.straight import straight
from linkcalc.words import word


@word("load", "gas_spring")
@dataclass(frozen=True)
class GasSpring:
    """A gas spring between two points: pushes them apart, the harder the deeper the rod is in and the warmer it is.

    The force is that of the gas alone, midway between those measured on the way in and on the way out; half their
    difference is the friction of its seals.
    """

    gas_spring: tuple[str, str] = fields.names("point", "the two points it is pinned to")
    force: Size = fields.size("force", "force fully extended", sign="plus")
    length: Size = fields.size("length", "length fully extended, between its pins", sign="plus")
    stroke: Size = fields.size("length", "how far the rod goes in", sign="plus")
    rise: Size | None = fields.size("number", "force fully in over force fully extended", None, sign="plus")
    volume: Size | None = fields.size("volume", "of the gas fully extended, in place of 'rise'", None, sign="plus")
    rod: Size | None = fields.size("length", "diameter of the rod; goes with 'volume'", None, sign="plus")
    exponent: Size = fields.size("number", "of the gas law: 1 moved slowly, up to 1.4 moved fast", 1, sign="plus")
    temperature: Size = fields.size("temperature", "at which its force is told", "20 degC")
    seal_friction: Size | None = fields.size(
        "force", "friction of its seals, against its motion", None, sign="not minus"
    )
    on: tuple[str, str] | None = fields.names("member", "the members they are on, if several carry the points", None)

    one_of = ("rise", "volume")
    tells = TELLS_FORCE | {ROD_FORCE: "force"}

    @property
    def ends(self) -> tuple[str, str]:
        return self.gas_spring

    def pusher(self, name: str, sketch: Sketch) -> LawPush:
        longest, stroke = sketch.value(self.length, "length"), sketch.value(self.stroke, "length")
        if sure(stroke >= longest):
            what = f"{sketch.shown(nominal(stroke))}, not less than its length, {sketch.shown(nominal(longest))}"
            raise fault(("stroke",), what, "less is wanted: rod and tube keep their length")
        exponent = sketch.value(self.exponent, "number")
        taken = self._taken(stroke, exponent, sketch)
        law = Gas(sketch.value(self.force, "force"), longest, stroke, taken, exponent)
        path = straight(sketch, self.gas_spring, self.on)
        edges = between(path, sketch, longest - stroke, longest, "its")
        warm = nominal(sketch.value(self.temperature, "temperature"))
        seal = 0.0 if self.seal_friction is None else sketch.value(self.seal_friction, "force")
        return LawPush(name, "gas spring", law, path, edges=edges, cautions=(_CAUTION,), temperature=warm, seal=seal)

    def _taken(self, stroke: Value, exponent: Value, sketch: Sketch) -> Value:
        """[1/m] part of the volume that each length of rod takes. Raises Faults."""
        if self.rise is not None:
            if self.rod is not None:
                raise fault(("rod",), "it goes with 'volume' only", "leave it out: 'rise' tells all of the gas")
            rise = sketch.value(self.rise, "number")
            if sure(rise < 1):
                raise fault(
                    ("rise",), f"{nominal(rise):g} cannot stand here", "1 or more is wanted, usually 1.2 to 1.4"
                )
            return taken_by_rise(rise, stroke, exponent)
        assert self.volume is not None  # one of the two is there
        if self.rod is None:
            raise fault(("rod",), "it is missing", "the diameter of the rod is wanted beside 'volume'")
        taken: Value = np.pi / 4 * sketch.value(self.rod, "length") ** 2 / sketch.value(self.volume, "volume")
        if sure(taken * stroke >= 1):
            raise fault(("volume",), "the rod fully in takes more room than there is", "a larger volume is wanted")
        return taken


_CAUTION = (
    "gas under high pressure, extended or not: never open, drill or heat it; prop what it holds before a pin is drawn"
)
