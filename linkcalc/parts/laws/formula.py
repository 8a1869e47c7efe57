"""Formula: a force written down as a function of the length or angle."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from linkcalc.parts.contract import Value


@dataclass(frozen=True, eq=False)
class Formula:
    """force  from a length [m] or angle [rad] to [N] or [N m], not a number where the formula has no value
    size   what it comes to in the drawing pose
    """

    force: Callable[[Value], Value]
    size: Value
    partial = True
