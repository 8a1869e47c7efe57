"""Equilibrium in letters against closed forms and against the plain script at sizes of no symmetry."""

from __future__ import annotations

from math import asin, cos, sin

import numpy as np
import pytest
import sympy as sp

from tests.reference import plain, symbolic
from tests.reference.linkage import Force, Linkage, Slide, Slot, Turn


def test_a_straight_lever() -> None:
    """Moments about the fulcrum: effort = load x arm / arm, and the fulcrum carries both."""
    near, far, load, effort = sp.symbols("near far load effort", positive=True)
    fulcrum = symbolic.pin("O", "bar", "ground", (0, 0))
    pushes = [symbolic.Push("bar", (-far, 0), (0, -effort)), symbolic.Push("bar", (near, 0), (0, -load))]
    answer = symbolic.solve([fulcrum], pushes, [effort])
    assert sp.simplify(answer[effort] - load * near / far) == 0
    assert sp.simplify(answer[sp.Symbol("O_y")] - load * (1 + near / far)) == 0


def test_a_built_in_bar() -> None:
    length, load = sp.symbols("length load", positive=True)
    answer = symbolic.solve(
        [symbolic.weld("root", "bar", "ground", (0, 0))], [symbolic.Push("bar", (length, 0), (0, -load), couple=3)]
    )
    assert answer == {sp.Symbol("root_x"): 0, sp.Symbol("root_y"): load, sp.Symbol("root_m"): load * length - 3}


def test_the_symmetric_toggle_multiplies_by_one_over_twice_the_tangent() -> None:
    answer, (_, _, p, q, load) = symbolic.toggle()
    effort = answer[sp.Symbol("effort", real=True)]
    assert sp.simplify((load / effort).subs(q, p) - 1 / (2 * sp.tan(p))) == 0


def test_a_lopsided_toggle_is_what_the_plain_script_finds() -> None:
    r, s, load, p = 0.21, 0.34, 750.0, 0.31
    q = asin(r * sin(p) / s)
    drawn = Linkage(
        {"A": (0.0, 0.0), "B": (r * cos(p), r * sin(p)), "C": (r * cos(p) + s * cos(q), 0.0)},
        {"ground": ("A",), "first": ("A", "B"), "second": ("B", "C"), "block": ("C",)},
        slides=(Slide("block", "C", (1.0, 0.0)),),
        loads=(Force("block", "C", -load, 0.0),),
        effort=Force("first", "B", 0.0, -1.0),
        drive=Turn("first"),
    )
    other = plain.solve(drawn, [p])
    answer = symbolic.numeric(*symbolic.toggle())(r, s, p, q, load)
    assert answer["effort"] == pytest.approx(other.effort[0], rel=1e-12)
    assert answer["guide_n"] == pytest.approx(other.forces["C", "block", "ground"][0, 1], rel=1e-12)
    for name, body in {"A": "first", "B": "first", "C": "second"}.items():
        felt = [answer[f"{name}_x"], answer[f"{name}_y"], 0.0]
        np.testing.assert_allclose(other.force(name, body)[0], felt, atol=1e-9)


def test_a_trestle_is_what_the_plain_script_finds() -> None:
    """By hand: its foot rolls, so A and E share the load as on a beam; the tie takes the moment about the top."""
    span, height, part, load = 1.4, 0.9, 0.3, 480.0
    answer = symbolic.numeric(*symbolic.trestle())(span, height, part, load)
    assert answer["E_n"] == pytest.approx(load * part / 2, rel=1e-12)
    assert answer["D_x"] == pytest.approx(load * part * span / (2 * height), rel=1e-12)
    left, right = {"A": (0.0, 0.0), "B": (span / 4, height / 2)}, {"E": (span, 0.0), "D": (3 * span / 4, height / 2)}
    drawn = Linkage(
        left | right | {"C": (span / 2, height), "W": (part * span / 2, part * height)},
        {"ground": ("A",), "left": ("A", "W", "B", "C"), "right": ("E", "D", "C"), "tie": ("B", "D")},
        slots=(Slot("right", "E", (1.0, 0.0)),),
        loads=(Force("left", "W", 0.0, -load),),
    )
    other = plain.solve(drawn)
    for name, body in {"A": "left", "C": "left", "B": "tie", "D": "tie"}.items():
        felt = [answer[f"{name}_x"], answer[f"{name}_y"], 0.0]
        np.testing.assert_allclose(other.force(name, body)[0], felt, atol=1e-9)


def test_too_many_supports_are_refused() -> None:
    supports = [symbolic.pin(name, "bar", "ground", (x, 0)) for name, x in (("A", 0), ("B", 1))]
    with pytest.raises(ValueError, match="3 equations for 4 unknowns"):
        symbolic.solve(supports, [])
