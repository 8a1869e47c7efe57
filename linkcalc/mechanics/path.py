"""The stroke of one mechanism: where it begins and ends, the way there, and its poses."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.faults import Fault, Faults
from linkcalc.mechanics.eliminate import SMALL
from linkcalc.mechanics.excess import no_fit
from linkcalc.mechanics.mesh import Mesh
from linkcalc.mechanics.motion import Closed, alone, along, close, wound
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.walk import Node, Walk, walk
from linkcalc.model.mechanism import DRAWN, LOWER, UPPER
from linkcalc.parts.along import Standing
from linkcalc.parts.contract import Size
from linkcalc.parts.pose import Array


class OutOfReach(ArithmeticError):
    """A value of the drive that the mechanism cannot come to. All drives in [rad or m].

    end     "from" or "to": which end of the stroke
    wanted  the value; last  how far it came
    limit   the limit of motion; nan: the motion is not determined beyond `last`
    why     which members stand in line at the limit, "" if none do
    """

    def __init__(self, end: str, wanted: float, last: float, limit: float, why: str):
        super().__init__(f"{end}: {wanted} not reached, stopped at {last}")
        self.end, self.wanted, self.last, self.limit, self.why = end, wanted, last, limit, why


_SHORT = 1e-9  # of the stroke: how far short of a limit of motion its last pose stands
_BEYOND = 0.1  # of the rest of the stroke: where it is looked how far joints come apart
_FAR = 10.0  # sizes of the mechanism that a length may run before it counts as without limit


@dataclass(frozen=True, eq=False)
class Path:
    """The way of the nominal mechanism through its stroke.

    drawn        [rad or m] drive in the drawing pose
    start, stop  [rad or m] ends of the stroke
    approach     nodes from the drawing pose to the start
    nodes        nodes in the order of the stroke, from start or before it to stop or beyond
    limits       limits of motion that were met, [rad or m]
    passed       pairs of drives between which a change point was passed
    """

    drawn: float
    start: float
    stop: float
    approach: tuple[Node, ...]
    nodes: tuple[Node, ...]
    limits: tuple[float, ...]
    passed: tuple[tuple[float, float], ...]

    @property
    def mesh(self) -> Mesh | None:
        """Of the nodes; None if nothing moves."""
        if not self.nodes:
            return None
        return Mesh(np.array([n.drive for n in self.nodes]), [n.pose for n in self.nodes])

    def poses(self, count: int) -> Array:
        """(count) evenly spread values of the drive."""
        return np.linspace(self.start, self.stop, count) if self.start != self.stop else np.full(1, self.start)


def lay_path(ready: Ready) -> Path:
    """Walk through the stroke. Raises OutOfReach, and Faults if it begins at the limit where it should end."""
    stroke = ready.drawing.mechanism.stroke
    if ready.standing is not None:
        return _standing(ready, ready.standing)
    coordinate = ready.chain.coordinate
    assert stroke is not None and coordinate is not None
    drawn = float(np.asarray(coordinate.value(ready.start.at)).flat[0])
    angle = coordinate.kind == "angle"
    fixed = [ready.drawing.value(s, coordinate.kind) for s in (stroke.start, stroke.stop) if s not in _WORDS]
    if angle and stroke.start not in _WORDS:
        drawn = float(wound(drawn, float(np.asarray(fixed[0]).flat[0])))
    here = Node(drawn, _lone(ready, drawn))
    far = 2 * np.pi if angle else _FAR * ready.chain.size
    first = _to(ready, here, stroke.start, drawn, far, "from")
    start = first.nodes[-1].drive
    second = _to(ready, here, stroke.stop, start, far, "to")
    stop = second.nodes[-1].drive
    limits = tuple(w.limit for w in (first, second) if w.stopped == "limit")
    if abs(stop - start) < 1e-12 * (1.0 if angle else ready.chain.size) and stroke.stop in _WORDS:
        raise Faults(
            Fault(("stroke", "to"), "the stroke begins at the limit of motion where it ends", "give another end")
        )
    return Path(drawn, start, stop, first.nodes, _nodes(first, second), limits, _inside(first, second, start, stop))


def _standing(ready: Ready, standing: Standing) -> Path:
    """The way of a load through a mechanism that stands: nothing to walk."""
    stroke = ready.drawing.mechanism.stroke
    assert stroke is not None
    lower, drawn, upper = motion_range(ready)
    words = {DRAWN: drawn, LOWER: lower, UPPER: upper}
    start, stop = (
        words[size] if size in words else float(np.ravel(ready.drawing.value(size, standing.kind))[0])
        for size in (stroke.start, stroke.stop)
    )
    if start == stop:
        raise Faults(
            Fault(("stroke", "to"), "the stroke begins at the end of the line where it ends", "give another end")
        )
    return Path(drawn, start, stop, (), (), (), ())


def motion_range(ready: Ready) -> tuple[float, float, float]:
    """Lower limit, drawn value and upper limit of the drive [rad or m]; nan for a limit that is not there."""
    if ready.standing is not None:
        drawn, span = (np.ravel(v)[0] for v in (ready.standing.value(ready.start.at), ready.standing.span))
        return 0.0, float(drawn), float(span)
    coordinate = ready.chain.coordinate
    assert coordinate is not None
    drawn = float(np.ravel(coordinate.value(ready.start.at))[0])
    here = Node(drawn, _lone(ready, drawn))
    far = 2 * np.pi if coordinate.kind == "angle" else _FAR * ready.chain.size
    down, up = (walk(ready.chain, here, drawn + sense * far) for sense in (-1, 1))
    return down.limit, drawn, up.limit


def _nodes(first: Walk, second: Walk) -> tuple[Node, ...]:
    """One row of nodes that covers the stroke: both walks set out from the drawing pose, to one side or to two."""
    start, stop, drawn = (w.drive for w in (first.nodes[-1], second.nodes[-1], first.nodes[0]))
    if (start - drawn) * (stop - drawn) <= 0:
        return (*first.nodes[::-1], *second.nodes[1:])
    return second.nodes if abs(stop - drawn) >= abs(start - drawn) else first.nodes[::-1]


def _inside(first: Walk, second: Walk, start: float, stop: float) -> tuple[tuple[float, float], ...]:
    """Change points between start and stop."""
    low, high = min(start, stop), max(start, stop)
    pairs = {(min(p), max(p)) for p in (*first.passed, *second.passed)}
    return tuple(sorted(p for p in pairs if p[1] > low and p[0] < high))


def _lone(ready: Ready, drawn: float) -> Closed:
    """The drawing pose for the walk; of a small chain in plain floats, which is quicker for one pose at a time."""
    chain = ready.chain
    assert chain.coordinate is not None
    if isinstance(ready.start.at.c[-1], float) or chain.columns > SMALL:
        return ready.start
    return close(chain, alone(ready.start.at), chain.coordinate.hold(drawn))


_WORDS = (DRAWN, LOWER, UPPER)


def _to(ready: Ready, start: Node, end: Size, begin: float, far: float, key: str) -> Walk:
    """Walk from the drawing pose to one end of the stroke; `begin` is where a stroke without limit is counted from."""
    if end == DRAWN:
        return Walk((start,), "", np.nan, ())
    assert ready.chain.coordinate is not None
    wordy = end in (LOWER, UPPER)
    if wordy:
        target = begin + (far if end == UPPER else -far)
    else:
        target = float(np.asarray(ready.drawing.value(end, ready.chain.coordinate.kind)).flat[0])
    way = walk(ready.chain, start, target)
    if way.stopped == "limit" and (wordy or abs(way.limit - target) <= _SHORT * abs(target - start.drive)):
        short = way.limit - _SHORT * (way.limit - start.drive)
        nodes = tuple(n for n in way.nodes if abs(n.drive - start.drive) < abs(short - start.drive))
        last = walk(ready.chain, nodes[-1] if nodes else start, short)
        return Walk((*nodes[:-1], *last.nodes) if nodes else last.nodes, "limit", way.limit, way.passed)
    if way.stopped:
        far_node = way.nodes[-1]
        if way.stopped == "stuck" and ready.chain.sharing is not None:
            raise _apart(ready, far_node, target)
        why = _in_line(ready, far_node) if way.stopped == "limit" else ""
        raise OutOfReach(key, target, far_node.drive, way.limit, why)
    return way


def _apart(ready: Ready, last: Node, target: float) -> Faults:
    """Joints that come apart a little on from the last node."""
    assert ready.chain.coordinate is not None
    drive = last.drive + _BEYOND * (target - last.drive)
    there = close(ready.chain, along(last.pose, drive - last.drive), ready.chain.coordinate.hold(drive))
    return no_fit(ready.drawing, ready.chain, there, np.array([drive]))


def _in_line(ready: Ready, node: Node) -> str:
    """Which two members stand in line at a pin, as links of a chain do at its dead points."""
    drawing = ready.drawing
    best, text = 0.02, ""
    for point, pin in drawing.pins.items():
        ways: list[tuple[str, float, float]] = []
        for member in pin.members:
            ends = [p for p in drawing.mechanism.members[member].points if p in drawing.pins and p != point]
            if member == drawing.members[0] or len(ends) != 1:
                continue
            (ax, ay) = node.pose.at.spot(drawing.site(point, member))
            (bx, by) = node.pose.at.spot(drawing.site(ends[0], member))
            dx, dy = (float(np.asarray(v).flat[0]) for v in (bx - ax, by - ay))
            ways.append((member, dx, dy))
        for i, (a, ux, uy) in enumerate(ways):
            for b, vx, vy in ways[:i]:
                sine = abs(ux * vy - uy * vx) / (np.hypot(ux, uy) * np.hypot(vx, vy))
                if sine < best:
                    best, text = sine, f"{b} and {a} stand in line at {point}"
    return text
