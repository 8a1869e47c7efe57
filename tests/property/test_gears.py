"""Laws of teeth in mesh on random machines: no tooth is lost, forces lie on the line of action, pins hold them."""

from __future__ import annotations

import math

import numpy as np
from hypothesis import example, given
from hypothesis import strategies as st

from linkcalc import parse, stroke
from linkcalc.design.answer import StrokeAnswer
from tests.property.resum import Resum, unbalanced

EXACT = 1e-9

TRAIN = """
[dimensions]
r1 = {r1}
r2 = {r2}
r3 = {r3}
[points]
O = [0, 0]
P = {{ from = "O", distance = "r1 + r2", angle = {lean} }}
Q = {{ from = "P", distance = "r2 + r3", angle = {turn} }}
a = {{ from = "O", distance = 30, angle = {lean} }}
b = {{ from = "P", distance = 45, angle = {turn} }}
c = {{ from = "Q", distance = 25, angle = 50 }}
[members]
ground = ["O", "P", "Q"]
first = ["a", "O"]
idler = ["P", "b"]
last = ["c", "Q"]
[gears.one]
members = ["first", "idler"]
centres = ["O", "P"]
radii = ["r1", "r2"]
pressure_angle = {slant}
[gears.two]
members = ["last", "idler"]
centres = ["Q", "P"]
radii = ["r3", "r2"]
pressure_angle = {slant}
[effort]
torque_on = "first"
[load]
at = "c"
direction = {pull}
size = 100
[stroke]
turn = "first"
from = "drawn"
to = {to}
poses = {poses}
"""

MODULE = 1.5
teeth = st.integers(12, 20)
angles = st.floats(-180, 180)


@given(teeth, st.integers(12, 90), teeth, angles, angles, angles, st.floats(10, 30), st.floats(200, 2500),
       st.sampled_from([9, 23, 61]))  # fmt: skip
def test_a_train_of_any_teeth_over_many_turns(
    z1: int, z2: int, z3: int, lean: float, turn: float, pull: float, slant: float, way: float, poses: int
) -> None:
    """The whole number of teeth that go by one gear goes by its neighbour, however far apart the poses are."""
    r1, r2, r3 = (MODULE * z / 2 for z in (z1, z2, z3))
    answer = stroke(parse(TRAIN.format(r1=r1, r2=r2, r3=r3, lean=lean, turn=turn, slant=slant, pull=pull,
                                       to=lean + way, poses=poses)))  # fmt: skip
    assert not answer.status.any()
    first, idler, last = answer.turn[1:, 0, 0]
    gone = answer.drive[0, 0] - answer.drive[0, 0, 0]
    begun = first[0], idler[0], last[0]
    for got, sense, radius, start in ((first, 1, r1, begun[0]), (idler, -1, r2, begun[1]), (last, 1, r3, begun[2])):
        wanted = start + sense * gone * r1 / radius
        np.testing.assert_allclose(np.angle(np.exp(1j * (got - wanted))), 0.0, atol=1e-9)
    assert max(unbalanced(answer).values()) < EXACT
    on_the_line_of_action(answer, math.radians(slant))


def on_the_line_of_action(answer: StrokeAnswer, slant: float) -> None:
    """Every mesh: the force makes the pressure angle with the square to the line of centres, and pushes apart."""
    table = Resum(answer)
    for name, gear in answer.mechanism.joints["gear"].items():
        (ax, ay), (bx, by) = (table.place(c, m) for c, m in zip(gear.centres, gear.members, strict=True))
        far = np.hypot(bx - ax, by - ay)
        ux, uy = (bx - ax) / far, (by - ay) / far
        fx, fy = answer.force_on(name, gear.members[0])
        along, apart = uy * fx - ux * fy, -(ux * fx + uy * fy)
        np.testing.assert_allclose(apart, np.abs(along) * math.tan(slant), rtol=1e-9, atol=1e-9 * np.abs(fx).max())


FIVE_BAR = """
[points]
A = [0, 0]
D = [{ground}, 0]
B = {{ from = "A", distance = {crank}, angle = {alpha} }}
E = {{ from = "D", distance = {rocker}, angle = {beta} }}
C = {{ meets = [["B", {rod}], ["E", {link}]], side = "left" }}
[members]
ground = ["A", "D"]
crank = {{ points = ["B", "A"], mass = 0.4 }}
rocker = ["D", "E"]
rod = {{ points = ["B", "C"], mass = 0.3 }}
link = ["C", "E"]
[gears.mesh]
members = ["crank", "rocker"]
centres = ["A", "D"]
radii = ["{ground} mm/(1 + {ratio})", "{ground} mm*{ratio}/(1 + {ratio})"]
[effort]
torque_on = "crank"
[load]
at = "C"
direction = -70
size = 150
[stroke]
turn = "crank"
line = ["A", "B"]
from = {alpha}
to = {to}
poses = 13
"""


@given(st.floats(20, 40), st.floats(20, 40), st.floats(150, 190), st.floats(150, 190), st.integers(1, 4), angles,
       angles, st.floats(-700, 700))  # fmt: skip
def test_a_geared_five_bar(crank: float, rocker: float, rod: float, link: float, ratio: int, alpha: float, beta: float,
                           way: float) -> None:  # fmt: skip
    """Two cranks in mesh with a joint between them: places from turns and two arcs, effort from virtual work."""
    ground = 120.0
    text = FIVE_BAR.format(ground=ground, crank=crank, rocker=rocker, rod=rod, link=link, ratio=ratio, alpha=alpha,
                           beta=beta, to=alpha + (way if abs(way) > 1 else 1))  # fmt: skip
    answer = stroke(parse(text))
    assert not answer.status.any()
    theta = answer.drive[0, 0]

    def meet(theta: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
        second = math.radians(beta) - (theta - math.radians(alpha)) / ratio
        b = crank * np.exp(1j * theta)
        e = ground + rocker * np.exp(1j * second)
        far = np.abs(e - b)
        along = (rod**2 - link**2 + far**2) / (2 * far)
        return b, b + (e - b) / far * (along + 1j * np.sqrt(rod**2 - along**2))

    _, c = meet(theta)
    table = Resum(answer)
    x, y = table.somewhere("C")
    np.testing.assert_allclose(np.ravel(x) * 1e3, c.real, atol=1e-8)
    np.testing.assert_allclose(np.ravel(y) * 1e3, c.imag, atol=1e-8)
    # the work of load and weights in a small turn, by central differences; masses at the middle of their members
    step, weight = 1e-5, 9.80665
    (b2, c2), (b1, c1) = meet(theta + step), meet(theta - step)
    pull = 150 * np.exp(1j * math.radians(-70))
    work = ((c2 - c1) * np.conj(pull)).real - weight * (0.4 * (b2 - b1).imag / 2 + 0.3 * (b2 - b1 + c2 - c1).imag / 2)
    np.testing.assert_allclose(answer.effort[0, 0], -work / (2 * step) / 1e3, rtol=1e-6, atol=1e-6 * 15)
    assert max(unbalanced(answer).values()) < EXACT
    on_the_line_of_action(answer, math.radians(20))


@given(teeth, st.integers(12, 80), teeth, angles, angles, st.floats(200, 2500), st.integers(2, 12))
@example(z1=18, z2=59, z3=12, lean=0.0, turn=0.0, way=342.0, poses=2)
def test_copies_lose_no_tooth(z1: int, z2: int, z3: int, lean: float, turn: float, way: float, poses: int) -> None:
    """Copies of other modules go from pose to pose, however far apart these are."""
    text = TRAIN.format(r1=f'"m*{z1}/2"', r2=f'"m*{z2}/2"', r3=f'"m*{z3}/2"', lean=lean, turn=turn, slant=20, pull=30,
                        to=lean + way, poses=9).replace("[dimensions]", "[dimensions]\nm = 1.5")  # fmt: skip
    answer = stroke(parse(text), sizes={"m": np.array([0.0015, 0.0012, 0.002])}, poses=poses)
    assert not answer.status.any()
    gone = answer.drive[0, 0] - answer.drive[0, 0, 0]
    got = answer.turn[3, 0]
    np.testing.assert_allclose(np.angle(np.exp(1j * (got - got[:, :1] - gone * z1 / z3))), 0.0, atol=1e-9)


def test_copies_step_over_a_node_that_is_a_pose() -> None:
    """A node of the walk within rounding of a pose makes no step: the next one could not be foretold by it."""
    rng = np.random.default_rng(2)
    alpha, beta = rng.uniform(-180, 180, 2)
    text = FIVE_BAR.format(ground=120, crank=rng.uniform(20, 40), rocker=30, rod=170, link=170, ratio=3, alpha=alpha,
                           beta=beta, to=alpha + 212)  # fmt: skip
    text = text.replace("[points]", "[dimensions]\nl = 170\n[points]", 1).replace('["B", 170]', '["B", "l"]')
    answer = stroke(parse(text), sizes={"l": np.array([0.16, 0.17, 0.18])}, poses=13)
    assert not answer.status.any()
    gone = answer.drive[0, 0] - answer.drive[0, 0, 0]
    second = np.angle(np.exp(1j * (answer.turn[2, 0] + gone / 3)))
    np.testing.assert_allclose(second, 0.0, atol=1e-9)
