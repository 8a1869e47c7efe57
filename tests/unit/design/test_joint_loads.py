"""What joints must carry, where it is a formula: worst, directions, swing, mean load, foundation, roses."""

from __future__ import annotations

from math import cos, degrees, pi, radians, sin

import numpy as np
import pytest

from linkcalc import parse, pins, stroke
from linkcalc.design.pins_answer import PinsAnswer, Swing
from linkcalc.faults import Faults
from tests.samples import CLAMP
from tests.unit.design.models import FOUR_BAR, LEVER, PRESS

TINY = 1e-9


def asked(text: str, **more: object) -> PinsAnswer:
    return pins(parse(text), **more)  # type: ignore[arg-type]


def swing(answer: PinsAnswer, joint: str, kind: str = "angle") -> Swing:
    (found,) = [s for s in answer.joint(joint).swings if s.kind == kind]
    return found


PARALLEL = """
[points]
A = [0, 0]
D = [100, 0]
B = [0, 40]
C = [100, 40]
[members]
ground = ["A", "D"]
crank = ["A", "B"]
coupler = ["B", "C"]
rocker = ["D", "C"]
[effort]
torque_on = "crank"
[load]
at = "C"
on = "rocker"
square_to = ["D", "C"]
size = 100
[stroke]
turn = "crank"
from = 40
to = 140
poses = 61
"""
"""A parallelogram: every pin turns as far as the crank does. The load is square to the rocker, so that the coupler,
which stays level, carries -100 / sin a at the crank's angle a."""


def test_pins_of_a_parallelogram_swing_as_far_as_the_crank() -> None:
    answer = asked(PARALLEL)
    for joint in "ABCD":
        assert swing(answer, joint).reach == pytest.approx(radians(100), abs=TINY)
        assert swing(answer, joint).path == pytest.approx(radians(100), abs=TINY)
        assert swing(answer, joint).turns == ()


def test_a_pin_that_turns_back_sweeps_more_than_it_swings() -> None:
    """Four-bar, once round: the rocker goes to and fro between the poses where crank and coupler lie in line.

    By the cosine law at D with a base of 100, a crank of 30, a coupler of 90, a rocker of 70: B C in line gives the
    far end at 120 and the near end at 60 from A.
    """
    answer = asked(FOUR_BAR)
    far, near = (np.arccos((100**2 + 70**2 - r**2) / (2 * 100 * 70)) for r in (120, 60))
    rocker = swing(answer, "D")
    assert rocker.reach == pytest.approx(far - near, rel=1e-12)
    assert rocker.path == pytest.approx(2 * (far - near), rel=1e-12)
    assert len(rocker.turns) == 2
    # the coupler turns whole turns against the crank
    assert swing(answer, "B").reach == pytest.approx(2 * pi, abs=1e-9)
    assert swing(answer, "A").path == pytest.approx(2 * pi, abs=1e-9)
    assert answer.rounds


def test_the_worst_lies_between_the_poses_with_its_direction() -> None:
    """Lever of two arms, effort square to it: the pin carries 600 N down and the effort 200 cos a at a - 90 deg.

    F² = 600² + (200 cos a)² + 2 x 600 x 200 cos² a = 360 000 + 280 000 cos² a: largest at a = 0, which the stroke from
    -17 to 26 deg in 12 poses has not among them.
    """
    answer = asked(LEVER.replace("from = 10\nto = 70\nposes = 13", "from = -17\nto = 26\nposes = 12"))
    worst = answer.joint("A").largest
    assert worst.value == pytest.approx(800.0, rel=1e-12)
    assert degrees(worst.drive) == pytest.approx(0.0, abs=1e-5)
    lever, ground = (next(f for f in worst.felt if f.member == m) for m in ("lever", "ground"))
    # the ground holds the lever up
    assert degrees(lever.direction) == pytest.approx(90.0, abs=1e-5)
    assert degrees(ground.direction) == pytest.approx(-90.0, abs=1e-5)
    # own axis of the lever: hook to hand, along the stroke's angle
    assert degrees(lever.own_direction) == pytest.approx(90.0, abs=1e-5)


def test_stroke_tells_the_direction_in_the_exact_pose_too() -> None:
    """The same lever with poses 43/11 degrees apart: the nearest one would be off by up to 2 degrees."""
    answer = stroke(parse(LEVER.replace("from = 10\nto = 70\nposes = 13", "from = -17\nto = 26\nposes = 12")), poses=12)
    (event,) = [e for e in answer.events if (e.kind, e.quantity) == ("largest", "force at A")]
    (lever,) = [f for f in event.felt if f.member == "lever"]
    assert (lever.force, degrees(lever.direction)) == pytest.approx((800.0, 90.0), rel=1e-6)


def test_the_mean_of_a_steady_load_is_the_load() -> None:
    """A weight hung on a crank that is held by a torque: the pin carries the weight all the way round."""
    text = """
[points]
A = [0, 0]
B = [50, 0]
[members]
ground = ["A"]
crank = ["A", "B"]
[effort]
torque_on = "crank"
[load]
at = "B"
direction = -90
size = 250
[stroke]
turn = "crank"
from = 0
to = 200
"""
    answer = asked(text)
    assert swing(answer, "A").mean_load == pytest.approx(250, rel=1e-12)
    assert answer.joint("A").largest.value == answer.joint("A").smallest.value == pytest.approx(250, rel=1e-12)


def test_the_root_mean_cube_of_a_load_that_varies() -> None:
    """In the parallelogram the coupler carries 100/sin a; its cube over the turn from 40 to 140 degrees in closed form:
    the integral of 1/sin³ a is (ln tan(a/2) - cos a/sin² a)/2."""

    def whole(a: float) -> float:
        return (np.log(np.tan(a / 2)) - cos(a) / sin(a) ** 2) / 2

    a, b = radians(40), radians(140)
    expected = 100 * ((whole(b) - whole(a)) / (b - a)) ** (1 / 3)
    for joint in "AB":
        assert swing(asked(PARALLEL), joint).mean_load == pytest.approx(expected, rel=1e-6)


def test_path_and_speed_of_rubbing() -> None:
    """100 degrees on a pin of 20 mm: 10 mm x 1.745 rad; in 3 s there and back that takes 1.5 s one way, evenly."""
    answer = asked(PARALLEL, diameters={"A": 0.02}, rate=20 / 60)
    one = swing(answer, "A")
    assert answer.time == pytest.approx(1.5)
    assert one.way == pytest.approx(0.01 * radians(100), rel=1e-12)
    assert one.speed == pytest.approx(one.way / 1.5, rel=1e-9)
    assert one.mean_speed == pytest.approx(one.way / 1.5, rel=1e-12)
    assert np.isnan(swing(answer, "B").way)


def test_a_stroke_all_the_way_round_is_not_gone_back() -> None:
    """20 turns a minute: 3 s a turn; a pin of 12 mm in the crank then rubs at 6 mm x 2 pi/3 s."""
    answer = asked(FOUR_BAR, diameters=0.012, rate=20 / 60)
    assert answer.time == pytest.approx(3.0)
    assert swing(answer, "A").speed == pytest.approx(0.006 * 2 * pi / 3, rel=1e-9)


def test_diameters_of_the_model_come_before_the_one_for_all() -> None:
    text = PARALLEL + "[pins.B]\ndiameter = 16\n"
    answer = asked(text, diameters=0.02)
    assert [answer.joint(j).diameter for j in "AB"] == pytest.approx([0.02, 0.016])
    assert asked(text, diameters={"B": 0.03}).joint("B").diameter == pytest.approx(0.03)


def test_largest_speed_is_that_of_the_geometry() -> None:
    """Toggle of two equal links: the knee turns by twice the crank, the ram slides at 2 L sin a for each radian."""
    answer = asked(PRESS)
    assert swing(answer, "B").fastest == pytest.approx(2.0, rel=1e-12)
    slide = swing(answer, "way", "length")
    assert slide.fastest == pytest.approx(0.2 * sin(radians(60)), rel=1e-9)
    assert slide.reach == pytest.approx(0.2 * (cos(radians(5)) - cos(radians(60))), rel=1e-12)


def test_the_load_on_a_two_force_member_stays_on_its_own_axis() -> None:
    """The lower link of the toggle is pressed throughout: B pushes along its axis, from its first point to its last."""
    (side,) = [s for s in asked(PRESS).joint("B").sides if s.member == "lower"]
    assert side.rose is not None and side.rose.free is not None
    assert degrees(side.rose.free_angle) == pytest.approx(360.0, abs=1e-6)
    assert np.flatnonzero(side.rose.sectors).tolist() == [0]


def test_the_rose_is_in_the_axes_of_the_member() -> None:
    """A bob on a pendulum that is swung by a torque: in ground axes its pull at the pin never turns, seen from the
    pendulum it does, by as much as that turns."""
    text = """
[points]
A = [0, 0]
B = [0, -80]
[members]
ground = ["A"]
arm = ["A", "B"]
[effort]
torque_on = "arm"
[load]
at = "B"
direction = -90
size = 40
[stroke]
turn = "arm"
from = -150
to = -60
"""
    arm, ground = asked(text).joint("A").sides
    assert (arm.member, ground.member) == ("arm", "ground")
    assert degrees(ground.rose.free_angle) == pytest.approx(360.0, abs=1e-6)  # type: ignore[union-attr]
    # the pin holds the arm up: 90 degrees in ground axes, from 240 down to 150 in those of the arm
    begin, end = np.degrees(arm.rose.free)  # type: ignore[union-attr]
    assert (begin % 360, end % 360) == pytest.approx((240.0, 150.0), abs=1e-6)


def test_a_force_through_nothing_points_both_ways_only() -> None:
    """The strut of a lever that is loaded past its balance is pulled, then pushed: two directions in its axes."""
    text = """
[points]
A = [0, 0]
P = [60, 0]
E = [100, 0]
G = [60, -150]
[members]
ground = ["A", "G"]
beam = ["A", "P", "E"]
strut = ["G", "P"]
[load]
at = "E"
direction = -90
size = 30
[cases.down]
[cases.up]
scale = { load = -1 }
"""
    (strut,) = [s for s in asked(text).joint("P").sides if s.member == "strut"]
    assert (np.flatnonzero(strut.rose.sectors) * 10).tolist() == [0, 180]  # type: ignore[union-attr]
    assert degrees(strut.rose.free_angle) == pytest.approx(180.0, abs=1e-6)  # type: ignore[union-attr]


def test_the_foundation_bears_what_acts_from_outside() -> None:
    """The resultant on the ground is that of hand and hook, its moment about A theirs: 600 x 0.1 cos a on one side,
    200 cos a x 0.3 on the other, which cancel."""
    answer = asked(LEVER)
    foot = answer.footing
    assert foot is not None
    assert foot.force.value == pytest.approx(answer.joint("A").largest.value, rel=1e-12)
    assert abs(foot.left_turning.value) < 1e-9 and abs(foot.right_turning.value) < 1e-9
    about_left = asked(LEVER, about=(-0.5, 0.0)).footing
    assert about_left is not None
    # all of it 0.5 m to the right of that point: clockwise, largest where most of it is plumb
    a = radians(10)
    assert about_left.right_turning.value == pytest.approx(0.5 * (600 + 200 * cos(a) * cos(a)), rel=1e-9)


def test_a_motor_on_the_frame_turns_it_back() -> None:
    """A torque against the ground is part of what the ground feels: in all, the weight about the point and no more."""
    text = """
[points]
A = [0, 0]
B = [200, 0]
[members]
ground = ["A"]
arm = ["A", "B"]
[effort]
torque_on = "arm"
[load]
at = "B"
direction = -90
size = 50
[stroke]
turn = "arm"
from = 0
to = 60
"""
    foot = asked(text).footing
    assert foot is not None
    assert foot.right_turning.value == pytest.approx(50 * 0.2, rel=1e-9)
    assert foot.down.value == pytest.approx(50, rel=1e-9)
    assert foot.up.value < 0


def test_a_frame_has_directions_and_roses_but_no_swing() -> None:
    """Bracket: a bar of 400 with a tie of 500, 900 N at its end: tie 1500, bar 1200."""
    text = """
[points]
A = [0, 0]
B = [0, 300]
C = [400, 0]
[members]
ground = ["A", "B"]
bar = ["A", "C"]
tie = ["B", "C"]
[load]
at = "C"
on = "bar"
direction = -90
size = 900
"""
    answer = asked(text)
    tie = answer.joint("B").largest
    assert tie.value == pytest.approx(1500)
    assert degrees(next(f for f in tie.felt if f.member == "tie").own_direction) == pytest.approx(180.0)
    assert answer.joint("B").swings == ()
    assert np.isnan(tie.drive)


def test_friction_counts_in_both_senses() -> None:
    """A guide of the toggle that rubs presses harder one way: the worst is that of the stroke's own cases."""
    text = PRESS + "[friction]\nslots = 0.2\n"
    answer, judge = asked(text), stroke(parse(text), poses=2001)
    assert set(judge.cases) == {"forward", "back"}
    for joint in answer.joints:
        assert joint.largest.value >= np.nanmax(judge.joint_force(joint.joint)) * (1 - 1e-12)
        case = judge.cases.index(joint.largest.case)
        assert joint.largest.value == pytest.approx(np.nanmax(judge.joint_force(joint.joint)[case]), rel=1e-6)


def test_a_slot_is_told_where_it_bears_on_its_other_side() -> None:
    """A level beam on a roller at 100 with a load that a slider carries along it from 150 to -50 about the pivot A:
    the roller is lifted where the load passes the pivot."""
    text = """
[points]
A = [0, 0]
R = [100, 0]
S = [150, 0]
[members]
ground = ["A"]
beam = ["A", "R"]
shoe = ["S"]
[slots.roller]
point = "R"
along = 0
[slides.way]
member = "shoe"
on = "beam"
along = ["A", "R"]
[effort]
at = "S"
on = "shoe"
direction = 180
[loads.burden]
at = "S"
on = "shoe"
direction = -90
size = 70
[loads.drag]
at = "S"
on = "shoe"
direction = 0
size = 5
[stroke]
travel = "way"
from = 150
to = -50
"""
    answer = asked(text)
    (turn,) = answer.joint("roller").reversals
    assert turn.of == "roller"
    assert turn.drive == pytest.approx(0.0, abs=1e-9)


def test_the_worst_of_copies_is_exact_on_the_copy() -> None:
    """A longer arm of the load's lever: copies of 100, 103 and 95 mm; the pin carries most with the longest."""
    text = LEVER.replace("distance = 100", 'distance = "arm"') + "[dimensions]\narm = { size = 100, tol = 5 }\n"
    answer = asked(text, sizes={"arm": np.array([0.1, 0.103, 0.095])})
    longest = asked(text.replace("size = 100, tol", "size = 103, tol")).joint("A")
    worst = answer.joint("A").largest
    assert worst.variant == 1
    assert worst.value == pytest.approx(longest.largest.value, rel=1e-12)
    assert worst.felt[0].direction == pytest.approx(longest.largest.felt[0].direction, abs=1e-9)
    assert answer.joint("A").smallest.variant == 2
    assert answer.variants == 3


def test_worst_of_many_cases_is_the_worst_of_each() -> None:
    cases = "".join(f"[cases.c{k}]\nscale = {{ load = {0.3 + 0.1 * k} }}\n" for k in range(8))
    answer = asked(FOUR_BAR + cases)
    for joint in answer.joints:
        each = [pins(parse(FOUR_BAR + cases), case=f"c{k}").joint(joint.joint).largest.value for k in (0, 7)]
        assert joint.largest.value == pytest.approx(max(each), rel=1e-10)
        assert joint.largest.case == ("c0", "c7")[int(np.argmax(each))]


def test_at_a_dead_point_the_force_has_no_bound_but_a_direction() -> None:
    """The toggle pressed through its dead point by the load: links are pressed without bound along their line."""
    text = (
        PRESS.replace("to = 5", "to = -5")
        .replace("size = 1000", "")
        .replace(
            '[effort]\nat = "B"\non = "upper"\ndirection = -90',
            '[effort]\nat = "B"\non = "upper"\ndirection = -90\nsize = 10',
        )
    )
    worst = asked(text).joint("A").largest
    assert np.isinf(worst.value)
    assert worst.drive == pytest.approx(0.0, abs=1e-9)
    (upper,) = [f for f in worst.felt if f.member == "upper"]
    assert abs(sin(upper.direction)) < 1e-3


@pytest.mark.parametrize(
    ("more", "says"),
    [
        ({"time": 1.0, "rate": 1.0}, "both a time and a rate of the stroke; give one of them"),
        ({"rate": 0.0}, "a stroke cannot have a time or rate of 0; more than 0 is wanted"),
        ({"about": "Q"}, "unknown point 'Q'; known: A, B, C, foot"),
        ({"diameters": {"Q": 0.01}}, "there is no pin 'Q'; known: A, B"),
        ({"diameters": -1.0}, "a pin cannot have a diameter of -1 m; more than 0 is wanted"),
        ({"sizes": {"arm": np.ones(2)}}, "dimensions.arm: there is no such dimension; there are none"),
    ],
)
def test_bad_questions(more: dict[str, object], says: str) -> None:
    with pytest.raises(Faults) as told:
        asked(PRESS, **more)
    assert [str(f) for f in told.value.faults] == [says]


def test_a_frame_has_no_time() -> None:
    with pytest.raises(Faults, match="the model has no stroke"):
        asked("points.A=[0,0]\npoints.B=[9,0]\nmembers.ground=['A']\nmembers.m=['A','B']\n"
              "welds.w={members=['m','ground'],at='A'}\nload={at='B',direction=-90,size=1}\n", time=1.0)  # fmt: skip


def test_names_are_told_where_a_joint_is_unknown() -> None:
    with pytest.raises(KeyError, match="no joint X; known: A, B"):
        asked(PRESS).joint("X")


def test_free_members_have_poses_of_their_own_in_each_case() -> None:
    """A clamp whose screw settles on the work: worst forces and directions are those of the case's own pose."""
    model = parse(CLAMP)
    answer = pins(model)
    fine = stroke(model, poses=401)
    assert answer.stroke.loose
    for joint in answer.joints:
        seen = fine.joint_force(joint.joint)
        assert joint.largest.value >= np.nanmax(seen) * (1 - 1e-9)
        assert joint.largest.value == pytest.approx(np.nanmax(seen), rel=1e-3, abs=1e-9)
        # a direction in ground axes is that in the member's, turned with the member as it stands there
        for felt in joint.largest.felt:
            if felt.member == "ground" and np.isfinite(felt.direction):
                assert felt.own_direction == felt.direction
