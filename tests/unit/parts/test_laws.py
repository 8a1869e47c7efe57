"""Laws against their energy in closed form, paths against the growth of their length, and any law along any path.

A force by a law does no work round a closed way: what it does to each coordinate is minus the slope of its energy.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
import pytest
from scipy.interpolate import PchipInterpolator

from linkcalc.parts.contract import Poses, Value
from linkcalc.parts.coordinates.turn import TurnCoordinate
from linkcalc.parts.law_push import LawPush, Way
from linkcalc.parts.laws import Law
from linkcalc.parts.laws.formula import Formula
from linkcalc.parts.laws.gas import Gas, taken_by_rise
from linkcalc.parts.laws.linear import COMPRESSION, TENSION, Linear
from linkcalc.parts.laws.steady import Steady
from linkcalc.parts.laws.table import Table
from linkcalc.parts.paths.straight import Straight
from linkcalc.parts.paths.turning import Turning
from linkcalc.parts.pose import Site
from tests.unit.parts.batch import SHAPE, STEP, nudged, random_poses

ROWS = (np.array([-4.0, -2.5, -1.0, 0.1, 0.6, 1.2, 4.0]), np.array([3.0, 9.0, 2.0, 2.0, -5.0, -4.0, 7.0]))
MEMBERS = 3


@dataclass(frozen=True)
class Known:
    """A law, and its energy [J] at a length or angle, worked out by hand or by another library."""

    law: Law
    energy: Callable[[np.ndarray], np.ndarray]


def gas_energy(way: np.ndarray, n: float) -> np.ndarray:
    """Work done on the gas from the extended end: the integral of F1/(1 - a x)^n over x."""
    left = 1 - 0.06 * (5.0 - way)
    return -90 / 0.06 * np.log(left) if n == 1 else 90 / 0.06 / (n - 1) * (left ** (1 - n) - 1)


LAWS = {
    "linear": Known(Linear(40.0, 0.3), lambda way: 20 * (way - 0.3) ** 2),
    "zero free length": Known(Linear(40.0, 0.0), lambda way: 20 * way**2),
    "tension": Known(Linear(40.0, 0.3, TENSION), lambda way: 20 * np.maximum(way - 0.3, 0) ** 2),
    "compression": Known(Linear(40.0, 0.3, COMPRESSION), lambda way: 20 * np.minimum(way - 0.3, 0) ** 2),
    "steady": Known(Steady(-7.0), lambda way: 7 * way),
    "gas, slow": Known(Gas(90.0, 5.0, 10.0, 0.06), lambda way: gas_energy(way, 1.0)),
    "gas, fast": Known(Gas(90.0, 5.0, 10.0, 0.06, 1.4), lambda way: gas_energy(way, 1.4)),
    "table": Known(Table(list(ROWS[0]), list(ROWS[1])), lambda way: -PchipInterpolator(*ROWS).antiderivative()(way)),
    "formula": Known(Formula(lambda way: 3 * np.sin(2 * way), 1.0), lambda way: 1.5 * np.cos(2 * way)),
}
PATHS: dict[str, Way] = {
    "straight, ground to member": Straight(Site(0, 0.1, -0.2), Site(1, 0.05, 0.12), ("", "")),
    "straight, member to member": Straight(Site(2, -0.04, 0.2), Site(1, 0.05, 0.12), ("", "P")),
    "turning, ground": Turning(TurnCoordinate(1, 0, 0.4), Site(1, 0.0, 0.0)),
    "turning, member": Turning(TurnCoordinate(2, 1, -0.2), Site(2, 0.0, 0.0)),
}
every_law = pytest.mark.parametrize("known", LAWS.values(), ids=LAWS)
every_path = pytest.mark.parametrize("path", PATHS.values(), ids=PATHS)


def full(value: Value) -> np.ndarray:
    return np.broadcast_to(value, SHAPE)


@every_law
@every_path
@pytest.mark.parametrize("sense", [1.0, -1.0])
def test_a_push_is_minus_the_slope_of_its_energy(known: Known, path: Way, sense: float) -> None:
    push = LawPush("s", "spring", known.law, path, sense)
    at = random_poses(MEMBERS)

    def energy(poses: Poses) -> np.ndarray:
        return sense * known.energy(np.asarray(path.value(poses)))

    for member, *parts in push.push(at):
        for which, part in enumerate(parts):
            if member:
                slope = (energy(nudged(at, member, which, STEP)) - energy(nudged(at, member, which, -STEP))) / (
                    2 * STEP
                )
                # of the central difference: third derivatives of the order of 1e3 times STEP squared
                np.testing.assert_allclose(full(push.strength(at) * part), -slope, rtol=1e-6, atol=1e-6)


@every_path
def test_a_path_pushes_by_the_growth_of_its_length(path: Way) -> None:
    at = random_poses(MEMBERS)
    for member, *parts in path.push(at):
        for which, part in enumerate(parts):
            if member:
                ahead, behind = (path.value(nudged(at, member, which, by)) for by in (STEP, -STEP))
                np.testing.assert_allclose(full(part), (ahead - behind) / (2 * STEP), atol=1e-7)


@every_law
def test_a_batch_is_its_lengths_one_by_one(known: Known) -> None:
    ways = np.linspace(-3.9, 3.9, 30).reshape(1, 5, 6)
    whole = np.broadcast_to(known.law.force(ways), ways.shape)
    for entry in np.ndindex(ways.shape):
        assert float(known.law.force(float(ways[entry]))) == pytest.approx(whole[entry], rel=1e-14)


@every_law
def test_copies_with_the_same_sizes_are_alike(known: Known) -> None:
    """Sizes may hang on toleranced dimensions: (1, variant, 1) arrays go through the same code."""
    law = known.law
    if isinstance(law, Formula):
        pytest.skip("a formula brings its dimensions with it")
    ways = np.linspace(-3.9, 3.9, 7).reshape(1, 1, 7)
    several = Table([copies(v) for v in law.ways], [copies(v) for v in law.forces]) if isinstance(law, Table) else (
        type(law)(**{k: copies(v) if isinstance(v, float) else v for k, v in vars(law).items()})
    )  # fmt: skip
    found, wanted = (np.broadcast_to(one.force(ways), (1, 4, 7)) for one in (several, law))
    np.testing.assert_allclose(found, wanted, rtol=1e-14)


def copies(value: float) -> np.ndarray:
    return np.full((1, 4, 1), float(value))


def test_a_table_is_what_another_library_makes_of_it() -> None:
    """Monotone cubic interpolation of scipy (its PchipInterpolator), to rounding."""
    ways = np.linspace(ROWS[0][0], ROWS[0][-1], 401)
    np.testing.assert_allclose(Table(*map(list, ROWS)).force(ways), PchipInterpolator(*ROWS)(ways), atol=1e-13)


def test_a_table_of_two_rows_is_a_straight_line() -> None:
    assert Table([1.0, 3.0], [10.0, 20.0]).force(1.5) == pytest.approx(12.5, rel=1e-15)


@pytest.mark.parametrize("law", [LAWS["table"].law, LAWS["gas, slow"].law], ids=["table", "gas"])
def test_no_force_beyond_the_ends(law: Law) -> None:
    """The ends themselves belong to it, though rounding may put them a little outside."""
    low, high = (law.ways[0], law.ways[-1]) if isinstance(law, Table) else (-5.0, 5.0)
    ways = np.array([low - 1e-6, low - 1e-12, low, high, high + 1e-12, high + 1e-6])
    assert np.isnan(law.force(ways)).tolist() == [True, False, False, False, False, True]


@pytest.mark.parametrize("exponent", [1.0, 1.2, 1.4])
def test_a_gas_of_a_stated_rise(exponent: float) -> None:
    """By the gas law with V0 chosen so that the ratio comes out: F2/F1 = rise, and (F1/F)^(1/n) falls evenly."""
    law = Gas(400.0, 0.6, 0.25, taken_by_rise(1.35, 0.25, exponent), exponent)
    assert law.force(0.6) == pytest.approx(400, rel=1e-14)
    assert law.force(0.35) == pytest.approx(400 * 1.35, rel=1e-14)
    volume = (400 / law.force(np.array([0.6, 0.475, 0.35]))) ** (1 / exponent)
    assert volume[1] == pytest.approx((volume[0] + volume[2]) / 2, rel=1e-14)
