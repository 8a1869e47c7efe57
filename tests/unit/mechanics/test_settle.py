"""Free members, links that give and contacts, in closed form: where they settle, what they carry, where they snap."""

from __future__ import annotations

from math import atan, atan2, cos, degrees, hypot, pi, radians, sin, sqrt, tan

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from linkcalc import Faults, copies, parse, stroke
from linkcalc.design.answer import StrokeAnswer
from tests.property.resum import unbalanced

G = 9.80665
EXACT = 1e-9
"""relative: the closed form is met to this"""

TWO_BARS = """
[units]
length = "m"
stiffness = "N/m"
[dimensions]
h = {h}
[points]
A = [-1, 0]
C = [1, 0]
K = [0, "h"]
O = [0, 3]
[members]
ground = ["A", "C", "O"]
left = {{ points = ["A", "K"], stiffness = {k} }}
right = {{ points = ["K", "C"], stiffness = {k} }}
[effort]
at = "K"
direction = -90
[stroke]
distance = ["O", "K"]
from = "drawn"
to = {to}
poses = 41
"""
"""Two elastic bars between fixed pins, pressed down at the knee: the shallow truss of R. von Mises (1923)."""


def two_bars(h: float = 0.3, k: float = 5e5, to: float = 3.2) -> StrokeAnswer:
    return stroke(parse(TWO_BARS.format(h=h, k=k, to=to)))


def pressed(y: np.ndarray | float, length: float, k: float) -> np.ndarray:
    """[N] what holds the knee at a height: each bar pushes by k times its shortening, along itself."""
    now = np.hypot(1.0, y)
    return np.asarray(2 * k * (length - now) * y / now)


def test_two_elastic_bars_over_the_whole_way() -> None:
    answer, length = two_bars(), hypot(1.0, 0.3)
    y = 3 - answer.drive[0, 0]
    np.testing.assert_allclose(answer.effort[0, 0], pressed(y, length, 5e5), rtol=EXACT, atol=EXACT * 5e5)


@pytest.mark.parametrize("h", [0.05, 0.3, 0.9])
def test_peak_effort_and_the_angle_where_it_is(h: float) -> None:
    """At the peak d/dy of 2k(L/l - 1)y is nothing: l^3 = L b^2, so cos(angle) is the cube root of cos(angle drawn)."""
    answer, length = two_bars(h, to=3.0), hypot(1.0, h)
    peak = next(e for e in answer.events if (e.kind, e.quantity) == ("largest", "effort"))
    angle = atan(3 - peak.drive)
    assert cos(angle) == pytest.approx((1 / length) ** (1 / 3), rel=EXACT)
    y = sqrt((length) ** (2 / 3) - 1)
    assert peak.value == pytest.approx(float(pressed(y, length, 5e5)), rel=EXACT)


def test_over_centre_the_effort_turns_round_in_line() -> None:
    answer = two_bars()
    (turn,) = [e for e in answer.events if (e.kind, e.quantity) == ("reversal", "effort")]
    assert turn.drive == pytest.approx(3.0, abs=1e-9)


SERIES = """
[units]
length = "m"
stiffness = "N/m"
[points]
A = [-1, 0]
C = [1, 0]
K = [0, 0.3]
B = [0, 1.3]
[members]
ground = ["A", "C"]
left = {{ points = ["A", "K"], stiffness = 5e5 }}
right = {{ points = ["K", "C"], stiffness = 5e5 }}
block = ["B"]
[slides.guide]
member = "block"
along = 90
[loads.coil]
spring = ["B", "K"]
rate = {rate}
free_length = 1
acts = "compression"
[effort]
at = "B"
direction = -90
[stroke]
travel = "guide"
from = 0
to = -0.8
poses = 81
"""
"""The same bars pressed through a spring: what is driven is its far end, and the knee is free."""


@pytest.mark.parametrize("rate", [1e4, 3e4])
def test_snap_through_where_the_spring_is_softer_than_the_fall_of_the_force(rate: float) -> None:
    """Stable while rate > dP/dy with P = 2k(L/l - 1)y: the balance ends where l^3 = 2k L b^2 / (rate + 2k)."""
    answer = stroke(parse(SERIES.format(rate=rate)))
    k, length = 5e5, hypot(1.0, 0.3)
    now = (2 * k * length / (rate + 2 * k)) ** (1 / 3)
    y = sqrt(now**2 - 1)
    block = y + 1.0 - float(pressed(y, length, k)) / rate  # where the far end of the spring stands
    (snap,) = [e for e in answer.events if e.kind == "snap-through"]
    assert snap.drive == pytest.approx(block - 1.3, abs=2e-9)
    assert any("snaps through" in c.text for c in answer.caveats)
    # on the other side it goes on along the balance that is there
    assert not answer.status.any()
    beyond = answer.drive[0, 0] < snap.drive
    turn = answer.turn[1, 0, 0] + atan(0.3)  # of the left bar, which carries the knee
    assert (turn[beyond] < 0).all()
    assert (turn[~beyond] > 0).all()
    assert (answer.steady[0, 0] == 1).all()


def test_a_stiff_spring_does_not_snap() -> None:
    answer = stroke(parse(SERIES.format(rate=5e6).replace('acts = "compression"', "")))
    assert not [e for e in answer.events if e.kind == "snap-through"]


BEAM = """
free = ["beam", "left_pan", "right_pan"]
[units]
length = "m"
[points]
F = [0, 0]
L = [-0.2, {down}]
R = [0.2, {down}]
S = [0, {low}]
pl = [-0.2, -0.15]
pr = [0.2, -0.15]
[members]
ground = ["F"]
beam = {{ points = ["L", "F", "R", "S"], mass = 0.5, centre = "S" }}
left_pan = ["L", "pl"]
right_pan = ["R", "pr"]
[loads.p]
mass_at = "pr"
mass = {p}
[loads.q]
mass_at = "pl"
mass = {q}
"""


def beam(p: float, q: float, down: float = -5e-5, low: float = -2e-3) -> StrokeAnswer:
    return stroke(parse(BEAM.format(p=p, q=q, down=down, low=low)))


def tilt(answer: StrokeAnswer) -> float:
    """[rad] of the beam, the right arm down plus."""
    return -float(answer.turn[1, 0, 0, 0])


@given(st.floats(0.5, 3), st.floats(-0.02, 0.02))
def test_tilt_of_a_beam_with_pans(q: float, more: float) -> None:
    """tan = (P - Q) a / ((P + Q) h + W k): moments about the fulcrum, the ends hanging h and the centre k below it."""
    p = q + more
    wanted = (p - q) * 0.2 / ((p + q) * 5e-5 + 0.5 * 2e-3)
    assert tan(tilt(beam(p, q))) == pytest.approx(wanted, rel=1e-8, abs=1e-12)


def test_an_equalising_bar_shares_by_its_arms() -> None:
    """A bar hung at one place carries its two rods by their arms, however it tilts: the lever law."""
    text = """
free = ["bar", "left", "right"]
[units]
length = "m"
[points]
H = [0, 0]
A = [-0.3, 0]
B = [0.15, 0]
wa = [-0.3, -0.2]
wb = [0.15, -0.2]
[members]
ground = ["H"]
bar = { points = ["A", "H", "B"], mass = 4, centre = "H" }
left = ["A", "wa"]
right = ["B", "wb"]
[loads.a]
at = "wa"
direction = -90
size = 300
[loads.b]
at = "wb"
direction = -90
size = 600
"""
    answer = stroke(parse(text))
    assert answer.steady[0, 0, 0] == 0  # 300 x 0.30 = 600 x 0.15: it stays however it is put
    assert answer.joint_force("H")[0, 0, 0] == pytest.approx(900 + 4 * G, rel=EXACT)
    assert stroke(parse(text.replace("600", "601"))).turn[1, 0, 0, 0] == pytest.approx(-pi / 2, abs=1e-6)


LAMP = """
free = ["arm"]
[units]
length = "m"
stiffness = "N/m"
[points]
O = [0, 0]
top = [0, 0.2]
hook = {{ from = "O", distance = 0.1, angle = {angle} }}
head = {{ from = "O", distance = 0.5, angle = {angle} }}
[members]
ground = ["O", "top"]
arm = ["O", "hook", "head"]
[loads.lamp]
mass_at = "head"
mass = 10
[loads.coil]
spring = ["top", "hook"]
rate = {rate}
free_length = 0
"""


@pytest.mark.parametrize("angle", [-60, 0, 37, 85])
def test_a_zero_free_length_spring_balances_an_arm_anywhere(angle: float) -> None:
    """Neutral at every angle if m g l = c a r (J. L. Herder, Energy-free Systems, 2001, from memory)."""
    rate = 10 * G * 0.5 / (0.2 * 0.1)
    answer = stroke(parse(LAMP.format(angle=angle, rate=rate)))
    assert answer.steady[0, 0, 0] == 0
    assert answer.turn[1, 0, 0, 0] == pytest.approx(0, abs=1e-9)  # it stays as drawn
    assert any("neutral" in c.text for c in answer.caveats)
    stiffer = stroke(parse(LAMP.format(angle=angle, rate=1.01 * rate)))
    assert stiffer.steady[0, 0, 0] == 1
    assert degrees(float(stiffer.turn[1, 0, 0, 0])) + angle == pytest.approx(90, abs=1e-6)


def test_all_balances_of_a_bar_and_a_rod_hung_on_it() -> None:
    text = """
free = ["bar", "rod"]
[units]
length = "m"
[points]
A = [0, 0]
B = [0.3, 0.1]
C = [0.5, 0]
[members]
ground = ["A"]
bar = { points = ["A", "B"], mass = 2 }
rod = { points = ["B", "C"], mass = 1 }
"""
    answer = stroke(parse(text))
    drawn = {"bar": atan2(0.1, 0.3), "rod": atan2(-0.1, 0.2)}
    found = {tuple(round(sin(drawn[m] + turn)) for m, turn in rest.turns.items()): rest.text for rest in answer.rests}
    assert found == {(-1, -1): "stable", (-1, 1): "unstable", (1, -1): "unstable", (1, 1): "unstable"}
    assert answer.rests[0].text == "stable"
    for rest in answer.rests:
        assert all(abs(cos(drawn[m] + turn)) < 1e-9 for m, turn in rest.turns.items())


def test_elastic_pins_share_the_load_of_a_rigid_beam() -> None:
    """A rigid beam on three springs in line: shares from force, moment and the straight line of the sinkings."""
    text = """
[units]
length = "m"
stiffness = "N/m"
[points]
A = [0, 0]
B = [1, 0]
C = [3, 0]
P = [2, 0]
[members]
ground = ["A", "B", "C"]
beam = ["A", "P", "B", "C"]
[pins.A]
stiffness = 2e7
[pins.B]
stiffness = 3e7
[pins.C]
stiffness = 5e7
[loads.push]
at = "P"
direction = -90
size = 1000
"""
    answer = stroke(parse(text))
    k, x = np.array([2e7, 3e7, 5e7]), np.array([0.0, 1.0, 3.0])
    sink, slope = np.linalg.solve([[k.sum(), (k * x).sum()], [(k * x).sum(), (k * x * x).sum()]], [1000, 2000])
    felt = [float(answer.force_on(p, "beam")[1, 0, 0, 0]) for p in "ABC"]
    np.testing.assert_allclose(felt, k * (sink + slope * x), rtol=1e-6)  # the turn of 1e-5 makes its cosine 1 - 1e-10
    assert sum(felt) == pytest.approx(1000, rel=EXACT)
    assert max(unbalanced(answer).values()) < 1e-9


STOP = """
[units]
length = "m"
stiffness = "N/m"
[points]
O = [0, 0]
tip = [0.4, 0.1]
[members]
ground = ["O"]
arm = ["O", "tip"]
[contacts.stop]
point = "tip"
along = 0
{room}
side = "left"
stiffness = 1e5
[effort]
torque_on = "arm"
[stroke]
turn = "arm"
from = 14
to = -3
poses = 35
"""


def test_a_contact_is_made_where_its_gap_is_closed() -> None:
    answer = stroke(parse(STOP.format(room="gap = 0.06")))
    (made,) = [e for e in answer.events if e.quantity == "stop" and e.kind.startswith("contact")]
    reach = hypot(0.4, 0.1)
    assert made.kind == "contact made"
    assert sin(made.drive) * reach == pytest.approx(0.04, abs=1e-12)
    deep = np.maximum(0.04 - reach * np.sin(answer.drive[0, 0]), 0)
    np.testing.assert_allclose(answer.joint_force("stop")[0, 0], 1e5 * deep, rtol=EXACT, atol=1e-6)
    arm = reach * np.cos(answer.drive[0, 0])
    np.testing.assert_allclose(answer.effort[0, 0], -1e5 * deep * arm, rtol=EXACT, atol=1e-6)


def test_a_preload_is_the_force_as_drawn() -> None:
    answer = stroke(parse(STOP.format(room="preload = 250").replace("from = 14", 'from = "drawn"')))
    assert answer.joint_force("stop")[0, 0, 0] == pytest.approx(250, rel=1e-9)


def test_a_stop_on_the_other_side_never_touches() -> None:
    answer = stroke(parse(STOP.format(room="gap = 0.06").replace('"left"', '"right"')))
    assert float(np.abs(answer.joint_force("stop")).max()) == 0.0


def test_friction_and_stretch_together_stay_in_balance_and_close_on_the_frictionless() -> None:
    rub = TWO_BARS.format(h=0.3, k=5e5, to=2.95) + "[friction]\npins = MU\ndiameter = 0.03\n"
    firm = two_bars(to=2.95).effort[0, 0]
    apart = []
    for mu in (0.2, 0.02, 0.002):
        answer = stroke(parse(rub.replace("MU", str(mu))))
        assert answer.checks.equilibrium < 1e-9
        # and every pin rubs as it should: its couple is the radius of its circle of friction times its force
        felt, couple = np.hypot(answer.force[:, 0], answer.force[:, 1]), np.abs(answer.moment)
        np.testing.assert_allclose(couple, 0.015 * mu / hypot(1, mu) * felt, rtol=EXACT, atol=EXACT)
        there, back = answer.effort[0, 0], answer.effort[1, 0]
        inside = slice(1, -1)
        assert (there[inside] > firm[inside]).all()
        assert (back[inside] < firm[inside]).all()
        apart.append(float((there - back)[inside].max()))
    assert apart[1] / apart[0] == pytest.approx(0.1, rel=0.05)
    assert apart[2] / apart[1] == pytest.approx(0.1, rel=0.02)


def test_cases_settle_each_for_itself() -> None:
    text = BEAM.format(p=2.0, q=2.0, down=-5e-5, low=-2e-3) + "[cases.even]\n[cases.more]\nscale = { p = 1.01 }\n"
    answer = stroke(parse(text))
    one = beam(2.02, 2.0)
    assert answer.turn.shape[1] == 2
    assert answer.turn[1, 0, 0, 0] == pytest.approx(0, abs=1e-9)
    np.testing.assert_allclose(answer.turn[:, 1], one.turn[:, 0], atol=1e-9)


@pytest.mark.parametrize(
    ("text", "said"),
    [
        (BEAM.format(p=2, q=2, down=0, low=0).partition("\n[units]")[2].join(["[units]", ""]), "name in 'free'"),
        ('free = ["arm"]\n[points]\nA = [0, 0]\nB = [9, 0]\n[members]\nground = ["A"]\narm = ["A", "B"]\n',
         "nothing that acts on them lets them settle"),
        (TWO_BARS.format(h=0.3, k=-5, to=3.1), "stiffness"),
        (TWO_BARS.format(h=0.3, k=5, to=3.1).replace('["K", "C"], s', '["K"], s'), "two pins"),
        (STOP.format(room="").replace('side = "left"', "").replace("tip = [0.4, 0.1]", "tip = [0.4, 0]")
         .replace("along = 0", 'along = ["O", "tip"]\non = "ground"'), "is a point of arm"),
        (STOP.format(room="gap = 0.01\npreload = 5"), "one of the two is wanted"),
        (STOP.format(room="").replace('side = "left"', ""), "where it is free"),
        (TWO_BARS.format(h=0.3, k=5, to=3.1) + "[pins.A]\nstiffness = 9\n[pins.K]\nstiffness = 9\n",
         "both its pins give already"),
    ],
    ids=["not said free", "nothing acts", "minus stiffness", "one pin", "own line", "gap and preload", "no side",
         "pins give already"],
)  # fmt: skip
def test_what_is_wrong_is_told(text: str, said: str) -> None:
    with pytest.raises(Faults) as caught:
        stroke(parse(text))
    assert said in str(caught.value)


def test_spring_lever_that_is_stable_and_the_one_that_is_not() -> None:
    """W r-rim and spring: k r^2 theta = W l sin(theta), the root beside nothing is 0.902 rad: F. P. Beer and others,
    Vector Mechanics: Statics, a mass on an arm held by a spring on the rim of its disk (figures as printed)."""
    text = """
free = ["arm"]
[units]
length = "m"
[points]
O = [0, 0]
G = [0, 0.3]
[members]
ground = ["O"]
arm = ["O", "G"]
[loads.w]
at = "G"
direction = -90
size = 98.1
[loads.rim]
torsion_spring = "arm"
rate = "25.6 N*m/rad"
preload = 0
"""
    answer = stroke(parse(text))
    turns = {round(abs(rest.turns["arm"]), 3): rest.text for rest in answer.rests}
    assert turns == {0.902: "stable", 0.0: "unstable"}
    assert radians(51.7) == pytest.approx(max(turns), abs=0.0005)
    assert max(abs(r.turns["arm"]) for r in answer.rests) < pi


def test_copies_settle_as_each_alone_would() -> None:
    text = TWO_BARS.format(h=0.3, k=5e5, to=3.2).replace("poses = 41", "poses = 9")
    heights = np.array([0.28, 0.3, 0.32])
    together = stroke(parse(text), sizes={"h": heights})
    assert not together.status.any()
    for k, h in enumerate(heights):
        y = 3 - together.drive[0, k]
        np.testing.assert_allclose(together.effort[0, k], pressed(y, hypot(1, h), 5e5), rtol=1e-8, atol=1e-3)


def test_copies_streamed_are_the_same() -> None:
    mechanism = parse(TWO_BARS.format(h=0.3, k=5e5, to=2.9).replace("poses = 41", "poses = 5"))
    heights = np.array([0.28, 0.3])
    whole = stroke(mechanism, sizes={"h": heights})
    for pose in copies(mechanism, {"h": heights}):
        np.testing.assert_allclose(pose.effort[0], whole.effort[0, :, pose.pose], rtol=1e-9)
