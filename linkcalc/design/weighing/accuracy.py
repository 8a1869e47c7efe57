"""Accuracy classes of weighing instruments: how wrong an indication may be, from the table of the package."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np

from linkcalc.data import table
from linkcalc.faults import fault
from linkcalc.parts.pose import Array
from linkcalc.words import nearest

_FILE, _BEAM = "weighing.toml", "beam"
_WHOLE = 1e-9  # of an interval: a load that is on the edge of a step but for rounding is on it


@dataclass(frozen=True)
class Accuracy:
    """A class with an interval.

    name      "OIML III", "NIST III L"
    interval  [kg] verification scale interval (division)
    in_use    True: the larger limits for a scale in use
    """

    name: str
    interval: float
    in_use: bool = False

    @property
    def row(self) -> Mapping[str, Any]:
        found: Mapping[str, Any] = table(_FILE)[self.name]
        return found

    @property
    def source(self) -> str:
        return str(self.row["source"])

    def limit(self, loads: Array | float) -> Array:
        """[kg] the largest error, plus or minus, at loads [kg]."""
        n = np.abs(np.asarray(loads, float)) / self.interval
        steps = self.row["steps"]
        edges, errors = (np.array(column, float) for column in zip(*steps, strict=True))
        pick = np.searchsorted(edges * (1 + _WHOLE), n)
        found = errors[np.minimum(pick, len(edges) - 1)]
        if "more" in self.row:
            beyond = np.maximum(n - edges[-1], 0.0) / self.row["each"]
            found = found + self.row["more"] * np.ceil(beyond * (1 - _WHOLE) - _WHOLE)
        return np.asarray(found * self.interval * (self.row["later"] if self.in_use else 1.0))

    def bands(self, most: float) -> tuple[tuple[float, float, float], ...]:
        """(from [kg], up to [kg], largest error [kg]) up to a capacity; finer than 12 bands are told as far as that."""
        out, low = [], 0.0
        edges = [edge for edge, _ in self.row["steps"]]
        if "more" in self.row:
            edges = [*edges, *(edges[-1] + self.row["each"] * k for k in range(1, 200))]
        for edge in edges:
            high = min(edge * self.interval, most)
            if high > low * (1 + _WHOLE):
                out.append((low, high, float(self.limit(high))))
            low = high
            if high >= most:
                break
        return tuple(out)

    def unfit(self, most: float) -> tuple[str, float, float] | None:
        """("intervals", least, most) if a capacity [kg] is not of the number of intervals that the class allows."""
        n = most / self.interval
        for largest, low, high in self.row.get("intervals", ()):
            if self.interval * 1e3 <= largest * (1 + _WHOLE):
                return None if low * (1 - _WHOLE) <= n <= high * (1 + _WHOLE) else ("intervals", low, high)
        return None

    def least_load(self) -> float:
        """[kg] the least load that may be weighed; 0 where the class tells none."""
        for largest, n in self.row.get("min", ()):
            if self.interval * 1e3 <= largest * (1 + _WHOLE):
                return float(n * self.interval)
        return 0.0

    @property
    def visible(self) -> float:
        """Part of the largest error that must still move the beam visibly; 0 where the class tells none."""
        return float(self.row.get("visible", 0.0))

    def extra(self, load: float, most: float, arm: float) -> tuple[float, float] | None:
        """([kg] extra load, [m] displacement that it must give) at a load; None where nothing is asked.

        most  [kg] capacity
        arm   [m] from the fulcrum to the end of the beam or its stop
        """
        if "extra" in self.row:
            way = next(d for capacity, d in self.row["extra"] if most <= capacity)
            return float(self.limit(load)), way * 1e-3
        if self.row.get(_BEAM):
            rule = table(_FILE)[_BEAM]
            way = next(d for reach, d in rule["travel"] if arm * 1e3 <= reach * (1 + _WHOLE))
            number = rule["at_nothing"] if load <= 0 else rule["at_most"] if load >= most * (1 - _WHOLE) else None
            return None if number is None else (number * self.interval, way * 1e-3 / 2)
        return None


def classes() -> tuple[str, ...]:
    """Names of the classes."""
    return tuple(name for name in table(_FILE) if name != _BEAM)


def accuracy(name: str, interval: float, *, in_use: bool = False) -> Accuracy:
    """A class by its name. Raises Faults: there is none of that name, or no interval."""
    if name not in classes():
        raise fault((), f"unknown accuracy class {name!r}", nearest(name, classes()))
    if not interval > 0:
        raise fault((), f"an interval of {interval:g} kg", "more than nothing is wanted")
    return Accuracy(name, interval, in_use)
