"""Largest sizes over a batch, by the way that is quickest for its length."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.parts.pose import Value

SHORT = 1024  # entries: below, the number of calls counts; above, the number of temporary arrays


def tops(values: Sequence[Value]) -> list[float]:
    """Largest absolute value of each over its whole batch; NaN if one entry is."""
    arrays = [v for v in values if not isinstance(v, float)]
    if arrays and arrays[0].size <= SHORT and len({a.shape for a in arrays}) == 1:
        stacked = np.abs(np.array(arrays)).reshape(len(arrays), -1).max(axis=1).tolist()
        found = iter(stacked)
        return [abs(v) if isinstance(v, float) else next(found) for v in values]
    # two reductions are cheaper than one of an array of absolute values that must be made first
    return [abs(v) if isinstance(v, float) else max(float(v.max()), -float(v.min())) for v in values]


def lows(values: Sequence[Value]) -> list[float]:
    """Smallest absolute value of each over its whole batch; NaN if one entry is."""
    arrays = [v for v in values if not isinstance(v, float)]
    if arrays and arrays[0].size <= SHORT and len({a.shape for a in arrays}) == 1:
        stacked = np.abs(np.array(arrays)).reshape(len(arrays), -1).min(axis=1).tolist()
        found = iter(stacked)
        return [abs(v) if isinstance(v, float) else next(found) for v in values]
    return [abs(v) if isinstance(v, float) else float(np.abs(v).min()) for v in values]
