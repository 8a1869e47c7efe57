"""Several load cases in one run are each what it is alone; loads added, dropped and scaled; gravity turned."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.design.answer import StrokeAnswer
from tests.property.resum import unbalanced
from tests.property.transform import turned
from tests.unit.design.models import FOUR_BAR, ask

SAME = 1e-12
"""Relative: the same equations with the same guesses; only the order of sums differs."""

LOADS = """
[loads.wind]
at = "C"
direction = 10
size = 35
[loads.bob]
mass_at = "tip"
mass = 1.5
[loads.spring]
between = ["B", "tip"]
size = -20
"""
CASES = (
    LOADS
    + """
[cases.plain]
[cases.windy]
scale = { wind = 3, load = 0.5 }
[cases.calm]
drop = ["wind", "spring"]
[cases.tilted]
gravity = { turn = 35, scale = 2 }
[cases.extra.add.rain]
at = "tip"
direction = -80
size = 12
[cases.extra.add.belt]
torque_on = "rocker"
size = 0.7
[cases.unloaded]
drop = ["load"]
[cases.other.effort]
torque_on = "rocker"
"""
)
NAMES = ("plain", "windy", "calm", "tilted", "extra", "unloaded", "other")
FEW = FOUR_BAR.replace("poses = 61", "poses = 13").replace("to = 420", "to = 170")


def all_of(answer: StrokeAnswer) -> list[np.ndarray]:
    axial = answer.axial_in("coupler")  # with the effort on the rocker the crank is a two-force member, too
    return [answer.effort, answer.load, answer.tare_effort, answer.force, answer.moment, axial, answer.x,
            answer.status.astype(float)]  # fmt: skip


@pytest.fixture(scope="module")
def together() -> StrokeAnswer:
    return ask(FEW + CASES)


@pytest.mark.parametrize("case", NAMES)
def test_a_case_in_a_run_of_many_is_the_case_alone(together: StrokeAnswer, case: str) -> None:
    alone = ask(FEW + CASES, case=case)
    k = together.cases.index(case)
    for several, single in zip(all_of(together), all_of(alone), strict=True):
        axis = several.ndim - 3
        part = several if several.shape[axis] == 1 else np.take(several, [k], axis=axis)
        np.testing.assert_allclose(part, single, rtol=SAME, atol=1e-12 * float(np.nanmax(np.abs(single), initial=1.0)))
    assert alone.cases == (case,)
    mine = {(e.kind, e.quantity): e for e in together.events if e.case == case}
    for e in alone.events:
        if e.kind in ("largest", "smallest") and "crank" not in e.quantity:
            other = mine[e.kind, e.quantity]
            assert (e.drive, e.value) == (
                pytest.approx(other.drive, abs=1e-6),
                pytest.approx(other.value, rel=1e-9, abs=1e-6),
            )


def test_every_case_is_in_equilibrium(together: StrokeAnswer) -> None:
    assert max(unbalanced(together).values()) < SAME
    assert together.effort.shape == (7, 1, 13)


def test_a_case_is_the_model_written_out(together: StrokeAnswer) -> None:
    """Each case put into the model by hand, without cases."""
    by_hand = {
        "plain": LOADS,
        "windy": LOADS.replace("size = 35", "size = 105"),
        "calm": '[loads.bob]\nmass_at = "tip"\nmass = 1.5\n',
        "tilted": LOADS + '[gravity]\ndirection = -55\nsize = "19.6133 m/s^2"\n',
        "extra": LOADS
        + '[loads.rain]\nat = "tip"\ndirection = -80\nsize = 12\n[loads.belt]\ntorque_on = "rocker"\nsize = 0.7\n',
        "unloaded": LOADS,
        "other": LOADS,
    }
    for k, case in enumerate(NAMES):
        text = FEW + by_hand[case]
        if case == "windy":
            text = text.replace("size = 100", "size = 50")
        if case == "unloaded":
            text = text.replace("size = 100", "size = 0")
        if case == "other":
            text = text.replace('[effort]\ntorque_on = "crank"', '[effort]\ntorque_on = "rocker"')
        alone = ask(text)
        np.testing.assert_allclose(together.effort[k], alone.effort[0], rtol=SAME)
        np.testing.assert_allclose(together.force[:, :, k], alone.force[:, :, 0], rtol=SAME, atol=1e-10)


def test_turned_gravity_is_a_turned_drawing() -> None:
    """A machine on a slope: gravity turned by 20 degrees, or everything else turned back by 20."""
    model = parse(
        FEW.replace("direction = -90", 'turns_with = "rocker"\ndirection = -90')
        + LOADS.partition("[loads.bob]")[2].join(["[loads.bob]", ""])
    )
    by = float(np.radians(20.0))
    leaning = replace(turned(model, -by), gravity=model.gravity)
    sloped = replace(model, gravity=replace(model.gravity, direction=-70))
    a, b = stroke(sloped), stroke(leaning)
    np.testing.assert_allclose(a.effort, b.effort, rtol=1e-10)
    c, s = np.cos(by), np.sin(by)
    fx, fy = b.force[:, 0], b.force[:, 1]
    np.testing.assert_allclose(a.force[:, 0], c * fx - s * fy, atol=1e-8)
    np.testing.assert_allclose(a.force[:, 1], s * fx + c * fy, atol=1e-8)


def test_cases_that_differ_in_nothing_are_still_several() -> None:
    text = FEW.replace('rocker = { points = ["D", "C", "tip"], mass = 2 }', 'rocker = ["D", "C", "tip"]')
    answer = ask(text + "[cases.a]\n[cases.b]\ngravity = { turn = 30 }\n[cases.c]\n")
    assert answer.cases == ("a", "b", "c")
    assert answer.effort.shape == answer.status.shape == (3, 1, 13)
    np.testing.assert_array_equal(answer.effort[0], answer.effort[1])
    assert {e.case for e in answer.events if e.kind == "largest"} == {"a", "b", "c"}


def test_gravity_of_every_case_is_its_own_on_the_way() -> None:
    """The walk sets out from one pose for all cases: none may carry its gravity along."""
    turns = [0, 90, 180, 270]
    text = FEW + "".join(f"[cases.t{t}]\ngravity = {{ turn = {t} }}\n" for t in turns)
    weightless = ask(FEW + "[gravity]\nsize = 0\n").effort[0]
    by_weight = ask(text).effort - weightless
    np.testing.assert_allclose(by_weight[0], -by_weight[2], rtol=1e-9)
    np.testing.assert_allclose(by_weight[1], -by_weight[3], rtol=1e-9)
    assert np.abs(by_weight[0] - by_weight[1]).max() > 1e-3
