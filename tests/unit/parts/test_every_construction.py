"""Constructions give the point that their words say, wherever the drawing lies; those that give none say why."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Any

import numpy as np
import pytest

from linkcalc.parts.points import NoPlace
from linkcalc.parts.points.coordinates import Coordinates
from linkcalc.parts.points.crossing import Crossing
from linkcalc.parts.points.meets import Meets
from linkcalc.parts.points.mirror import Mirror
from linkcalc.parts.points.on_line import OnLine
from linkcalc.parts.points.polar import Polar
from linkcalc.words import kinds

ROUNDING = 1e-12
"""Compass and ruler on lengths near 1 with angles that are not flat: a few dozen roundings."""
NEAR_TOUCH = 1e-7
"""Arcs that only touch cross as the square root of rounding."""


class Board:
    """As much of a sketch as a construction asks: points [m] by name, sizes as they stand."""

    def __init__(self, points: Mapping[str, Any], turn: float = 0.0, scale: float = 1.0):
        self.points, self.turn, self.scale = points, turn, scale

    def point(self, name: str) -> Any:
        return self.points[name]

    def value(self, size: Any, kind: str) -> Any:
        """Lengths of a scaled board are scaled; the rest stays."""
        return size * self.scale if kind == "length" else size

    def shown(self, length: float) -> str:
        return f"{length * 1e3:g} mm"


def random_points(seed: int) -> dict[str, tuple[float, float]]:
    rng = np.random.default_rng(seed)
    return {name: tuple(rng.uniform(-1, 1, 2)) for name in "ABCD"}


def direction(a: Any, b: Any) -> np.ndarray:
    way = np.subtract(b, a)
    return way / np.hypot(*way)


def left_of(a: Any, b: Any) -> np.ndarray:
    u, v = direction(a, b)
    return np.array([-v, u])


def far(a: Any, b: Any) -> float:
    return float(np.hypot(*np.subtract(a, b)))


def angle(line: np.ndarray) -> float:
    return float(np.arctan2(line[1], line[0]))


def same_angle(a: float, b: float) -> bool:
    return abs(np.exp(1j * a) - np.exp(1j * b)) < 10 * ROUNDING


# what each word promises, said in distances and angles


def polar(part: Polar, p: Mapping[str, Any], place: Any) -> None:
    base = angle(direction(*(p[n] for n in part.line))) if part.line else 0.0
    assert far(p[part.from_], place) == pytest.approx(part.distance, abs=ROUNDING)
    assert same_angle(angle(np.subtract(place, p[part.from_])), base + part.angle)


def meets(part: Meets, p: Mapping[str, Any], place: Any) -> None:
    (first, r), (second, s) = part.meets
    assert far(p[first], place) == pytest.approx(r, abs=ROUNDING)
    assert far(p[second], place) == pytest.approx(s, abs=ROUNDING)
    assert (left_of(p[first], p[second]) @ np.subtract(place, p[first]) > 0) == (part.side == "left")


def on(part: OnLine, p: Mapping[str, Any], place: Any) -> None:
    a, b = (p[n] for n in part.on)
    along = part.distance if part.distance is not None else part.part * far(a, b)
    assert direction(a, b) @ np.subtract(place, a) == pytest.approx(along, abs=ROUNDING)
    assert left_of(a, b) @ np.subtract(place, a) == pytest.approx(part.offset, abs=ROUNDING)


def crossing(part: Crossing, p: Mapping[str, Any], place: Any) -> None:
    for a, b in part.crossing:
        assert left_of(p[a], p[b]) @ np.subtract(place, p[a]) == pytest.approx(0.0, abs=1e3 * ROUNDING)


def mirror(part: Mirror, p: Mapping[str, Any], place: Any) -> None:
    a, b = (p[n] for n in part.line)
    middle = np.add(place, p[part.mirror]) / 2
    assert left_of(a, b) @ (middle - a) == pytest.approx(0.0, abs=ROUNDING)
    assert direction(a, b) @ np.subtract(place, p[part.mirror]) == pytest.approx(0.0, abs=ROUNDING)


def coordinates(part: Coordinates, p: Mapping[str, Any], place: Any) -> None:  # noqa: ARG001
    assert place == (part.x, part.y)


PROMISES: dict[str, Callable[..., None]] = {
    "x": coordinates, "from": polar, "meets": meets, "on": on, "crossing": crossing, "mirror": mirror,
}  # fmt: skip


def parts(word: str, p: Mapping[str, Any], seed: int) -> list[Any]:
    """Some parts of a kind with sizes that can be drawn on the points."""
    rng = np.random.default_rng(seed)
    r, turn = rng.uniform(0.1, 1.0), rng.uniform(-np.pi, np.pi)
    d = far(p["A"], p["B"])
    made: dict[str, list[Any]] = {
        "x": [Coordinates(r, turn)],
        "from": [Polar("A", r, turn), Polar("A", r, turn, line=("B", "C"))],
        "meets": [Meets((("A", d * (0.3 + r)), ("B", d * 0.9)), side) for side in ("left", "right")],
        "on": [OnLine(("A", "B"), distance=turn, offset=r), OnLine(("A", "B"), part=turn, offset=0)],
        "crossing": [Crossing((("A", "B"), ("C", "D")))],
        "mirror": [Mirror("A", ("B", "C"))],
    }
    return made[word]


every_word = pytest.mark.parametrize("word", kinds("construction"))
seeds = pytest.mark.parametrize("seed", range(8))


@every_word
@seeds
def test_the_point_is_where_the_words_say(word: str, seed: int) -> None:
    points = random_points(seed)
    for part in parts(word, points, seed):
        PROMISES[word](part, points, part.place(Board(points)))


@every_word
@seeds
def test_turning_moving_and_scaling_the_drawing_carries_the_point_along(word: str, seed: int) -> None:
    by, (dx, dy), k = 1.1, (0.4, -0.3), 2.5
    c, s = k * np.cos(by), k * np.sin(by)

    def carried(place: Any) -> tuple[float, float]:
        x, y = place
        return c * x - s * y + dx, s * x + c * y + dy

    points = random_points(seed)
    there = {name: carried(place) for name, place in points.items()}
    for part in parts(word, points, seed):
        if not part.needs():
            continue  # coordinates are those of the ground axes
        moved = part
        if isinstance(part, Polar) and part.line is None:
            moved = Polar(part.from_, part.distance, part.angle + by)  # counted from the x axis
        place = moved.place(Board(there, scale=k))
        np.testing.assert_allclose(place, carried(part.place(Board(points))), atol=1e3 * ROUNDING)


@every_word
def test_copies_are_drawn_as_each_alone(word: str) -> None:
    """Points as (1, variant, 1): each variant is what it is by itself."""
    boards = [random_points(seed) for seed in range(6)]
    stacked = {name: tuple(np.array([b[name][i] for b in boards]).reshape(1, -1, 1) for i in (0, 1)) for name in "ABCD"}
    for part in parts(word, boards[0], seed=0):
        with np.errstate(invalid="ignore"):
            x, y = (np.broadcast_to(v, (1, 6, 1)) for v in part.place(Board(stacked)))
        for k, points in enumerate(boards):
            try:
                alone = part.place(Board(points))
            except NoPlace:
                assert np.isnan(x[0, k, 0]) and np.isnan(y[0, k, 0]), "what cannot be drawn is not a number"
                continue
            np.testing.assert_allclose((x[0, k, 0], y[0, k, 0]), alone, atol=1e3 * ROUNDING)


@every_word
def test_a_point_needs_no_more_than_it_says(word: str) -> None:
    points = random_points(3)
    for part in parts(word, points, 3):
        part.place(Board({name: points[name] for name in part.needs()}))


ON_A_LINE = {"A": (0.0, 0.0), "B": (1.0, 0.0), "C": (0.0, 1.0), "D": (1.0, 1.0), "E": (0.0, 0.0)}


@pytest.mark.parametrize(
    ("part", "reason"),
    [
        (
            Meets((("A", 0.3), ("B", 0.4)), "left"),
            "do not meet: the centres are 1000 mm apart, the radii together reach 700 mm",
        ),
        (
            Meets((("A", 2.5), ("B", 1.2)), "left"),
            "do not meet: the centres are 1000 mm apart, the radii differ by 1300 mm",
        ),
        (Meets((("A", 1.0), ("E", 1.0)), "left"), "have the same centre"),
        (Crossing((("A", "B"), ("C", "D"))), "the two lines are parallel"),
        (Crossing((("A", "E"), ("C", "D"))), "the two lines are parallel"),
        (OnLine(("A", "E"), distance=0.1), "the line A - E has no length"),
        (Mirror("B", ("A", "E")), "the line A - E has no length"),
    ],
    ids=lambda v: v if isinstance(v, str) else type(v).__name__,
)
def test_what_gives_no_point_says_why(part: Any, reason: str) -> None:
    with pytest.raises(NoPlace, match=reason):
        part.place(Board(ON_A_LINE))


def test_arcs_that_just_touch_meet_on_the_line() -> None:
    place = Meets((("A", 0.25), ("B", 0.75)), "left").place(Board(ON_A_LINE))
    np.testing.assert_allclose(place, (0.25, 0.0), atol=NEAR_TOUCH)


def test_right_angles_are_exact() -> None:
    """Straight guides then fold into constants."""
    assert Polar("A", 2.0, np.pi / 2).place(Board(ON_A_LINE)) == (0.0, 2.0)
    assert Polar("B", 2.0, np.pi).place(Board(ON_A_LINE)) == (-1.0, 0.0)
