"""What is written reads back unchanged; what is built in Python is as good as what is read."""

from __future__ import annotations

import tomllib
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings

from linkcalc.faults import Faults
from linkcalc.model.check import check
from linkcalc.model.gather import Gather
from linkcalc.model.mechanism import Dimension, Gravity, Mechanism, Member, Stroke, Units
from linkcalc.model.read import parse, read
from linkcalc.model.tree import from_tree, to_tree
from linkcalc.model.write import dumps, write
from linkcalc.parts.coordinates.turn import Turn
from linkcalc.parts.loads.force import Force
from linkcalc.parts.points.coordinates import Coordinates
from linkcalc.parts.points.meets import Meets
from linkcalc.words import kinds
from tests.unit.model.samples import EVERYTHING, HOLD_DOWN
from tests.unit.model.strategies import MECHANISMS, filled


@settings(max_examples=150, deadline=None, suppress_health_check=list(HealthCheck))
@given(MECHANISMS)
def test_any_mechanism_reads_back_unchanged(mechanism: Mechanism) -> None:
    gather = Gather()
    again = from_tree(tomllib.loads(dumps(mechanism)), gather)
    assert gather.faults == []
    assert again == mechanism
    for table in ("points", "members", "dimensions", "loads", "cases", "requirements"):
        assert list(getattr(again, table)) == list(getattr(mechanism, table)), "the order of the file counts"


@pytest.mark.parametrize("family", ["construction", "joint", "load", "coordinate"])
def test_every_kind_reads_back_unchanged(family: str) -> None:
    """Each kind by itself, so that none is left to chance."""
    for kind in kinds(family).values():

        @settings(max_examples=15, deadline=None, database=None)
        @given(filled(kind))
        def holds(part: object) -> None:
            built = {
                "construction": Mechanism(points={"P": part}),
                "joint": Mechanism(joints={part.word: {"j": part}}),  # type: ignore[attr-defined]
                "load": Mechanism(loads={"l": part}),
                "coordinate": Mechanism(stroke=Stroke(part)),
            }[family]
            gather = Gather()
            assert from_tree(tomllib.loads(dumps(built)), gather) == built
            assert gather.faults == []

        holds()


@pytest.mark.parametrize("text", [HOLD_DOWN, EVERYTHING], ids=["hold-down", "everything"])
def test_models_read_back_unchanged(text: str, tmp_path: Path) -> None:
    mechanism = parse(text)
    assert parse(dumps(mechanism)) == mechanism
    assert dumps(parse(dumps(mechanism))) == dumps(mechanism)
    write(mechanism, tmp_path / "m.toml")
    again = read(tmp_path / "m.toml")
    assert again == mechanism
    assert again.source == str(tmp_path / "m.toml")
    assert check(again) == mechanism
    assert check(again).source == again.source


def test_what_a_written_file_looks_like() -> None:
    """As one would write it by hand: short forms where they do, nothing that is as when left out."""
    mechanism = Mechanism(
        title="Lever",
        units=Units(length="in"),
        dimensions={"a": Dimension(4.5), "b": Dimension("2*a", tol=(-0.1, 0.1))},
        points={"A": Coordinates(0, 0), "B": Coordinates("a", 0)},
        members={"ground": Member(("A",)), "bar": Member(("A", "B"), mass=2)},
        gravity=Gravity(size=9.8),
        load=Force("B", direction=-90, size=40),
        note='Two\n"lines"',
    )
    assert dumps(mechanism) == (
        'title = "Lever"\nnote = """\nTwo\n\\"lines\\""""\n\n[units]\nlength = "in"\n\n'
        '[dimensions]\na = 4.5\nb = { size = "2*a", tol = [-0.1, 0.1] }\n\n[points]\nA = [0, 0]\nB = ["a", 0]\n\n'
        '[members]\nground = ["A"]\nbar = { points = ["A", "B"], mass = 2 }\n\n[gravity]\nsize = 9.8\n\n'
        '[load]\nat = "B"\ndirection = -90\nsize = 40\n'
    )


def test_what_python_builds_may_use_short_forms() -> None:
    """Lists for tuples, [x, y] for a point, a list of points for a member, numpy's numbers: as in a file."""
    short = Mechanism(
        dimensions={"a": 40},  # type: ignore[dict-item]
        points={"A": [0, 0], "B": (np.float64(40.5), np.int64(0)), "C": Meets([["A", 30], ["B", 30]], "left")},  # type: ignore[arg-type]
        members={"ground": ["A"], "bar": Member(["A", "B", "C"])},  # type: ignore[dict-item, arg-type]
        stroke=Stroke(Turn("bar"), 10, 20),
    )
    plain = Mechanism(
        dimensions={"a": Dimension(40)},
        points={"A": Coordinates(0, 0), "B": Coordinates(40.5, 0), "C": Meets((("A", 30), ("B", 30)), "left")},
        members={"ground": Member(("A",)), "bar": Member(("A", "B", "C"))},
        stroke=Stroke(Turn("bar"), 10, 20),
    )
    assert check(short) == plain
    assert dumps(short) == dumps(plain)


def test_what_python_builds_is_checked_alike() -> None:
    wrong = Mechanism(points={"A": Coordinates(True, 0)}, members={"bar": Member(("A", "Q"))})
    with pytest.raises(Faults) as raised:
        check(wrong)
    assert [str(f) for f in raised.value.faults] == [
        'points.A.x: true is no size; a number, a quantity ("12 mm") or a formula is wanted',
        "members.bar.points: unknown point 'Q'; known: A",
    ]


@pytest.mark.parametrize(
    ("value", "message"),
    [({1, 2}, "set {1, 2} cannot stand in a model file"), (True, "bool True cannot stand in a model file")],
)
def test_what_a_file_cannot_say(value: object, message: str) -> None:
    with pytest.raises(Faults) as raised:
        dumps(Mechanism(points={"A": Coordinates(0, value)}))  # type: ignore[arg-type]
    assert str(raised.value) == f"points.A: {message}"


def test_where_a_model_cannot_be_written(tmp_path: Path) -> None:
    with pytest.raises(Faults) as raised:
        write(parse(HOLD_DOWN), tmp_path / "none" / "m.toml")
    assert str(raised.value) == f"{tmp_path}/none/m.toml: cannot be written: there is no folder {tmp_path}/none"


def test_a_tree_holds_only_what_is_said() -> None:
    assert to_tree(Mechanism()) == {}
    assert to_tree(replace(Mechanism(), stroke=Stroke(Turn("bar"), 5))) == {"stroke": {"turn": "bar", "from": 5}}
