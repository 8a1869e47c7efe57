"""The walk through a stroke stays on the branch that was drawn and finds the limits of motion exactly."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import assume, example, given
from hypothesis import strategies as st

from linkcalc import Faults, stroke
from linkcalc.mechanics.path import OutOfReach, lay_path, motion_range
from linkcalc.mechanics.pipeline import solve_at
from linkcalc.model.read import parse
from tests.unit.mechanics.linkages import FourBar, SliderCrank, ready, twice

LIMIT = 1e-9
"""[rad] and relative [m]: a limit is refined to rounding of its rate, and promised to a nanometre."""
PLACE = 1e-11
"""[m] on lengths of 0.1 closed to 1e-12 of the size; the rest is transmission angles down to 10 degrees."""
POSES = 181

LINKAGES = {
    "crank and rocker": FourBar(30, 90, 70, 100),
    "drag link": FourBar(90, 80, 85, 30),
    "long coupler": FourBar(25, 150, 140, 60),
    "near its change point": FourBar(30, 70.2, 60, 100),
    "rocker and rocker": FourBar(60, 40, 55, 50),
    "inner rocker": FourBar(80, 25, 70, 100, drawn=40),
}


def walked(linkage: FourBar, start: float, stop: float) -> tuple[np.ndarray, np.ndarray]:
    """Crank angles [rad] and places of the knee (2, poses) over a stroke."""
    model = ready(linkage.text(f'[stroke]\nturn = "crank"\nfrom = {start!r}\nto = {stop!r}'))
    path = lay_path(model)
    angles = path.poses(POSES)
    solved = solve_at(model, path.mesh, angles)
    assert solved.closed.fine.all()
    at = solved.closed.at
    drawn = linkage.rocker_angle(np.radians(linkage.drawn))
    u, v = linkage.c / 1000 * np.cos(drawn), linkage.c / 1000 * np.sin(drawn)
    place = [at.x[3] + at.c[3] * u - at.s[3] * v, at.y[3] + at.s[3] * u + at.c[3] * v]
    return angles, np.array(place).reshape(2, -1)


@pytest.mark.parametrize("name", ["crank and rocker", "drag link", "long coupler", "near its change point"])
@pytest.mark.parametrize("stop", [420.0, -300.0, 1140.0], ids=["once round", "backwards", "three times"])
def test_all_the_way_round_on_the_branch_that_was_drawn(name: str, stop: float) -> None:
    linkage = LINKAGES[name]
    angles, places = walked(linkage, linkage.drawn, stop)
    np.testing.assert_allclose(places, linkage.knee(angles), atol=PLACE)


@given(
    a=st.floats(20, 100), b=st.floats(30, 120), c=st.floats(30, 120), d=st.floats(30, 120),
    drawn=st.floats(15, 165), part=st.floats(0.05, 0.97), up=st.booleans(),
)  # fmt: skip
@example(a=30.0, b=70.2, c=60.0, d=100.0, drawn=60.0, part=0.97, up=True)  # past the near change point
@example(a=60.0, b=40.0, c=55.0, d=50.0, drawn=60.0, part=0.97, up=True)  # up to just before a limit
def test_random_four_bars_keep_their_branch(
    a: float, b: float, c: float, d: float, drawn: float, part: float, up: bool
) -> None:
    linkage = FourBar(a, b, c, d, drawn)
    begin = np.radians(drawn)
    fan = begin + (1 if up else -1) * np.linspace(0, 2 * np.pi, 2000)
    reach = np.isfinite(linkage.knee(fan)[0])
    assume(reach[0])
    last = int(np.argmin(reach)) or fan.size  # the first angle that cannot be
    stop = begin + (fan[min(last, fan.size - 1)] - begin) * part
    knees = linkage.knee(np.linspace(begin, stop, 500))
    x, y = knees * 1000
    # the two branches must be apart all the way: half the distance between them is the height over the diagonal
    bx, by = a * np.cos(np.linspace(begin, stop, 500)), a * np.sin(np.linspace(begin, stop, 500))
    height = np.abs((x - bx) * (0 - by) - (y - by) * (d - bx)) / np.hypot(d - bx, by)
    assume(height.min() > 2.0)
    angles, places = walked(linkage, drawn, float(np.degrees(stop)))
    np.testing.assert_allclose(places, linkage.knee(angles), atol=1e3 * PLACE)


@pytest.mark.parametrize(
    "model", [SliderCrank(40, 130), SliderCrank(40, 90, 25), SliderCrank(40, 45), SliderCrank(40, 60, -15)]
)
def test_a_slider_crank_goes_round_without_turning_over(model: SliderCrank) -> None:
    answer = stroke(parse(model.text('[stroke]\nturn = "crank"\nto = 410\nposes = 181')))
    angle = answer.drive[0, 0]
    assert not answer.status.any()
    bx, by = model.r / 1000 * np.cos(angle), model.r / 1000 * np.sin(angle)
    np.testing.assert_allclose(answer.x[2, 0, 0], bx, atol=PLACE)
    lean = np.arcsin((model.h / 1000 - by) / (model.l / 1000))
    drawn = lean[0]
    turned = answer.turn[2, 0, 0] + drawn
    np.testing.assert_allclose(bx + model.l / 1000 * np.cos(turned), model.place(angle), atol=PLACE)


@pytest.mark.parametrize("coupler", [90.0, 70.2, 70.02, 70.002])
def test_two_loops_that_come_near_their_change_points_together(coupler: float) -> None:
    """The sign of the determinant would not tell if both went over to the other branch at once."""
    linkage = FourBar(30, coupler, 60, 100)
    model = ready(twice(linkage, '[stroke]\nturn = "crank"\nfrom = 60\nto = 420'))
    path = lay_path(model)
    angles = path.poses(POSES)
    solved = solve_at(model, path.mesh, angles)
    assert solved.closed.fine.all() and not path.passed
    drawn, knee, at = linkage.rocker_angle(np.radians(linkage.drawn)), linkage.knee(angles), solved.closed.at
    for member in (3, 5):
        u, v = linkage.c / 1000 * np.cos(drawn), linkage.c / 1000 * np.sin(drawn)
        x, y = at.c[member] * u - at.s[member] * v, at.s[member] * u + at.c[member] * v
        np.testing.assert_allclose([at.x[member] + x, at.y[member] + y], knee.reshape(2, 1, 1, -1), atol=1e3 * PLACE)


# limits of motion


@pytest.mark.parametrize("name", ["rocker and rocker", "inner rocker"])
def test_limits_of_a_crank_that_does_not_come_round(name: str) -> None:
    linkage = LINKAGES[name]
    lower, drawn, upper = motion_range(ready(linkage.text('[stroke]\nturn = "crank"\nto = "upper limit"')))
    limits = linkage.crank_limits()
    above = min((v for v in [*limits, *(2 * np.pi - v for v in limits)] if v > drawn), default=np.nan)
    below = max((v for v in [*limits, *(-v for v in limits)] if v < drawn), default=np.nan)
    assert drawn == pytest.approx(np.radians(linkage.drawn))
    assert upper == pytest.approx(above, abs=LIMIT)
    assert lower == pytest.approx(below, abs=LIMIT)


def test_dead_points_of_a_driven_rocker() -> None:
    linkage = LINKAGES["crank and rocker"]
    lower, _, upper = motion_range(ready(linkage.text('[stroke]\nturn = "rocker"\nto = "upper limit"')))
    assert sorted([lower, upper]) == pytest.approx(sorted(linkage.rocker_limits()), abs=LIMIT)


@pytest.mark.parametrize("model", [SliderCrank(40, 130), SliderCrank(40, 90, 25)])
def test_ends_of_a_driven_slide(model: SliderCrank) -> None:
    """Crank and rod in line: the slide stands at the root of (l +- r)^2 - h^2."""
    lower, _, upper = motion_range(ready(model.text('[stroke]\ntravel = "guide"\nto = "upper limit"')))
    far, near = (np.sqrt((model.l + sign * model.r) ** 2 - model.h**2) / 1000 for sign in (1, -1))
    assert (lower, upper) == pytest.approx((near, far), rel=LIMIT)


TOGGLE = """
[points]
A = [0, 0]
C = [120, 0]
B = { meets = [["A", 80], ["C", 60]], side = "left" }
[members]
ground = ["A"]
first = ["A", "B"]
second = ["B", "C"]
[slots.guide]
point = "C"
along = 0
[effort]
torque_on = "first"
[load]
at = "C"
direction = 180
size = 100
[stroke]
distance = ["A", "C"]
to = "upper limit"
"""


def test_a_toggle_is_longest_stretched_and_shortest_folded() -> None:
    lower, drawn, upper = motion_range(ready(TOGGLE))
    assert (lower, drawn, upper) == pytest.approx((0.02, 0.12, 0.14), rel=LIMIT)


def test_a_full_turn_has_no_limit() -> None:
    lower, _, upper = motion_range(ready(LINKAGES["drag link"].text('[stroke]\nturn = "crank"\nto = "upper limit"')))
    assert np.isnan([lower, upper]).all()


@pytest.mark.parametrize("word", ["lower limit", "upper limit"])
def test_a_stroke_to_a_limit_ends_a_hair_before_it(word: str) -> None:
    linkage = LINKAGES["rocker and rocker"]
    path = lay_path(ready(linkage.text(f'[stroke]\nturn = "crank"\nto = "{word}"')))
    (limit,) = path.limits
    assert 0 < abs(path.stop - limit) < 1e-8
    assert abs(path.stop - path.drawn) < abs(limit - path.drawn)
    assert path.start == path.drawn


def test_beyond_a_limit_it_says_where_it_came_to() -> None:
    linkage = LINKAGES["rocker and rocker"]
    with pytest.raises(OutOfReach) as stop:
        lay_path(ready(linkage.text('[stroke]\nturn = "crank"\nto = 170')))
    assert stop.value.limit == pytest.approx(max(linkage.crank_limits()), abs=LIMIT)
    assert stop.value.end == "to" and "stand in line at C" in stop.value.why


@pytest.mark.parametrize(
    ("start", "stop"),
    [
        ("from = 20", "to = 80"),
        ("from = 80", "to = 20"),
        ("", 'to = "lower limit"'),
        ('from = "lower limit"', 'to = "upper limit"'),
        ('from = "upper limit"', "to = 30"),
    ],
)
def test_the_ends_are_what_the_file_says(start: str, stop: str) -> None:
    linkage = LINKAGES["rocker and rocker"]
    answer = stroke(parse(linkage.text(f'[stroke]\nturn = "crank"\n{start}\n{stop}\nposes = 5')))
    lower, upper = np.degrees(sorted(linkage.crank_limits()))
    words = {"": 60.0, '"lower limit"': lower, '"upper limit"': upper}
    ends = [words.get(v.partition("= ")[2]) for v in (start, stop)]
    wanted = [float(v.partition("= ")[2]) if end is None else end for v, end in zip((start, stop), ends, strict=True)]
    assert np.degrees(answer.drive[0, 0, [0, -1]]) == pytest.approx(wanted, abs=1e-6)
    assert not answer.status.any()


def test_a_stroke_that_cannot_begin_is_a_fault() -> None:
    with pytest.raises(Faults, match=r"stroke.from: 170 deg cannot be reached: the limit of motion is"):
        stroke(parse(LINKAGES["rocker and rocker"].text('[stroke]\nturn = "crank"\nfrom = 170\nto = 60')))
