"""Facts of the trade on toggles, cranks and quick returns, each with its source, through the public interface."""

from __future__ import annotations

import math
from pathlib import Path

import pytest

from .ask import ask

TOGGLE = """
[dimensions]
link = 100
lean = "20 deg"

[points]
A = [0, 0]
K = { from = "A", distance = "link", angle = "lean" }
S = ["2*link*cos(lean)", 0]

[members]
ground = ["A"]
upper = ["A", "K"]
lower = ["K", "S"]

[slots.jaw]
point = "S"
along = "0 deg"

[effort]
at = "K"
direction = -90

[load]
at = "S"
direction = 180
size = 1000

[stroke]
turn = "upper"
from = 2
to = 0.5
poses = 4
"""

FOUR_BAR = """
[points]
O2 = [0, 0]
A = {{ from = "O2", distance = {crank}, angle = 70 }}
O4 = [{base}, 0]
B = {{ meets = [["A", {coupler}], ["O4", {rocker}]], side = "left" }}

[members]
ground = ["O2", "O4"]
crank = ["O2", "A"]
coupler = ["A", "B"]
rocker = ["O4", "B"]

[effort]
torque_on = "crank"

[load]
torque_on = "rocker"
size = 1

[cases.rocker]

[cases.coupler]
drop = ["load"]

[cases.coupler.add.coupler_torque]
torque_on = "coupler"
size = 1

[stroke]
"""

SLOTTED_LEVER = """
[points]
C = [0, 0]
A = [0, {centres}]
B = {{ from = "A", distance = {crank}, angle = 10 }}
D = {{ on = ["C", "B"], distance = {lever} }}

[members]
ground = ["A", "C"]
crank = ["A", "B"]
lever = ["C", "D"]

[slots.block]
point = "B"
on = "lever"
along = ["C", "D"]

[effort]
torque_on = "crank"

[load]
torque_on = "lever"
size = 1

[stroke]
turn = "lever"
from = "lower limit"
to = "upper limit"
poses = 3
"""


def model(folder: Path, text: str) -> Path:
    file = folder / "model.toml"
    file.write_text(text, encoding="utf-8")
    return file


@pytest.mark.parametrize(("pose", "angle", "printed"), [(0, 2.0, "14.3"), (2, 1.0, "28.6"), (3, 0.5, "57.3")])
def test_toggle_ratio_near_its_dead_point(tmp_path: Path, pose: int, angle: float, printed: str) -> None:
    """Two equal links at an angle a to the line of their ends, pushed at the knee: clamping force over knee force is
    1/(2 tan a), 14.3 at 2 degrees, 28.6 at 1 degree, 57.3 at 0.5 degrees. Source: balance of the knee, effort =
    2 F sin a and clamping force = F cos a."""
    file = model(tmp_path, TOGGLE)
    assert ask(file, "|force ratio|", pose=pose) == pytest.approx(float(printed), abs=0.05)
    for words in ("|force ratio|", "|ideal ratio|"):
        assert ask(file, words, pose=pose) == pytest.approx(0.5 / math.tan(math.radians(angle)), rel=1e-8)


@pytest.mark.parametrize(("pose", "printed", "tolerance"), [(0, 31.63, 0.02), (1, 100.79, 0.01)])
def test_transmission_angle_at_its_extremes(tmp_path: Path, pose: int, printed: float, tolerance: float) -> None:
    """The angle between coupler and rocker is smallest and largest with the crank in line with the base. Source:
    kinematics solution set, problem 2.2, https://www.coursehero.com/file/5956508/kin-sol-hw2/ (crank 63.5, coupler
    165.5, rocker 114, base 154.34 mm): 31.63 and 100.79 degrees. The source carries rounded lengths and cosines,
    hence 0.02 and 0.01. A member loaded at its two pins only shows its direction by its force."""
    text = FOUR_BAR.format(crank=63.5, coupler=165.5, rocker=114, base=154.34)
    file = model(tmp_path, text + 'turn = "crank"\nfrom = 0\nto = 180\nposes = 2\n')
    coupler = ask(file, "line of force B on rocker", "rocker", pose)
    rocker = ask(file, "line of force B on rocker", "coupler", pose)
    assert math.degrees(rocker - coupler) == pytest.approx(printed, abs=tolerance)


@pytest.mark.parametrize(
    ("crank", "coupler", "rocker", "base"), [(63.5, 165.5, 114, 154.34), (40, 150, 80, 150), (62.5, 175, 112.5, 200)]
)
def test_rocker_swings_between_its_dead_points(
    tmp_path: Path, crank: float, coupler: float, rocker: float, base: float
) -> None:
    """At a dead point crank and coupler are in line, so that the rocker's pin is their sum or their difference away
    from the crank's pivot. Source: the solution set named above, where these two lengths are 229 and 102 mm."""
    text = FOUR_BAR.format(crank=crank, coupler=coupler, rocker=rocker, base=base)
    file = model(tmp_path, text + 'turn = "rocker"\nfrom = "lower limit"\nto = "upper limit"\nposes = 3\n')

    def at_rocker_pivot(reach: float) -> float:
        return math.acos((base**2 + rocker**2 - reach**2) / (2 * base * rocker))

    swing = at_rocker_pivot(coupler + crank) - at_rocker_pivot(coupler - crank)
    assert ask(file, "range") == pytest.approx(swing, rel=1e-6)


@pytest.mark.parametrize("pose", range(9))
def test_torque_ratio_of_a_four_bar(tmp_path: Path, pose: int) -> None:
    """Angular speeds of rocker and crank are as a sin(t2 - t3) to c sin(t4 - t3), with the links' directions from the
    base; torques are the inverse. Source: the closed velocity loop, in any book of kinematics."""
    a, b, c, d = 63.5, 165.5, 114.0, 154.34
    text = FOUR_BAR.format(crank=a, coupler=b, rocker=c, base=d)
    file = model(tmp_path, text + 'turn = "crank"\nfrom = 20\nto = 140\nposes = 9\n')
    t2 = math.radians(20 + 15 * pose)
    t3, t4 = _loop(a, b, c, d, t2)
    speed = a * math.sin(t2 - t3) / (c * math.sin(t4 - t3))
    assert ask(file, "effort", "rocker", pose) == pytest.approx(-speed, rel=1e-9, abs=1e-12)
    assert ask(file, "|ideal ratio|", "rocker", pose) == pytest.approx(abs(1 / speed), rel=1e-8)


def _loop(a: float, b: float, c: float, d: float, t2: float) -> tuple[float, float]:
    """Directions of coupler and rocker, their pin above the base: half-angle closed form."""
    k1, k2, k3 = d / a, d / c, (a * a - b * b + c * c + d * d) / (2 * a * c)
    p = math.cos(t2) - k1 - k2 * math.cos(t2) + k3
    q, r = -2 * math.sin(t2), k1 - (k2 + 1) * math.cos(t2) + k3
    t4 = 2 * math.atan2(-q - math.sqrt(q * q - 4 * p * r), 2 * p)
    t3 = math.atan2(c * math.sin(t4) - a * math.sin(t2), d + c * math.cos(t4) - a * math.cos(t2))
    return t3, t4 % (2 * math.pi)


@pytest.mark.parametrize(("centres", "crank", "lever"), [(240, 120, 450), (300, 100, 500)])
def test_slotted_lever_swings_where_the_crank_is_square_to_it(
    tmp_path: Path, centres: float, crank: float, lever: float
) -> None:
    """The lever turns back where the crank stands square to it: swing = 2 asin(crank / centres), 60 degrees for 120
    and 240. Source: R. S. Khurmi, J. K. Gupta, Theory of Machines, example 5.2, p. 110,
    https://github.com/FOSSEE/Python-Textbook-Companions (time ratio 240 : 120 degrees)."""
    file = model(tmp_path, SLOTTED_LEVER.format(centres=centres, crank=crank, lever=lever))
    assert ask(file, "range") == pytest.approx(2 * math.asin(crank / centres), rel=1e-6)
