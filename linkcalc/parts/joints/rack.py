"""Rack: a pinion of one member that rolls along a toothed line of another; a force along the line of action.

As of gears, the multiplier is the force along the pitch line, and the teeth push each other apart besides.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Mark, Poses, Push, Row, Rub, Site, Size, Sketch, Value, X, Y
from linkcalc.parts.lines import Guide, guide
from linkcalc.parts.teeth import PRESSURE_ANGLE, TOUCHING, slant, wound
from linkcalc.words import word


@word("joint", "rack")
@dataclass(frozen=True)
class Rack:
    """A pinion that rolls along the pitch line of a rack."""

    pinion: str = fields.name("member", "the member that has the pinion, or a segment of it")
    centre: str = fields.name("point", "its centre")
    radius: Size = fields.size("length", "its pitch radius", sign="plus")
    along: tuple[str, str] = fields.names("point", "the pitch line of the rack: two points")
    on: str = fields.name("member", "the member that has the rack", "ground")
    pressure_angle: Size = fields.size("angle", "pressure angle of the teeth", PRESSURE_ANGLE)

    def joints(self, name: str, sketch: Sketch) -> Iterator[RackJoint]:
        line = guide(sketch, self.along, self.on, self.centre)
        (px, py), (qx, qy) = sketch.point(self.centre), sketch.point(self.along[0])
        radius = sketch.value(self.radius, "length")
        off = line.tx * (py - qy) - line.ty * (px - qx)
        if np.ndim(off) == 0 and np.ndim(radius) == 0:
            self._check_touching(sketch, abs(float(off)), float(radius))
        left: Value = radius * np.sign(off)
        begin = line.tx * (px - qx) + line.ty * (py - qy)
        yield RackJoint(name, sketch.site(self.centre, self.pinion), line, left, begin, off,
                        slant(sketch, self.pressure_angle))  # fmt: skip

    def _check_touching(self, sketch: Sketch, off: float, radius: float) -> None:
        """Looked at with the mechanism's own sizes."""
        if abs(off - radius) > TOUCHING * radius:
            what = f"the pinion does not touch the rack: {self.centre} is drawn {sketch.shown(off)} from it"
            raise fault(("centre",), what, f"{sketch.shown(radius)} is wanted, the pitch radius")


@dataclass(frozen=True, eq=False)
class RackJoint:
    """The equation of rack and pinion; gap = way along the rack less what the pinion rolled since the drawing [m].

    left   [m] pitch radius; minus where the pinion is to the right of the line
    begin  [m] how far along the line the centre is drawn
    off    [m] how far to the left of the line
    slant  [-] tangent of the pressure angle
    """

    name: str
    site: Site
    line: Guide
    left: Value
    begin: Value
    off: Value
    slant: Value
    on_pin: str = ""
    angular = (False,)
    word = "rack"

    @property
    def members(self) -> tuple[int, int]:
        return self.site.member, self.line.member

    @property
    def grain(self) -> Value:
        """[m] the gap is known but for multiples of this: one turn of the pinion."""
        around: Value = 2 * np.pi * np.abs(self.left)
        return around

    def _from_start(self, at: Poses) -> tuple[Value, Value, Value, Value]:
        """From the start of the line to the centre, and the direction of the line."""
        (px, py), (qx, qy) = at.spot(self.site), at.spot(self.line.start)
        return px - qx, py - qy, *at.turned(self.line.member, self.line.tx, self.line.ty)

    def gap(self, at: Poses) -> tuple[Value]:
        a, b = self.members
        dx, dy, tx, ty = self._from_start(at)
        turn = np.arctan2(at.s[a] * at.c[b] - at.c[a] * at.s[b], at.c[a] * at.c[b] + at.s[a] * at.s[b])
        return (wound(tx * dx + ty * dy - self.begin + self.left * turn, self.grain),)

    def slope(self, at: Poses) -> tuple[Row]:
        _, _, tx, ty = self._from_start(at)
        (a, ax, ay, at_a), (b, bx, by, at_b) = self._pushes(at, tx, ty)
        return ((
            (a, X, ax), (a, Y, ay), (a, TURN, at_a + self.left),
            (b, X, bx), (b, Y, by), (b, TURN, at_b - self.left),
        ),)  # fmt: skip

    def place(self, at: Poses) -> tuple[Value, Value]:
        """[m] the pitch point: where the two move alike."""
        (x, y), (_, _, tx, ty) = at.spot(self.site), self._from_start(at)
        return x + self.left * ty, y - self.left * tx

    def astray(self, at: Poses) -> Value:
        """[m] how much farther from the rack the centre is than as drawn."""
        dx, dy, tx, ty = self._from_start(at)
        farther: Value = np.sign(self.left) * (tx * dy - ty * dx - self.off)
        return farther

    def rubs(self) -> tuple[Rub, ...]:
        return (Rub((((1.0,),),), self.slant, self._push_apart, always=True),)

    def _push_apart(self, at: Poses) -> tuple[Push, ...]:
        """A force square to the rack on the pinion, away from it, and back on the rack."""
        _, _, tx, ty = self._from_start(at)
        side = np.sign(self.left)
        return self._pushes(at, -side * ty, side * tx)

    def _pushes(self, at: Poses, fx: Value, fy: Value) -> tuple[Push, Push]:
        """A force at the centre on the pinion, and back on the rack at the same place."""
        a, b = self.members
        (ua, va), (px, py) = at.arm(self.site), at.spot(self.site)
        ub, vb = px - at.x[b], py - at.y[b]
        return (a, fx, fy, ua * fy - va * fx), (b, -fx, -fy, vb * fx - ub * fy)

    def mark(self, at: Poses) -> Mark:
        (cx, cy), (x, y), (_, _, tx, ty) = at.spot(self.site), self.place(at), self._from_start(at)
        (x, y), (u, v), radius = (float(x), float(y)), (float(tx), float(ty)), abs(float(self.left))
        line = tuple((x + k * radius * u, y + k * radius * v) for k in (-1.5, 1.5))
        return Mark("rack", ((x, y),), (u, v), self.name, line, ((float(cx), float(cy), radius),))
