"""The drawing: points, members and their frames, sites, pins, joints, and many copies at once."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import replace
from typing import Any

import numpy as np
import pytest

from linkcalc.faults import Faults
from linkcalc.model.check_drawing import drawn_poses
from linkcalc.model.mechanism import Dimension, Mechanism, Member, Units
from linkcalc.model.read import parse
from linkcalc.model.sketch import Drawing
from linkcalc.parts.fields import part_fields
from linkcalc.parts.points.coordinates import Coordinates
from linkcalc.parts.points.on_line import OnLine
from linkcalc.parts.points.polar import Polar
from tests.unit.model.samples import EVERYTHING, HOLD_DOWN

MODELS = {"hold-down": parse(HOLD_DOWN), "everything": parse(EVERYTHING)}
models = pytest.mark.parametrize("mechanism", MODELS.values(), ids=MODELS)


@models
def test_sites_lie_where_the_points_are_drawn(mechanism: Mechanism) -> None:
    drawing = Drawing(mechanism)
    at = drawn_poses(drawing)
    for member in drawing.members:
        for point in mechanism.points:
            assert at.spot(drawing.site(point, member)) == pytest.approx(drawing.point(point), abs=1e-15)


@models
def test_a_site_is_made_once(mechanism: Mechanism) -> None:
    drawing = Drawing(mechanism)
    for member in drawing.members:
        for point in mechanism.points:
            assert drawing.site(point, member) is drawing.site(point, member)
    assert drawing.site("B") is drawing.site("B", drawing.hub("B"))
    assert all(drawing.mass_site(m) is drawing.mass_site(m) for m in drawing.members[1:])
    assert drawing.joints is drawing.joints


@models
def test_values_that_never_change_are_python_floats(mechanism: Mechanism) -> None:
    drawing = Drawing(mechanism)
    for member in drawing.members[1:]:
        first = drawing.site(drawing.first_point(member), member)
        assert (repr(first.u), repr(first.v)) == ("0.0", "0.0")
        assert [type(part) for part in drawing.origins[drawing.member(member)]] == [float, float]
        centre = drawing.mass_site(member)
        assert (type(centre.u), type(centre.v)) == (float, float)
        assert type(drawing.own_axis(member)) is float
    assert drawing.origins[0] == (0.0, 0.0)
    assert type(drawing.size) is float
    assert type(drawing.value("3 mm", "length")) is float


def test_members_are_numbered_in_the_order_of_the_file() -> None:
    text = HOLD_DOWN.replace('ground = ["A", "D"]\n', "").replace("[effort]", 'ground = ["A", "D"]\n[effort]')
    drawing = Drawing(parse(text))
    assert drawing.members == ("ground", "handle", "strut", "arm")
    assert [drawing.member(name) for name in drawing.members] == [0, 1, 2, 3]
    assert list(drawing.points) == list(drawing.mechanism.points)


def test_what_a_drawing_says_of_a_lever() -> None:
    """A bar from (30, 0) to (30, 40) mm: upright, its middle 20 mm above its first point."""
    lever = Mechanism(
        points={"A": Coordinates(30, 0), "B": Coordinates(30, 40), "Z": Coordinates(0, 0)},
        members={"ground": Member(("A",)), "bar": Member(("A", "B"), mass=2)},
    )
    drawing = Drawing(lever)
    assert drawing.own_axis("bar") == pytest.approx(math.pi / 2)
    assert drawing.own_axis("ground") == 0.0
    assert drawing.size == pytest.approx(0.04)
    centre = drawing.mass_site("bar")
    assert (centre.u, centre.v) == pytest.approx((0.0, 0.02))
    assert drawing.carriers("A") == ("ground", "bar")
    assert drawing.carriers("Z") == ()
    assert (drawing.hub("A"), drawing.hub("B"), drawing.hub("Z")) == ("ground", "bar", "ground")
    assert drawing.site("Z").member == 0
    assert drawing.first_point("bar") == "A"


@pytest.mark.parametrize(
    ("path", "middle"),
    # an angle of legs 30 and 40: legs' middles (15, 0) and (30, 20), weighed by length: (1650/70, 800/70) mm
    [((), (1650 / 70, 800 / 70)), (("A", "C"), (15.0, 20.0)), (("A", "B", "C", "A"), (1650 / 120 + 6.25, 15.0))],
)
def test_the_centre_of_an_evenly_spread_mass(path: tuple[str, ...], middle: tuple[float, float]) -> None:
    """The last: a wire triangle 3-4-5; its long side adds 50 at (15, 20): x (1650 + 750)/120, y (800 + 1000)/120."""
    points = {"A": Coordinates(0, 0), "B": Coordinates(30, 0), "C": Coordinates(30, 40)}
    members = {"ground": Member(("A",)), "bent": Member(("A", "B", "C"), path=path, mass=1)}
    centre = Drawing(Mechanism(points=points, members=members)).mass_site("bent")
    assert (centre.u, centre.v) == pytest.approx((middle[0] / 1000, middle[1] / 1000))


def test_a_member_of_one_point_has_its_centre_there() -> None:
    points = {"A": Coordinates(5, 5), "B": Coordinates(5, 5)}
    members = {"ground": Member(("A",)), "block": Member(("A",), mass=1), "dot": Member(("A", "B"), mass=1)}
    drawing = Drawing(Mechanism(points=points, members=members))
    for name in ("block", "dot"):
        assert (drawing.mass_site(name).u, drawing.mass_site(name).v) == (0.0, 0.0)
    assert drawing.own_axis("block") == 0.0
    assert drawing.size == 1.0


def test_points_may_be_in_any_order_and_hang_on_long_chains() -> None:
    count = 1500
    points = {f"P{i}": Polar(f"P{i + 1}", 1, 0) for i in range(count)} | {f"P{count}": Coordinates(0, 0)}
    drawing = Drawing(Mechanism(points=points))
    assert drawing.point("P0") == pytest.approx((count / 1000, 0.0))


def test_travel_is_asked_of_slots_and_slides_only() -> None:
    drawing = Drawing(MODELS["everything"])
    assert drawing.travelled("guide").travel(drawn_poses(drawing)) == pytest.approx(0.0)
    with pytest.raises(Faults, match=r"unknown slot, slide or track 'root'; known: guide, roll, way"):
        drawing.travelled("root")


@pytest.mark.parametrize(
    ("ask", "message"),
    [
        (lambda d: d.point("gripp"), "unknown point 'gripp'; did you mean 'grip'?"),
        (lambda d: d.site("B", "hndle"), "unknown member 'hndle'; did you mean 'handle'?"),
        (lambda d: d.member("stru"), "unknown member 'stru'; did you mean 'strut'?"),
        (lambda d: d.value("12 kg", "length"), "12 kg is a mass; a length is wanted (e.g. 12 mm)"),
    ],
)
def test_asking_for_what_is_not_there(ask, message: str) -> None:  # type: ignore[no-untyped-def]
    with pytest.raises(Faults) as raised:
        ask(Drawing(MODELS["hold-down"]))
    assert str(raised.value) == message


@pytest.mark.parametrize(
    ("points", "message"),
    [
        (
            {"A": OnLine(("B", "C"), part=0.5), "B": Polar("A", 1, 0), "C": Coordinates(0, 0)},
            "points.A: hangs on itself: A -> B -> A; place one of them otherwise",
        ),
        ({"A": Polar("A", 1, 0)}, "points.A: hangs on itself: A -> A; place one of them otherwise"),
        ({"A": Polar("Q", 1, 0)}, "points.A: unknown point 'Q'; did you mean 'A'?"),
        (
            {"A": Coordinates(0, 0), "B": Coordinates(0, 0), "C": OnLine(("A", "B"), part=0.5), "D": Polar("C", 1, 0)},
            "points.C.on: the line A - B has no length",
        ),
        (
            {"A": Coordinates(0, 0), "B": Coordinates(0, 0), "C": Polar("A", 1, 0, ("A", "B"))},
            "points.C: it comes to no place; a line it is measured from has no length, or a size is beyond reach",
        ),
        ({"A": Coordinates(math.nan, 0)}, "points.A: nan is no number; a length is wanted (e.g. 12 mm)"),
    ],
)
def test_points_that_cannot_be_drawn(points: dict[str, object], message: str) -> None:
    points.setdefault("Z", Coordinates(9, 9))
    with pytest.raises(Faults) as raised:
        Drawing(Mechanism(points=points))
    assert str(raised.value).replace("; known: A, Z", "; did you mean 'A'?") == message


def test_a_member_without_points() -> None:
    with pytest.raises(Faults, match=r"members\.bar: member 'bar' has no points; name the points it carries"):
        Drawing(Mechanism(members={"bar": Member(())}))


def numbers(thing: object, found: list[object]) -> list[object]:
    """All numbers in the drawing's joints and pushers, in order."""
    if isinstance(thing, (float, np.ndarray)):
        found.append(thing)
    elif hasattr(thing, "__dataclass_fields__"):
        for name in thing.__dataclass_fields__:
            numbers(getattr(thing, name), found)
    elif isinstance(thing, (tuple, list)):
        for one in thing:
            numbers(one, found)
    elif isinstance(thing, dict):
        numbers(list(thing.values()), found)
    return found


@models
def test_copies_are_drawn_as_each_by_itself(mechanism: Mechanism) -> None:
    """Every dimension scattered at once: the drawing of the batch holds the drawing of each copy."""
    rng = np.random.default_rng(3)
    own = Drawing(mechanism)._dimensions
    names = [n for n, d in mechanism.dimensions.items() if not isinstance(d.size, str) or n in ("lean", "c")]
    copies = {name: own[name].value * rng.uniform(0.99, 1.01, (1, 5, 1)) for name in names}
    together = Drawing(mechanism, copies)
    batch = numbers([together.points, together.origins, together.joints, together.assembly()], [])
    assert any(isinstance(value, np.ndarray) for value in batch)
    for i in range(5):
        one = Drawing(mechanism, {name: float(values[0, i, 0]) for name, values in copies.items()})
        alone = numbers([one.points, one.origins, one.joints, one.assembly()], [])
        picked = [v[0, i, 0] if isinstance(v, np.ndarray) else v for v in batch]
        np.testing.assert_allclose(picked, alone, rtol=1e-12, atol=1e-13)
        assert one.size == together.size == Drawing(mechanism).size


def test_a_copy_that_does_not_assemble_is_nan_among_the_others() -> None:
    mechanism = replace(MODELS["hold-down"], dimensions={"link": Dimension(40), "lean": Dimension("12 deg")})
    x, _ = Drawing(mechanism, {"link": np.array([0.04, 0.2]).reshape(1, 2, 1)}).point("C")
    assert np.isnan(x).ravel().tolist() == [False, True]


def spelt_out(part: Any, mechanism: Mechanism) -> Any:
    """A part with the unit of the file written behind every bare number."""

    def told(size: Any, kind: str) -> Any:
        bare = isinstance(size, (int, float)) and kind != "number"
        return f"{size!r} {mechanism.units.of(kind)}" if bare else size

    given = {}
    for entry in part_fields(part):
        value, kind = getattr(part, entry.name), entry.metadata["kind"]
        if kind == "arcs":
            given[entry.name] = tuple((centre, told(radius, "length")) for centre, radius in value)
        elif kind == "sizes":
            given[entry.name] = tuple(told(one, entry.metadata["unit"]) for one in value)
        elif kind in ("size", "line"):
            given[entry.name] = told(value, entry.metadata.get("unit", "angle"))
    return replace(part, **given)


@models
def test_other_units_of_the_file_change_nothing(mechanism: Mechanism) -> None:
    """All bare numbers written out in their unit, then the file's units changed: the drawing stays where it is."""

    def each(parts: Mapping[str, Any]) -> dict[str, Any]:
        return {name: spelt_out(part, mechanism) for name, part in parts.items()}

    length = mechanism.units.length
    dimensions = {
        name: Dimension(size if isinstance(size := d.size, str) else f"{size} {length}")
        for name, d in mechanism.dimensions.items()
    }
    other = replace(
        mechanism,
        units=Units(length="yd", angle="turn", force="kip", mass="slug", moment="ft*lbf", acceleration="ft/s^2"),
        dimensions=dimensions,
        points=each(mechanism.points),
        members=each(mechanism.members),
        joints={word: each(parts) for word, parts in mechanism.joints.items()},
        effort=spelt_out(mechanism.effort, mechanism),
        load=spelt_out(mechanism.load, mechanism),
        loads=each(mechanism.loads),
        pins=each(mechanism.pins),
        cases={
            name: replace(case, add=each(case.add), gravity=spelt_out(case.gravity, mechanism))
            for name, case in mechanism.cases.items()
        },
    )
    drawings = [Drawing(mechanism), Drawing(other)]
    first, second = (numbers([d.points, d.origins, d.joints, d.assembly()], []) for d in drawings)
    np.testing.assert_allclose(second, first, rtol=1e-14, atol=1e-15)
