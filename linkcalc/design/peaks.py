"""The worst of something within a member, and places along its body."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.mechanics.body import Body


@dataclass(frozen=True)
class Place:
    """A place along the body of a member.

    start, stop  names of the ends of the straight part that it is on
    way, long    [m] how far from start, and how long that part is
    along        [m] how far from the member's first point, along the body
    """

    start: str
    stop: str
    way: float
    long: float
    along: float


@dataclass(frozen=True)
class Peak:
    """The worst of something within a member, over the stroke and all cases.

    value  SI, with the sign it has there (see ``mechanics.internal``)
    kind   "force" or "moment"
    case   name of its load case
    drive  [rad or m] where in the stroke, found exactly; nan without a stroke
    place  where along the member; None where it has no bound
    """

    value: float
    kind: str
    case: str
    drive: float
    place: Place | None


def where(body: Body, edge: int, way: float) -> Place:
    """A place along an edge of a body, in words."""
    start, stop = (body.names[k[edge]] for k in (body.starts, body.stops))
    return Place(start, stop, way, float(body.long[edge]), float(body.before[edge]) + way)
