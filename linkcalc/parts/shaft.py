"""Where a couple goes into the members that it acts between."""

from __future__ import annotations

from linkcalc.parts.contract import Site, Sketch


def shaft(sketch: Sketch, member: str, against: str, point: str | None = None) -> tuple[Site, Site]:
    """The place on each of two members: the point given, else the first that both carry, else the first of each.

    It matters to the inner forces of the members alone: a couple turns a whole member alike wherever it acts.
    """
    point = point or sketch.shared_point(member, against)
    return _on(sketch, member, point), _on(sketch, against, point)


def _on(sketch: Sketch, member: str, point: str | None) -> Site:
    if point is not None:
        return sketch.site(point, member)
    return Site(sketch.member(member), 0.0, 0.0)
