"""The stroke of a mechanism with free members: its path, and settled poses anywhere along it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.balance import Balance, balance, failed
from linkcalc.mechanics.loose import Places
from linkcalc.mechanics.loose_walk import Jump, LooseNode, LooseWalk, walk_loose
from linkcalc.mechanics.mesh import Mesh
from linkcalc.mechanics.motion import Closed, cubic, placed_between, turned_between, wound
from linkcalc.mechanics.path import OutOfReach, Path
from linkcalc.mechanics.plan import NoPlan
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.settle import TELLS_BADLY, Settled, settle
from linkcalc.mechanics.solved import Solved, joined
from linkcalc.mechanics.state import Status
from linkcalc.model.mechanism import DRAWN, LOWER, UPPER
from linkcalc.parts.contract import Size
from linkcalc.parts.pose import Array, Numbers, Poses

_FAR = 10.0  # sizes of the mechanism that a length may run before it counts as without limit
_TRIES = 4  # choices of places for one batch


class LooseMesh(Mesh):
    """Settled poses in the order of the stroke, each case with its own; and what was found of the unknown there."""

    def __init__(self, drive: Array, known: Sequence[Closed], unknown: Array):
        """known: batches (case, 1, 1), one a node, or one for all; unknown (case, nodes)."""
        self.drive, self._unknown = drive, unknown
        self._rising = np.sign(drive[-1] - drive[0]) or 1.0
        first = known[0].at
        self._down, self._field = first.down, first.field
        cases = max(np.shape(v)[0] if np.ndim(v) else 1 for v in first.c[1:])
        self._tables = np.concatenate([_table(k, cases) for k in known], axis=3)

    def guess(self, drive: Array) -> Poses:
        return self.near(drive)[0]

    def near(self, drive: Array) -> tuple[Poses, Array]:
        """Poses near those at some values of the drive, (case, 1, values), and the unknown there."""
        last = self.drive.size - 1
        a = np.clip(np.searchsorted(self._rising * self.drive, self._rising * drive) - 1, 0, max(last - 1, 0))
        b = np.minimum(a + 1, last)
        span = self.drive[b] - self.drive[a]
        t = (drive - self.drive[a]) / np.where(span == 0.0, 1.0, span)
        weights = cubic(t, span)
        (xa, ya, ca, sa, ua, va, wa), (xb, yb, cb, sb, ub, vb, wb) = self._tables[..., a], self._tables[..., b]
        turned = turned_between(weights, (ca, sa, wa), (cb, sb, wb))
        # the places that are held may be x or y of a member, so these are foretold as well
        placed = placed_between(weights, (xa, ua), (xb, ub)), placed_between(weights, (ya, va), (yb, vb))
        x, y, c, s = (list(np.asarray(v)[:, :, None]) for v in (*placed, *turned))
        unknown = (1 - t) * self._unknown[:, a] + t * self._unknown[:, b]
        return Poses([0.0, *x], [0.0, *y], [1.0, *c], [0.0, *s], self._down, self._field), unknown[:, None]


def _table(known: Closed, cases: int) -> Array:
    """(7, members, cases, poses) x, y, cosine and sine of the turn, speeds of the three."""
    at, speed = known.at, known.speed
    shape = (cases, *known.fine.shape[1:])
    rows = [at.x[1:], at.y[1:], at.c[1:], at.s[1:], speed[0::3], speed[1::3], speed[2::3]]
    return np.array([[np.broadcast_to(v, shape)[:, 0] for v in row] for row in rows])


@dataclass(frozen=True, eq=False)
class LoosePath(Path):
    """The way of such a mechanism through its stroke.

    settled  its nodes in the order of the stroke
    jumps    where balances end and cases snap through to others
    """

    settled: tuple[LooseNode, ...] = ()
    jumps: tuple[Jump, ...] = ()

    @property
    def mesh(self) -> Mesh:
        unknown = [np.broadcast_to(n.settled.unknown, n.settled.closed.fine.shape)[:, :, 0] for n in self.settled]
        return LooseMesh(np.array([n.drive for n in self.settled]), [n.settled.closed for n in self.settled],
                         np.concatenate(unknown, axis=1))  # fmt: skip


def lay_loose_path(ready: Ready) -> LoosePath:
    """Walk through the stroke. Raises OutOfReach."""
    stroke, coordinate = ready.drawing.mechanism.stroke, ready.chain.coordinate
    assert stroke is not None and coordinate is not None
    drawn = float(np.asarray(coordinate.value(ready.start.at)).flat[0])
    angle = coordinate.kind == "angle"
    if angle:
        for size in (stroke.start, stroke.stop):
            if size not in (DRAWN, LOWER, UPPER):
                near = float(np.ravel(ready.drawing.value(size, coordinate.kind))[0])
                drawn = float(wound(drawn, near))
                break
    here = _drawn_node(ready, drawn)
    far = 2 * np.pi if angle else _FAR * ready.chain.size
    first = _to(ready, here, stroke.start, drawn, far, "from")
    start = first.nodes[-1].drive
    second = _to(ready, here, stroke.stop, start, far, "to")
    stop = second.nodes[-1].drive
    nodes: tuple[LooseNode, ...]
    if (start - drawn) * (stop - drawn) <= 0:
        nodes = (*first.nodes[::-1], *second.nodes[1:])
    else:
        nodes = second.nodes if abs(stop - drawn) >= abs(start - drawn) else first.nodes[::-1]
    limits = tuple(w.nodes[-1].drive for w in (first, second) if w.stopped)
    low, high = min(start, stop), max(start, stop)
    jumps = tuple(j for j in (*first.jumps, *second.jumps) if low <= j.drive <= high)
    return LoosePath(drawn, start, stop, (), (), limits, (), nodes, jumps)


def loose_range(ready: Ready) -> tuple[float, float, float]:
    """Lower limit, drawn value and upper limit of the drive [rad or m]; nan for a limit that is not there."""
    coordinate = ready.chain.coordinate
    assert coordinate is not None
    drawn = float(np.ravel(coordinate.value(ready.start.at))[0])
    here = _drawn_node(ready, drawn)
    far = 2 * np.pi if coordinate.kind == "angle" else _FAR * ready.chain.size
    ways = [_to(ready, here, word, drawn, far, "to") for word in (LOWER, UPPER)]
    low, high = (w.nodes[-1].drive if w.stopped else np.nan for w in ways)
    return low, drawn, high


def _drawn_node(ready: Ready, drawn: float) -> LooseNode:
    loose = ready.loose
    assert loose is not None
    places = loose.places(ready.start.at)
    assert places is not None
    target = np.full((1, 1, 1), drawn)
    return LooseNode(drawn, settle(loose, places, ready.start.at, target, ready.pushing, ready.unknown), places)


def _to(ready: Ready, start: LooseNode, end: Size, begin: float, far: float, key: str) -> LooseWalk:
    """Walk from the drawing pose to one end of the stroke."""
    assert ready.loose is not None and ready.chain.coordinate is not None
    if end == DRAWN:
        return LooseWalk((start,), (), "")
    wordy = end in (LOWER, UPPER)
    target = begin + (far if end == UPPER else -far)
    if not wordy:
        target = float(np.ravel(ready.drawing.value(end, ready.chain.coordinate.kind))[0])
    way = walk_loose(ready.loose, ready.pushing, start, target)
    if way.stopped and not wordy:
        raise OutOfReach(key, target, way.nodes[-1].drive, way.nodes[-1].drive, "")
    return way


def solve_loose(ready: Ready, mesh: LooseMesh, drive: Array, *, checked: bool = True) -> Solved:
    """Statics of a mechanism with free members at some values of its drive (values)."""
    loose = ready.loose
    assert loose is not None
    left, parts, order = np.arange(drive.size), list[Solved](), list[Numbers]()
    for tried in range(_TRIES):
        guess, unknown = mesh.near(drive[left])
        places = loose.places(guess, (0, 0, left.size // 2))
        if places is None:
            places = tuple(h for h in ready.chain.holds)  # type: ignore[misc]
        target = drive[left].reshape(1, 1, -1)
        try:
            found = settle(loose, places, guess, target, ready.pushing, unknown, along=None)
        except NoPlan:
            found = None
        if found is None:
            break
        good = found.closed.fine.all(axis=(0, 1)) & (_reach(found, left.size) <= TELLS_BADLY)
        if tried == _TRIES - 1 or good.all():
            good = np.ones(left.size, bool)
        if good.any():
            whole = Solved(target, found.closed, settled_balance(ready, places, found.closed, checked=checked))
            parts.append(whole if good.all() else joined([whole], np.flatnonzero(good)))
            order.append(left[good])
        left = left[~good]
        if not left.size:
            break
    if len(parts) == 1:
        return parts[0]
    return joined(parts, np.argsort(np.concatenate(order)))


def settled_balance(ready: Ready, places: Places, closed: Closed, *, checked: bool = True) -> Balance:
    """Statics of settled poses; where none was found, the status says so."""
    assert ready.loose is not None
    told = balance(ready.loose.chain(places), closed, ready.pushing, checked=checked)
    return told if closed.fine.all() else failed(told, ~closed.fine, Status.UNSETTLED)


def _reach(found: Settled, poses: int) -> Array:
    """(poses) largest speed of a coordinate per unit of a place."""
    top = np.zeros(poses)
    for rate in found.rates:
        for v in rate:
            value = np.abs(np.asarray(v))
            top = np.maximum(top, value.max(axis=(0, 1)) if value.ndim == 3 else value)
    return np.where(np.isfinite(top), top, np.inf)
