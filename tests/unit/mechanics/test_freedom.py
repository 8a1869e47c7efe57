"""Degrees of freedom: counted, judged by rank, and told in names a designer can act on."""

from __future__ import annotations

import pytest

from linkcalc import Faults, parse, stroke
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.freedom import Freedom, freedom
from linkcalc.model.sketch import Drawing
from linkcalc.parts.pose import Poses


def found(text: str) -> tuple[Freedom, list[str]]:
    """Mobility of the joints of a model in its drawing pose, and the names of those that can move."""
    drawing = Drawing(parse(text))
    moving = len(drawing.members) - 1
    chain = Chain(moving, drawing.joints, None, drawing.size)
    x, y = ([0.0, *(float(o[i]) for o in drawing.origins[1:])] for i in (0, 1))
    seen = freedom(chain, Poses(x, y, [1.0] * (moving + 1), [0.0] * (moving + 1)))
    return seen, [drawing.members[k] for k in seen.movers]


def refused(text: str) -> str:
    with pytest.raises(Faults) as faults:
        stroke(parse(text))
    assert faults.value.faults, "a refusal without a word"
    return str(faults.value)


FOUR_BAR = """
[points]
A = [0, 0]
D = [100, 0]
B = [15, 26]
C = [90, 69]
[members]
ground = ["A", "D"]
crank = ["A", "B"]
coupler = ["B", "C"]
rocker = ["D", "C"]
"""
EFFORT = '[effort]\ntorque_on = "crank"\n'
LOAD = '[load]\nat = "C"\ndirection = -90\nsize = 10\n'
ON_LEFT = '[load]\nat = "B"\non = "left"\ndirection = -90\nsize = 10\n'

PARALLEL = """
[points]
A = [0, 0]
D = [100, 0]
G = [60, 20]
B = { from = "A", distance = 40, angle = 70 }
C = { from = "D", distance = 40, angle = 70 }
H = { from = "G", distance = 40, angle = 70 }
[members]
ground = ["A", "D", "G"]
crank = ["A", "B"]
bar = ["B", "C", "H"]
second = ["D", "C"]
third = ["G", "H"]
"""
"""Three equal cranks in parallel: by counting it cannot move, yet it does, in every pose."""

STRAIGHT = """
[points]
A = [0, 0]
B = [100, 0]
C = [220, 0]
[members]
ground = ["A", "C"]
left = ["A", "B"]
right = ["B", "C"]
"""
"""Two bars in line between fixed pins: they can bow a little in that pose, and in no other."""

LOOSE = STRAIGHT.replace('["A", "C"]', '["A"]')


@pytest.mark.parametrize(
    ("text", "counted", "free", "excess", "movers"),
    [
        (FOUR_BAR, 1, 1, 0, ["crank", "coupler", "rocker"]),
        (FOUR_BAR + '[welds.w]\nmembers = ["crank", "ground"]\nat = "A"\n', 0, 0, 0, []),
        (PARALLEL, 0, 1, 1, ["crank", "bar", "second", "third"]),
        (STRAIGHT, 0, 1, 1, ["left", "right"]),
        (STRAIGHT.replace("[100, 0]", "[100, 30]"), 0, 0, 0, []),
        (LOOSE, 2, 2, 0, ["left", "right"]),
        (FOUR_BAR + '[slots.level]\npoint = "C"\nalong = 0\n', 0, 0, 0, []),
    ],
    ids=["four-bar", "crank built in", "three parallel", "in line", "not in line", "loose end", "slotted too"],
)  # fmt: skip
def test_mobility(text: str, counted: int, free: int, excess: int, movers: list[str]) -> None:
    seen, names = found(text)
    assert (seen.counted, seen.free, seen.excess) == (counted, free, excess)
    assert names == movers
    assert bool(seen.repeated) == (excess > 0)


def test_only_those_that_can_move_are_named() -> None:
    """A four-bar that is held, and a pendulum beside it that is not."""
    text = FOUR_BAR.replace("[members]", "P = [40, -20]\n[members]\npendulum = ['A', 'P']")
    held = text + '[welds.w]\nmembers = ["crank", "ground"]\nat = "A"\n'
    assert found(held)[1] == ["pendulum"]


def test_only_the_joints_that_repeat_each_other_are_named() -> None:
    """A panel with both diagonals is held once too often; the arm that swings beside it has no part in that."""
    text = """
[points]
A = [0, 0]
B = [50, 0]
C = [50, 80]
D = [0, 80]
P = [-40, 10]
[members]
ground = ["A", "B"]
plate = ["C", "D"]
a = ["A", "D"]
b = ["B", "C"]
diagonal = ["A", "C"]
other_diagonal = ["B", "D"]
arm = ["A", "P"]
"""
    seen, names = found(text)
    assert (seen.free, seen.excess) == (1, 1)
    assert names == ["arm"]
    assert set(seen.repeated) == {"A", "B", "C", "D"}


@pytest.mark.parametrize(
    ("text", "special"),
    [(STRAIGHT, True), (PARALLEL, False), (STRAIGHT.replace("[100, 0]", "[100, 30]"), False)],
    ids=["bars in line", "three parallel", "sound"],
)
def test_an_excess_of_one_pose_only_is_told_from_a_lasting_one(text: str, special: bool) -> None:
    assert found(text)[0].special == special


@pytest.mark.parametrize("unit", ["um", "mm", "km"])
def test_mobility_does_not_hang_on_how_large_the_drawing_is(unit: str) -> None:
    seen, _ = found(f'[units]\nlength = "{unit}"\n' + PARALLEL)
    assert (seen.free, seen.excess, seen.special) == (1, 1, False)


# what the designer is told


def test_too_many_freedoms() -> None:
    chain = FOUR_BAR.replace("[members]", "E = [160, 40]\n[members]").replace('"D", "C"]', '"C", "E"]')
    text = refused(chain + EFFORT + LOAD + '[stroke]\nturn = "crank"\nto = 90\n')
    assert "3 degrees of freedom, of which the stroke takes one: crank, coupler, rocker can move" in text
    assert "hold them by 2 more" in text


def test_a_frame_that_can_move() -> None:
    text = refused(FOUR_BAR + LOAD)
    assert "1 degree of freedom: crank, coupler, rocker can move" in text
    assert "give the model an [effort], or hold them by 1 more" in text


def test_held_more_than_needed() -> None:
    braced = STRAIGHT.replace("[100, 0]", "[100, 30]") + '[welds.w]\nmembers = ["left", "ground"]\nat = "A"\n'
    text = refused(braced + ON_LEFT + '[effort]\ntorque_on = "left"\n')
    assert "held 1 time more than needed, among joints B, C, w" in text


def test_nothing_can_move() -> None:
    frame = STRAIGHT.replace("[100, 0]", "[100, 30]")
    text = refused(frame + '[effort]\nat = "B"\ndirection = 90\n' + ON_LEFT)
    assert "nothing can move, yet the effort wants one degree of freedom" in text


def test_a_special_pose() -> None:
    text = refused(STRAIGHT + ON_LEFT)
    assert "the drawing pose is a special one: joints A, B, C line up there" in text
    assert "draw it a little off that pose" in text


def test_an_excess_that_does_not_last_names_its_joints() -> None:
    third = PARALLEL.replace('"G", distance = 40', '"G", distance = 41')
    text = refused(third + EFFORT + LOAD + '[stroke]\nturn = "crank"\nto = 90\n')
    assert "held 1 time more than needed" in text
    assert all(f" {pin}" in text for pin in "ABCDGH")


def test_drawn_in_a_dead_point_of_the_drive() -> None:
    """A crank and rod in line, driven by the slide: neither way is the one."""
    text = refused("""
[points]
A = [0, 0]
B = [40, 0]
C = [140, 0]
[members]
ground = ["A"]
crank = ["A", "B"]
rod = ["B", "C"]
[slots.guide]
point = "C"
along = 0
[effort]
torque_on = "crank"
[load]
at = "C"
direction = 180
size = 10
[stroke]
travel = "guide"
to = 5
""")
    assert "stroke.travel: cannot be driven from the drawing pose, which is a dead point of this coordinate" in text


def test_what_is_refused_does_not_hang_on_what_was_solved_before() -> None:
    """A plan of elimination made for the sound frame fits the straight one, too."""
    sound, straight = STRAIGHT.replace("[100, 0]", "[100, 30]"), STRAIGHT
    first = refused(straight + ON_LEFT)
    assert not stroke(parse(sound + ON_LEFT)).status.any()
    assert refused(straight + ON_LEFT) == first


def test_a_mechanism_drawn_in_a_dead_point_of_its_effort_is_solved() -> None:
    """A toggle drawn straight, stepped by its crank: the effort is asked, and has no answer there."""
    text = """
[points]
A = [0, 0]
B = [80, 0]
C = [160, 0]
[members]
ground = ["A"]
first = ["A", "B"]
second = ["B", "C"]
[slots.guide]
point = "C"
along = 0
[effort]
at = "C"
direction = 180
[load]
torque_on = "first"
size = 3
[stroke]
turn = "first"
to = 20
poses = 5
"""
    answer = stroke(parse(text))
    assert answer.status[0, 0].tolist() == [4, 0, 0, 0, 0]
    assert any("at a dead point of the effort" in c.text for c in answer.caveats)
