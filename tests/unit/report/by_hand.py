"""Two answers worked out on paper, so that the report is tested without the engine.

toggle  two equal links A-B and B-C, straightened by a push down on pin B, drive a ram along the x axis against a
        load W. With both links at an angle a to the axis each carries N = W / cos a of compression, the push is
        F = 2 N sin a = 2 W tan a, the guide of the ram takes N sin a.
lever   a straight lever on pivot A: load W hung 4 in to the left, a push e square to it 12 in to the right, its own
        weight G on the pivot: e = W cos(turn) / 3, and the pivot carries what is left.
"""

from __future__ import annotations

import numpy as np

from linkcalc.design.answer import Array, Bearing, Caveat, Checks, Event, StrokeAnswer, Verdict
from linkcalc.model.mechanism import Case, Mechanism, Member, Stroke, Units
from linkcalc.parts.coordinates.turn import Turn
from linkcalc.parts.joints.slide import Slide
from linkcalc.parts.loads.force import Force
from linkcalc.parts.points.coordinates import Coordinates
from linkcalc.parts.points.polar import Polar

LINK, FIRST, LAST, POSES = 0.1, 30.0, 2.0, 57
LOADS = np.array([1000.0, 1500.0])
LBF, INCH, POUND = 4.4482216152605, 0.0254, 0.45359237


def toggle(*, lost: int = 0) -> StrokeAnswer:
    """The toggle, two cases, angles from 30 to 2 degrees; the last `lost` poses are failed ones."""
    a = np.radians(np.linspace(FIRST, LAST, POSES)).reshape(1, 1, -1)
    if lost:
        a = np.where(np.arange(POSES) >= POSES - lost, np.nan, a)
    W = LOADS.reshape(2, 1, 1) + 0 * a
    N, c, s = W / np.cos(a), np.cos(a), np.sin(a)
    effort, zero = 2 * W * np.tan(a), 0 * W
    force = {
        ("A", "ground"): (-N * c, -N * s), ("A", "crank"): (N * c, N * s),
        ("B", "crank"): (-N * c, -N * s), ("B", "link"): (N * c, -N * s),
        ("C", "link"): (-N * c, N * s), ("C", "ram"): (N * c, -N * s),
        ("guide", "ram"): (zero, N * s), ("guide", "ground"): (zero, -N * s),
    }  # fmt: skip
    first = float(np.radians(FIRST))
    top = float(2 * LOADS[1] * np.tan(first))
    largest = float(LOADS[1] / np.cos(first))
    events = [Event("largest", f"force at {j}", "heavy", first, largest, "force") for j in "ABC"]
    events.append(Event("largest", "force at guide", "heavy", first, top / 2, "force"))
    events.append(Event("largest", "effort", "heavy", first, top, "force"))
    events.append(Event("dead point", "force ratio", "", np.radians(LAST), np.nan, "number"))
    n = a.shape[-1]
    drawn = np.radians(FIRST)
    zero_place = np.zeros((1, 1, n))
    return StrokeAnswer(
        mechanism=_toggle_model(),
        cases=("light", "heavy"),
        kinds={"drive": "angle", "effort": "force", "load": "force"},
        drive_name="turn of crank",
        bearings=tuple(Bearing(j, "slide" if j == "guide" else "pin", m) for j, m in force),
        two_force=("crank", "link"),
        ropes=(),
        drive=a,
        effort=effort,
        load=W,
        tare_effort=zero,
        frictionless_effort=zero,
        efficiency=zero,
        rubs=False,
        loose=False,
        steady=np.full_like(zero, np.nan),
        force_ratio=W / effort,
        ideal_ratio=W / effort,
        force=np.array(list(force.values())),
        moment=np.zeros((8, 2, 1, n)),
        axial=np.array([-N, -N]),
        tension=np.zeros((0, 1, 1, 1)),
        x=np.array([zero_place, zero_place, LINK * c, 2 * LINK * c]),
        y=np.array([zero_place, zero_place, LINK * s, zero_place]),
        turn=np.array([zero_place, a - drawn, drawn - a, zero_place]),
        status=np.isnan(effort).astype(np.int8) * 2,
        checks=Checks(2e-16, 3e-15, 4e-15),
        events=tuple(events),
        verdicts=(
            Verdict("hand", "effort <= 2 kN", True, top, 2000.0, "force", "heavy", first),
            Verdict("grip", "force ratio >= 5 at 10 deg", False, 1 / (2 * np.tan(np.radians(10))), 5.0, "number",
                    "light", float(np.radians(10))),
        ),
        caveats=(Caveat("stroke", "it ends 2 deg before the dead point"),),
    )  # fmt: skip


def _toggle_model() -> Mechanism:
    return Mechanism(
        title="Toggle for a riveting ram",
        points={
            "A": Coordinates(0, 0),
            "B": Polar("A", 100, FIRST),
            "C": Polar("B", 100, -FIRST),
            "nose": Polar("C", 60, 0),
        },
        members={
            "ground": Member(("A",)),
            "crank": Member(("A", "B")),
            "link": Member(("B", "C")),
            "ram": Member(("C", "nose")),
        },
        joints={"slide": {"guide": Slide("ram", 0)}},
        effort=Force("B", direction=-90),
        load=Force("nose", direction=180, size="1 kN"),
        stroke=Stroke(Turn("crank"), FIRST, LAST, POSES),
        cases={"light": Case(), "heavy": Case(scale={"load": 1.5})},
        requirements={"hand": "effort <= 2 kN", "grip": "force ratio >= 5 at 10 deg"},
    )


def lever(turns: tuple[float, ...] = (0.0,)) -> StrokeAnswer:
    """The lever in inches and pounds, at these turns [deg]; a single turn is a frame without stroke."""
    t = np.radians(np.array(turns)).reshape(1, 1, -1)
    W, G = 50 * LBF, 5 * LBF
    e = W * np.cos(t) / 3
    on_lever = -e * np.sin(t), e * np.cos(t) + W + G
    stepped = len(turns) > 1
    zero: Array = 0 * t
    model = Mechanism(
        title="Hoist lever",
        units=Units(length="in", force="lbf", mass="lb", moment="in*lbf"),
        points={"A": Coordinates(0, 0), "hook": Coordinates(-4, 0), "grip": Coordinates(12, 0)},
        members={
            "ground": Member(("A",)),
            "lever": Member(("hook", "A", "grip"), mass=5, centre="A"),
        },
        effort=Force("grip", square_to=("grip", "A")),
        load=Force("hook", direction=-90, size=50),
        stroke=Stroke(Turn("lever"), turns[0], turns[-1], len(turns)) if stepped else None,
    )
    return StrokeAnswer(
        mechanism=model,
        cases=("",),
        kinds={"effort": "force", "load": "force"} | ({"drive": "angle"} if stepped else {}),
        drive_name="turn of lever" if stepped else "",
        bearings=(Bearing("A", "pin", "lever"), Bearing("A", "pin", "ground")),
        two_force=(),
        ropes=(),
        drive=t if stepped else np.full_like(t, np.nan),
        effort=e,
        load=W + zero,
        tare_effort=zero,
        frictionless_effort=zero,
        efficiency=zero,
        rubs=False,
        loose=False,
        steady=np.full_like(zero, np.nan),
        force_ratio=W / e,
        ideal_ratio=W / e,
        force=np.array([on_lever, [-f for f in on_lever]]),
        moment=np.zeros((2, *t.shape)),
        axial=np.zeros((0, *t.shape)),
        tension=np.zeros((0, 1, 1, 1)),
        x=np.array([zero, -4 * INCH * np.cos(t)]),
        y=np.array([zero, -4 * INCH * np.sin(t)]),
        turn=np.array([zero, t]),
        status=np.zeros(t.shape, np.int8),
        checks=Checks(0.0, 0.0, 1e-16),
    )
