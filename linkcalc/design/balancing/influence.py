"""What a push at a place does to the effort, pose by pose: virtual work on the poses of a solved stroke."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from linkcalc.mechanics.path import Path
from linkcalc.mechanics.pipeline import solve_at
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.solved import Solved
from linkcalc.mechanics.state import Status
from linkcalc.parts.contract import Push
from linkcalc.parts.pose import Array, Mask, Poses, Value


@dataclass(frozen=True, eq=False)
class Influence:
    """A solved stroke as a field of influence.

    forward  +1.0 if the drive grows along the stroke, else -1.0
    """

    ready: Ready
    path: Path
    solved: Solved

    @property
    def at(self) -> Poses:
        return self.solved.closed.at

    @property
    def drive(self) -> Array:
        """(pose) [rad or m]"""
        drive: Array = self.solved.drive[0, 0]
        return drive

    @property
    def forward(self) -> float:
        return 1.0 if self.path.stop >= self.path.start else -1.0

    @property
    def shape(self) -> tuple[int, int]:
        """(cases, poses)"""
        cases, _, poses = self.solved.balance.status.shape
        return cases, poses

    @cached_property
    def effort(self) -> Array:
        """(case, pose) [N] or [N m]"""
        return self._spread(self.solved.balance.effort)

    @cached_property
    def effort_speed(self) -> Array:
        """(case, pose) speed of the effort along its own direction, per unit of the drive"""
        return self._spread(self.solved.balance.effort_speed)

    @cached_property
    def sound(self) -> Mask:
        """(case, pose) True where there is an effort."""
        fine = np.asarray(self.solved.balance.status[:, 0] == Status.FINE)
        return fine & np.isfinite(self.effort) & (np.abs(self.effort_speed) > 0)

    def of(self, pushes: Sequence[Push]) -> Array:
        """(case, variant, pose) effort that a push of 1 asks for. Speeds v of the coordinates, generalised force Q:
        e = -v Q / speed of the effort."""
        power: Value = 0.0
        for member, *parts in pushes:
            for which, part in enumerate(parts):
                if member and not (isinstance(part, float) and part == 0.0):
                    power = power + self.solved.closed.speed[3 * (member - 1) + which] * part
        with np.errstate(all="ignore"):
            return np.asarray(-np.asarray(power) / self.effort_speed[:, None, :], float)

    def at_poses(self, drive: Array) -> Influence:
        """The same mechanism at other values of the drive."""
        return Influence(self.ready, self.path, solve_at(self.ready, self.path.mesh, drive, checked=False))

    def _spread(self, value: Value) -> Array:
        cases, poses = self.shape
        return np.array(np.broadcast_to(value, (cases, 1, poses))[:, 0], float)
