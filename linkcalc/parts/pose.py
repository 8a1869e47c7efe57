"""Where the members are: position and turn of each, and the points they carry.

A member's frame has its origin at the member's first point and is parallel to the ground axes in the drawing
pose, so the turn is zero there. Numbers are Python floats where they never change (the ground, exact zeros)
and arrays ``(case, variant, pose)`` where they do; that difference is what constant folding lives on.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING, Any

import numpy as np

if TYPE_CHECKING:
    from numpy.typing import NDArray

    Array = NDArray[np.float64]
    Mask = NDArray[np.bool_]
    Numbers = NDArray[np.intp]
    Codes = NDArray[np.int8]
else:  # numpy.typing takes longer to load than a stroke to solve
    Array = Mask = Numbers = Codes = np.ndarray

Value = float | Array
X, Y, TURN = 0, 1, 2


@dataclass(frozen=True, eq=False)
class Site:
    """A point as one member carries it.

    member  index of the member, 0 is the ground
    u, v    [m] place in the member's own frame, float or (1, variant, 1)
    """

    member: int
    u: Value
    v: Value

    @cached_property
    def along(self) -> tuple[bool, bool]:
        """Whether u and v are more than an exact zero, which folds away."""
        return not zero(self.u), not zero(self.v)


class Poses:
    """All members in a batch of poses; index 0 is the ground.

    x, y     [m]  place of each member's origin, float or (case, variant, pose)
    c, s     [-]  cosine and sine of its turn
    down     [-]     direction of gravity (x, y), float or (case, 1, 1)
    field    [m/s2]  strength of gravity, float or (case, 1, 1)
    places   [m]  where loads stand that are moved along a line while nothing else moves, by name

    >>> at = Poses(x=[0.0, 1.0], y=[0.0, 2.0], c=[1.0, 0.0], s=[0.0, 1.0])
    >>> at.spot(Site(1, 0.5, 0.0))
    (1.0, 2.5)
    """

    def __init__(
        self,
        x: Sequence[Value],
        y: Sequence[Value],
        c: Sequence[Value],
        s: Sequence[Value],
        down: tuple[Value, Value] = (0.0, -1.0),
        field: Value = 9.80665,
        places: Mapping[str, Value] | None = None,
    ):
        self.x, self.y, self.c, self.s = x, y, c, s
        self.down, self.field = down, field
        self.places: Mapping[str, Value] = places or {}
        self._arms: dict[int, tuple[Value, Value, Site]] = {}  # by the site's identity; the site is kept alive

    def arm(self, site: Site) -> tuple[Value, Value]:
        """From the member's origin to the site, ground axes [m]; worked out once a batch."""
        has_u, has_v = site.along
        if not (has_u or has_v):
            return 0.0, 0.0
        known = self._arms.get(id(site))
        if known is None:
            c, s, u, v = self.c[site.member], self.s[site.member], site.u, site.v
            if not has_v:
                known = (c * u, s * u, site)
            elif not has_u:
                known = (-(s * v), c * v, site)
            else:
                known = (c * u - s * v, s * u + c * v, site)
            self._arms[id(site)] = known
        return known[0], known[1]

    def spot(self, site: Site) -> tuple[Value, Value]:
        """The site in ground axes [m]."""
        x, y = self.x[site.member], self.y[site.member]
        if site.along == (False, False):
            return x, y
        a, b = self.arm(site)
        return x + a, y + b

    def turned(self, member: int, u: Value, v: Value) -> tuple[Value, Value]:
        """A direction that is fixed in a member, in ground axes."""
        c, s = self.c[member], self.s[member]
        return c * u - s * v, s * u + c * v


def zero(value: Any) -> bool:
    """True for an exact nothing that never changes: it folds away."""
    return isinstance(value, float) and value == 0.0
