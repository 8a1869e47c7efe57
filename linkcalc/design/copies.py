"""Many copies of a mechanism, streamed: for tolerance studies and searches over more copies than memory holds."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

import numpy as np

from linkcalc.design.reach import located
from linkcalc.faults import fault
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.copies import each_pose
from linkcalc.mechanics.pipeline import path_of
from linkcalc.mechanics.prepare import prepare
from linkcalc.mechanics.solved import Solved
from linkcalc.model.check import check
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import Drawing, drawn
from linkcalc.parts.pose import Array, Codes
from linkcalc.words import nearest

BLOCK = 8192
"""Copies that go through the stroke together: few enough for their arrays to stay in the processor's cache."""


@dataclass(frozen=True, eq=False)
class CopiesPose:
    """One pose of one block of copies, SI.

    first   number of the first copy of the block
    pose    number of the pose in the stroke
    drive   [rad or m] value of the stroke's coordinate
    effort, load  (case, variant)
    joints  joint -> multipliers (rows, case, variant): of a pin its force on the first member, x and y; of a slot the
            force square to the line, of a gear or rack that along the pitch line; of a slide the force square to its
            line and the moment; of a weld x, y and moment
    status  (case, variant) mechanics.state.Status; failed copies are NaN
    """

    first: int
    pose: int
    drive: float
    effort: Array
    load: Array
    joints: Mapping[str, tuple[Array, ...]]
    status: Codes


def copies(
    mechanism: Mechanism, sizes: Mapping[str, Array], *, poses: int | None = None, block: int = BLOCK
) -> Iterator[CopiesPose]:
    """Walk copies of a mechanism through its stroke, block after block, pose after pose; nothing is kept.

    sizes  name of a dimension -> (copies) [SI] its size in each copy
    poses  number of poses, instead of the model's

    Raises Faults: whatever is wrong with the model, a stroke out of reach, sizes of unknown dimensions or of
    different counts.
    """
    mechanism = check(mechanism)
    count = copies_in(mechanism, sizes)
    if mechanism.stroke is None:
        raise fault("stroke", "the model has no stroke to walk through", "give it one, or use stroke(sizes=...)")
    nominal = prepare(drawn(mechanism))
    with located(nominal):
        path = path_of(nominal)
    drive = path.poses(poses or mechanism.stroke.poses)
    for first in range(0, count, block):
        part = {name: np.reshape(size[first : first + block], (1, -1, 1)) for name, size in sizes.items()}
        ready = prepare(Drawing(mechanism, part), like=nominal)
        for pose, solved in enumerate(each_pose(ready, path, drive, checked=False)):
            yield _told(first, pose, float(drive[pose]), solved, ready.chain)


def copies_in(mechanism: Mechanism, sizes: Mapping[str, Array]) -> int:
    """How many copies there are sizes for. Raises Faults: unknown dimensions, different counts."""
    counts = set()
    for name, size in sizes.items():
        if name not in mechanism.dimensions:
            raise fault(("dimensions", name), "there is no such dimension", nearest(name, mechanism.dimensions))
        counts.add(np.size(size))
    if len(counts) != 1:
        raise fault("dimensions", f"sizes for {sorted(counts)} copies", "give every dimension as many sizes")
    return counts.pop()


def _told(first: int, pose: int, drive: float, solved: Solved, chain: Chain) -> CopiesPose:
    b = solved.balance
    shape = b.status.shape[:2]

    def flat(value: object) -> Array:
        array = np.asarray(value)
        return np.broadcast_to(array[:, :, 0] if array.ndim == 3 else array, shape)

    joints: dict[str, tuple[Array, ...]] = {}
    for joint, row in zip(chain.joints, chain.first_row, strict=True):
        rows = tuple(flat(m) for m in b.multipliers[row : row + len(joint.angular)])
        joints[joint.name] = (*joints.get(joint.name, ()), *rows)
    return CopiesPose(first, pose, drive, flat(b.effort), flat(b.load), joints, b.status[:, :, 0])
