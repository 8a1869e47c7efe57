"""Gears and racks: they roll without slip over many turns, and give the force along the line of action."""

from __future__ import annotations

import math

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.design.answer import StrokeAnswer
from linkcalc.parts.teeth import pitch
from tests.property.resum import unbalanced

EXACT = 1e-9
SLANT = math.tan(math.radians(20))

PAIR = """
[points]
P = [0, 0]
Q = [{apart}, 0]
a = [0, 30]
b = [{apart}, 40]
[members]
ground = ["P", "Q"]
first = ["a", "P"]
second = ["b", "Q"]
[gears.mesh]
members = ["first", "second"]
centres = ["P", "Q"]
radii = [{radii}]
{more}
[effort]
torque_on = "first"
[load]
torque_on = "second"
size = 30
[stroke]
turn = "first"
from = "drawn"
to = {to}
poses = 41
"""


def pair(first: float, second: float, to: float = 1000, more: str = "", add: str = "") -> StrokeAnswer:
    apart = abs(first - second) if "internal" in more else first + second
    return stroke(parse(PAIR.format(apart=apart, radii=f"{first}, {second}", to=to, more=more) + add))


def rolled(answer: StrokeAnswer, member: int) -> np.ndarray:
    """[rad] how far a member has turned from its first pose, whole turns counted: poses are close enough for it."""
    turn = np.unwrap(answer.turn[member, 0, 0])
    return turn - turn[0]


@pytest.mark.parametrize(("first", "second", "turns"), [(20, 60, 3.5), (20, 30, 3.5), (17, 53, 2.2), (50, 20, 1.5),
                                                         (31.4, 47.7, 0.7)])  # fmt: skip
def test_gears_turn_as_their_radii_are(first: float, second: float, turns: float) -> None:
    """r1 turn1 + r2 turn2 = 0 of gears outside; over many turns where the ratio is one of whole numbers up to 20."""
    answer = pair(first, second, -90 + 360 * turns)
    assert not answer.status.any()
    np.testing.assert_allclose(first * rolled(answer, 1) + second * rolled(answer, 2), 0.0, atol=EXACT * first)
    assert rolled(answer, 1)[-1] == pytest.approx(2 * math.pi * turns)
    np.testing.assert_allclose(answer.effort, 30 * first / second, rtol=EXACT)


@pytest.mark.parametrize(("first", "second"), [(20, 60), (60, 20), (18, 45)])
def test_a_ring_turns_the_same_way(first: float, second: float) -> None:
    answer = pair(first, second, more='mesh = "internal"', to=600)
    np.testing.assert_allclose(first * rolled(answer, 1) - second * rolled(answer, 2), 0.0, atol=EXACT * first)
    np.testing.assert_allclose(answer.effort, -30 * first / second, rtol=EXACT)
    smaller = 1 if first < second else 2
    x, y = answer.force_on("mesh", "first" if smaller == 1 else "second")[:, 0, 0]
    # the circles touch beyond the smaller gear as seen from the ring; its teeth push it towards the middle of the ring
    inward = 1.0 if smaller == 1 else -1.0
    np.testing.assert_allclose(x, inward * 30 / second * 1e3 * SLANT, rtol=EXACT)
    np.testing.assert_allclose(np.abs(y), 30 / second * 1e3, rtol=EXACT)


@pytest.mark.parametrize(("size", "sense"), [(30, 1.0), (-30, -1.0)])
def test_the_force_leans_away_whichever_way_the_torque_goes(size: float, sense: float) -> None:
    text = PAIR.format(apart=50, radii="20, 30", to=100, more="").replace("size = 30", f"size = {size}")
    x, y = stroke(parse(text)).force_on("mesh", "first")[:, 0, 0]
    np.testing.assert_allclose(x, -1000 * SLANT, rtol=EXACT)  # 30 N m over 30 mm, away from the second gear
    np.testing.assert_allclose(y, -1000 * sense, rtol=EXACT)


@pytest.mark.parametrize("angle", [14.5, 25])
def test_another_pressure_angle(angle: float) -> None:
    answer = pair(20, 30, more=f"pressure_angle = {angle}")
    x, y = answer.force_on("mesh", "second")[:, 0, 0]
    np.testing.assert_allclose(np.hypot(x, y), 1000 / math.cos(math.radians(angle)), rtol=EXACT)


def test_no_friction_no_second_sense() -> None:
    """The push apart is no friction: one answer a case, no efficiency, no band that would hold by itself."""
    answer = pair(20, 30)
    assert answer.cases == ("",)
    assert not answer.rubs
    np.testing.assert_allclose(answer.efficiency, 1.0, rtol=EXACT)
    assert {e.kind for e in answer.events} <= {"largest", "smallest"}


def test_pins_rub_under_the_whole_force() -> None:
    """Each pin feels 1000/cos 20 N and more: by hand, with friction circles of 0.5 mm, both senses.

    Second gear: 30 N m = F (30 mm -+ 0.5 mm/cos 20), F along the pitch line; effort = F (20 mm +- 0.5 mm/cos 20).
    The pins carry the same force as the mesh, for nothing else acts on the gears but couples.
    """
    rub = "\n[pins]\nP = { friction_radius = 0.5 }\nQ = { friction_radius = 0.5 }\n"
    answer = pair(20, 30, to=200, add=rub)
    assert answer.cases == ("forward", "back")
    for case, way in enumerate((-1.0, 1.0)):
        # forward turns the first counter-clockwise with a positive effort: it drives
        lever = 0.5 / math.cos(math.radians(20))
        force = 30e3 / (30 + way * lever)
        np.testing.assert_allclose(answer.effort[case], force * (20 - way * lever) / 1e3, rtol=EXACT)
        x, y = answer.force_on("mesh", "first")[:, case, 0]
        np.testing.assert_allclose(np.hypot(x, y), force / math.cos(math.radians(20)), rtol=EXACT)
    np.testing.assert_allclose(answer.frictionless_effort, 20.0, rtol=EXACT)
    assert np.all(answer.efficiency[0] < 1.0)
    for case in (0, 1):
        for member, gear, pin, torque in (("first", 20, "P", answer.effort), ("second", 30, "Q", answer.load)):
            mesh, bush = (answer.force_on(joint, member)[:, case, 0] for joint in ("mesh", pin))
            np.testing.assert_allclose(mesh + bush, 0.0, atol=1e-9 * 1e3)
            arm = gear / 1e3 * (1 if member == "first" else -1)  # the pitch point lies to the right of P, left of Q
            left = arm * mesh[1] + torque[case, 0] + answer.moment_on(pin, member)[case, 0]
            np.testing.assert_allclose(left, 0.0, atol=1e-9 * 30)
            # the couple of the pin is its friction circle times what it carries, against the turn
            np.testing.assert_allclose(np.abs(answer.moment_on(pin, member)[case, 0]),
                                       0.5e-3 * np.hypot(*bush), rtol=EXACT)  # fmt: skip


def test_a_frame_feels_the_push_apart_too() -> None:
    """Without stroke and effort, a weight on one gear and a stop on the other: the teeth still push."""
    answer = stroke(
        parse("""
[points]
P = [0, 0]
Q = [50, 0]
a = [-60, 0]
b = [50, 40]
[members]
ground = ["P", "Q"]
first = ["P", "a"]
second = ["Q", "b"]
[gears.mesh]
members = ["first", "second"]
centres = ["P", "Q"]
radii = [20, 30]
[slots.stop]
point = "b"
along = 90
[load]
at = "a"
direction = -90
size = 100
""")
    )
    x, y = answer.force_on("mesh", "first")[:, 0, 0, 0]
    assert (x, y) == pytest.approx((-300 * SLANT, -300.0), rel=EXACT)  # 100 N x 60 mm over 20 mm
    # 300 N x 30 mm on the second gear, against the slot 40 mm above Q
    assert np.hypot(*answer.force_on("stop", "second")[:, 0, 0, 0]) == pytest.approx(300 * 30 / 40, rel=EXACT)
    assert max(unbalanced(answer).values()) < EXACT


def test_a_planet_turns_by_willis() -> None:
    """Fixed ring 60, planet 20, sun 20: the sun makes 1 + 60/20 = 4 turns for one of the arm (R. Willis's relation
    of turns taken relative to the arm; common practice), the planet 1 - 60/20 = -2; here over one and a half turns."""
    answer = stroke(
        parse("""
[points]
O = [0, 0]
P = [40, 0]
s = [15, 0]
p = [50, 0]
[members]
ground = ["O"]
arm = ["O", "P"]
planet = ["p", "P"]
sun = ["s", "O"]
[gears.ring]
members = ["planet", "ground"]
centres = ["P", "O"]
radii = [20, 60]
mesh = "internal"
[gears.inner]
members = ["sun", "planet"]
centres = ["O", "P"]
radii = [20, 20]
[effort]
torque_on = "sun"
[load]
torque_on = "arm"
size = -8
[stroke]
turn = "arm"
from = 0
to = 540
poses = 73
""")
    )
    assert not answer.status.any()
    arm, planet, sun = (rolled(answer, k) for k in (1, 2, 3))
    np.testing.assert_allclose(planet, -2 * arm, atol=1e-9)
    np.testing.assert_allclose(sun, 4 * arm, atol=1e-9)
    np.testing.assert_allclose(answer.effort, 2.0, rtol=EXACT)
    assert max(unbalanced(answer).values()) < EXACT


RACK = """
[points]
C = [0, {side}25]
a = [30, {side}40]
near = [-10, 0]
far = [40, 0]
tip = [400, 0]
[members]
ground = ["C"]
wheel = ["a", "C"]
bar = ["near", "tip"]
[slides.ways]
member = "bar"
along = 0
[racks.teeth]
pinion = "wheel"
centre = "C"
radius = 25
along = ["near", "far"]
on = "bar"
[effort]
torque_on = "wheel"
[load]
at = "tip"
direction = 180
size = 400
[stroke]
turn = "wheel"
from = "drawn"
to = {to}
poses = 41
"""


@pytest.mark.parametrize(("side", "way"), [("", 1.0), ("-", -1.0)])
def test_a_rack_goes_as_far_as_its_pinion_rolls(side: str, way: float) -> None:
    """Three turns of a pinion of 25 mm above or below the rack: x = r turn; torque = force x radius."""
    answer = stroke(parse(RACK.format(side=side, to=1080)))
    assert not answer.status.any()
    went = answer.x[2, 0, 0] - answer.x[2, 0, 0, 0]
    np.testing.assert_allclose(went, way * 0.025 * rolled(answer, 1), atol=1e-12)
    np.testing.assert_allclose(answer.effort, way * 400 * 0.025, rtol=EXACT)
    x, y = answer.force_on("teeth", "wheel")[:, 0, 0]
    np.testing.assert_allclose(x, -400.0, rtol=EXACT)
    np.testing.assert_allclose(y, way * 400 * SLANT, rtol=EXACT)
    assert max(unbalanced(answer).values()) < EXACT


def test_a_wheel_rolls_along_a_fixed_rack() -> None:
    """A loaded carriage on a pinion and a rack on the ground: x = - r turn of a wheel above the line."""
    text = RACK.format(side="", to=720).replace('ground = ["C"]', 'ground = ["near"]').replace(
        'bar = ["near", "tip"]', 'bar = ["C", "tip"]').replace('on = "bar"', "")  # fmt: skip
    answer = stroke(parse(text))
    np.testing.assert_allclose(answer.x[2, 0, 0] - answer.x[2, 0, 0, 0], -0.025 * rolled(answer, 1), atol=1e-12)
    assert max(unbalanced(answer).values()) < EXACT


def test_many_copies_go_through_many_turns() -> None:
    """Copies step from pose to pose: no tooth and no turn is lost on the way, though poses are far apart."""
    text = RACK.format(side="", to=1900).replace("radius = 25", 'radius = "r"').replace("C = [0, 25]", 'C = [0, "r"]')
    model = parse(text.replace("[points]", "[dimensions]\nr = 25\n[points]", 1))
    sizes = np.array([0.02, 0.025, 0.031])
    answer = stroke(model, sizes={"r": sizes}, poses=5)
    assert not answer.status.any()
    way = answer.drive[0, 0, -1] - answer.drive[0, 0, 0]
    np.testing.assert_allclose(answer.x[2, 0, :, -1] - answer.x[2, 0, :, 0], sizes * way, rtol=1e-9)


def test_gears_that_come_out_of_mesh_are_warned_of() -> None:
    """The second gear rides on a lever whose pivot is not the centre of the first."""
    text = PAIR.format(apart=50, radii="20, 30", to=100, more="").replace(
        'ground = ["P", "Q"]', 'ground = ["P", "Z"]\nlever = ["Z", "Q"]').replace(
        "[points]", "[points]\nZ = [0, -10]").replace(
        'turn = "first"\nfrom = "drawn"\nto = 100', 'turn = "lever"\nto = 30')  # fmt: skip
    held = '[slots.still]\npoint = "a"\nalong = 20\n'
    answer = stroke(parse(text + held))
    (warned,) = [c for c in answer.caveats if c.item == "mesh"]
    # by hand: Z to Q is hypot(50, 10), from 11.31 to 30 deg; its distance from P 10 mm above Z
    far = math.hypot(50, 10)
    x, y = far * math.cos(math.radians(30)), far * math.sin(math.radians(30)) - 10
    assert f"{50 - math.hypot(x, y):.2f}" == "3.20"
    assert "into each other by 3.202 mm at 30 deg" in warned.text
    # the push apart does work there: it counts in the effort, and is still no friction
    assert max(unbalanced(answer).values()) < EXACT
    assert answer.checks.virtual_work < EXACT
    np.testing.assert_allclose(answer.frictionless_effort, answer.effort, rtol=EXACT)
    assert not [c for c in pair(20, 30).caveats if c.item == "mesh"]


@pytest.mark.parametrize(("radii", "teeth"), [((20, 60), 1), ((60, 20), 1), ((20, 30), 2), ((17, 53), 17),
                                               ((19.0, 19.0 * 21 / 20), 20), ((20, 21.01), 1)])  # fmt: skip
def test_how_far_a_turn_can_be_told(radii: tuple[float, float], teeth: int) -> None:
    assert pitch(radii) == pytest.approx(2 * math.pi * min(radii) / teeth)
