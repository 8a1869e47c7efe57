"""Members that stand for several equal plates: the whole in the mechanics, one plate in the answer."""

from __future__ import annotations

import json

import numpy as np
import pytest

from linkcalc import Faults, members, parse, stroke
from linkcalc.report.edge import Edge
from linkcalc.report.free_body import free_body, free_body_table
from linkcalc.report.json import as_json
from linkcalc.report.members_blocks import members_blocks
from linkcalc.report.stroke_blocks import stroke_blocks
from linkcalc.report.stroke_table import stroke_table
from linkcalc.report.text import as_text
from tests.property.resum import unbalanced

TEXT = """
[points]
A = [0, 0]
B = [0, 300]
C = [400, 0]
T = [600, 0]
[members]
ground = ["A", "B"]
strut = { points = ["B", "C"], mass = 0, copies = COPIES }
beam = { points = ["A", "C", "T"], mass = 6, copies = BEAMS }
[load]
at = "T"
direction = -90
size = 900
"""
"""A beam hung from a stay that leans 3 in 5, its load 600 out."""


def model(copies: int = 1, beams: int = 1) -> str:
    return TEXT.replace("mass = 0, ", "").replace("COPIES", str(copies)).replace("BEAMS", str(beams))


def test_one_of_twin_plates_takes_half() -> None:
    """About A: T 0.6 x 400 = 900 x 600 + 6 g x 300, half of it in each of two stays; the beam feels it whole."""
    answer = stroke(parse(model(2)))
    pull = (900 * 600 + 6 * 9.80665 * 300) / 240
    assert answer.axial_in("strut")[0, 0, 0] == pytest.approx(pull / 2, rel=1e-12)
    assert np.hypot(*answer.force_on("C", "strut")[:, 0, 0, 0]) == pytest.approx(pull / 2, rel=1e-12)
    assert np.hypot(*answer.force_on("C", "beam")[:, 0, 0, 0]) == pytest.approx(pull, rel=1e-12)
    assert np.hypot(*answer.force_on("B", "ground")[:, 0, 0, 0]) == pytest.approx(pull, rel=1e-12)
    assert answer.joint_force("C")[0, 0, 0] == pytest.approx(pull, rel=1e-12)
    assert max(unbalanced(answer).values()) < 1e-12


def test_mass_is_that_of_one_plate() -> None:
    """Three beams side by side weigh three times as much."""
    answer = stroke(parse(model(2, 3)))
    pull = (900 * 600 + 3 * 6 * 9.80665 * 300) / 240
    assert answer.axial_in("strut")[0, 0, 0] == pytest.approx(pull / 2, rel=1e-12)
    assert np.hypot(*answer.force_on("C", "beam")[:, 0, 0, 0]) == pytest.approx(pull / 3, rel=1e-12)
    assert answer.joint_force("C")[0, 0, 0] == pytest.approx(pull / 2, rel=1e-12), "the largest of any plate"
    assert max(unbalanced(answer).values()) < 1e-12


def test_requirements_are_for_one_plate() -> None:
    pull = (900 * 600 + 6 * 9.80665 * 300) / 240
    text = model(2) + (
        '[requirements]\nplate = "tension in strut <= 1.2 kN"\nbore = "force at C on strut <= 1.2 kN"\n'
        'pin = "force at C <= 3 kN"\nbeam = "force at C on beam <= 3 kN"\n'
    )
    worst = [v.worst for v in stroke(parse(text)).verdicts]
    assert worst == pytest.approx([pull / 2, pull / 2, pull, pull], rel=1e-12)


def test_tables_say_that_it_is_one_of_several() -> None:
    answer = stroke(parse(model(2)))
    heads = [c.head for c in stroke_table(answer).columns]
    assert "C on strut (1 of 2) x" in heads and "axial in strut (1 of 2)" in heads and "C on beam x" in heads
    told = as_text(stroke_blocks(answer))
    assert "strut (1 of 2)" in told
    tree = json.loads(as_json(answer))
    copies = {(b["joint"], b["member"]): b["copies"] for b in tree["joints"]}
    assert copies["C", "strut"] == 2 and copies["C", "beam"] == 1


def test_the_free_body_of_one_plate_balances() -> None:
    """Loads and weight on it are shared by its plates as its joint forces are."""
    answer = stroke(parse(model(1, 2)))
    edge = Edge(answer)
    rows = {row[0]: row for row in free_body_table(answer, "beam").rows}
    assert rows["load"][4] == pytest.approx(-450, rel=1e-12)
    assert rows["weight of beam"][4] == pytest.approx(-6 * 9.80665, rel=1e-12)
    assert rows["sum"][3:] == pytest.approx((0, 0, 0), abs=1e-9 * edge.one(900.0, "force"))
    assert "beam (1 of 2) cut free" in free_body(answer, "beam").title


def test_a_guide_of_twin_plates_tells_its_whole_moment() -> None:
    """One member alone, the ground, takes the moment of both plates: it is what the guide gives."""
    text = """
[points]
P = [0, 0]
Q = [50, 0]
[members]
ground = []
ram = { points = ["P", "Q"], copies = 2 }
[slides.guide]
member = "ram"
along = 90
[effort]
at = "P"
direction = 90
[load]
at = "Q"
direction = -90
size = 80
[requirements]
guide = "moment at guide <= 5 N*m"
"""
    answer = stroke(parse(text))
    assert answer.moment_on("guide", "ram")[0, 0, 0] == pytest.approx(80 * 0.05 / 2, rel=1e-12)
    assert answer.verdicts[0].worst == pytest.approx(4.0, rel=1e-12)


def test_inner_forces_are_those_of_one_plate() -> None:
    """A beam under an even load w has w l/2 and w l²/8; each of two plates half, its own weight included."""
    text = """
[points]
A = [0, 0]
B = [6000, 0]
[members]
ground = ["A"]
beam = { points = ["A", "B"], mass = 12, copies = 2 }
[slots.roller]
point = "B"
along = 0
[loads.bed]
spread = ["A", "B"]
intensity = "2 kN/m"
direction = -90
"""
    answer = members(parse(text))
    (beam,) = answer.members
    total = 2e3 * 6 / 2 + 12 * 9.80665
    assert beam.shear is not None and beam.bending is not None
    assert abs(beam.shear.value) == pytest.approx(total / 2, rel=1e-9)
    assert beam.bending.value == pytest.approx(total * 6 / 8, rel=1e-9)
    assert "beam (1 of 2)" in as_text(members_blocks(answer))


@pytest.mark.parametrize(
    ("old", "new", "says"),
    [
        ("copies = COPIES", "copies = 0", "members.strut.copies: 0"),
        ("copies = COPIES", "copies = 1.5", "members.strut.copies: 1.5"),
        ('ground = ["A", "B"]', 'ground = { points = ["A", "B"], copies = 2 }',
         "members.ground.copies: there is one ground only; leave it out"),
    ],
)  # fmt: skip
def test_numbers_of_plates_that_make_no_sense(old: str, new: str, says: str) -> None:
    text = TEXT.replace("mass = 0, ", "").replace(old, new).replace("COPIES", "1").replace("BEAMS", "1")
    with pytest.raises(Faults) as found:
        parse(text)
    assert says in str(found.value)
