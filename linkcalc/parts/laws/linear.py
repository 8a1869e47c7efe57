"""Linear: a force that grows evenly with the way from where it is nothing, as of a coil or torsion spring."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts.contract import Value

BOTH, TENSION, COMPRESSION = "both", "tension", "compression"


@dataclass(frozen=True, eq=False)
class Linear:
    """Force = rate (free - way).

    rate  [N/m] or [N m/rad]
    free  [m] or [rad] where it is nothing
    acts  "both", or "tension" or "compression" only: the other way it is slack or loose
    """

    rate: Value
    free: Value
    acts: str = BOTH
    partial = False

    @property
    def size(self) -> Value:
        return self.rate

    def force(self, way: Value) -> Value:
        force = self.rate * (self.free - way)
        if self.acts == BOTH:
            return force
        one_way: Value = np.minimum(force, 0.0) if self.acts == TENSION else np.maximum(force, 0.0)
        return one_way
