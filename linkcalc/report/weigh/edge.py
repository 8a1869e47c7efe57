"""Units of a scale's answer: the edge where SI becomes the units of the model file."""

from __future__ import annotations

import math
from collections.abc import Iterable

import numpy as np

from linkcalc.design.weighing.answer import WeighAnswer
from linkcalc.model.units import from_si, show
from linkcalc.parts.pose import Array
from linkcalc.report.numbers import plain


class MassEdge:
    """Sizes by kind, one over another ("length", "mass") too."""

    def __init__(self, answer: WeighAnswer):
        self.units = answer.mechanism.units

    def unit(self, kind: str, over: str = "") -> str:
        return f"{self.units.of(kind)}/{self.units.of(over)}" if over else self.units.of(kind)

    def out(self, values: Array | float, kind: str, over: str = "") -> Array:
        """SI -> the file's unit"""
        found = np.asarray(from_si(np.asarray(values, float), kind, self.units))
        return found if not over else np.asarray(found / from_si(1.0, over, self.units))

    def one(self, value: float, kind: str, over: str = "") -> float:
        return float(self.out(value, kind, over))

    def rows(self, values: Iterable[float] | Array, kind: str, over: str = "") -> list[float]:
        return [float(v) for v in np.ravel(self.out(np.asarray(values, float), kind, over))]

    def text(self, value: float, kind: str, digits: int = 5) -> str:
        """With its unit, for reading."""
        return "none" if math.isnan(value) else show(value, kind, self.units, digits)

    def head(self, kind: str, over: str = "") -> str:
        return plain(self.unit(kind, over))
