"""The linkages of the benchmark as plain data, drawn by their own compass: every competitor solves these.

Lengths in metres; the same in millimetres stand in `tests/bench/mechanisms.py`, made from these.
"""

from __future__ import annotations

from math import cos, hypot, radians, sin, sqrt

from tests.reference.linkage import Distance, Force, Linkage, Pair, Place, Slot, Torque, Turn

CRANK_DRAWN = radians(60)

FOURBAR = {"frame": 0.200, "crank": 0.060, "coupler": 0.180, "rocker": 0.120}
"""A crank that turns all the way and rocks a lever: shortest + longest is less than the other two."""
FOURBAR_TIP = 0.200
FOURBAR_LOAD = 250.0

SIXBAR = FOURBAR | {"arm": 0.150, "second_coupler": 0.160, "second_rocker": 0.140}
SIXBAR_SECOND_PIVOT = (0.360, 0.030)
SIXBAR_ARM_AHEAD = radians(-30)
SIXBAR_TIP = 0.220
SIXBAR_LOAD = 400.0

TONG_BAR = 0.300
TONG_DRAWN = radians(35)
TONG_LOAD = 500.0


def polar(start: Place, length: float, angle: float) -> Place:
    return start[0] + length * cos(angle), start[1] + length * sin(angle)


def arcs(first: Place, r: float, second: Place, s: float) -> Place:
    """Where two arcs cross, to the left of the line from the first centre to the second."""
    dx, dy = second[0] - first[0], second[1] - first[1]
    d = hypot(dx, dy)
    along = (d * d + r * r - s * s) / (2 * d)
    off = sqrt(r * r - along * along)
    return first[0] + (along * dx - off * dy) / d, first[1] + (along * dy + off * dx) / d


def beyond(start: Place, through: Place, length: float, ahead: float = 0.0) -> Place:
    """A place at a distance from the start, turned by an angle from the line to another place."""
    dx, dy = through[0] - start[0], through[1] - start[1]
    d = hypot(dx, dy)
    c, s = length * cos(ahead) / d, length * sin(ahead) / d
    return start[0] + c * dx - s * dy, start[1] + s * dx + c * dy


def _loop(sizes: dict[str, float]) -> dict[str, Place]:
    a, d = (0.0, 0.0), (sizes["frame"], 0.0)
    b = polar(a, sizes["crank"], CRANK_DRAWN)
    return {"A": a, "B": b, "C": arcs(b, sizes["coupler"], d, sizes["rocker"]), "D": d}


def fourbar() -> Linkage:
    """A crank rocks a lever with a load hung on its tip; the torque on the crank is asked."""
    places = _loop(FOURBAR)
    places["tip"] = beyond(places["D"], places["C"], FOURBAR_TIP)
    return Linkage(
        places,
        {"ground": ("A", "D"), "crank": ("A", "B"), "coupler": ("B", "C"), "rocker": ("D", "C", "tip")},
        loads=(Force("rocker", "tip", 0.0, -FOURBAR_LOAD),),
        effort=Torque("crank"),
        drive=Turn("crank"),
    )


def sixbar() -> Linkage:
    """The same crank and rocker; an arm of the rocker moves a second rocker through a second coupler."""
    places = _loop(SIXBAR)
    places["E"] = beyond(places["D"], places["C"], SIXBAR["arm"], SIXBAR_ARM_AHEAD)
    places["G"] = SIXBAR_SECOND_PIVOT
    places["F"] = arcs(places["E"], SIXBAR["second_coupler"], places["G"], SIXBAR["second_rocker"])
    places["tip"] = beyond(places["G"], places["F"], SIXBAR_TIP)
    return Linkage(
        places,
        {
            "ground": ("A", "D", "G"),
            "crank": ("A", "B"),
            "coupler": ("B", "C"),
            "rocker": ("D", "C", "E"),
            "coupler_2": ("E", "F"),
            "rocker_2": ("G", "F", "tip"),
        },
        loads=(Force("rocker_2", "tip", 0.0, -SIXBAR_LOAD),),
        effort=Torque("crank"),
        drive=Turn("crank"),
    )


def lazy_tongs(pairs: int, *, by_distance: bool = False) -> Linkage:
    """Crossed pairs of bars stacked upright, the load on the left top end.

    The left bottom end turns on the ground, the right one runs level in a slot. Bar ai leans right, bi leans left.
    They are moved by a torque on the first bar, or by a push between the bottom ends.
    """
    width, height = TONG_BAR * cos(TONG_DRAWN), TONG_BAR * sin(TONG_DRAWN)
    places, bodies = {"L0": (0.0, 0.0), "R0": (width, 0.0)}, {"ground": ("L0",)}
    for i in range(1, pairs + 1):
        places |= {f"L{i}": (0.0, i * height), f"R{i}": (width, i * height), f"M{i}": (width / 2, (i - 0.5) * height)}
        bodies[f"a{i}"] = (f"L{i - 1}", f"M{i}", f"R{i}")
        bodies[f"b{i}"] = (f"R{i - 1}", f"M{i}", f"L{i}")
    bottom = (("ground", "L0"), ("b1", "R0"))
    return Linkage(
        places,
        bodies,
        slots=(Slot("b1", "R0", (1.0, 0.0)),),
        loads=(Force(f"b{pairs}", f"L{pairs}", 0.0, -TONG_LOAD),),
        effort=Pair(bottom) if by_distance else Torque("a1"),
        drive=Distance(bottom) if by_distance else Turn("a1"),
    )
