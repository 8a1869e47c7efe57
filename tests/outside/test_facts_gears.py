"""Facts of the trade on spur gears, trains, racks and epicyclic gears, each with its source, through the public
interface."""

from __future__ import annotations

import math
from pathlib import Path

import numpy as np
import pytest

from linkcalc import parse, stroke

from .ask import ask

PAIR = """
[points]
P = [0, 0]
Q = [0, 100]
p = [40, 0]
q = [60, 100]
[members]
ground = ["P", "Q"]
pinion = ["P", "p"]
wheel = ["Q", "q"]
[gears.mesh]
members = ["wheel", "pinion"]
centres = ["Q", "P"]
radii = [60, 40]
pressure_angle = {angle}
[effort]
torque_on = "pinion"
[load]
torque_on = "wheel"
size = 60
"""


@pytest.mark.parametrize(
    ("angle", "apart", "whole"),
    [
        # separating and total force over the tangential one, tan and sec of the pressure angle, for teeth of
        # 14 1/2, 20 and 25 degrees: common practice, printed in every handbook (as Machinery's Handbook; from memory)
        (14.5, 0.2586, 1.0329),
        (20, 0.3640, 1.0642),
        (25, 0.4663, 1.1034),
    ],
)
def test_force_apart_for_each_of_the_usual_teeth(angle: float, apart: float, whole: float, tmp_path: Path) -> None:
    file = tmp_path / "pair.toml"
    file.write_text(PAIR.format(angle=angle), encoding="utf-8")
    tangential = 60 / 0.060  # torque over pitch radius
    assert ask(file, "|force mesh on wheel: x|") == pytest.approx(tangential, rel=1e-9)
    assert ask(file, "force mesh on wheel: y") == pytest.approx(apart * tangential, abs=5e-5 * tangential)
    assert ask(file, "force mesh on wheel: size") == pytest.approx(whole * tangential, abs=5e-5 * tangential)
    assert ask(file, "force P on pinion: size") == pytest.approx(whole * tangential, abs=5e-5 * tangential)


def test_an_idler_changes_the_sense_and_not_the_ratio() -> None:
    """Common practice: 18 teeth on 24 on 54, module 3: the last turns a third as fast, the same way as the first."""
    answer = stroke(
        parse("""
[points]
A = [0, 0]
B = [63, 0]
C = [180, 0]
a = [0, 20]
b = [63, 20]
c = [180, 20]
[members]
ground = ["A", "B", "C"]
first = ["A", "a"]
idler = ["B", "b"]
last = ["C", "c"]
[gears.one]
members = ["first", "idler"]
centres = ["A", "B"]
radii = [27, 36]
[gears.two]
members = ["idler", "last"]
centres = ["B", "C"]
radii = [36, 81]
[effort]
torque_on = "first"
[load]
torque_on = "last"
size = -30
[stroke]
turn = "first"
from = 90
to = 1170
poses = 61
""")
    )
    np.testing.assert_allclose(answer.effort, 10.0, rtol=1e-9)
    first, _, last = (np.unwrap(answer.turn[k, 0, 0]) for k in (1, 2, 3))
    assert first[-1] - first[0] == pytest.approx(6 * math.pi)
    assert last[-1] - last[0] == pytest.approx(2 * math.pi)


def test_a_rack_of_module_2_goes_94_25_mm_for_a_turn_of_15_teeth() -> None:
    """Makers' lists of straight racks print the pitch circumference, pi x module x teeth: 94.25 mm; and 2 N m at
    15 mm of pitch radius push with 133.3 N (common practice; from memory)."""
    answer = stroke(
        parse("""
[points]
C = [0, 15]
a = [20, 15]
near = [0, 0]
far = [300, 0]
[members]
ground = ["C"]
pinion = ["C", "a"]
bar = ["near", "far"]
[slides.ways]
member = "bar"
along = 0
[racks.teeth]
pinion = "pinion"
centre = "C"
radius = 15
along = ["near", "far"]
on = "bar"
[effort]
torque_on = "pinion"
size = 2
[load]
at = "near"
direction = 180
[stroke]
turn = "pinion"
from = 0
to = 360
poses = 13
""")
    )
    went = (answer.x[2, 0, 0, -1] - answer.x[2, 0, 0, 0]) * 1e3
    assert f"{went:.2f}" == "94.25"
    np.testing.assert_allclose(answer.load, 133.333, atol=5e-4)


def test_an_epicyclic_hoist_gives_one_and_ring_over_sun() -> None:
    """Sun 24, planet 24 and fixed ring 72 teeth: the carrier turns once for 1 + 72/24 = 4 turns of the sun (R. Willis,
    Principles of Mechanism; common practice), and its torque is four times as large."""
    answer = stroke(
        parse("""
[points]
O = [0, 0]
P = [48, 0]
s = [0, 20]
p = [48, 10]
[members]
ground = ["O"]
sun = ["O", "s"]
planet = ["P", "p"]
carrier = ["O", "P"]
[gears.inner]
members = ["sun", "planet"]
centres = ["O", "P"]
radii = [24, 24]
[gears.ring]
members = ["planet", "ground"]
centres = ["P", "O"]
radii = [24, 72]
mesh = "internal"
[effort]
torque_on = "sun"
[load]
torque_on = "carrier"
size = -100
[stroke]
turn = "sun"
from = 90
to = 1530
poses = 121
""")
    )
    np.testing.assert_allclose(answer.effort, 25.0, rtol=1e-9)
    carrier = np.unwrap(answer.turn[3, 0, 0])
    assert carrier[-1] - carrier[0] == pytest.approx(2 * math.pi)
