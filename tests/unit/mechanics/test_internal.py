"""Laws of inner forces, on random bodies under random loads in balance."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from linkcalc.mechanics.acts import Act
from linkcalc.mechanics.body import Body
from linkcalc.mechanics.internal import Pieces, fibre_stress, largest, pieces, unbalance
from linkcalc.parts.contract import Spread
from linkcalc.parts.pose import Site

ONE = (1, 1, 1)
SAME = 1e-9
"""Of the largest: sums of a few numbers of like size."""

sizes = st.floats(-1.0, 1.0)
places = st.tuples(sizes, sizes)


@dataclass(frozen=True)
class Loaded:
    """A body, and acts on it that are in balance."""

    body: Body
    acts: list[Act]

    @property
    def pieces(self) -> Pieces:
        return pieces(self.body, self.acts, ONE)


def chain(nodes: list[tuple[float, float]], parents: list[int]) -> Body:
    """A tree: node k + 1 hangs on node parents[k]."""
    count = len(nodes)
    names = tuple(f"n{k}" for k in range(count))
    # an edge comes after the one that leads to it
    return Body(names, np.array(nodes), tuple(parents), tuple(range(1, count)), (False,) * (count - 1), False, 1e-9)


def apart(body: Body) -> bool:
    """True if no node lies on an edge that it is no end of: a body has each of its places once."""
    for edge, ends in enumerate(zip(body.starts, body.stops, strict=True)):
        for node, at in enumerate(body.nodes):
            arm = at - body.nodes[ends[0]]
            way = float(np.clip(arm @ body.along[edge], 0.0, body.long[edge]))
            if node not in ends and np.hypot(*(arm - way * body.along[edge])) < 1e-3:
                return False
    return True


def act(place: np.ndarray, force: tuple[float, float], moment: float, spread: Spread | None = None) -> Act:
    values = [np.full(ONE, v) for v in (*place, *force, moment)]
    return Act("act", "force", *values, False, spread)


@st.composite
def loaded(draw: st.DrawFn) -> Loaded:
    """A bent or branched body with point loads, couples and a load spread along it, held at its first node."""
    count = draw(st.integers(2, 5))
    nodes = [draw(places) for _ in range(count)]
    parents = [draw(st.integers(0, k)) for k in range(count - 1)]
    body = chain(nodes, parents)
    assume(len(body.long) and body.long.min() > 0.1 and apart(body))
    acts = []
    for _ in range(draw(st.integers(1, 4))):
        edge, part = draw(st.integers(0, count - 2)), draw(st.sampled_from([0.0, 0.25, 0.6, 1.0]))
        at = body.nodes[body.starts[edge]] + part * body.long[edge] * body.along[edge]
        acts.append(act(at, draw(places), draw(st.sampled_from([0.0, 0.3, -0.7]))))
    if draw(st.booleans()):
        edge = draw(st.integers(0, count - 2))
        ends = [Site(1, *(float(v) for v in body.nodes[k])) for k in (body.starts[edge], body.stops[edge])]
        low = draw(st.floats(0.0, 2.0))
        middle = (body.nodes[body.starts[edge]] + body.nodes[body.stops[edge]]) / 2
        # a load that rises evenly from a to b has its resultant L (b - a)/(6 (a + b)) beyond the middle
        off = body.long[edge] * ((2.0 - low) - low) / 12
        acts.append(act(middle + off * body.along[edge], draw(places), 0.0,
                        Spread(((ends[0], ends[1]),), (low, 2.0 - low))))  # fmt: skip
    force = np.array([[float(a.fu[0, 0, 0]), float(a.fv[0, 0, 0])] for a in acts])
    place = np.array([[float(a.u[0, 0, 0]), float(a.v[0, 0, 0])] for a in acts]) - body.nodes[0]
    turning = sum(float(a.moment[0, 0, 0]) for a in acts) + float(
        (place[:, 0] * force[:, 1] - place[:, 1] * force[:, 0]).sum()
    )
    held = -force.sum(axis=0)
    acts.append(act(body.nodes[0], (float(held[0]), float(held[1])), -turning))
    return Loaded(body, acts)


def at(power: np.ndarray, x: float) -> float:
    return float(np.polynomial.polynomial.polyval(x, power))


@given(loaded())
def test_every_piece_keeps_the_law_of_slopes(case: Loaded) -> None:
    """The slope of M is V, by differences."""
    found = case.pieces
    for k in range(len(found.edge)):
        long = float(found.long[k, 0, 0, 0])
        if long <= 0:
            continue
        x, step = 0.4 * long, 1e-4 * long
        m = found.bending[:, k, 0, 0, 0]
        slope = (at(m, x + step) - at(m, x - step)) / (2 * step)
        assert slope == pytest.approx(at(found.shear[:, k, 0, 0, 0], x), abs=1e-6)


@given(loaded())
def test_the_diagram_ends_at_nothing(case: Loaded) -> None:
    """At the far end of each branch only what acts right there is left; and all that acts is in balance."""
    found, body = case.pieces, case.body
    force, moment = unbalance(case.acts, ONE)
    assert float(force.max()) < SAME and float(moment.max()) < SAME
    for edge, stop in enumerate(body.stops):
        if stop in body.starts:
            continue
        here = [a for a in case.acts if a.spread is None and np.hypot(*(_place(a) - body.nodes[stop])) < 1e-9]
        last = [k for k in range(len(found.edge)) if _ends(found, k, edge, body)]
        t = body.along[edge]
        total = sum(([float(a.fu[0, 0, 0]), float(a.fv[0, 0, 0])] for a in here), start=np.zeros(2))
        for k in last:
            x = float(found.long[k, 0, 0, 0])
            assert at(found.axial[:, k, 0, 0, 0], x) == pytest.approx(float(t @ total), abs=SAME)
            assert at(found.shear[:, k, 0, 0, 0], x) == pytest.approx(
                float(t[1] * total[0] - t[0] * total[1]), abs=SAME
            )
            assert at(found.bending[:, k, 0, 0, 0], x) == pytest.approx(
                sum(float(a.moment[0, 0, 0]) for a in here), abs=SAME
            )
        assert last


@given(loaded())
def test_the_jumps_are_the_loads(case: Loaded) -> None:
    """Across a place between the ends of an edge N, V and M change by what acts there, and by nothing else."""
    found, body = case.pieces, case.body
    for edge in range(len(body.starts)):
        mine = sorted((float(found.start[k, 0, 0, 0]), k) for k in range(len(found.edge))
                      if found.edge[k, 0, 0, 0] == edge and found.real[k, 0, 0, 0])  # fmt: skip
        for (s, before), (r, after) in pairwise(mine):
            if r == s:
                continue
            place = body.nodes[body.starts[edge]] + r * body.along[edge]
            here = [a for a in case.acts if a.spread is None and np.hypot(*(_place(a) - place)) < 1e-9]
            force = sum(([float(a.fu[0, 0, 0]), float(a.fv[0, 0, 0])] for a in here), start=np.zeros(2))
            t = body.along[edge]
            for power, jump in (
                (found.axial, -float(t @ force)), (found.shear, float(t[0] * force[1] - t[1] * force[0])),
                (found.bending, -sum(float(a.moment[0, 0, 0]) for a in here)),
            ):  # fmt: skip
                left = at(power[:, before, 0, 0, 0], float(found.long[before, 0, 0, 0]))
                assert at(power[:, after, 0, 0, 0], 0.0) - left == pytest.approx(jump, abs=SAME)


@given(loaded())
def test_nothing_along_the_body_is_larger_than_the_largest(case: Loaded) -> None:
    """Against many places of every piece; and the largest is had at the place that is told."""
    found = case.pieces
    for power in (found.axial, found.shear, found.bending):
        top = largest(found, power)
        most = 0.0
        for k in range(len(found.edge)):
            if found.real[k, 0, 0, 0]:
                x = np.linspace(0.0, float(found.long[k, 0, 0, 0]), 41)
                most = max(most, float(np.max(np.abs(np.polynomial.polynomial.polyval(x, power[:, k, 0, 0, 0])))))
        assert abs(float(top.value[0, 0, 0])) >= most - SAME
        k = int(top.piece[0, 0, 0])
        x = float(top.way[0, 0, 0] - found.start[k, 0, 0, 0])
        assert at(power[:, k, 0, 0, 0], x) == pytest.approx(float(top.value[0, 0, 0]), abs=SAME)


@given(loaded())
def test_the_fibre_stress_is_that_of_both_where_it_is_largest(case: Loaded) -> None:
    area, modulus = 2.0, 0.3
    found = case.pieces
    top = fibre_stress(case.body, found, area, modulus)
    most = 0.0
    for k in range(len(found.edge)):
        if found.real[k, 0, 0, 0]:
            x = np.linspace(0.0, float(found.long[k, 0, 0, 0]), 41)
            n, m = (np.polynomial.polynomial.polyval(x, q[:, k, 0, 0, 0]) for q in (found.axial, found.bending))
            most = max(most, float(np.max(np.abs(n) / area + np.abs(m) / modulus)))
    value = abs(float(top.value[0, 0, 0]))
    assert value >= most - SAME
    assert value <= (abs(float(largest(found, found.axial).value[0, 0, 0])) / area
                     + abs(float(largest(found, found.bending).value[0, 0, 0])) / modulus + SAME)  # fmt: skip


@given(st.lists(places, min_size=2, max_size=4), places, places)
def test_the_other_way_round_the_diagram_is_mirrored(
    nodes: list[tuple[float, float]], force: tuple[float, float], other: tuple[float, float]
) -> None:
    """Walked from the other end, right is left: M changes its sign, V keeps it, N does not care."""
    line = chain(nodes, list(range(len(nodes) - 1)))
    assume(line.long.min() > 0.1 and apart(line))
    back = chain(nodes[::-1], list(range(len(nodes) - 1)))
    acts = [act(line.nodes[0], force, 0.1), act(line.nodes[-1], other, -0.4)]
    total = -np.add(force, other)
    arms = line.nodes[-1] - line.nodes[0]
    turning = -0.3 + float(arms[0] * other[1] - arms[1] * other[0])
    acts.append(act(line.nodes[0], (float(total[0]), float(total[1])), -turning))
    there, here = pieces(line, acts, ONE), pieces(back, acts, ONE)
    count = len(line.long)
    for edge in range(count):
        mirror, long = count - 1 - edge, float(line.long[edge])
        for mine, theirs, sign in (
            (there.axial, here.axial, 1.0), (there.shear, here.shear, 1.0), (there.bending, here.bending, -1.0),
        ):  # fmt: skip
            a = at(mine[:, edge, 0, 0, 0], 0.3 * long)
            assert sign * at(theirs[:, mirror, 0, 0, 0], 0.7 * long) == pytest.approx(a, abs=SAME)


def _place(a: Act) -> np.ndarray:
    return np.array([float(a.u[0, 0, 0]), float(a.v[0, 0, 0])])


def _ends(found: Pieces, k: int, edge: int, body: Body) -> bool:
    """True for a piece that reaches the end of an edge."""
    if found.edge[k, 0, 0, 0] != edge or not found.real[k, 0, 0, 0]:
        return False
    return bool(found.start[k, 0, 0, 0] + found.long[k, 0, 0, 0] > body.long[edge] - 1e-9)


@pytest.mark.parametrize(
    ("ends", "most", "where"),
    [
        ((1.0, 1.0), 1 / 8, 1 / 2),
        ((0.0, 2.0), 2 / (9 * 3**0.5), 1 / 3**0.5),
        ((2.0, 0.0), 2 / (9 * 3**0.5), 1 - 1 / 3**0.5),
    ],
)
def test_the_summit_under_a_spread_load(ends: tuple[float, float], most: float, where: float) -> None:
    """A beam on two supports under a load W spread over its length l: W l/8 in the middle if evenly; if it rises from
    nothing, V = W/3 - W x^2/l^2 passes through nothing at l/sqrt(3), where M is 2 W l/(9 sqrt 3)."""
    long, whole = 1.6, 700.0
    beam = chain([(0.0, 0.0), (long, 0.0)], [0])
    middle = long * (0.5 + (ends[1] - ends[0]) / 12)
    line = ((Site(1, 0.0, 0.0), Site(1, long, 0.0)),)
    right = whole * middle / long
    acts = [
        act(np.array([middle, 0.0]), (0.0, -whole), 0.0, Spread(line, ends)),
        act(np.array([0.0, 0.0]), (0.0, whole - right), 0.0), act(np.array([long, 0.0]), (0.0, right), 0.0),
    ]  # fmt: skip
    found = pieces(beam, acts, ONE)
    top = largest(found, found.bending)
    assert float(top.value[0, 0, 0]) == pytest.approx(most * whole * long)
    assert float(top.way[0, 0, 0]) == pytest.approx(where * long)
