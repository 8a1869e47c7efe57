"""Every fault that a model can have: the exact words, file, line and item."""

from __future__ import annotations

import copy
import datetime
import math
import tomllib
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from linkcalc.faults import Faults
from linkcalc.model.check import checked
from linkcalc.model.gather import Gather
from linkcalc.model.read import parse
from linkcalc.model.sketch import Drawing
from linkcalc.model.write import dumps
from tests.unit.model.samples import EVERYTHING, HOLD_DOWN

Change = tuple[str, str]
KNOWN = tomllib.loads((Path(__file__).with_name("faults.toml")).read_text(encoding="utf-8"))["fault"]


def faults(text: str, *changes: Change, add: str = "") -> list[str]:
    """The messages for a model with some of its text changed and lines added at its end, without the line."""
    for old, new in changes:
        assert old in text, old
        text = text.replace(old, new)
    with pytest.raises(Faults) as raised:
        parse(text + add, "m")
    lines = [str(fault).partition(": ") for fault in raised.value.faults]
    assert all(head.startswith("m:") and int(head[2:]) > 0 for head, _, _ in lines)
    return [tail for _, _, tail in lines]


def test_the_samples_have_none() -> None:
    parse(HOLD_DOWN)
    parse(EVERYTHING)


def test_file_and_line_stand_before_the_item() -> None:
    text = HOLD_DOWN.replace("angle = 20", 'angle = "20 mm"')
    line = text[: text.index("20 mm")].count("\n") + 1
    with pytest.raises(Faults) as raised:
        parse(text, "clamp.toml")
    assert (
        str(raised.value) == f"clamp.toml:{line}: points.tip.angle: 20 mm is a length; an angle is wanted (e.g. 12 deg)"
    )


def test_everything_is_told_at_once_in_the_order_of_the_file() -> None:
    found = faults(
        HOLD_DOWN,
        ("tol = 0.05", "tol = true"),
        ('lean = "12 deg"', 'lean = "12 dog"'),
        ("D = [180, 0]", "D = [180]"),
        ("distance = 240", "distnce = 240"),
        ('strut = ["B", "C"]', 'strut = ["B", "Cc"]'),
        ('size = "1.2 kN"', 'size = "1.2 kg"'),
        ("poses = 61", "poses = 1"),
        ("effort <= 400 N", "efort <= 400 N"),
    )
    assert [f.partition(": ")[0] for f in found] == [
        "dimensions.link.tol", "dimensions.lean", "points.D", "points.grip.distnce", "members.strut.points",
        "load.size", "stroke.poses", "requirements.hand",
    ]  # fmt: skip


def test_what_hangs_on_a_fault_is_not_told_again() -> None:
    """D is unreadable, and named by C, E's neighbour, two members, and through C by a slot: one message."""
    found = faults(HOLD_DOWN, ("D = [180, 0]", "D = [true, 0]"), add='[slots.s]\npoint = "C"\nalong = ["D", "A"]\n')
    assert found == ['points.D.x: true is no size; a number, a quantity ("12 mm") or a formula is wanted']
    found = faults(HOLD_DOWN, ("link = { size = 40, tol = 0.05 }", 'link = "40 lbz"'))
    assert found == ["dimensions.link: unknown unit 'lbz'; did you mean 'lb' or 'lbs'?"]


@pytest.mark.parametrize("one", KNOWN, ids=[one["says"].partition(": ")[0] for one in KNOWN])
def test_one_fault(one: dict[str, Any]) -> None:
    assert faults(HOLD_DOWN, *one.get("changes", ()), add=one.get("add", "")) == [one["says"]]


def test_a_model_of_nothing_but_ground() -> None:
    assert faults('[members]\nground = ["A"]\n[points]\nA = [0, 0]') == [
        "members: there is no member but the ground; at least one is wanted"
    ]


@pytest.mark.parametrize(
    "change",
    [
        ('[load]\nat = "tip"\ndirection = -90\nsize = "1.2 kN"\n', ""),  # an effort alone: the tare effort is asked
        ('square_to = ["A", "grip"]', 'direction = "30 deg"\nturns_with = "handle"'),
        ('ground = ["A", "D"]', 'ground = ["A", "D", "E"]'),
        ('at = "grip"\nsquare_to = ["A", "grip"]', 'torque_on = "handle"'),
        ("from = 150\nto = 120\n", ""),
        ("from = 150\nto = 120", 'from = "upper limit"\nto = "lower limit"'),
    ],
)
def test_what_is_no_fault(change: Change) -> None:
    old, new = change
    assert old in HOLD_DOWN
    parse(HOLD_DOWN.replace(old, new).replace("effort <= 400 N", "force at A <= 1 N"))


def places(tree: Any, path: tuple[Any, ...] = ()) -> Iterator[tuple[Any, ...]]:
    """Paths of everything in a tree of tables and lists."""
    if path:
        yield path
    if isinstance(tree, (dict, list)):
        for key in tree if isinstance(tree, dict) else range(len(tree)):
            yield from places(tree[key], (*path, key))


ODD = st.one_of(
    st.sampled_from([
        0, -1, 1e-320, 1e29, 1e300, -0.0, math.inf, math.nan, 10**400, True, "", " ", "A", "ground", "load", "drawn",
        "a", "1/0", "a*b", "c", "0 mm", "0 deg", "1e-300 m", "1e29 m", "upper limit", "effort", [], {}, [0, 0],
        ["A", "A"], ["A", "B"], [["A", 1], ["B", 1]], [["A", "B"], ["A", "B"]], datetime.date(2020, 1, 1), {"at": "A"},
        "force at A <= 1 N at 3 deg", "1 N" * 300, "\u00b2", "\u0661", "é",
    ]),
    st.integers(), st.floats(), st.text(max_size=6),
)  # fmt: skip


@settings(max_examples=400, deadline=None)
@given(st.sampled_from([HOLD_DOWN, EVERYTHING]), st.lists(st.tuples(st.integers(0), ODD, st.booleans()), max_size=3))
def test_whatever_stands_in_a_model_faults_are_all_that_comes(text: str, changes: list[tuple[int, Any, bool]]) -> None:
    """Values, names and tables of a sound model replaced or taken away: it is read, or told what is wrong with it."""
    tree = tomllib.loads(text)
    for number, value, away in changes:
        paths = list(places(tree))
        *path, last = paths[number % len(paths)]
        inner = tree
        for key in path:
            inner = inner[key]
        if away:
            del inner[last]
        else:
            inner[last] = copy.deepcopy(value)
        if not tree:
            return
    gather = Gather()
    mechanism = checked(tree, gather)
    assert all(fault.what for fault in gather.faults)
    if not gather.faults:
        Drawing(mechanism).assembly()
        assert parse(dumps(mechanism)) == mechanism
