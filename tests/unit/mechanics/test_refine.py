"""Roots and peaks in brackets: exact on known functions, and found as fast as the methods promise."""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np
import pytest
from hypothesis import example, given
from hypothesis import strategies as st
from numpy.typing import NDArray

from linkcalc.mechanics.refine import peaks, roots

PLACE = 1e-9
"""Of the bracket: what ``peaks`` promises of a place."""
ROOT = 4e-14
"""Of the bracket: twice what ``roots`` is asked for, and rounding of the functions themselves."""
VALUE = 1e-15
"""A value at a peak is as exact as the curve."""

Function = Callable[[np.ndarray], np.ndarray]


def together(functions: Sequence[Function], seen: list[tuple[int, float]] | None = None) -> Callable[..., np.ndarray]:
    """Several functions as numbered curves; what is asked of them is noted."""

    def f(where: np.ndarray, which: NDArray[np.intp]) -> np.ndarray:
        if seen is not None:
            seen.extend(zip(which.tolist(), where.tolist(), strict=True))
        return np.array([functions[k](x) for x, k in zip(where, which, strict=True)])

    return f


def bracketed(functions: Sequence[Function], low: Sequence[float], high: Sequence[float], **more: object) -> np.ndarray:
    f, lo, hi = together(functions), np.array(low, float), np.array(high, float)
    every = np.arange(len(functions))
    return roots(f, lo, hi, f(lo, every), f(hi, every), **more)


KNOWN_ROOTS: dict[str, tuple[Function, float, float, float]] = {
    "cosine": (np.cos, 1.0, 2.0, np.pi / 2),
    "falling line": (lambda x: 3 - 2 * x, 0.0, 7.0, 1.5),
    "cubic": (lambda x: x**3 - 2, 0.0, 2.0, 2 ** (1 / 3)),
    "exponential": (lambda x: np.exp(20 * x) - 2, -1.0, 1.0, np.log(2) / 20),
    "bracket from above": (np.sin, 4.0, 2.5, np.pi),
    "kink": (lambda x: np.where(x < 0.3, 0.3 - x, 0.01 * (0.3 - x)), 0.0, 1.0, 0.3),
    "ninth power": (lambda x: (x - 0.7) ** 9, 0.0, 1.0, 0.7),
    "jump": (lambda x: np.where(x < 1 / 3, -1.0, 2.0), 0.0, 1.0, 1 / 3),
    "pole": (lambda x: 1 / (x - 0.6), 0.0, 1.0, 0.6),
    "huge and tiny": (lambda x: 1e12 * (x - 1e-6) * (x + 1e-3), 0.0, 1.0, 1e-6),
}


@pytest.mark.parametrize("name", KNOWN_ROOTS)
def test_known_roots(name: str) -> None:
    f, low, high, root = KNOWN_ROOTS[name]
    with np.errstate(divide="ignore"):
        (found,) = bracketed([f], [low], [high])
    # of a ninth power rounding leaves nothing of the sign within 1e-16 ** (1/9) of the root
    flat = 1e-2 if name == "ninth power" else ROOT * abs(high - low)
    assert found == pytest.approx(root, abs=flat)


def test_many_at_once_are_each_alone() -> None:
    smooth = [v for k, v in KNOWN_ROOTS.items() if k != "pole"]
    all_of_them = bracketed([v[0] for v in smooth], [v[1] for v in smooth], [v[2] for v in smooth])
    for found, (f, low, high, _) in zip(all_of_them, smooth, strict=True):
        assert found == bracketed([f], [low], [high])[0]


@pytest.mark.parametrize(("low", "high"), [(0.0, 1.0), (-1.0, 0.0)])
def test_a_root_at_an_end_is_that_end(low: float, high: float) -> None:
    assert bracketed([lambda x: x], [low], [high])[0] == 0.0


@given(st.floats(-0.95, 0.95), st.floats(-3, 3), st.floats(0, 5))
@example(0.0, 0.0, 0.0)
@example(0.949, 3.0, 5.0)
def test_random_smooth_curves(root: float, bend: float, steep: float) -> None:
    def f(x: np.ndarray) -> np.ndarray:
        u = x - root
        return u * (4 + bend * np.sin(2 * u)) * np.exp(steep * u)

    assert bracketed([f], [-1.0], [1.0])[0] == pytest.approx(root, abs=2 * ROOT)


def test_converges_faster_than_a_line() -> None:
    """Order of convergence measured: each error is a power above 1.3 of the one before (bisection: 1)."""
    seen: list[tuple[int, float]] = []
    root = 0.4
    f = together([lambda x: np.exp(x) - np.exp(root)], seen)
    low, high, only = np.array([-1.0]), np.array([1.0]), np.arange(1)
    roots(f, low, high, f(low, only), f(high, only))
    errors = np.array([abs(x - root) for _, x in seen[2:]])
    errors = errors[errors > 1e-13]
    orders = np.log(errors[2:] / errors[1:-1]) / np.log(errors[1:-1] / errors[:-2])
    assert np.median(orders[-3:]) > 1.3
    assert len(seen) < 16, "bisection takes 48"


PEAKS: dict[str, tuple[Function, float, float, float, float]] = {
    "parabola": (lambda x: 5 - (x - 0.3) ** 2, -1.0, 1.0, 0.3, 5.0),
    "sine": (np.sin, 0.0, 3.0, np.pi / 2, 1.0),
    "at the low end": (lambda x: -x, 2.0, 3.0, 2.0, -2.0),
    "at the high end": (np.exp, 0.0, 1.0, 1.0, np.e),
    "just inside an end": (lambda x: -((x - 0.999999) ** 2), 0.0, 1.0, 0.999999, 0.0),
    "bracket from above": (np.sin, 3.0, 0.0, np.pi / 2, 1.0),
    "kink": (lambda x: -np.abs(x - 0.123), -1.0, 1.0, 0.123, 0.0),
    "lopsided kink": (lambda x: np.where(x < 0.456, 3 * x, 0.456 * 3 - 0.1 * (x - 0.456)), 0.0, 1.0, 0.456, 1.368),
    "kink on a hump": (lambda x: -np.abs(x - 0.2) - (x - 0.2) ** 2, -1.0, 1.0, 0.2, 0.0),
    "sharp hump": (lambda x: 1 / (1 + 400 * (x - 0.11) ** 2), -1.0, 1.0, 0.11, 1.0),
}


@pytest.mark.parametrize("name", PEAKS)
def test_known_peaks(name: str) -> None:
    f, low, high, place, value = PEAKS[name]
    found, best = peaks(together([f]), np.array([low]), np.array([high]))
    # near a smooth top the place is known to the square root of rounding only, the value fully
    smooth = "kink" not in name and "end" not in name.replace("inside", "")
    slack = 3e-8 if smooth else PLACE
    assert found[0] == pytest.approx(place, abs=slack * abs(high - low))
    steep = 0.0 if smooth else 3 * PLACE * abs(high - low)
    assert best[0] == pytest.approx(value, rel=VALUE, abs=VALUE + steep)


def test_many_peaks_at_once_are_each_alone() -> None:
    places, values = peaks(
        together([p[0] for p in PEAKS.values()]),
        np.array([p[1] for p in PEAKS.values()]),
        np.array([p[2] for p in PEAKS.values()]),
    )
    for place, value, (f, low, high, _, _) in zip(places, values, PEAKS.values(), strict=True):
        alone = peaks(together([f]), np.array([low]), np.array([high]))
        # the order of sums differs between one row and many, which moves a smooth top by the root of rounding
        assert place == pytest.approx(alone[0][0], abs=3e-8)
        assert value == pytest.approx(alone[1][0], rel=VALUE, abs=PLACE)


def test_a_smooth_peak_takes_few_rounds() -> None:
    """Interpolation through seven points: the bracket shrinks tenfold a round, and stops where nothing is gained."""
    seen: list[tuple[int, float]] = []
    peaks(together([lambda x: np.cos(x - 0.2)], seen), np.array([-1.0]), np.array([1.0]))
    assert len(seen) <= 7 * 10


@given(st.floats(-1, 1), st.floats(0.1, 3), st.floats(-2, 2))
@example(1.0, 1.0, 0.0)
@example(-1.0, 0.1, 2.0)
def test_no_sample_of_the_curve_is_higher(middle: float, wide: float, lean: float) -> None:
    def f(x: np.ndarray) -> np.ndarray:
        return lean * x - ((x - middle) / wide) ** 2

    _, best = peaks(together([f]), np.array([-1.0]), np.array([1.0]))
    top = np.max(f(np.linspace(-1, 1, 2001)))
    assert best[0] >= top - VALUE * (1 + abs(top))


def test_what_is_not_a_number_is_no_peak() -> None:
    def f(x: np.ndarray) -> np.ndarray:
        return np.where(x > 0.5, np.nan, x)

    place, value = peaks(together([f]), np.array([0.0]), np.array([1.0]))
    assert place[0] == pytest.approx(0.5, abs=1e-6) and value[0] == pytest.approx(0.5, abs=1e-6)
    nothing = peaks(together([lambda x: x * np.nan]), np.array([0.0]), np.array([1.0]))
    assert nothing[1][0] == -np.inf
