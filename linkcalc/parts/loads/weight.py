"""Weight: a mass carried at a point; gravity does the pushing, so a case that turns gravity turns it."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Mark, Poses, Push, Site, Size, Sketch, Value
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
    """What a weight does, for 1 kg; its size is the mass [kg]."""

    name: str
    site: Site
    size: Value | None
    on_pins: tuple[str] = ("",)
    kind = "mass"
    word = "weight"

    def push(self, at: Poses) -> tuple[Push, ...]:
        gx, gy = at.gravity
        a, b = at.arm(self.site)
        return ((self.site.member, gx, gy, a * gy - b * gx),)

    def mark(self, at: Poses) -> Mark:
        x, y = at.spot(self.site)
        gx, gy = (float(g) if isinstance(g, float) else float(g.flat[0]) for g in at.gravity)
        return Mark("weight", ((float(x), float(y)),), (gx, gy), self.name)
