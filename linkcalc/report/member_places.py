"""Places along a member in words, and what is the same for every table of inner forces."""

from __future__ import annotations

from linkcalc.design.peaks import Place
from linkcalc.report.edge import Edge

SIGNS = (
    "N is plus in tension. M is plus where it stretches the right side of the member, V is the slope of M: both seen"
    " along the body from its first point on, so that a level member drawn from left to right has the usual signs of"
    " a beam."
)


def spoken(place: Place | None, edge: Edge) -> str:
    """ "at C, towards hook", "195.2 mm from A towards E"; "" where it has no place."""
    if place is None:
        return ""
    near = 1e-9 * place.long
    if place.way <= near:
        return f"at {place.start}, towards {place.stop}"
    if place.way >= place.long - near:
        return f"at {place.stop}, towards {place.start}"
    return f"{edge.text(place.way, 'length')} from {place.start} towards {place.stop}"
