"""What a rope loses at a pulley: tension beyond it over tension before it, as it runs over it. 1 or more."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from linkcalc.parts.contract import Value
from linkcalc.parts.paths.over_pulleys import Way

Loss = Callable[[Way, Way, Value], Value]
"""(direction before, direction after, arc of contact [rad]) -> ratio of the tensions"""


@dataclass(frozen=True, eq=False)
class ByEfficiency:
    """Told outright: of what pulls on one side so much arrives on the other."""

    efficiency: Value

    def __call__(self, before: Way, after: Way, arc: Value) -> Value:  # noqa: ARG002
        return 1.0 / self.efficiency


@dataclass(frozen=True, eq=False)
class OverPost:
    """The rope slides over a post that does not turn: exp(µ wrap), after Euler and Eytelwein (common practice).

    turns  [-] whole turns round the post beside the arc that is drawn
    """

    friction: Value
    turns: Value

    def __call__(self, before: Way, after: Way, arc: Value) -> Value:  # noqa: ARG002
        ratio: Value = np.exp(self.friction * np.maximum(arc + 2 * np.pi * self.turns, 0.0))
        return ratio


@dataclass(frozen=True, eq=False)
class OnPin:
    """The pulley turns on a pin that rubs, of friction circle r: moments about its centre balance if

        R (T2 - T1) = r |T2 d2 - T1 d1|        R its radius, d1, d2 the directions of the rope

    Squared, with the ratio f = T2/T1 and d1·d2 = 1 - |d2 - d1|²/2, that is f + 1/f = 2 + 2 e with

        e = r² |d2 - d1|² / (2 (R² - r²)),     f = 1 + e + sqrt(e (2 + e))

    so (R + r)/(R - r) for a rope that turns right back. A straight rope does not press on its pulley: f = 1.
    """

    radius: Value
    circle: Value

    def __call__(self, before: Way, after: Way, arc: Value) -> Value:  # noqa: ARG002
        turned = (after[0] - before[0]) ** 2 + (after[1] - before[1]) ** 2
        e = self.circle**2 * turned / (2 * (self.radius**2 - self.circle**2))
        ratio: Value = 1 + e + np.sqrt(e * (2 + e))
        return ratio
