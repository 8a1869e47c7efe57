"""Random machines, drawn so that they always close: a crank or a bed, then dyads hung on to what is there already.

A dyad is two members with three joints, or one with a pin and a slot: it adds no freedom. Each is drawn from its free
joint outwards with an angle of transmission that is never flat, so no drawing has to be thrown away.
"""

from __future__ import annotations

from collections.abc import Callable
from math import atan2, cos, degrees, hypot, radians, sin
from typing import Any

from hypothesis import assume
from hypothesis import strategies as st

from linkcalc import Faults, stroke
from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.mechanism import Case, Gravity, GravityChange, Mechanism, Member, Stroke
from linkcalc.parts.coordinates.distance import Distance
from linkcalc.parts.coordinates.turn import Turn
from linkcalc.parts.joints.slide import Slide
from linkcalc.parts.joints.slot import Slot
from linkcalc.parts.joints.weld import Weld
from linkcalc.parts.loads.force import Force
from linkcalc.parts.loads.pair import Pair
from linkcalc.parts.loads.torque import Torque
from linkcalc.parts.loads.weight import Weight
from linkcalc.parts.points.coordinates import Coordinates

Draw = Callable[[st.SearchStrategy[Any]], Any]
FLATTEST = 45.0
"""[deg] no angle of transmission is flatter than this as drawn"""
SHORTEST = 10.0
"""[mm] no line that gives a direction is shorter than this"""


class Board:
    """A drawing board: points [mm], members and joints so far."""

    def __init__(self, draw: Draw):
        self.draw = draw
        self.points: dict[str, tuple[float, float]] = {}
        self.members: dict[str, list[str]] = {"ground": []}
        self.slots: dict[str, Slot] = {}
        self.slides: dict[str, Slide] = {}
        self.welds: dict[str, Weld] = {}

    def number(self, low: float, high: float) -> float:
        return round(float(self.draw(st.floats(low, high))), 3)

    def one_of(self, *items: Any) -> Any:
        return self.draw(st.sampled_from(items))

    def yes(self) -> bool:
        return bool(self.draw(st.booleans()))

    def way(self) -> tuple[float, float]:
        """Some direction."""
        angle = radians(self.number(0, 360))
        return cos(angle), sin(angle)

    def point(self, x: float, y: float, *members: str) -> str:
        name = f"P{len(self.points)}"
        self.points[name] = (x, y)
        for member in members:
            self.members[member].append(name)
        return name

    def beside(self, point: str, *members: str, near: float = 20, far: float = 120) -> str:
        """A new point some way off another."""
        (x, y), (u, v), r = self.points[point], self.way(), self.number(near, far)
        return self.point(x + r * u, y + r * v, *members)

    def member(self, *points: str) -> str:
        name = f"m{len(self.members)}"
        self.members[name] = list(points)
        return name

    def moving(self) -> list[str]:
        return [name for name in self.members if name != "ground"]

    def hold(self) -> str:
        """A point of some member, an old one or a new one: where something can be hung on."""
        member = self.one_of(*self.members)
        carried = self.members[member]
        if carried and self.yes():
            return str(self.one_of(*carried))
        return self.beside(carried[0], member) if carried else self.point(self.number(-50, 50), 0.0, member)

    def away(self, u: float, v: float) -> tuple[float, float]:
        """A direction that crosses another at no flat angle."""
        by = radians(self.number(FLATTEST, 180 - FLATTEST) * self.one_of(1, -1))
        return u * cos(by) - v * sin(by), u * sin(by) + v * cos(by)


def two_links(board: Board) -> None:
    """Two members pinned to each other and each to something that is there; the second may carry a tip."""
    first = board.hold()
    joint = board.beside(first, near=40)
    (x, y), (px, py) = board.points[joint], board.points[first]
    far = hypot(x - px, y - py)
    u, v = board.away((x - px) / far, (y - py) / far)
    r = board.number(40, 120)
    second = board.point(x + r * u, y + r * v, board.one_of(*board.members))
    board.member(first, joint)
    link = board.member(second, joint)
    if board.yes():
        board.beside(joint, link)


def link_in_slot(board: Board) -> None:
    """A link whose far end is guided along a line of something that is there."""
    first = board.hold()
    end, on = board.beside(first, near=40), board.one_of(*board.members)
    name = board.member(first, end)
    board.slots[f"s{len(board.slots)}"] = Slot(end, _line(board, end, first), on=on, of=name if board.yes() else None)


def link_and_ram(board: Board) -> None:
    """A link that moves a ram in a guide; the guide may run beside the told point."""
    first = board.hold()
    wrist, on = board.beside(first, near=40), board.one_of(*board.members)
    along = _line(board, wrist, first)
    board.member(first, wrist)
    ram = board.member(wrist)
    nose = board.beside(wrist, ram)
    board.slides[f"g{len(board.slides)}"] = Slide(ram, along, on=on, at=board.one_of(None, wrist, nose))


def rocker_on_pin(board: Board) -> None:
    """A rocker with a slot that embraces a point that is there: a pin itself, or the point of one member."""
    point = board.one_of(*(p for m in board.moving() for p in board.members[m]))
    pivot = board.beside(point, board.one_of(*board.members), near=40)
    rocker = board.member(pivot)
    (x, y), (px, py) = board.points[point], board.points[pivot]
    board.beside(pivot, rocker)
    # a line at an angle to the arm, never square to it: the slot's force then has a lever about the pivot
    turn, far = radians(board.number(-90 + FLATTEST, 90 - FLATTEST)), hypot(x - px, y - py)
    u, v = (x - px) / far, (y - py) / far
    u, v = u * cos(turn) - v * sin(turn), u * sin(turn) + v * cos(turn)
    carriers = [m for m, points in board.members.items() if point in points]
    start, stop = board.point(x - 60 * u, y - 60 * v), board.point(x + 90 * u, y + 90 * v)
    board.slots[f"s{len(board.slots)}"] = Slot(
        point, (start, stop), on=rocker, of=board.one_of(None, *(m for m in carriers if m != "ground"))
    )


def welded_arm(board: Board) -> None:
    """An arm welded to a member that is there."""
    base = board.one_of(*board.moving()) if board.moving() else "ground"
    foot = board.beside(board.members[base][0], base) if board.members[base] else board.point(0.0, 0.0, base)
    arm = board.member(foot)
    board.beside(foot, arm)
    pair = (arm, base) if board.yes() else (base, arm)
    board.welds[f"w{len(board.welds)}"] = Weld(pair, foot)


def _line(board: Board, at: str, link: str) -> Any:
    """A line through a point that does not stand square to a link that ends there: as two points or as an angle."""
    (x, y), (px, py) = board.points[at], board.points[link]
    far = hypot(x - px, y - py)
    angle = board.number(-90 + FLATTEST, 90 - FLATTEST)
    c, s, u, v = cos(radians(angle)), sin(radians(angle)), (x - px) / far, (y - py) / far
    u, v = u * c - v * s, u * s + v * c
    start, stop = board.point(x - 70 * u, y - 70 * v), board.point(x + 50 * u, y + 50 * v)
    return (start, stop)


PLAIN_DYADS = (two_links, link_in_slot, link_and_ram, rocker_on_pin)
DYADS = (*PLAIN_DYADS, welded_arm)


def _force(board: Board, size: float | None, plain: bool) -> Force:
    """At a point of a moving member, or on a pin itself."""
    member = board.one_of(*board.moving())
    point = board.one_of(*board.members[member])
    on = member if plain or board.yes() else None
    way = board.one_of("fixed", "turning") if plain else board.one_of("fixed", "turning", "along", "square to")
    ends = [p for p, place in board.points.items() if _apart(place, board.points[point]) and _carried(board, p)]
    if way in ("fixed", "turning") or not ends:
        turns = None if way != "turning" else (member if plain else board.one_of(*board.moving()))
        return Force(point, on=on, direction=board.number(-180, 180), turns_with=turns, size=size)
    line = {"along" if way == "along" else "square_to": (point, board.one_of(*ends))}
    return Force(point, on=on, size=size, **line)


def _load(board: Board, plain: bool) -> Any:
    size = board.number(-300, 300)
    kind = board.one_of("force", "torque", "pair", "mass")
    moving = board.moving()
    if kind == "torque":
        first = board.one_of(*moving)
        return Torque(first, against=board.one_of(*(m for m in board.members if m != first)), size=size / 10)
    if kind == "mass":
        member = board.one_of(*moving)
        return Weight(board.one_of(*board.members[member]), abs(size) / 50, on=member if plain or board.yes() else None)
    if kind == "pair":
        first = board.one_of(*moving)
        a = board.one_of(*board.members[first])
        ends = [(m, p) for m, points in board.members.items() for p in points
                if m != first and _apart(board.points[a], board.points[p])]  # fmt: skip
        if ends:
            second, b = board.one_of(*ends)
            # between two pins that the same member stands for it would do nothing
            alike = _hub(board, a) == _hub(board, b)
            on = (first, second) if plain or alike or board.yes() else None
            return Pair((a, b), on=on, size=size)
    return _force(board, size, plain)


def _hub(board: Board, point: str) -> str:
    """Who stands for a pin: the ground, else the first that names it."""
    carriers = [member for member, points in board.members.items() if point in points]
    return "ground" if "ground" in carriers else carriers[0]


def _apart(a: tuple[float, float], b: tuple[float, float]) -> bool:
    return hypot(a[0] - b[0], a[1] - b[1]) >= SHORTEST


def _carried(board: Board, point: str) -> bool:
    return any(point in points for points in board.members.values())


def _finish(board: Board, plain: bool, **more: Any) -> Mechanism:
    masses = {m: board.number(0.1, 9) for m in board.moving() if board.yes()}
    members = {name: Member(tuple(points), mass=masses.get(name)) for name, points in board.members.items()}
    loads = {f"l{k}": _load(board, plain) for k in range(board.one_of(0, 1, 2))}
    return Mechanism(
        points={name: Coordinates(x, y) for name, (x, y) in board.points.items()},
        members=members,
        joints={word: parts for word, parts in (("slot", board.slots), ("slide", board.slides), ("weld", board.welds))
                if parts},
        gravity=Gravity(direction=board.one_of(-90, board.number(-180, 180))),
        loads=loads,
        cases=_cases(board, tuple(loads)),
        **more,
    )  # fmt: skip


def _cases(board: Board, loads: tuple[str, ...]) -> dict[str, Case]:
    if board.yes():
        return {}
    tilted = Case(gravity=GravityChange(board.number(-40, 40), board.number(0.0, 3.0)))
    if not loads:
        return {"as built": Case(), "tilted": tilted}
    name = board.one_of(*loads)
    return {"eased": Case(drop=(name,)), "tilted": tilted, "heavy": Case(scale={name: board.number(-2, 4)})}


@st.composite
def machines(draw: Draw, *, plain: bool = False, most: int = 3) -> Mechanism:
    """A crank that drives up to `most` dyads; the effort is on the crank, a load on some member.

    plain  only joints and loads that the independent solution knows
    """
    board = Board(draw)
    pivot = board.point(0.0, 0.0, "ground")
    crank = board.member(pivot)
    end = board.beside(pivot, crank, near=20, far=80)
    (x, y) = board.points[end]
    # a place on the ground seen from the crank's end at no flat angle: for a cylinder, or to measure a distance
    u, v = board.away(-x / hypot(x, y), -y / hypot(x, y))
    r = board.number(40, 120)
    stand = board.point(x + r * u, y + r * v, "ground")
    for _ in range(board.one_of(*range(1, most + 1))):
        board.one_of(*(PLAIN_DYADS if plain else DYADS))(board)
    efforts: tuple[Any, ...] = (
        Torque(crank),
        Force(end, on=crank, square_to=(pivot, end)),
        Pair((stand, end), on=("ground", crank)),
    )
    loads = _force(board, board.number(20, 500), plain)
    span = board.number(1, 6) * board.one_of(1, -1)
    drawn = _axis(board, crank)
    stroke = Stroke(Turn(crank), start=drawn, stop=drawn + span, poses=7)
    if board.yes():
        far = _length(board, stand, end)
        stroke = Stroke(Distance((stand, end)), stop=far + span / 3, poses=7)
    return _finish(board, plain, effort=board.one_of(*efforts), load=loads, stroke=stroke)


@st.composite
def frames(draw: Draw, *, most: int = 4) -> Mechanism:
    """A frame without an effort: arms built into the ground, and dyads on them."""
    board = Board(draw)
    welded_arm(board)
    for _ in range(board.one_of(*range(1, most + 1))):
        board.one_of(*DYADS)(board)
    return _finish(board, plain=False, load=_force(board, board.number(20, 500), plain=False))


def solved(machine: Mechanism, **more: Any) -> StrokeAnswer:
    """The answer of a random machine; one whose few degrees of stroke run into a limit of motion is passed over."""
    try:
        return stroke(machine, **more)
    except Faults as found:
        assume("cannot be reached" not in str(found))
        raise


def _axis(board: Board, member: str) -> float:
    (ax, ay), (bx, by) = (board.points[p] for p in (board.members[member][0], board.members[member][-1]))
    return degrees(atan2(by - ay, bx - ax))


def _length(board: Board, a: str, b: str) -> float:
    (ax, ay), (bx, by) = board.points[a], board.points[b]
    return hypot(bx - ax, by - ay)
