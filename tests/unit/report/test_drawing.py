"""What is drawn is where the closed forms say, and what acts from outside balances."""

import math

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.faults import Faults
from linkcalc.model.sketch import Drawing
from linkcalc.parts.pose import Poses
from linkcalc.report.blocks import Drawing as Sheet
from linkcalc.report.blocks import Item
from linkcalc.report.drawing import draw_mechanism
from linkcalc.report.drawing_figure import drawing_figure
from linkcalc.report.free_body import free_body, free_body_table
from linkcalc.report.scene import Scene
from linkcalc.report.shapes import SHAPES
from linkcalc.words import kinds
from tests.unit.report.by_hand import lever, toggle


def _items(drawing, shape):
    return [item for item in drawing.items if item.shape == shape]


def test_members_are_drawn_along_their_points_in_the_pose_asked_for():
    drawing = draw_mechanism(toggle(), poses=(20, 56))
    a = math.radians(20)
    bars = {item.name: item.spots for item in _items(drawing, "bar") if item.tone == "plain"}
    assert set(bars) == {"crank", "link", "ram"}
    np.testing.assert_allclose(
        bars["link"], [(100 * math.cos(a), 100 * math.sin(a)), (200 * math.cos(a), 0)], atol=1e-9
    )
    np.testing.assert_allclose(bars["ram"][1], (200 * math.cos(a) + 60, 0), atol=1e-9)
    ghosts = [item for item in _items(drawing, "bar") if item.tone == "ghost"]
    assert len(ghosts) == 3
    assert drawing.unit == "mm"


def test_forces_point_the_way_they_push_with_their_size_beside_them():
    drawing = draw_mechanism(toggle(), poses=(0,), case=1)
    arrows = {item.name.split()[0]: item for item in _items(drawing, "arrow")}
    assert set(arrows) == {"effort", "load", "A", "guide"}
    np.testing.assert_allclose(arrows["effort"].along, (0, -1), atol=1e-12)
    np.testing.assert_allclose(arrows["load"].along, (-1, 0), atol=1e-12)
    # the ground pushes the crank up along the link, and holds the ram up
    np.testing.assert_allclose(arrows["A"].along, (math.cos(math.radians(30)), 0.5), atol=1e-12)
    np.testing.assert_allclose(arrows["guide"].along, (0, 1), atol=1e-12)
    assert arrows["A"].tone == "joint"
    assert arrows["load"].name == "load 1500 N"


@pytest.mark.parametrize("pose", [0, 20, 56])
@pytest.mark.parametrize("case", [0, 1])
def test_what_is_drawn_from_outside_balances(pose, case):
    drawing = draw_mechanism(toggle(), poses=(pose,), case=case)
    arrows = _items(drawing, "arrow")
    largest = max(np.hypot(*a.force) for a in Scene(toggle()).acting(pose, case))
    sums = np.zeros(3)
    sizes = {a.name.split()[0]: float(a.name.split()[1]) for a in arrows}
    for item in arrows:
        fx, fy = (sizes[item.name.split()[0]] * part for part in item.along)
        (x, y) = item.spots[0]
        sums += (fx, fy, (x * fy - y * fx) / 200)
    # sizes are read off the drawing, where they have four figures
    np.testing.assert_allclose(sums, 0, atol=1.5e-3 * largest)


@pytest.mark.parametrize("member", ["crank", "link", "ram"])
@pytest.mark.parametrize("pose", [0, 33, 56])
def test_every_member_cut_free_balances(member, pose):
    table = free_body_table(toggle(), member, pose=pose, case=1)
    assert table.rows[-1][0] == "sum"
    largest = max(abs(v) for row in table.rows for v in row[3:5])
    assert np.abs(table.rows[-1][3:]).max() < 1e-9 * largest


def test_a_force_that_does_not_balance_shows_in_the_sums():
    answer = toggle()
    force = answer.force.copy()
    force[answer.bearing("guide", "ram"), 1] += 10.0
    sums = free_body_table(type(answer)(**{**vars(answer), "force": force}), "ram").rows[-1]
    assert sums[4] == pytest.approx(10.0)


def test_the_table_of_a_free_body_can_be_checked_on_paper():
    table = free_body_table(lever((-30.0, 0.0, 30.0)), "lever", pose=1)
    rows = {row[0]: row[1:] for row in table.rows}
    assert rows["A"] == pytest.approx((4, 0, 0, 50 + 5 + 50 / 3, 4 * (50 + 5 + 50 / 3)), abs=1e-9)
    assert rows["effort"] == pytest.approx((16, 0, 0, -50 / 3, -16 * 50 / 3), abs=1e-9)
    assert rows["weight of lever"] == pytest.approx((4, 0, 0, -5, -20), abs=1e-9)
    assert [c.unit for c in table.columns] == ["", "in", "in", "lbf", "lbf", "in*lbf"]


def test_a_load_on_the_pin_itself_is_told_not_to_be_the_members():
    drawing = free_body(toggle(), "link")
    assert "effort acts on pin B itself" in drawing.caption
    assert not any("effort" in item.name for item in _items(drawing, "arrow"))


def test_a_guide_reaches_as_far_as_the_stroke_goes():
    (guide,) = _items(draw_mechanism(toggle(), poses=(20,)), "guide")
    ends = sorted(x for x, _ in guide.spots)
    assert ends == pytest.approx([200 * math.cos(math.radians(30)), 200 * math.cos(math.radians(2))])
    assert guide.tone == "ground"


def test_traces_follow_effort_and_load_or_the_points_asked_for():
    ways = _items(draw_mechanism(toggle()), "path")
    assert len(ways) == 2
    for x, y in ways[0].spots:
        assert math.hypot(x, y) == pytest.approx(100)
    (asked,) = _items(draw_mechanism(toggle(), traces=("C",)), "path")
    assert asked.spots[-1] == pytest.approx((200 * math.cos(math.radians(2)), 0), abs=1e-9)


@pytest.mark.parametrize(
    ("ask", "message"),
    [
        (lambda: draw_mechanism(toggle(), poses=(57,)), "numbered 0 to 56"),
        (lambda: draw_mechanism(toggle(lost=1), poses=(56,)), "no answer"),
        (lambda: draw_mechanism(toggle(), case=2), "no case 2"),
        (lambda: draw_mechanism(toggle(), traces=("noze",)), "did you mean 'nose'"),
        (lambda: free_body(toggle(), "lnik"), "did you mean 'link'"),
        (lambda: free_body(toggle(), "ground"), "no such member"),
    ],
)
def test_what_is_not_there_is_a_clear_fault(ask, message):
    with pytest.raises(Faults, match=message):
        ask()


TWO_SPOTS = ("bar", "stem", "path", "guide", "pair", "round of rope", "rope", "line of rope", "line of track", "spring",
             "gas spring", "ordinates", "constant spring", "cylinder", "screw", "force over length",
             "round of gear", "round of rack", "line of gear", "line of rack", "line of contact",
             "segment", "rim", "spread")  # fmt: skip
NAMED = ("bar", "pin", "slot", "slide", "weld", "point", "arrow", "couple", "rope", "track", "gear", "rack", "contact",
         "value", "remark")  # fmt: skip
STEM = """
[points]
A = [0, 0]
B = [100, 0]
up = [50, 20]
[members]
ground = ["A"]
bar = { points = ["A", "up", "B"], path = ["A", "B"] }
[effort]
at = "up"
direction = 0
[load]
at = "B"
direction = -90
size = 10
"""
EVERY_KIND = """
[points]
A = [0, 0]
B = [100, 0]
C = [200, 0]
D = [200, 100]
E = [300, 0]
F = [50, 90]
B2 = [100, 0]
G = [250, 100]
H = [350, 100]
[members]
ground = ["A", "D", "F"]
arm = { points = ["A", "B", "C"], mass = 1 }
rod = ["C", "E"]
stub = ["E", "D"]
[slots]
peg = { point = "B", along = 90, of = "arm" }
[ropes]
cord = { path = ["C", { pulley = "D", radius = 8, wrap = "right" }, "F"], end = "hauling" }
[tracks]
cam = { point = "B", arc = ["A", "B2", "F"], of = "arm" }
[gears]
teeth = { members = ["arm", "stub"], centres = ["B", "D"], radii = [70.7107, 70.7107] }
[racks]
bar = { pinion = "rod", centre = "E", radius = 100, along = ["G", "H"] }
[slides]
ram = { member = "rod", along = 0 }
[contacts]
pad = { point = "C", along = 0, stiffness = 50, side = "left", of = "arm" }
[welds]
root = { members = ["stub", "ground"], at = "D" }
[effort]
at = "B"
direction = 90
[load]
mass_at = "C"
mass = 2
[loads.twist]
torque_on = "arm"
size = 3
[loads.hand]
haul = "cord"
size = 4
[loads.spread]
between = ["A", "E"]
size = 5
[loads.pull]
at = "E"
along = ["A", "E"]
size = 5
[loads.bed]
spread = ["B", "C"]
intensity = 2
[loads.wheel]
moves_along = ["B", "C"]
direction = -80
size = 6
[loads.trolley]
mass_along = ["B", "C"]
mass = 6
[loads.coil]
spring = ["A", "E"]
rate = 1
preload = 2
[loads.coiled]
torsion_spring = "arm"
rate = 1
free_angle = 0
[loads.gas]
gas_spring = ["A", "E"]
force = 9
length = 400
stroke = 200
rise = 1.2
[loads.strip]
constant_spring = ["A", "E"]
pull = 3
[loads.press]
cylinder = ["A", "E"]
bore = 10
pressure = 1
[loads.spindle]
screw = ["A", "E"]
diameter = 10
lead = 2
friction = 0.1
size = 4
[loads.curve]
force_over = ["A", "E"]
formula = "1 N/mm*length"
[loads.twisted]
torque_over = "arm"
formula = "1 N*m/deg*angle"
"""


def test_every_kind_of_joint_and_load_has_its_shape():
    model = parse(EVERY_KIND)
    used = {type(part) for group in model.joints.values() for part in group.values()}
    assert used == set(kinds("joint").values())
    assert {type(p) for p in (model.effort, model.load, *model.loads.values())} == set(kinds("load").values())
    sketch = Drawing(model)
    n = len(sketch.members)
    at = Poses([x for x, _ in sketch.origins], [y for _, y in sketch.origins], [1.0] * n, [0.0] * n)
    marks = [part.mark(at) for part in (*sketch.joints, *sketch.pushers().values())]
    assert {mark.shape for mark in marks} <= set(SHAPES)


@pytest.mark.parametrize("shape", sorted(SHAPES))
def test_every_shape_leaves_ink_and_its_name_on_the_page(shape):
    frame = Item("path", ((0.0, 0.0), (100.0, 60.0)))
    spots = ((20.0, 30.0), (70.0, 30.0)) if shape in TWO_SPOTS else ((50.0, 30.0),)
    bare = drawing_figure(Sheet("sheet", "mm", (frame,)))
    full = drawing_figure(Sheet("sheet", "mm", (frame, Item(shape, spots, (1.0, 0.0), "name"))))
    inked = [sum(map(len, (ax.lines, ax.patches, ax.texts))) for ax in (bare.axes[0], full.axes[0])]
    # a force, a torque and a haul are their arrow and have no body besides
    assert (inked[1] > inked[0]) == (shape not in ("force", "torque", "haul", "torque over angle"))
    named = "name" in [t.get_text() for t in full.axes[0].texts]
    assert named == (shape in NAMED)


def test_the_footing_stands_clear_of_the_member_over_it():
    up = Item("bar", ((0.0, 0.0), (0.0, -80.0)), name="post")
    figure = drawing_figure(Sheet("sheet", "mm", (up, Item("footing", ((0.0, 0.0),)))))
    corners = figure.axes[0].patches[0].get_xy()
    assert corners[:, 1].max() > 1
    assert corners[:, 1].min() > -1


def test_a_point_beside_its_members_body_hangs_on_a_stem():
    answer = stroke(parse(STEM))
    stems = _items(draw_mechanism(answer), "stem")
    np.testing.assert_allclose(stems[0].spots, [(50, 0), (50, 20)], atol=1e-9)
