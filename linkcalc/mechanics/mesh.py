"""Known poses of one mechanism along its stroke, and poses anywhere between them as a guess for Newton."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.mechanics.motion import Known, cubic, table, turned_between
from linkcalc.parts.pose import Array, Poses


class Mesh:
    """Poses of one variant in the order of the stroke.

    drive  (nodes) [rad or m], rising or falling
    """

    def __init__(self, drive: Array, known: Sequence[Known]):
        """known: one batch for all nodes, (1, 1, nodes), or one of a single pose for each."""
        self.drive = drive
        self._rising = np.sign(drive[-1] - drive[0]) or 1.0
        first = known[0].at
        self._down, self._field = first.down, first.field
        if len(known) == drive.size:
            tables = np.array([table(k) for k in known]).transpose(1, 2, 0)
        else:
            tables = np.empty((5, len(first.x) - 1, drive.size))
            for row, values in zip(
                tables, (first.x, first.y, first.c, first.s, (0.0, *known[0].speed[2::3])), strict=True
            ):
                for m, value in enumerate(values[1:]):
                    row[m] = np.ravel(value)
        self._x, self._y, self._c, self._s, self._turning = tables

    def guess(self, drive: Array) -> Poses:
        """Poses near those at some values of the drive, (1, 1, values), by the cubic through the neighbours."""
        last = self.drive.size - 1
        a = np.clip(np.searchsorted(self._rising * self.drive, self._rising * drive) - 1, 0, max(last - 1, 0))
        b = np.minimum(a + 1, last)
        span = self.drive[b] - self.drive[a]
        t = (drive - self.drive[a]) / np.where(span == 0.0, 1.0, span)
        turned = turned_between(
            cubic(t, span),
            (self._c[:, a], self._s[:, a], self._turning[:, a]),
            (self._c[:, b], self._s[:, b], self._turning[:, b]),
        )
        foretold = (self._x[:, b], self._y[:, b], *map(np.asarray, turned))
        x, y, c, s = (list(v.reshape(len(v), 1, 1, -1)) for v in foretold)
        return Poses([0.0, *x], [0.0, *y], [1.0, *c], [0.0, *s], self._down, self._field)
