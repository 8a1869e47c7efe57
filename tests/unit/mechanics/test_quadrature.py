"""Integrals of sampled curves: exact for cubics, of fourth order for the rest."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.mechanics.quadrature import Integral


@pytest.mark.parametrize("count", [4, 5, 12])
@pytest.mark.parametrize("ends", [(0.0, 2.0), (1.5, -1.0)])
def test_cubics_are_exact_from_any_place_to_any(count: int, ends: tuple[float, float]) -> None:
    x = np.linspace(*ends, count)
    power = np.array([[3.0, -1.0, 2.0, 0.5], [0.0, 0.0, 1.0, -2.0]])
    values = np.array([np.polyval(p[::-1], x) for p in power])
    places = np.array([ends[0], ends[1], *np.linspace(*ends, 7)])

    def whole(p: np.ndarray, at: np.ndarray) -> np.ndarray:
        return np.polyval(np.append(p[::-1] / [4, 3, 2, 1], 0.0), at)

    expected = np.array([whole(p, places) - whole(p, np.array([ends[0]])) for p in power])
    np.testing.assert_allclose(Integral(x, values).to(places), expected, atol=1e-12)


def test_half_the_step_gives_a_sixteenth_of_the_error() -> None:
    def error(count: int) -> float:
        x = np.linspace(0, 3, count)
        return abs(float(Integral(x, np.exp(x)[None]).to(np.array([2.2]))[0, 0]) - (np.exp(2.2) - 1))

    assert 12 < error(31) / error(61) < 22


def test_too_few_samples() -> None:
    with pytest.raises(ValueError, match="3 samples; 4 are wanted"):
        Integral(np.arange(3.0), np.zeros((1, 3)))
