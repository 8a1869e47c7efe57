"""Columns and sections: closed forms, limits where formulas meet, sizes that are used to the full."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad
from scipy.optimize import brentq

from linkcalc.design.sizing.column import ENDS, critical_load, length_factor, two_force_member
from linkcalc.design.sizing.materials import Material
from linkcalc.design.sizing.section import (
    SECTIONS,
    Section,
    flat,
    general,
    least_size,
    needed_modulus,
    rectangular_tube,
    round_bar,
    stressed,
    tube,
)
from linkcalc.faults import Faults

STEEL = Material("steel", 300e6, modulus=210e9)


@pytest.mark.parametrize(
    ("section", "inside", "half"),
    [
        (round_bar(0.02), lambda x, y: x * x + y * y <= 1e-4, (0.01, 0.01)),
        (tube(0.03, 0.004), lambda x, y: 0.011**2 <= x * x + y * y <= 0.015**2, (0.015, 0.015)),
        (flat(0.04, 0.01), lambda x, y: True, (0.005, 0.02)),  # noqa: ARG005
        (rectangular_tube(0.04, 0.03, 0.003), lambda x, y: abs(x) >= 0.012 or abs(y) >= 0.017, (0.015, 0.02)),
    ],
)
def test_area_and_second_moments_by_counting(section: Section, inside: object, half: tuple[float, float]) -> None:
    """A fine grid over the section: area, and sums of y² and x²."""
    n = 400
    x = (np.arange(n) + 0.5) / n * half[0]
    y = (np.arange(n) + 0.5) / n * half[1]
    mask = np.frompyfunc(inside, 2, 1)(x[None, :], y[:, None]).astype(bool)  # type: ignore[arg-type]
    cell = half[0] * half[1] / n**2 * 4
    found = section.working
    assert found["A"] == pytest.approx(mask.sum() * cell, rel=2e-3)
    assert found["I"] == pytest.approx((mask * (y**2)[:, None]).sum() * cell, rel=4e-3)
    assert found["Ia"] == pytest.approx((mask * (x**2)[None]).sum() * cell, rel=4e-3)
    assert found["c"] == pytest.approx(half[1])


def test_a_general_section_is_as_given() -> None:
    found = general(1e-3, 2e-6, 0.04).working
    assert (found["A"], found["I"], found["Ia"]) == (1e-3, 2e-6, 2e-6)
    assert found["W"] == pytest.approx(5e-5)
    assert set(SECTIONS) == {"round", "tube", "flat", "rectangular tube", "general"}


def test_axial_force_and_bending_add() -> None:
    """Flat 40 x 10: A 400 mm², W 2666.7 mm³; 20 kN and 100 N m: 50 + 37.5 = 87.5 MPa of 150 MPa."""
    found = stressed(flat(0.04, 0.01), -20e3, 100.0, STEEL, 2.0, shear=4e3)
    assert found["sigma"] == pytest.approx(87.5e6)
    assert found.utilisation == pytest.approx(87.5 / 150)
    assert found["tau"] == pytest.approx(10e6)
    assert found["W_needed"] == pytest.approx(100 / 100e6)
    assert needed_modulus(-100.0, STEEL, 2.0) == pytest.approx(100 / 150e6)


@given(st.floats(100, 1e5), st.floats(-1e3, 1e3), st.floats(1, 4))
def test_the_least_flat_is_used_to_the_full(axial: float, moment: float, factor: float) -> None:
    least = least_size(lambda h: flat(h, 0.01), axial, moment, STEEL, factor)
    assert stressed(flat(least, 0.01), axial, moment, STEEL, factor).utilisation == pytest.approx(1.0, abs=1e-9)


@given(st.floats(0.51, 20))
def test_curved_bars_against_an_integral(ratio: float) -> None:
    """Winkler and Bach: the neutral line lies at A over the integral of dA/r; at the inner face M (rn - ri)/(A e ri).
    The integral by scipy, for a flat 20 mm deep and a round of 20 mm, the radius of the middle line in depths."""
    depth, radius = 0.02, ratio * 0.02
    for section, width in ((flat(depth, 0.008), lambda y: 0.008), (round_bar(depth), lambda y: _chord(y, depth))):  # noqa: ARG005
        area = quad(width, -depth / 2, depth / 2, epsabs=0)[0]
        over = quad(lambda y: width(y) / (radius + y), -depth / 2, depth / 2, epsabs=0, limit=200)[0]  # noqa: B023
        neutral, inner = area / over, radius - depth / 2
        stress = (neutral - inner) / (area * (radius - neutral) * inner)
        found = stressed(section, 0.0, 1.0, STEEL, 1.0, radius=radius)
        assert found["sigma_M"] == pytest.approx(stress, rel=2e-4)


def _chord(y: float, depth: float) -> float:
    return 2 * math.sqrt(max((depth / 2) ** 2 - y * y, 0.0))


def test_a_gentle_bend_is_nearly_straight_and_a_sharp_tube_is_warned_of() -> None:
    assert stressed(flat(0.02, 0.01), 0.0, 1.0, STEEL, 1.0, radius=2.0)["k_i"] == pytest.approx(1.0, abs=0.004)
    sharp = stressed(tube(0.02, 0.002), 0.0, 1.0, STEEL, 1.0, radius=0.06)
    assert any("Sharply bent" in c for c in sharp.cautions)
    gentle = stressed(tube(0.02, 0.002), 0.0, 1.0, STEEL, 1.0, radius=0.11)
    assert not any("Sharply bent" in c for c in gentle.cautions)
    with pytest.raises(Faults, match="a radius of more than half the depth is wanted"):
        stressed(flat(0.02, 0.01), 0.0, 1.0, STEEL, 1.0, radius=0.01)


def test_a_wall_that_does_not_fit() -> None:
    for made in (lambda: tube(0.02, 0.011), lambda: rectangular_tube(0.04, 0.02, 0.011)):
        with pytest.raises(Faults, match="a wall of 11 mm does not fit into 20 mm"):
            made()
    with pytest.raises(Faults, match=r"depth in the plane: -0\.01 cannot stand here"):
        _ = flat(-0.01, 0.01).working


# columns


def test_tension_by_hand() -> None:
    """10 kN in a round of 10 mm: 127.3 MPa of 150; nothing buckles."""
    found = two_force_member(10e3, 1.0, round_bar(0.01), STEEL, 2.0)
    assert found["sigma"] == pytest.approx(127.32e6, rel=1e-4)
    assert [c.name for c in found.checks] == ["tension"]


@pytest.mark.parametrize("ends", sorted(ENDS))
def test_euler_against_the_equation_of_the_bent_bar(ends: str) -> None:
    """The smallest load at which a bar of these ends stands bent, from the equations of the ends in k L = sqrt(P/EI) L:
    sin = 0; tan = kL; cos = 1; cos = 0."""
    roots = {
        "pinned": math.pi, "fixed and pinned": brentq(lambda x: math.tan(x) - x, 4.0, 4.6), "fixed": 2 * math.pi,
        "fixed and free": math.pi / 2,
    }  # fmt: skip
    bar = round_bar(0.01)
    load = roots[ends] ** 2 * 210e9 * float(bar.working["I"]) / 2.0**2
    assert critical_load(2.0, bar, STEEL, ends) == pytest.approx(load, rel=1e-6)


def test_euler_and_johnson_meet() -> None:
    """At the transition both give half the yield stress, and the curve goes on without a jump."""
    bar = flat(0.03, 0.03)
    length = math.sqrt(2 * math.pi**2 * 210e9 / 300e6) * 0.03 / math.sqrt(12)
    below, above = critical_load(length * (1 - 1e-9), bar, STEEL), critical_load(length * (1 + 1e-9), bar, STEEL)
    assert below == pytest.approx(300e6 / 2 * 9e-4, rel=1e-6)
    assert above == pytest.approx(below, rel=1e-6)


@given(st.floats(0.1, 5.0), st.floats(1.0, 2.0))
def test_a_longer_bar_carries_no_more(length: float, more: float) -> None:
    bar = round_bar(0.02)
    assert critical_load(length * more, bar, STEEL) <= critical_load(length, bar, STEEL) * (1 + 1e-12)
    assert critical_load(length, bar, STEEL) <= 300e6 * float(bar.working["A"])


def test_out_of_the_plane_a_flat_is_weaker() -> None:
    found = two_force_member(-5e3, 0.6, flat(0.04, 0.008), STEEL, 3.0, ends_across="fixed")
    assert found["Pcra"] < found["Pcr"]  # type: ignore[operator]
    assert found.governs == "buckling out of the plane"
    # Euler out of the plane, half the length: pi² E h b³/12/(0.3)²
    assert found["Pcra"] == pytest.approx(math.pi**2 * 210e9 * 0.04 * 0.008**3 / 12 / 0.3**2)


def test_a_force_that_changes_its_sense() -> None:
    forces = np.array([-4e3, 10e3, 0.0])
    found = two_force_member(forces, 0.6, round_bar(0.02), STEEL, 3.0)
    each = [two_force_member(f, 0.6, round_bar(0.02), STEEL, 3.0).utilisation for f in forces]
    np.testing.assert_allclose(found.utilisation, each)


def test_faults() -> None:
    bar = round_bar(0.02)
    with pytest.raises(Faults, match="unknown ends 'pined'; did you mean 'pinned'"):
        two_force_member(-1.0, 1.0, bar, STEEL, 2.0, ends="pined")
    with pytest.raises(Faults, match="a length factor of 0 cannot stand here"):
        length_factor(0.0)
    with pytest.raises(Faults, match=r"materials\.own: 'modulus' is missing"):
        two_force_member(-1.0, 1.0, bar, Material("own", 300e6), 2.0)
    with pytest.raises(Faults, match="factor against yield: 0 cannot stand here"):
        two_force_member(-1.0, 1.0, bar, STEEL, 0.0)
    with pytest.raises(Faults, match="length between the pins: 0 cannot stand here"):
        two_force_member(-1.0, 0.0, bar, STEEL, 2.0)
