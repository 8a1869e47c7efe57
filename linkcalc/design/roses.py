"""Load roses: where the force of a joint points as one member sees it, and the sector that it leaves free."""

from __future__ import annotations

import numpy as np

from linkcalc.design.pins_answer import Rose
from linkcalc.parts.pose import Array, Mask

SECTORS = 36
FAINT = 0.01
"""Part of its largest below which a force is no load: where it passes through nothing it points anywhere."""
_WIDE = np.radians(4.0)  # a step of the direction above which the force between two poses is followed more finely
_FINE = 16
_TURN = 2 * np.pi


def rose(fx: Array, fy: Array, turn: Array) -> Rose:
    """The rose of a member.

    fx, fy  (case, pose) [N] force on it, ground axes
    turn    (case, pose) [rad] direction of its own axis
    """
    x = fx * np.cos(turn) + fy * np.sin(turn)
    y = fy * np.cos(turn) - fx * np.sin(turn)
    force = np.hypot(x, y)
    largest = float(np.max(force, initial=0.0, where=np.isfinite(force)))
    with np.errstate(invalid="ignore"):
        direction = np.where(force > FAINT * largest, np.arctan2(y, x) % _TURN, np.nan)
    starts, ends, sizes = _arcs(x, y, FAINT * largest)
    return Rose(direction, force, _sectors(starts, ends, sizes), _free(starts, ends))


def _arcs(x: Array, y: Array, faint: float) -> tuple[Array, Array, Array]:
    """What the force sweeps from pose to pose: from, to [rad], 0 <= from <= to, and its size [N] there."""
    with np.errstate(invalid="ignore"):
        far = np.abs(_between(x, y)) > _WIDE
        loaded = np.hypot(x, y) > faint
    here = np.arctan2(y[loaded], x[loaded]) % _TURN
    pieces = [(here, here, np.hypot(x, y)[loaded]), _swept(x, y, faint, ~far)]
    case, pose = np.nonzero(far)
    if case.size:
        # where the direction changes fast the components are taken to go evenly from one pose to the next
        part = np.linspace(0.0, 1.0, _FINE + 1)
        fx, fy = (v[case, pose, None] + (v[case, pose + 1] - v[case, pose])[:, None] * part for v in (x, y))
        pieces.append(_swept(fx, fy, faint, np.ones((case.size, _FINE), bool)))
    starts, ends, sizes = (np.concatenate(v) for v in zip(*pieces, strict=True))
    return starts, ends, sizes


def _swept(x: Array, y: Array, faint: float, wanted: Mask) -> tuple[Array, Array, Array]:
    """Arcs between neighbours that are both loaded, where they are wanted."""
    size = np.hypot(x, y)
    with np.errstate(invalid="ignore"):
        both = (size[:, :-1] > faint) & (size[:, 1:] > faint) & wanted
    turned = _between(x, y)[both]
    start = (np.arctan2(y, x)[:, :-1][both] + np.minimum(turned, 0.0)) % _TURN
    return start, start + np.abs(turned), np.maximum(size[:, :-1], size[:, 1:])[both]


def _between(x: Array, y: Array) -> Array:
    """[rad] turn from each place of a row to the next, the shorter way."""
    ax, ay, bx, by = x[:, :-1], y[:, :-1], x[:, 1:], y[:, 1:]
    turned: Array = np.arctan2(ax * by - ay * bx, ax * bx + ay * by)
    return turned


def _sectors(starts: Array, ends: Array, sizes: Array) -> Array:
    """(36) the largest size in each sector that an arc reaches, the first sector half on either side of the axis."""
    out = np.zeros(SECTORS)
    wide = _TURN / SECTORS
    first, last = (np.floor(v / wide + 0.5).astype(int) for v in (starts, ends))
    for more in range(int(np.max(last - first, initial=-1)) + 1):
        here = first + more <= last
        np.maximum.at(out, (first[here] + more) % SECTORS, sizes[here])
    return out


def _free(starts: Array, ends: Array) -> tuple[float, float] | None:
    """The widest gap between arcs."""
    if not starts.size:
        return None
    over = ends > _TURN  # these cover the beginning of the turn too
    starts, ends = np.concatenate([starts, np.zeros(int(over.sum()))]), np.concatenate([ends, ends[over] - _TURN])
    order = np.argsort(starts)
    starts, reached = starts[order], np.maximum.accumulate(ends[order])
    gaps = np.append(starts[1:], starts[0] + _TURN) - reached
    k = int(np.argmax(gaps))
    if gaps[k] <= 0:
        return None
    begin = float(reached[k] % _TURN)
    return begin, begin + float(gaps[k])
