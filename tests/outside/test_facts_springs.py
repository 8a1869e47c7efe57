"""Springs, gas springs, cylinders and screws against closed forms and printed figures, each with its source."""

from __future__ import annotations

import math

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.design.answer import StrokeAnswer

ARM = """
[units]
moment = "N*m"
[points]
A = [0, 0]
S = [{foot}]
R = {{ from = "A", distance = {hook}, angle = {start} }}
G = {{ from = "A", distance = {reach}, angle = {start} }}
[members]
ground = ["A", "S"]
arm = {{ points = ["A", "R", "G"], mass = {mass}, centre = "G" }}
[effort]
torque_on = "arm"
[loads.balancer]
{load}
[stroke]
turn = "arm"
from = {start}
to = {stop}
poses = 25
"""
"""A hinged arm with its weight at G, and something that balances it."""

EXACT = 1e-9


def arm(load: str, *, foot: tuple[float, float] = (0, 200), hook: float = 100, reach: float = 500, mass: float = 10,
        start: float = -60, stop: float = 85, more: str = "", at: list[float] | None = None
        ) -> StrokeAnswer:  # fmt: skip
    place = f"{foot[0]}, {foot[1]}"
    sizes = {"hook": hook, "reach": reach, "mass": mass, "start": start, "stop": stop}
    text = ARM.format(load=load, foot=place, **sizes)
    return stroke(parse(text + more), at=at)


def hand(answer: StrokeAnswer, push: np.ndarray, *, foot: tuple[float, float], hook: float = 0.1, reach: float = 0.5,
         mass: float = 10) -> np.ndarray:  # fmt: skip
    """[N m] effort by hand: weight arm less the moment of a push apart of foot and hook, from the law of cosines.

    The moment of a force along the line foot to hook, about the pivot, is push x d(length)/d(angle).
    """
    angle = answer.drive[0, 0]
    far, lean = math.hypot(*foot), math.atan2(foot[1], foot[0])
    length = np.sqrt(far**2 + hook**2 - 2 * far * hook * np.cos(angle - lean))
    growth = far * hook * np.sin(angle - lean) / length
    return mass * 9.80665 * reach * np.cos(angle) - push * growth


def length(answer: StrokeAnswer, foot: tuple[float, float], hook: float = 0.1) -> np.ndarray:
    far, lean = math.hypot(*foot), math.atan2(foot[1], foot[0])
    return np.sqrt(far**2 + hook**2 - 2 * far * hook * np.cos(answer.drive[0, 0] - lean))


def test_a_spring_without_free_length_balances_at_every_angle() -> None:
    """Condition m g l = c a r of a spring whose force is its whole length times its rate (static balancing of a hinged
    arm; J. L. Herder, Energy-free Systems, Delft 2001): 10 kg at 0.5 m, hooked 0.2 m above the pivot and 0.1 m out."""
    rate = 10 * 9.80665 * 0.5 / (0.2 * 0.1)
    assert rate == pytest.approx(2451.6625, abs=1e-4)
    answer = arm(f'spring = ["S", "R"]\nrate = "{rate!r} N/m"\nfree_length = 0')
    assert np.abs(answer.effort).max() < EXACT * 10 * 9.80665 * 0.5
    assert np.abs(answer.tare_effort).max() < EXACT * 10 * 9.80665 * 0.5


@pytest.mark.parametrize("how", ["free_length = 90", "preload = {}"])
def test_a_coil_spring_as_counterbalance(how: str) -> None:
    """Closed form by the law of cosines, to 1e-9: with a free length, or with its force in the drawing pose told."""
    foot = (-0.03, 0.2)
    drawn = math.sqrt(0.2**2 + 0.03**2 + 0.1**2 - 2 * (-0.03 * 0.1 * math.cos(math.radians(-60))
                                                       + 0.2 * 0.1 * math.sin(math.radians(-60))))  # fmt: skip
    force = 3000 * (0.09 - drawn)
    answer = arm(f'spring = ["S", "R"]\nrate = 3\n{how.format(repr(force))}', foot=(-30, 200))
    push = 3000 * (0.09 - length(answer, foot))
    np.testing.assert_allclose(answer.effort[0, 0], hand(answer, push, foot=foot), atol=EXACT * 50)
    np.testing.assert_allclose(answer.reading("force of balancer")[0, 0], push, rtol=EXACT)
    np.testing.assert_allclose(answer.reading("length of balancer")[0, 0], length(answer, foot), rtol=EXACT)
    # the hinge carries weight and spring: its force from the sum of both
    angle = answer.drive[0, 0]
    hook = 0.1 * np.cos(angle), 0.1 * np.sin(angle)
    along = (hook[0] - foot[0]) / length(answer, foot), (hook[1] - foot[1]) / length(answer, foot)
    x, y = answer.force_on("A", "arm")[:, 0, 0]
    np.testing.assert_allclose(x, -push * along[0], atol=EXACT * 500)
    np.testing.assert_allclose(y, 10 * 9.80665 - push * along[1], atol=EXACT * 500)


@pytest.mark.parametrize(
    ("gas", "taken", "n"),
    [
        ("rise = 1.35", (1 - 1 / 1.35) / 0.18, 1.0),
        ("rise = 1.35\nexponent = 1.3", (1 - 1.35 ** (-1 / 1.3)) / 0.18, 1.3),
        ('rod = 10\nvolume = "55 cm^3"', math.pi / 4 * 0.01**2 / 55e-6, 1.0),
    ],
)
def test_a_gas_spring_as_counterbalance(gas: str, taken: float, n: float) -> None:
    """F = F1/(1 - x A/V0)^n over the way x that the rod is in (gas law), at three temperatures as F/T = constant."""
    foot = (0.05, -0.14)
    load = f'gas_spring = ["S", "R"]\nforce = 600\nlength = 250\nstroke = 180\n{gas}'
    cases = '[cases.frost]\ntemperature = "0 degC"\n[cases.mild]\n[cases.heat]\ntemperature = "104 degF"\n'
    answer = arm(load, foot=(50, -140), start=-30, stop=80, more=cases)
    push = 600 / (1 - (0.25 - length(answer, foot)) * taken) ** n
    for case, kelvin in enumerate((273.15, 293.15, 313.15)):
        warm = push * kelvin / 293.15
        np.testing.assert_allclose(answer.reading("force of balancer")[case, 0], warm, rtol=EXACT)
        np.testing.assert_allclose(answer.effort[case, 0], hand(answer, warm, foot=foot), atol=EXACT * 100)


def test_warmth_of_a_gas_spring() -> None:
    """Makers state 3.4 % of force for 10 degrees (data sheets of the trade); the ideal gas: 10/293.15 = 3.411 %."""
    load = 'gas_spring = ["S", "R"]\nforce = 600\nlength = 250\nstroke = 180\nrise = 1.3'
    answer = arm(load, foot=(50, -140), start=-30, stop=80, more="[cases.a]\n[cases.b]\ntemperature = 30\n")
    cool, warm = answer.reading("force of balancer")[:, 0]
    np.testing.assert_allclose(warm / cool - 1, 0.034, atol=0.0005)


def test_where_a_torsion_spring_balances_a_weight() -> None:
    """F. P. Beer, E. R. Johnston and others, Vector Mechanics for Engineers: Statics, sample problem 10.4: spring of
    4 kN/m wound on a hub of 80 mm, weight of 98.1 N on an arm of 300 mm; balance at 0.902 rad from upright.
    The spring on the hub is a torsion spring of k r^2 = 25.6 N m/rad."""
    spring = 'torsion_spring = "arm"\nrate = "25.6 N*m/rad"\nfree_angle = 90'
    lean = np.array([0.9015, 0.9025])
    answer = arm(spring, reach=300, mass=98.1 / 9.80665, start=90, stop=20, at=list(math.pi / 2 - lean))
    below, above = answer.effort[0, 0]
    assert below * above < 0, "the effort passes through nothing at 0.902 rad, to the digits printed"


def test_rate_of_a_torsion_spring_per_turn() -> None:
    """E d^4/(10.8 D N) with 207 GPa, wire 2 mm, coil 20 mm, 5 turns: 3066.67 N mm a turn, 8.52 N mm a degree
    (worked example of an engineering-calculation page, calculatorlib.com/torsion-spring-calculator)."""
    answer = arm('torsion_spring = "arm"\nrate = "3066.67 N*mm/turn"\nfree_angle = 0', start=0, stop=10,
                 at=[math.radians(1)])  # fmt: skip
    assert answer.reading("torque of balancer")[0, 0, 0] * 1e3 == pytest.approx(-8.52, abs=0.005)


def test_a_torsion_spring_as_counterbalance() -> None:
    """effort = m g l cos a - c (free - a), to 1e-9; the same told by its torque in the drawing pose, at -60 deg."""
    for how in ("free_angle = 95", f"preload = {0.4 * 155!r}"):
        answer = arm(f'torsion_spring = "arm"\nrate = 0.4\n{how}')
        angle = answer.drive[0, 0]
        wanted = 10 * 9.80665 * 0.5 * np.cos(angle) - 0.4 * (95 - np.degrees(angle))
        np.testing.assert_allclose(answer.effort[0, 0], wanted, atol=EXACT * 50)


def test_a_constant_spring_and_forces_that_are_written_down() -> None:
    """A steady draw; the same as a table and as a formula; a line as a formula, against the coil spring it is."""
    foot = (-0.03, 0.2)
    for load in (
        'constant_spring = ["S", "R"]\npull = 250',
        'force_over = ["S", "R"]\ntable = [[50, -250], [170, -250], [310, -250]]',
        'force_over = ["S", "R"]\nformula = "0*length/(1 m)*(1 N) - 250 N"',
    ):
        answer = arm(load, foot=(-30, 200))
        wanted = hand(answer, np.full(25, -250.0), foot=foot)
        np.testing.assert_allclose(answer.effort[0, 0], wanted, atol=EXACT * 50)
    answer = arm('force_over = ["S", "R"]\nformula = "3 N/mm*(90 mm - length)"', foot=(-30, 200))
    wanted = hand(answer, 3000 * (0.09 - length(answer, foot)), foot=foot)
    np.testing.assert_allclose(answer.effort[0, 0], wanted, atol=EXACT * 50)


def test_a_torque_that_is_written_down() -> None:
    """The weight's own moment as formula and as a straight table: nothing is left for the effort."""
    answer = arm('torque_over = "arm"\nformula = "10*9.80665*0.5*(1 N*m)*cos(angle)"')
    assert np.abs(answer.effort).max() < EXACT * 50
    answer = arm('torque_over = "arm"\ntable = [[-60, 30], [90, 0]]')
    angle = np.degrees(answer.drive[0, 0])
    wanted = 10 * 9.80665 * 0.5 * np.cos(np.radians(angle)) - 0.2 * (90 - angle)
    np.testing.assert_allclose(answer.effort[0, 0], wanted, atol=EXACT * 50)


JACK = """
[points]
A = [0, 0]
F = [300, -200]
C = [350, 0]
T = [900, 0]
[members]
ground = ["A", "F"]
boom = ["A", "C", "T"]
[effort]
{effort}
[load]
at = "T"
direction = -90
size = "2 kN"
[stroke]
turn = "boom"
from = 0
to = 40
poses = 9
"""


def strut(answer: StrokeAnswer) -> np.ndarray:
    """[N] the push that holds 2 kN at 900 mm: moment over the arm of the line F to C about A."""
    angle, points = answer.drive[0, 0], (0.3, -0.2)
    cx, cy = 0.35 * np.cos(angle), 0.35 * np.sin(angle)
    ux, uy = cx - points[0], cy - points[1]
    arm_of_line = (cx * uy - cy * ux) / np.hypot(ux, uy)
    return 2000 * 0.9 * np.cos(angle) / arm_of_line


def test_a_cylinder_as_effort_tells_its_pressure() -> None:
    """Pressure = force/area; pushing over the bore, drawing over the ring beside the rod."""
    answer = stroke(parse(JACK.format(effort='cylinder = ["F", "C"]\nbore = 40')))
    np.testing.assert_allclose(answer.effort[0, 0], strut(answer), rtol=EXACT)
    np.testing.assert_allclose(answer.reading("pressure of effort")[0, 0], strut(answer) / (math.pi / 4 * 0.04**2),
                               rtol=EXACT)  # fmt: skip
    pull = stroke(parse(JACK.format(effort='cylinder = ["F", "C"]\nbore = 40\nrod = 22\nacts = "pull"').replace(
        "direction = -90", "direction = 90")))  # fmt: skip
    np.testing.assert_allclose(pull.effort[0, 0], strut(pull), rtol=EXACT)
    ring = math.pi / 4 * (0.04**2 - 0.022**2)
    np.testing.assert_allclose(pull.reading("pressure of effort")[0, 0], strut(pull) / ring, rtol=EXACT)
    assert not pull.caveats


def test_a_cylinder_of_given_pressure() -> None:
    """100 bar on a bore of 40 mm push with 12 566.4 N; with a rod of 22 mm they draw with 8765.0 N."""
    asked = JACK.replace('size = "2 kN"\n', "")
    push = stroke(parse(asked.format(effort='cylinder = ["F", "C"]\nbore = 40\npressure = 100')))
    assert push.effort[0, 0, 0] == pytest.approx(12566.4, abs=0.05)
    np.testing.assert_allclose(push.load[0, 0], 1e7 * math.pi / 4 * 0.04**2 / strut(push) * 2000, rtol=EXACT)
    pull = stroke(
        parse(asked.format(effort='cylinder = ["F", "C"]\nbore = 40\nrod = 22\nacts = "pull"\npressure = 100'))
    )
    assert pull.effort[0, 0, 0] == pytest.approx(8765.0, abs=0.05)
    np.testing.assert_allclose(
        pull.load[0, 0], -1e7 * math.pi / 4 * (0.04**2 - 0.022**2) / strut(pull) * 2000, rtol=EXACT
    )


@pytest.mark.parametrize(("lead", "holds"), [(4, True), (12, False)])
def test_a_screw_as_effort(lead: float, holds: bool) -> None:
    """Torque F d/2 tan(phi +- lambda) of a square thread, phi the angle of friction and lambda that of the lead (any
    textbook of machine elements); it holds itself if lambda is less than phi. d = 22 mm, µ = 0.12."""
    answer = stroke(parse(JACK.format(effort=f'screw = ["F", "C"]\ndiameter = 22\nlead = {lead}\nfriction = 0.12')))
    phi, slope = math.atan(0.12), math.atan(lead / (math.pi * 22))
    np.testing.assert_allclose(answer.reading("raising torque of effort")[0, 0],
                               strut(answer) * 0.011 * math.tan(phi + slope), rtol=EXACT)  # fmt: skip
    np.testing.assert_allclose(answer.reading("lowering torque of effort")[0, 0],
                               strut(answer) * 0.011 * math.tan(phi - slope), rtol=EXACT)  # fmt: skip
    told = [c.text for c in answer.caveats]
    runs = ["not held by its own friction: it runs back unless a brake holds it, over the whole stroke"]
    assert told == ([] if holds else runs)
