"""Formulas: their values, their dimensions, what they refuse, and floats against arrays of copies."""

from __future__ import annotations

import math
from fractions import Fraction

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from linkcalc.faults import Faults
from linkcalc.model import units as u
from linkcalc.model.formulas import evaluate, to_si
from linkcalc.model.functions import FUNCTIONS, Quantity
from linkcalc.model.mechanism import Units

LENGTH, ANGLE, MOMENT = u.KINDS["length"], u.KINDS["angle"], u.KINDS["moment"]
NAMES = {
    "link": Quantity(0.04, LENGTH),
    "lean": Quantity(0.2, ANGLE),
    "m": Quantity(2.0, LENGTH),
    "länge": Quantity(0.1, LENGTH),
    "n": Quantity(3.0, u.NUMBER),
}


@pytest.mark.parametrize(
    ("text", "value", "dims"),
    [
        ("3*link", 0.12, LENGTH),
        ("lean + 90 deg", 0.2 + math.pi / 2, ANGLE),
        ("hypot(30 mm, link)", 0.05, LENGTH),
        ("hypot(1, 2, 2)", 3.0, u.NUMBER),
        ("3/8 in", 0.009525, LENGTH),
        ("1 3/8 in", 0.034925, LENGTH),
        ("1 3/8", 1.375, u.NUMBER),
        ("2*3/8 in", 0.01905, LENGTH),
        ("45 lbf", 200.1699727, u.KINDS["force"]),
        ("12 N m", 12.0, MOMENT),
        ("(12 N)*m", 24.0, MOMENT),
        ("12 m", 12.0, LENGTH),
        ("link-5 mm", 0.035, LENGTH),
        ("2 mm-link", -0.038, LENGTH),
        ("100 N/2 mm", 50_000.0, u.KINDS["stiffness"]),
        ("2^3^2", 512.0, u.NUMBER),
        ("-2^2", -4.0, u.NUMBER),
        ("2**-1", 0.5, u.NUMBER),
        ("--n", 3.0, u.NUMBER),
        ("link^0.5*link^(1/2)", 0.04, LENGTH),
        ("sqrt(link^2)", 0.04, LENGTH),
        ("sqrt(link)", 0.2, (Fraction(1, 2), 0, 0, 0)),
        ("sin(30 deg)", 0.5, u.NUMBER),
        ("atan2(link, link)", math.pi / 4, ANGLE),
        ("acos(0)", math.pi / 2, ANGLE),
        ("min(n, 2, 5) + max(1, 2)", 4.0, u.NUMBER),
        ("abs(-link)", 0.04, LENGTH),
        ("2*pi*1 rad", 2 * math.pi, ANGLE),
        ("30°", math.pi / 6, ANGLE),
        ('3/8"', 0.009525, LENGTH),
        ("1e3 mm", 1.0, LENGTH),
        (".5 mm", 0.0005, LENGTH),
        ("2·länge", 0.2, LENGTH),
        ("9.81 m/s^2", 9.81, u.KINDS["acceleration"]),
        ("3 mm2", 3e-6, (2, 0, 0, 0)),
    ],
)
def test_values(text: str, value: float, dims: u.Dims) -> None:
    found = evaluate(text, NAMES)
    assert found.value == pytest.approx(value, rel=1e-9)
    assert isinstance(found.value, float)
    assert found.dims == dims


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("", "an empty text; a number with a unit or a formula is wanted"),
        ("link + 5", "a plain number cannot be added to a length in 'link + 5'; a number needs its unit, e.g. 12 mm"),
        ("link - 5", "a plain number cannot be taken from a length in 'link - 5'; a number needs its unit, e.g. 12 mm"),
        ("link + lean", "an angle cannot be added to a length in 'link + lean'; both must be of one kind"),
        ("sin(30)", "sin is given a plain number in 'sin(30)'; an angle is wanted, e.g. sin(30 deg)"),
        ("asin(link)", "asin is given a length in 'asin(link)'; a plain number is wanted"),
        ("hypot(link, n)", "hypot is given a plain number in 'hypot(link, n)'; a length is wanted"),
        ("hypot(link)", "hypot is given 1 in 'hypot(link)'; it takes 2 or more"),
        ("sqrt(1, 2)", "sqrt is given 2 in 'sqrt(1, 2)'; it takes 1"),
        ("lnk", "unknown name 'lnk' in 'lnk'; did you mean 'link'?"),
        ("mm", "unknown name 'mm' in 'mm'; a unit follows a number: 1 mm"),
        ("sin", "unknown name 'sin' in 'sin'; a function has brackets: sin(...)"),
        ("sine(2 deg)", "unknown function 'sine' in 'sine(2 deg)'; did you mean 'sin' or 'asin'?"),
        ("5 inn", "unknown unit 'inn'; did you mean 'in' or 'min'?"),
        ("3 link", "'link' cannot stand there in '3 link'; put a sign between '3' and 'link'"),
        ("2 mm 3", "'3' cannot stand there in '2 mm 3'; put a sign between '2 mm' and '3'"),
        ("3,5 mm", "',' cannot stand there in '3,5 mm'; write a decimal point, not a comma"),
        ("12 kg*", "the formula is not finished in '12 kg*'"),
        ("sin(30 deg", "the formula is not finished in 'sin(30 deg'"),
        ("(link", "the formula is not finished in '(link'"),
        ("link)", "')' cannot stand there in 'link)'"),
        ("link.real", "'.' cannot stand in 'link.real'; a number with a unit or a formula is wanted"),
        ("link[0]", "'[' cannot stand in 'link[0]'; a number with a unit or a formula is wanted"),
        ("a/3/8 in", "'a/3/8 in' can be read in two ways; write (3/8 ...) in brackets"),
        (
            "12 N*m",
            "'m' is a unit as well as a dimension of this model in '12 N*m'; for the unit leave out the sign '*' "
            "before it, for the dimension put the quantity in brackets: (12 N)*m",
        ),
        ("1/0", "division by zero in '1/0'"),
        ("3/0 in", "division by zero"),
        ("sqrt(-1)", "'sqrt(-1)' has no finite value"),
        ("acos(1.1)", "'acos(1.1)' has no finite value"),
        ("(-8)^(1/3)", "'(-8)^(1/3)' has no finite value"),
        ("1e999", "'1e999' has no finite value"),
        ("1e308*10", "'1e308*10' has no finite value"),
        ("9**9**9", "too large a power in '9**9**9'; powers go up to 100"),
        ("2^link", "a length cannot be a power in '2^link'; a plain number is wanted"),
        ("(" * 50 + "1" + ")" * 50, "brackets or signs stand too deep in one another; at most 40 deep"),
        ("^".join(["1"] * 60), "brackets or signs stand too deep in one another; at most 40 deep"),
        ("1+" * 50_000 + "1", "a formula of 100001 characters; at most 500 are read"),
    ],
)
def test_what_is_refused(text: str, message: str) -> None:
    with pytest.raises(Faults) as raised:
        evaluate(text, NAMES)
    assert str(raised.value) == message


@pytest.mark.parametrize("text", ["__import__", "open", "eval", "np", "self", "__class__"])
def test_nothing_but_arithmetic_can_be_reached(text: str) -> None:
    with pytest.raises(Faults, match=r"unknown (name|function|unit)"):
        evaluate(text)
    with pytest.raises(Faults, match="unknown function"):
        evaluate(f"{text}(1)")


@pytest.mark.parametrize(
    ("size", "kind", "units", "value"),
    [
        (40, "length", Units(), 0.04),
        (40, "length", Units(length="in"), 1.016),
        (-90, "angle", Units(), -math.pi / 2),
        ("0.5", "number", Units(), 0.5),
        (0.5, "number", Units(), 0.5),
        ("2*link", "length", Units(length="in"), 0.08),
        (12, "moment", Units(moment="lbf*ft"), 12 * 0.3048 * 4.4482216152605),
    ],
)
def test_sizes_in_si(size: float | str, kind: str, units: Units, value: float) -> None:
    assert to_si(size, kind, units, NAMES) == pytest.approx(value, rel=1e-12)


@pytest.mark.parametrize(
    ("size", "message"),
    [
        ("12 kg", "12 kg is a mass; a length is wanted (e.g. 12 mm)"),
        ("link*link", "link*link is an area; a length is wanted (e.g. 12 mm)"),
        ("40", "40 is a plain number; a length is wanted (e.g. 12 mm, or 40 without quotes)"),
        ("n", "n is a plain number; a length is wanted (e.g. 12 mm)"),
        (True, "True is no size; a length is wanted (e.g. 12 mm)"),
        (None, "None is no size; a length is wanted (e.g. 12 mm)"),
        (math.nan, "nan is no number; a length is wanted (e.g. 12 mm)"),
        (-math.inf, "-inf is no number; a length is wanted (e.g. 12 mm)"),
        pytest.param(10**5000, "a number beyond all measure; a length is wanted (e.g. 12 mm)", id="long"),
        ("1e40 m", "1e40 m is beyond all measure; a length is wanted (e.g. 12 mm)"),
    ],
)
def test_sizes_that_are_none(size: object, message: str) -> None:
    with pytest.raises(Faults) as raised:
        to_si(size, "length", Units(), NAMES)  # type: ignore[arg-type]
    assert str(raised.value) == message


FORMULAS = st.recursive(
    st.sampled_from(["a", "b", "2.5", "1/4", "pi"]),
    lambda inner: st.one_of(
        st.tuples(inner, st.sampled_from("+-*/"), inner).map(lambda t: f"({t[0]}){t[1]}({t[2]})"),
        st.tuples(inner, st.integers(-3, 3)).map(lambda t: f"({t[0]})^{t[1]}"),
        inner.map(lambda t: f"sin(({t})*1 rad)"),
        inner.map(lambda t: f"sqrt({t})"),
        inner.map(lambda t: f"-({t})"),
        st.tuples(inner, inner).map(lambda t: f"hypot({t[0]}, {t[1]})"),
        st.tuples(inner, inner).map(lambda t: f"min({t[0]}, {t[1]})"),
        inner.map(lambda t: f"atan({t})/(1 rad)"),
    ),
    max_leaves=5,
)
COPIES = st.lists(st.floats(-3, 3, allow_subnormal=False), min_size=2, max_size=2)


@settings(max_examples=200, deadline=None)
@given(FORMULAS, st.lists(COPIES, min_size=1, max_size=6))
def test_copies_come_out_as_each_by_itself(text: str, copies: list[list[float]]) -> None:
    """An array of copies gives what each copy gives alone; a copy that has no value alone is NaN among the others."""
    alone = []
    for one in copies:
        try:
            alone.append(evaluate(text, dict(zip("ab", (Quantity(v, u.NUMBER) for v in one), strict=True))).value)
        except Faults:
            alone.append(math.nan)
    arrays = np.array(copies).T.reshape(2, 1, -1, 1)
    if np.all(np.isnan(alone)):
        return
    together = evaluate(text, dict(zip("ab", (Quantity(v, u.NUMBER) for v in arrays), strict=True))).value
    np.testing.assert_allclose(np.broadcast_to(together, (1, len(copies), 1)).ravel(), alone, rtol=1e-12, atol=1e-12)


def test_copies_without_any_value_are_a_fault() -> None:
    with pytest.raises(Faults, match="'sqrt\\(k\\)' has no finite value"):
        evaluate("sqrt(k)", {"k": Quantity(np.full((1, 3, 1), -1.0), u.NUMBER)})


@settings(max_examples=60, deadline=None)
@given(st.floats(-1e4, 1e4), st.sampled_from(["mm", "cm", "m", "in", "ft", "thou", "yd"]))
def test_the_unit_of_the_file_does_not_change_the_size(value: float, unit: str) -> None:
    """A bare number in the file's unit, the quantity written out, and the same told in another unit are one size."""
    metres = to_si(value, "length", Units(length=unit))
    assert to_si(f"{value!r} {unit}", "length", Units(length="ft")) == pytest.approx(metres, rel=1e-15)
    assert float(u.from_si(metres, "length", Units(length=unit))) == pytest.approx(value, rel=1e-15)


def test_every_function_is_documented() -> None:
    """The model file page names the functions; a new one must be told there."""
    from pathlib import Path

    page = (Path(__file__).parents[3] / "docs" / "model_file.md").read_text(encoding="utf-8")
    line = page.partition("the functions `")[2].partition("`")[0].split()
    assert sorted(line) == sorted(FUNCTIONS)
