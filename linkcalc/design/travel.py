"""How far something goes in the stroke: a point from its place at the start, a slot's point or slide along its line."""

from __future__ import annotations

import numpy as np

from linkcalc.design.curves import Curves
from linkcalc.mechanics.sampled import Samples, sampled_peaks
from linkcalc.parts.pose import Array


def travel(curves: Curves, of: str) -> float:
    """[m] the largest distance of a point from its start, or the range along a slot, slide or track."""
    drawing = curves.survey.ready.drawing
    joints = {j.name: j for j in drawing.joints if hasattr(j, "travel")}
    if of in joints:
        along = drawing.travelled(of)

        def f(x: Array) -> Array:
            return np.ravel(along.travel(curves.solve(x).closed.at))

        values = f(curves.drive)
        ends = [_largest(curves, values * sense, lambda x, s=sense: f(x) * s) for sense in (1.0, -1.0)]
        return ends[0] + ends[1]
    site = drawing.site(of)

    def place(x: Array) -> tuple[Array, Array]:
        px, py = curves.solve(x).closed.at.spot(site)
        return np.ravel(px), np.ravel(py)

    x0, y0 = (float(v[0]) if np.ndim(v) else float(v) for v in place(curves.drive[:1]))

    def far(x: Array) -> Array:
        px, py = place(x)
        return np.broadcast_to(np.hypot(px - x0, py - y0), x.shape)

    return _largest(curves, far(curves.drive), far)


def _largest(curves: Curves, values: Array, f) -> float:  # type: ignore[no-untyped-def]
    samples = Samples(curves.drive, np.broadcast_to(values, curves.drive.shape)[None])
    _, best = sampled_peaks(lambda x, which: f(x), samples)  # noqa: ARG005
    return float(best[0])
