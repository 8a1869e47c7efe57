"""Gas: a rod pushed into a closed volume of gas, which presses it out the harder the deeper it goes in."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts.contract import Value

_ROUNDING = 1e-9  # of the stroke: an end that is met but for rounding is met


@dataclass(frozen=True, eq=False)
class Gas:
    """Force = extended / (1 - x taken)^exponent, x the way in from the extended end.

    The gas is pressed from V0 to V0 - x A by the rod's area A, and p V^n keeps its value: n = 1 slow, so that it stays
    as warm as it is, up to 1.4 fast (polytropic change of an ideal gas, any textbook of thermodynamics).

    extended  [N] force at the extended end
    longest   [m] length there
    stroke    [m] how far the rod goes in
    taken     [1/m] part of the volume that each length of rod takes: A / V0
    exponent  [-] n
    """

    extended: Value
    longest: Value
    stroke: Value
    taken: Value
    exponent: Value = 1.0
    partial = True

    @property
    def size(self) -> Value:
        return self.extended

    def force(self, way: Value) -> Value:
        into = self.longest - way
        slack = _ROUNDING * self.stroke
        with np.errstate(invalid="ignore"):
            inside = (into >= -slack) & (into <= self.stroke + slack)
            force = self.extended / (1.0 - into * self.taken) ** self.exponent
        known: Value = np.where(inside, force, np.nan)
        return known


def taken_by_rise(rise: Value, stroke: Value, exponent: Value) -> Value:
    """[1/m] part of the volume that each length of rod takes, from the force fully in over that fully out."""
    taken: Value = (1.0 - rise ** (-1.0 / exponent)) / stroke
    return taken
