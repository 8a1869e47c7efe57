"""Friction within loads: seals of gas springs and cylinders, and a screw that is asked for one torque a sense."""

from __future__ import annotations

from math import atan, pi, tan

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.mechanics.state import Status
from tests.property.resum import unbalanced

EXACT = 1e-9

PLATFORM = """
[units]
length = "m"
[points]
base = [0, 0]
top = [0, 1]
rim = [0.4, 1]
[members]
ground = ["base"]
platform = ["top", "rim"]
[slides.ways]
member = "platform"
along = 90
{slides}
[stroke]
travel = "ways"
from = {start}
to = {end}
poses = 4
"""
LOAD = """
[load]
at = "top"
direction = -90
size = 900
"""
GAS = """
[effort]
at = "top"
direction = 90
[loads.strut]
gas_spring = ["base", "top"]
force = 600
length = 1.2
stroke = 0.5
rise = 1.25
seal_friction = 40
"""
CYLINDER = """
[effort]
cylinder = ["base", "top"]
bore = 0.05
seal_friction = 80
"""
DRAWING = """
[effort]
cylinder = ["eye", "top"]
bore = 0.05
rod = 0.02
acts = "pull"
seal_friction = 80
"""
SCREW = """
[effort]
screw = ["base", "top"]
diameter = 0.025
lead = {lead}
friction = {mu}
"""


def platform(*tables: str, slides: str = "", start: float = 0.0, end: float = 0.15) -> str:
    return PLATFORM.format(slides=slides, start=start, end=end) + "".join(tables)


def test_the_seal_of_a_gas_spring_works_against_both_senses() -> None:
    """Up: hand + gas - 40 = 900; down: hand + gas + 40 = 900."""
    answer = stroke(parse(platform(LOAD, GAS)))
    gas = answer.reading("force of strut")
    np.testing.assert_allclose(answer.effort[0], 900 - gas[0] + 40, rtol=EXACT)
    np.testing.assert_allclose(answer.effort[1], 900 - gas[1] - 40, rtol=EXACT)
    np.testing.assert_allclose(answer.reading("rod force of strut"), gas + np.reshape([-40, 40], (2, 1, 1)), rtol=EXACT)
    np.testing.assert_allclose(answer.efficiency[0], (900 - gas[0]) / answer.effort[0], rtol=EXACT)
    assert max(unbalanced(answer).values()) < 1e-12


@pytest.mark.parametrize("drawing", [False, True])
def test_the_pressure_of_a_cylinder_has_the_friction_of_its_seals_in_it(drawing: bool) -> None:
    """Raising, the pressure carries 900 N and 80 N; letting down, 900 N less 80 N. The pins feel 900 N anyhow."""
    text = platform(LOAD, DRAWING if drawing else CYLINDER)
    if drawing:
        text = text.replace("top = [0, 1]", "top = [0, 1]\neye = [0, 2]").replace('["base"]', '["base", "eye"]')
    answer = stroke(parse(text))
    np.testing.assert_allclose(answer.effort[0], 980, rtol=EXACT)
    np.testing.assert_allclose(answer.effort[1], 820, rtol=EXACT)
    area = pi / 4 * (0.05**2 - (0.02**2 if drawing else 0))
    np.testing.assert_allclose(answer.reading("pressure of effort"), answer.effort / area, rtol=EXACT)
    np.testing.assert_allclose(answer.reading("rod force of effort"), 900, rtol=EXACT)
    np.testing.assert_allclose(answer.efficiency[0], 900 / 980, rtol=EXACT)
    assert max(unbalanced(answer).values()) < 1e-12


def test_a_stroke_the_other_way_turns_the_senses_round() -> None:
    answer = stroke(parse(platform(LOAD, CYLINDER, start=0.15, end=0.0)))
    np.testing.assert_allclose(answer.effort[:, 0, 0], [820, 980], rtol=EXACT)


@pytest.mark.parametrize(("mu", "lead"), [(0.15, 0.005), (0.05, 0.02), (0.0, 0.005)])
def test_the_torque_of_a_screw_follows_the_sense(mu: float, lead: float) -> None:
    """Square thread on its mean diameter d, slope tan l = lead / (pi d), friction angle p: F d/2 tan(l + p) raising and
    F d/2 tan(p - l) letting down (minus: it runs back by itself), efficiency tan l / tan(l + p); it holds by itself
    where mu is above the slope (common practice of every textbook of machine elements)."""
    text = platform(LOAD, SCREW.format(mu=mu, lead=lead), slides="friction = 0.1")
    answer = stroke(parse(text))
    rise, turn = lead / (pi * 0.025), atan(mu)
    up, down = (900 * 0.0125 * tan(t) for t in (atan(rise) + turn, turn - atan(rise)))
    np.testing.assert_allclose(answer.effort, 900, rtol=EXACT)
    np.testing.assert_allclose(answer.reading("turning torque of effort")[0], up, rtol=EXACT)
    np.testing.assert_allclose(answer.reading("turning torque of effort")[1], down, rtol=EXACT, atol=1e-12)
    np.testing.assert_allclose(answer.reading("thread efficiency of effort"), rise / tan(atan(rise) + turn), rtol=EXACT)
    np.testing.assert_allclose(answer.reading("holding ratio of effort"), mu / rise, rtol=EXACT)
    assert any("runs back" in c.text for c in answer.caveats) == (mu < rise)
    # work of a turn: what goes in, less what is lost, is the load by the lead
    assert 2 * pi * up * rise / tan(atan(rise) + turn) == pytest.approx(900 * lead, rel=EXACT)


RAMP = """
[units]
length = "m"
[points]
C = [0, 1]
P = [0, 0]
Q = {{ from = "C", distance = 1, angle = -60 }}
R = {{ from = "C", distance = 1, angle = -20 }}
T = {{ from = "C", distance = 1, angle = -50 }}
far = [0, 5]
[members]
ground = ["P", "Q", "R"]
follower = ["T"]
sledge = ["far"]
[tracks.ramp]
point = "T"
arc = ["P", "Q", "R"]
friction = {mu}
[slides.level]
member = "sledge"
along = 0
[slides.plumb]
member = "follower"
on = "sledge"
along = 90
[effort]
at = "T"
direction = 0
[load]
at = "T"
direction = -90
size = 700
[stroke]
travel = "ramp"
from = 0.75
to = 1.0
poses = 5
"""
"""A follower that cannot turn, on an arc of 1 m that begins at its lowest point: the slope there is the travel."""


@pytest.mark.parametrize("mu", [0.1, 0.3])
def test_a_point_on_a_curved_track_is_one_on_an_incline(mu: float) -> None:
    """A level push up a slope b takes W tan(b + p), one that lets down W tan(b - p), p the angle of friction: Beer,
    Johnston et al., Statics, sample problem 8.2, with the slope of the tangent."""
    text = RAMP.format(mu=mu)
    answer = stroke(parse(text))
    assert (answer.status == Status.FINE).all()
    slope = answer.drive[0, 0] / 1.0  # arc from the lowest point, radius 1
    for sense, sign in ((0, 1), (1, -1)):
        np.testing.assert_allclose(answer.effort[sense, 0], 700 * np.tan(slope + sign * atan(mu)), rtol=EXACT)
    assert max(unbalanced(answer).values()) < 1e-12
