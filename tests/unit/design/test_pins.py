"""A load on a pin itself, on a member at the pin, and three members on one pin."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.design.answer import StrokeAnswer
from tests.property.resum import unbalanced
from tests.unit.design.models import WELDED, ask

TINY = 1e-9
"""[N] on forces of some hundred newtons"""

SHEARS = """
[points]
A = [-100, 0]
B = [100, 0]
top = [0, 173.2050807568877]
ring = [0, 120]
[members]
ground = ["A", "B"]
left = ["A", "top"]
right = ["B", "top"]
block = ["top", "ring"]
[slots.plumb]
point = "ring"
along = 90
[loads.hoist]
at = "top"
direction = -90
size = 600
"""
"""Two legs of 200 mm at 60 degrees and a block on one pin; the hoist pulls on the pin itself: each leg carries
600 / (2 sin 60)."""


def on(answer: StrokeAnswer, member: str) -> np.ndarray:
    return answer.force_on("top", member)[:, 0, 0, 0]


def test_a_load_on_the_pin_itself_is_shared_by_its_members() -> None:
    answer = ask(SHEARS)
    leg = 600 / (2 * np.sin(np.radians(60)))
    np.testing.assert_allclose(on(answer, "left"), [-leg / 2, -300], atol=TINY)
    np.testing.assert_allclose(on(answer, "right"), [leg / 2, -300], atol=TINY)
    np.testing.assert_allclose(on(answer, "block"), [0, 0], atol=TINY)
    assert answer.two_force == ("left", "right", "block")
    assert answer.axial_in("left")[0, 0, 0] == pytest.approx(-leg)


@pytest.mark.parametrize("member", ["left", "right", "block"])
def test_the_same_load_on_a_member_changes_what_that_member_feels(member: str) -> None:
    """What the others and the ground feel is the same; the member's own pin force is less by the load."""
    pin, own = ask(SHEARS), ask(SHEARS.replace('at = "top"', f'at = "top"\non = "{member}"'))
    for name in ("left", "right", "block"):
        less = [0.0, 600.0] if name == member else [0.0, 0.0]
        np.testing.assert_allclose(on(own, name), on(pin, name) + less, atol=TINY)
    for joint, bearer in (("A", "ground"), ("B", "ground"), ("plumb", "ground")):
        np.testing.assert_allclose(own.force_on(joint, bearer), pin.force_on(joint, bearer), atol=TINY)
    assert member not in own.two_force


@pytest.mark.parametrize("order", [("left", "right", "block"), ("block", "right", "left"), ("right", "block", "left")])
def test_which_member_stands_for_the_pin_does_not_matter(order: tuple[str, ...]) -> None:
    lines = {line.split(" ")[0]: line for line in SHEARS.splitlines() if ' = ["' in line}
    block = "\n".join(lines[name] for name in ("left", "right", "block"))
    text = SHEARS.replace(block, "\n".join(lines[name] for name in order))
    first, other = ask(SHEARS), ask(text)
    for name in order:
        np.testing.assert_allclose(on(other, name), on(first, name), atol=TINY)


def test_forces_of_a_pin_sum_to_its_own_loads() -> None:
    """Also with a hung mass, a slot on the pin itself and one end of a pair on it."""
    text = SHEARS.replace('ground = ["A", "B"]', 'ground = ["A", "B", "E"]')
    text = text.replace('[slots.plumb]\npoint = "ring"\nalong = 90\n', "").replace('block = ["top", "ring"]\n', "")
    text = text.replace('right = ["B", "top"]', 'right = ["C", "top"]\nlink = ["B", "C"]\nhang = ["top", "ring"]')
    text = (
        text.replace("ring = [0, 120]", "ring = [0, 120]\nC = [130, 60]\nE = [400, 40]")
        + """
[slots.guide]
point = "top"
along = -70
[slots.plumb]
point = "ring"
along = 90
[loads.bob]
mass_at = "top"
mass = 3
[loads.tackle]
between = ["top", "E"]
size = -80
[loads.side]
at = "C"
direction = 10
size = 20
"""
    )
    answer = ask(text)
    assert max(unbalanced(answer).values()) < 1e-12
    total = sum(answer.force[k] for k, b in enumerate(answer.bearings) if (b.joint, b.word) == ("top", "pin"))
    pull = np.array([400.0, 40 - 173.2050807568877])
    own = np.array([0.0, -600.0 - 3 * 9.80665]) + 80 * pull / np.hypot(*pull)
    np.testing.assert_allclose(total[:, 0, 0, 0], own + answer.force_on("guide", "pin top")[:, 0, 0, 0], atol=TINY)


def test_a_force_at_a_pin_is_the_largest_that_any_member_feels() -> None:
    answer = ask(SHEARS + '[requirements]\npin = "force at top <= 346 N"\n')
    (verdict,) = answer.verdicts
    assert not verdict.holds
    assert verdict.worst == pytest.approx(600 / (2 * np.sin(np.radians(60))))


def test_a_pin_in_the_ground_shows_what_the_ground_feels() -> None:
    """A load on the foot pin itself goes into the ground and nowhere else."""
    before, after = ask(SHEARS), ask(SHEARS + '[loads.kick]\nat = "A"\ndirection = 0\nsize = 50\n')
    np.testing.assert_allclose(after.force_on("A", "left"), before.force_on("A", "left"), atol=TINY)
    more = after.force_on("A", "ground") - before.force_on("A", "ground")
    np.testing.assert_allclose(more[:, 0, 0, 0], [50, 0], atol=TINY)


def test_where_all_are_welded_there_is_no_pin() -> None:
    """A roller under a welded corner bears on a member, not on a pin that is none: 100 x 150/100 + 10 N."""
    answer = ask(WELDED)
    assert not any(b.member.startswith("pin ") for b in answer.bearings)
    np.testing.assert_allclose(answer.force_on("roller", "post")[:, 0, 0, 0], [0, 160], atol=TINY)
    assert max(unbalanced(answer).values()) < 1e-12
