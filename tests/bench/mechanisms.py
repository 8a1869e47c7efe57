"""The linkages of the benchmark as linkcalc mechanisms: drawn with compass and ruler over named dimensions.

The sizes are those of `peers/linkages.py`. Links have a tolerance, so that a changed one redraws the whole.
"""

from __future__ import annotations

from collections.abc import Mapping
from math import cos, degrees, radians
from typing import Any

from linkcalc.model.mechanism import Dimension, Mechanism, Member, Stroke
from linkcalc.parts.coordinates.distance import Distance
from linkcalc.parts.coordinates.turn import Turn
from linkcalc.parts.joints.slot import Slot
from linkcalc.parts.loads.force import Force
from linkcalc.parts.loads.pair import Pair
from linkcalc.parts.loads.torque import Torque
from linkcalc.parts.points.coordinates import Coordinates
from linkcalc.parts.points.meets import Meets
from linkcalc.parts.points.on_line import OnLine
from linkcalc.parts.points.polar import Polar
from tests.bench.peers import linkages as drawn

LINK_TOLERANCE = 0.05
"""[mm] plus and minus, of every link"""


def fourbar(poses: int = 361) -> Mechanism:
    """A crank rocks a lever with a load hung on its tip; the torque on the crank is asked, all the way round."""
    return Mechanism(
        title="Crank and rocker with a load on the rocker's tip",
        dimensions=_links(drawn.FOURBAR),
        points=_loop() | {"tip": OnLine(("D", "C"), distance=_mm(drawn.FOURBAR_TIP))},
        members=_members(ground="A D", crank="A B", coupler="B C", rocker="D C tip"),
        effort=Torque("crank"),
        load=Force("tip", direction=-90, size=drawn.FOURBAR_LOAD),
        stroke=_once_round(poses),
    )


def sixbar(poses: int = 361) -> Mechanism:
    """The same crank and rocker; an arm of the rocker moves a second rocker through a second coupler."""
    second = {
        "E": Polar("D", "arm", _deg(drawn.SIXBAR_ARM_AHEAD), line=("D", "C")),
        "G": Coordinates(*(_mm(each) for each in drawn.SIXBAR_SECOND_PIVOT)),
        "F": Meets((("E", "second_coupler"), ("G", "second_rocker")), side="left"),
        "tip": OnLine(("G", "F"), distance=_mm(drawn.SIXBAR_TIP)),
    }
    first = _members(ground="A D G", crank="A B", coupler="B C", rocker="D C E")
    return Mechanism(
        title="Crank and rocker that moves a second rocker",
        dimensions=_links(drawn.SIXBAR),
        points=_loop() | second,
        members=first | {"coupler_2": Member(("E", "F")), "rocker_2": Member(("G", "F", "tip"))},
        effort=Torque("crank"),
        load=Force("tip", direction=-90, size=drawn.SIXBAR_LOAD),
        stroke=_once_round(poses),
    )


def lazy_tongs(pairs: int, *, by_distance: bool = False, poses: int = 61) -> Mechanism:
    """Crossed pairs of bars stacked upright, raised until the bars lean 65 degrees, the load on the left top end.

    by_distance  moved by a push between the bottom ends, not by a torque on the first bar
    """
    width, rise = "bar * cos(lean)", "bar * sin(lean)"
    points, members = {"L0": Coordinates(0, 0), "R0": Coordinates(width, 0)}, {"ground": Member(("L0",))}
    for i in range(1, pairs + 1):
        points |= {
            f"L{i}": Coordinates(0, f"{i} * {rise}"),
            f"R{i}": Coordinates(width, f"{i} * {rise}"),
            f"M{i}": OnLine((f"L{i - 1}", f"R{i}"), part="0.5"),
        }
        members[f"a{i}"] = Member((f"L{i - 1}", f"M{i}", f"R{i}"))
        members[f"b{i}"] = Member((f"R{i - 1}", f"M{i}", f"L{i}"))
    raised, bottom = 65, ("L0", "R0")
    closest = _mm(drawn.TONG_BAR) * cos(radians(raised))
    return Mechanism(
        title=f"Lazy tongs of {pairs} crossed pairs",
        dimensions={
            "bar": Dimension(_mm(drawn.TONG_BAR), tol=LINK_TOLERANCE),
            "lean": Dimension(f"{_deg(drawn.TONG_DRAWN)!r} deg"),
        },
        points=points,
        members=members,
        joints={"slot": {"level": Slot("R0", along=0)}},
        effort=Pair(bottom, on=("ground", "b1")) if by_distance else Torque("a1"),
        load=Force(f"L{pairs}", direction=-90, size=drawn.TONG_LOAD),
        stroke=Stroke(Distance(bottom), stop=closest, poses=poses)
        if by_distance
        else Stroke(Turn("a1"), stop=raised, poses=poses),
    )


def _mm(metres: float) -> float:
    return round(1000 * metres, 9)


def _deg(radian: float) -> float:
    return round(degrees(radian), 9)


def _links(sizes: Mapping[str, float]) -> dict[str, Dimension]:
    return {name: Dimension(_mm(size), tol=LINK_TOLERANCE) for name, size in sizes.items()}


def _loop() -> dict[str, Any]:
    return {
        "A": Coordinates(0, 0),
        "D": Coordinates("frame", 0),
        "B": Polar("A", "crank", _deg(drawn.CRANK_DRAWN)),
        "C": Meets((("B", "coupler"), ("D", "rocker")), side="left"),
    }


def _members(**points: str) -> dict[str, Member]:
    return {name: Member(tuple(carried.split())) for name, carried in points.items()}


def _once_round(poses: int) -> Stroke:
    start = _deg(drawn.CRANK_DRAWN)
    return Stroke(Turn("crank"), start=start, stop=start + 360, poses=poses)
