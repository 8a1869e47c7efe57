"""Sizes of pins under what their joints carry: poses, stacks, given and chosen sizes, requirements on them."""

from __future__ import annotations

from math import hypot, pi

import numpy as np
import pytest

from linkcalc import parse, pins, read, stroke
from linkcalc.design.pins_answer import PinsAnswer, Sized
from linkcalc.design.sizing.stack import StackPlate, pin_stack
from linkcalc.faults import Faults
from tests.endtoend.models import ROOT
from tests.unit.design.models import FOUR_BAR, LEVER

PRESS = ROOT / "examples" / "lever_press.toml"
TRIPLE = """
[points]
A = [0, 0]
D = [160, 0]
B = { from = "A", distance = 50, angle = 70 }
C = { meets = [["B", 120], ["D", 90]], side = "left" }
E = [70, 200]
S = { meets = [["C", 110], ["E", 60]], side = "left" }
[members]
ground = ["A", "D", "E"]
crank = ["A", "B"]
coupler = ["B", "C"]
rocker = ["D", "C"]
link = ["C", "S"]
swinger = ["E", "S"]
[effort]
torque_on = "crank"
[load]
torque_on = "swinger"
size = 20
[loads.drag]
torque_on = "rocker"
size = 12
[stroke]
turn = "crank"
from = 70
to = 130
poses = 25
[pins.C]
diameter = 11
stack = [["rocker", 4], ["link", 8, 0.5], ["coupler", 9, 1], ["rocker", 4, 0.5]]
"""
"""Coupler, rocker and link on one pin, each with a force that turns on its own."""


def size(answer: PinsAnswer, joint: str, item: str = "pin") -> Sized:
    (found,) = [s for s in answer.joint(joint).sized if s.item == item]
    return found


def test_the_knee_pin_of_the_press_by_hand() -> None:
    """As at the head of the example: 6500 N mm plumb, 264.8 x 25.5 - 529.7 x 3 level, under 2000 N at 150/145."""
    knee = size(pins(read(PRESS)), "K")
    level = 2000 * (150**2 - 145**2) ** 0.5 / 145 / 2  # of each plate of a link
    expected = hypot(6.5, (level * 25.5 - 2 * level * 3) * 1e-3)
    assert knee.working["M"] == pytest.approx(expected, rel=1e-6)
    # bending governs, and at 9.07 mm it is used to the full
    assert knee.required == pytest.approx((32 * expected / (pi * 340e6 / 3)) ** (1 / 3), rel=1e-6)
    assert knee.chosen == "10 mm"


def test_a_given_diameter_is_judged_and_what_is_needed_told() -> None:
    """The head pin of 12 mm: fork plates of 6 mm, eye of 20 mm, gaps of 0.5 mm: F/2 (3 + 5 + 0.5)."""
    head = size(pins(read(PRESS)), "A")
    force = 2000 * 150 / 145
    moment = force / 2 * 8.5e-3
    assert head.working["M"] == pytest.approx(moment, rel=1e-9)
    assert head.working["sigma"] == pytest.approx(32 * moment / (pi * 0.012**3), rel=1e-9)
    assert (head.chosen, head.size) == ("", 0.012)
    assert head.required is not None and head.required < 0.012


def test_without_a_stack_the_pin_shears_in_one_section() -> None:
    answer = pins(parse(LEVER + '[pins.A]\nmaterial = "S235"\nfactor = 3\n'))
    pin, force = size(answer, "A"), answer.joint("A").largest.value
    assert pin.required == pytest.approx((4 * force / (pi * 235e6 / 3 / 3**0.5)) ** 0.5, rel=1e-9)


def test_a_thick_bar_is_weaker() -> None:
    """S235 is good for 235 MPa up to 16 mm and for 225 MPa up to 40 mm (EN 10025-2); 60 kN ask for more than 16."""
    pin = size(pins(parse(LEVER.replace("size = 600", "size = 60000") + '[pins.A]\nmaterial = "S235"\n')), "A")
    assert pin.working["Re"] == pytest.approx(225e6)
    assert pin.size > 0.016


def test_the_worst_pose_of_a_pin_of_three_is_its_own() -> None:
    """Against 2001 poses each reckoned by itself: the moment of the sheet is the largest of all, to the sampling."""
    model = parse(TRIPLE)
    pin = size(pins(model), "C")
    fine = stroke(model, poses=2001)
    plates = [StackPlate("rocker", 4e-3), StackPlate("link", 8e-3, 0.5e-3), StackPlate("coupler", 9e-3, 1e-3),
              StackPlate("rocker", 4e-3, 0.5e-3)]  # fmt: skip
    forces = {m: -fine.force_on("C", m)[:, 0, 0] for m in ("rocker", "link", "coupler")}
    every = pin_stack(plates, forces).equivalent(0.011).value.max()
    assert pin.working["combined"] == pytest.approx(every, rel=1e-5)


def test_stress_of_a_pin_is_judged_at_its_exact_worst() -> None:
    model = TRIPLE + '[requirements]\npin = "stress in pin C <= 50 MPa"\nat = "stress in pin C <= 50 MPa at 100 deg"\n'
    worst, there = stroke(parse(model)).verdicts
    fine = stroke(parse(model), poses=2001)
    plates = [StackPlate("rocker", 4e-3), StackPlate("link", 8e-3, 0.5e-3), StackPlate("coupler", 9e-3, 1e-3),
              StackPlate("rocker", 4e-3, 0.5e-3)]  # fmt: skip
    forces = {m: -fine.force_on("C", m)[:, 0, 0] for m in ("rocker", "link", "coupler")}
    stress = pin_stack(plates, forces).equivalent(0.011).value
    assert worst.worst >= stress.max() * (1 - 1e-12)
    assert worst.worst == pytest.approx(stress.max(), rel=1e-6)
    assert there.worst == pytest.approx(np.interp(np.radians(100), fine.drive[0, 0], stress), rel=1e-5)


def test_pressure_of_a_bush() -> None:
    """Largest force over bore times length: 800 N at most on 10 x 16 mm², in the lever through its level."""
    text = LEVER.replace("from = 10\nto = 70", "from = -20\nto = 25") + (
        '[pins.A]\ndiameter = 10\nbush = "sintered bronze"\nlength = 16\n[requirements]\np = "pressure at A <= 6 MPa"\n'
    )
    (verdict,) = stroke(parse(text)).verdicts
    assert verdict.worst == pytest.approx(800 / 160e-6, rel=1e-9)
    assert verdict.holds


def test_life_of_a_bearing() -> None:
    """ISO 281 by hand: 1e6 (C/P)³ turns, a stroke there and back rolling twice the swing, for a load that stays."""
    text = """
[points]
A = [0, 0]
B = [0, -80]
[members]
ground = ["A"]
arm = ["A", "B"]
[effort]
torque_on = "arm"
[load]
at = "B"
direction = -90
size = 900
[stroke]
turn = "arm"
from = -150
to = -60
[pins.A]
bearing = "sample ball 10"
[requirements]
life = "life at A >= 1e6"
"""
    (verdict,) = pins(parse(text)).stroke.verdicts
    assert verdict.worst == pytest.approx(1e6 * (4500 / 900) ** 3 * 180 / 90, rel=1e-9)
    assert verdict.holds
    assert stroke(parse(text)).verdicts[0].worst == verdict.worst
    # of a kind the smallest that does is meant; the least bore of the list is that of the one above
    of_kind = pins(parse(text.replace("sample ball 10", "ball")))
    assert of_kind.stroke.verdicts[0].worst == verdict.worst
    assert size(of_kind, "A", "bearing").chosen == "sample ball 10"


def test_rubbing_of_a_bush_over_a_whole_turn() -> None:
    """A crank of the four-bar at 20 turns a minute on a bore of 12 mm: pi 12 mm x 20/60 s."""
    text = FOUR_BAR + '[pins.A]\ndiameter = 12\nbush = "thermoplastic"\nlength = 15\n'
    bush = size(pins(parse(text), rate=20 / 60), "A", "bush")
    assert bush.working["v"] == pytest.approx(pi * 0.012 / 3, rel=1e-9)


def test_no_size_where_the_force_has_no_bound() -> None:
    """The toggle let through its dead point: what its pins carry there is set by stretch and play."""
    text = """
points.A = [0, 0]
points.B = { from = "A", distance = 100, angle = 60 }
points.C = { mirror = "A", line = ["B", "foot"] }
points.foot = [50, 0]
members.ground = ["A"]
members.upper = ["A", "B"]
members.lower = ["B", "C"]
slots.way = { point = "C", along = 0 }
effort = { at = "B", on = "upper", direction = -90, size = 10 }
load = { at = "C", direction = 180 }
stroke = { turn = "upper", from = 60, to = -5, poses = 61 }
"""
    answer = pins(parse(text))
    assert np.isinf(answer.joint("A").largest.value)
    assert answer.joint("A").sized == ()


def test_an_unknown_bush_is_told_of_its_pin() -> None:
    with pytest.raises(Faults, match=r"pins\.A: unknown bush material 'bronce'"):
        pins(parse(LEVER + '[pins.A]\ndiameter = 10\nbush = "bronce"\n'))


def test_a_member_of_twin_plates_bends_the_pin_with_both() -> None:
    """What a member of two plates feels is told of one; on the pin both push: as before at the head pin."""
    text = PRESS.read_text(encoding="utf-8")
    twins = text.replace('upper = ["A", "K"]', 'upper = { points = ["A", "K"], copies = 2 }')
    assert twins != text
    one, two = (size(pins(parse(t)), "A") for t in (text, twins))
    assert two.working["M"] == pytest.approx(one.working["M"], rel=1e-12)
    asked = twins + 'head = "stress in pin A <= 1 MPa"\n'
    verdict = stroke(parse(asked)).verdicts[-1]
    assert verdict.worst == pytest.approx(one.working["combined"], rel=1e-9)
