"""Table: a force given at some lengths, and smoothly between them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from itertools import pairwise

import numpy as np

from linkcalc.parts.contract import Value

_ROUNDING = 1e-9  # of the whole range: an end that is met but for rounding is met


@dataclass(frozen=True, eq=False)
class Table:
    """A curve through the rows that rises and falls only where they do, with a slope that does not jump.

    ways    [m] or [rad], rising, at least two
    forces  [N] or [N m]

    Piecewise cubic with the slopes of F. N. Fritsch and J. Butland, SIAM J. Sci. Stat. Comput. 5 (1984), pp. 300-304:
    the weighted harmonic mean of the slopes on either side, nothing where they differ in sign; at the ends by three
    rows, held back so that the curve does not overshoot. Outside the rows there is no force.
    """

    ways: Sequence[Value]
    forces: Sequence[Value]
    partial = True

    @property
    def size(self) -> Value:
        top: Value = np.max(np.abs(np.broadcast_arrays(*self.forces)), axis=0)
        return top if np.ndim(top) else float(top)

    @cached_property
    def _slopes(self) -> list[Value]:
        spans = [b - a for a, b in pairwise(self.ways)]
        rises = [(b - a) / h for (a, b), h in zip(pairwise(self.forces), spans, strict=True)]
        if len(spans) == 1:
            return [rises[0], rises[0]]
        inner = [_mean(h0, h1, d0, d1) for (h0, h1), (d0, d1) in zip(pairwise(spans), pairwise(rises), strict=True)]
        first = _end(spans[0], spans[1], rises[0], rises[1])
        last = _end(spans[-1], spans[-2], rises[-1], rises[-2])
        return [first, *inner, last]

    def force(self, way: Value) -> Value:
        slack = _ROUNDING * (self.ways[-1] - self.ways[0])
        inside = (way >= self.ways[0] - slack) & (way <= self.ways[-1] + slack)
        out: Value = np.nan
        for k, (a, b) in enumerate(pairwise(self.ways)):
            out = np.where(way >= a if k else inside, self._piece(k, way, a, b - a), out)
        known: Value = np.where(inside, out, np.nan)
        return known

    def _piece(self, k: int, way: Value, start: Value, span: Value) -> Value:
        """Hermite's cubic between two rows."""
        t = (way - start) / span
        (f0, f1), (m0, m1) = self.forces[k : k + 2], self._slopes[k : k + 2]
        far = t * t * (3 - 2 * t)
        return f0 * (1 - far) + f1 * far + span * t * (1 - t) * (m0 * (1 - t) - m1 * t)


def _mean(h0: Value, h1: Value, d0: Value, d1: Value) -> Value:
    w0, w1 = 2 * h1 + h0, h1 + 2 * h0
    with np.errstate(divide="ignore", invalid="ignore"):
        mean = np.divide(w0 + w1, np.divide(w0, d0) + np.divide(w1, d1))
    slope: Value = np.where(d0 * d1 > 0, mean, 0.0)
    return slope


def _end(h0: Value, h1: Value, d0: Value, d1: Value) -> Value:
    slope = ((2 * h0 + h1) * d0 - h0 * d1) / (h0 + h1)
    held = np.where((d0 * d1 < 0) & (np.abs(slope) > 3 * np.abs(d0)), 3 * d0, slope)
    end: Value = np.where(slope * d0 > 0, held, 0.0)
    return end
