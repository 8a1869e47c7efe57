"""The pin across its plates as a beam: balance, free ends, slope of the moment, the clevis in closed form."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad

from linkcalc.design.sizing.stack import PinStack, StackPlate, pin_stack
from linkcalc.faults import Faults

LENGTHS = st.floats(1e-3, 0.05)
FORCES = st.floats(-1e5, 1e5)


@st.composite
def stacks(draw: Any) -> PinStack:
    """Two to five plates of two to three members, in any order, under forces that balance."""
    members = draw(st.sampled_from(["ab", "abc"]))
    more = draw(st.lists(st.sampled_from(list(members)), max_size=3))
    order = draw(st.permutations([*members, *more]))
    plates = [StackPlate(m, draw(LENGTHS), draw(st.sampled_from([0.0, 1e-3, 0.02]))) for m in order]
    forces = {m: np.array([draw(FORCES), draw(FORCES)]) for m in members[:-1]}
    forces[members[-1]] = -sum(forces.values())
    return pin_stack(plates, forces)


def _scale(stack: PinStack) -> float:
    return max(float(np.abs(stack.forces).max()), 1e-9)


@given(stacks())
def test_shear_and_moment_vanish_at_the_free_ends(stack: PinStack) -> None:
    ends = np.array([0.0, stack.length])
    size = _scale(stack)
    assert np.abs(stack.shear(ends)).max() < 1e-9 * size
    assert np.abs(stack.moment(ends)).max() < 1e-9 * size * stack.length


@given(stacks())
def test_the_slope_of_the_moment_is_the_shear(stack: PinStack) -> None:
    z = np.linspace(0, stack.length, 41)[1:-1]
    h = 1e-6 * stack.length
    slope = (stack.moment(z + h) - stack.moment(z - h)) / (2 * h)
    # the central difference of a moment bent by the line load is off by its jump over h
    bend = float(stack.line_load.max()) * h
    np.testing.assert_allclose(slope, stack.shear(z), atol=bend + 1e-6 * _scale(stack))


@given(stacks())
def test_plates_of_a_member_share_its_force(stack: PinStack) -> None:
    """The forces of all plates balance, and so do their moments about any place: the stack stands by itself."""
    total = stack.forces.sum(axis=0)
    assert np.abs(total).max() < 1e-9 * _scale(stack)


@given(stacks())
def test_peaks_are_the_largest(stack: PinStack) -> None:
    z = stack.stations(500)
    for peak, along in ((stack.peak_moment, stack.moment(z)), (stack.peak_shear, stack.shear(z))):
        size = np.hypot(*along)
        assert float(peak.value) >= size.max() * (1 - 1e-9)
        assert float(peak.value) <= size.max() * (1 + 1e-3) + 1e-12 * _scale(stack)


@given(LENGTHS, LENGTHS, st.floats(0, 0.01), FORCES, FORCES)
def test_a_rod_in_a_fork_is_the_usual_clevis(t1: float, t2: float, gap: float, x: float, y: float) -> None:
    """M = F/2 (t1/2 + t2/4 + gap) at the middle of the rod, V = F/2; even pressure. Balance of half the pin."""
    plates = [StackPlate("fork", t1), StackPlate("rod", t2, gap), StackPlate("fork", t1, gap)]
    stack = pin_stack(plates, {"fork": np.array([x, y]), "rod": np.array([-x, -y])})
    force = np.hypot(x, y)
    assert float(stack.peak_moment.value) == pytest.approx(force / 2 * (t1 / 2 + t2 / 4 + gap), rel=1e-9, abs=1e-9)
    assert float(stack.peak_shear.value) == pytest.approx(force / 2, rel=1e-9, abs=1e-9)
    np.testing.assert_allclose(np.hypot(*stack.forces[0]), force / 2, atol=1e-6)
    np.testing.assert_allclose(stack.line_load, [force / 2 / t1, force / t2, force / 2 / t1], rtol=1e-6, atol=1e-6)


def test_single_shear_by_hand() -> None:
    """Two plates of t = 10 mm side by side, F = 1 kN. What tips them is F t, taken by a line load that rises by s over
    each: s 2 t³/12 = F t, s = 6 F/t². So on each it runs from -2 F/t at its free face to 4 F/t at the common one. Shear
    from the free face: -2 F u/t + 3 F u²/t², nothing at u = 2 t/3, where the moment is -4/27 F t; F and nothing at the
    common face."""
    stack = pin_stack(
        [StackPlate("a", 0.01), StackPlate("b", 0.01)], {"a": np.array([1e3, 0]), "b": np.array([-1e3, 0])}
    )
    assert stack.line_load == pytest.approx([4e5, 4e5])
    assert stack.shear(np.array([0.01]))[0, 0] == pytest.approx(1e3)
    assert stack.moment(np.array([0.01]))[:, 0] == pytest.approx([0, 0], abs=1e-9)
    assert float(stack.peak_moment.value) == pytest.approx(4 / 27 * 1e3 * 0.01)
    place = float(stack.peak_moment.place)
    assert min(place, stack.length - place) == pytest.approx(0.02 / 3, abs=1e-7)  # the same on both sides


def test_moment_by_plain_integration() -> None:
    """The moment of the line load before a section, integrated by scipy, in both planes."""
    plates = [
        StackPlate("a", 0.01),
        StackPlate("b", 0.02, 0.003),
        StackPlate("c", 0.015),
        StackPlate("a", 0.006, 0.001),
    ]
    forces = {"a": np.array([3e3, -1e3]), "b": np.array([-5e3, 2e3]), "c": np.array([2e3, -1e3])}
    stack = pin_stack(plates, forces)
    for z in (0.004, 0.02, 0.04, 0.05):
        for plane in (0, 1):
            whole = 0.0
            for k in range(4):
                start, stop = float(stack.starts[k]), min(float(stack.stops[k]), z)
                if stop > start:
                    even, tip = float(stack.middles[k, plane]), float(stack.tips[plane])
                    centre = float(stack.centres[k])
                    whole += quad(lambda s: (even + tip * (s - centre)) * (z - s), start, stop)[0]  # noqa: B023
            assert stack.moment(np.array([z]))[plane, 0] == pytest.approx(whole, rel=1e-9, abs=1e-9)


def test_a_batch_is_one_by_one() -> None:
    rng = np.random.default_rng(7)
    a, b = rng.normal(size=(2, 2, 3, 1, 4))
    plates = [StackPlate("a", 0.01), StackPlate("b", 0.02, 0.001), StackPlate("c", 0.01), StackPlate("b", 0.02)]
    batch = pin_stack(plates, {"a": a, "b": b, "c": -a - b})
    moment, both = batch.peak_moment, batch.equivalent(0.02)
    assert moment.value.shape == (3, 1, 4)
    for at in np.ndindex(3, 1, 4):
        one = {"a": a[:, *at], "b": b[:, *at], "c": (-a - b)[:, *at]}
        single = pin_stack(plates, one)
        assert float(single.peak_moment.value) == pytest.approx(float(moment.value[at]), rel=1e-9)
        assert float(single.peak_moment.place) == pytest.approx(float(moment.place[at]), abs=1e-6)
        assert float(single.equivalent(0.02).value) == pytest.approx(float(both.value[at]), rel=1e-9)


@pytest.mark.parametrize(
    ("plates", "says"),
    [
        ([], "no plate of a and b"),
        ([StackPlate("a", 0.01)], "no plate of b"),
        ([StackPlate("a", 0.01), StackPlate("bb", 0.01)], "'bb' puts no force on this pin; did you mean 'b'"),
        ([StackPlate("a", 0.0), StackPlate("b", 0.01)], "a plate of no thickness"),
        ([StackPlate("a", 0.01), StackPlate("b", 0.01, -1e-3)], "a gap of less than nothing"),
    ],
)
def test_faults(plates: list[StackPlate], says: str) -> None:
    forces = {"a": np.array([1.0, 0]), "b": np.array([-1.0, 0])}
    with pytest.raises(Faults, match=says):
        pin_stack(plates, forces)


def test_forces_must_balance() -> None:
    with pytest.raises(Faults, match=r"do not balance: 0\.5 N are left over"):
        pin_stack([StackPlate("a", 0.01), StackPlate("b", 0.01)], {"a": np.array([1.0, 0]), "b": np.array([-0.5, 0])})
