"""Pins and lugs: formulas by hand, sizes that are used to the full, larger loads that ask for no smaller sizes."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from linkcalc.design.sizing.lug import Lug, lug
from linkcalc.design.sizing.materials import Material, material
from linkcalc.design.sizing.pin import (
    BENDING,
    Clevis,
    choose_pin,
    clevis_pin,
    least_diameter,
    sheared_pin,
    stacked_pin,
)
from linkcalc.design.sizing.series import clevis_pins
from linkcalc.design.sizing.stack import StackPlate, pin_stack
from linkcalc.faults import Faults

STEEL = Material("steel", 300e6)
CLEVIS = Clevis(0.008, 0.016, 0.0005)
LOADS = st.floats(10.0, 1e6)
FACTORS = st.floats(1.0, 5.0)


@pytest.mark.parametrize(
    ("method", "moment"),
    [
        # 10 kN, fork 8 mm, rod 16 mm, gap 0.5 mm
        ("even pressure", 5e3 * (4e-3 + 4e-3 + 0.5e-3)),
        ("loads at middles", 5e3 * (4e-3 + 8e-3 + 0.5e-3)),  # half the force from middle to middle
        ("tight in fork", 10e3 * 16e-3 / 8),  # a beam built in at both ends under an even load, at its middle F b/24,
        ("tight in rod", 10e3 * 8e-3 / 4),  # a cantilever of one plate under half the force: F/2 t1/2
    ],
)
def test_the_moments_of_a_clevis(method: str, moment: float) -> None:
    found = clevis_pin(10e3, 0.02, Clevis(0.008, 0.016, 0.0005, method), STEEL, 2.0)
    assert found["M"] == pytest.approx(moment, rel=1e-12)
    assert found["sigma"] == pytest.approx(32 * moment / (math.pi * 0.02**3), rel=1e-12)


def test_a_clevis_by_hand() -> None:
    """16 kN on a pin of 16 mm: tau = 16e3/(2 x 201.06) = 39.79 MPa; M = 8e3 x 8.5e-3 = 68 N m over W = 402.1 mm³:
    169.1 MPa; together sqrt(169.1² + 3 x 39.79²) = 182.6 MPa of 300/2 = 150 MPa; 16e3/(16 x 16) = 62.5 MPa."""
    found = clevis_pin(16e3, 0.016, CLEVIS, STEEL, 2.0)
    assert found["tau"] == pytest.approx(39.79e6, abs=0.01e6)
    assert found["sigma"] == pytest.approx(169.1e6, abs=0.05e6)
    assert found["combined"] == pytest.approx(182.6e6, abs=0.1e6)
    assert found["p1"] == found["p2"] == pytest.approx(62.5e6)
    assert found.utilisation == pytest.approx(182.6 / 150, abs=0.001)
    assert (found.governs, found.passes) == ("bending and shear of the pin", False)
    assert found["S"] == 2.0


@given(LOADS, FACTORS, st.sampled_from(sorted(BENDING)))
def test_the_least_pin_is_used_to_the_full(force: float, factor: float, method: str) -> None:
    def of(d: float) -> object:
        return clevis_pin(force, d, Clevis(0.01, 0.02, 0.0, method), STEEL, factor)

    least = least_diameter(of)  # type: ignore[arg-type]
    assert of(least).utilisation == pytest.approx(1.0, abs=1e-9)  # type: ignore[attr-defined]
    assert of(least).passes  # type: ignore[attr-defined]


@given(LOADS, st.floats(1.0, 3.0), FACTORS)
def test_a_larger_load_asks_for_no_smaller_pin(force: float, more: float, factor: float) -> None:
    def least(load: float) -> float:
        return least_diameter(lambda d: clevis_pin(load, d, CLEVIS, STEEL, factor))

    assert least(force * more) >= least(force) * (1 - 1e-9)


@given(st.floats(100.0, 50e3))
def test_the_chosen_pin_passes_and_the_next_smaller_does_not(force: float) -> None:
    def of(d: float) -> object:
        return clevis_pin(force, d, CLEVIS, material("S355", thickness=d), 2.0)

    choice = choose_pin(of)  # type: ignore[arg-type]
    sizes = {name: size for size, name in clevis_pins()}
    assert choice.required is not None
    assert choice.working.passes
    assert sizes[choice.chosen] >= choice.required * (1 - 1e-9)
    if choice.smaller:
        assert not of(sizes[choice.smaller]).passes  # type: ignore[attr-defined]
        assert choice.why.startswith(of(sizes[choice.smaller]).governs)  # type: ignore[attr-defined]
    else:
        assert choice.chosen == "3 mm"


def test_a_stack_of_fork_and_rod_is_a_clevis() -> None:
    """The same moment, shear and pressures; its equivalent stress is not more, as each is taken where it acts."""
    plates = [StackPlate("fork", 0.008), StackPlate("rod", 0.016, 0.0005), StackPlate("fork", 0.008, 0.0005)]
    stack = pin_stack(plates, {"fork": np.array([3e3, 4e3]), "rod": np.array([-3e3, -4e3])})
    across, usual = stacked_pin(stack, 0.014, STEEL, 2.0), clevis_pin(5e3, 0.014, CLEVIS, STEEL, 2.0)
    for symbol in ("tau", "M", "sigma"):
        assert across[symbol] == pytest.approx(usual[symbol], rel=1e-9)
    assert across["p1"] == pytest.approx(usual["p1"])
    assert across["p2"] == pytest.approx(usual["p2"])
    assert usual["sigma"] * (1 - 1e-12) <= across["combined"] <= usual["combined"]
    assert across["z_M"] == pytest.approx(0.0165)


def test_five_plates_by_hand() -> None:
    """Two pairs of links and a rod between them, no gaps: plates of 6, 6, 12, 6, 6 mm. By symmetry no pressure slopes.
    In the middle, 18 mm from the face, half of each pair acts 15 and 9 mm away and half the rod 3 mm: as vectors
    M = U/2 15 + L/2 9 + R/2 3 mm."""
    upper, lower = np.array([2e3, 500.0]), np.array([-1.5e3, 800.0])
    forces = {"upper": upper, "lower": lower, "rod": -upper - lower}
    names = ("upper", "lower", "rod", "lower", "upper")
    plates = [StackPlate(name, 0.012 if name == "rod" else 0.006) for name in names]
    stack = pin_stack(plates, forces)
    middle = (upper / 2 * 15 + lower / 2 * 9 + forces["rod"] / 2 * 3) * 1e-3
    np.testing.assert_allclose(stack.moment(np.array([0.018]))[:, 0], middle)
    found = stacked_pin(stack, 0.014, STEEL, 2.0)
    assert found["M"] == pytest.approx(float(stack.peak_moment.value), rel=1e-12)
    assert found["V"] == pytest.approx(float(stack.peak_shear.value), rel=1e-12)
    assert found["q3"] == pytest.approx(np.hypot(*forces["rod"]) / 0.012)


@given(st.integers(0, 10**6))
def test_the_sheet_of_a_stack_gives_its_peaks(seed: int) -> None:
    """V and M of the sheet come from the loads before their sections by written formulas, in every pose of a batch."""
    rng = np.random.default_rng(seed)
    a, b = rng.normal(size=(2, 2, 5)) * 1e3
    plates = [StackPlate(m, *rng.uniform(0.002, 0.02, 2)) for m in ("a", "b", "a", "c")]
    stack = pin_stack(plates, {"a": a, "b": b, "c": -a - b})
    found = stacked_pin(stack, 0.014, STEEL, 2.0)
    np.testing.assert_allclose(found["M"], stack.peak_moment.value, rtol=1e-9)
    np.testing.assert_allclose(found["V"], stack.peak_shear.value, rtol=1e-9)


def test_arrays_of_forces_give_arrays() -> None:
    forces = np.array([[1e3, -2e3], [5e3, 0.0]])
    found = clevis_pin(forces, 0.016, CLEVIS, STEEL, 2.0)
    one = clevis_pin(5e3, 0.016, CLEVIS, STEEL, 2.0)
    assert np.shape(found.utilisation) == (2, 2)
    assert found.utilisation[1, 0] == pytest.approx(one.utilisation)  # type: ignore[index]
    assert found.utilisation[1, 1] == 0  # type: ignore[index]


def test_the_softer_of_pin_and_plates_bears_the_pressure() -> None:
    found = clevis_pin(5e3, 0.016, CLEVIS, STEEL, 2.0, plate=Material("soft", 100e6))
    assert found["p_allow"] == pytest.approx(50e6)
    assert clevis_pin(5e3, 0.016, CLEVIS, STEEL, 2.0, plate=Material("hard", 900e6))["p_allow"] == pytest.approx(150e6)


def test_inch_sizes_on_request() -> None:
    choice = choose_pin(lambda d: clevis_pin(5e3, d, CLEVIS, STEEL, 2.0), inch=True)
    # bending alone asks for (32 x 21.25 N m/(pi x 150 MPa))^(1/3) = 11.3 mm, which 7/16 in (11.1 mm) has not
    assert (choice.chosen, choice.smaller) == ("1/2 in", "7/16 in")
    assert choice.working["d"] == pytest.approx(0.0127)


def test_no_pin_of_the_series_will_do() -> None:
    choice = choose_pin(lambda d: sheared_pin(5e6, d, 1, STEEL, 2.0))
    assert choice.chosen == ""
    assert choice.why.startswith("the largest, 100 mm, does not do: shear of the pin at ")
    assert choice.required == pytest.approx(math.sqrt(5e6 * 2 * math.sqrt(3) * 4 / (math.pi * 300e6)))


@pytest.mark.parametrize(
    ("changed", "says"),
    [
        ({"factor": 0.0}, "factor against yield: 0 cannot stand here; more than nothing is wanted"),
        ({"factor": -2.0}, "factor against yield: -2 cannot stand here"),
        ({"diameter": 0.0}, "diameter of the pin: 0 cannot stand here"),
        ({"clevis": Clevis(0.008, 0.016, -0.001)}, "gap: -0.001 cannot stand here; nothing or more is wanted"),
        ({"clevis": Clevis(0.008, 0.0)}, "thickness of the rod: 0 cannot stand here"),
        ({"clevis": Clevis(0.008, 0.016, 0.0, "even presure")}, "did you mean 'even pressure'"),
    ],
)
def test_faults(changed: dict[str, object], says: str) -> None:
    given = {"force": 1e3, "diameter": 0.01, "clevis": CLEVIS, "material": STEEL, "factor": 2.0} | changed
    with pytest.raises(Faults, match=says):
        clevis_pin(**given)  # type: ignore[arg-type]


def test_a_lug_by_hand() -> None:
    """20 kN, hole 20, plate 10 x 50, edge 30 mm: 20e3/(10 x 30) = 66.7 MPa; planes of 20 mm:
    20e3/(2 x 10 x 20) = 50 MPa; pressure 20e3/(20 x 10) = 100 MPa."""
    found = lug(20e3, Lug(0.02, 0.01, 0.05, 0.03), STEEL, 2.0)
    assert [found[s] for s in ("sigma", "tau", "p")] == pytest.approx([200e6 / 3, 50e6, 100e6])
    assert found.governs == "pressure in the hole"
    longer = lug(20e3, Lug(0.02, 0.01, 0.05, 0.03), STEEL, 2.0, planes="40 degrees")
    assert longer["a"] == pytest.approx(0.03 - 0.01 * math.cos(math.radians(40)))


@given(LOADS, st.floats(1.0, 10.0))
def test_a_lug_is_used_in_proportion(force: float, more: float) -> None:
    sizes = Lug(0.02, 0.01, 0.05, 0.03)
    once, again = lug(force, sizes, STEEL, 2.0).utilisation, lug(force * more, sizes, STEEL, 2.0).utilisation
    assert again == pytest.approx(more * once)


@pytest.mark.parametrize("sizes", [Lug(0.02, 0.01, 0.02, 0.03), Lug(0.02, 0.01, 0.05, 0.01)])
def test_a_hole_that_leaves_no_plate(sizes: Lug) -> None:
    with pytest.raises(Faults, match="a hole of 20 mm leaves no plate"):
        lug(1.0, sizes, STEEL, 1.0)
