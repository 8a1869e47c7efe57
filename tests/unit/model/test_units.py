"""Units: the quick table against the pint library, spellings, kinds, and numbers for people."""

from __future__ import annotations

import json
import math
import subprocess
import sys
from pathlib import Path

import pint
import pytest

from linkcalc.faults import Faults
from linkcalc.model import units as u
from linkcalc.model.mechanism import Units

REGISTRY = pint.UnitRegistry()
QUICK = json.loads((Path(u.__file__).with_name("units.json")).read_text(encoding="utf-8"))
SPELT_OUT = {
    "Nm": "N*m", "Nmm": "N*mm", "kNm": "kN*m", "daNm": "daN*m", "kp": "kgf", "lbm": "lb", "rev": "turn",
    "tf": "t*g_0", "gn": "g_0", "inlbf": "in*lbf", "ftlbf": "ft*lbf",
}  # fmt: skip
PRODUCTS = [
    "N*m", "N*mm", "kN*m", "kgf*m", "kgf*cm", "lbf*in", "lbf*ft", "ozf*in", "N/mm", "N/m", "kN/m", "kN/mm",
    "lbf/in", "lbf/ft",
    "kgf/mm", "m/s^2", "mm/s^2", "ft/s^2", "in/s^2", "N/mm^2", "N/m^2", "lbf/in^2",
    "kgf/cm^2", "kg/m", "kg*m^2", "N*m/deg", "N*m/rad", "mm^2", "in^3",
]  # fmt: skip


def by_pint(text: str) -> tuple[float, tuple[float, ...]]:
    base = REGISTRY.Quantity(1.0, text).to_base_units()
    powers = {str(axis): power for axis, power in base.unit_items()}
    return base.magnitude, tuple(powers.get(axis, 0) for axis in ("meter", "kilogram", "second", "radian"))


@pytest.mark.parametrize("word", QUICK)
def test_a_word_of_the_table_is_what_pint_says(word: str) -> None:
    factor, powers = by_pint(SPELT_OUT.get(word, word))
    assert QUICK[word][0] == pytest.approx(factor, rel=1e-15)
    assert tuple(QUICK[word][1]) == powers


@pytest.mark.parametrize("text", PRODUCTS)
def test_a_product_is_what_pint_says(text: str) -> None:
    factor, powers = by_pint(text)
    found = u.unit(text)
    assert found.factor == pytest.approx(factor, rel=1e-15)
    assert found.dims == powers


def test_the_table_is_as_generated() -> None:
    assert {word: (factor, tuple(dims)) for word, (factor, dims) in QUICK.items()} == u.table()


def test_what_the_table_covers() -> None:
    asked = {
        "mm", "cm", "m", "in", "ft", "N", "kN", "lbf", "kgf", "MPa", "bar", "psi", "ksi", "kg",
        "g", "t", "lb", "oz", "deg", "rad", "turn", "Nm", "Nmm", "kip", "GPa", "slug", "ozf", "daN", "thou",
    }  # fmt: skip
    assert asked <= set(QUICK)


@pytest.mark.parametrize(
    ("text", "factor"),
    # exact by definition: NIST SP 811 (2008), appendix B.8
    [("in", 0.0254), ("ft", 0.3048), ("lb", 0.45359237), ("lbf", 0.45359237 * 9.80665), ("kgf", 9.80665)],
)
def test_factors_by_definition(text: str, factor: float) -> None:
    assert u.unit(text).factor == pytest.approx(factor, rel=1e-15)


@pytest.mark.parametrize(
    ("spelt", "plain"),
    [
        ("Nm", "N*m"), ("N m", "N*m"), ("N.m", "N*m"), ("N·m", "N*m"), ("in-lbf", "in*lbf"), ("lbf-in", "in*lbf"),
        ("ft lbf", "ft*lbf"), ("inlbf", "in*lbf"), ("°", "deg"), ("degrees", "deg"), ('"', "in"), ("'", "ft"),
        ("m/s²", "m/s^2"), ("m/s**2", "m/s^2"), ("m/s2", "m/s^2"), ("m s^-2", "m/s^2"), (" kg ", "kg"), ("µm", "um"),
        ("N/mm²", "MPa"), ("inch", "in"), ("lbs", "lb"), ("rev", "turn"),
    ],
)  # fmt: skip
def test_spellings(spelt: str, plain: str) -> None:
    assert u.unit(spelt).factor == pytest.approx(u.unit(plain).factor, rel=1e-15)
    assert u.unit(spelt).dims == u.unit(plain).dims


def test_a_unit_that_only_pint_knows() -> None:
    assert "furlong" not in QUICK
    assert u.unit("furlong").factor == pytest.approx(by_pint("furlong")[0], rel=1e-15)


@pytest.mark.parametrize(
    ("text", "kind", "message"),
    [
        ("inn", "length", "unknown unit 'inn'; did you mean 'in' or 'min'?"),
        ("zorg", "force", "unknown unit 'zorg'; e.g. N, kN, MN"),
        ("degC", "length", "unknown unit 'degC'; did you mean 'deg' or 'degree'?"),
        ("kg", "force", "'kg' is a unit of mass; a unit of force is wanted, e.g. N, kN, MN"),
        ("rad", "number", "'rad' is a unit of angle; a unit of number is wanted, e.g. "),
        ("mm^99", "length", "'mm^99' is not a unit; powers go up to 9"),
        ("N*", "moment", "'N*' is not a unit; a unit is wanted, e.g. mm, N*m or m/s^2"),
        ("9**9**9", "length", "'9**9**9' is not a unit; a unit is wanted, e.g. mm, N*m or m/s^2"),
        ("mm$", "length", "'mm$' is not a unit; a unit is wanted, e.g. mm, N*m or m/s^2"),
        ("x" * 41, "length", f"unknown unit '{'x' * 41}'; e.g. mm, cm, m"),
    ],
)
def test_what_is_no_unit(text: str, kind: str, message: str) -> None:
    with pytest.raises(Faults) as raised:
        u.unit(text, kind)
    assert str(raised.value) == message


@pytest.mark.parametrize(
    ("value", "kind", "units", "text"),
    [
        (0.0123456, "length", Units(), "12.35 mm"),
        (1234.5678, "force", Units(force="kN"), "1.235 kN"),
        (1234567.0, "force", Units(), "1234567 N"),
        (-0.5, "moment", Units(moment="N*mm"), "-500 N mm"),
        (math.pi / 2, "angle", Units(), "90 deg"),
        (0.0, "length", Units(length="in"), "0 in"),
        (-1e-30, "length", Units(), "0 mm"),
        (2.5, "number", Units(), "2.5"),
        (math.nan, "force", Units(), "no value"),
        (math.inf, "force", Units(), "no value"),
    ],
)
def test_numbers_for_people(value: float, kind: str, units: Units, text: str) -> None:
    assert u.show(value, kind, units) == text


def test_a_usual_model_is_read_without_the_slow_libraries() -> None:
    code = (
        "import sys; from linkcalc.model.read import parse\n"
        'parse(\'[units]\\nlength = "in"\\nforce = "lbf"\\n[points]\\nA = [0, 0]\\nB = ["3 ft", "2*4 in"]\\n'
        '[members]\\nground = ["A"]\\nbar = ["A", "B"]\\n[load]\\nat = "B"\\ndirection = -90\\nsize = "2 kN"\')\n'
        "print([m for m in ('pint', 'scipy', 'matplotlib') if m in sys.modules])"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "[]"
