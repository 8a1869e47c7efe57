"""Beam tables: shear and moment of beams whose supports follow from balance, through the public interface.

Source of the formulas: AISC, Steel Construction Manual, table 3-23, shears, moments and deflections (numbers of the
cases as there; from memory, and every one follows from balance). Spread loads are own weight.
"""

from __future__ import annotations

import math

import pytest

from linkcalc import members, parse
from linkcalc.design.diagram import diagram
from linkcalc.design.members import MembersAnswer

BEAM = """
[points]
{points}
[members]
ground = ["A"]
beam = {{ points = {order}, mass = {mass} }}
{held}
{loads}
"""
ON_TWO = '[slots.right]\npoint = "B"\nalong = 0\n'
BUILT_IN = '[welds.wall]\nmembers = ["ground", "beam"]\nat = "A"\n'
G = 9.80665


def beam(spots: dict[str, float], held: str, *, mass: float = 0.0, lean: float = 0.0, **loads: float) -> MembersAnswer:
    """A level beam (mm) with plumb loads downward at its points [N]."""
    order = sorted(spots, key=spots.__getitem__)
    text = BEAM.format(
        points="\n".join(f"{p} = [{x}, {x * lean}]" for p, x in spots.items()),
        order="[" + ", ".join(f'"{p}"' for p in order) + "]",
        mass=mass,
        held=held,
        loads="\n".join(f'[loads.on_{p}]\nat = "{p}"\ndirection = -90\nsize = {f}' for p, f in loads.items()),
    )
    return members(parse(text))


def worst(answer: MembersAnswer) -> tuple[float, float, float]:
    """Largest shear [N] without its sign, largest moment [N m], and where the moment is [mm]."""
    found = answer.member("beam")
    assert found.shear is not None and found.bending is not None and found.bending.place is not None
    return abs(found.shear.value), found.bending.value, found.bending.place.along * 1e3


def test_case_1_simple_beam_uniform_load() -> None:
    mass, long = 30.0, 2.4
    shear, moment, where = worst(beam({"A": 0, "B": 2400}, ON_TWO, mass=mass))
    assert shear == pytest.approx(mass * G / 2)
    assert moment == pytest.approx(mass * G * long / 8)
    assert where == pytest.approx(1200)


def test_case_8_simple_beam_load_at_any_point() -> None:
    p, a, b = 900.0, 0.7, 1.3
    shear, moment, where = worst(beam({"A": 0, "P": 700, "B": 2000}, ON_TWO, P=p))
    assert shear == pytest.approx(p * b / (a + b))
    assert moment == pytest.approx(p * a * b / (a + b))
    assert where == pytest.approx(700)


def test_case_9_simple_beam_two_equal_loads_symmetrically_placed() -> None:
    p, a = 400.0, 0.5
    shear, moment, where = worst(beam({"A": 0, "P": 500, "Q": 1500, "B": 2000}, ON_TWO, P=p, Q=p))
    assert shear == pytest.approx(p)
    assert moment == pytest.approx(p * a)
    assert 500 <= where <= 1500


def test_case_11_simple_beam_two_unequal_loads() -> None:
    p1, p2, a, b, long = 300.0, 700.0, 0.4, 0.6, 2.0
    left = (p1 * (long - a) + p2 * b) / long
    right = (p1 * a + p2 * (long - b)) / long
    shear, moment, where = worst(beam({"A": 0, "P": 400, "Q": 1400, "B": 2000}, ON_TWO, P=p1, Q=p2))
    assert shear == pytest.approx(max(left, right))
    assert left > p1 and right < p2  # so that the moment is largest under P2
    assert moment == pytest.approx(right * b)
    assert where == pytest.approx(1400)


def test_case_19_cantilever_uniform_load() -> None:
    mass, long = 12.0, 1.5
    shear, moment, where = worst(beam({"A": 0, "E": 1500}, BUILT_IN, mass=mass))
    assert shear == pytest.approx(mass * G)
    assert moment == pytest.approx(-mass * G * long / 2)
    assert where == pytest.approx(0)


def test_case_21_cantilever_load_at_any_point() -> None:
    p, b = 250.0, 0.9
    shear, moment, where = worst(beam({"A": 0, "P": 900, "E": 1500}, BUILT_IN, P=p))
    assert shear == pytest.approx(p)
    assert moment == pytest.approx(-p * b)
    assert where == pytest.approx(0)


def test_case_24_overhanging_one_support_uniform_load() -> None:
    """M1 = w (l + a)^2 (l - a)^2/(8 l^2) at x = l/2 (1 - a^2/l^2); M2 = w a^2/2 at the support."""
    w, long, a = 100.0, 2.0, 0.8
    found = beam({"A": 0, "B": 2000, "E": 2800}, ON_TWO, mass=w * (long + a) / G)
    _, moment, where = worst(found)
    assert moment == pytest.approx(w * (long + a) ** 2 * (long - a) ** 2 / (8 * long**2))
    assert where == pytest.approx(1e3 * long / 2 * (1 - a**2 / long**2))
    (at,) = {float(s.bending[-1]) for s in diagram(found, "beam").stretches if s.stop == "B"}
    assert at == pytest.approx(-w * a**2 / 2)


def test_case_26_overhanging_one_support_load_at_the_end() -> None:
    p, long, a = 500.0, 1.6, 0.6
    shear, moment, where = worst(beam({"A": 0, "B": 1600, "E": 2200}, ON_TWO, E=p))
    assert shear == pytest.approx(max(p, p * a / long))
    assert moment == pytest.approx(-p * a)
    assert where == pytest.approx(1600)


def test_a_sloping_beam_under_its_own_weight() -> None:
    """Common practice (stairs, rafters): W l/8 with the level span l, shear W cos/2, thrust W sin/2 at the foot where
    the upper end only leans on a plumb force."""
    mass, rise = 20.0, 0.75
    found = beam({"A": 0, "B": 1600}, ON_TWO, mass=mass, lean=rise)
    angle = math.atan(rise)
    shear, moment, _ = worst(found)
    assert shear == pytest.approx(mass * G * math.cos(angle) / 2)
    assert moment == pytest.approx(mass * G * 1.6 / 8)
    axial = found.member("beam").axial
    assert axial is not None
    assert abs(axial.value) == pytest.approx(mass * G * math.sin(angle) / 2)
