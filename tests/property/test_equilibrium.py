"""Statics of random machines, checked from the answer alone."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
from hypothesis import example, given

from linkcalc import parse
from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.mechanism import GROUND, Mechanism
from tests.property.resum import Resum, unbalanced
from tests.samples import BRACKET, COLLAR, RAM, SLOTTED, TRAIN, WINDER
from tests.strategies import frames, machines, solved
from tests.unit.design.models import WELDED

BALANCE = 1e-9
"""Of the largest force: rounding is 1e-16 a product, amplified by angles of transmission down to 30 degrees in chains
of three; three figures are left to spare."""
WORK = 1e-5
"""Of the power of all loads: central differences over STEP err by its square times a third derivative up to 1e4."""
STEP = 3e-5
"""[-] of the drive, relative to a radian or to the size of the drawing"""

TILTED = "\n[cases.level]\n[cases.tilted]\ngravity = { turn = 35, scale = 2 }\n"


def corners(test: Any) -> Any:
    """The awkward ones: a guide beside its member, a slot on a pin itself, teeth, gravity that differs from case to
    case."""
    for text in (RAM + TILTED, COLLAR + TILTED, SLOTTED + TILTED, TRAIN + TILTED, WINDER + TILTED):
        test = example(parse(text))(test)
    return test


@given(machines())
@corners
def test_every_member_and_every_pin_is_in_equilibrium(machine: Mechanism) -> None:
    answer = solved(machine)
    assert not answer.status.any()
    assert max(unbalanced(answer).values()) < BALANCE


@given(frames())
@example(parse(BRACKET))
@example(parse(WELDED))
def test_every_member_of_a_frame_is_in_equilibrium(frame: Mechanism) -> None:
    answer = solved(frame)
    assert not answer.status.any()
    assert max(unbalanced(answer).values()) < BALANCE


@given(machines())
@corners
def test_action_is_reaction(machine: Mechanism) -> None:
    """What two members do to each other at a slot, slide or weld is opposite, and at a pin of two without a load."""
    answer = solved(machine)
    table = Resum(answer)
    largest = max(float(np.abs(answer.force).max()), 1e-300)
    loaded = {who for who, *_ in (*table.loads(), *table.joints()) if who.startswith("pin ")}
    for joint in answer.joints:
        sides = [k for k, b in enumerate(answer.bearings) if b.joint == joint]
        assert len(sides) >= 2
        if f"pin {joint}" not in loaded:
            assert np.abs(answer.force[sides].sum(axis=0)).max() <= BALANCE * largest
        if len(sides) == 2:
            assert np.abs(answer.moment[sides].sum(axis=0)).max() <= BALANCE * largest * table.drawing.size


@given(machines())
@corners
def test_the_ground_takes_what_all_loads_come_to(machine: Mechanism) -> None:
    """Cut free of the ground, the whole machine is one body."""
    answer = solved(machine)
    table = Resum(answer)
    on_ground = [wrench for wrench in table.joints() if wrench[0] == GROUND]
    from_outside = [wrench for wrench in table.loads() if wrench[0] != GROUND]
    sums, size = np.zeros((3, *table.shape)), np.full(table.shape, 1e-300)
    for sign, wrenches in ((-1.0, on_ground), (1.0, from_outside)):
        for _, x, y, fx, fy, couple in wrenches:
            sums += sign * np.array([fx, fy, (x * fy - y * fx + couple) / table.drawing.size])
            size = np.maximum(size, np.hypot(fx, fy) + np.abs(couple) / table.drawing.size)
    assert np.all(np.abs(sums) <= 30 * BALANCE * size)


@given(machines())
@corners
def test_virtual_work_by_finite_differences(machine: Mechanism) -> None:
    """Effort, loads and weights do no work together in a small motion; the motion is taken from solved poses."""
    usual = solved(machine)
    length = Resum(usual).drawing.size
    rate = length if usual.kinds["drive"] == "angle" else 1.0  # [m] a usual way, per unit of the drive
    step, drive = STEP * length / rate, usual.drive[0, 0, [0, 3]]
    before, there, after = (solved(machine, at=drive + by) for by in (-step, 0.0, step))
    table, behind, ahead = Resum(there), Resum(before), Resum(after)
    power = np.zeros(table.shape)
    size = np.full(table.shape, 1e-300)
    for who, x, y, fx, fy, couple in table.loads():
        carrier = (table.carriers(who[4:])[0]) if who.startswith("pin ") else who
        k = table.index[carrier]
        turn = (after.turn[k] - before.turn[k] + np.pi) % (2 * np.pi) - np.pi
        # speed of the loaded spot as the member that carries it moves
        (ax, ay), (bx, by) = (_carried(t, k, there, x, y) for t in (ahead, behind))
        one = (fx * (ax - bx) + fy * (ay - by) + couple * turn) / (2 * step)
        power += one
        size = size + np.abs(one) + (np.hypot(fx, fy) + np.abs(couple) / length) * rate
    assert np.all(np.abs(power) <= WORK * size)


def _carried(table: Resum, k: int, there: StrokeAnswer, x: np.ndarray, y: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
    """Where a spot of a member, known in one answer, is in another."""
    now = table.answer
    dx, dy, by = x - there.x[k], y - there.y[k], now.turn[k] - there.turn[k]
    return now.x[k] + np.cos(by) * dx - np.sin(by) * dy, now.y[k] + np.sin(by) * dx + np.cos(by) * dy


@given(machines())
def test_the_ideal_ratio_is_the_force_ratio_with_nothing_else(machine: Mechanism) -> None:
    """Bare of weights and other loads the two are one; the ideal ratio does not change by them."""
    bare = replace(
        machine,
        loads={},
        cases={},
        members={name: replace(member, mass=None) for name, member in machine.members.items()},
    )
    full, answer = solved(machine), solved(bare)
    sound = np.isfinite(answer.ideal_ratio) & (np.abs(answer.ideal_ratio) < 1e6)
    np.testing.assert_allclose(answer.force_ratio[sound], answer.ideal_ratio[sound], rtol=1e-7)
    np.testing.assert_allclose(full.ideal_ratio[0][sound[0]], answer.ideal_ratio[0][sound[0]], rtol=1e-9)


@given(machines())
def test_the_answer_says_how_well_it_satisfies_its_equations(machine: Mechanism) -> None:
    checks = solved(machine).checks
    assert checks.closure < 1e-12
    assert checks.equilibrium < BALANCE
    assert checks.virtual_work < 1e-6
