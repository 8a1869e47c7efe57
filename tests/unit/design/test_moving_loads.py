"""Loads that move along a member: reactions, effort and events over their place, against the lever law."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc import Faults, members, parse, stroke
from linkcalc.design.check import check_model
from linkcalc.design.copies import copies
from tests.property.resum import unbalanced
from tests.unit.mechanics.test_redundancy import BEAM

RUNWAY = """
[points]
A = [0, 0]
B = [6000, 0]
C = [7000, 0]
[members]
ground = ["A"]
beam = ["A", "B", "C"]
[slots.roller]
point = "B"
along = 0
[load]
moves_along = ["A", "C"]
direction = -90
size = "20 kN"
[stroke]
place = "load"
to = 7000
poses = 8
"""
"""A beam on two supports, 6 m apart, that runs on for 1 m; a wheel goes along it."""


def test_reactions_of_a_beam_over_the_place_of_a_wheel() -> None:
    """The lever law: B takes P s/L, A takes P (1 - s/L); beyond B the beam lifts off A."""
    answer = stroke(parse(RUNWAY))
    s = np.linspace(0.0, 7.0, 8)
    assert answer.drive_name == "place of load"
    assert answer.drive[0, 0] == pytest.approx(s, rel=1e-12, abs=1e-12)
    assert answer.force_on("roller", "beam")[1, 0, 0] == pytest.approx(20e3 * s / 6, rel=1e-12, abs=1e-9)
    assert answer.force_on("A", "beam")[1, 0, 0] == pytest.approx(20e3 * (1 - s / 6), rel=1e-12, abs=1e-9)
    assert np.ptp(answer.turn) == 0.0
    assert max(unbalanced(answer).values()) < 1e-12
    assert not answer.caveats


def test_extremes_and_requirements_are_exact_over_the_place() -> None:
    """The least force at A is nothing, where the wheel stands over B; the most at B is P 7/6."""
    text = RUNWAY + '[requirements]\nroller = "force at roller <= 23 kN"\nmiddle = "force at A >= 9.9 kN at 3000"\n'
    answer = stroke(parse(text.replace("to = 7000\nposes = 8", "from = 400\nto = 6900\nposes = 8")))
    found = {(e.kind, e.quantity): e for e in answer.events}
    assert found["smallest", "force at A"].drive == pytest.approx(6.0, abs=1e-9)
    assert found["largest", "force at roller"].drive == pytest.approx(6.9, rel=1e-12)
    assert [(v.holds, v.worst) for v in answer.verdicts] == [
        (True, pytest.approx(20e3 * 6.9 / 6, rel=1e-12)), (True, pytest.approx(10e3, rel=1e-12)),
    ]  # fmt: skip
    assert "load" not in {e.quantity for e in answer.events}, "a load that is given has no extremes"


SCALE = """
[points]
O = [0, 0]
K = [-40, 0]
E = [300, 0]
P = [-40, -200]
Q = [-340, -200]
L = [-40, -260]
[members]
ground = ["O"]
beam = ["O", "K", "E"]
platform = ["K", "P", "Q", "L"]
[slots.check_link]
point = "L"
along = 90
[effort]
at = "E"
direction = -90
[loads.goods]
mass_along = ["P", "Q"]
mass = 15
[load]
at = "P"
on = "platform"
direction = -90
size = 30
[stroke]
place = "goods"
to = 300
poses = 5
"""
"""A platform hung from a beam and kept upright by a guide at its foot."""


def test_an_effort_holds_the_mechanism_while_a_load_is_moved() -> None:
    """Where the goods stand does not matter to the weight that balances them: (15 g + 30) 40/300. It does to the
    guide, which takes 15 g s over the height from K to L."""
    answer = stroke(parse(SCALE))
    s = np.linspace(0.0, 0.3, 5)
    weight = 15 * 9.80665
    assert answer.effort[0, 0] == pytest.approx(np.full(5, (weight + 30) * 40 / 300), rel=1e-12)
    assert np.abs(answer.force_on("check_link", "platform")[0, 0, 0]) == pytest.approx(weight * s / 0.26, abs=1e-9)
    assert answer.ideal_ratio[0, 0] == pytest.approx(np.full(5, 7.5), rel=1e-12)
    assert answer.checks.virtual_work < 1e-12
    assert max(unbalanced(answer).values()) < 1e-12


def test_a_load_over_the_pivot_is_its_dead_point() -> None:
    """A lever held at its end by a force: E 300 = P (s - 100) with the pivot 100 along the line."""
    text = """
[points]
O = [0, 0]
S = [-100, 0]
E = [300, 0]
[members]
ground = ["O"]
lever = ["S", "O", "E"]
[effort]
at = "E"
direction = 90
[load]
moves_along = ["S", "E"]
direction = -90
size = 60
[stroke]
place = "load"
from = 20
to = 380
poses = 10
"""
    answer = stroke(parse(text))
    s = answer.drive[0, 0]
    assert answer.effort[0, 0] == pytest.approx(60 * (s - 0.1) / 0.3, rel=1e-12, abs=1e-12)
    (dead,) = [e for e in answer.events if e.kind == "dead point"]
    assert (dead.quantity, dead.drive) == ("load", pytest.approx(0.1, abs=1e-9))


def test_friction_holds_both_ways_with_a_moving_load() -> None:
    """A rubbing pin under a lever: M = r sin(atan mu) R, R the sum of both downward forces."""
    text = """
[points]
O = [0, 0]
S = [-400, 0]
E = [300, 0]
[members]
ground = ["O"]
lever = ["S", "O", "E"]
[pins.O]
friction_radius = 6
[effort]
at = "E"
direction = -90
[load]
moves_along = ["O", "S"]
direction = -90
size = 60
[stroke]
place = "load"
from = 50
to = 400
poses = 4
"""
    answer = stroke(parse(text))
    s = answer.drive[0, 0]
    for case, sign in ((0, 1.0), (1, -1.0)):
        r = sign * 0.006
        assert answer.effort[case, 0] == pytest.approx(60 * (s + r) / (0.3 - r), rel=1e-12)


def test_a_wheel_over_three_supports() -> None:
    """Joints that share: the rigid beam on springs, for every place of the load."""
    crate = BEAM[BEAM.index("[loads.crate]") :]
    text = BEAM.replace(crate, '[load]\nmoves_along = ["A", "C"]\ndirection = -90\nsize = 900\n')
    answer = stroke(parse(text + '[stroke]\nplace = "load"\nposes = 6\n'))
    x, s = np.array([0.0, 0.4, 1.0]), np.linspace(0, 1.0, 6)
    middle, spread = x.mean(), ((x - x.mean()) ** 2).sum()
    for name, place in zip(("A", "middle", "end"), x, strict=True):
        wanted = 900 * (1 / 3 + (s - middle) * (place - middle) / spread)
        assert answer.force_on(name, "beam")[1, 0, 0] == pytest.approx(wanted, rel=1e-9, abs=1e-7)


def test_the_line_goes_with_its_member() -> None:
    """In a stroke that moves the mechanism the load stands at its place on the member: a pendulum held by torque."""
    text = """
[points]
O = [0, 0]
E = [300, 0]
[members]
ground = ["O"]
arm = ["O", "E"]
[effort]
torque_on = "arm"
[load]
mass_along = ["O", "E"]
mass = 4
place = 120
[stroke]
turn = "arm"
from = 0
to = 80
poses = 5
"""
    answer = stroke(parse(text))
    turn = np.radians(np.linspace(0, 80, 5))
    assert answer.effort[0, 0] == pytest.approx(4 * 9.80665 * 0.12 * np.cos(turn), rel=1e-12)


def test_copies_with_other_sizes() -> None:
    text = RUNWAY.replace("B = [6000, 0]", 'B = ["span", "0 mm"]') + "[dimensions]\nspan = 6000\n"
    spans = np.array([5.0, 6.0, 6.5])
    many = stroke(parse(text), sizes={"span": spans})
    s = np.linspace(0.0, 7.0, 8)
    wanted = 20e3 * s[None, :] / spans[:, None]
    assert many.force_on("roller", "beam")[1, 0] == pytest.approx(wanted, rel=1e-12, abs=1e-9)
    streamed = [p.joints["roller"][0][0] for p in copies(parse(text), {"span": spans}, poses=8)]
    assert pytest.approx(wanted, rel=1e-12, abs=1e-9) == np.array(streamed).T


def test_a_look_at_the_model_tells_the_ends_of_the_line() -> None:
    motion = check_model(parse(RUNWAY)).motion
    assert motion is not None
    assert (motion.lower, motion.drawn, motion.upper) == (0.0, 0.0, pytest.approx(7.0))


def test_limits_are_the_ends_of_the_line() -> None:
    text = RUNWAY.replace("to = 7000", 'from = "upper limit"\nto = "lower limit"')
    assert stroke(parse(text)).drive[0, 0, [0, -1]] == pytest.approx([7.0, 0.0], abs=1e-12)


def test_beyond_its_line_it_warns() -> None:
    answer = stroke(parse(RUNWAY.replace("to = 7000", "from = -500\nto = 7600")))
    assert [(c.item, c.text) for c in answer.caveats] == [
        ("load", "it stands beyond the end of its line A to C, up to 0 mm"),
        ("load", "it stands beyond the end of its line A to C, from 7000 mm on"),
    ]


@pytest.mark.parametrize(
    ("old", "new", "says"),
    [
        ('place = "load"', 'place = "laod"', "stroke.place: unknown load 'laod'; did you mean 'load'?"),
        ('moves_along = ["A", "C"]', 'at = "C"', "stroke.place: load does not move along a line; a load of the kind "
         "'moves_along' or 'mass_along' is wanted"),
        ('["A", "C"]\ndirection', '["A", "A"]\ndirection', "load.moves_along: A to A is no line; two points"),
        ('["A", "C"]\ndirection', '["A", "D"]\ndirection', "load.moves_along: no member carries both A and D; take two "
         "points of one member"),
        ('["A", "C"]\ndirection', '["A", "C"]\non = "ground"\ndirection', "load.on: ground does not carry both A and C"
         "; beam is wanted"),
        ('["A", "C"]\ndirection', '["A", "C"]\nplace = "3 N"\ndirection', "load.place: 3 N is a force; a length is "
         "wanted (e.g. 12 mm)"),
        ("to = 7000", "from = 3\nto = 3", "stroke.to: the stroke ends where it begins; another end is wanted"),
        ("to = 7000", 'from = "upper limit"', "stroke.to: the stroke ends where it begins; another end is wanted"),
        ("direction = -90\n", "", "load: 'direction' is missing; where it points, from the x axis"),
    ],
)  # fmt: skip
def test_what_is_wrong_is_told(old: str, new: str, says: str) -> None:
    text = RUNWAY.replace("C = [7000, 0]", "C = [7000, 0]\nD = [0, -500]")
    assert text.count(old) == 1
    with pytest.raises(Faults) as found:
        stroke(parse(text.replace(old, new)))
    assert says in str(found.value)
    assert str(found.value).count("\n") == 0, "one message"


def test_a_load_on_the_ground_is_turned_down() -> None:
    text = RUNWAY.replace("C = [7000, 0]", "C = [7000, 0]\nD = [0, -500]").replace('["A"]', '["A", "D"]')
    with pytest.raises(Faults, match="it stands on the ground, and loads nothing"):
        parse(text.replace('["A", "C"]\ndirection', '["A", "D"]\ndirection'))


def test_what_settles_anew_at_every_place_is_turned_down() -> None:
    text = RUNWAY + "[pins.A]\nstiffness = 900\n"
    with pytest.raises(Faults, match="the mechanism gives or has free members, which settle anew"):
        stroke(parse(text))


def test_a_mechanism_that_nothing_holds_is_turned_down() -> None:
    text = RUNWAY.replace('[slots.roller]\npoint = "B"\nalong = 0\n', "")
    with pytest.raises(Faults, match="1 degree of freedom: beam can move; give the model an"):
        stroke(parse(text))


def test_bending_under_a_moving_wheel() -> None:
    """Largest moment of a beam under one wheel: P l/4 with the wheel in the middle (common practice)."""
    answer = members(parse(RUNWAY.replace("to = 7000\nposes = 8", "to = 6000\nposes = 21")))
    (beam,) = answer.members
    assert beam.bending is not None
    assert beam.bending.value == pytest.approx(20e3 * 6 / 4, rel=1e-9)
    assert beam.bending.drive == pytest.approx(3.0, abs=1e-6)
