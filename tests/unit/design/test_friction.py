"""Friction: friction circles, inclines and guides in closed form, both senses, self-locking, jamming, equilibrium."""

from __future__ import annotations

from math import asin, atan, radians, sin, tan

import numpy as np
import pytest

from linkcalc import Faults, parse, stroke
from linkcalc.design.answer import StrokeAnswer
from linkcalc.mechanics.state import Status

EXACT = 1e-9
"""relative: the closed form is met to this (the issue is rounding and the iteration on the normal forces)"""

LEVER = """
[units]
length = "m"
[points]
A = [0, 0]
hook = [-0.2, 0]
grip = [0.6, 0]
[members]
ground = ["A"]
lever = ["hook", "A", "grip"]
[friction]
pins = {mu}
diameter = 0.04
[effort]
at = "grip"
direction = -90
[load]
at = "hook"
direction = -90
size = 1000
"""

TOGGLE = """
[units]
length = "m"
[points]
A = [0, 0]
B = {{ from = "A", distance = 0.1, angle = {angle} }}
C = {{ from = "B", distance = 0.1, angle = -{angle} }}
[members]
ground = ["A"]
one = ["A", "B"]
two = ["B", "C"]
ram = ["C"]
[slides.guide]
member = "ram"
along = 0
at = "C"
[friction]
pins = 0.15
diameter = 0.02
[effort]
at = "B"
direction = -90
[load]
at = "C"
on = "ram"
direction = 180
size = 1000
"""

BLOCK = """
[units]
length = "m"
[points]
O = [0, 0]
P = [1, 0]
[members]
ground = ["P"]
block = ["O"]
[slides.plane]
member = "block"
along = 25
friction = {mu}
[effort]
at = "O"
direction = 0
[load]
at = "O"
direction = -90
size = 800
"""


def radius(mu: float, diameter: float) -> float:
    return diameter / 2 * sin(atan(mu))


def both(answer: StrokeAnswer) -> list[float]:
    assert (answer.status == Status.FINE).all()
    return [float(e) for e in answer.effort[:, 0, 0]]


@pytest.mark.parametrize("mu", [0.01, 0.1, 0.2, 0.6])
def test_friction_circle_of_a_lever(mu: float) -> None:
    """effort = load (l_load + r) / (l_effort - r) when raising, the signs turned when letting down.

    R. A. Walsh, Handbook of Machining and Metalworking Calculations, 2001, lever with parallel forces, with the exact
    friction circle r = pin radius times sin(atan mu)."""
    r = radius(mu, 0.04)
    expected = [1000 * (0.2 + r) / (0.6 - r), 1000 * (0.2 - r) / (0.6 + r)]
    answer = stroke(parse(LEVER.format(mu=mu)))
    assert answer.cases == ("forward", "back")
    assert both(answer) == pytest.approx(expected, rel=EXACT)
    assert answer.efficiency[0, 0, 0] == pytest.approx(1000 / 3 / expected[0], rel=EXACT)
    assert np.isnan(answer.efficiency[1, 0, 0])


@pytest.mark.parametrize("angle", [30, 10, 5, 2, 1, 0.5])
def test_toggle_links_tilt_by_their_friction_circles(angle: float) -> None:
    """The line of thrust of a two-pin link tilts by eps = asin((r1 + r2) / L), so the symmetric toggle takes
    2 tan(alpha + eps) of the load going in and 2 tan(alpha - eps) coming back (derived from the friction circle;
    below eps it does not spring back by itself)."""
    alpha, eps = radians(angle), asin(2 * radius(0.15, 0.02) / 0.1)
    answer = stroke(parse(TOGGLE.format(angle=angle)))
    assert both(answer) == pytest.approx([2000 * tan(alpha + eps), 2000 * tan(alpha - eps)], rel=EXACT)
    held = any("holds by itself" in c.text for c in answer.caveats)
    assert held == (alpha < eps)


@pytest.mark.parametrize(
    ("mu", "sense", "printed", "digit"), [(0.35, 0, 780, 0.5), (0.25, 0, 649, 0.5), (0.35, 1, 80, 0.5)]
)
def test_block_on_an_incline_pushed_sideways(mu: float, sense: int, printed: float, digit: float) -> None:
    """Beer, Johnston et al., Vector Mechanics for Engineers: Statics, sample problem 8.2, p. 397: 780, 649 and 80 N."""
    effort = both(stroke(parse(BLOCK.format(mu=mu))))[sense]
    assert effort == pytest.approx(printed, abs=digit)
    turn = radians(25) + (atan(mu) if sense == 0 else -atan(mu))
    assert effort == pytest.approx(800 * tan(turn), rel=EXACT)


@pytest.mark.parametrize("mu", [0.0, 0.05, 0.2])
def test_pulley_on_a_rubbing_pin(mu: float) -> None:
    """Beer, Johnston et al., Statics, sample problem 8.6, p. 423: 611.1 lb to raise and 409 lb to hold 500 lb on a
    2 in radius, with a friction circle of 0.20 in."""
    text = LEVER.format(mu=0).replace("hook = [-0.2, 0]", "hook = [-2, 0]").replace("grip = [0.6, 0]", "grip = [2, 0]")
    text = text.replace("pins = 0\ndiameter = 0.04\n", "").replace("size = 1000", "size = 500")
    answer = stroke(parse(text + f"[pins.A]\nfriction_radius = {mu}\n"))
    expected = [500 * (2 + mu) / (2 - mu), 500 * (2 - mu) / (2 + mu)]
    efforts = both(answer)
    assert efforts[0] == pytest.approx(expected[0], rel=EXACT)
    assert efforts[-1] == pytest.approx(expected[1] if mu else 500, rel=EXACT)
    if mu == 0.2:
        assert efforts == pytest.approx([611.1, 409.0], abs=0.5)


def test_a_guide_that_carries_a_moment_rubs_at_both_ends_and_jams() -> None:
    """A ram of guide length L pushed at an arm a beside its axis: N = F a / L at both ends, F = W / (1 - 2 mu a / L);
    it jams at mu = L / (2 a) (common practice: the collar that binds)."""
    text = """
[units]
length = "m"
[points]
O = [0, 0]
P = [{arm}, 0]
Q = [1, 0]
[members]
ground = ["Q"]
ram = ["O", "P"]
[slides.guide]
member = "ram"
along = 90
at = "O"
friction = {mu}
length = 0.1
[effort]
at = "P"
direction = 90
[load]
at = "O"
direction = -90
size = 1000
"""
    for arm, mu in ((0.05, 0.2), (0.1, 0.3), (0.2, 0.2)):
        efforts = both(stroke(parse(text.format(arm=arm, mu=mu))))
        assert efforts[0] == pytest.approx(1000 / (1 - 2 * mu * arm / 0.1), rel=EXACT)
        assert efforts[1] == pytest.approx(1000 / (1 + 2 * mu * arm / 0.1), rel=EXACT)
    jammed = stroke(parse(text.format(arm=0.2, mu=0.26)))
    assert jammed.status[0, 0, 0] == Status.JAMMED and np.isnan(jammed.effort[0, 0, 0])
    assert jammed.status[1, 0, 0] == Status.FINE
    assert any("jams" in c.text for c in jammed.caveats)
    # coming back F = W - mu N with N = 2 |F| a / L has a second answer, F < 0, as soon as it jams the other way
    told = [c.text for c in jammed.caveats if "more than one answer" in c.text]
    assert len(told) == 1 and "case back" in told[0]
    free = stroke(parse(text.format(arm=0.2, mu=0.24)))
    assert not any("more than one" in c.text for c in free.caveats)


STROKE = """
[stroke]
turn = "one"
from = 40
to = 5
poses = 36
"""


def test_members_balance_with_the_stated_friction_at_every_pin() -> None:
    """Re-summed from the answer alone: forces and friction couples of every member, at every pose, both senses."""
    answer = stroke(parse(TOGGLE.format(angle=40) + STROKE))
    r = radius(0.15, 0.02)
    for joint in ("A", "B", "C"):
        for bearing in (b for b in answer.bearings if b.joint == joint):
            size = np.hypot(*answer.force_on(joint, bearing.member))
            couple = np.abs(answer.moment_on(joint, bearing.member))
            if joint != "B":  # on the knee itself the effort acts, so the two links feel different forces there
                np.testing.assert_allclose(couple, r * size, rtol=EXACT)
    one, two = answer.force_on("A", "one"), answer.force_on("B", "one")
    np.testing.assert_allclose(one + two, 0, atol=EXACT * np.abs(one).max())
    turn = np.linspace(radians(40), radians(5), 36)
    arm = 0.1 * np.array([np.cos(turn), np.sin(turn)])
    moment = arm[0] * two[1] - arm[1] * two[0] + answer.moment_on("A", "one") + answer.moment_on("B", "one")
    np.testing.assert_allclose(moment, 0, atol=EXACT * np.abs(one).max() * 0.1)


def test_the_band_closes_as_friction_goes_to_nothing() -> None:
    bare = TOGGLE.format(angle=40).replace("pins = 0.15\ndiameter = 0.02\n", "") + STROKE
    exact = stroke(parse(bare)).effort[0]
    widths = []
    for mu in (1e-2, 1e-4, 1e-6):
        answer = stroke(parse(TOGGLE.format(angle=40).replace("pins = 0.15", f"pins = {mu}") + STROKE))
        widths.append(float(np.abs(answer.effort - exact).max()))
        np.testing.assert_allclose(answer.frictionless_effort[0], exact, rtol=EXACT)
    assert widths[1] == pytest.approx(widths[0] / 100, rel=0.05) and widths[2] == pytest.approx(
        widths[1] / 100, rel=0.05
    )


def test_power_in_is_never_less_than_power_out() -> None:
    """Driving in, the effort gives more than the load takes; let back, the load gives more than the effort takes."""
    answer = stroke(parse(TOGGLE.format(angle=40) + STROKE))
    assert (answer.efficiency[0] > 0).all() and (answer.efficiency[0] <= 1).all()
    assert (answer.effort[0] > answer.frictionless_effort[0]).all() and (answer.effort[1] < answer.effort[0]).all()


def test_self_locking_edge_is_found_exactly() -> None:
    eps = asin(2 * radius(0.15, 0.02) / 0.1)
    answer = stroke(parse(TOGGLE.format(angle=40).replace('"B"', '"B"') + STROKE.replace("to = 5", "to = 0.5")))
    edges = [e.drive for e in answer.events if e.kind == "self-locking edge"]
    assert edges == pytest.approx([eps], rel=EXACT)


def test_copies_rub_as_each_alone() -> None:
    text = (
        "[dimensions]\nlink = 0.1\n" + TOGGLE.format(angle=40).replace("distance = 0.1", 'distance = "link"') + STROKE
    )
    sizes = np.array([0.098, 0.1, 0.103])
    together = stroke(parse(text), sizes={"link": sizes})
    for k, size in enumerate(sizes):
        alone = stroke(parse(text.replace("link = 0.1\n", f"link = {size}\n")))
        np.testing.assert_allclose(together.effort[:, k], alone.effort[:, 0], rtol=EXACT)


def test_a_rubbing_pin_without_a_diameter_is_a_fault() -> None:
    with pytest.raises(Faults, match=r"pins\.A: it rubs, but has no diameter; give it one"):
        stroke(parse(LEVER.format(mu=0.1).replace("diameter = 0.04\n", "")))
