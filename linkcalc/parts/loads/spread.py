"""Load spread along a line of a member: evenly, or rising from one end to the other (snow, wind, a bed of goods)."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Mark, Poses, Push, Site, Size, Sketch, Spread, Value
from linkcalc.parts.lines import exact
from linkcalc.words import word

LENGTH, PROJECTION = "length", "projection"


@word("load", "spread")
@dataclass(frozen=True)
class SpreadForce:
    """A load spread along a line of a member, so much for each length of it."""

    spread: tuple[str, str] = fields.names(
        "point", "the line it is spread along, from the first of these to the second"
    )
    intensity: Size = fields.size("line load", "force for each length, all along or at the first point")
    intensity_end: Size | None = fields.size("line load", "that at the second point, if it is another there", None)
    direction: Size | None = fields.size(
        "angle", "where it points, from the x axis; else square to the line, a quarter turn counter-clockwise", None
    )
    turns_with: str | None = fields.name("member", "the member that the direction turns with; as drawn", None)
    per: str = fields.choice(
        (LENGTH, PROJECTION), "of the line itself, or of the line as seen along the direction (snow by plan)", LENGTH
    )
    on: str | None = fields.name("member", "the member that carries both points, if several do", None)

    @property
    def way(self) -> tuple[str, str]:
        return self.spread

    def pusher(self, name: str, sketch: Sketch) -> SpreadPush:
        first, last = self.spread
        member = self.on or next(m for m in sketch.carriers(first) if m in sketch.carriers(last))
        start, end = sketch.site(first, member), sketch.site(last, member)
        du, dv = end.u - start.u, end.v - start.v
        span = np.hypot(du, dv)
        q0 = sketch.value(self.intensity, "line load")
        q1 = q0 if self.intensity_end is None else sketch.value(self.intensity_end, "line load")
        both = np.ravel(q0 + q1)
        if not both.any() or np.any(np.abs(both) <= 1e-9 * np.ravel(np.abs(q0) + np.abs(q1))):
            wanted = "an intensity is wanted; two loads, if one end is pushed and the other pulled"
            raise fault(("intensity",), "it comes to nothing over its length", wanted)
        part = (q0 + 2 * q1) / (3 * (q0 + q1))
        centre = Site(start.member, start.u + part * du, start.v + part * dv)
        aim = (sketch.member(member), -dv / span, du / span)
        if self.direction is not None:
            angle = sketch.value(self.direction, "angle")
            turns = sketch.member(self.turns_with) if self.turns_with else 0
            aim = (turns, exact(np.cos(angle)), exact(np.sin(angle)))
        seen = self.per == PROJECTION
        return SpreadPush(name, start, end, centre, q0, q1, span, aim, (du / span, dv / span) if seen else None)


@dataclass(frozen=True, eq=False)
class SpreadPush:
    """What a spread load does, for a total of 1 N: that of its resultant, which acts at the middle of its area.

    site     where the resultant acts: (q0 + 2 q1)/(3 (q0 + q1)) of the way from start to end
    q0, q1   [N/m] intensity at both ends
    span     [m] length of the line
    aim      member it turns with, and direction in its frame
    line     direction of the line in the member's frame, if it counts as seen along the direction; None: it does not
    """

    name: str
    start: Site
    end: Site
    site: Site
    q0: Value
    q1: Value
    span: Value
    aim: tuple[int, Value, Value]
    line: tuple[Value, Value] | None
    on_pins: tuple[str] = ("",)
    kind = "force"
    word = "spread"

    @property
    def size(self) -> Value:
        """[N] the total, as along the line itself."""
        return (self.q0 + self.q1) / 2 * self.span

    def _direction(self, at: Poses) -> tuple[Value, Value]:
        member, u, v = self.aim
        return at.turned(member, u, v) if member else (u, v)

    def strength(self, at: Poses) -> Value:
        if self.line is None:
            return self.size
        (tx, ty), (dx, dy) = at.turned(self.start.member, *self.line), self._direction(at)
        return self.size * np.abs(tx * dy - ty * dx)

    def push(self, at: Poses) -> tuple[Push, ...]:
        fx, fy = self._direction(at)
        a, b = at.arm(self.site)
        return ((self.site.member, fx, fy, a * fy - b * fx),)

    @property
    def sites(self) -> tuple[Site, ...]:
        return (self.site,)

    @property
    def spread(self) -> tuple[Spread]:
        first, last = (float(np.ravel(2 * q / (self.q0 + self.q1))[0]) for q in (self.q0, self.q1))
        return (Spread(((self.start, self.end),), (first, last)),)

    def mark(self, at: Poses) -> Mark:
        spots = tuple((float(x), float(y)) for x, y in map(at.spot, (self.site, self.start, self.end)))
        fx, fy = self._direction(at)
        return Mark("spread", spots, (float(fx), float(fy)), self.name)
