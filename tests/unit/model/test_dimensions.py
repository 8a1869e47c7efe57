"""Named sizes: order, circles, overrides, tolerances."""

from __future__ import annotations

import math
import random

import numpy as np
import pytest

from linkcalc.faults import Faults
from linkcalc.model.dimensions import Tolerance, evaluate, tolerances
from linkcalc.model.mechanism import Dimension, Mechanism, Units
from linkcalc.model.order import ordered


def model(units: Units = Units(), **sizes: object) -> Mechanism:
    dimensions = {name: size if isinstance(size, Dimension) else Dimension(size) for name, size in sizes.items()}  # type: ignore[arg-type]
    return Mechanism(units=units, dimensions=dimensions)


def test_values_and_kinds() -> None:
    found = evaluate(model(Units(length="in"), a=2, b="3*a", lean="30 deg", pull="2 kN", part="0.5"))
    assert found["a"] == (pytest.approx(0.0508), (1, 0, 0, 0))
    assert found["b"] == (pytest.approx(0.1524), (1, 0, 0, 0))
    assert found["lean"] == (pytest.approx(math.pi / 6), (0, 0, 0, 1))
    assert found["pull"] == (pytest.approx(2000.0), (1, 1, -2, 0))
    assert found["part"] == (0.5, (0, 0, 0, 0))


def test_any_order_and_long_chains() -> None:
    """Each of 2,000 dimensions is the next plus 1 mm; shuffled, the first is 2,000 mm."""
    sizes: dict[str, object] = {f"d{i}": f"d{i + 1} + 1 mm" for i in range(1, 2000)} | {"d2000": 1}
    names = list(sizes)
    random.Random(1).shuffle(names)
    assert evaluate(model(**{name: sizes[name] for name in names}))["d1"].value == pytest.approx(2.0)


def test_order_leaves_circles_out() -> None:
    order, circles = ordered({"a": ["b"], "b": ["nobody"], "c": ["d"], "d": ["c"], "e": ["e"], "f": ["d"]})
    assert order.index("b") < order.index("a")
    assert circles == [["c", "d", "c"], ["e", "e"]]


def test_overrides_reach_what_hangs_on_them() -> None:
    copies = np.array([0.01, 0.02]).reshape(1, 2, 1)
    found = evaluate(model(a=5, b="2*a", c=7), {"a": copies})
    np.testing.assert_allclose(found["b"].value, 2 * copies)
    assert found["c"].value == pytest.approx(0.007)
    assert evaluate(model(a=5, b="2*a"), {"a": 0.03})["b"].value == pytest.approx(0.06)
    assert evaluate(model(a=5, b="2*a"), {"b": 0.03})["a"].value == pytest.approx(0.005)


@pytest.mark.parametrize(
    ("tol", "lower", "upper"),
    [(0.1, -1e-4, 1e-4), ([-0.2, 0], -2e-4, 0.0), ("0.01 cm", -1e-4, 1e-4), ((0.1, 0.3), 1e-4, 3e-4)],
)
def test_tolerances(tol: object, lower: float, upper: float) -> None:
    tol = tuple(tol) if isinstance(tol, list) else tol
    found = tolerances(model(a=Dimension(40, tol, "uniform"), b=3))  # type: ignore[arg-type]
    assert found == {"a": Tolerance(pytest.approx(lower), pytest.approx(upper), "uniform", "length")}


def test_a_bare_tolerance_is_in_the_unit_of_its_kind() -> None:
    found = tolerances(model(lean=Dimension("12 deg", 0.5), part=Dimension("0.5", 0.1)))
    assert found["lean"].upper == pytest.approx(math.radians(0.5))
    assert found["part"].upper == pytest.approx(0.1)


@pytest.mark.parametrize(
    ("sizes", "message"),
    [
        (
            {"a": "b", "b": "c + 1 mm", "c": "a"},
            "dimensions.a: hangs on itself: a -> b -> c -> a; give one of them a size",
        ),
        ({"a": "2*a"}, "dimensions.a: hangs on itself: a -> a; give one of them a size"),
        ({"link": 3, "b": "2*lnk"}, "dimensions.b: unknown name 'lnk' in '2*lnk'; did you mean 'link'?"),
        ({"a b": 3}, "dimensions.a b: 'a b' cannot stand in a formula; a name of letters, digits and _ is wanted"),
        ({"sin": 3}, "dimensions.sin: 'sin' has a meaning in formulas already; another name is wanted"),
        ({"pi": 3}, "dimensions.pi: 'pi' has a meaning in formulas already; another name is wanted"),
        ({"a": math.nan}, "dimensions.a: nan is no number; a length is wanted (e.g. 12 mm)"),
        ({"a": "1/0", "b": "a"}, "dimensions.a: division by zero in '1/0'"),
        (
            {"a": Dimension(3, (0.2, -0.1))},
            "dimensions.a.tol: the lower limit is above the upper one; plus and minus: 0.05, "
            "or the lower departure first: [-0.1, 0.05]",
        ),
        ({"a": Dimension(3, -0.2)}, "dimensions.a.tol: the lower limit is above the upper one; plus and minus: 0.05, "
            "or the lower departure first: [-0.1, 0.05]"),
        ({"a": Dimension(3, "2 deg")}, "dimensions.a.tol: 2 deg is an angle; a length is wanted (e.g. 12 mm)"),
        (
            {"a": Dimension("3 mm^5", 1)},
            "dimensions.a.tol: the dimension is a length^5; only sizes of a usual kind carry a tolerance",
        ),
    ],
)  # fmt: skip
def test_what_is_wrong(sizes: dict[str, object], message: str) -> None:
    mechanism = model(**sizes)
    with pytest.raises(Faults) as raised:
        evaluate(mechanism)
        tolerances(mechanism)
    assert str(raised.value) == message


def test_an_override_of_nothing() -> None:
    with pytest.raises(Faults) as raised:
        evaluate(model(link=3), {"lnk": 0.1})
    assert str(raised.value) == "dimensions.lnk: unknown dimension 'lnk'; did you mean 'link'?"
