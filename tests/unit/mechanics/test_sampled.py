"""Peaks and roots of sampled curves: as exact as in brackets, at one evaluation where the curve is smooth."""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np
import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from linkcalc.mechanics.sampled import Roots, Samples, sampled_peaks

VALUE = 1e-12
"""Of the curve's size: a polynomial through seven samples foretells to 1e-9, and the value squares what is left."""
PLACE = 1e-9
"""Of the range: a top is known to the root of the value's exactness."""

Function = Callable[[np.ndarray], np.ndarray]


class Watched:
    """Numbered curves that count how often they are asked."""

    def __init__(self, functions: Sequence[Function], low: float, high: float, count: int):
        self.functions, self.asked = functions, 0
        where = np.linspace(low, high, count)
        self.samples = Samples(where, np.array([f(where) for f in functions], float).reshape(len(functions), count))

    def __call__(self, where: np.ndarray, which: np.ndarray) -> np.ndarray:
        self.asked += where.size
        return np.array([self.functions[k](x) for x, k in zip(where, which, strict=True)])

    def peak(self) -> tuple[float, float]:
        place, value = sampled_peaks(self, self.samples)
        return float(place[0]), float(value[0])

    def roots(self) -> np.ndarray:
        return Roots(self.samples).confirmed(self)


SMOOTH: dict[str, tuple[Function, float, float]] = {
    "cosine": (lambda x: np.cos(x - 0.217), 0.217, 1.0),
    "rising": (np.exp, 1.0, np.e),
    "falling": (lambda x: np.exp(-x), -1.0, np.e),
    "near the start": (lambda x: -((x + 0.9999) ** 2), -0.9999, 0.0),
    "near the end": (lambda x: -((x - 0.9999) ** 2), 0.9999, 0.0),
    "on a sample": (lambda x: 3 - x**4 - x**2, 0.0, 3.0),
}
counts = pytest.mark.parametrize("count", [2, 3, 6, 7, 8, 31, 181])


@counts
@pytest.mark.parametrize("name", SMOOTH)
def test_smooth_peaks(name: str, count: int) -> None:
    f, place, value = SMOOTH[name]
    found, best = Watched([f], -1.0, 1.0, count).peak()
    assert best == pytest.approx(value, abs=VALUE)
    assert found == pytest.approx(place, abs=np.sqrt(VALUE))


@pytest.mark.parametrize("count", [31, 61, 181])
def test_a_smooth_peak_is_confirmed_by_one_evaluation(count: int) -> None:
    watched = Watched([SMOOTH["cosine"][0]], -1.0, 1.0, count)
    watched.peak()
    assert watched.asked == 1


@counts
def test_ends_are_told_as_given(count: int) -> None:
    """No rounding: the designer's own value of the stroke."""
    assert Watched([np.exp], 0.1, 0.7, count).peak()[0] == np.linspace(0.1, 0.7, count)[-1]
    assert Watched([lambda x: -x], 0.1, 0.7, count).peak()[0] == 0.1


@pytest.mark.parametrize("count", [7, 31, 181])
@given(at=st.floats(-0.999, 0.999))
@example(at=0.0)
@example(at=0.25)
@example(at=0.9921875)
@example(at=-0.998)
def test_a_kink_is_found_as_exactly(count: int, at: float) -> None:
    place, value = Watched([lambda x: 1 - np.abs(x - at)], -1.0, 1.0, count).peak()
    assert place == pytest.approx(at, abs=3 * PLACE)
    assert value == pytest.approx(1.0, abs=3 * PLACE)


@pytest.mark.parametrize("count", [31, 61, 121])
@given(st.floats(-0.5, 0.5), st.floats(1e-9, 1e-3))
@example(0.1, 1e-9)
def test_the_higher_of_two_humps_wins_whatever_the_samples_show(count: int, shift: float, higher: float) -> None:
    """Two humps alike but for a trifle: the samples may well be higher on the lower one."""
    step = 2.0 / (count - 1)
    first, second = -0.5 + shift * step, 0.5 + 0.37 * step

    def f(x: np.ndarray) -> np.ndarray:
        return np.exp(-20 * (x - first) ** 2) + (1 + higher) * np.exp(-20 * (x - second) ** 2)

    fine = np.linspace(second - 1e-3, second + 1e-3, 2001)
    _, value = Watched([f], -1.0, 1.0, count).peak()
    assert value >= np.max(f(fine)) - VALUE


def test_a_peak_beside_a_pole_is_as_exact_as_any() -> None:
    """A ratio of the kind a toggle has: no bound at one end, an ordinary peak elsewhere that another curve tells."""

    def ratio(x: np.ndarray) -> np.ndarray:
        return -(1 / (1.001 - x) + 1 / (x + 2) ** 3)

    _, value = Watched([ratio], -1.0, 1.0, 61).peak()

    top = _by_golden_section(ratio, -1.0, 0.9)
    assert value == pytest.approx(top, rel=VALUE)


def _by_golden_section(f: Function, low: float, high: float) -> float:
    """The largest value by a method that knows no polynomials."""
    r = (np.sqrt(5) - 1) / 2
    for _ in range(90):
        a, b = high - r * (high - low), low + r * (high - low)
        low, high = (low, b) if f(np.array(a)) > f(np.array(b)) else (a, high)
    return float(f(np.array((low + high) / 2)))


def test_several_curves_at_once_are_each_alone() -> None:
    functions = [f for f, _, _ in SMOOTH.values()] + [lambda x: -np.abs(x - 0.3)]
    places, values = sampled_peaks(w := Watched(functions, -1.0, 1.0, 31), w.samples)
    for place, value, f in zip(places, values, functions, strict=True):
        alone = Watched([f], -1.0, 1.0, 31).peak()
        assert place == pytest.approx(alone[0], abs=1e-7)
        assert value == pytest.approx(alone[1], abs=1e-9)


def test_samples_that_are_not_numbers_are_left_out() -> None:
    def f(x: np.ndarray) -> np.ndarray:
        return np.where(np.abs(x - 0.4) < 0.05, np.nan, np.cos(x + 0.3))

    place, value = Watched([f], -1.0, 1.0, 61).peak()
    assert place == pytest.approx(-0.3, abs=1e-6) and value == pytest.approx(1.0, abs=VALUE)


@pytest.mark.parametrize("count", [2, 3, 7, 12, 61, 200])
def test_all_roots_between_samples(count: int) -> None:
    def f(x: np.ndarray) -> np.ndarray:
        return np.sin(np.pi * 2 * (x - 0.13)) if count > 3 else x - 0.13

    wanted = 0.13 + np.arange(-2, 2) * 0.5 if count > 3 else [0.13]
    np.testing.assert_allclose(Watched([f], -1.0, 1.0, count).roots(), wanted, atol=1e-12)


@pytest.mark.parametrize("count", [5, 9, 61])
def test_a_root_on_a_sample_is_one_root(count: int) -> None:
    np.testing.assert_allclose(Watched([lambda x: x**3 + x], -1.0, 1.0, count).roots(), [0.0], atol=1e-15)


@pytest.mark.parametrize("count", [9, 61])
def test_a_curve_that_touches_zero_does_not_pass_it(count: int) -> None:
    assert Watched([lambda x: x**2], -1.0, 1.0, count).roots().size == 0
    assert Watched([lambda x: 0 * x], -1.0, 1.0, count).roots().size == 0
    assert Watched([lambda x: x + 1], -1.0, 1.0, count).roots().size == 0, "zero at the end is no passage"


def test_a_stretch_of_zeros_is_passed_once() -> None:
    (root,) = Watched([lambda x: np.sign(x) * np.maximum(np.abs(x) - 0.2, 0)], -1.0, 1.0, 61).roots()
    assert -0.25 <= root <= 0.25


@pytest.mark.parametrize("count", [9, 61])
@given(at=st.floats(-0.99, 0.99), bend=st.floats(-0.9, 0.9))
@example(at=0.25, bend=0.0)
def test_roots_of_kinks_and_curves(count: int, at: float, bend: float) -> None:
    def f(x: np.ndarray) -> np.ndarray:
        return (x - at) * (1 + bend * np.sign(x - at))

    (root,) = Watched([f], -1.0, 1.0, count).roots()
    assert root == pytest.approx(at, abs=1e-12 if bend == 0 else PLACE)


def test_roots_come_curve_by_curve() -> None:
    watched = Watched([np.cos, lambda x: x - 1.0, lambda x: x * 0 + 1], 0.0, 9.0, 61)
    found = Roots(watched.samples)
    np.testing.assert_array_equal(found.curve, [0, 0, 0, 1])
    np.testing.assert_allclose(found.confirmed(watched), [np.pi / 2, 3 * np.pi / 2, 5 * np.pi / 2, 1.0], atol=1e-12)


@pytest.mark.parametrize("count", [5, 61])
@pytest.mark.parametrize("at", [-1.0, -0.3, 0.0, 1.0])
def test_what_has_no_bound_is_the_largest(count: int, at: float) -> None:
    """A ratio at a dead point, on a sample or between two: told as endless, not as the largest number that was met."""

    def f(x: np.ndarray) -> np.ndarray:
        with np.errstate(divide="ignore"):
            ratio = np.abs(1 / (x - at))
        return np.where(ratio > 1e9, np.inf, ratio)

    place, value = Watched([f], -1.0, 1.0, count).peak()
    assert value == np.inf and place == pytest.approx(at, abs=1e-8)
