"""Closed poses with their statics, and several batches of them put together."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from linkcalc.mechanics.balance import Balance
from linkcalc.mechanics.motion import Closed
from linkcalc.parts.pose import Array, Numbers, Poses, Value


@dataclass(frozen=True, eq=False)
class Solved:
    """Closed poses with their statics; batch (case, variant, pose)."""

    drive: Array  # (1, variant, pose) [rad or m]
    closed: Closed
    balance: Balance


def joined(poses: Sequence[Solved], order: Numbers | None = None) -> Solved:
    """One batch out of several, pose after pose.

    order  (poses) which of the poses, one after the other, stands first, second, ...; None: as they come
    """
    closed, first = poses[0].closed, poses[0].balance
    counts = [p.drive.shape[2] for p in poses]

    def put(values: Any) -> Any:
        whole = np.concatenate(values, axis=2)
        return whole if order is None else whole[:, :, order]

    def join(pick) -> Value:  # type: ignore[no-untyped-def]
        values = [pick(p) for p in poses]
        if all(isinstance(v, float) and v == values[0] for v in values):
            return float(values[0])
        shape = np.broadcast_shapes((1, 1, 1), *(_one_pose(v) for v in values))
        return put([np.broadcast_to(v, (*shape[:2], count)) for v, count in zip(values, counts, strict=True)])

    members = range(len(closed.at.x))
    x, y, c, s = ([join(lambda p, m=m, n=n: getattr(p.closed.at, n)[m]) for m in members] for n in ("x", "y", "c", "s"))
    at = Poses(x, y, c, s, closed.at.down, closed.at.field)
    speed = [join(lambda p, k=k: p.closed.speed[k]) for k in range(len(closed.speed))]
    steady = None if closed.steady is None else put([p.closed.steady for p in poses])
    fine = put([p.closed.fine for p in poses])
    whole = Closed(at, [], fine, max(p.closed.worst for p in poses), closed.factored, speed, steady)
    told = Balance(
        effort=join(lambda p: p.balance.effort),
        load=join(lambda p: p.balance.load),
        tare=join(lambda p: p.balance.tare),
        effort_speed=join(lambda p: p.balance.effort_speed),
        load_speed=join(lambda p: p.balance.load_speed),
        multipliers=[join(lambda p, k=k: p.balance.multipliers[k]) for k in range(len(first.multipliers))],
        unbalance=np.asarray(join(lambda p: p.balance.unbalance)),
        disagreement=np.asarray(join(lambda p: p.balance.disagreement)),
        status=put([p.balance.status for p in poses]),
        frictionless=join(lambda p: p.balance.frictionless),
        friction=[join(lambda p, k=k: p.balance.friction[k]) for k in range(len(first.friction))],
        parts=[
            [join(lambda p, r=r, k=k: p.balance.parts[r][k]) for k in range(len(rope))]
            for r, rope in enumerate(first.parts)
        ],
        seals=[join(lambda p, k=k: p.balance.seals[k]) for k in range(len(first.seals))],
    )
    return Solved(put([p.drive for p in poses]), whole, told)


def _one_pose(value: Value) -> tuple[int, ...]:
    return (*np.shape(value)[:2], 1) if np.ndim(value) == 3 else np.shape(value)
