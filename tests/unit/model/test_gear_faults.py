"""What may be wrong with gears and racks, told with file, line, item, what is wrong and what would be right."""

from __future__ import annotations

import pytest

from linkcalc.faults import Faults
from linkcalc.model.read import parse

GOOD = """
[points]
P = [0, 0]
Q = [50, 0]
a = [-60, 0]
b = [50, 40]
near = [30, 30]
far = [80, 30]
[members]
ground = ["P", "Q"]
first = ["P", "a"]
second = ["Q", "b"]
bar = ["near", "far"]
[gears.mesh]
members = ["first", "second"]
centres = ["P", "Q"]
radii = [20, 30]
pressure_angle = 20
[slides.ways]
member = "bar"
along = 0
[racks.teeth]
pinion = "second"
centre = "Q"
radius = 30
along = ["near", "far"]
on = "bar"
[effort]
torque_on = "first"
[load]
at = "far"
direction = 0
size = 100
"""
GEAR = GOOD.splitlines().index("[gears.mesh]") + 1
RACK = GOOD.splitlines().index("[racks.teeth]") + 1


def test_the_sample_has_none() -> None:
    parse(GOOD)
    parse(GOOD.replace("Q = [50, 0]", "Q = [50.02, 0]"))  # teeth have more play than that
    parse(GOOD.replace("radii = [20, 30]", 'radii = [20, 70]\nmesh = "internal"'))


@pytest.mark.parametrize(
    ("old", "new", "line", "says"),
    [
        ("radii = [20, 30]", "radii = [20, 35]", GEAR + 2,
         "gears.mesh.centres: the gears do not touch: P and Q are drawn 50 mm apart; "
         "55 mm is wanted, the sum of the pitch radii"),
        ("radii = [20, 30]", "radii = [20, 29.8]", GEAR + 2,
         "gears.mesh.centres: the gears do not touch: P and Q are drawn 50 mm apart; "
         "49.8 mm is wanted, the sum of the pitch radii"),
        ("radii = [20, 30]", 'radii = [20, 30]\nmesh = "internal"', GEAR + 2,
         "gears.mesh.centres: the gears do not touch: P and Q are drawn 50 mm apart; "
         "10 mm is wanted, the difference of the pitch radii"),
        ("radii = [20, 30]", 'radii = [30, 30]\nmesh = "internal"', GEAR + 3,
         "gears.mesh.radii: a ring and a gear of one size cannot mesh; a larger ring is wanted"),
        ("radii = [20, 30]", "radii = [-20, 70]", GEAR + 3,
         "gears.mesh.radii: -20 mm cannot stand here; more than nothing is wanted"),
        ("radii = [20, 30]", "radii = 20", GEAR + 3,
         "gears.mesh.radii: 20 is no list; two sizes are wanted, each a length: [20, 30]"),
        ("radii = [20, 30]", "radii = [20]", GEAR + 3,
         "gears.mesh.radii: a list of 1; two sizes are wanted, each a length: [20, 30]"),
        ("radii = [20, 30]", 'radii = [20, "30 deg"]', GEAR + 3,
         "gears.mesh.radii: 30 deg is an angle; a length is wanted (e.g. 12 mm)"),
        ("radii = [20, 30]\n", "", GEAR, "gears.mesh: 'radii' is missing; pitch radius of each"),
        ("radii = [20, 30]", 'radii = [20, 30]\nmesh = "inner"', GEAR + 4,
         "gears.mesh.mesh: 'inner' is not known here; one of 'external', 'internal'"),
        ("pressure_angle = 20", "pressure_angle = 0", GEAR + 4,
         "gears.mesh.pressure_angle: a pressure angle of 0 deg cannot be; more than 0 and less than 45 deg is wanted"),
        ("pressure_angle = 20", "pressure_angle = 70", GEAR + 4,
         "gears.mesh.pressure_angle: a pressure angle of 70 deg cannot be; more than 0 and less than 45 deg is wanted"),
        ('members = ["first", "second"]', 'members = ["first", "first"]', GEAR + 1,
         "gears.mesh.members: first cannot mesh with itself; two members are wanted"),
        ('centres = ["P", "Q"]', 'centres = ["P", "b"]', GEAR + 2,
         "gears.mesh.centres: the gears do not touch: P and b are drawn 64.03 mm apart; "
         "50 mm is wanted, the sum of the pitch radii"),
        ('centres = ["P", "Q"]', 'centres = ["Q", "P"]', GEAR + 2,
         "gears.mesh.centres: first does not carry Q; name Q in first"),
        ('centres = ["P", "Q"]', 'centres = ["P", "q"]', GEAR + 2,
         "gears.mesh.centres: unknown point 'q'; did you mean 'Q'?"),
        ("radius = 30\n", "radius = 25\n", RACK + 2,
         "racks.teeth.centre: the pinion does not touch the rack: Q is drawn 30 mm from it; "
         "25 mm is wanted, the pitch radius"),
        ("far = [80, 30]", "far = [80, 32]", RACK + 2,
         "racks.teeth.centre: the pinion does not touch the rack: Q is drawn 30.78 mm from it; "
         "30 mm is wanted, the pitch radius"),
        ('on = "bar"', 'on = "second"', RACK,
         "racks.teeth: second cannot roll along itself; another member is wanted for 'pinion' or 'on'"),
        ('centre = "Q"', 'centre = "P"', RACK + 2, "racks.teeth.centre: second does not carry P; name P in second"),
        ('along = ["near", "far"]', 'along = ["near", "b"]', RACK + 4,
         "racks.teeth.along: b is a point of second, not of bar; take a point that bar or no member carries"),
    ],
)  # fmt: skip
def test_one_fault(old: str, new: str, line: int, says: str) -> None:
    assert GOOD.count(old) == 1
    with pytest.raises(Faults) as raised:
        parse(GOOD.replace(old, new), "gripper.toml")
    told = [str(fault) for fault in raised.value.faults]
    assert told[0] == f"gripper.toml:{line}: {says}"
    assert len(told) == (2 if '["Q", "P"]' in new else 1)  # there the other centre is the wrong one too
