"""What may be wrong with what is said of a pin or a material, told with line, item, what is wrong and what is right."""

from __future__ import annotations

import pytest

from linkcalc.faults import Faults
from linkcalc.model.read import parse

GOOD = """
[points]
A = [0, 0]
C = [200, 0]
[members]
ground = ["A"]
arm = ["A", "C"]
[materials.own]
yield = 300
[pins.A]
diameter = 20
material = "own"
factor = 2
stack = [["ground", 8], ["arm", 16, 0.5], { plate = "ground", thickness = 8, width = 40, edge = 25 }]
[effort]
torque_on = "arm"
[load]
at = "C"
direction = -90
size = 1
"""
LINE = {key: GOOD.splitlines().index(key) + 1 for key in ("[pins.A]", "yield = 300", "diameter = 20")}
PIN, YIELD, SIZE = LINE["[pins.A]"], LINE["yield = 300"], LINE["diameter = 20"]
MATERIAL, FACTOR, STACK = SIZE + 1, SIZE + 2, SIZE + 3


def test_the_sample_has_none() -> None:
    pin = parse(GOOD).pins["A"]
    assert [(p.plate, p.thickness, p.gap, p.width) for p in pin.stack] == [
        ("ground", 8, 0, None), ("arm", 16, 0.5, None), ("ground", 8, 0, 40),
    ]  # fmt: skip


@pytest.mark.parametrize(
    ("old", "new", "line", "says"),
    [
        ('"own"', '"S335"', MATERIAL, "pins.A.material: unknown material 'S335'; did you mean 'S355' or 'S235'?"),
        ("factor = 2", "factor = 0", FACTOR, "pins.A.factor: 0 cannot stand here; more than nothing is wanted"),
        ("factor = 2", "factor = -1.5", FACTOR, "pins.A.factor: -1.5 cannot stand here; more than nothing is wanted"),
        ("diameter = 20", "diameter = -20", SIZE,
         "pins.A.diameter: -20 mm cannot stand here; more than nothing is wanted"),
        ("yield = 300", 'yield = "30 mm"', YIELD,
         "materials.own.yield: 30 mm is a length; a stress is wanted (e.g. 12 MPa)"),
        ("[pins.A]", "[pins.C]", PIN, "pins.C: 'C' is no pin: only arm carries it; known: A"),
        ("[pins.A]", "[pins.Q]", PIN, "pins.Q: 'Q' is no point; known: A"),
        ('["arm", 16, 0.5], ', "", STACK,
         "pins.A.stack: no plate of arm; the pin joins ground, arm: each is wanted, in order across it"),
        ('["arm", 16, 0.5]', '["arm"]', STACK,
         "pins.A.stack.2: a list of 1; [plate, thickness[, gap[, width[, edge]]]] is wanted"),
        ('["arm", 16, 0.5]', '["amr", 16]', STACK, "pins.A.stack.2.plate: unknown member 'amr'; did you mean 'arm'?"),
        ('["arm", 16, 0.5]', '["arm", 16, -0.5]', STACK,
         "pins.A.stack.2.gap: -0.5 mm cannot stand here; nothing or more is wanted"),
        ('["arm", 16, 0.5]', '"arm"', STACK,
         "pins.A.stack.2: 'arm' is no table; a table with one of the keys 'plate' is wanted"),
    ],
)  # fmt: skip
def test_each_is_told(old: str, new: str, line: int, says: str) -> None:
    assert old in GOOD
    with pytest.raises(Faults) as found:
        parse(GOOD.replace(old, new))
    assert str(found.value) == f"model:{line}: {says}"


def test_a_plate_of_a_member_that_is_not_on_the_pin() -> None:
    more = GOOD.replace('arm = ["A", "C"]', 'arm = ["A", "C"]\nrod = ["C"]').replace('["arm", 16, 0.5]', '["rod", 16]')
    with pytest.raises(Faults, match=r"pins\.A\.stack\.2: rod has no plate here"):
        parse(more)
