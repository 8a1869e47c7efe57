"""Weight: a mass carried at a point; gravity does the pushing, so a case that turns gravity turns it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts import fields
from linkcalc.parts.contract import Mark, Poses, Push, Site, Size, Sketch, Spread, Value
from linkcalc.words import word


@word("load", "mass_at")
@dataclass(frozen=True)
class Weight:
    """A mass carried at a point, or hung on a pin itself."""

    mass_at: str = fields.name("point", "the point that carries it; where several members meet the pin itself")
    mass: Size = fields.size("mass", "how much", sign="not minus")
    on: str | None = fields.name("member", "the member it acts on, if several carry the point", None)

    def pusher(self, name: str, sketch: Sketch) -> WeightPush:
        alone = self.on is not None or len(sketch.carriers(self.mass_at)) < 2
        pin = "" if alone else self.mass_at
        return WeightPush(name, sketch.site(self.mass_at, self.on), sketch.value(self.mass, "mass"), (pin,))


@dataclass(frozen=True, eq=False)
class WeightPush:
    """What a weight does, for 1 N; its size is the mass [kg], its strength mass times the field of gravity.

    lines  straight lines that the mass is spread along evenly, each by its ends; empty for one at a point
    """

    name: str
    site: Site
    size: Value
    on_pins: tuple[str] = ("",)
    lines: tuple[tuple[Site, Site], ...] = ()
    kind = "force"
    word = "weight"

    @property
    def sites(self) -> tuple[Site, ...]:
        return (self.site,)

    @property
    def spread(self) -> tuple[Spread | None, ...]:
        return (Spread(self.lines) if self.lines else None,)

    def strength(self, at: Poses) -> Value:
        return self.size * at.field

    def push(self, at: Poses) -> tuple[Push, ...]:
        dx, dy = at.down
        a, b = at.arm(self.site)
        return ((self.site.member, dx, dy, a * dy - b * dx),)

    def mark(self, at: Poses) -> Mark:
        x, y = at.spot(self.site)
        dx, dy = (float(np.ravel(d)[0]) for d in at.down)  # as the first case has it
        return Mark("weight", ((float(x), float(y)),), (dx, dy), self.name)
