"""Pin: two members turn about a point that both carry; it takes force, no moment."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts.contract import TURN, Give, Mark, Poses, Push, Row, Rub, Site, Value, X, Y
from linkcalc.parts.gives import Elastic
from linkcalc.parts.lines import rubless


@dataclass(frozen=True, eq=False)
class PinJoint:
    """The equations of a pin between two members; gap = place on the first less place on the second [m].

    friction_radius  [m] radius of the friction circle: pin radius times the sine of the angle of friction
    stiffness        [N/m] of pin and bush, alike in all directions; None: they do not give
    share            [N/m] the same of one that does not give, but shares its force with other joints by it
    """

    name: str
    a: Site
    b: Site
    on_pin: str = ""
    friction_radius: Value = 0.0
    stiffness: Value | None = None
    share: Value | None = None
    angular = (False, False)
    word = "pin"

    @property
    def gives(self) -> tuple[Give | None, Give | None]:
        law = None if self.stiffness is None else Elastic(self.stiffness)
        return law, law

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


@dataclass(frozen=True, eq=False)
class StretchJoint(PinJoint):
    """A pin at the end of a link that stretches: along the link it gives as the link does, across it holds.

    link   the elastic member, one of the two
    tx, ty direction of the link in its own frame
    """

    link: int = 0
    tx: Value = 1.0
    ty: Value = 0.0

    @property
    def site(self) -> Site:
        """The end that the link reaches for."""
        return self.b if self.link == self.a.member else self.a

    @property
    def gives(self) -> tuple[Give | None, Give | None]:
        assert self.stiffness is not None
        return Elastic(self.stiffness), None

    def _axes(self, at: Poses) -> tuple[tuple[Value, Value], tuple[Value, Value]]:
        """Along the link and to the left of it."""
        tx, ty = at.turned(self.link, self.tx, self.ty)
        return (tx, ty), (-ty, tx)

    def gap(self, at: Poses) -> tuple[Value, Value]:
        dx, dy = PinJoint.gap(self, at)
        along, across = (nx * dx + ny * dy for nx, ny in self._axes(at))
        return along, across

    def slope(self, at: Poses) -> tuple[Row, Row]:
        a, b = self.a.member, self.b.member
        (ua, va), (ub, vb) = at.arm(self.a), at.arm(self.b)
        dx, dy = PinJoint.gap(self, at)
        along, across = (
            (
                (a, X, nx), (a, Y, ny), (a, TURN, ua * ny - va * nx),
                (b, X, -nx), (b, Y, -ny), (b, TURN, vb * nx - ub * ny),
                (self.link, TURN, nx * dy - ny * dx),  # the direction turns with the link
            )
            for nx, ny in self._axes(at)
        )  # fmt: skip
        return along, across
