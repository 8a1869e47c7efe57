"""Pin: two members turn about a point that both carry; it takes force, no moment."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts.contract import TURN, Mark, Poses, Push, Row, Rub, Site, Value, X, Y
from linkcalc.parts.lines import rubless


@dataclass(frozen=True, eq=False)
class PinJoint:
    """The equations of a pin between two members; gap = place on the first less place on the second [m].

    friction_radius  [m] radius of the friction circle: pin radius times the sine of the angle of friction
    """

    name: str
    a: Site
    b: Site
    on_pin: str = ""
    friction_radius: Value = 0.0
    angular = (False, False)
    word = "pin"

    @property
    def members(self) -> tuple[int, int]:
        return self.a.member, self.b.member

    @property
    def site(self) -> Site:
        return self.a

    def gap(self, at: Poses) -> tuple[Value, Value]:
        (ax, ay), (bx, by) = at.spot(self.a), at.spot(self.b)
        return ax - bx, ay - by

    def slope(self, at: Poses) -> tuple[Row, Row]:
        a, b = self.a.member, self.b.member
        (ua, va), (ub, vb) = at.arm(self.a), at.arm(self.b)
        return (
            ((a, X, 1.0), (a, TURN, -va), (b, X, -1.0), (b, TURN, vb)),
            ((a, Y, 1.0), (a, TURN, ua), (b, Y, -1.0), (b, TURN, -ub)),
        )

    def rubs(self) -> tuple[Rub, ...]:
        if rubless(self.friction_radius):
            return ()
        a, b = self.members

        def push(at: Poses) -> tuple[Push, ...]:  # noqa: ARG001
            return (a, 0.0, 0.0, 1.0), (b, 0.0, 0.0, -1.0)

        return (Rub((((1.0, 0.0), (0.0, 1.0)),), self.friction_radius, push),)

    def mark(self, at: Poses) -> Mark:
        x, y = at.spot(self.a)
        return Mark("pin", ((float(x), float(y)),), name=self.name)
