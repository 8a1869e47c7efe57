"""Ropes against paper: lengths of known tangents, tackles, drums, the vector sum at a pulley, a rope gone slack."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.model.sketch import Drawing
from linkcalc.parts.joints.rope import RopeJoint
from tests.property.resum import unbalanced

EXACT = 1e-9


def rope(points: str, path: str) -> tuple[Drawing, RopeJoint]:
    """A rope between points of the ground (one is on a bar, so that there is a member)."""
    text = f"""
    [points]
    {points}
    far = [9, 9]
    near = [8, 9]
    [members]
    ground = ["A", "B", "P", "Q", "near"]
    bar = ["near", "far"]
    [units]
    length = "m"
    [ropes.r]
    path = {path}
    [effort]
    torque_on = "bar"
    """
    drawing = Drawing(parse(text))
    (found,) = (j for j in drawing.joints if isinstance(j, RopeJoint))
    return drawing, found


@pytest.mark.parametrize(
    ("path", "straight", "arc"),
    [
        # open: k = 2 - 1, so the straight part is sqrt(25 - 1) and rises by asin(1/5)
        ('["A", { pulley = "P", radius = 1, wrap = "left" }, { pulley = "Q", radius = 2, wrap = "left" }, "B"]',
         np.sqrt(24), np.pi / 2 - np.arcsin(0.2) + 2 * (np.pi / 2 + np.arcsin(0.2))),
        # crossed: k = 1 + 2, so the straight part is 4 m (3-4-5) and falls by asin(3/5)
        ('["A", { pulley = "P", radius = 1, wrap = "left" }, { pulley = "Q", radius = 2, wrap = "right" }, "B"]',
         4.0, np.pi / 2 + np.arcsin(0.6) + 2 * (np.pi / 2 + np.arcsin(0.6))),
    ],
    ids=["open", "crossed"],
)  # fmt: skip
def test_length_over_two_pulleys(path: str, straight: float, arc: float) -> None:
    """Both ends 3 m off, plumb from where their wheels meet the axis."""
    down = path.count("left") == 2
    drawing, joint = rope(f"A = [-1, -3]\nB = [7, {-3 if down else 3}]\nP = [0, 0]\nQ = [5, 0]", path)
    length = float(joint.path.length(drawing.drawn))
    assert length == pytest.approx(3 + straight + arc + 3, rel=EXACT)


def test_an_eye_is_a_pulley_of_no_radius() -> None:
    points = "A = [-1, 0]\nB = [7, 0]\nP = [3, 3]\nQ = [5, 0]"
    drawing, joint = rope(points, '["A", { pulley = "P", radius = 0, wrap = "left" }, "B"]')
    assert float(joint.path.length(drawing.drawn)) == pytest.approx(5 + 5, rel=EXACT)  # 4-3-5 twice


def test_beyond_half_a_turn_the_arc_is_wound_on() -> None:
    """From below on the left over the wheel and back to the left: three quarters of a turn."""
    drawing, joint = rope(
        "A = [-1, -2]\nB = [-2, -1]\nP = [0, 0]\nQ = [5, 0]", '["A", { pulley = "P", radius = 1, wrap = "left" }, "B"]'
    )
    # up at x = -1, round clockwise to the lowest point, off to the left at y = -1: 270 deg
    assert float(joint.path.length(drawing.drawn)) == pytest.approx(2 + 1.5 * np.pi + 2, rel=EXACT)


def tackle(falls: int) -> str:
    """A block on so many plumb falls: every odd one goes up from it, the last one to the hauling end on the ground."""
    width, x, upward = 20, 0, bool(falls % 2)
    points, steps = [f"start = [0, {0 if upward else 500}]"], ['"start"']
    ends, block = ([], ["hook", "start"]) if upward else (["start"], ["hook"])
    fixed, moving = ["T1", "T2"], ["B1", "B2"]
    for k in range(falls):
        name = (fixed if upward else moving)[k // 2]
        y = 500 if upward else 0
        points.append(f"{name} = [{x + width / 2}, {y}]")
        (ends if upward else block).append(name)
        wrap = "left" if upward else "right"
        steps.append(f'{{ pulley = "{name}", radius = {width / 2}, wrap = "{wrap}" }}')
        x, upward = x + width, not upward
    points.append(f"lead = [{x}, {100 if not upward else 300}]")
    ends.append("lead")
    steps.append('"lead"')
    return f"""
    [points]
    hook = [{x / 2}, -50]
    {chr(10).join(points)}
    [members]
    ground = {ends}
    block = {{ points = {block}, mass = 3 }}
    [slides.ways]
    member = "block"
    along = 90
    [ropes.fall]
    path = [{", ".join(steps)}]
    end = "hauling"
    [effort]
    haul = "fall"
    [load]
    at = "hook"
    direction = -90
    size = 1200
    [stroke]
    haul = "fall"
    from = 0
    to = 300
    poses = 5
    [requirements]
    pull = "tension of fall <= 1 kN"
    block_pull = "force at fall at T1 <= 5 kN"
    """


@pytest.mark.parametrize("falls", [2, 3, 4])
def test_a_tackle_divides_the_load_by_its_falls(falls: int) -> None:
    """Load and weight of the block over the number of falls; the block rises by as much less than is hauled in."""
    answer = stroke(parse(tackle(falls)))
    weight = 3 * 9.80665
    np.testing.assert_allclose(answer.effort, (1200 + weight) / falls, rtol=EXACT)
    np.testing.assert_allclose(answer.tension_of("fall"), answer.effort, rtol=EXACT)
    np.testing.assert_allclose(answer.ideal_ratio, falls, rtol=EXACT)
    np.testing.assert_allclose(answer.y[1, 0, 0] - answer.y[1, 0, 0, 0], answer.drive[0, 0] / falls, atol=EXACT)
    assert max(unbalanced(answer).values()) < 1e-12
    # each sheave is pulled by two plumb falls
    np.testing.assert_allclose(answer.force_on("fall at T1", "ground")[1], -2 * answer.effort, rtol=EXACT)
    np.testing.assert_allclose(answer.force_on("fall at B1", "block")[1], 2 * answer.effort, rtol=EXACT)
    pull = next(v for v in answer.verdicts if v.name == "block_pull")
    assert pull.worst == pytest.approx(2 * (1200 + weight) / falls, rel=EXACT)


AXLE = """
[units]
length = "m"
[points]
O = [0, 0]
rim = [0.6, 0]
B = [-0.05, -2]
hook = [-0.05, -2.3]
[members]
ground = ["O"]
axle = ["O", "rim"]
block = ["B", "hook"]
[slides.ways]
member = "block"
along = 90
[ropes.bight]
path = [
  { drum = "O", radius = 0.3, wrap = "right", on = "axle" },
  { pulley = "B", radius = 0.25, wrap = "right" },
  { drum = "O", radius = 0.2, wrap = "right", on = "axle" },
]
[effort]
torque_on = "axle"
[load]
at = "hook"
direction = -90
size = 800
[stroke]
turn = "axle"
from = -120
to = 150
poses = 10
"""


def test_the_differential_axle() -> None:
    """Both falls plumb at x = -0.3 and x = 0.2: a turn winds 0.3 up and lets 0.2 off, torque = W (0.3 - 0.2) / 2."""
    answer = stroke(parse(AXLE))
    np.testing.assert_allclose(answer.effort, -800 * 0.05, rtol=EXACT)
    turned = answer.turn[1, 0, 0]
    rise = answer.y[2, 0, 0] - answer.y[2, 0, 0, 0]
    np.testing.assert_allclose(rise, -0.05 * (turned - turned[0]), atol=EXACT)
    assert max(unbalanced(answer).values()) < 1e-12


SLING = """
[points]
A = [0, 0]
T = [0, 300]
hook = [200, 0]
W = [400, 300]
[members]
ground = ["A", "T", "W"]
arm = ["A", "hook"]
[ropes.sling]
path = ["hook", "T"]
[loads.down]
at = "hook"
direction = -90
size = 300
[cases.hangs]
[cases.pushed]
scale = { down = -1 }
"""


def test_a_rope_that_would_have_to_push_is_a_warning() -> None:
    """3-4-5 triangle scaled: the sling runs up at asin(3/sqrt(13)), so its pull is 300 sqrt(13)/3."""
    answer = stroke(parse(SLING))
    np.testing.assert_allclose(answer.tension_of("sling")[:, 0, 0], [100 * np.sqrt(13), -100 * np.sqrt(13)], rtol=EXACT)
    assert [(c.item, c.text) for c in answer.caveats] == [
        ("sling", "the rope is slack throughout in case pushed: it cannot push; the answer there is not that of a rope")
    ]


FLAP = """
[points]
A = [0, 0]
tip = [100, 0]
T = [0, 100]
B = [0, -400]
[members]
ground = ["A", "T"]
flap = { points = ["A", "tip"], mass = 2 }
pan = { points = ["B"], mass = 1 }
[slides.ways]
member = "pan"
along = 90
[ropes.cord]
path = ["tip", { pulley = "T", radius = 0, wrap = "left" }, "B"]
[effort]
torque_on = "flap"
[loads.float]
at = "B"
along = ["B", "T"]
size = 4.80665
[loads.spread]
between = ["tip", "B"]
size = 0
[stroke]
turn = "flap"
from = 0
to = 60
poses = 13
"""


def test_the_pull_of_a_plumb_cord_is_its_pan() -> None:
    answer = stroke(parse(FLAP))
    np.testing.assert_allclose(answer.tension_of("cord"), 9.80665 - 4.80665, rtol=EXACT)
    assert answer.caveats == ()


def test_the_pose_where_a_rope_goes_slack_is_exact() -> None:
    """A push on the pan that turns with the flap lifts by 20 N times the sine of its turn: the weight at asin(W/20)."""
    text = FLAP.replace('along = ["B", "T"]\nsize = 4.80665', 'direction = 0\nturns_with = "flap"\nsize = 20')
    answer = stroke(parse(text))
    (event,) = (e for e in answer.events if e.kind == "slack")
    assert (event.quantity, event.drive) == ("cord", pytest.approx(np.arcsin(9.80665 / 20), abs=EXACT))
    (caveat,) = (c for c in answer.caveats if c.item == "cord")
    told = f"{np.degrees(np.arcsin(9.80665 / 20)):.4g}"
    assert caveat.text.startswith(f"the rope is slack from {told}")
