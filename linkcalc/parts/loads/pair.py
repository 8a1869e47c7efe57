"""Pair: two equal and opposite forces between two points, as of a cylinder, a screw or a strut pressed apart."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Mark, Poses, Push, Site, Size, Sketch, Value
from linkcalc.parts.loads.force import LineAim
from linkcalc.words import word


@word("load", "between")
@dataclass(frozen=True)
class Pair:
    """Two forces between two points: plus pushes them apart, minus draws them together."""

    between: tuple[str, str] = fields.names("point", "the two points")
    on: tuple[str, str] | None = fields.names("member", "the members they act on, if several carry the points", None)
    size: Size | None = fields.size("force", "how large; left out for the one unknown", None)

    def pusher(self, name: str, sketch: Sketch) -> PairPush:
        members = self.on or (None, None)
        ends = [sketch.site(p, m) for p, m in zip(self.between, members, strict=True)]
        pins = ["" if m or len(sketch.carriers(p)) < 2 else p for p, m in zip(self.between, members, strict=True)]
        size = None if self.size is None else sketch.value(self.size, "force")
        return PairPush(name, ends[0], ends[1], size, (pins[0], pins[1]))


@dataclass(frozen=True, eq=False)
class PairPush:
    """What a pair does, for 1 N of push apart."""

    name: str
    first: Site
    second: Site
    size: Value | None
    on_pins: tuple[str, str]
    kind = "force"
    word = "pair"

    @property
    def sites(self) -> tuple[Site, ...]:
        return self.first, self.second

    def strength(self, at: Poses) -> Value:  # noqa: ARG002
        assert self.size is not None
        return self.size

    def push(self, at: Poses) -> tuple[Push, ...]:
        fx, fy = LineAim(self.first, self.second, False).direction(at)
        (a0, b0), (a1, b1) = at.arm(self.first), at.arm(self.second)
        return (
            (self.first.member, -fx, -fy, b0 * fx - a0 * fy),
            (self.second.member, fx, fy, a1 * fy - b1 * fx),
        )

    def mark(self, at: Poses) -> Mark:
        (ax, ay), (bx, by) = at.spot(self.first), at.spot(self.second)
        return Mark("pair", ((float(ax), float(ay)), (float(bx), float(by))), name=self.name)
