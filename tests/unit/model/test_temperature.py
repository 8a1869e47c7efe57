"""Temperatures against the pint library, and what is none."""

from __future__ import annotations

import pint
import pytest

from linkcalc.faults import Faults
from linkcalc.model.formulas import to_si
from linkcalc.model.mechanism import Units

REGISTRY = pint.UnitRegistry()


@pytest.mark.parametrize(
    ("text", "number", "scale"),
    [("20 degC", 20, "degC"), ("-40degF", -40, "degF"), ("300 K", 300, "kelvin"), ("+68.5 °F", 68.5, "degF")],
)
def test_a_temperature_is_what_pint_says(text: str, number: float, scale: str) -> None:
    wanted = REGISTRY.Quantity(number, scale).to("kelvin").magnitude
    assert to_si(text, "temperature", Units()) == pytest.approx(wanted, rel=1e-14)


@pytest.mark.parametrize("scale", ["degC", "degF", "K"])
def test_a_bare_number_is_on_the_scale_of_the_file(scale: str) -> None:
    wanted = REGISTRY.Quantity(40, {"K": "kelvin"}.get(scale, scale)).to("kelvin").magnitude
    assert to_si(40, "temperature", Units(temperature=scale)) == pytest.approx(wanted, rel=1e-14)


@pytest.mark.parametrize(
    ("text", "what"),
    [
        ("20 mm", "'20 mm' is no temperature"),
        ("10 degC + 10 degC", "'10 degC + 10 degC' is no temperature"),
        ("warm", "'warm' is no temperature"),
        ("-300 degC", "-300 degC is at or below absolute zero"),
        ("0 K", "0 K is at or below absolute zero"),
        ("1e9 K", "1e+09 K is no temperature that a machine could have"),
    ],
)
def test_what_is_no_temperature(text: str, what: str) -> None:
    with pytest.raises(Faults) as raised:
        to_si(text, "temperature", Units())
    assert str(raised.value) == f"{what}; a number with its scale is wanted: degC, degF or K (e.g. 20 degC)"
