"""The body of a member as a tree of edges."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc import parse
from linkcalc.mechanics.body import Body, body, straight
from linkcalc.model.sketch import drawn

FRAME = """
[points]
A = [0, 0]
B = [300, 0]
C = [300, 200]
K = [100, 0]
S = [200, 50]
ON = [150, 0]
[members]
ground = ["A"]
bar = {BAR}
[welds.foot]
members = ["ground", "bar"]
at = "A"
"""


def of(bar: str) -> Body:
    return body(drawn(parse(FRAME.replace("{BAR}", bar))), "bar")


def edges(of: Body) -> set[tuple[str, str]]:
    return {(of.names[a], of.names[b]) for a, b in zip(of.starts, of.stops, strict=True)}


def test_the_points_in_order_are_the_body_and_it_is_cut_at_points_that_lie_on_it() -> None:
    found = of('["A", "B", "C", "ON"]')
    # C to ON goes back across the corner: with the piece ON to B it closes a ring
    assert found.ring
    plain = of('{ points = ["A", "B", "C", "ON"], path = ["A", "B", "C"] }')
    assert edges(plain) == {("A", "ON"), ("ON", "B"), ("B", "C")}
    assert not plain.ring and not any(plain.arms)
    assert plain.before.tolist() == pytest.approx([0.0, 0.15, 0.3])
    assert [plain.names[k] for k in plain.corners()] == ["B"]


def test_a_point_beside_the_path_hangs_on_by_a_straight_arm() -> None:
    found = of('{ points = ["A", "B", "S"], path = ["A", "B"] }')
    assert edges(found) == {("A", "foot of S"), ("foot of S", "B"), ("foot of S", "S")}
    arm = found.arms.index(True)
    assert found.names[found.stops[arm]] == "S"
    assert float(found.long[arm]) == pytest.approx(0.05)
    assert found.nodes[found.starts[arm]].tolist() == pytest.approx([0.2, 0.0])


def test_a_path_that_goes_back_makes_a_branch() -> None:
    found = of('{ points = ["A", "B", "C", "K"], path = ["A", "K", "C", "K", "B"] }')
    assert edges(found) == {("A", "K"), ("K", "C"), ("K", "B")}
    assert not found.ring
    lead = {found.names[found.stops[k]]: k for k in range(3)}
    assert found.beyond[lead["K"], lead["C"]] and found.beyond[lead["K"], lead["B"]]
    assert not found.beyond[lead["C"], lead["B"]]


def test_a_path_that_closes_is_a_ring() -> None:
    assert of('{ points = ["A", "B", "C"], path = ["A", "B", "C", "A"] }').ring


def test_a_member_of_one_point_has_no_body() -> None:
    assert of('["A"]').starts == ()


def test_how_far_a_body_runs_straight_between_two_places() -> None:
    found = of('{ points = ["A", "B", "C"], path = ["A", "B", "C"] }')
    at = {name: tuple(found.nodes[k].tolist()) for k, name in enumerate(found.names)}
    assert straight(found, at["A"], at["B"]) == pytest.approx(0.3)
    assert straight(found, (0.05, 0.0), at["B"]) == pytest.approx(0.25)
    assert straight(found, at["A"], at["C"]) is None
    assert straight(found, at["A"], at["A"]) is None


def test_the_mass_of_a_tee_lies_on_each_of_its_arms_once() -> None:
    """By hand: arms of 100, sqrt(200² + 200²) and 200 mm with their middles at (50, 0), (200, 100) and (200, 0)."""
    bar = '{ points = ["A", "B", "C", "K"], path = ["A", "K", "C", "K", "B"], mass = 3 }'
    drawing = drawn(parse(FRAME.replace("{BAR}", bar)))
    long = np.array([0.1, np.hypot(0.2, 0.2), 0.2])
    x, y = (float(long @ v / long.sum()) for v in ([0.05, 0.2, 0.2], [0.0, 0.1, 0.0]))
    centre = drawing.mass_site("bar")
    assert (centre.u, centre.v) == pytest.approx((x, y))
    assert len(drawing.mass_lines("bar")) == 3
