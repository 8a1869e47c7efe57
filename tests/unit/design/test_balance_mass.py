"""Counterweights: optima against a grid and against least squares of whole strokes, limits kept, laws of likeness."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from linkcalc import balance, parse, stroke
from linkcalc.parts.balancers.counterweight import Counterweight
from linkcalc.parts.rooms.at import At
from tests.property.transform import placed
from tests.unit.design.balancing import BOX, LINKAGE, columns, linkage, with_mass


def test_the_least_peak_is_that_of_a_grid() -> None:
    """Every mass and place of a grid, judged by strokes of their own (exact, since the effort is linear in them)."""
    model = linkage()
    answer = balance(model)
    base, part = columns(model, "crank")
    mass, x, y = (v.ravel() for v in np.meshgrid(np.linspace(0, 9, 37), np.linspace(-150, -20, 40),
                                                 np.linspace(-130, -30, 40), indexing="ij"))  # fmt: skip
    effort = base[:, None] + part @ np.array([mass, mass * x, mass * y])
    peak = np.abs(effort).max(axis=0)
    best = float(peak.min())
    found = abs(answer.peak_after.value)
    assert found <= best * (1 + 1e-6)
    assert found >= best * 0.9  # the grid is fine enough to come close
    assert answer.foretold == pytest.approx(found, rel=1e-6)


def test_the_least_mean_square_is_that_of_least_squares() -> None:
    """Without bounds that matter: numpy's lstsq over columns made from whole strokes."""
    model = parse(LINKAGE + BOX.format(goal="least mean square").replace("[0, 9]", "[0, 500]").replace(
        'box = ["low", "high"]', 'within = 5000, of = "A"'))  # fmt: skip
    answer = balance(model)
    poses = replace(model, stroke=replace(model.stroke, poses=61))
    base, part = columns(poses, "crank")
    left = base + part @ np.linalg.lstsq(part, -base, rcond=None)[0]
    assert answer.foretold == pytest.approx(float(np.sqrt(np.mean(left**2))), rel=1e-6)
    assert answer.foretold == pytest.approx(answer.geometry, rel=1e-6)
    assert answer.square_after < answer.square_before


def test_the_mean_square_within_bounds_is_that_of_a_grid() -> None:
    model = linkage("least mean square")
    answer = balance(model)
    base, part = columns(replace(model, stroke=replace(model.stroke, poses=61)), "crank")
    mass, x, y = (v.ravel() for v in np.meshgrid(np.linspace(0, 9, 37), np.linspace(-150, -20, 40),
                                                 np.linspace(-130, -30, 40), indexing="ij"))  # fmt: skip
    square = np.sqrt(np.mean((base[:, None] + part @ np.array([mass, mass * x, mass * y])) ** 2, axis=0))
    assert answer.foretold <= float(square.min()) * (1 + 1e-6)
    assert answer.foretold >= float(square.min()) * 0.97


@pytest.mark.parametrize("goal", ["least peak", "least mean square"])
def test_the_found_mass_gives_the_told_effort_by_plain_editing_of_the_model(goal: str) -> None:
    model = linkage(goal)
    answer = balance(model)
    found = answer.found[0]
    plain = with_mass(model, "crank", found.size("mass"), 1000 * found.size("x"), 1000 * found.size("y"))
    np.testing.assert_allclose(stroke(plain).effort, answer.after.effort, rtol=1e-8, atol=1e-10)


def test_all_bounds_are_kept() -> None:
    found = balance(linkage()).found[0]
    assert 0 <= found.size("mass") <= 9 + 1e-9
    assert -0.15 - 1e-9 <= found.size("x") <= -0.02 + 1e-9
    assert -0.13 - 1e-9 <= found.size("y") <= -0.03 + 1e-9


def test_a_reach_is_kept() -> None:
    model = parse(LINKAGE + BOX.format(goal="least peak").replace('box = ["low", "high"]', 'within = 60, of = "A"'))
    found = balance(model).found[0]
    assert np.hypot(found.size("x"), found.size("y")) <= 0.06 * (1 + 1e-9)
    part = replace(model.balance.find["bob"], place_step=7)
    found = balance(replace(model, balance=replace(model.balance, find={"bob": part}))).found[0]
    assert np.hypot(found.size("x"), found.size("y")) <= 0.06 * (1 + 1e-9)


def test_twice_the_masses_want_twice_the_counterweight() -> None:
    model = linkage()
    heavy = {n: m if m.mass is None else replace(m, mass=2 * m.mass) for n, m in model.members.items()}
    part = replace(model.balance.find["bob"], mass=(0, 18))
    double = replace(model, members=heavy, balance=replace(model.balance, find={"bob": part}))
    one, two = balance(model), balance(double)
    assert two.found[0].size("mass") == pytest.approx(2 * one.found[0].size("mass"), rel=1e-5)
    assert two.found[0].size("x") == pytest.approx(one.found[0].size("x"), abs=1e-5)
    assert two.peak_after.value == pytest.approx(2 * one.peak_after.value, rel=1e-5)


def test_a_mirrored_machine_has_its_counterweight_mirrored() -> None:
    model = linkage()
    mirror = placed(model, lambda x, y: (-x, y))
    # the crank turns the other way: its angles from the x axis are mirrored too
    mirror = replace(mirror, stroke=replace(model.stroke, start=160, stop=30))
    one, two = balance(model), balance(mirror)
    assert two.found[0].size("mass") == pytest.approx(one.found[0].size("mass"), rel=1e-5)
    assert two.found[0].size("x") == pytest.approx(-one.found[0].size("x"), abs=1e-6)
    assert two.found[0].size("y") == pytest.approx(one.found[0].size("y"), abs=1e-6)
    assert abs(two.peak_after.value) == pytest.approx(abs(one.peak_after.value), rel=1e-6)


def test_geometry_is_what_no_mass_takes_away() -> None:
    """The least peak over any mass times place, of any sign: a linear programme of columns made from whole strokes."""
    from scipy.optimize import linprog

    model = linkage()
    base, part = columns(replace(model, stroke=replace(model.stroke, poses=61)), "crank")
    A = np.block([[part, -np.ones((base.size, 1))], [-part, -np.ones((base.size, 1))]])
    least = linprog([0, 0, 0, 1], A, np.concatenate([-base, base]), bounds=[(None, None)] * 3 + [(0, None)])
    assert balance(model).geometry == pytest.approx(least.fun, rel=1e-3)


def test_steps_are_whole_and_judged_anew() -> None:
    model = linkage()
    part = replace(model.balance.find["bob"], mass_step=0.25, place_step=5)
    answer = balance(replace(model, balance=replace(model.balance, find={"bob": part})))
    found = answer.found[0]
    for name, step in (("mass", 0.25), ("x", 0.005), ("y", 0.005)):
        assert found.size(name) / step == pytest.approx(round(found.size(name) / step), abs=1e-9)
    assert answer.foretold == pytest.approx(abs(answer.peak_after.value), rel=1e-6)
    assert abs(answer.peak_after.value) >= abs(balance(model).peak_after.value) * (1 - 1e-9)


def test_friction_is_judged_in_both_senses() -> None:
    """What a frictionless reckoning foretells is not what rubbing pins leave; what is told is."""
    text = LINKAGE + "[friction]\npins = 0.2\ndiameter = 20\n" + BOX.format(goal="least peak")
    answer = balance(parse(text))
    assert answer.after.rubs
    assert answer.foretold == pytest.approx(abs(answer.peak_after.value), rel=1e-4)
    assert abs(answer.peak_after.value) < abs(answer.peak_before.value)
    # no mass near by, at the same place, is better
    found = answer.found[0]
    for factor in (0.97, 1.03):
        near = with_mass(
            parse(text), "crank", min(9, factor * found.size("mass")), 1000 * found.size("x"), 1000 * found.size("y")
        )
        assert np.abs(stroke(near).effort).max() >= abs(answer.peak_after.value) * (1 - 1e-4)


def test_it_stays_at_an_end_with_the_margin_that_is_wanted() -> None:
    """The hand must press at least the margin to leave: the effort there, by the stroke itself."""
    model = linkage()
    bare = stroke(replace(model, balance=None)).effort[0, 0]
    wanted = float(0.4 * abs(bare[0]))
    staying = replace(model, balance=replace(model.balance, stays_at_start=wanted))
    answer = balance(staying)
    assert bare[0] > 0
    assert answer.stays[0].holds
    assert answer.after.effort[0, 0, 0] >= wanted * (1 - 1e-5)
    assert answer.stays[0].wanted == pytest.approx(wanted)


def test_python_takes_a_part_without_a_table_of_the_model() -> None:
    found = balance(parse(LINKAGE), {"bob": Counterweight("rocker", At("C"), (0, 3))}).found[0]
    assert found.on == ("rocker",)
