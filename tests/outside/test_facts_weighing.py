"""Facts of weighing, each with its source, through the public interface."""

from __future__ import annotations

import math
from pathlib import Path

import pytest

from .ask import ask

PLATFORM = """
# The beam turns about F; one support of the platform hangs at P, the other stands on a bottom lever that hangs at Q
[points]
F = [0, 0]
P = [60, 0]
Q = [300, 0]
poise = [-400, 0]
S1 = [60, -200]
lever_end = [300, -300]
bottom = [550, -300]
S2 = {{ on = ["bottom", "lever_end"], distance = {load_arm} }}
{spots}

[members]
ground = ["F", "bottom"]
beam = ["poise", "F", "P", "Q"]
rod_P = ["P", "S1"]
rod_Q = ["Q", "lever_end"]
lever = ["bottom", "S2", "lever_end"]
platform = ["S1", {carried}, "S2"]

[effort]
at = "poise"
direction = -90

{cases}
"""

PAN = """
# A beam and a stay below it carry the stem of a pan; the other side of the beam carries the counterweight
[dimensions]
tilt = "{tilt} deg"

[points]
O1 = [0, 0]
L1 = {{ from = "O1", distance = 200, angle = "tilt + 180 deg" }}
R1 = {{ from = "O1", distance = 200, angle = "tilt" }}
O2 = [0, -150]
L2 = {{ from = "O2", distance = {stay}, angle = "{stay_tilt} deg + 180 deg" }}
{spots}

[members]
ground = ["O1", "O2"]
beam = ["L1", "O1", "R1"]
stay = ["L2", "O2"]
stem = ["L1", {carried}, "L2"]

[effort]
at = "R1"
direction = -90

{cases}
"""

BEAM = """
# Two hung pans, the end edges a little below the fulcrum, the beam's own centre of mass below it
[points]
O = [0, 0]
left = [-200, -0.05]
right = [200, -0.05]
centre = [0, -2]

[members]
ground = ["O"]
beam = {{ points = ["O", "left", "right", "centre"], path = ["left", "right"], mass = 0.5, centre = "centre" }}

[effort]
torque_on = "beam"

[load]
mass_at = "left"
mass = {left}

[loads.counter]
mass_at = "right"
mass = {right}

[stroke]
turn = "beam"
line = ["left", "right"]
from = {start}
to = {stop}
poses = 2
"""

PLACES = (70.0, 130.0, 250.0, 390.0, 480.0)
OFFSETS = (-120.0, -30.0, 0.0, 60.0, 150.0)


def model(folder: Path, text: str) -> Path:
    file = folder / "model.toml"
    file.write_text(text, encoding="utf-8")
    return file


def hung(names: list[str], mass: float) -> str:
    """One case a place: the same mass at each in turn."""
    return "\n".join(f'[cases.at_{n}.add.goods]\nmass_at = "{n}"\nmass = {mass}\n' for n in names)


def platform(folder: Path, load_arm: float) -> Path:
    names = [f"g{i}" for i in range(len(PLACES))]
    spots = "\n".join(f"{n} = [{x}, -190]" for n, x in zip(names, PLACES, strict=True))
    carried = ", ".join(f'"{n}"' for n in names)
    return model(folder, PLATFORM.format(load_arm=load_arm, spots=spots, carried=carried, cases=hung(names, 25)))


def test_platform_reads_the_same_wherever_the_load_stands(tmp_path: Path) -> None:
    """With load arm : end arm of the bottom lever equal to p : q of the beam (50 : 250 = 60 : 300) all of the load acts
    as if it hung at p. Source: moments about the two fulcrums (u/v = p/q, derived); general rule, every lever that
    shares the platform has the same multiple to the beam, common practice."""
    file = platform(tmp_path, 50)
    efforts = [ask(file, "effort", f"at_g{i}") for i in range(len(PLACES))]
    assert efforts == pytest.approx([25 * 9.80665 * 60 / 400] * len(PLACES), rel=1e-9)


def test_platform_with_unmatched_levers_reads_by_place(tmp_path: Path) -> None:
    """With other arms (60 : 250) the beam moment is W1 p + W2 (u/v) q, shares W1 and W2 by the place on the platform.
    Source: as above."""
    file = platform(tmp_path, 60)
    span = (550 - 60) - 60.0
    for i, x in enumerate(PLACES):
        second = 25 * 9.80665 * (x - 60) / span
        moment = (25 * 9.80665 - second) * 60 + second * (60 / 250) * 300
        assert ask(file, "effort", f"at_g{i}") == pytest.approx(moment / 400, rel=1e-9)


def pan(folder: Path, tilt: float, stay: float, stay_tilt: float) -> Path:
    names = [f"g{i}" for i in range(len(OFFSETS))]
    spots = "\n".join(
        f'{n} = {{ from = "L1", distance = {math.hypot(e, 40)}, angle = {math.degrees(math.atan2(40, e))} }}'
        for n, e in zip(names, OFFSETS, strict=True)
    )
    carried = ", ".join(f'"{n}"' for n in names)
    text = PAN.format(tilt=tilt, stay=stay, stay_tilt=stay_tilt, spots=spots, carried=carried, cases=hung(names, 2))
    return model(folder, text)


@pytest.mark.parametrize("tilt", [0.0, 6.0])
def test_parallel_stay_makes_the_place_on_the_pan_no_matter(tmp_path: Path, tilt: float) -> None:
    """A pan on a parallelogram only goes up and down, so that a load off its middle puts a couple on beam and stay and
    changes nothing at the beam. Source: Encyclopaedia Britannica, http://www.britannica.com/print/topic/505608."""
    file = pan(tmp_path, tilt, 200, tilt)
    efforts = [ask(file, "effort", f"at_g{i}") for i in range(len(OFFSETS))]
    assert efforts == pytest.approx([2 * 9.80665] * len(OFFSETS), rel=1e-9)


def test_load_off_the_middle_puts_a_couple_on_the_stay(tmp_path: Path) -> None:
    """Load times its distance from the stem = stay force times the height between beam and stay. Source: as above, and
    moments on the stem about its upper pin (derived)."""
    file = pan(tmp_path, 0, 200, 0)
    for i, offset in enumerate(OFFSETS):
        pull = 2 * 9.80665 * offset / 150
        assert ask(file, "force L2 on stem: x", f"at_g{i}") == pytest.approx(pull, rel=1e-9, abs=1e-9)


def test_stay_of_another_length_gives_a_corner_error(tmp_path: Path) -> None:
    """A stay that is not parallel to the beam turns the stem as the pan sinks, and the reading follows the place of the
    load. Source: velocities of the stem's two pins (derived): for a level beam and a stay tilted by b, the stem turns
    about the point where their lines meet."""
    tilt = 4.0
    file = pan(tmp_path, 0, 200, tilt)
    # the stem's pin L1 goes straight up and down; its centre of turning lies where the two lines meet
    meet = 150 / math.tan(math.radians(tilt))
    for i, offset in enumerate(OFFSETS):
        leverage = (meet - (-200 + offset)) / (meet - -200)
        assert ask(file, "effort", f"at_g{i}") == pytest.approx(2 * 9.80665 * leverage, rel=1e-9)


def test_beam_balances_at_the_angle_of_the_moment_equation(tmp_path: Path) -> None:
    """tan(angle) = (P - Q) a / ((P + Q + 2 S) h + W k). Source: I. Todhunter, Analytical Statics, art. 150 (moment
    equation); the numbers are ours: P 2.0001, Q 2, S 0.1, W 0.5 kg, a 200, h 0.05, k 2 mm."""
    p, q, s, w, a, h, k = 2.0001, 2.0, 0.1, 0.5, 200.0, 0.05, 2.0
    angle = math.degrees(math.atan((p - q) * a / ((p + q + 2 * s) * h + w * k)))
    file = model(tmp_path, BEAM.format(left=p + s, right=q + s, start=angle - 0.0005, stop=angle + 0.0005))
    # left of balance the beam still wants to turn on, past it it wants to turn back
    assert ask(file, "effort", pose=0) < 0 < ask(file, "effort", pose=1)


@pytest.mark.parametrize("rider", [20.0, 130.0])
def test_steelyard_scale_is_linear(tmp_path: Path, rider: float) -> None:
    """Pitch of the scale per unit of load = load arm / poise mass, whatever the beam itself weighs. Source: moments
    about the fulcrum (derived)."""
    text = """
[points]
hook = [-15, 0]
O = [0, 0]
rider = [{rider}, 0]
end = [160, 0]

[members]
ground = ["O"]
beam = {{ points = ["hook", "O", "rider", "end"], mass = 0.4 }}

[effort]
at = "hook"
direction = -90

[load]
mass_at = "rider"
mass = 0.5
"""
    one = ask(model(tmp_path, text.format(rider=rider)), "effort")
    other_folder = tmp_path / "next"
    other_folder.mkdir()
    next_notch = ask(model(other_folder, text.format(rider=rider + 15 / 0.5)), "effort")
    assert next_notch - one == pytest.approx(9.80665, rel=1e-9)
