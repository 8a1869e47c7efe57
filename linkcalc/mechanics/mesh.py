"""Known poses of one mechanism along its stroke, and poses anywhere between them as a guess for Newton."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from linkcalc.mechanics.motion import Known, between
from linkcalc.parts.pose import Array, Poses, Value


@dataclass(frozen=True, eq=False)
class _Picked:
    at: Poses
    speed: list[Value]


class Mesh:
    """Poses of one variant in the order of the stroke.

    drive  (nodes) [rad or m], rising or falling
    """

    def __init__(self, drive: Array, known: Sequence[Known]):
        """known: one batch for all nodes, (1, 1, nodes), or one of a single pose for each."""
        self.drive = drive
        self._rising = np.sign(drive[-1] - drive[0]) or 1.0
        first = known[0].at
        self._down, self._field, self._members = first.down, first.field, len(first.x)
        rows: list[Array] = []
        for name in ("x", "y", "c", "s"):
            rows += [_joined([getattr(k.at, name)[m] for k in known], drive.size) for m in range(self._members)]
        rows += [_joined([k.speed[j] for k in known], drive.size) for j in range(len(known[0].speed))]
        self._rows = np.stack(rows)

    def guess(self, drive: Array) -> Poses:
        """Poses near those at some values of the drive, (1, 1, values), by the cubic through the neighbours."""
        if self.drive.size == 1:
            return self._pick(np.zeros(drive.size, int)).at
        k = np.clip(np.searchsorted(self._rising * self.drive, self._rising * drive) - 1, 0, self.drive.size - 2)
        span = (self.drive[k + 1] - self.drive[k]).reshape(1, 1, -1)
        t = (drive - self.drive[k]).reshape(1, 1, -1) / span
        return between(self._pick(k), self._pick(k + 1), t, span)

    def _pick(self, k: NDArray[np.intp]) -> _Picked:
        rows = list(self._rows[:, k].reshape(len(self._rows), 1, 1, -1))
        n = self._members
        x, y, c, s = (rows[i * n : (i + 1) * n] for i in range(4))
        # the ground stays a constant
        poses = Poses([0.0, *x[1:]], [0.0, *y[1:]], [1.0, *c[1:]], [0.0, *s[1:]], self._down, self._field)
        return _Picked(poses, list(rows[4 * n :]))


def _joined(values: Sequence[Value], size: int) -> Array:
    flat = np.concatenate([np.ravel(v) for v in values])
    return np.broadcast_to(flat, size) if flat.size == 1 else flat
