"""An order for things that hang on one another: dimensions on dimensions, points on points."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from graphlib import CycleError, TopologicalSorter


def ordered(needs: Mapping[str, Iterable[str]]) -> tuple[list[str], list[list[str]]]:
    """Names in an order in which each comes after what it needs, and the circles that stand in the way.

    Names in a circle are left out of the order; needs that are no names are passed over.

    >>> ordered({"a": ["b"], "b": [], "c": ["d"], "d": ["c"]})
    (['b', 'a'], [['c', 'd', 'c']])
    """
    left = {name: [n for n in wants if n in needs] for name, wants in needs.items()}
    circles: list[list[str]] = []
    while True:
        sorter = TopologicalSorter(left)
        try:
            return [name for name in sorter.static_order() if name in left], circles
        except CycleError as error:
            backward: list[str] = error.args[1]
            circle = backward[::-1][:-1]
            first = circle.index(min(circle, key=list(needs).index))
            circle = circle[first:] + circle[:first]
            circles.append([*circle, circle[0]])
            for name in circle:
                del left[name]
            left = {name: [w for w in wants if w in left] for name, wants in left.items()}
