"""Degrees of freedom from the rank of the Jacobian, and what to do when they do not fit.

Counting alone (three a member less the rows of the joints) cannot tell a mechanism that is held twice in one place
and not at all in another, nor one that is drawn in a special pose; the null spaces of the Jacobian can, and they
name the members and joints concerned.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.motion import moved, single
from linkcalc.parts.pose import Array, Poses

_RANK = 1e-9  # of the largest singular value
_TAKES_PART = 1e-5  # of the largest component of a null vector
_NUDGE = 1e-3
_BESIDE = 0.02  # of the mechanism's size: far enough to see what is not so in the drawing pose


@dataclass(frozen=True)
class Freedom:
    """Mobility in one pose.

    counted    three a moving member less all rows of the joints
    free       degrees of freedom from the rank
    excess     constraints that say again what others say
    movers     indices of the members that can move
    repeated   names of the joints among which the excess constraints are
    special    True if the excess is there only in this very pose (drawn straight, say)
    """

    counted: int
    free: int
    excess: int
    movers: tuple[int, ...]
    repeated: tuple[str, ...]
    special: bool


def freedom(chain: Chain, at: Poses) -> Freedom:
    """Mobility of a chain (its drive left aside) in a single pose."""
    jacobian = _jacobian(chain, at)
    u, s, vt = np.linalg.svd(jacobian, full_matrices=True)
    rank = int(np.sum(s > _RANK * max(float(s[0]) if s.size else 0.0, 1e-300)))
    free, excess = chain.columns - rank, chain.joint_rows - rank
    movers = _movers(vt[rank:])
    rows = np.abs(u[:, rank:]).max(axis=1) if excess else np.zeros(0)
    repeated = _names(chain, rows)
    special = excess > 0 and free > 0 and _freed(chain, at, vt[rank:], rank)
    return Freedom(chain.columns - chain.joint_rows, free, excess, movers, repeated, special)


def motion_of(chain: Chain, at: Poses) -> Array:
    """(columns) the one motion of a chain with one freedom, scaled to pure numbers: its first null vector."""
    _, _, vt = np.linalg.svd(_jacobian(chain, at), full_matrices=True)
    last: Array = vt[-1]
    return last


def beside(chain: Chain, at: Poses) -> Poses | None:
    """A closed pose a little on, of a chain with one freedom; None if it cannot be closed there."""
    way = motion_of(chain, at) * _BESIDE * chain.size / chain.column_size
    return _closed(chain, moved(at, way.tolist()))


def _jacobian(chain: Chain, at: Poses) -> Array:
    bare = Chain(chain.moving, chain.joints, None, chain.size)
    return bare.dense(bare.equations(at, None)[1])


def _movers(null: Array) -> tuple[int, ...]:
    if not len(null):
        return ()
    amount = np.abs(null).max(axis=0).reshape(-1, 3).max(axis=1)
    return tuple(int(k) + 1 for k in np.nonzero(amount > _TAKES_PART * amount.max())[0])


def _names(chain: Chain, amount: Sequence[float] | Array) -> tuple[str, ...]:
    if not len(amount):
        return ()
    top = float(np.max(amount))
    found = [chain.joints[k].name for k, a in zip(chain.row_joint, amount, strict=True) if a > _TAKES_PART * top]
    return tuple(dict.fromkeys(found))


def _freed(chain: Chain, at: Poses, null: Array, rank: int) -> bool:
    """True if a small move along some free motion raises the rank: the excess was of this pose only."""
    rng = np.random.default_rng(0)
    for _ in range(4):
        way = rng.normal(size=len(null)) @ null
        nudge = (way * _NUDGE * chain.size / chain.column_size).tolist()
        there = _closed(chain, moved(at, nudge))
        if there is None:
            continue
        s = np.linalg.svd(_jacobian(chain, there), compute_uv=False)
        if int(np.sum(s > 1e-7 * s[0])) > rank:
            return True
    return False


def _closed(chain: Chain, at: Poses) -> Poses | None:
    """Gauss-Newton with the shortest steps: closes a chain that has freedoms left."""
    bare = Chain(chain.moving, chain.joints, None, chain.size)
    for _ in range(20):
        gaps, entries = bare.equations(at, None)
        if bare.worst(gaps) < 1e-12:
            return at
        step = np.linalg.lstsq(bare.dense(entries), single(gaps) * bare.row_size, rcond=1e-8)[0] / bare.column_size
        at = moved(at, step.tolist())
    return None
