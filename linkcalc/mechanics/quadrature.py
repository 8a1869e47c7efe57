"""Integrals of sampled curves: of the cubic through four neighbouring samples, from any place to any other.

P. E. Gill and G. F. Miller, An algorithm for the integration of unequally spaced data, The Computer Journal 15, 1972,
pp. 80-83, here for even steps: the error falls with the fourth power of the step.
"""

from __future__ import annotations

import numpy as np

from linkcalc.parts.pose import Array, Numbers

_WIDE = 4
_TO_POWERS = np.linalg.inv(np.vander(np.arange(_WIDE, dtype=float), increasing=True))
_DIVIDED = np.arange(1.0, _WIDE + 1)


class Integral:
    """The integral of curves (rows, samples) from the first of their even places [-] to any other."""

    def __init__(self, where: Array, values: Array):
        """Raises ValueError: fewer than four samples."""
        if where.size < _WIDE:
            raise ValueError(f"{where.size} samples; {_WIDE} are wanted")
        self._start, self._step, self._cells = float(where[0]), float(where[1] - where[0]), where.size - 1
        self._values = values
        cell = np.arange(self._cells)
        left = np.arange(float(self._cells))
        parts = self._within(cell, left + 1.0) - self._within(cell, left)
        self._whole = np.concatenate([np.zeros((len(values), 1)), np.cumsum(parts, axis=1)], axis=1)

    def to(self, place: Array) -> Array:
        """(rows, places) the integral from the first sample to each place."""
        index = (place - self._start) / self._step
        cell = np.clip(np.floor(index).astype(int), 0, self._cells - 1)
        left = np.asarray(cell, float)
        found: Array = self._whole[:, cell] + self._within(cell, index) - self._within(cell, left)
        return found

    def _within(self, cell: Numbers, index: Array) -> Array:
        """(rows, places) antiderivative of the cubic of each cell, at places counted in steps."""
        first = np.clip(cell - 1, 0, self._cells + 1 - _WIDE)
        window = self._values[:, first[:, None] + np.arange(_WIDE)]
        power = window @ _TO_POWERS.T / _DIVIDED
        t = index - first
        found: Array = self._step * np.sum(power * t[:, None] ** _DIVIDED, axis=2)
        return found
