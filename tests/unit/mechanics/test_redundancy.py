"""Joints that hold more than needed: their forces against closed forms and a solution by least squares of our own."""

from __future__ import annotations

from dataclasses import replace
from itertools import permutations

import numpy as np
import pytest

from linkcalc import Faults, parse, stroke
from linkcalc.design.answer import StrokeAnswer
from linkcalc.mechanics.state import Status
from tests.property.resum import unbalanced
from tests.unit.mechanics.test_freedom import EFFORT, LOAD, ON_LEFT, PARALLEL, STRAIGHT, refused

STROKE = '[stroke]\nturn = "crank"\nfrom = 0\nto = 360\nposes = 25\n'

BEAM = """
[points]
A = [0, 0]
B = [400, 0]
C = [1000, 0]
D = [700, 0]
[members]
ground = ["A"]
beam = ["A", "B", "C", "D"]
[slots.middle]
point = "B"
along = 0
[slots.end]
point = "C"
along = 0
[loads.crate]
at = "D"
direction = -90
size = 900
"""
"""A stiff beam on three supports."""


def told(answer: StrokeAnswer, joint: str, member: str) -> np.ndarray:
    """(2) force of a joint on a member in the first case and pose."""
    return np.array(answer.force_on(joint, member)[:, 0, 0, 0])


@pytest.mark.parametrize("k", [(1.0, 1.0, 1.0), (80.0, 200.0, 35.0)], ids=["alike", "different"])
def test_a_stiff_beam_on_three_springs(k: tuple[float, float, float]) -> None:
    """A rigid beam sinks by u + t x, so each support takes k (u + t x): two equations for u and t."""
    given = "" if k == (1.0, 1.0, 1.0) else f"[pins.A]\nstiffness = {k[0]}\n"
    text = BEAM
    if given:
        text = BEAM.replace('point = "B"', f'point = "B"\nstiffness = {k[1]}')
        text = text.replace('point = "C"', f'point = "C"\nstiffness = {k[2]}') + given
    x, kk, load, at = np.array([0.0, 0.4, 1.0]), np.array(k), 900.0, 0.7
    matrix = np.array([[kk.sum(), kk @ x], [kk @ x, kk @ x**2]])
    u, t = np.linalg.solve(matrix, [load, load * at])
    wanted = kk * (u + t * x)
    answer = stroke(parse(text))
    found = [told(answer, joint, "beam")[1] for joint in ("A", "middle", "end")]
    assert found == pytest.approx(wanted, rel=1e-9)
    assert told(answer, "A", "beam")[0] == pytest.approx(0.0, abs=1e-9)
    assert max(unbalanced(answer).values()) < 1e-12


RAM = """
[points]
low = [0, 0]
high = [0, 120]
nose = [30, 200]
tail = [0, -60]
[members]
ground = []
ram = ["low", "high", "nose", "tail"]
[slides.lower]
member = "ram"
along = 90
at = "low"
[slides.upper]
member = "ram"
along = 90
at = "high"
[effort]
at = "tail"
direction = 90
[load]
at = "nose"
direction = 180
size = 100
[loads.work]
at = "nose"
on = "ram"
direction = -90
size = 400
[stroke]
travel = "lower"
to = 80
poses = 5
"""
"""A ram in two guides, 120 apart."""


@pytest.mark.parametrize("stiffness", [(1.0, 1.0), (30.0, 90.0)], ids=["alike", "different"])
def test_a_doubly_guided_slide(stiffness: tuple[float, float]) -> None:
    """The ram leans by u + t y: each guide gives k (u + t y) and, pressing at both its ends, k (l/2)² t."""
    lengths = (0.05, 0.07)
    text = RAM.replace('at = "low"', 'at = "low"\nlength = 50').replace('at = "high"', 'at = "high"\nlength = 70')
    if stiffness != (1.0, 1.0):
        text = text.replace("length = 50", f"length = 50\nstiffness = {stiffness[0]}")
        text = text.replace("length = 70", f"length = 70\nstiffness = {stiffness[1]}")
    k, y = np.array(stiffness), np.array([0.0, 0.12])
    turning = k * np.array(lengths) ** 2 / 4
    # about "low", counter-clockwise: 100 N to the left at (30, 200), 400 N down at (30, 200)
    side, moment = -100.0, 100.0 * 0.2 - 400.0 * 0.03
    # the guides hold against it: the sum of k (u + t y) is 100 to the right; a move to the right at y > 0 turns by -t
    matrix = np.array([[k.sum(), k @ y], [k @ y, k @ y**2 + turning.sum()]])
    u, t = np.linalg.solve(matrix, [-side, moment])
    answer = stroke(parse(text))
    for name, j in (("lower", 0), ("upper", 1)):
        force, turned = answer.force_on(name, "ram")[:, 0, 0], answer.moment_on(name, "ram")[0, 0]
        assert force[0] == pytest.approx(k[j] * (u + t * y[j]), rel=1e-9)
        assert turned == pytest.approx(-turning[j] * t, rel=1e-9)
    assert answer.effort[0, 0] == pytest.approx(400.0, rel=1e-12)
    assert answer.checks.virtual_work < 1e-12 and answer.checks.equilibrium < 1e-12
    assert max(unbalanced(answer).values()) < 1e-12


def test_a_stated_turning_stiffness_goes_before_the_length_of_the_guide() -> None:
    """As above, with what the length would give written out: 30 N/mm (25 mm)² = 18.75 N m/rad."""
    text = RAM.replace('at = "low"', 'at = "low"\nstiffness = 30\nlength = 50')
    text = text.replace('at = "high"', 'at = "high"\nstiffness = 30\nlength = 50')
    first = stroke(parse(text))
    second = stroke(parse(text.replace("length = 50", 'torsion_stiffness = "18.75 N*m/rad"')))
    assert second.moment == pytest.approx(first.moment, rel=1e-12)
    assert second.force == pytest.approx(first.force, rel=1e-12)


def test_two_slots_on_one_member_need_no_sharing() -> None:
    """Two points of a ram in one straight groove: a couple h apart, by the balance of moments alone."""
    slots = '[slots.lower]\npoint = "low"\nalong = 90\n[slots.upper]\npoint = "high"\nalong = 90\n'
    text = RAM[: RAM.index("[slides.lower]")] + slots + RAM[RAM.index("[effort]") :]
    answer = stroke(parse(text))
    upper = (100.0 * 0.2 - 400.0 * 0.03) / 0.12
    assert answer.force_on("upper", "ram")[0, 0, 0] == pytest.approx(upper, rel=1e-12)
    assert answer.force_on("lower", "ram")[0, 0, 0] == pytest.approx(100.0 - upper, rel=1e-12)
    assert not any("more than needed" in c.text for c in answer.caveats)


def test_friction_sees_the_shared_forces() -> None:
    """Three guided points in line, h apart, pushed at an offset a: no side force, so the outer two take M/2h.

    With M = F a the effort is F = G + µ 2 F a/2h = G/(1 - µ a/h) up, and with the sign of µ changed down.
    """
    text = """
[points]
P = [0, 0]
Q = [0, 100]
R = [0, 200]
S = [45, -20]
[members]
ground = []
ram = ["P", "Q", "R", "S"]
[friction]
slots = 0.2
[slots.one]
point = "P"
along = 90
[slots.two]
point = "Q"
along = 90
[slots.three]
point = "R"
along = 90
[effort]
at = "S"
direction = 90
[load]
at = "R"
direction = -90
size = 300
[stroke]
travel = "one"
to = 50
poses = 3
"""
    answer = stroke(parse(text))
    for case, mu in ((0, 0.2), (1, -0.2)):
        effort = 300.0 / (1 - mu * 0.045 / 0.1)
        assert answer.effort[case, 0] == pytest.approx(effort, rel=1e-12)
        for name, sign in (("one", 1.0), ("two", 0.0), ("three", -1.0)):
            side = abs(sign) * effort * 0.045 / 0.2
            force = answer.force_on(name, "ram")[:, case, 0]
            assert np.abs(force[0]) == pytest.approx(side, rel=1e-12, abs=1e-9)
            assert force[1] == pytest.approx(-mu * side, rel=1e-12, abs=1e-9)


FRAME = """
[points]
A = [0, 0]
B = [500, 0]
C = [520, 400]
D = [-20, 380]
[members]
ground = ["A", "B"]
floor = ["D", "C"]
left = ["A", "D"]
right = ["B", "C"]
rising = ["A", "C"]
falling = ["B", "D"]
tie = ["D", "C"]
[loads.push]
at = "D"
direction = -20
size = 700
[loads.hang]
at = "C"
on = "rising"
direction = -90
size = 250
"""
"""A braced panel with twin ties, pushed on a pin itself: held twice too often."""


def least_squares(text: str) -> dict[tuple[str, str], np.ndarray]:
    """(pin, member) -> force of the pin on the member of a frame with pins and point forces only.

    Each member sits in a spring of its own on the pin, all alike. Of all forces of pins on members that balance every
    member and every pin, numpy gives those of least sum of squares.
    """
    model = parse(text)
    places = {name: np.array([float(p.x), float(p.y)]) / 1000 for name, p in model.points.items()}
    sides = [(p, m) for m, member in model.members.items() for p in member.points]
    column = {side: 2 * k for k, side in enumerate(sides)}
    rows, right = [], []
    for name, member in model.members.items():
        if name == "ground":
            continue
        for axis in range(3):
            row, load = np.zeros(2 * len(sides)), 0.0
            for p in member.points:
                x, y = places[p]
                row[column[p, name] : column[p, name] + 2] = [(1, 0), (0, 1), (-y, x)][axis]
            for one in model.loads.values():
                if one.on == name:
                    x, y = places[one.at]
                    fx, fy = one.size * np.cos(np.radians(one.direction)), one.size * np.sin(np.radians(one.direction))
                    load += (fx, fy, x * fy - y * fx)[axis]
            rows.append(row)
            right.append(-load)
    for p in places:
        for axis in range(2):
            row = np.zeros(2 * len(sides))
            for q, m in sides:
                if q == p:
                    row[column[q, m] + axis] = 1.0
            own = [o for o in model.loads.values() if o.at == p and o.on is None]
            turn = [(np.cos, np.sin)[axis](np.radians(o.direction)) for o in own]
            rows.append(row)
            right.append(sum(o.size * t for o, t in zip(own, turn, strict=True)))
    found = np.linalg.lstsq(np.array(rows), np.array(right), rcond=None)[0]
    return {side: found[k : k + 2] for side, k in column.items()}


def test_a_frame_of_pins_against_least_squares() -> None:
    answer = stroke(parse(FRAME))
    for (pin, member), force in least_squares(FRAME).items():
        assert told(answer, pin, member) == pytest.approx(force, rel=1e-9, abs=1e-7), (pin, member)
    assert max(unbalanced(answer).values()) < 1e-12


def test_the_order_of_the_members_does_not_matter() -> None:
    model = parse(FRAME)
    usual = stroke(model)
    names = list(model.members)
    for order in list(permutations(names[1:]))[::17]:
        members = {name: model.members[name] for name in ("ground", *order)}
        other = stroke(replace(model, members=members))
        for b in usual.bearings:
            assert told(other, b.joint, b.member) == pytest.approx(told(usual, b.joint, b.member), rel=1e-9, abs=1e-7)


def test_a_third_crank_shares_in_every_pose() -> None:
    """A parallel crank pair with a third crank, against least squares of the balance of its bar, pose by pose.

    No crank but the first is loaded, so the second and third pull along themselves; the first takes a force across as
    well. A crank of two pins gives as its two pins in a row, twice as far as one, the same for all; the ground's pins
    and the bar's take the same force. So the shares are those of least sum of squares, of (x, y) on the first crank
    and the pulls of the other two.
    """
    answer = stroke(parse(PARALLEL + EFFORT + LOAD + STROKE.replace("from = 0\nto = 360", "from = 3\nto = 363")))
    assert not answer.status.any()
    points = {"B": (40, 70, (0.0, 0.0)), "C": (40, 70, (0.1, 0.0)), "H": (40, 70, (0.06, 0.02))}
    for k, angle in enumerate(np.radians(np.linspace(3, 363, 25))):
        way = np.array([np.cos(angle), np.sin(angle)])
        ends = {p: np.array(base) + 0.04 * way for p, (_, _, base) in points.items()}
        matrix = np.zeros((3, 4))
        for j, (p, f) in enumerate((("B", (1.0, 0.0)), ("B", (0.0, 1.0)), ("C", way), ("H", way))):
            matrix[:, j] = (*f, ends[p][0] * f[1] - ends[p][1] * f[0])
        right = np.array([0.0, 10.0, ends["C"][0] * 10.0])  # 10 N down at C
        # the load acts on the pin at C itself; on its way to the bar it strains the bar's side of it only
        free = np.linalg.svd(matrix)[2][-1]
        base = np.linalg.lstsq(matrix, right, rcond=None)[0]

        def energy(t: float, base=base, free=free, way=way) -> float:  # type: ignore[no-untyped-def]
            x = base + t * free
            on_crank, on_bar = -x[2] * way, x[2] * way + np.array([0.0, -10.0])
            pin_c = on_crank @ on_crank + on_bar @ on_bar
            return float(4 * (x[:2] @ x[:2] + x[3] ** 2) + 2 * x[2] ** 2 + pin_c)

        e = [energy(t) for t in (-1.0, 0.0, 1.0)]
        t = (e[0] - e[2]) / 2 / (e[0] - 2 * e[1] + e[2])
        x = base + t * free
        assert answer.force_on("B", "bar")[:, 0, 0, k] == pytest.approx(x[:2], rel=1e-9, abs=1e-9)
        assert answer.force_on("H", "bar")[:, 0, 0, k] == pytest.approx(x[3] * way, rel=1e-9, abs=1e-9)
    assert answer.checks.virtual_work < 1e-12
    assert max(unbalanced(answer).values()) < 1e-12


def test_it_passes_where_two_of_the_cranks_alone_would_not() -> None:
    """At 0 deg the first two cranks lie in line with their bar; the third, beside it, holds the way."""
    answer = stroke(parse(PARALLEL + EFFORT + LOAD + STROKE))
    assert np.degrees(answer.turn[2, 0, 0]) == pytest.approx(np.zeros(25), abs=1e-9), "the bar does not turn"
    assert not any("change point" in c.text for c in answer.caveats)


def test_many_copies_share_like_one() -> None:
    """Copies with other crank lengths, and with other stiffness, against each alone."""
    text = PARALLEL.replace("distance = 40", 'distance = "crank"') + "[dimensions]\ncrank = 40\n"
    text += EFFORT + LOAD + '[stroke]\nturn = "crank"\nfrom = 60\nto = 120\nposes = 4\n'
    cranks = np.array([0.04, 0.05, 0.03])
    many = stroke(parse(text), sizes={"crank": cranks})
    for v, crank in enumerate(cranks):
        one = stroke(parse(text.replace("crank = 40", f"crank = {float(crank * 1000)!r}")))
        assert many.force[:, :, :, v] == pytest.approx(one.force[:, :, :, 0], rel=1e-9, abs=1e-9)
    ram = RAM.replace('at = "low"', 'at = "low"\nstiffness = "k"').replace('at = "high"', 'at = "high"\nstiffness = 70')
    ram += "[dimensions]\nk = '50 N/mm'\n"
    many = stroke(parse(ram), sizes={"k": np.array([5e4, 2e5, 1e4])})
    for v, k in enumerate((50, 200, 10)):
        one = stroke(parse(ram.replace("'50 N/mm'", f"'{k} N/mm'")))
        assert many.force[:, :, :, v] == pytest.approx(one.force[:, :, :, 0], rel=1e-9, abs=1e-9)


def test_copies_whose_third_crank_does_not_fit() -> None:
    text = PARALLEL.replace('"G", distance = 40', '"G", distance = "third"') + "[dimensions]\nthird = 40\n"
    text += EFFORT + LOAD + '[stroke]\nturn = "crank"\nfrom = 70\nto = 120\nposes = 3\n'
    many = stroke(parse(text), sizes={"third": np.array([0.04, 0.0401])})
    assert many.status[0].tolist() == [[0, 0, 0], [0, Status.NO_FIT, Status.NO_FIT]]


# what is turned down, and what is told


def test_the_joints_are_named_in_a_warning() -> None:
    caveats = [c for c in stroke(parse(BEAM)).caveats if "more than needed" in c.text]
    assert [c.item for c in caveats] == ["A, middle, end"]
    assert "held once more than needed" in caveats[0].text
    assert "as if all were equally stiff" in caveats[0].text
    assert "tolerances, clearances and the give of the members decide the real shares" in caveats[0].text


def test_a_brace_that_fits_as_drawn_only_is_turned_down() -> None:
    """A third crank a little longer than the others comes apart as soon as they turn."""
    text = PARALLEL.replace('"G", distance = 40', '"G", distance = 41')
    assert "held 1 time more than needed, among joints A, D, G, B, C, H" in refused(text + EFFORT + LOAD + STROKE)


def test_a_straight_guide_across_a_round_path_is_turned_down() -> None:
    """A slot along the path of a crank pin holds nothing as drawn, and everything a little on."""
    text = """
[points]
A = [0, 0]
B = [0, 100]
[members]
ground = ["A"]
crank = ["A", "B"]
[slots.level]
point = "B"
along = 0
[effort]
torque_on = "crank"
[load]
at = "B"
direction = 0
size = 10
"""
    assert "held 1 time more than needed, among joints A, level" in refused(text)
    assert "held 1 time more than needed" in refused(text + '[stroke]\nturn = "crank"\nto = 95\n')


def test_guides_that_part_later_on_are_told_with_their_pose() -> None:
    """A rail straight for 300 mm beside a guide, bent at its end: of that a spline feels nothing at its beginning."""
    names = [f"p{k}" for k in range(40)]
    places = "".join(f"{name} = [{10 * k}, {5 if k == 39 else 0}]\n" for k, name in enumerate(names))
    text = f"""
[points]
P = [10, 0]
Q = [20, 30]
{places}
[members]
ground = []
ram = {{ points = ["P", "Q"] }}
[slides.ways]
member = "ram"
along = 0
[tracks.rail]
point = "P"
through = {names!r}
[effort]
at = "P"
direction = 0
[load]
at = "Q"
direction = 180
size = 10
[stroke]
travel = "ways"
to = REACH
poses = 7
"""
    assert not stroke(parse(text.replace("REACH", "20"))).status.any()
    said = refused(text.replace("REACH", "375"))
    assert "held once more than needed, among joints ways, rail, which come apart by " in said
    assert "of the stroke; draw them so that they fit in every pose" in said


def test_a_special_pose_of_a_frame_stays_turned_down() -> None:
    assert "the drawing pose is a special one" in refused(STRAIGHT + ON_LEFT)


@pytest.mark.parametrize(
    ("text", "says"),
    [
        (BEAM.replace('point = "B"', 'point = "B"\nstiffness = 20'),
         "pins.A: A has no stiffness, but shares forces with middle, which has one; give it a 'stiffness'"),
        (BEAM.replace('point = "B"', 'point = "B"\nstiffness = 0'), "slots.middle.stiffness: "),
        (BEAM.replace('point = "B"', 'point = "B"\nstiffness = -4'), "slots.middle.stiffness: "),
        (BEAM.replace('point = "B"', 'point = "B"\nstiffness = "4 mm"'), "slots.middle.stiffness: 4 mm is a length"),
        (BEAM[: BEAM.index("[slots.end]")] + "stiffness = 3\n" + BEAM[BEAM.index("[loads") :],
         "slots.middle.stiffness: it shares its force with no other joint: none holds again what it holds"),
    ],
    ids=["only one", "zero", "minus", "length", "nothing to share"],
)  # fmt: skip
def test_stiffness_that_makes_no_sense(text: str, says: str) -> None:
    with pytest.raises(Faults) as found:
        stroke(parse(text))
    assert says in str(found.value)
