"""linkcalc against judges that share no code with it: a physics engine, a plain script, equilibrium in letters.

Judges: `mujoco` (general-purpose physics engine, joint forces of closed linkages at rest), `scipy.optimize.root` and
`numpy.linalg.solve` in a plain script, `sympy` (symbolic equilibrium). All from PyPI; see tests/reference.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from math import asin, cos, radians, sin

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.model.mechanism import Mechanism
from tests.bench import mechanisms
from tests.bench.peers import linkages
from tests.reference import engine, plain, symbolic
from tests.reference.linkage import Linkage

TURN = np.radians(np.arange(0, 360, 15.0)) + linkages.CRANK_DRAWN
ROUNDING = 1e-9
"""of the largest force: both solve the same equations to rounding, the plain script's poses to 1e-13"""
SOFT = 2e-3
"""of the largest force: the engine's constraints give a little (at most 9.5e-4 measured on the six-bar)"""

LINKAGES: list[tuple[Callable[[], Mechanism], Callable[[], Linkage]]] = [
    (mechanisms.fourbar, linkages.fourbar),
    (mechanisms.sixbar, linkages.sixbar),
]


def ours(mechanism: Mechanism):  # type: ignore[no-untyped-def]
    """The stroke once round, at the judges' poses."""
    assert mechanism.stroke is not None
    start = f"{linkages.CRANK_DRAWN!r} rad"
    whole = replace(
        mechanism, stroke=replace(mechanism.stroke, start=start, stop=f"{start} + 345 deg", poses=TURN.size)
    )
    return stroke(whole)


def worst(answer, judge) -> float:  # type: ignore[no-untyped-def]
    """Largest difference of any joint force or of the effort, over the largest force (or effort) there is."""
    largest = float(np.max(np.hypot(answer.force[:, 0], answer.force[:, 1])))
    apart = [
        np.abs(answer.force_on(b.joint, b.member)[:, 0, 0].T - judge.force(b.joint, b.member)[:, :2]).max() / largest
        for b in answer.bearings
    ]
    effort = np.abs(answer.effort[0, 0] - judge.effort).max() / np.abs(answer.effort).max()
    return float(max(*apart, effort))


@pytest.mark.parametrize(("mechanism", "linkage"), LINKAGES, ids=["four-bar", "six-bar"])
def test_joint_forces_are_those_of_a_plain_script(
    mechanism: Callable[[], Mechanism], linkage: Callable[[], Linkage]
) -> None:
    assert worst(ours(mechanism()), plain.solve(linkage(), TURN)) < ROUNDING


@pytest.mark.parametrize(("mechanism", "linkage"), LINKAGES, ids=["four-bar", "six-bar"])
def test_joint_forces_are_those_of_a_physics_engine(
    mechanism: Callable[[], Mechanism], linkage: Callable[[], Linkage]
) -> None:
    poses = plain.solve(linkage(), TURN).poses
    assert worst(ours(mechanism()), engine.solve(linkage(), poses)) < SOFT


TOGGLE = """
[units]
length = "m"
[points]
A = [0, 0]
B = {{ from = "A", distance = {r}, angle = {p} }}
C = {{ from = "B", distance = {s}, angle = {minus_q} }}
[members]
ground = ["A"]
first = ["A", "B"]
second = ["B", "C"]
block = ["C"]
[slides.guide]
member = "block"
along = 0
at = "C"
[effort]
at = "B"
on = "first"
direction = -90
[load]
at = "C"
on = "block"
direction = 180
size = {load}
"""


@pytest.mark.parametrize(("r", "s", "p", "q"), [(0.3, 0.3, 20, 20), (0.25, 0.4, 35, 21), (0.2, 0.5, 5, 2)])
def test_toggle_in_letters(r: float, s: float, p: float, q: float) -> None:
    answer, given = symbolic.toggle()
    letters = symbolic.numeric(answer, given)(r, s, radians(p), radians(q), 800.0)
    found = stroke(parse(TOGGLE.format(r=r, s=s, p=p, minus_q=-q, load=800)))
    assert found.effort[0, 0, 0] == pytest.approx(letters["effort"], rel=1e-12)
    for joint, member, name in (("A", "first", "A"), ("C", "second", "C")):
        expected = [letters[f"{name}_x"], letters[f"{name}_y"]]
        assert found.force_on(joint, member)[:, 0, 0, 0] == pytest.approx(expected, rel=1e-11, abs=1e-9)
    # the knee is pressed through the first link, so the second feels the pin alone: its thrust
    thrust = np.hypot(letters["B_x"], letters["B_y"])
    assert found.axial_in("second")[0, 0, 0] == pytest.approx(-thrust, rel=1e-11)


TRESTLE = """
[units]
length = "m"
[points]
A = [0, 0]
E = [{span}, 0]
C = {{ on = ["A", "E"], part = 0.5, offset = {height} }}
B = {{ on = ["A", "C"], part = 0.5 }}
D = {{ on = ["E", "C"], part = 0.5 }}
P = {{ on = ["A", "C"], part = {part} }}
[members]
ground = ["A"]
left = ["A", "B", "P", "C"]
right = ["E", "D", "C"]
tie = ["B", "D"]
[slots]
E = {{ point = "E", along = 0 }}
[load]
at = "P"
direction = -90
size = {load}
"""


@pytest.mark.parametrize(("span", "height", "part"), [(2.0, 1.8, 0.75), (1.2, 2.4, 0.3)])
def test_trestle_in_letters(span: float, height: float, part: float) -> None:
    answer, given = symbolic.trestle()
    letters = symbolic.numeric(answer, given)(span, height, part, 500.0)
    text = TRESTLE.format(span=span, height=height, part=part, load=500).replace("E = { point", "foot = { point")
    found = stroke(parse(text))
    for joint, member in (("A", "left"), ("C", "left"), ("B", "tie"), ("D", "tie")):
        expected = [letters[f"{joint}_x"], letters[f"{joint}_y"]]
        assert found.force_on(joint, member)[:, 0, 0, 0] == pytest.approx(expected, rel=1e-11, abs=1e-9)
    assert found.force_on("foot", "right")[1, 0, 0, 0] == pytest.approx(letters["E_n"], rel=1e-11)
    assert found.axial_in("tie")[0, 0, 0] == pytest.approx(-letters["B_x"], rel=1e-11)


SLIDER_CRANK = """
[units]
length = "m"
[points]
O = [0, 0]
A = {{ from = "O", distance = {r}, angle = 40 }}
B = [{x}, 0]
[members]
ground = ["O"]
crank = ["O", "A"]
rod = ["A", "B"]
piston = ["B"]
[slides.bore]
member = "piston"
along = 0
[effort]
torque_on = "crank"
[load]
at = "B"
on = "piston"
direction = 180
size = 1000
"""


def test_slider_crank_torque_by_hand() -> None:
    """T = F r sin(a + b) / cos(b) with sin b = (r / l) sin a (common practice)."""
    r, rod, force, a = 0.05, 0.16, 1000.0, radians(40)
    b = asin(r / rod * sin(a))
    torque = stroke(parse(SLIDER_CRANK.format(r=r, x=r * cos(a) + rod * cos(b)))).effort[0, 0, 0]
    # the piston is pressed in, towards the crank: to hold it the crank is turned outwards, that is clockwise
    assert torque == pytest.approx(-force * r * sin(a + b) / cos(b), rel=1e-12)
