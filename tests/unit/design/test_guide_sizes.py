"""Guides under normal force and moment, ropes against their breaking load: closed forms, fine sampling, laws."""

from __future__ import annotations

from math import exp, pi, radians, sin, sqrt, tan

import numpy as np
import pytest

from linkcalc import parse, pins, read, stroke
from linkcalc.design.answer import Verdict
from linkcalc.design.pins_answer import PinsAnswer, Sized
from tests.endtoend.models import ROOT
from tests.samples import SLOTTED
from tests.unit.design.models import PRESS

R, L, F, G = 0.05, 0.13, 900.0, 0.1
LONG, WIDE = 0.06, 0.02
RAM = f"""
[points]
A = [0, 0]
B = {{ from = "A", distance = 50, angle = 60 }}
C = [{25 + sqrt(130**2 - 2500 * 0.75)!r}, 0]
G = {{ on = ["A", "C"], distance = {125 + sqrt(130**2 - 2500 * 0.75)!r} }}
tool = {{ on = ["A", "G"], distance = 400, offset = OFF }}
[members]
ground = ["A"]
crank = ["A", "B"]
rod = ["B", "C"]
ram = {{ points = ["C", "G", "tool"] }}
[slides.guide]
member = "ram"
along = 0
at = "G"
length = 60
width = 20
allowed_pressure = 5
[effort]
torque_on = "crank"
[load]
at = "tool"
direction = 180
size = 900
[stroke]
turn = "crank"
from = 30
to = 150
poses = 37
"""
"""A crank r pushes a ram along the x axis over a rod l against F, which acts `off` beside the axis.

The rod leans by sin a = r sin(turn)/l, so the guide, g ahead of the rod's pin, gives N = F tan a and takes the moment
of both: M = F |off + g tan a|.
"""


def lean(degrees: float) -> float:
    s = R * sin(radians(degrees)) / L
    return s / sqrt(1 - s * s)


def edge(degrees: float, off: float) -> float:
    """[Pa] N/(l b) + 6 M/(l² b)"""
    return F * (lean(degrees) / (LONG * WIDE) + 6 * abs(off + G * lean(degrees)) / (LONG**2 * WIDE))


def ram(off: float, more: str = "") -> str:
    return RAM.replace("OFF", repr(off)) + more


def guide(answer: PinsAnswer, name: str = "guide") -> Sized:
    (found,) = answer.joint(name).sized
    assert found.item == "guide"
    return found


def judged(text: str, requirement: str) -> Verdict:
    (verdict,) = stroke(parse(f'{text}\n[requirements]\nit = "{requirement}"\n')).verdicts
    return verdict


@pytest.mark.parametrize(
    ("off", "where"),
    [
        (10, 90),  # the moment grows with the lean: both are largest where the rod leans most
        (-30, 90),  # it passes through nothing on the way, a kink of the curve, and is larger beyond
        (-35, 30),  # largest where the normal force is smallest, at both ends alike
    ],
)
def test_the_edge_of_a_guide_by_hand(off: float, where: float) -> None:
    sized = guide(pins(parse(ram(off))))
    assert sized.worst is not None
    assert sized.worst.value == pytest.approx(edge(where, off / 1000), rel=1e-9)
    assert sized.worst.value == pytest.approx(sized.working["p_edge"], rel=1e-12)
    assert min(abs(np.degrees(sized.worst.drive) - w) for w in (where, 180 - where)) < 1e-4
    assert sized.working["N"] == pytest.approx(F * lean(where), rel=1e-9)
    assert sized.working["M"] == pytest.approx(F * abs(off / 1000 + G * lean(where)), rel=1e-9)
    assert sized.utilisation == pytest.approx(edge(where, off / 1000) / 5e6, rel=1e-9)


def test_no_pose_is_worse() -> None:
    every = [edge(d, -0.03) for d in np.linspace(30, 150, 4001)]
    worst = guide(pins(parse(ram(-30)))).worst
    assert worst is not None and max(every) <= worst.value <= max(every) * (1 + 1e-6)


def test_a_force_at_the_edge_of_the_core_presses_twice_the_mean() -> None:
    """A rectangle pressed a sixth of its length from its middle: no pressure at one edge, twice the mean at the other
    (the core of a section, textbooks of strength of materials; from memory)."""
    text = """
points.O = [0, 0]
points.P = [0, 50]
points.Q = [12, 50]
members.ground = ["O"]
members.block = ["P", "Q"]
slides.bed = { member = "block", along = 0, at = "P", length = 72, width = 25 }
effort = { at = "P", direction = 0 }
load = { at = "Q", direction = -90, size = 450 }
stroke = { travel = "bed", from = "drawn", to = 40 }
"""
    sized = guide(pins(parse(text)), "bed")
    assert sized.working["p_edge"] == pytest.approx(2 * 450 / (0.072 * 0.025), rel=1e-9)
    assert (sized.required, sized.working.checks) == (None, ())  # nothing is allowed, so nothing is used


def test_the_length_that_is_needed_is_used_to_the_full() -> None:
    """Without friction the forces do not hang on the length: a guide so long is used to 100 % somewhere, never more."""
    for off in (10, -30, -35):
        needed = guide(pins(parse(ram(off)))).required
        assert needed is not None
        again = guide(pins(parse(ram(off).replace("length = 60", f"length = {needed * 1000!r}"))))
        assert again.utilisation == pytest.approx(1.0, abs=1e-9)


def test_with_friction_both_senses_count() -> None:
    """Against 2001 poses there and back: the guide runs along x, so the normal force is the plumb one."""
    text = ram(
        -30, "[friction]\nslides = 0.15\npins = 0.1\ndiameter = 12\n[cases.a]\n[cases.b]\nscale = {load = 1.2}\n"
    )
    answer, fine = pins(parse(text)), stroke(parse(text), poses=2001)
    force, moment = np.abs(fine.force_on("guide", "ram")[1]), np.abs(fine.moment_on("guide", "ram"))
    pressure = force / (LONG * WIDE) + 6 * moment / (LONG**2 * WIDE)
    worst = guide(answer).worst
    assert worst is not None
    case, _, pose = np.unravel_index(np.argmax(pressure), pressure.shape)
    assert worst.case == fine.cases[case]
    assert abs(worst.drive - fine.drive[0, 0, pose]) < radians(0.2)
    # friction steps where the rod turns back, at 90 degrees: the worst is what it comes to beside that
    assert pressure.max() * (1 - 1e-12) <= worst.value <= pressure.max() * (1 + 1e-5)
    assert judged(text, "pressure at guide <= 1 MPa").worst == pytest.approx(worst.value, rel=1e-12)


def test_a_guide_is_judged_at_its_worst_and_in_a_pose() -> None:
    text = ram(-30)
    worst = judged(text, "pressure at guide <= 2 MPa")
    assert worst.worst == pytest.approx(edge(90, -0.03), rel=1e-9) and worst.holds
    assert not judged(text, "pressure at guide <= 1 MPa").holds
    assert judged(text, "pressure at guide <= 2 MPa at 60 deg").worst == pytest.approx(edge(60, -0.03), rel=1e-9)


def test_twin_plates_have_a_block_each() -> None:
    one, two = (guide(pins(parse(ram(-30).replace('"tool"] }', f'"tool"], copies = {n} }}')))) for n in (1, 2))
    assert two.utilisation == pytest.approx(one.utilisation / 2, rel=1e-12)


SHOE = "length = 30\nwidth = 12\nallowed_pressure = 8\n"


def test_a_slot_has_no_moment() -> None:
    """The foot of the toggle: 1000 N at a lean of 60 degrees press it with 1000 tan 60, on 30 x 12 mm²."""
    sized = guide(pins(parse(PRESS.replace("along = 0\n", f"along = 0\n{SHOE}"))), "way")
    assert sized.working["M"] == 0.0
    assert sized.working["p_edge"] == pytest.approx(1000 * tan(radians(60)) / 360e-6, rel=1e-9)
    assert sized.required == pytest.approx(1000 * tan(radians(60)) / (8e6 * 0.012), rel=1e-9)


def test_the_block_on_a_pin_of_two_members_is_one() -> None:
    """Twin plates with a slot each share the force; a twin crank on the same pin changes nothing."""
    text = SLOTTED.replace('on = "arm"\n', f'on = "arm"\n{SHOE}')
    plain = guide(pins(parse(text)), "in_arm").working["N"]
    arm = text.replace('arm = ["O", "tip", "side"]', 'arm = { points = ["O", "tip", "side"], copies = 2 }')
    link = text.replace('link = ["B", "low"]', 'link = { points = ["B", "low"], copies = 2 }')
    assert guide(pins(parse(arm)), "in_arm").working["N"] == pytest.approx(plain / 2, rel=1e-9)
    assert guide(pins(parse(link)), "in_arm").working["N"] == pytest.approx(plain, rel=1e-9)


def test_a_block_in_a_track() -> None:
    """A weight on a pendulum that is a track: round the middle of the arc, 300 N press it with the cosine."""
    text = """
points.O = [0, 0]
points.P = [0, -100]
points.a = { from = "O", distance = 100, angle = -140 }
points.b = { from = "O", distance = 100, angle = -90 }
points.c = { from = "O", distance = 100, angle = -40 }
points.foot = [0, -160]
members.ground = ["O", "a", "b", "c"]
members.bob = ["P", "foot"]
slides.upright = { member = "bob", along = 90, on = "cart", at = "P" }
members.cart = ["foot2"]
points.foot2 = [0, -200]
slides.level = { member = "cart", along = 0, at = "foot2" }
tracks.bowl = { point = "P", arc = ["a", "b", "c"], length = 20, width = 10 }
effort = { at = "foot2", direction = 0 }
load = { at = "P", direction = -90, size = 300 }
stroke = { travel = "level", from = -40, to = 50 }
"""
    answer = pins(parse(text))
    (sized,) = answer.joint("bowl").sized
    # the cart pushes level only, so the bowl bears the weight by the plumb part of its force: N = 300/cos(lean)
    assert sized.working["p_edge"] == pytest.approx(300 / sqrt(1 - 0.5**2) / 200e-6, rel=1e-9)


@pytest.mark.parametrize("to", [-5, 0])
def test_no_sheet_where_the_pressure_has_no_bound(to: int) -> None:
    """A ram that the knee presses aside, through the dead point and up to it: a torque of any size on the crank."""
    text = f"""
points.A = [0, 0]
points.B = {{ from = "A", distance = 50, angle = 60 }}
points.C = [{25 + sqrt(130**2 - 2500 * 0.75)!r}, 0]
points.tool = [400, -20]
members.ground = ["A"]
members.crank = ["A", "B"]
members.rod = ["B", "C"]
members.ram = ["C", "tool"]
slides.way = {{ member = "ram", along = 0, length = 40, width = 10 }}
effort = {{ torque_on = "crank", size = 10 }}
load = {{ at = "tool", direction = 180 }}
stroke = {{ turn = "crank", from = 60, to = {to}, poses = 61 }}
"""
    answer = pins(parse(text))
    assert np.isinf(answer.joint("C").largest.value)
    assert answer.joint("way").sized == ()
    verdict = judged(text, "pressure at way <= 6 MPa")
    assert np.isinf(verdict.worst) and not verdict.holds


def test_the_shoes_of_the_press_by_hand() -> None:
    """As at the head of the example: 1990.5 N and 14 287 N mm on 60 x 30 mm."""
    answer = pins(read(ROOT / "examples" / "twin_guides.toml"))
    rod = (2000 - 8 * 9.80665) / 0.8
    side = 0.6 * rod
    turning = side * 0.14 + 2000 * 0.015
    upper = guide(answer, "upper")
    assert upper.working["N"] == pytest.approx(side / 2 + turning * 0.08 / 0.0146, rel=1e-9)
    assert upper.working["M"] == pytest.approx(turning * 0.0009 / 0.0146, rel=1e-9)


HOIST = (ROOT / "examples" / "goods_hoist.toml").read_text(encoding="utf-8")
LEAD = 60 * 9.80665 / 1.95 * exp(0.25 * pi)
"""[N] as at the head of the example"""


def test_the_rope_of_the_hoist_by_hand() -> None:
    answer = pins(parse(HOIST))
    (rope,) = answer.sized["fall"]
    assert (rope.item, rope.kind, rope.size) == ("rope", "force", 8000.0)
    assert rope.utilisation == pytest.approx(LEAD * 8 / 8000, rel=1e-9)
    assert rope.required == pytest.approx(LEAD * 8, rel=1e-9)
    assert rope.worst is not None and rope.worst.case == "forward"
    assert any("codes" in c for c in rope.working.cautions)
    verdict = next(v for v in answer.stroke.verdicts if v.name == "rope")
    assert verdict.worst == pytest.approx(8000 / LEAD, rel=1e-9)
    assert (verdict.case, verdict.holds) == ("forward", True)
    assert not stroke(parse(HOIST.replace("safety factor of fall >= 8", "safety factor of fall >= 12.1"))).holds


def test_a_rope_without_a_factor_has_the_usual_one_and_says_so() -> None:
    """5 against breaking, for wire rope slings (common practice)."""
    without = HOIST.replace("factor = 8 ", "# ")
    (rope,) = pins(parse(without)).sized["fall"]
    factor = rope.working.entry("S")
    assert factor.value == 5.0
    assert "common practice" in factor.source and "codes" in factor.source


def test_a_rope_that_hangs_slack_is_safe_there() -> None:
    """The derrick's rope has nothing to hold at the top: its worst is elsewhere, its best has no bound."""
    text = (ROOT / "examples" / "rope_frame.toml").read_text(encoding="utf-8")
    name = next(iter(parse(text).joints["rope"]))
    text = text.partition("[requirements]")[0].replace(
        f"[ropes.{name}]\n", f'[ropes.{name}]\nbreaking_load = "40 kN"\n'
    )
    largest = stroke(parse(text), poses=2001).tension_of(name).max()
    assert judged(text, f"safety factor of {name} >= 1").worst == pytest.approx(40e3 / largest, rel=1e-6)
    best = judged(text, f"safety factor of {name} <= 1000")
    assert np.isinf(best.worst) and not best.holds


def test_copies_are_told_not_to_count() -> None:
    answer = pins(parse(HOIST), sizes={"crank": np.array([0.34, 0.36])})
    assert any("guides and ropes are sized for the mechanism as drawn" in c.text for c in answer.stroke.caveats)
