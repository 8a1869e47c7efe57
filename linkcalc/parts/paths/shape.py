"""How the way of a rope looks in one pose: straight parts and arcs as one line of many short pieces."""

from __future__ import annotations

import math

import numpy as np

from linkcalc.parts.contract import Poses
from linkcalc.parts.paths.over_pulleys import OverPulleys

_STEP = np.radians(5.0)
_SHOWN = np.radians(100.0)  # of the rope on a drum, of which no end is known


def line_of(path: OverPulleys, at: Poses) -> tuple[tuple[float, float], ...]:
    """[m] places along the rope, from end to end."""
    run = path.run(at)
    last = len(path.wheels) - 1
    arcs = path.arcs(at, run)
    line: list[tuple[float, float]] = []
    for k, wheel in enumerate(path.wheels):
        x, y = (float(v) for v in at.spot(wheel.site))
        radius = float(wheel.radius)
        if not radius:
            line.append((x, y))
            continue
        dx, dy = (float(v) for v in run.ways[max(k - 1, 0)])
        arc = _SHOWN if k in (0, last) else max(float(arcs[k]), 0.0)
        # from the centre to where the rope touches: square to its direction, away from the side of the centre
        first = np.arctan2(-wheel.side * dx, wheel.side * dy)
        start = first - wheel.side * arc if k == 0 else first
        angles = (start + wheel.side * np.linspace(0.0, arc, int(arc / _STEP) + 2)).tolist()
        line += [(x + radius * math.cos(a), y + radius * math.sin(a)) for a in angles]
    return tuple(line)
