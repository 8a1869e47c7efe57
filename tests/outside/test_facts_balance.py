"""Balancing against published conditions and the laws of the lever, each with its source."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc import balance, balance_positions, dumps, parse, stroke
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import drawn

EXACT = 1e-9
ARM = """
[points]
A = [0, 0]
back = [-400, 0]
G = [300, 0]
[members]
ground = ["A"]
arm = {{ points = ["back", "A", "G"], mass = {mass}, centre = "G" }}
[effort]
torque_on = "arm"
[stroke]
turn = "arm"
line = ["A", "G"]
from = -70
to = 80
{more}
"""


@pytest.mark.parametrize(("mass", "at"), [(4, 100), (4, 250), (12.5, 400)])
def test_a_balanced_arm_obeys_the_law_of_the_lever(mass: float, at: float) -> None:
    """m l = M L at every pose (Archimedes, On the Equilibrium of Planes, book I, propositions 6 and 7)."""
    more = '[balance.find.bob]\nmass_on = "arm"\nplace = "P"\n'
    text = (
        ARM.format(mass=mass, more=more)
        .replace("[points]", f"[points]\nP = [-{at}, 0]")
        .replace('["back",', '["back", "P",')
    )
    answer = balance(parse(text))
    assert answer.found[0].size("mass") == pytest.approx(mass * 300 / at, rel=EXACT)
    assert answer.exact
    assert np.abs(answer.after.effort).max() <= EXACT * np.abs(answer.before.effort).max()
    assert answer.positions_after.neutral == ("",)


@pytest.mark.parametrize("mass", [3.5, 9, 40])
def test_a_given_mass_finds_its_place_by_the_law_of_the_lever(mass: float) -> None:
    """l = M L/m (as above)."""
    more = f'[balance.find.bob]\nmass_on = "arm"\nplace = {{ line = ["A", "back"] }}\nmass = {mass}\n'
    answer = balance(parse(ARM.format(mass=4, more=more)))
    assert answer.found[0].size("from A") == pytest.approx(4 * 0.3 / mass, rel=EXACT)
    assert answer.exact


def test_the_lightest_of_all_that_balance_is_the_farthest_out() -> None:
    """Of all m l = M L the least m has the greatest l: 4 x 300/400 = 3 kg."""
    more = '[balance.find.bob]\nmass_on = "arm"\nplace = { line = ["A", "back"] }\n'
    found = balance(parse(ARM.format(mass=4, more=more))).found[0]
    assert found.size("mass") == pytest.approx(3, rel=1e-7)
    assert found.size("from A") == pytest.approx(0.4, rel=1e-7)


SPRUNG = """
[points]
A = [0, 0]
S = [0, 200]
R = [100, 0]
G = [500, 0]
[members]
ground = ["A", "S"]
arm = { points = ["A", "R", "G"], mass = 10, centre = "G" }
[effort]
torque_on = "arm"
[stroke]
turn = "arm"
from = -60
to = 85
[balance.find.balancer]
spring = ["S", "R"]
free_length = 0
acts = "tension"
"""


def test_a_spring_without_free_length_balances_every_pose() -> None:
    """m g l = c a r: spring from a above the pivot to r out on the arm (J. L. Herder, Energy-free Systems, 2001, from
    memory; the condition as read in a technical note on static balancing).
    10 x 9.80665 x 0.5/(0.2 x 0.1) = 2451.6625 N/m."""
    answer = balance(parse(SPRUNG))
    assert answer.found[0].size("rate") == pytest.approx(2451.6625, abs=1e-4)
    assert answer.exact
    at = np.radians([-60.0, 0.0, 37.0, 85.0]).tolist()
    assert np.abs(stroke(answer.after.mechanism, at=at).effort).max() <= 1e-9


def test_a_spring_with_its_free_length_to_be_found_finds_that_it_wants_none() -> None:
    """The same: of all rates and free lengths only c = m g l/(a r) with no free length leaves nothing."""
    answer = balance(parse(SPRUNG.replace("free_length = 0", "free_length = [0, 120]")))
    assert answer.exact
    assert answer.found[0].size("rate") == pytest.approx(2451.6625, rel=1e-7)
    assert answer.found[0].size("free length") == pytest.approx(0, abs=1e-9)


FOUR_BAR = """
[points]
A = [0, 0]
D = [300, 0]
B = { from = "A", distance = 100, angle = 60 }
C = { meets = [["B", 250], ["D", 200]], side = "left" }
G = { on = ["B", "C"], distance = 110, offset = 0 }
[members]
ground = ["A", "D"]
crank = ["A", "B"]
coupler = { points = ["B", "C", "G"], path = ["B", "C"], mass = 3, centre = "G" }
rocker = ["D", "C"]
[effort]
torque_on = "crank"
[stroke]
turn = "crank"
from = "drawn"
to = 420
poses = 121
[balance.find.first]
mass_on = "crank"
place = { within = 80, of = "A" }
[balance.find.second]
mass_on = "rocker"
place = { within = 90, of = "D" }
"""


def test_two_counterweights_balance_a_four_bar_at_every_pose() -> None:
    """Full force balance of a four-bar by counterweights on its two links that turn about the frame (R. S. Berkof and
    G. G. Lowen, A new method for completely force balancing simple linkages, Journal of Engineering for Industry, 1969,
    from memory): the coupler's mass m at b from B of length L is shared out to B and C, m (L - b)/L and m b/L, and each
    link carries its share at its end. So the mass times arm is m (L - b)/L x 100 behind A, m b/L x 200 behind D."""
    answer = balance(parse(FOUR_BAR))
    assert answer.exact
    shares = {"first": 3 * 140 / 250 * 0.1, "second": 3 * 110 / 250 * 0.2}
    origins = {"first": ("A", "B"), "second": ("D", "C")}
    points = _drawn(answer.after.mechanism)
    for part in answer.found:
        a, b = (points[p] for p in origins[part.name])
        arm = np.array([part.size("x"), part.size("y")]) - a
        along = (b - a) / np.linalg.norm(b - a)
        # with free mass and place the lightest is taken, but their product is settled
        np.testing.assert_allclose(part.size("mass") * arm, -shares[part.name] * along, atol=1e-8)


def _drawn(mechanism: Mechanism) -> dict[str, np.ndarray]:
    return {name: np.array(place, float) for name, place in drawn(mechanism).points.items()}


def test_the_found_counterweight_stands_in_the_written_model() -> None:
    """Written, read and stepped again the model gives the effort that was told."""
    answer = balance(parse(FOUR_BAR.replace("within = 80", "within = 15")))
    again = stroke(parse(dumps(answer.after.mechanism)))
    np.testing.assert_allclose(again.effort, answer.after.effort, rtol=1e-9, atol=1e-12)
    assert not answer.exact or answer.geometry <= 1e-9


def test_a_pendulum_balances_hanging_down_and_standing_up() -> None:
    """Moment m g l cos(angle): nothing at -90 and 90 degrees; stiffness m g l, plus below where it hangs, minus above.
    Closed form: the derivative of the moment that holds it is -m g l sin(angle)."""
    text = ARM.format(mass=4, more="").replace("from = -70", "from = -120").replace("to = 80", "to = 130")
    found = balance_positions(parse(text))
    stiff = 4 * 9.80665 * 0.3
    assert [p.steady for p in found.places] == [1, -1]
    np.testing.assert_allclose([p.drive for p in found.places], np.radians([-90, 90]), atol=1e-9)
    np.testing.assert_allclose([p.stiffness for p in found.places], [stiff, -stiff], rtol=1e-8)


def test_a_hand_shifts_the_balance() -> None:
    """A torque T balances where m g l cos(angle) = T, that is at +-acos(T/(m g l)); stable below, unstable above."""
    full = 4 * 9.80665 * 0.3
    found = balance_positions(parse(ARM.format(mass=4, more="")), effort=full / 2)
    np.testing.assert_allclose([p.drive for p in found.places], np.radians([-60, 60]), atol=1e-9)
    assert [p.steady for p in found.places] == [1, -1]


def test_friction_holds_the_arm_near_its_balance() -> None:
    """The pin carries the weight W alone; its friction holds a moment of W r_f, so the arm stays where
    |l cos(angle)| <= r_f: r_f = 6 mm of 300 mm is 90 -+ asin(6/300). Closed form; friction circle of a pin."""
    text = (
        ARM.format(mass=4, more="[pins.A]\nfriction_radius = 6\n").replace("to = 80", "to = 130").replace("-70", "30")
    )
    text = (
        text.replace('[members]\nground = ["A"]', '[members]\nground = ["A"]\nstub = ["A", "back2"]') if False else text
    )
    found = balance_positions(parse(text))
    half = np.degrees(np.arcsin(6 / 300))
    assert len(found.held) == 1
    np.testing.assert_allclose(np.degrees([found.held[0].start, found.held[0].stop]), [90 - half, 90 + half], atol=1e-6)
    np.testing.assert_allclose(np.degrees(found.places[0].drive), 90, atol=1e-7)


def test_every_case_has_its_own_balance() -> None:
    """Gravity turned by a: the moment is m g l cos(angle + 90 - (90 + a)), so both balances turn by a too."""
    more = "[cases.level]\n[cases.tilted]\ngravity = { turn = 10 }\n"
    text = ARM.format(mass=4, more=more).replace("from = -70", "from = -100").replace("to = 80", "to = 130")
    found = balance_positions(parse(text))
    told = [(p.case, round(float(np.degrees(p.drive)), 6), p.steady) for p in found.places]
    assert told == [("level", -90.0, 1), ("level", 90.0, -1), ("tilted", -80.0, 1), ("tilted", 100.0, -1)]
