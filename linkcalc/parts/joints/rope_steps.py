"""The steps of a rope's way: ends made fast, pulleys and posts, drums."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch, Value
from linkcalc.parts.law_push import nominal, sure
from linkcalc.parts.lines import rubless
from linkcalc.parts.paths.drag_at import ByEfficiency, Loss, OnPin, OverPost
from linkcalc.words import word

_SIDES = {"left": -1.0, "right": 1.0}
_WRAP = "the side of the centre on which the rope passes, looking along the path"


@word("rope step", "point")
@dataclass(frozen=True)
class Anchor:
    """An end that is made fast at a point."""

    point: str = fields.name("point", "the point it is made fast to; where several members meet the pin itself")
    on: str | None = fields.name("member", "the member that takes the pull, if several carry the point", None)

    short = "point"
    radius = 0.0
    side = 1.0
    fixed = False


@word("rope step", "pulley")
@dataclass(frozen=True)
class Pulley:
    """A pulley that turns about a point, or a post that does not. It has at most one kind of friction: an efficiency, a
    pin that rubs, or a rope that slides over it."""

    pulley: str = fields.name("point", "its centre; where several members meet it sits on the pin itself")
    radius: Size = fields.size("length", "to the middle of the rope", sign="not minus")
    wrap: str = fields.choice(tuple(_SIDES), _WRAP)
    on: str | None = fields.name("member", "the member that takes the pull, if several carry the point", None)
    efficiency: Size | None = fields.size(
        "number",
        "tension on the running-on side over that on the running-off side",
        None,
        sign="part",
        sensible=(0.5, 1),
    )
    friction: Size | None = fields.friction("of rope on pulley, which does not turn: a post or a band brake")
    turns: Size = fields.size(
        "number", "whole turns round a post beside what is drawn; with 'friction'", 0, sign="not minus"
    )
    friction_radius: Size | None = fields.size("length", "radius of its pin's friction circle", None, sign="not minus")
    pin_friction: Size | None = fields.friction("of its pin; with 'pin_diameter'")
    pin_diameter: Size | None = fields.size("length", "diameter of its pin", None, sign="plus")

    fixed = False
    losses = ("efficiency", "friction", "friction_radius", "pin_friction")

    @property
    def point(self) -> str:
        return self.pulley

    @property
    def side(self) -> float:
        return _SIDES[self.wrap]

    def loss(self, sketch: Sketch) -> Loss | None:
        """What the rope loses on it; None if nothing. Raises Faults."""
        if self.friction is not None:
            friction = sketch.value(self.friction, "number")
            return None if rubless(friction) else OverPost(friction, sketch.value(self.turns, "number"))
        if self.friction_radius is not None:
            return self._on_pin(sketch, sketch.value(self.friction_radius, "length"), "friction_radius")
        if self.pin_friction is not None:
            mu = sketch.value(self.pin_friction, "number")
            assert self.pin_diameter is not None  # looked at before
            pin = sketch.value(self.pin_diameter, "length") / 2
            return self._on_pin(sketch, pin * mu / np.hypot(1.0, mu), "pin_diameter")
        efficiency = sketch.sheave_efficiency() if self.efficiency is None else sketch.value(self.efficiency, "number")
        return None if isinstance(efficiency, float) and efficiency == 1.0 else ByEfficiency(efficiency)

    def _on_pin(self, sketch: Sketch, circle: Value, key: str) -> Loss | None:
        radius = sketch.value(self.radius, "length")
        if sure(np.greater_equal(circle, radius)):
            what = f"the pin's friction circle of {sketch.shown(nominal(circle))} is no smaller than the pulley"
            raise fault((key,), what, f"less than its radius of {sketch.shown(nominal(radius))} is wanted")
        return None if rubless(circle) else OnPin(radius, circle)


@word("rope step", "drum")
@dataclass(frozen=True)
class Drum:
    """An end that winds on a drum or sector fixed to a member, within half a turn of the drawing pose."""

    drum: str = fields.name("point", "its centre")
    radius: Size = fields.size("length", "to the middle of the rope", sign="plus")
    wrap: str = fields.choice(tuple(_SIDES), _WRAP)
    on: str | None = fields.name("member", "the member that the drum is part of, if several carry the point", None)

    fixed = True

    @property
    def point(self) -> str:
        return self.drum

    @property
    def side(self) -> float:
        return _SIDES[self.wrap]
