"""The straight lines of a member's body, and their centre."""

from __future__ import annotations

from itertools import pairwise

import numpy as np

from linkcalc.model.drafting import Place
from linkcalc.model.mechanism import Member
from linkcalc.parts.contract import Value


def body_lines(entry: Member) -> list[tuple[str, str]]:
    """The straight lines of a member's body, each by the names of its ends, none of them twice: a path may go back
    the way it came, to where a branch leaves it. Of a member with one point it is that point twice."""
    path = entry.path or entry.points
    found: dict[frozenset[str], tuple[str, str]] = {}
    for ends in pairwise(path):
        found.setdefault(frozenset(ends), ends)
    return list(found.values()) or [(path[0], path[0])]


def middle(lines: list[tuple[Place, Place]]) -> Place:
    """Centre of lines of even weight; the first place of them if they have no length."""
    total: Value = 0.0
    sum_x: Value = 0.0
    sum_y: Value = 0.0
    for (ax, ay), (bx, by) in lines:
        length = np.hypot(bx - ax, by - ay)
        total, sum_x, sum_y = total + length, sum_x + length * (ax + bx) / 2, sum_y + length * (ay + by) / 2
    if np.ndim(total) == 0 and total == 0:
        return lines[0][0]
    return sum_x / total, sum_y / total
