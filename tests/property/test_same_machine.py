"""What a machine does cannot hang on how it is drawn, measured or written down."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from random import Random
from typing import Any

import numpy as np
from hypothesis import assume, example, given
from hypothesis import strategies as st

from linkcalc import dumps, parse
from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import Drawing
from linkcalc.parts.loads.force import Force
from linkcalc.parts.loads.pair import Pair
from linkcalc.parts.loads.weight import Weight
from tests.property.transform import INCH_POUND, in_units, moved, reordered, scaled, turned
from tests.samples import BRACKET, CLAMP, COLLAR, RAM, SLOTTED
from tests.strategies import frames, machines, solved

SAME = 1e-9
"""Of the largest force: places written anew differ by 1e-16 of the size, amplified by angles of transmission down to
30 degrees in chains of three; far places cost as many figures as they are sizes away."""

either = st.one_of(machines(), frames())


def sides(answer: StrokeAnswer) -> dict[tuple[str, str], tuple[np.ndarray, np.ndarray]]:
    """(joint, member) -> force (2, case, variant, pose) and moment."""
    return {(b.joint, b.member): (answer.force[k], answer.moment[k]) for k, b in enumerate(answer.bearings)}


def alike(a: StrokeAnswer, b: StrokeAnswer, *, turn: float = 0.0, scale: float = 1.0) -> None:
    """Effort, ratios and joint forces of b are those of a, its forces turned and its moments scaled."""
    assert a.cases == b.cases and a.kinds == b.kinds
    np.testing.assert_array_equal(a.status, b.status)
    size = Drawing(a.mechanism).size
    largest = max(float(np.nanmax(np.abs(a.force))), 1e-300)
    arms = {"effort": 1.0, "load": 1.0}
    for key in ("effort", "load"):
        if a.kinds.get(key) == "moment":
            arms[key] = scale
    for name, arm in (("effort", arms["effort"]), ("tare_effort", arms["effort"]), ("load", arms["load"])):
        slack = SAME * largest * (1.0 if arm == 1.0 and a.kinds.get("effort") != "moment" else size * scale)
        np.testing.assert_allclose(getattr(b, name), arm * getattr(a, name), rtol=SAME, atol=slack, err_msg=name)
    bounded = np.isfinite(a.ideal_ratio) & (np.abs(a.ideal_ratio) < 1e3)
    per = 1.0 if a.kinds.get("effort", "force") == a.kinds.get("load", "force") else 1.0 / scale
    np.testing.assert_allclose(b.ideal_ratio[bounded], per * a.ideal_ratio[bounded], rtol=1e-7, atol=1e-9)
    mine, theirs = sides(a), sides(b)
    assert mine.keys() == theirs.keys()
    c, s = np.cos(turn), np.sin(turn)
    for key, (force, moment) in mine.items():
        fx, fy = force
        other, other_moment = theirs[key]
        np.testing.assert_allclose(other[0], c * fx - s * fy, atol=SAME * largest, err_msg=str(key))
        np.testing.assert_allclose(other[1], s * fx + c * fy, atol=SAME * largest, err_msg=str(key))
        np.testing.assert_allclose(other_moment, scale * moment, atol=SAME * largest * size * scale, err_msg=str(key))


@given(either, st.floats(-3.1, 3.1))
@example(parse(COLLAR), 1.0)
@example(parse(SLOTTED), -2.0)
@example(parse(RAM), np.pi / 2)
@example(parse(BRACKET), np.pi)
@example(parse(CLAMP), 1.0)
def test_turning_the_drawing_with_its_gravity(machine: Mechanism, by: float) -> None:
    alike(solved(machine), solved(turned(machine, by)), turn=by)


@given(either, st.floats(-2, 2), st.floats(-2, 2))
def test_moving_the_drawing(machine: Mechanism, dx: float, dy: float) -> None:
    alike(solved(machine), solved(moved(machine, dx, dy)))


@given(either, st.floats(-3.1, 3.1), st.floats(-1, 1))
def test_other_ground_axes(machine: Mechanism, by: float, dx: float) -> None:
    alike(solved(machine), solved(turned(moved(machine, dx, -dx), by)), turn=by)


@given(either, st.sampled_from([0.001, 0.04, 0.5, 3.0, 1000.0]))
def test_scaling_the_drawing(machine: Mechanism, by: float) -> None:
    """A model a thousand times as large, with torques in proportion: same forces, same ratios of like to like."""
    alike(solved(machine), solved(scaled(machine, by)), scale=by)


@given(either)
@example(parse(COLLAR))
@example(parse(SLOTTED))
@example(parse(RAM))
@example(parse(BRACKET))
@example(parse(CLAMP))
def test_units_of_the_file(machine: Mechanism) -> None:
    """In inches, pounds and radians the same machine gives the same newtons."""
    alike(solved(machine), solved(in_units(machine, INCH_POUND)))


@given(either, st.randoms(use_true_random=False))
def test_order_of_members_and_points(machine: Mechanism, random: Random) -> None:
    """Which member stands for a pin changes with it, and the plan of the elimination."""
    machine = bearers_named(machine)
    pins = Drawing(machine).pins
    # which of two welded members a third is pinned to, where all three meet, is the order of the file by its own word
    assume(not any(weld.at in pins for weld in machine.joints.get("weld", {}).values()))
    points, members = list(machine.points), list(machine.members)
    random.shuffle(points)
    random.shuffle(members)
    alike(solved(machine), solved(reordered(machine, points, members)))


def bearers_named(machine: Mechanism) -> Mechanism:
    """Where all members at a point are welded together there is no pin to take a force: a member is named for it."""
    drawing = Drawing(machine)

    def bearer(point: str) -> str | None:
        return None if point in drawing.pins else drawing.hub(point)

    def named(load: Any) -> Any:
        match load:
            case Force(at=point, on=None) | Weight(mass_at=point, on=None):
                return replace(load, on=bearer(point))
            case Pair(between=ends, on=None) if any(bearer(p) for p in ends):
                return replace(load, on=tuple(drawing.hub(p) for p in ends))
        return load

    slots = {
        name: replace(slot, of=slot.of or bearer(slot.point)) for name, slot in machine.joints.get("slot", {}).items()
    }
    return replace(
        machine,
        load=named(machine.load),
        loads={name: named(load) for name, load in machine.loads.items()},
        joints={**machine.joints, **({"slot": slots} if slots else {})},
    )


@given(either)
def test_order_of_joints_and_loads(machine: Mechanism) -> None:
    backwards = replace(
        machine,
        joints={word: dict(reversed(parts.items())) for word, parts in reversed(machine.joints.items())},
        loads=dict(reversed(machine.loads.items())),
    )
    alike(solved(machine), solved(backwards))


@given(either)
def test_cases_one_by_one(machine: Mechanism) -> None:
    whole = solved(machine)
    for k, case in enumerate(whole.cases if machine.cases else ()):
        alone = solved(machine, case=case)
        largest = max(float(np.abs(alone.force).max()), 1e-300)
        np.testing.assert_allclose(whole.effort[k], alone.effort[0], rtol=SAME, atol=SAME * largest)
        np.testing.assert_allclose(whole.force[:, :, k], alone.force[:, :, 0], atol=SAME * largest)


@given(machines())
def test_poses_in_any_number(machine: Mechanism) -> None:
    """Ends and middle of the stroke are what they are, whatever stands between."""
    few, many = solved(machine, poses=3), solved(machine, poses=25)
    largest = float(np.abs(many.force).max())
    np.testing.assert_allclose(few.force, many.force[..., ::12], atol=SAME * largest)
    np.testing.assert_allclose(few.effort, many.effort[..., ::12], rtol=SAME, atol=SAME * largest)


@given(machines())
def test_going_the_other_way(machine: Mechanism) -> None:
    """The same stroke from its end to its start."""
    there = solved(machine)
    unit = "rad" if there.kinds["drive"] == "angle" else "m"
    start, stop = (f"{float(there.drive[0, 0, k])!r} {unit}" for k in (-1, 0))
    again = solved(replace(machine, stroke=replace(machine.stroke, start=start, stop=stop)))
    largest = float(np.abs(there.force).max())
    np.testing.assert_allclose(again.force[..., ::-1], there.force, atol=SAME * largest)
    np.testing.assert_allclose(again.effort[..., ::-1], there.effort, rtol=SAME, atol=SAME * largest)
    assert extremes(there).keys() == extremes(again).keys()
    for key, value in extremes(there).items():
        np.testing.assert_allclose(extremes(again)[key], value, rtol=1e-8, atol=1e-8 * largest)


def extremes(answer: StrokeAnswer) -> dict[Sequence[str], float]:
    return {(e.kind, e.quantity, e.case): e.value for e in answer.events if e.kind in ("largest", "smallest")}


@given(machines())
@example(
    parse("""
[points]
A = [0, 0]
hand = [300, 0.1]
hook = [-100, 0]
[members]
ground = ["A"]
lever = ["hook", "A", "hand"]
[effort]
at = "hand"
direction = -90
[load]
at = "hook"
direction = -90
size = 600
[stroke]
turn = "lever"
to = 20
""")
)
def test_written_and_read_again_it_is_the_same_machine(machine: Mechanism) -> None:
    again = parse(dumps(machine))
    assert again == machine
    first, second = solved(machine), solved(again)
    for name in ("drive", "effort", "load", "force", "moment", "axial", "x", "y", "turn", "status"):
        np.testing.assert_array_equal(getattr(first, name), getattr(second, name), err_msg=name)
    assert first.events == second.events or str(first.events) == str(second.events)
    assert first.caveats == second.caveats
