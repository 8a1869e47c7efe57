"""What gives: laws between the gap of a joint's row and its force, for elastic links, elastic pins and contacts."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts.contract import Value


@dataclass(frozen=True, eq=False)
class Elastic:
    """Holds both ways, in proportion to the gap.

    stiffness  [N/m]
    """

    stiffness: Value
    one_sided = False

    def force(self, gap: Value) -> Value:
        return -self.stiffness * gap


@dataclass(frozen=True, eq=False)
class OneSided:
    """Pushes where the gap is closed, in proportion to how far; lets go where it is open.

    stiffness  [N/m]
    """

    stiffness: Value
    one_sided = True

    def force(self, gap: Value) -> Value:
        pushed: Value = self.stiffness * np.maximum(-gap, 0.0)
        return pushed
