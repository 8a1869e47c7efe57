"""Mechanisms with more freedoms than the drive takes: which coordinates stand for the free ones.

A hanging pan, a beam on a knife edge, a link that stretches: the drive does not say where it is, equilibrium does.
While it is looked for, some coordinates of members are held (the *places*); their multipliers are what would hold them
there, and must vanish. Any coordinates will do that the joints and the drive leave free; they are chosen anew where
they tell the pose badly.
"""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.mechanics.chain import Chain, Holder
from linkcalc.mechanics.limit import Place
from linkcalc.parts.contract import Joint
from linkcalc.parts.pose import Array, Poses

Places = tuple[Place, ...]


class Loose:
    """The chain of such a mechanism, once for each choice of places.

    count  how many freedoms the drive does not take
    """

    def __init__(self, moving: int, joints: Sequence[Joint], coordinate: Holder | None, size: float):
        self._parts = (moving, tuple(joints), coordinate, size)
        self.bare = Chain(moving, joints, coordinate, size)
        self.coordinate = coordinate
        self.count = self.bare.columns - self.bare.rows
        self._chains: dict[Places, Chain] = {}

    def chain(self, places: Places) -> Chain:
        """The square chain with some places held."""
        if places not in self._chains:
            self._chains[places] = Chain(*self._parts, holds=places)
        return self._chains[places]

    def share_plans(self, other: Loose) -> None:
        """Use the plans of the same mechanism with other sizes."""
        for places, chain in other._chains.items():
            self.chain(places).share_plans(chain)

    def places(self, at: Poses, which: tuple[int, ...] = (0, 0, 0)) -> Places | None:
        """The coordinates that tell one pose of a batch best; None if joints or drive say something twice there."""
        null = self._null(at, which)
        if null is None:
            return None
        left, found = null.copy(), []
        for _ in range(self.count):
            k = int(np.argmax(np.linalg.norm(left, axis=1)))
            found.append(Place(k // 3 + 1, k % 3))
            way = left[k] / np.linalg.norm(left[k])
            left = left - np.outer(left @ way, way)
        return tuple(found)

    def _null(self, at: Poses, which: tuple[int, ...]) -> Array | None:
        """(columns, count) the free motions of one pose, scaled to pure numbers."""
        one = _picked(at, which)
        drive = None if self.coordinate is None else self.coordinate.hold(self.coordinate.value(one))
        jacobian = self.bare.dense(self.bare.equations(one, drive)[1])
        if not np.isfinite(jacobian).all():
            return None
        _, sizes, vt = np.linalg.svd(jacobian, full_matrices=True)
        if sizes.size and sizes[-1] <= _TWICE * sizes[0]:
            return None
        free: Array = vt[len(jacobian) :].T
        return free


_TWICE = 1e-9  # smallest over largest singular value: what is said twice


def _picked(at: Poses, which: tuple[int, ...]) -> Poses:
    """One pose of a batch, as a batch of one; gravity as it is."""

    def pick(values: Sequence[object]) -> list[object]:
        return [v if isinstance(v, float) else np.full((1, 1, 1), _entry(np.asarray(v), which)) for v in values]

    return Poses(pick(at.x), pick(at.y), pick(at.c), pick(at.s), at.down, at.field)  # type: ignore[arg-type]


def _entry(values: Array, which: tuple[int, ...]) -> float:
    return float(values[tuple(min(k, n - 1) for k, n in zip(which, values.shape, strict=True))])
