"""Haul: a pull on the hauling end of a rope; it is the tension of the whole rope."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Hauled, Mark, Poses, Push, Site, Size, Sketch, Value
from linkcalc.words import word


@word("load", "haul")
@dataclass(frozen=True)
class HaulForce:
    """A pull on the hauling end of a rope, as of a hand, a winch or a mass hung there; plus pulls."""

    haul: str = fields.name("rope", "the rope that is pulled")
    size: Size | None = fields.size("force", "how large; left out for the one unknown", None)

    def pusher(self, name: str, sketch: Sketch) -> HaulPush:
        size = None if self.size is None else sketch.value(self.size, "force")
        return HaulPush(name, sketch.hauled(self.haul), size)


@dataclass(frozen=True, eq=False)
class HaulPush:
    """What a pull of 1 N on a rope does wherever the rope acts.

    through  name of the rope, whose contacts tell it
    """

    name: str
    rope: Hauled
    size: Value | None
    kind = "force"
    word = "haul"

    @property
    def through(self) -> str:
        return self.rope.name

    @property
    def on_pins(self) -> tuple[str, ...]:
        return self.rope.pins

    @property
    def sites(self) -> tuple[Site, ...]:
        return self.rope.sites

    def strength(self, at: Poses) -> Value:  # noqa: ARG002
        assert self.size is not None
        return self.size

    def push(self, at: Poses) -> tuple[Push, ...]:
        found = []
        for c in self.rope.contacts(at):
            a, b = at.arm(c.site)
            found.append((c.site.member, c.fx, c.fy, a * c.fy - b * c.fx + c.moment))
        return tuple(found)

    def mark(self, at: Poses) -> Mark:
        return Mark("haul", self.rope.mark(at).line[-1:], name=self.name)
