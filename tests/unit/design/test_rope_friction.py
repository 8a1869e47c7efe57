"""Ropes that lose on their pulleys, both senses: closed forms, printed figures, and what must hold anyhow."""

from __future__ import annotations

from math import asin, atan, exp, log, pi, radians, sin, sqrt

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from linkcalc import parse, stroke
from linkcalc.design.answer import StrokeAnswer
from linkcalc.mechanics.state import Status
from tests.property.resum import unbalanced
from tests.samples import BOOM, SECTOR, SPRUNG
from tests.unit.parts.test_rope import FLAP, SLING, tackle

EXACT = 1e-9
"""relative: what is solved without an iteration is exact but for rounding"""

# a weight of 500 on a plumb slide, its rope over one wheel on the ground to a hauling end
HOIST = """
[units]
length = "m"
[points]
W = [-2, -10]
P = [0, 0]
lead = {lead}
[members]
ground = ["P", "lead"]
weight = ["W"]
[slides.ways]
member = "weight"
along = 90
[ropes.fall]
path = ["W", {{ pulley = "P", radius = 2, wrap = "left", {loss} }}, "lead"]
end = "hauling"
[effort]
haul = "fall"
[load]
at = "W"
direction = -90
size = 500
[stroke]
haul = "fall"
from = 0
to = 3
poses = 4
"""
DOWN, LEVEL = "[2, -6]", "[9, 2]"


def hoist(loss: str, lead: str = DOWN) -> StrokeAnswer:
    answer = stroke(parse(HOIST.format(loss=loss, lead=lead)))
    assert (answer.status == Status.FINE).all()
    assert max(unbalanced(answer).values()) < 1e-12
    return answer


@pytest.mark.parametrize(("lead", "wrap"), [(DOWN, pi), (LEVEL, pi / 2)])
@pytest.mark.parametrize("mu", [0.05, 0.3, 0.6])
def test_a_post_multiplies_by_the_wrap(lead: str, wrap: float, mu: float) -> None:
    """T2 = T1 exp(mu wrap), L. Euler 1762 and J. A. Eytelwein 1808 (common practice)."""
    answer = hoist(f"friction = {mu}", lead)
    np.testing.assert_allclose(answer.effort[0], 500 * exp(mu * wrap), rtol=EXACT)
    np.testing.assert_allclose(answer.effort[1], 500 * exp(-mu * wrap), rtol=EXACT)
    np.testing.assert_allclose(answer.efficiency[0], exp(-mu * wrap), rtol=EXACT)
    assert np.isnan(answer.efficiency[1]).all()
    # both ends are told: the load's is the load, the hauling end's the effort, and the tension is the larger of them
    assert np.allclose(answer.tension_of("fall")[0], answer.effort[0]) and np.allclose(
        answer.tension_of("fall")[1], 500
    )
    np.testing.assert_allclose(np.hypot(*answer.force_on("fall at W", "weight")), 500, rtol=EXACT)
    np.testing.assert_allclose(np.hypot(*answer.force_on("fall at lead", "ground")), answer.effort, rtol=EXACT)
    # and the post takes the torque of the difference, square at its rim
    np.testing.assert_allclose(
        np.abs(answer.moment_on("fall at P", "ground")), 2 * np.abs(answer.effort - 500), rtol=EXACT
    )


def test_turns_of_a_hawser_round_a_bollard() -> None:
    """Beer, Johnston et al., Vector Mechanics for Engineers: Statics, sample problem 8.7, p. 431: 150 N on the free end
    of two full turns hold 7500 N, so mu = 0.311; three turns would hold 53.0 kN."""
    mu = log(50) / (4 * pi)
    assert mu == pytest.approx(0.311, abs=0.0005)
    for turns, ratio in ((2, 7500 / 150), (3, 53033 / 150)):
        # half a turn is drawn; the whole turns are beside it
        answer = hoist(f"friction = {mu}, turns = {turns - 0.5}")
        np.testing.assert_allclose(answer.effort[0] / 500, ratio, rtol=2e-5 if turns == 3 else EXACT)
        np.testing.assert_allclose(500 / answer.effort[1], ratio, rtol=2e-5 if turns == 3 else EXACT)


@pytest.mark.parametrize(("lead", "raise_"), [(DOWN, 611.1), (LEVEL, 577.0)])
def test_pulley_on_a_rubbing_pin(lead: str, raise_: float) -> None:
    """Beer, Johnston et al., Statics, sample problem 8.6, p. 423: 500 lb on a pulley of 2 in, friction circle 0.20 in:
    611.1 lb plumb and 577 lb level to raise it, 409 lb plumb to hold it. (The source rounds angles to a tenth.)"""
    answer = hoist("friction_radius = 0.2", lead)
    assert answer.effort[0] == pytest.approx(raise_, abs=1.0)
    # exactly: the resultant of both tensions is tangent to the friction circle
    if lead == DOWN:
        np.testing.assert_allclose(answer.effort[0], 500 * 2.2 / 1.8, rtol=EXACT)
        np.testing.assert_allclose(answer.effort[1], 500 * 1.8 / 2.2, rtol=EXACT)
        assert answer.effort[1] == pytest.approx(409.0, abs=0.5)
    else:
        # the lines meet at (-2, 2), sqrt(8) from the pin; the resultant passes the pin at 0.2
        turn = radians(45) + asin(0.2 / sqrt(8))
        np.testing.assert_allclose(answer.effort[0], 500 * np.tan(turn), rtol=EXACT)
    pull = np.hypot(*answer.force_on("fall at P", "ground"))
    np.testing.assert_allclose(np.abs(answer.moment_on("fall at P", "ground")), 0.2 * pull, rtol=EXACT)


def test_pin_by_coefficient_and_diameter() -> None:
    """The circle is the pin's radius times sin(atan mu)."""
    circle = 0.25 * sin(atan(0.3))
    answer = hoist("pin_friction = 0.3, pin_diameter = 0.5")
    np.testing.assert_allclose(answer.effort[0], 500 * (2 + circle) / (2 - circle), rtol=EXACT)


@pytest.mark.parametrize("falls", [2, 3, 4])
@pytest.mark.parametrize("eta", [0.96, 0.8])
def test_a_tackle_with_sheaves_that_lose(falls: int, eta: float) -> None:
    """Of the pull P the falls carry eta P, eta² P, ...: load = P eta (1 - eta^n) / (1 - eta) hoisting (common practice
    of the hoisting trade), and with 1/eta for eta letting down."""
    answer = stroke(parse(tackle(falls) + f"[friction]\nsheave_efficiency = {eta}\n"))
    load = 1200 + 3 * 9.80665
    for sense, e in ((0, eta), (1, 1 / eta)):
        np.testing.assert_allclose(answer.effort[sense], load / (e * (1 - e**falls) / (1 - e)), rtol=EXACT)
    assert max(unbalanced(answer).values()) < 1e-12
    np.testing.assert_allclose(answer.frictionless_effort, load / falls, rtol=EXACT)


BRAKE = """
[units]
length = "m"
[points]
O = [0, 0]
rim = [0.5, 0]
F = {F}
A = {A}
B = [-1, -6]
grip = [-3, -6]
[members]
ground = ["O", "F", "A"]
drum = ["O", "rim"]
lever = ["F", "B", "grip"]
[ropes.band]
path = ["A", {{ pulley = "O", radius = 1, wrap = "left", friction = {mu}, on = "drum" }}, "B"]
[effort]
torque_on = "drum"
[load]
at = "grip"
direction = {down}
size = 100
[stroke]
turn = "drum"
from = 0
to = 90
poses = 4
"""


def test_band_brake() -> None:
    """Beer, Johnston et al., Statics, sample problem 8.8, p. 432, a belt that is about to slip over a wrap of 120 deg
    with mu = 0.25 on a drum of 8 in: 600 lb on the tight side, a torque of 1957 lb in. Here as a band brake: the drum
    drags the band on to its dead end at A or on to its lever, whichever way it turns."""
    mu, wrap = 0.25, radians(120)
    # one side plumb down at x = -1 to the lever, the other away at 120 deg from it
    way = np.array([np.cos(radians(-30)), np.sin(radians(-30))])
    a = np.array([np.cos(radians(60)), np.sin(radians(60))]) + 5 * way
    text = BRAKE.format(mu=mu, F="[-2, -6]", A=f"[{a[0]}, {a[1]}]", down=90).replace('wrap = "left"', 'wrap = "right"')
    answer = stroke(parse(text))
    assert (answer.status == Status.FINE).all() and max(unbalanced(answer).values()) < 1e-12
    slack = 100.0  # lever: grip 1 m and band 1 m from F, on opposite sides
    ratio = exp(mu * wrap)
    first, last = (answer.tension_of("band"), np.abs(answer.force_on("band at B", "lever")[1]))
    np.testing.assert_allclose(last, slack, rtol=EXACT)
    torques = sorted(float(t) for t in np.unique(np.round(np.abs(answer.effort), 9)))
    assert torques == pytest.approx(sorted([slack * (ratio - 1), slack * (1 - 1 / ratio)]), rel=1e-8)
    assert first.max() == pytest.approx(slack * ratio, rel=EXACT)
    # the printed case: 600 lb on the tight side of 8 in
    tight = slack * ratio
    assert (tight - slack) * 600 / tight * 8 == pytest.approx(1957, abs=0.5)


losses = st.one_of(
    st.floats(0.3, 1.0).map(lambda e: f"efficiency = {e}"),
    st.floats(0.0, 1.0).map(lambda m: f"friction = {m}"),
    st.floats(0.0, 8.0).map(lambda r: f"friction_radius = {r}"),
)


@given(st.integers(2, 4), st.lists(losses, min_size=4, max_size=4))
def test_power_in_is_never_less_than_power_out(falls: int, each: list[str]) -> None:
    """Hoisting, the effort gives at least what it gives without friction; letting down, it holds back no more."""
    text = tackle(falls)
    for loss in each:
        text = text.replace('wrap = "left" }', f'wrap = "left", {loss} }}', 1) if 'wrap = "left" }' in text else text
    answer = stroke(parse(text))
    assert (answer.status == Status.FINE).all()
    assert max(unbalanced(answer).values()) < 1e-12
    bare = stroke(parse(tackle(falls))).effort
    assert (answer.effort[0] >= bare[0] * (1 - 1e-12)).all()
    assert (answer.effort[-1] <= bare[0] * (1 + 1e-12)).all()
    assert (answer.effort > 0).all()


def test_the_band_closes_as_friction_goes_to_nothing() -> None:
    bare = stroke(parse(tackle(3))).effort[0]
    widths = []
    for loss in (1e-2, 1e-4, 1e-6):
        answer = stroke(parse(tackle(3) + f"[friction]\nsheave_efficiency = {1 - loss}\n"))
        widths.append(float(np.abs(answer.effort - bare).max()))
    assert widths[1] == pytest.approx(widths[0] / 100, rel=0.05)
    assert widths[2] == pytest.approx(widths[1] / 100, rel=0.05)


# a boom held by a rope of fixed length that a second member works: pins and guide rub as well
MIXED = """
[units]
length = "m"
[points]
O = [0, 0]
T = [2, 2]
M = [-0.4, 4]
Q = [-1, 0.6]
[members]
ground = ["O", "M"]
boom = {{ points = ["O", "T"], mass = 20 }}
car = ["Q"]
[slides.rail]
member = "car"
along = 80
[ropes.stay]
path = ["T", {{ pulley = "M", radius = 0.2, wrap = "right", {loss} }}, "Q"]
[friction]
pins = {pins}
diameter = 0.1
slides = {pins}
[effort]
at = "Q"
direction = -100
[load]
mass_at = "T"
mass = 100
[stroke]
turn = "boom"
from = 40
to = 70
poses = 7
"""


@pytest.mark.parametrize("loss", ["efficiency = 0.9", "friction = 0.2", "friction_radius = 0.03"])
@pytest.mark.parametrize("pins", [0, 0.2])
def test_a_rope_of_fixed_length_with_rubbing_pins_and_guide(loss: str, pins: float) -> None:
    text = MIXED.format(loss=loss, pins=pins)
    answer = stroke(parse(text))
    assert (answer.status == Status.FINE).all()
    assert max(unbalanced(answer).values()) < 1e-12
    first = np.hypot(*answer.force_on("stay at T", "boom"))
    last = np.hypot(*answer.force_on("stay at Q", "car"))
    pull = np.hypot(*answer.force_on("stay at M", "ground"))
    match loss.split(" = "):
        case ["efficiency", e]:
            expected = np.full_like(first, 1 / float(e))
        case ["friction", mu]:
            turned = np.arccos((first**2 + last**2 - pull**2) / (2 * first * last))  # the triangle of both tensions
            expected = np.exp(float(mu) * turned)
        case ["friction_radius", r]:
            np.testing.assert_allclose(np.abs(answer.moment_on("stay at M", "ground")), float(r) * pull, rtol=EXACT)
            expected = 1 + float(r) * pull / 0.2 / np.minimum(first, last)
    np.testing.assert_allclose(np.maximum(first, last) / np.minimum(first, last), expected, rtol=EXACT)
    assert (last[0] > first[0]).all() and (last[1] < first[1]).all()  # drawn over M going up, let back coming down
    np.testing.assert_allclose(answer.tension_of("stay"), np.maximum(first, last), rtol=EXACT)
    if pins:
        couple = np.abs(answer.moment_on("O", "boom"))
        np.testing.assert_allclose(couple, 0.05 * sin(atan(0.2)) * np.hypot(*answer.force_on("O", "boom")), rtol=EXACT)


@pytest.mark.parametrize("text", [BOOM, SECTOR, SPRUNG], ids=["boom", "sector", "sprung"])
def test_members_and_pins_balance_where_pulleys_sit_on_pins_and_members_that_move(text: str) -> None:
    answer = stroke(parse(text))
    assert (answer.status == Status.FINE).all() and answer.rubs
    assert max(unbalanced(answer).values()) < 1e-9
    # what is left of the drive's power by friction has the sign that costs the effort in both senses
    more = answer.effort - answer.frictionless_effort
    assert (more[0] * more[1] < 0).all()


def test_copies_lose_as_each_alone() -> None:
    text = MIXED.format(loss='friction = "mu"', pins=0.1)
    text = '[dimensions]\nmu = "0.2"\n' + text
    values = np.array([0.1, 0.2, 0.3])
    together = stroke(parse(text), sizes={"mu": values})
    for k, mu in enumerate(values):
        alone = stroke(parse(text.replace('mu = "0.2"', f'mu = "{mu}"')))
        np.testing.assert_allclose(together.effort[:, k], alone.effort[:, 0], rtol=EXACT)
        np.testing.assert_allclose(together.tension_of("stay")[:, k], alone.tension_of("stay")[:, 0], rtol=EXACT)


LIFTING = """
[units]
length = "m"
[points]
O = [0, 0]
T = { from = "O", distance = 5, angle = 10 }
P = [0, 3]
lead = [-3, 3]
[members]
ground = ["O", "P", "lead"]
boom = ["O", "T"]
[ropes.fall]
path = ["T", { pulley = "P", radius = 0, wrap = "right", efficiency = 0.9 }, "lead"]
end = "hauling"
[effort]
haul = "fall"
[load]
at = "T"
direction = -90
size = 100
[stroke]
turn = "boom"
from = 10
to = 60
poses = 11
"""


def test_the_pose_where_a_rope_lifts_off_is_told() -> None:
    """The lead is level: the rope is straight when T has come up to it, at asin(3/5)."""
    answer = stroke(parse(LIFTING))
    told = [(c.item, c.text) for c in answer.caveats if "off the pulley" in c.text]
    assert told == [("fall", "off the pulley at P: it would have to pass it on the other side, from 36.87 deg on")]
    assert not any("off the pulley" in c.text for c in stroke(parse(LIFTING.replace("to = 60", "to = 36"))).caveats)
    # a whole turn beside it keeps it there
    wound = LIFTING.replace("efficiency = 0.9", "friction = 0.1, turns = 1")
    assert not any("off the pulley" in c.text for c in stroke(parse(wound)).caveats)


def test_a_rope_with_friction_goes_slack_at_the_same_pose() -> None:
    """The pan hangs on the last part: it is slack where the push that turns with the flap bears the pan, as without."""
    text = FLAP.replace('along = ["B", "T"]\nsize = 4.80665', 'direction = 0\nturns_with = "flap"\nsize = 20')
    answer = stroke(parse(text.replace('wrap = "left"', 'wrap = "left", efficiency = 0.8')))
    slack = [e for e in answer.events if e.kind == "slack"]
    assert {e.case for e in slack} == {"forward", "back"}
    assert [e.drive for e in slack] == pytest.approx([asin(9.80665 / 20)] * 2, abs=EXACT)
    assert sum("slack from" in c.text for c in answer.caveats) == 2


@pytest.mark.parametrize(
    ("line", "item"),
    [
        ("[friction]\nslides = 0.61", "friction.slides"),
        ("[friction]\nsheave_efficiency = 0.49", "friction.sheave_efficiency"),
        ("[pins.T1]\nfriction = 0.7\ndiameter = 9", "pins.T1.friction"),
    ],
)
def test_a_friction_beyond_what_is_usual_is_a_warning(line: str, item: str) -> None:
    text = tackle(2)
    if "pins" in line:
        text = MIXED.format(loss="efficiency = 1", pins=0.1)
        line = line.replace("T1", "O").replace("diameter = 9", "diameter = 0.1")
        item = item.replace("T1", "O")
    answer = stroke(parse(f"{text}\n{line}\n"))
    assert [c.item for c in answer.caveats if "unusual" in c.text] == [item]
    usual = line.replace("0.61", "0.6").replace("0.49", "0.5").replace("0.7", "0.6")
    assert not any("unusual" in c.text for c in stroke(parse(f"{text}\n{usual}\n")).caveats)


def test_a_frame_with_friction_has_one_answer() -> None:
    """Nothing moves there, so nothing tells which way friction would work."""
    text = SLING.replace('"hook", "T"', '"hook", { pulley = "T", radius = 0, wrap = "left" }, "W"')
    bare = stroke(parse(text))
    answer = stroke(parse(text + "[friction]\nsheave_efficiency = 0.9\npins = 0.1\ndiameter = 5\n"))
    assert answer.cases == bare.cases and not answer.rubs
    np.testing.assert_allclose(answer.tension_of("sling"), bare.tension_of("sling"), rtol=EXACT)


def test_a_link_twice_over_shares_and_changes_nothing_else() -> None:
    """The pulley sits on a pin of members that share their forces: what its friction does there strains them too."""
    twice = stroke(parse(SECTOR.replace('rocker = ["R", "P"]', 'rocker = ["R", "P"]\nsecond = ["A", "P"]')))
    np.testing.assert_allclose(twice.effort, stroke(parse(SECTOR)).effort, rtol=EXACT)
    assert max(unbalanced(twice).values()) < 1e-12
    one, other = (np.hypot(*twice.force_on("P", name)) for name in ("link", "second"))
    np.testing.assert_allclose(one, other, rtol=1e-3)  # alike but for the side of the pin that each is on
