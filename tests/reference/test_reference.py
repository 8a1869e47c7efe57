"""The independent solutions against answers in closed form, and against each other."""

from __future__ import annotations

from math import asin, cos, hypot, sin

import numpy as np
import pytest

from tests.bench.peers.by_hand import fourbar_by_hand
from tests.bench.peers.clock import crank_angles
from tests.bench.peers.linkages import TONG_BAR, TONG_DRAWN, TONG_LOAD, fourbar, lazy_tongs, sixbar
from tests.reference import plain
from tests.reference.linkage import Force, Linkage, Slide, Slot, Torque, Turn


def lever(effort_arm: float, load_arm: float, load: float, drawn: float) -> Linkage:
    """A straight lever on a fulcrum: load hung from one end, effort square to the other."""
    c, s = cos(drawn), sin(drawn)
    places = {"O": (0.0, 0.0), "hand": (-effort_arm * c, -effort_arm * s), "tip": (load_arm * c, load_arm * s)}
    return Linkage(
        places,
        {"ground": ("O",), "bar": ("hand", "O", "tip")},
        loads=(Force("bar", "tip", 0.0, -load),),
        effort=Force("bar", "hand", s, -c, turns=True),
        drive=Turn("bar"),
    )


def test_lever_by_its_arms() -> None:
    """Load arm (level) over effort arm; the fulcrum carries what is left of the two forces."""
    angles = np.radians([20.0, 35.0, 60.0, 80.0])
    answer = plain.solve(lever(0.8, 0.1, 900.0, angles[0]), angles)
    effort = 900.0 * 0.1 * np.cos(angles) / 0.8
    np.testing.assert_allclose(answer.effort, effort, rtol=1e-12)
    fulcrum = np.column_stack([-effort * np.sin(angles), 900.0 + effort * np.cos(angles), 0 * angles])
    np.testing.assert_allclose(answer.force("O", "bar"), fulcrum, atol=1e-9)


def toggle(lean: float, link: float, load: float) -> Linkage:
    """Two equal links that lean towards a level line; the knee is pressed down, a block in a slide is pressed back."""
    knee, wrist = (link * cos(lean), link * sin(lean)), (2 * link * cos(lean), 0.0)
    return Linkage(
        {"A": (0.0, 0.0), "B": knee, "C": wrist},
        {"ground": ("A",), "first": ("A", "B"), "second": ("B", "C"), "block": ("C",)},
        slides=(Slide("block", "C", (1.0, 0.0)),),
        loads=(Force("block", "C", -load, 0.0),),
        effort=Force("first", "B", 0.0, -1.0),
        drive=Turn("first"),
    )


def test_toggle_multiplies_by_one_over_twice_the_tangent() -> None:
    """By hand: the knee shares the effort between two links, each 2 sin a of it, whose level part is the load."""
    angles = np.radians([30.0, 20.0, 10.0, 5.0, 1.0])
    answer = plain.solve(toggle(angles[0], 0.2, 1000.0), angles)
    np.testing.assert_allclose(1000.0 / answer.effort, 1 / (2 * np.tan(angles)), rtol=1e-9)
    slide = answer.forces["C", "block", "ground"]
    np.testing.assert_allclose(slide[:, 1], 1000.0 * np.tan(angles), rtol=1e-9)
    np.testing.assert_allclose(slide[:, 2], 0.0, atol=1e-9)


def slider_crank(crank: float, rod: float, load: float, drawn: float) -> Linkage:
    wrist = crank * cos(drawn) + rod * cos(asin(crank * sin(drawn) / rod))
    return Linkage(
        {"A": (0.0, 0.0), "B": (crank * cos(drawn), crank * sin(drawn)), "C": (wrist, 0.0)},
        {"ground": ("A",), "crank": ("A", "B"), "rod": ("B", "C")},
        slots=(Slot("rod", "C", (1.0, 0.0)),),
        loads=(Force("rod", "C", -load, 0.0),),
        effort=Torque("crank"),
        drive=Turn("crank"),
    )


def test_slider_crank_torque() -> None:
    """Rod force = load / cos b, its arm about the shaft = r sin(a + b), where sin b = r sin a / rod.

    Forwards is outwards: below half a turn a counter-clockwise crank draws the load in, so its torque is minus.
    """
    crank, rod, load, angles = 0.05, 0.18, 2000.0, np.radians(np.arange(40.0, 400.0, 10.0))
    answer = plain.solve(slider_crank(crank, rod, load, angles[0]), angles)
    b = np.arcsin(crank * np.sin(angles) / rod)
    torque = -load / np.cos(b) * crank * np.sin(angles + b)
    np.testing.assert_allclose(answer.effort, torque, atol=1e-8)
    np.testing.assert_allclose(answer.force("C", "rod")[:, 1], load * np.tan(b), atol=1e-8)


@pytest.mark.parametrize("pairs", [1, 2, 5])
def test_lazy_tongs_by_virtual_work(pairs: int) -> None:
    """Height = pairs x bar x sin a, width = bar x cos a: torque = load x dh/da, push = load x dh/d(width)."""
    angles = TONG_DRAWN + np.radians([0.0, 5.0, 15.0, 25.0])
    torque = plain.solve(lazy_tongs(pairs), angles).effort
    np.testing.assert_allclose(torque, TONG_LOAD * pairs * TONG_BAR * np.cos(angles), rtol=1e-9)
    push = plain.solve(lazy_tongs(pairs, by_distance=True), TONG_BAR * np.cos(angles)).effort
    np.testing.assert_allclose(push, -TONG_LOAD * pairs / np.tan(angles), rtol=1e-9)


def test_three_members_on_one_pin() -> None:
    """A shear-legs: two legs and a hook block on one pin; with both legs at 60 degrees each carries W / (2 sin 60)."""
    rise = 3**0.5
    frame = Linkage(
        {"A": (-1.0, 0.0), "B": (1.0, 0.0), "top": (0.0, rise), "hook": (0.0, rise - 0.5)},
        {"ground": ("A", "B"), "left": ("A", "top"), "right": ("B", "top"), "block": ("top", "hook")},
        slots=(Slot("block", "hook", (0.0, 1.0)),),  # keeps the block upright, with no force: it hangs plumb
        loads=(Force("block", "hook", 0.0, -600.0),),
    )
    answer = plain.solve(frame)
    assert np.isnan(answer.effort).all()
    for leg, sign in (("left", -1), ("right", 1)):
        np.testing.assert_allclose(answer.force("top", leg)[0], (sign * 300.0 / rise, -300.0, 0.0), atol=1e-9)
    np.testing.assert_allclose(answer.force("top", "block")[0], (0.0, 600.0, 0.0), atol=1e-9)


@pytest.mark.parametrize("linkage", [fourbar(), sixbar()], ids=["four-bar", "six-bar"])
def test_effort_of_the_crank_is_the_work_of_the_load(linkage: Linkage) -> None:
    """Torque x turn of the crank + load x travel of the tip = nothing, by central differences of the closed poses."""
    step = 1e-4
    answer = plain.solve(linkage, (crank_angles(360)[:, None] + [-step, 0.0, step]).ravel())
    (load,) = linkage.loads
    (x0, y0), (x1, y1) = linkage.places[linkage.bodies[load.body][0]], linkage.places["tip"]
    angle = answer.poses[:, linkage.moving().index(load.body), 2].reshape(-1, 3)
    rise = hypot(x1 - x0, y1 - y0) * (np.sin(angle[:, 2]) - np.sin(angle[:, 0])) / (2 * step)
    np.testing.assert_allclose(answer.effort[1::3], -load.fy * rise, atol=2e-6)


def test_the_script_by_hand_gives_what_the_general_one_gives() -> None:
    angles = crank_angles(360)
    torque, felt = fourbar_by_hand(angles)
    answer = plain.solve(fourbar(), angles)
    np.testing.assert_allclose(torque, answer.effort, atol=1e-6)
    joints = [("A", "crank"), ("B", "coupler"), ("C", "rocker"), ("D", "rocker")]
    general = np.hstack([answer.force(*joint)[:, :2] for joint in joints])
    np.testing.assert_allclose(felt, general, atol=1e-5)


def test_a_drive_beyond_the_limit_of_motion_is_refused() -> None:
    with pytest.raises(ArithmeticError, match="does not close"):
        plain.solve(lazy_tongs(1, by_distance=True), [1.1 * TONG_BAR])
