"""Gear: two members in mesh at their pitch circles; a force along the line of action, at the pitch point.

The multiplier is the force along the pitch line. The flanks lean by the pressure angle, so the teeth also push each
other apart, whichever way they drive: that is told as a push that grows with the multiplier (``Rub.always``).
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import TURN, Mark, Poses, Push, Row, Rub, Site, Size, Sketch, Value, X, Y
from linkcalc.parts.teeth import PRESSURE_ANGLE, TEETH, TOUCHING, pitch, slant, wound
from linkcalc.words import word

EXTERNAL, INTERNAL = "external", "internal"


@word("joint", "gear")
@dataclass(frozen=True)
class Gear:
    """Two members in mesh, whole wheels or segments: they roll on each other at their pitch circles."""

    members: tuple[str, str] = fields.names("member", "the two members; the force is told on the first")
    centres: tuple[str, str] = fields.names("point", "centre of the pitch circle of each")
    radii: tuple[Size, Size] = fields.sizes("length", "pitch radius of each", sign="plus")
    mesh: str = fields.choice(
        (EXTERNAL, INTERNAL), "teeth on the outside of both, or on the inside of the larger (a ring)", EXTERNAL
    )
    pressure_angle: Size = fields.size("angle", "pressure angle of the teeth", PRESSURE_ANGLE)

    def joints(self, name: str, sketch: Sketch) -> Iterator[GearJoint]:
        p, q = self.centres
        site, other = (sketch.site(c, m) for c, m in zip(self.centres, self.members, strict=True))
        first, second = self._signed(*(sketch.value(r, "length") for r in self.radii))
        (ax, ay), (bx, by) = (sketch.point(c) for c in self.centres)
        self._check_touching(sketch, np.hypot(bx - ax, by - ay), np.abs(first + second))
        common = (m for m in sketch.carriers(self.centres[0]) if m in sketch.carriers(self.centres[1]))
        carrier = min(common, key=sketch.member, default=None)
        carried = None if carrier is None else (sketch.site(p, carrier), sketch.site(q, carrier))
        # without a carrier guesses of places tell where the line of centres is: too far off to count teeth by them
        grain = pitch((first, second), TEETH if carried else 1)
        lean = slant(sketch, self.pressure_angle)
        yield GearJoint(name, site, other, (first, second), (bx - ax, by - ay), lean, grain, carried)

    def _signed(self, first: Value, second: Value) -> tuple[Value, Value]:
        """Both radii, that of a ring minus."""
        if self.mesh == EXTERNAL:
            return first, second
        ring = np.where(np.less(first, second), 1.0, -1.0)
        if np.ndim(ring) == 0:
            return first * float(ring), second * -float(ring)
        return first * ring, second * -ring

    def _check_touching(self, sketch: Sketch, apart: Value, wanted: Value) -> None:
        """Looked at with the mechanism's own sizes."""
        if np.ndim(apart) or np.ndim(wanted):
            return
        if float(wanted) == 0.0:
            raise fault(("radii",), "a ring and a gear of one size cannot mesh", "a larger ring is wanted")
        if abs(float(apart - wanted)) > TOUCHING * float(wanted):
            rule = "sum" if self.mesh == EXTERNAL else "difference"
            what = f"the gears do not touch: {' and '.join(self.centres)} are drawn {sketch.shown(float(apart))} apart"
            raise fault(("centres",), what, f"{sketch.shown(float(wanted))} is wanted, the {rule} of the pitch radii")


@dataclass(frozen=True, eq=False)
class GearJoint:
    """The equation of gears in mesh; gap = rolled off the one less rolled on the other since the drawing [m].

    radii    [m] pitch radii, that of a ring minus
    drawn    [m] from the first centre to the second in the drawing pose
    slant    [-] tangent of the pressure angle
    grain    [m] the gap is known but for multiples of this
    carried  both centres as a third member carries them, whose pins keep their distance; None if there is none
    """

    name: str
    site: Site
    other: Site
    radii: tuple[Value, Value]
    drawn: tuple[Value, Value]
    slant: Value
    grain: Value
    carried: tuple[Site, Site] | None = None
    on_pin: str = ""
    angular = (False,)
    word = "gear"

    @property
    def members(self) -> tuple[int, int]:
        return self.site.member, self.other.member

    @property
    def _span(self) -> Value:
        """[m] distance of the centres as the radii want it; minus in a ring."""
        return self.radii[0] + self.radii[1]

    def _apart(self, at: Poses) -> tuple[Value, Value]:
        (ax, ay), (bx, by) = at.spot(self.site), at.spot(self.other)
        return bx - ax, by - ay

    def _line_of_centres(self, at: Poses) -> tuple[Value, Value]:
        """[m] from the first centre to the second, by the turn of the member that carries both if one does."""
        if self.carried is None:
            return self._apart(at)
        (ax, ay), (bx, by) = (at.arm(site) for site in self.carried)
        return bx - ax, by - ay

    def gap(self, at: Poses) -> tuple[Value]:
        dx, dy = self._line_of_centres(at)
        (ux, uy), (a, b) = self.drawn, self.members
        c, s = dx * ux + dy * uy, ux * dy - uy * dx  # of the turn of the line of centres, times a length squared
        with np.errstate(all="ignore"):
            first, second = (np.arctan2(at.s[m] * c - at.c[m] * s, at.c[m] * c + at.s[m] * s) for m in (a, b))
            gap = wound(self.radii[0] * first + self.radii[1] * second, self.grain)
            if self.carried is not None:
                # nothing where the pins of the carrier hold. Before they do this makes the turns go by turns alone:
                # guesses of places are far off, and would lead to another tooth
                px, py = self._apart(at)
                gap = gap - self._span / (dx * dx + dy * dy) * (dx * py - dy * px)
        return (gap,)

    def slope(self, at: Poses) -> tuple[Row]:
        a, b = self.members
        (ua, va), (ub, vb), (dx, dy) = at.arm(self.site), at.arm(self.other), self._line_of_centres(at)
        with np.errstate(all="ignore"):
            part = self._span / (dx * dx + dy * dy)
            fx, fy = -part * dy, part * dx
        return ((
            (a, X, fx), (a, Y, fy), (a, TURN, ua * fy - va * fx + self.radii[0]),
            (b, X, -fx), (b, Y, -fy), (b, TURN, vb * fx - ub * fy + self.radii[1]),
        ),)  # fmt: skip

    def place(self, at: Poses) -> tuple[Value, Value]:
        """[m] the pitch point: where the two move alike."""
        (x, y), (dx, dy) = at.spot(self.site), self._line_of_centres(at)
        part = self.radii[0] / self._span
        return x + part * dx, y + part * dy

    def astray(self, at: Poses) -> Value:
        """[m] how much farther apart the centres are than as drawn."""
        apart: Value = np.hypot(*self._apart(at)) - np.hypot(*self.drawn)
        return apart

    def rubs(self) -> tuple[Rub, ...]:
        return (Rub((((1.0,),),), self.slant, self._push_apart, always=True),)

    def _push_apart(self, at: Poses) -> tuple[Push, ...]:
        """A force along the line of centres on each gear, away from the teeth of the other."""
        a, b = self.members
        (ua, va), (ub, vb), (dx, dy) = at.arm(self.site), at.arm(self.other), self._line_of_centres(at)
        with np.errstate(all="ignore"):
            part = self._span / (dx * dx + dy * dy)
            fx, fy = -part * dx, -part * dy
        return (a, fx, fy, ua * fy - va * fx), (b, -fx, -fy, vb * fx - ub * fy)

    def mark(self, at: Poses) -> Mark:
        spots = [at.spot(site) for site in (self.site, self.other)]
        (ax, ay), (bx, by) = ((float(x), float(y)) for x, y in spots)
        x, y = self.place(at)
        first, second = (abs(float(r)) for r in self.radii)
        return Mark("gear", ((float(x), float(y)),), name=self.name, line=((ax, ay), (bx, by)),
                    rounds=((ax, ay, first), (bx, by, second)))  # fmt: skip
