"""The body of a member as lines that forces run along: a tree of straight edges in the member's own frame.

The edges are those of the member's path, cut at every point that lies on it. A point beside the path hangs on by a
straight arm from the nearest place of the path. Every edge points away from the first point of the path, so that
what lies beyond a cut is a branch of the tree.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from itertools import pairwise

import numpy as np

from linkcalc.model.body_lines import body_lines
from linkcalc.model.sketch import Drawing
from linkcalc.parts.pose import Array, Mask

_SAME = 1e-9
"""Of the size of the drawing: places closer together are one."""


@dataclass(frozen=True, eq=False)
class Body:
    """A member's body.

    names    name of each node; the foot of an arm is called after its point
    nodes    (node, 2) [m] own frame
    starts, stops  for each edge the numbers of its nodes, the first nearer to the first point of the path
    arms     for each edge True if it is no part of the path but an arm to a point beside it
    ring     True if the path closes: then forces within it do not follow from balance alone, and it is left open
    slack    [m] places closer together are one
    """

    names: tuple[str, ...]
    nodes: Array
    starts: tuple[int, ...]
    stops: tuple[int, ...]
    arms: tuple[bool, ...]
    ring: bool
    slack: float

    @cached_property
    def _ways(self) -> Array:
        ways: Array = self.nodes[list(self.stops)] - self.nodes[list(self.starts)]
        return ways if self.starts else np.zeros((0, 2))

    @cached_property
    def long(self) -> Array:
        """(edge) [m]"""
        return np.hypot(*self._ways.T)

    @cached_property
    def along(self) -> Array:
        """(edge, 2) [-] direction of each edge, from start to stop"""
        return np.asarray(self._ways / self.long[:, None])

    @cached_property
    def leads(self) -> tuple[int, ...]:
        """For each edge the one that leads to it; -1 where the body begins."""
        stops = list(self.stops)
        return tuple(stops.index(start) if start in stops else -1 for start in self.starts)

    @cached_property
    def before(self) -> Array:
        """(edge) [m] way along the body from its first point to the start of each edge"""
        before = np.zeros(len(self.starts))
        for k, lead in enumerate(self.leads):  # an edge comes after the one that leads to it
            before[k] = before[lead] + self.long[lead] if lead >= 0 else 0.0
        return before

    @cached_property
    def beyond(self) -> Mask:
        """(edge, edge) True where the second lies beyond the far end of the first"""
        beyond = np.zeros((len(self.starts),) * 2, bool)
        for k, lead in enumerate(self.leads):
            if lead >= 0:
                beyond[:, k] = beyond[:, lead]
                beyond[lead, k] = True
        return beyond

    def corners(self) -> list[int]:
        """Nodes where the path bends (or branches), ends left out."""
        found = []
        for node in range(len(self.names)):
            ways = [self.along[k] for k, stop in enumerate(self.stops) if stop == node and not self.arms[k]]
            ways += [-self.along[k] for k, start in enumerate(self.starts) if start == node and not self.arms[k]]
            if len(ways) > 1 and not all(abs(_cross(ways[0], w)) < 1e-6 for w in ways[1:]):
                found.append(node)
        return found


def body(drawing: Drawing, member: str) -> Body:
    """The body of a member, by its drawn sizes."""
    entry = drawing.mechanism.members[member]
    slack = _SAME * drawing.size

    def place(point: str) -> Array:
        site = drawing.site(point, member)
        return np.array([float(np.ravel(site.u)[0]), float(np.ravel(site.v)[0])])

    names: list[str] = []
    nodes: list[Array] = []

    def node(name: str, at: Array) -> int:
        for k, known in enumerate(nodes):
            if np.hypot(*(known - at)) <= slack:
                names[k] = names[k] or name
                return k
        names.append(name)
        nodes.append(at)
        return len(nodes) - 1

    lines = [(node(a, place(a)), node(b, place(b))) for a, b in body_lines(entry)]
    arms: list[tuple[int, int]] = []
    for point in dict.fromkeys(entry.points):
        at = place(point)
        foot = _foot(at, [(nodes[a], nodes[b]) for a, b in lines])
        if np.hypot(*(foot - at)) <= slack:
            node(point, at)
        else:
            arms.append((node(f"foot of {point}", foot), node(point, at)))
    edges = [
        (a, b, arm)
        for some, arm in ((lines, False), (arms, True))
        for line in some
        for a, b in _cut(line, nodes, slack)
    ]
    kept, ring = _tree(edges, lines[0][0])
    starts, stops, beside = zip(*kept, strict=True) if kept else ((), (), ())
    return Body(tuple(names), np.array(nodes), starts, stops, beside, ring, slack)


def straight(of: Body, a: tuple[float, float], b: tuple[float, float]) -> float | None:
    """[m] how long the body is between two places (own frame), if it runs straight from the one to the other; None if
    it does not."""
    first, last = np.array(a), np.array(b)
    long = float(np.hypot(*(last - first)))
    if long <= of.slack:
        return None
    t, covered = (last - first) / long, 0.0
    for start, stop in zip(of.starts, of.stops, strict=True):
        arms = of.nodes[[start, stop]] - first
        if max(abs(_cross(t, arm)) for arm in arms) <= of.slack:
            low, high = np.clip(sorted(float(arm @ t) for arm in arms), 0.0, long)
            covered += float(high - low)
    return long if covered >= long - 10 * of.slack else None


def _foot(at: Array, lines: Sequence[tuple[Array, Array]]) -> Array:
    """The nearest place on some straight lines."""
    feet = []
    for a, b in lines:
        span = float((b - a) @ (b - a))
        feet.append(a + (np.clip((at - a) @ (b - a) / span, 0.0, 1.0) if span else 0.0) * (b - a))
    return min(feet, key=lambda foot: float(np.hypot(*(foot - at))))


def _cut(line: tuple[int, int], nodes: Sequence[Array], slack: float) -> list[tuple[int, int]]:
    """A line between two nodes in pieces, from each node that lies on it to the next."""
    a, b = nodes[line[0]], nodes[line[1]]
    long = float(np.hypot(*(b - a)))
    if long <= slack:
        return []
    t = (b - a) / long
    on = []
    for k, at in enumerate(nodes):
        s = float((at - a) @ t)
        if -slack <= s <= long + slack and abs(_cross(t, at - a)) <= slack:
            on.append((s, k))
    return list(pairwise(k for _, k in sorted(on)))


def _tree(edges: Sequence[tuple[int, int, bool]], root: int) -> tuple[list[tuple[int, int, bool]], bool]:
    """The edges that can be reached from a node, each pointing away from it and after the one that leads to it; and
    True if one had to be left out because it closes a ring."""
    left = list({frozenset(edge[:2]): edge for edge in reversed(edges)}.values())[::-1]
    reached, ring = {root}, False
    kept: list[tuple[int, int, bool]] = []
    while True:
        found = next((e for e in left if (e[0] in reached) or (e[1] in reached)), None)
        if found is None:
            return kept, ring
        left.remove(found)
        a, b, arm = found
        if a in reached and b in reached:
            ring = True
            continue
        kept.append((a, b, arm) if a in reached else (b, a, arm))
        reached.add(kept[-1][1])


def _cross(a: Array, b: Array) -> float:
    return float(a[0] * b[1] - a[1] * b[0])
