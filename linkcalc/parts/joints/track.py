"""Track: a point of one member guided along a curved line of another: an arc, or a smooth curve (cam track).

The force is square to the line and nothing else, as in a slot.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Entry, Mark, Poses, Push, Row, Rub, Site, Size, Sketch, Value, X, Y
from linkcalc.parts.lines import rubless
from linkcalc.parts.paths.curves import Arc, Foot, Smooth, arc_through, smooth_through
from linkcalc.parts.shoes import WHOLE, Shoe, allowed_field, length_field, shoe, width_field
from linkcalc.parts.stiff import stiff, stiffness_field
from linkcalc.words import word

_FLAT = 1e-9


@word("joint", "track")
@dataclass(frozen=True)
class Track:
    """A point of one member guided along a curve of another, free to turn: force square to the curve only."""

    point: str = fields.name("point", "the point that is guided")
    arc: tuple[str, ...] | None = fields.names(
        "point", "three points: the arc from the first through the second to the third", None, least=3, most=3
    )
    through: tuple[str, ...] | None = fields.names(
        "point", "three or more points: the smooth curve through them in order", None, least=3, most=None
    )
    on: str = fields.name("member", "the member that has the track", "ground")
    of: str | None = fields.name("member", "the member that the point belongs to, if several carry it", None)
    friction: Size | None = fields.friction("if not the one for all slots")
    length: Size | None = length_field()
    width: Size | None = width_field()
    allowed_pressure: Size | None = allowed_field()
    stiffness: Size | None = stiffness_field()

    one_of = ("arc", "through")
    goes_with = (("length", ("width",)), *WHOLE)

    def joints(self, name: str, sketch: Sketch) -> Iterator[TrackJoint]:
        alone = self.of is not None or len(sketch.carriers(self.point)) < 2
        sites = [sketch.site(p, self.on) for p in (self.arc or self.through or ())]
        places = [(s.u, s.v) for s in sites]
        curve: Arc | Smooth
        if self.arc:
            self._check_bent(sketch)
            curve = arc_through(places)
        else:
            curve = smooth_through(places)
        base = Site(sketch.member(self.on), 0.0, 0.0)
        mu = sketch.coefficient("slots", self.friction)
        yield TrackJoint(
            name, sketch.site(self.point, self.of), base, curve, "" if alone else self.point, mu,
            shoe=shoe(self, sketch), **stiff(self, sketch),
        )  # fmt: skip

    def _check_bent(self, sketch: Sketch) -> None:
        (ax, ay), (bx, by), (cx, cy) = (sketch.point(p) for p in self.arc or ())
        cross = (bx - ax) * (cy - ay) - (by - ay) * (cx - ax)
        if np.ndim(cross) == 0 and abs(float(cross)) <= _FLAT * sketch.size**2:
            names = ", ".join(self.arc or ())
            raise fault(("arc",), f"{names} stand in line", "an arc is wanted, or a slot along a straight line")


@dataclass(frozen=True, eq=False)
class TrackJoint:
    """The equation of a track; gap = how far the point stands to the left of the curve [m].

    base  the origin of the member that has the curve
    """

    name: str
    site: Site
    base: Site
    curve: Arc | Smooth
    on_pin: str = ""
    friction: Value = 0.0
    shoe: Shoe | None = None
    share: Value | None = None
    angular = (False,)
    word = "track"

    @property
    def members(self) -> tuple[int, int]:
        return self.site.member, self.base.member

    @property
    def span(self) -> Value:
        """[m] the length of the curve, from its first point to its last."""
        return self.curve.length

    def _foot(self, at: Poses) -> Foot:
        b = self.base.member
        (px, py), c, s = at.spot(self.site), at.c[b], at.s[b]
        dx, dy = px - at.x[b], py - at.y[b]
        with np.errstate(all="ignore"):
            return self.curve.foot(c * dx + s * dy, c * dy - s * dx)

    def gap(self, at: Poses) -> tuple[Value]:
        return (self._foot(at).left,)

    def slope(self, at: Poses) -> tuple[Row]:
        foot = self._foot(at)
        return (self._row(at, *at.turned(self.base.member, foot.nx, foot.ny)),)

    def travel(self, at: Poses) -> Value:
        with np.errstate(all="ignore"):
            return self.curve.along(self._foot(at))

    def travel_slope(self, at: Poses) -> Row:
        foot = self._foot(at)
        return self._row(at, *at.turned(self.base.member, foot.rate * foot.ny, -foot.rate * foot.nx))

    def rubs(self) -> tuple[Rub, ...]:
        if rubless(self.friction):
            return ()
        return (Rub((((1.0,),),), self.friction, self._along_line),)

    def _along_line(self, at: Poses) -> tuple[Push, ...]:
        """A force along the curve on the guided point, and back on the member of the track at the same place."""
        foot = self._foot(at)
        row = self._row(at, *at.turned(self.base.member, foot.ny, -foot.nx))
        (a, _, ax), (_, _, ay), (_, _, at_a), (b, _, bx), (_, _, by), (_, _, at_b) = row
        return (a, ax, ay, at_a), (b, bx, by, at_b)

    def _row(self, at: Poses, nx: Value, ny: Value) -> tuple[Entry, Entry, Entry, Entry, Entry, Entry]:
        """Derivative where only the place of the point in the frame of the track counts."""
        a, b = self.members
        (ua, va), (px, py) = at.arm(self.site), at.spot(self.site)
        ub, vb = px - at.x[b], py - at.y[b]
        return (
            (a, X, nx), (a, Y, ny), (a, TURN, ua * ny - va * nx),
            (b, X, -nx), (b, Y, -ny), (b, TURN, vb * nx - ub * ny),
        )  # fmt: skip

    def mark(self, at: Poses) -> Mark:
        foot, b = self._foot(at), self.base.member
        x, y = at.spot(self.site)
        tx, ty = at.turned(b, float(foot.ny), -float(foot.nx))
        turned = [at.turned(b, u, v) for u, v in self.curve.places()]
        line = tuple((float(at.x[b] + u), float(at.y[b] + v)) for u, v in turned)
        return Mark("track", ((float(x), float(y)),), (float(tx), float(ty)), self.name, line)
