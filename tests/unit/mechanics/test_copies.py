"""Many copies at once are each what it is alone; a copy that fails says why and holds up no other."""

from __future__ import annotations

from dataclasses import fields

import numpy as np
import pytest

from linkcalc import Faults, parse, stroke
from linkcalc.design.answer import StrokeAnswer
from linkcalc.design.copies import copies
from linkcalc.mechanics.copies import each_pose, solve_copies
from linkcalc.mechanics.path import lay_path
from linkcalc.mechanics.prepare import prepare
from linkcalc.mechanics.state import Status
from linkcalc.model.sketch import Drawing
from tests.unit.mechanics.linkages import FourBar

ALONE = 1e-9
"""Relative: the same equations closed to 1e-12 from other guesses, with transmission angles above 30 degrees."""
ARRAYS = ("effort", "load", "tare_effort", "force_ratio", "ideal_ratio", "force", "moment", "axial", "x", "y", "turn")
LINKAGE = FourBar(30, 90, 70, 100)
STROKE = '[stroke]\nturn = "crank"\nto = 170\nposes = 7'
CASES = """
[loads.hung]
mass_at = "C"
mass = 3
[cases.upright]
[cases.tilted]
gravity = { turn = 30, scale = 1.5 }
scale = { load = 2 }
"""


def sizes(count: int = 6, seed: int = 1) -> dict[str, np.ndarray]:
    rng = np.random.default_rng(seed)
    return {
        "crank": rng.uniform(0.025, 0.035, count),
        "coupler": rng.uniform(0.085, 0.095, count),
        "rocker": rng.uniform(0.065, 0.075, count),
    }


def alone(of: dict[str, np.ndarray], k: int, **more: object) -> StrokeAnswer:
    changed = FourBar(*(float(of[name][k]) * 1000 for name in ("crank", "coupler", "rocker")), LINKAGE.d)
    return stroke(parse(changed.text(STROKE + CASES)), **more)


def test_each_copy_is_what_it_is_alone() -> None:
    at = sizes()
    together = stroke(parse(LINKAGE.text(STROKE + CASES)), sizes=at)
    assert not together.status.any()
    assert together.effort.shape == (2, 6, 7)
    for k in range(6):
        single = alone(at, k)
        for name in ARRAYS:
            whole = getattr(together, name)
            np.testing.assert_allclose(
                whole[..., k : k + 1, :], getattr(single, name), rtol=ALONE,
                atol=ALONE * max(1.0, float(np.abs(whole[np.isfinite(whole)]).max())), err_msg=name,
            )  # fmt: skip


def test_copies_as_drawn_without_a_stroke() -> None:
    at = sizes()
    together = stroke(parse(LINKAGE.text(CASES)), sizes=at)
    assert together.effort.shape == (2, 6, 1)
    for k in range(6):
        changed = FourBar(*(float(at[n][k]) * 1000 for n in ("crank", "coupler", "rocker")), 100)
        single = stroke(parse(changed.text(CASES)))
        np.testing.assert_allclose(together.effort[:, k], single.effort[:, 0], rtol=ALONE)
        np.testing.assert_allclose(together.force[..., k, :], single.force[..., 0, :], rtol=ALONE, atol=1e-9)


@pytest.mark.parametrize("drive", [[170, 60], [90, 150, 60, 120], [60.0], [100, 100]], ids=str)
def test_poses_in_any_order(drive: list[float]) -> None:
    at, where = sizes(), np.radians(drive)
    together = stroke(parse(LINKAGE.text(STROKE + CASES)), sizes=at, at=where)
    for k in (0, 5):
        np.testing.assert_allclose(together.effort[:, k], alone(at, k, at=where).effort[:, 0], rtol=ALONE)


def test_a_copy_that_cannot_be_drawn() -> None:
    """Coupler 300 mm: its arcs do not meet. Nothing is told of it, and the others are as without it."""
    at = sizes()
    spoilt = {name: np.insert(size, 2, {"coupler": 0.3}.get(name, size[0])) for name, size in at.items()}
    model = parse(LINKAGE.text(STROKE + CASES))
    assert_alike_but_for(stroke(model, sizes=at), stroke(model, sizes=spoilt), 2, Status.NOT_DRAWN)
    frozen = parse(LINKAGE.text(CASES))
    assert_alike_but_for(stroke(frozen, sizes=at), stroke(frozen, sizes=spoilt), 2, Status.NOT_DRAWN)


@pytest.mark.parametrize("order", [1, -1])
def test_copies_of_which_half_cannot_be_drawn(order: int) -> None:
    """Whichever half: plans of elimination are made from copies that can be."""
    coupler = np.array([0.09, 0.091, 0.3, 0.3])[::order]
    answer = stroke(parse(LINKAGE.text(STROKE)), sizes={"coupler": coupler})
    np.testing.assert_array_equal(answer.status[0, :, 0] == 0, coupler < 0.1)


def test_a_copy_that_cannot_come_along() -> None:
    """A rocker-and-rocker: the crank of the nominal goes to 115 degrees, of the copy to 92 only."""
    linkage = FourBar(60, 40, 55, 50)
    short = FourBar(60, 30, 40, 50)
    limit = max(short.crank_limits())
    assert np.degrees(limit) < 100 < 115 < np.degrees(max(linkage.crank_limits()))
    model = parse(linkage.text('[stroke]\nturn = "crank"\nto = 115\nposes = 12'))
    at = {"coupler": np.array([0.04, 0.03, 0.041]), "rocker": np.array([0.055, 0.04, 0.055])}
    answer = stroke(model, sizes=at)
    reached = answer.drive[0, 1] < limit
    np.testing.assert_array_equal(answer.status[0, 1] == Status.FINE, reached)
    assert set(answer.status[0, 1, ~reached].tolist()) <= {Status.OUT_OF_REACH, Status.BRANCH_LOST}
    for name in ARRAYS:
        assert np.isnan(getattr(answer, name)[..., 1, ~reached]).all(), name
    others = stroke(model, sizes={name: size[[0, 2]] for name, size in at.items()})
    np.testing.assert_allclose(answer.effort[:, [0, 2]], others.effort, rtol=ALONE)


@pytest.mark.parametrize("poses", [5, 13, 25, 241])
def test_a_copy_that_would_have_to_be_assembled_anew(poses: int) -> None:
    """Its crank stops 1.4 degrees short of flat; a step over that gap would find it on the other branch."""
    short = FourBar(30, 69.99, 60, 100)
    (limit,) = short.crank_limits()
    assert 178 < np.degrees(limit) < 179
    text = FourBar(30, 75, 60, 100).text(f'[stroke]\nturn = "crank"\nfrom = 70\nto = 310\nposes = {poses}')
    answer = stroke(parse(text), sizes={"coupler": np.array([0.075, 0.06999])})
    reached = answer.drive[0, 1] < limit
    np.testing.assert_array_equal(answer.status[0, 1] == Status.FINE, reached)
    assert set(answer.status[0, 1, ~reached].tolist()) <= {Status.OUT_OF_REACH, Status.BRANCH_LOST}
    ratio = short.velocity_ratio(answer.drive[0, 1, reached])
    np.testing.assert_allclose(answer.effort[0, 1, reached], 10 * ratio, rtol=1e-6)


def assert_alike_but_for(others: StrokeAnswer, answer: StrokeAnswer, copy: int, status: Status) -> None:
    assert (answer.status[:, copy] == status).all()
    np.testing.assert_array_equal(np.delete(answer.status, copy, axis=1), others.status)
    for name in ARRAYS:
        values = getattr(answer, name)
        assert np.isnan(values[..., copy, :]).all(), name
        np.testing.assert_allclose(
            np.delete(values, copy, axis=-2), getattr(others, name), rtol=ALONE, atol=1e-9, err_msg=name
        )


def test_streaming_gives_what_all_at_once_gives() -> None:
    model = parse(LINKAGE.text(STROKE + CASES))
    nominal = prepare(Drawing(model))
    path = lay_path(nominal)
    ready = prepare(Drawing(model, {name: size.reshape(1, -1, 1) for name, size in sizes().items()}))
    drive = path.poses(7)
    whole = solve_copies(ready, path, drive)
    poses = list(each_pose(ready, path, drive, checked=True))
    assert len(poses) == 7
    for k, one in enumerate(poses):
        for f in fields(one.balance):
            got, wanted = getattr(one.balance, f.name), getattr(whole.balance, f.name)
            for a, b in zip(*((v if isinstance(v, list) else [v]) for v in (got, wanted)), strict=True):
                b = b if isinstance(b, float) else np.broadcast_to(b, (*np.shape(b)[:2], 7))[..., k : k + 1]
                np.testing.assert_array_equal(np.broadcast_to(a, np.shape(b)), b, err_msg=f.name)


@pytest.mark.parametrize("block", [1, 4, 100])
def test_blocks_of_copies_are_the_same_copies(block: int) -> None:
    at = sizes()
    model = parse(LINKAGE.text(STROKE + CASES))
    whole = stroke(model, sizes=at)
    seen = np.zeros((6, 7), bool)
    pin = whole.bearing("B", "coupler")
    for part in copies(model, at, block=block):
        rows = slice(part.first, part.first + part.status.shape[1])
        seen[rows, part.pose] = True
        assert part.effort.shape == part.load.shape == part.status.shape
        np.testing.assert_allclose(part.effort, whole.effort[:, rows, part.pose], rtol=ALONE)
        np.testing.assert_allclose(part.load, whole.load[:, rows, part.pose], rtol=ALONE)
        np.testing.assert_allclose(part.drive, whole.drive[0, 0, part.pose])
        np.testing.assert_allclose(part.joints["B"], whole.force[pin, :, :, rows, part.pose], rtol=ALONE, atol=1e-9)
    assert seen.all()


def test_sizes_of_different_counts_are_a_fault() -> None:
    model = parse(LINKAGE.text(STROKE))
    wrong = {"crank": np.array([0.03, 0.031]), "rocker": np.array([0.07, 0.071, 0.072])}
    with pytest.raises(Faults, match="sizes for"):
        list(copies(model, wrong))
    with pytest.raises(Faults, match="sizes for"):
        stroke(model, sizes=wrong)


def test_an_unknown_dimension_is_a_fault() -> None:
    with pytest.raises(Faults, match="crnk"):
        stroke(parse(LINKAGE.text(STROKE)), sizes={"crnk": np.array([0.03])})


@pytest.mark.parametrize("what", ["load", "direction", "mass", "slot"])
def test_copies_may_differ_in_anything_that_has_a_size(what: str) -> None:
    """Strengths, directions, masses and guides as dimensions: none of them moves a point."""
    text = """
[dimensions]
push = "100 N"
lean = "180 deg"
lump = "2 kg"
tilt = "0 deg"
[points]
A = [0, 0]
B = { from = "A", distance = 40, angle = 50 }
C = [151.2, 0]
[members]
ground = ["A"]
crank = ["A", "B"]
rod = ["B", "C"]
[slots.guide]
point = "C"
along = "tilt"
[effort]
torque_on = "crank"
[load]
at = "C"
direction = "lean"
size = "push"
[loads.lump]
mass_at = "B"
mass = "lump"
[stroke]
turn = "crank"
to = 120
poses = 4
"""
    name, values, unit = {
        "load": ("push", [80.0, 100.0, 150.0], "N"),
        "direction": ("lean", [2.9, 3.1, 3.3], "rad"),
        "mass": ("lump", [0.0, 2.0, 3.0], "kg"),
        "slot": ("tilt", [-0.1, 0.0, 0.1], "rad"),
    }[what]
    together = stroke(parse(text), sizes={name: np.array(values)})
    for k, value in enumerate(values):
        old = next(line for line in text.splitlines() if line.startswith(name))
        single = stroke(parse(text.replace(old, f'{name} = "{value!r} {unit}"')))
        np.testing.assert_allclose(together.effort[:, k], single.effort[:, 0], rtol=ALONE)
        np.testing.assert_allclose(together.force[..., k, :], single.force[..., 0, :], rtol=ALONE, atol=1e-9)
