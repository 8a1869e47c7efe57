"""Close the loops: bring a batch of poses onto the constraints, and tell how it moves from there.

A turn is carried as cosine and sine; a Newton step turns them by atan(step) and norms them again, so no
trigonometric function is called in the loop, and a wild step never turns more than a quarter.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.eliminate import Factored
from linkcalc.parts.contract import Drive
from linkcalc.parts.pose import Array, Poses, Value

CLOSED = 1e-12  # largest gap of a closed pose, over the size of the mechanism
_AIM = 2e-15  # no use in iterating below this
_QUADRATIC = 1e-7  # a step this small leaves an error of its square
_STEPS = 12


@dataclass(frozen=True, eq=False)
class Closed:
    """A batch of poses brought onto the constraints.

    at        the poses
    entries   of the Jacobian there
    fine      (1, variant, pose) True where the gaps are closed
    worst     (1, variant, pose) largest gap over the size of the mechanism
    factored  factors of the Jacobian there
    speed     dq/d(drive): x, y [.. per unit of the drive], turn of each member, in the order of the columns;
              empty without a drive
    """

    at: Poses
    entries: list[Value]
    fine: NDArray[np.bool_]
    worst: Array
    factored: Factored
    speed: list[Value]


def close(chain: Chain, guess: Poses, drive: Drive | None, steps: int = _STEPS) -> Closed:
    """Newton from a guess. Entries that do not arrive are told by ``fine``. Raises NoPlan where all are singular."""
    at = guess
    last = np.inf
    for _ in range(steps):
        equations = chain.equations(at, drive)
        finite = equations.worst[np.isfinite(equations.worst)]
        worst = float(finite.max()) if finite.size else 0.0
        # rounding sets the floor: stop where a further step gains nothing
        if worst <= _AIM or (worst <= CLOSED / 10 and worst > 0.1 * last) or drive is None:
            break
        step = chain.factor(equations.entries).solve(equations.gaps)
        at = moved(at, step)
        last = worst
    else:
        equations = chain.equations(at, drive)
    factored = chain.factor(equations.entries)
    speed: list[Value] = []
    if drive is not None:
        speed = factored.solve([0.0] * (chain.rows - 1) + [1.0])
    fine = np.asarray(equations.worst <= CLOSED)
    return Closed(at, equations.entries, fine, equations.worst, factored, speed)


def moved(at: Poses, step: Sequence[Value]) -> Poses:
    """Poses less a step: every member shifted by -dx, -dy and turned by -atan(dturn)."""
    x, y, c, s = [at.x[0]], [at.y[0]], [at.c[0]], [at.s[0]]
    for k in range(1, len(at.x)):
        dx, dy, dt = step[3 * k - 3 : 3 * k]
        x.append(at.x[k] - dx)
        y.append(at.y[k] - dy)
        c1, s1 = at.c[k] + at.s[k] * dt, at.s[k] - at.c[k] * dt
        norm = 1.0 / np.sqrt(c1 * c1 + s1 * s1)
        c.append(c1 * norm)
        s.append(s1 * norm)
    return Poses(x, y, c, s, at.down, at.field)


def between(a: Closed, b: Closed, t: Value, span: Value) -> Poses:
    """Poses on the cubic through two closed poses and their speeds; t = 0 at a, 1 at b, outside it runs on.

    span  drive at b less drive at a; the error goes with its fourth power
    """
    t2 = t * t
    t3 = t2 * t
    h00, h10, h01, h11 = 2 * t3 - 3 * t2 + 1, (t3 - 2 * t2 + t) * span, 3 * t2 - 2 * t3, (t3 - t2) * span
    pa, pb = a.at, b.at
    x, y, c, s = [pa.x[0]], [pa.y[0]], [pa.c[0]], [pa.s[0]]
    for k in range(1, len(pa.x)):
        (vxa, vya, vta), (vxb, vyb, vtb) = a.speed[3 * k - 3 : 3 * k], b.speed[3 * k - 3 : 3 * k]
        x.append(h00 * pa.x[k] + h01 * pb.x[k] + h10 * vxa + h11 * vxb)
        y.append(h00 * pa.y[k] + h01 * pb.y[k] + h10 * vya + h11 * vyb)
        c1 = h00 * pa.c[k] + h01 * pb.c[k] - h10 * (pa.s[k] * vta) - h11 * (pb.s[k] * vtb)
        s1 = h00 * pa.s[k] + h01 * pb.s[k] + h10 * (pa.c[k] * vta) + h11 * (pb.c[k] * vtb)
        norm = 1.0 / np.sqrt(c1 * c1 + s1 * s1)
        c.append(c1 * norm)
        s.append(s1 * norm)
    return Poses(x, y, c, s, pa.down, pa.field)


def along(a: Closed, step: Value) -> Poses:
    """Poses a step of the drive on, straight along the speed."""
    return moved(a.at, [-step * v if not (isinstance(v, float) and v == 0.0) else 0.0 for v in a.speed])


def fastest(chain: Chain, speed: Sequence[Value]) -> Value:
    """Largest speed of any coordinate, turns counted at the size of the mechanism: (1, variant, pose)."""
    top: Value = 0.0
    for v, size in zip(speed, chain.column_size, strict=True):
        if not (isinstance(v, float) and v == 0.0):
            top = np.maximum(top, np.abs(v) if size == 1.0 else np.abs(v) * size)
    return top
