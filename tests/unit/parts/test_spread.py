"""Loads spread along a member: resultants of a handbook, and what is told of the distribution."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc import Faults, parse, stroke
from linkcalc.model.sketch import Drawing
from tests.property.resum import unbalanced
from tests.unit.parts.batch import random_poses

BEAM = """
[points]
A = [0, 0]
B = [6000, 0]
P = [1000, 0]
Q = [4000, 0]
[members]
ground = ["A"]
beam = ["A", "P", "Q", "B"]
[slots.roller]
point = "B"
along = 0
[loads.bed]
spread = ["P", "Q"]
intensity = "2 kN/m"
direction = -90
"""


def at_b(text: str) -> float:
    """[N] what the roller bears."""
    answer = stroke(parse(text))
    assert max(unbalanced(answer).values()) < 1e-12
    return float(answer.force_on("roller", "beam")[1, 0, 0, 0])


def test_an_even_load_acts_at_its_middle() -> None:
    """Beam with a uniform load over part of its span: R = w c (2 a + c)/(2 l), a = 1 m, c = 3 m, l = 6 m (Machinery's
    Handbook, beams supported at both ends, load over part of the span; from memory)."""
    assert at_b(BEAM) == pytest.approx(2e3 * 3 * (2 * 1 + 3) / (2 * 6), rel=1e-12)


@pytest.mark.parametrize(("q0", "q1"), [(2.0, 5.0), (0.0, 4.0), (3.0, 0.0), (-1.0, -2.5)])
def test_a_trapezoid_acts_at_its_centroid(q0: float, q1: float) -> None:
    """Area (a + b) h/2, centroid h (a + 2 b)/(3 (a + b)) from the side a (a trapezoid: Machinery's Handbook, plane
    areas; from memory)."""
    text = BEAM.replace('"2 kN/m"', f'"{q0} kN/m"\nintensity_end = "{q1} kN/m"')
    total, place = (q0 + q1) * 1e3 * 3 / 2, 1 + 3 * (q0 + 2 * q1) / (3 * (q0 + q1))
    assert at_b(text) == pytest.approx(total * place / 6, rel=1e-12)


LEANING = """
[points]
A = [0, 0]
B = [400, 300]
[members]
ground = ["A"]
roof = ["A", "B"]
[slots.wall]
point = "B"
along = 90
[loads.cover]
spread = ["A", "B"]
intensity = 4
"""
"""A roof that leans 3 in 5, 500 long, 400 wide, against a wall that takes a level force only."""


@pytest.mark.parametrize(
    ("keys", "force", "moment"),
    [
        ('direction = -90\n', (0.0, -2000.0), -2000.0 * 0.2),
        ('direction = -90\nper = "projection"\n', (0.0, -1600.0), -1600.0 * 0.2),
        ("", (-1200.0, 1600.0), 2000.0 * 0.25),
        ("direction = 0\nper = 'projection'\n", (1200.0, 0.0), -1200.0 * 0.15),
    ],
    ids=["by length", "by plan", "square", "wind by height"],
)  # fmt: skip
def test_directions_and_what_counts_as_length(keys: str, force: tuple[float, float], moment: float) -> None:
    """4 N/mm over 500 mm, or over 400 seen from above, or over 300 seen from the side; the wall holds the moment."""
    answer = stroke(parse(LEANING + keys))
    wall = answer.force_on("wall", "roof")[0, 0, 0, 0]
    assert wall * 0.3 == pytest.approx(moment, rel=1e-12)
    foot = answer.force_on("A", "roof")[:, 0, 0, 0]
    assert foot == pytest.approx([-force[0] - wall, -force[1]], rel=1e-12, abs=1e-9)
    assert max(unbalanced(answer).values()) < 1e-12


@pytest.mark.parametrize("keys", ["direction = -90\nper = 'projection'\n", "intensity_end = 1\n"])
def test_the_distribution_sums_to_the_push(keys: str) -> None:
    """Simpson's rule over what is told of the line, in any pose: force, and moment about the member's origin."""
    drawing = Drawing(parse(LEANING + keys))
    part = drawing.pushers()["", "cover"]
    at = random_poses(len(drawing.members))
    (told,) = part.spread
    ((member, fx, fy, moment),) = part.push(at)
    ((start, end),) = told.lines
    assert start.member == end.member == member
    (ax, ay), (bx, by) = at.arm(start), at.arm(end)
    sums = np.zeros((3, *np.shape(at.x[member])))
    for place, weight in ((0.0, 1 / 6), (0.5, 4 / 6), (1.0, 1 / 6)):
        x, y = ax + place * (bx - ax), ay + place * (by - ay)
        share = weight * (told.ends[0] + place * (told.ends[1] - told.ends[0]))
        qx, qy = share * fx, share * fy
        sums += np.stack(np.broadcast_arrays(qx, qy, x * qy - y * qx))
    np.testing.assert_allclose(sums, np.stack(np.broadcast_arrays(fx, fy, moment)), atol=1e-12)


def test_it_can_be_the_load_of_an_effort() -> None:
    """A flap under even pressure, square to it in every pose: w l/2 at its tip, whatever the angle."""
    text = """
[points]
A = [0, 0]
B = [500, 0]
[members]
ground = ["A"]
flap = ["A", "B"]
[effort]
at = "B"
square_to = ["B", "A"]
[load]
spread = ["A", "B"]
intensity = 4
[stroke]
turn = "flap"
from = 0
to = 60
poses = 4
"""
    answer = stroke(parse(text))
    assert answer.load[0, 0] == pytest.approx(np.full(4, 2000.0), rel=1e-12)
    assert answer.effort[0, 0] == pytest.approx(np.full(4, 1000.0), rel=1e-12)


@pytest.mark.parametrize(
    ("old", "new", "says"),
    [
        ('"2 kN/m"', '"2 kN"', "loads.bed.intensity: 2 kN is a force; a line load is wanted (e.g. 12 N/mm)"),
        ('"2 kN/m"', "0", "loads.bed.intensity: it comes to nothing over its length; an intensity is wanted"),
        ('"2 kN/m"', "3\nintensity_end = -3", "loads.bed.intensity: it comes to nothing over its length"),
        ('["P", "Q"]\nint', '["P", "P"]\nint', "loads.bed.spread: P to P is no line"),
        ('["P", "Q"]\nint', '["P", "Q"]\non = "ground"\nint', "loads.bed.on: ground does not carry both P and Q"),
        ("direction = -90", 'turns_with = "beam"', "loads.bed.turns_with: there is no direction to be turned"),
        ("direction = -90", 'per = "plan"', "loads.bed.per: "),
        ('intensity = "2 kN/m"\n', "", "loads.bed: 'intensity' is missing"),
    ],
)  # fmt: skip
def test_what_is_wrong_is_told(old: str, new: str, says: str) -> None:
    assert BEAM.count(old) == 1
    with pytest.raises(Faults) as found:
        parse(BEAM.replace(old, new))
    assert says in str(found.value)
    assert str(found.value).count("\n") == 0, "one message"
