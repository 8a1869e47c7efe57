"""What may be wrong with a rope, told with file, line, item, what is wrong and what would be right."""

from __future__ import annotations

import pytest

from linkcalc.faults import Faults
from linkcalc.model.read import parse

GOOD = """
[points]
T = [30, 300]
B = [0, 0]
dead = [-20, 300]
lead = [40, 100]
[members]
ground = ["T", "dead", "lead"]
block = ["B"]
[slides.ways]
member = "block"
along = 90
[ropes.fall]
path = ["dead", { pulley = "B", radius = 20, wrap = "right" }, { pulley = "T", radius = 10, wrap = "left" }, "lead"]
end = "hauling"
[effort]
haul = "fall"
[load]
mass_at = "B"
mass = 10
"""
PATH = GOOD.splitlines().index("[ropes.fall]") + 2
END = PATH + 1


def test_the_sample_has_none() -> None:
    parse(GOOD)


@pytest.mark.parametrize(
    ("old", "new", "line", "says"),
    [
        ("T = [30, 300]", "T = [34, 108]", PATH,
         "ropes.fall.path: lead lies within the pulley at T: 10 mm from its centre; "
         "more than its radius of 10 mm is wanted"),
        ("T = [30, 300]", "T = [0, 5]", PATH,
         "ropes.fall.path: pulleys B and T overlap: the centres are 5 mm apart; more than 30 mm is wanted"),
        ("lead = [40, 100]", "lead = [0, 500]", PATH,
         "ropes.fall.path: it crosses the pulley at T, and would go round it by 354 deg; "
         "wrap = 'right' is wanted there"),
        ("dead = [-20, 300]", "dead = [60, 500]", PATH,
         "ropes.fall.path: from dead to B it crosses the pulley at T; "
         "another order, another side or a smaller pulley is wanted"),
        (', "lead"]\nend', "]\nend", PATH,
         "ropes.fall.path: the rope has one end only: it ends at the pulley at T; "
         "a point or drum is wanted at both ends"),
        ('["dead", ', "[", PATH,
         "ropes.fall.path: the rope has one end only: it begins at the pulley at B; "
         "a point or drum is wanted at both ends"),
        ('["dead", {', '["dead", "lead", {', PATH,
         "ropes.fall.path: lead is an end in the middle of the rope; "
         '{ pulley = "lead", radius = 30, wrap = "left" } is wanted between the ends'),
        ("radius = 10", "radius = -10", PATH,
         "ropes.fall.path.3.radius: -10 mm cannot stand here; nothing or more is wanted"),
        ('pulley = "B"', 'pulley = "b"', PATH, "ropes.fall.path.2.pulley: unknown point 'b'; did you mean 'B'?"),
        ('wrap = "left"', 'wrap = "lft"', PATH,
         "ropes.fall.path.3.wrap: 'lft' is not known here; one of 'left', 'right'"),
        ('"lead"]\nend', '"leed"]\nend', PATH, "ropes.fall.path.4.point: unknown point 'leed'; did you mean 'lead'?"),
        ('"T", "dead"', '"T"', PATH, "ropes.fall.path.1: no member carries dead; name dead in a member"),
        ('"lead"]\nend', '{ point = "lead", on = "block" }]\nend', PATH,
         "ropes.fall.path.4.on: block does not carry lead; ground, or left out is wanted"),
        ('haul = "fall"', 'haul = "fal"', END + 2, "effort.haul: unknown rope 'fal'; did you mean 'fall'?"),
        ('end = "hauling"\n', "", END + 1,
         'effort.haul: fall has no hauling end: both are made fast; end = "hauling" is wanted in [ropes.fall]'),
        ('haul = "fall"', 'at = "B"\ndirection = 90', END,
         "ropes.fall.end: nothing pulls at its hauling end; "
         'an effort or load with haul = "fall" is wanted, or end = "dead"'),
        ("radius = 10,", "radius = 10, efficiency = 1.2,", PATH,
         "ropes.fall.path.3.efficiency: 1.2 cannot stand here; more than nothing, up to 1, is wanted"),
        ("radius = 10,", "radius = 10, efficiency = 0,", PATH,
         "ropes.fall.path.3.efficiency: 0 cannot stand here; more than nothing, up to 1, is wanted"),
        ("radius = 10,", "radius = 10, friction = -0.1,", PATH,
         "ropes.fall.path.3.friction: -0.1 cannot stand here; nothing or more is wanted"),
        ("radius = 10,", "radius = 10, friction = 0.1, efficiency = 0.9,", PATH,
         "ropes.fall.path.3.friction: 'efficiency' and 'friction' are two ways to tell its friction; "
         "one of them is wanted"),
        ("radius = 10,", "radius = 10, turns = 2,", PATH,
         "ropes.fall.path.3.turns: it goes with 'friction' only; "
         "a rope is wound round a post that does not turn"),
        ("radius = 10,", "radius = 10, friction = 0.1, turns = -1,", PATH,
         "ropes.fall.path.3.turns: -1 cannot stand here; nothing or more is wanted"),
        ("radius = 10,", "radius = 10, pin_friction = 0.1,", PATH,
         "ropes.fall.path.3.pin_friction: it goes with 'pin_diameter'; both are wanted, or neither"),
        ("radius = 10,", "radius = 10, pin_diameter = 4,", PATH,
         "ropes.fall.path.3.pin_diameter: it goes with 'pin_friction'; both are wanted, or neither"),
        ("radius = 10,", "radius = 10, friction_radius = 10,", PATH,
         "ropes.fall.path.3.friction_radius: the pin's friction circle of 10 mm is no smaller than the pulley; "
         "less than its radius of 10 mm is wanted"),
        ("radius = 10,", "radius = 10, pin_friction = 1, pin_diameter = 40,", PATH,
         "ropes.fall.path.3.pin_diameter: the pin's friction circle of 14.14 mm is no smaller than the pulley; "
         "less than its radius of 10 mm is wanted"),
        ("mass = 10", "mass = 10\n[friction]\nsheave_efficiency = 1.1", END + 7,
         "friction.sheave_efficiency: 1.1 cannot stand here; more than nothing, up to 1, is wanted"),
        ("mass = 10", "mass = 10\n[friction]\nsheave_efficiency = 0", END + 7,
         "friction.sheave_efficiency: 0 cannot stand here; more than nothing, up to 1, is wanted"),
        ("mass = 10", "mass = 10\n[friction]\npins = -0.1", END + 7,
         "friction.pins: -0.1 cannot stand here; nothing or more is wanted"),
        ("mass = 10", "mass = 10\n[pins.B]\nfriction_radius = -2", END + 7,
         "pins.B.friction_radius: -2 mm cannot stand here; nothing or more is wanted"),
        ("mass = 10", 'mass = 10\n[requirements]\nx = "first tension of fal <= 3 kN"', END + 7,
         "requirements.x: unknown rope 'fal'; did you mean 'fall'?"),
        ("[ropes.fall]", "[ropes.block]", PATH - 1, "ropes.block: 'block' is a member already; another name is wanted"),
    ],
)  # fmt: skip
def test_one_fault(old: str, new: str, line: int, says: str) -> None:
    assert GOOD.count(old) == 1
    text = GOOD.replace(old, new)
    if "ropes.block" in new:
        text = text.replace('haul = "fall"', 'haul = "block"')
    with pytest.raises(Faults) as raised:
        parse(text, "hoist.toml")
    assert [str(fault) for fault in raised.value.faults] == [f"hoist.toml:{line}: {says}"]


def test_a_path_that_is_no_path() -> None:
    wanted = (
        'both ends and the pulleys between are wanted, e.g. ["A", { pulley = "P", radius = 30, wrap = "left" }, "B"]'
    )
    for path, what in (('"dead"', "'dead' is no list"), ('["dead"]', "a list of 1")):
        text = "\n".join(f"path = {path}" if line.startswith("path") else line for line in GOOD.splitlines())
        with pytest.raises(Faults) as raised:
            parse(text, "hoist.toml")
        assert str(raised.value.faults[0]) == f"hoist.toml:{PATH}: ropes.fall.path: {what}; {wanted}"
