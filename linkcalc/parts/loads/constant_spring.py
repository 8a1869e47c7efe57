"""Constant-force spring: a strip that draws in with the same pull wherever it is."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch
from linkcalc.parts.law_push import TELLS_FORCE, LawPush, between
from linkcalc.parts.laws.steady import Steady
from linkcalc.parts.paths.straight import straight
from linkcalc.words import word


@word("load", "constant_spring")
@dataclass(frozen=True)
class ConstantSpring:
    """A coiled strip from one point (its drum) to another (its end): draws them together, always alike."""

    constant_spring: tuple[str, str] = fields.names("point", "the drum, and the end of the strip")
    pull: Size = fields.size("force", "how strong it draws", sign="not minus")
    longest: Size | None = fields.size("length", "length it must not be drawn out beyond", None, sign="plus")
    on: tuple[str, str] | None = fields.names("member", "the members they are on, if several carry the points", None)

    tells = TELLS_FORCE

    @property
    def ends(self) -> tuple[str, str]:
        return self.constant_spring

    def pusher(self, name: str, sketch: Sketch) -> LawPush:
        path = straight(sketch, self.constant_spring, self.on)
        longest = None if self.longest is None else sketch.value(self.longest, "length")
        law = Steady(-sketch.value(self.pull, "force"))
        caution = "a strip drawn out runs back and cuts when it is let go: let it in before its end is loosened"
        edges = between(path, sketch, None, longest, "its")
        return LawPush(name, "constant spring", law, path, edges=edges, cautions=(caution,))
