"""Equilibrium in letters: the equations of every body written down with `sympy` and solved once for all sizes.

Everything is plain data with sympy expressions: places and directions may hold any symbols, and so may the loads.
What is unknown is one symbol for each part of a joint, and whatever else the caller names (an effort in a load).
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass

import sympy as sp

Pair = tuple[sp.Expr | float, sp.Expr | float]


@dataclass(frozen=True)
class Joint:
    """What body a feels from body b at a place: a sum of unknown symbols, each along its own direction.

    carries  symbol -> (x, y, couple) for one unit of it; see `pin`, `guide`, `couple`
    """

    a: str
    b: str
    at: Pair
    carries: Mapping[sp.Symbol, tuple[sp.Expr | float, sp.Expr | float, sp.Expr | float]]


@dataclass(frozen=True)
class Push:
    """A force and a couple on a body."""

    body: str
    at: Pair = (0, 0)
    force: Pair = (0, 0)
    couple: sp.Expr | float = 0


def pin(name: str, a: str, b: str, at: Pair) -> Joint:
    """Unknown `name_x`, `name_y`."""
    return Joint(a, b, at, {sp.Symbol(f"{name}_x"): (1, 0, 0), sp.Symbol(f"{name}_y"): (0, 1, 0)})


def slot(name: str, a: str, b: str, at: Pair, along: Pair) -> Joint:
    """Unknown `name_n`, a quarter turn counter-clockwise from the unit direction of the line."""
    return Joint(a, b, at, {sp.Symbol(f"{name}_n"): (-along[1], along[0], 0)})


def slide(name: str, a: str, b: str, at: Pair, along: Pair) -> Joint:
    """Unknown `name_n` as of a slot, and the couple `name_m`."""
    return Joint(a, b, at, {**slot(name, a, b, at, along).carries, sp.Symbol(f"{name}_m"): (0, 0, 1)})


def weld(name: str, a: str, b: str, at: Pair) -> Joint:
    """Unknown `name_x`, `name_y` and the couple `name_m`."""
    return Joint(a, b, at, {**pin(name, a, b, at).carries, sp.Symbol(f"{name}_m"): (0, 0, 1)})


def equations(joints: Iterable[Joint], pushes: Iterable[Push]) -> list[sp.Expr]:
    """Sums of x, of y and of moments about the origin, of every body but "ground": each is nothing."""
    sums: dict[str, list[sp.Expr]] = {}

    def add(body: str, at: Pair, fx: sp.Expr, fy: sp.Expr, couple: sp.Expr) -> None:
        total = sums.setdefault(body, [sp.Integer(0)] * 3)
        total[0] += fx
        total[1] += fy
        total[2] += at[0] * fy - at[1] * fx + couple

    for joint in joints:
        for size, (x, y, couple) in joint.carries.items():
            add(joint.a, joint.at, size * x, size * y, size * couple)
            add(joint.b, joint.at, -size * x, -size * y, -size * couple)
    for push in pushes:
        add(push.body, push.at, *push.force, push.couple)
    return [each for body, total in sums.items() if body != "ground" for each in total]


def solve(
    joints: Sequence[Joint], pushes: Sequence[Push], unknown: Sequence[sp.Symbol] = ()
) -> dict[sp.Symbol, sp.Expr]:
    """Every part of every joint, and the further unknowns, as expressions in what is given."""
    wanted = [*(size for joint in joints for size in joint.carries), *unknown]
    matrix, right = sp.linear_eq_to_matrix(equations(joints, pushes), wanted)
    if matrix.rows != matrix.cols:
        raise ValueError(f"{matrix.rows} equations for {matrix.cols} unknowns")
    (answer,) = sp.linsolve((matrix, right), wanted)
    return {symbol: sp.simplify(value) for symbol, value in zip(wanted, answer, strict=True)}


def numeric(answer: Mapping[sp.Symbol, sp.Expr], given: Sequence[sp.Symbol]) -> Callable[..., dict[str, float]]:
    """The answer as a function of numbers or arrays for the given symbols, in their order: name -> value."""
    evaluate = sp.lambdify(list(given), list(answer.values()), "numpy")
    names = [symbol.name for symbol in answer]
    return lambda *values: dict(zip(names, evaluate(*values), strict=True))


def toggle() -> tuple[dict[sp.Symbol, sp.Expr], list[sp.Symbol]]:
    """Two links and a block: ground pin A, knee B, wrist C; the block slides along x and is pressed back by `load`.

    The links have any lengths, drawn at angles p and q above the x axis. The knee is pressed by `effort`, downwards;
    it acts on the first link. -> the answer, and the symbols it is given in: r, s, p, q, load
    """
    r, s, p, q, load, effort = given = sp.symbols("r s p q load effort", real=True)
    b = (r * sp.cos(p), r * sp.sin(p))
    c = (b[0] + s * sp.cos(q), b[1] - s * sp.sin(q))
    joints = [
        pin("A", "first", "ground", (0, 0)),
        pin("B", "first", "second", b),
        pin("C", "second", "block", c),
        slide("guide", "block", "ground", c, (1, 0)),
    ]
    pushes = [Push("first", b, (0, -effort)), Push("block", c, (-load, 0))]
    return solve(joints, pushes, [effort]), list(given[:5])


def trestle() -> tuple[dict[sp.Symbol, sp.Expr], list[sp.Symbol]]:
    """A frame of three members: two legs pinned at the top and held together by a tie halfway; the right foot rolls.

    Feet A and E are a span apart, the top C is in the middle at a height. A load hangs on the left leg, part of the
    way up. -> the answer, and the symbols it is given in: span, height, part, load
    """
    span, height, part, load = given = sp.symbols("span height part load", positive=True)
    top, half = (span / 2, height), sp.Rational(1, 2)
    left, right = (span / 4, height * half), (3 * span / 4, height * half)
    joints = [
        pin("A", "left", "ground", (0, 0)),
        slot("E", "right", "ground", (span, 0), (1, 0)),
        pin("C", "left", "right", top),
        pin("B", "tie", "left", left),
        pin("D", "tie", "right", right),
    ]
    return solve(joints, [Push("left", (part * top[0], part * top[1]), (0, -load))]), list(given)
