"""Close the loops: bring a batch of poses onto the constraints, and tell how it moves from there.

A turn is carried as cosine and sine; a Newton step turns them by atan(step) and norms them again, so no
trigonometric function is called in the loop, and a wild step never turns more than a quarter. A single pose may come as
Python floats, which is faster for one and takes the same way through the code.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Protocol

import numpy as np

from linkcalc.mechanics.batch import SHORT
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.eliminate import Factors
from linkcalc.parts.contract import Drive
from linkcalc.parts.pose import Array, Codes, Mask, Poses, Value

CLOSED = 1e-12  # largest gap of a closed pose, over the size of the mechanism
_AIM = 2e-15  # no use in iterating below this
_SPARE = 2e-3  # of what is allowed: what Newton is made to reach
_STEPS = 12


class Known(Protocol):
    """Closed poses with their speeds, in the order of the columns."""

    @property
    def at(self) -> Poses: ...
    @property
    def speed(self) -> list[Value]: ...


@dataclass(frozen=True, eq=False)
class Closed:
    """A batch of poses brought onto the constraints.

    at        the poses
    entries   of the Jacobian there
    fine      (1, variant, pose) True where the gaps are closed
    worst     largest gap of those, over the size of the mechanism
    factored  factors of the Jacobian there
    speed     dq/d(drive): x, y, turn of each member, in the order of the columns; empty without a drive
    steady    (case, variant, pose) of free members: +1 stable, 0 neutral, -1 unstable; None: there are none
    """

    at: Poses
    entries: list[Value]
    fine: Mask
    worst: float
    factored: Factors
    speed: list[Value]
    steady: Codes | None = None


def close(
    chain: Chain,
    guess: Poses,
    drive: Drive | None,
    *,
    steps: int = _STEPS,
    sure: int = 0,
    within: float = CLOSED,
    live: Mask | None = None,
    held: Sequence[Drive] = (),
) -> Closed:
    """Newton from a guess. Entries that do not arrive are told by ``fine``. Raises NoPlan where all are singular.

    steps  how many at most
    sure   that many are made without asking whether they are needed
    within the largest gap of a closed pose, over the size of the mechanism
    live   (1, variant, pose) only these are waited for
    held   rows of the chain's holds
    """
    at, last, worst = guess, math.inf, math.inf
    lone = isinstance(guess.c[-1], float)
    for k in range(steps + 1):
        gaps, entries = chain.equations(at, drive, held)
        if k >= sure:
            worst = chain.worst(gaps, live)
            # rounding sets the floor: stop where a further step gains nothing
            if worst <= max(_AIM, within * _SPARE) or not (drive or held) or k == steps:
                break
            if worst <= within / 10 and worst > 0.1 * last:
                break
            last = worst
        at = moved(at, chain.factor(entries, at, lone=lone).solve(gaps))
    fine = np.ones((1, 1, 1) if lone else _batch(at), bool)
    if not worst <= within or live is not None:
        each = chain.worst_each(gaps)
        fine = fine & (each <= within)
        worst = float(each[np.broadcast_to(fine, each.shape)].max(initial=0.0))
    factored = chain.factor(entries, at, lone=lone)
    speed = factored.solve([0.0] * (chain.rows - 1) + [1.0]) if drive is not None else []
    return Closed(at, entries, fine, worst, factored, speed)


def _batch(at: Poses) -> tuple[int, ...]:
    return np.broadcast_shapes((1, 1, 1), *(np.shape(c) for c in at.c))


def moved(at: Poses, step: Sequence[Value]) -> Poses:
    """Poses less a step: every member shifted by -dx, -dy and turned by -atan(dturn)."""
    turn = at.c[-1]
    if not isinstance(turn, float) and turn.size <= SHORT:
        return _moved_short(at, step)
    x, y, c, s = [at.x[0]], [at.y[0]], [at.c[0]], [at.s[0]]
    for k in range(1, len(at.x)):
        dx, dy, dt = step[3 * k - 3 : 3 * k]
        x.append(at.x[k] - dx)
        y.append(at.y[k] - dy)
        ck, sk = _normed(at.c[k] + at.s[k] * dt, at.s[k] - at.c[k] * dt)
        c.append(ck)
        s.append(sk)
    return Poses(x, y, c, s, at.down, at.field)


def _moved_short(at: Poses, step: Sequence[Value]) -> Poses:
    """The same with all members in one array: for a short batch the number of calls counts."""
    shape = np.broadcast_shapes((1, 1, 1), *(v.shape for v in (*step, at.c[-1]) if not isinstance(v, float)))
    moves = np.empty((len(step), *shape))
    for k, value in enumerate(step):
        moves[k] = value
    stacked = np.empty((4, len(at.x) - 1, *shape))
    for row, values in zip(stacked, (at.x, at.y, at.c, at.s), strict=True):
        for k, value in enumerate(values[1:]):
            row[k] = value
    c, s, dt = stacked[2], stacked[3], moves[2::3]
    turned = [np.asarray(v) for v in _normed(c + s * dt, s - c * dt)]
    x, y = stacked[0] - moves[0::3], stacked[1] - moves[1::3]
    return Poses([at.x[0], *x], [at.y[0], *y], [at.c[0], *turned[0]], [at.s[0], *turned[1]], at.down, at.field)


def between(a: Known, b: Known, t: Value, span: Value) -> Poses:
    """Poses on the cubic through two closed poses and their speeds; t = 0 at a, 1 at b, outside it runs on.

    Only turns are foretold: places follow from them in one Newton step, for the constraints are linear in them.
    span  drive at b less drive at a; the error goes with its fourth power
    """
    weights = cubic(t, span)
    pa, pb = a.at, b.at
    c, s = [pa.c[0]], [pa.s[0]]
    for k in range(1, len(pa.x)):
        wa, wb = a.speed[3 * k - 1], b.speed[3 * k - 1]
        ck, sk = turned_between(weights, (pa.c[k], pa.s[k], wa), (pb.c[k], pb.s[k], wb))
        c.append(ck)
        s.append(sk)
    return Poses(pb.x, pb.y, c, s, pa.down, pa.field)


Weights = tuple[Value, Value, Value, Value]
Turning = tuple[Value, Value, Value]


def cubic(t: Value, span: Value) -> Weights:
    """Weights of value and slope at the start, value and slope at the end, of the cubic between two poses."""
    t2 = t * t
    t3 = t2 * t
    late = 3 * t2 - 2 * t3
    return 1 - late, (t3 - 2 * t2 + t) * span, late, (t3 - t2) * span


def turned_between(weights: Weights, a: Turning, b: Turning) -> tuple[Value, Value]:
    """Cosine and sine of a turn between two, from cosine, sine and speed of both."""
    h00, h10, h01, h11 = weights
    (ca, sa, wa), (cb, sb, wb) = a, b
    ga, gb = h10 * wa, h11 * wb
    return _normed(h00 * ca + h01 * cb - ga * sa - gb * sb, h00 * sa + h01 * sb + ga * ca + gb * cb)


def placed_between(weights: Weights, a: tuple[Value, Value], b: tuple[Value, Value]) -> Value:
    """A place between two on the cubic, from place and speed of both."""
    h00, h10, h01, h11 = weights
    return h00 * a[0] + h10 * a[1] + h01 * b[0] + h11 * b[1]


def rolled(at: Poses, way: Sequence[Value]) -> Poses:
    """Poses moved by a way, (columns), however far: turned by just that."""
    x, y, c, s = [at.x[0]], [at.y[0]], [at.c[0]], [at.s[0]]
    for k in range(1, len(at.x)):
        dx, dy, turn = way[3 * k - 3 : 3 * k]
        ct, st = np.cos(turn), np.sin(turn)
        x.append(at.x[k] + dx)
        y.append(at.y[k] + dy)
        c.append(at.c[k] * ct - at.s[k] * st)
        s.append(at.s[k] * ct + at.c[k] * st)
    return Poses(x, y, c, s, at.down, at.field)


def turn_from(a: Poses, b: Poses, member: int) -> Value:
    """[rad] how far a member has turned from one batch to another, within half a turn."""
    ca, sa, cb, sb = a.c[member], a.s[member], b.c[member], b.s[member]
    turn: Value = np.arctan2(sb * ca - cb * sa, cb * ca + sb * sa)
    return turn


def wound(value: Value, near: float) -> Value:
    """[rad] an angle, whole turns added so that it is within half a turn of another."""
    return value + 2 * np.pi * np.round((near - value) / (2 * np.pi))


def along(a: Known, step: Value) -> Poses:
    """Poses a step of the drive on, straight along the speed."""
    return moved(a.at, [-step * v if not (isinstance(v, float) and v == 0.0) else 0.0 for v in a.speed])


def _normed(c: Value, s: Value) -> tuple[Value, Value]:
    if isinstance(c, float) and isinstance(s, float):
        size = math.hypot(c, s)
        return c / size, s / size
    norm = 1.0 / np.sqrt(c * c + s * s)
    return c * norm, s * norm


def fastest(chain: Chain, speed: Sequence[Value]) -> Value:
    """Largest speed of any coordinate, turns counted at the size of the mechanism: (1, variant, pose)."""
    top: Value = 0.0
    for v, size in zip(speed, chain.column_size, strict=True):
        if not (isinstance(v, float) and v == 0.0):
            top = np.maximum(top, np.abs(v) if size == 1.0 else np.abs(v) * size)
    return top


def single(values: Sequence[Value]) -> Array:
    """(values) of the first pose of a batch, as one vector."""
    return np.array([v if isinstance(v, float) else np.ravel(v)[0] for v in values], float)


def table(pose: Known) -> Array:
    """(5, members) of a single pose: x and y, cosine, sine and speed of the turn of each moving member."""
    at = pose.at
    rows = single([*at.x[1:], *at.y[1:], *at.c[1:], *at.s[1:], *pose.speed[2::3]])
    return rows.reshape(5, -1)


def alone(at: Poses) -> Poses:
    """The first pose of a batch as Python floats; gravity stays what it is in each case."""
    x, y, c, s = (single(v).tolist() for v in (at.x, at.y, at.c, at.s))
    return Poses(x, y, c, s, at.down, at.field)
