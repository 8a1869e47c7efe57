"""Pins, welds at pins, pushers and load cases."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.faults import Faults
from linkcalc.model.mechanism import Case, GravityChange, Mechanism, Member
from linkcalc.model.parts_list import PinGroup
from linkcalc.model.read import parse
from linkcalc.model.sketch import Drawing
from linkcalc.parts.joints.weld import Weld
from linkcalc.parts.loads.force import Force
from linkcalc.parts.points.coordinates import Coordinates
from tests.unit.model.samples import EVERYTHING, HOLD_DOWN


def pin_at_p(members: str, *welds: tuple[str, str], at: str = "P") -> PinGroup | None:
    """Members a, b, ... and perhaps the ground (g) that all carry P, some welded together there."""
    names = ["ground" if m == "g" else m for m in members]
    mechanism = Mechanism(
        points={"P": Coordinates(0, 0), "Q": Coordinates(1, 0)},
        members={name: Member(("P", "Q") if at == "Q" else ("P",)) for name in names},
        joints={"weld": {f"w{i}": Weld(pair, at) for i, pair in enumerate(welds)}},
    )
    return Drawing(mechanism).pins.get("P")


def test_the_hub_of_a_pin() -> None:
    assert pin_at_p("ab") == PinGroup("P", "a", ("b",))
    assert pin_at_p("abg") == PinGroup("P", "ground", ("a", "b"))
    assert pin_at_p("abc") == PinGroup("P", "a", ("b", "c"))
    assert pin_at_p("a") is None


def test_welded_members_are_one_at_their_pin() -> None:
    assert pin_at_p("ab", ("a", "b")) is None
    assert pin_at_p("abc", ("b", "a")) == PinGroup("P", "a", ("c",))
    assert pin_at_p("abc", ("b", "c")) == PinGroup("P", "a", ("b",))
    assert pin_at_p("abcd", ("a", "b"), ("c", "d")) == PinGroup("P", "a", ("c",))
    assert pin_at_p("abcd", ("a", "c"), ("c", "d"), ("d", "b")) is None
    assert pin_at_p("abg", ("b", "ground")) == PinGroup("P", "ground", ("a",))
    assert pin_at_p("ab", ("a", "b"), at="Q") == PinGroup("P", "a", ("b",))


def test_one_pin_joint_for_each_member_against_the_hub() -> None:
    drawing = Drawing(parse(HOLD_DOWN))
    joined = [(j.name, drawing.members[j.members[0]], drawing.members[j.members[1]]) for j in drawing.joints]
    assert joined == [
        ("A", "handle", "ground"),
        ("B", "strut", "handle"),
        ("C", "arm", "strut"),
        ("D", "arm", "ground"),
    ]
    group = PinGroup("A", "ground", ("x", "y"))
    assert group.members == ("ground", "x", "y")


def test_pins_come_first_and_then_the_other_joints() -> None:
    names = [joint.name for joint in Drawing(parse(EVERYTHING)).joints]
    assert names[:4] == ["A", "B", "D", "J"]
    assert sorted(names[4:]) == ["guide", "roll", "root", "way"]


def test_pushers_and_what_cases_make_of_them() -> None:
    drawing = Drawing(parse(EVERYTHING))
    found = drawing.assembly()
    base = [("", n) for n in ("effort", "load", "wind", "sack", "push", "weight of bar", "weight of ram")]
    assert list(found.pushers) == [*base, ("wet day", "effort"), ("wet day", "rain")]
    assert {name: p.name for (_, name), p in found.pushers.items()} == {n: n for _, n in found.pushers}
    plain, wet = found.cases
    assert (plain.name, plain.effort) == ("plain", ("", "effort"))
    assert plain.factors == dict.fromkeys(base[1:], 1.0)
    assert (wet.name, wet.effort) == ("wet day", ("wet day", "effort"))
    weights = {("", "weight of bar"): 1.0, ("", "weight of ram"): 1.0}
    assert wet.factors == {
        ("", "load"): 1.5, ("", "sack"): 0.0, ("", "push"): 1.0, ("wet day", "rain"): 1.0, **weights
    }  # fmt: skip
    assert plain.field == pytest.approx(9.81)
    assert wet.field == pytest.approx(9.81 / 2)
    assert wet.down == pytest.approx((np.cos(np.radians(-95)), np.sin(np.radians(-95))))


def test_a_model_without_cases_has_one_without_a_name() -> None:
    (only,) = Drawing(parse(HOLD_DOWN)).assembly().cases
    assert (only.name, only.effort, only.down) == ("", ("", "effort"), (0.0, -1.0))
    assert only.factors == {("", "load"): 1.0, ("", "weight of handle"): 1.0}


def test_a_frame_has_no_effort() -> None:
    mechanism = Mechanism(
        points={"A": Coordinates(0, 0)},
        members={"ground": Member(("A",), mass=5)},
        cases={"up": Case(gravity=GravityChange("180 deg"))},
    )
    found = Drawing(mechanism).assembly()
    assert found.pushers == {}, "the mass of the ground does nothing"
    assert found.cases[0].effort is None
    assert found.cases[0].down == (0.0, 1.0)


def test_faults_of_loads_tell_their_item() -> None:
    mechanism = Mechanism(
        points={"A": Coordinates(0, 0)},
        members={"ground": Member(("A",))},
        cases={"wet": Case(add={"rain": Force("A", direction="3 mm", size=1)})},
    )
    with pytest.raises(Faults) as raised:
        Drawing(mechanism).pushers()
    assert str(raised.value) == "cases.wet.add.rain: 3 mm is a length; an angle is wanted (e.g. 12 deg)"
