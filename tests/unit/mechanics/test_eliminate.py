"""Planned elimination against dense solution of the same matrices, weak pivots and singular ones among them."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
import pytest
from hypothesis import assume, example, given
from hypothesis import strategies as st

from linkcalc.mechanics.eliminate import Elimination
from linkcalc.mechanics.plan import NoPlan, Plan
from linkcalc.parts.pose import Value

POSES = 12
RESIDUAL = 1e-9
"""Of the largest product in a row: a pivot may be 1e-4 of its row before it is weak, which costs four figures."""


@dataclass
class Matrices:
    """A batch of sparse matrices: some entries constant, the others (1, 1, pose)."""

    size: int
    places: list[tuple[int, int]]
    entries: list[Value]

    def dense(self) -> np.ndarray:
        """(pose, size, size)"""
        shape = np.broadcast_shapes((1, 1, 1), *(np.shape(e) for e in self.entries))
        out = np.zeros((*shape, self.size, self.size))
        for (i, j), e in zip(self.places, self.entries, strict=True):
            out[..., i, j] = e
        return out

    def elimination(self, row_size: np.ndarray | None = None, column_size: np.ndarray | None = None) -> Elimination:
        ones = np.ones(self.size)
        return Elimination(
            self.size,
            self.places,
            ones if row_size is None else row_size,
            ones if column_size is None else column_size,
        )


def random_matrices(size: int, seed: int, fill: float = 0.25, constant: float = 0.4) -> Matrices:
    """A strong entry somewhere in every row and column, others strewn about; many constants, as of a linkage."""
    rng = np.random.default_rng(seed)
    strong = dict(enumerate(rng.permutation(size)))
    places, entries = [], []
    for i in range(size):
        for j in range(size):
            if strong[i] != j and rng.random() > fill:
                continue
            places.append((i, j))
            base = rng.choice([1.0, -1.0]) * (2.0 if strong[i] == j else 1.0)
            varying = base * rng.uniform(0.3, 1.0, (1, 1, POSES))
            entries.append(float(base) if rng.random() < constant else varying)
    order = rng.permutation(len(places))
    return Matrices(size, [places[k] for k in order], [entries[k] for k in order])


def check_solution(a: np.ndarray, x: list[Value], b: list[Value], *, transposed: bool) -> None:
    """Put back: A x = b in every entry of the batch."""
    shape = np.broadcast_shapes(a.shape[:-2], *(np.shape(v) for v in (*x, *b)))
    xs, bs = (np.stack([np.broadcast_to(v, shape) for v in values], axis=-1) for values in (x, b))
    terms = (np.swapaxes(a, -1, -2) if transposed else a) * xs[..., None, :]
    left = np.abs(terms.sum(axis=-1) - bs)
    size = np.maximum(np.abs(terms).max(axis=(-1, -2)), np.abs(bs).max(axis=-1))
    assert np.isfinite(xs).all()
    assert np.all(left <= RESIDUAL * size[..., None])


@given(st.integers(1, 14), st.integers(0, 2**31), st.booleans(), st.booleans())
@example(1, 0, False, False)
@example(14, 5, True, True)
def test_solves_the_matrices_and_their_transposes(size: int, seed: int, transposed: bool, sparse: bool) -> None:
    m = random_matrices(size, seed)
    a = m.dense()
    assume(np.linalg.cond(a).max() < 1e3)
    rng = np.random.default_rng(seed)
    b: list[Value] = [0.0 if sparse and rng.random() < 0.6 else rng.normal(size=(3, 1, POSES)) for _ in range(size)]
    factors = m.elimination().factor(m.entries, lone=False)
    check_solution(a, factors.solve(b, transposed=transposed), b, transposed=transposed)
    np.testing.assert_array_equal(np.broadcast_to(factors.negative, a.shape[:-2]), np.linalg.det(a) < 0)


@given(st.integers(2, 10), st.integers(0, 2**31))
def test_scales_of_rows_and_columns_do_not_change_the_answer(size: int, seed: int) -> None:
    """They only decide which pivots are small: lengths in metres beside angles in radians."""
    m = random_matrices(size, seed)
    a = m.dense()
    assume(np.linalg.cond(a).max() < 1e3)
    rng = np.random.default_rng(seed)
    row, column = rng.choice([1.0, 0.05], size), rng.choice([1.0, 0.05], size)
    b = list(rng.normal(size=(size, 1, 1, POSES)))
    for lone, entries in ((False, m.entries), (True, [float(np.ravel(e)[0]) for e in m.entries])):
        factors = m.elimination(row, column).factor(entries, lone=lone)
        for transposed in (False, True):
            right = [float(v[0, 0, 0]) for v in b] if lone else b
            check_solution(a[..., :1, :, :] if lone else a, factors.solve(right, transposed=transposed), right,
                           transposed=transposed)  # fmt: skip


@given(st.integers(2, 10), st.integers(0, 2**31), st.booleans())
def test_a_pivot_that_dies_at_some_poses_is_mended_there(size: int, seed: int, transposed: bool) -> None:
    """An entry passes through zero between poses of the batch; the plan was made where it was strong."""
    m = random_matrices(size, seed)
    rng = np.random.default_rng(seed)
    k = int(rng.integers(len(m.entries)))
    elimination = m.elimination()
    elimination.factor(m.entries, lone=False)  # the plan
    died = np.array(np.broadcast_to(m.entries[k], (1, 1, POSES)))
    died[..., POSES // 2] = rng.choice([0.0, 1e-9])
    m.entries[k] = died
    a = m.dense()
    assume(np.linalg.cond(a).max() < 1e3)
    b = list(rng.normal(size=(size, 2, 1, POSES)))
    factors = elimination.factor(m.entries, lone=False)
    check_solution(a, factors.solve(b, transposed=transposed), b, transposed=transposed)
    np.testing.assert_array_equal(np.broadcast_to(factors.negative, a.shape[:-2]), np.linalg.det(a) < 0)


SQUARE = [(0, 0), (0, 1), (1, 0), (1, 1)]


def turning(*angles: float) -> Matrices:
    """Rotations: every pivot dies somewhere, the determinant is 1 throughout."""
    t = np.array(angles).reshape(1, 1, -1)
    return Matrices(2, SQUARE, [np.cos(t), -np.sin(t), np.sin(t), np.cos(t)])


@pytest.mark.parametrize("transposed", [False, True])
def test_a_rotation_is_solved_at_every_angle(transposed: bool) -> None:
    m = turning(*np.linspace(0, 2 * np.pi, 73))
    factors = m.elimination().factor(m.entries, lone=False)
    b: list[Value] = [1.0, np.full((1, 1, 73), 0.25)]
    check_solution(m.dense(), factors.solve(b, transposed=transposed), b, transposed=transposed)
    assert not factors.negative.any()


def test_many_weak_pivots_call_for_a_new_plan() -> None:
    """A plan made at 0 degrees meets a batch near 90 degrees: planned anew, nothing is left to dense solution."""
    elimination = turning(0.0).elimination()
    elimination.factor(turning(*np.linspace(0.0, 0.01, 40)).entries, lone=False)
    m = turning(*np.linspace(np.pi / 2 - 1e-6, np.pi / 2 + 1e-6, 41))
    factors = elimination.factor(m.entries, lone=False)
    check_solution(m.dense(), factors.solve([1.0, 2.0]), [1.0, 2.0], transposed=False)
    assert not factors.negative.any()


def test_a_singular_entry_is_not_a_number_and_leaves_the_others() -> None:
    """A = [[1, t], [t, 1]] is singular at t = 1: x of (1, 0) is (1, -t) / (1 - t t)."""
    t = np.array([0.0, 0.5, 1.0, 2.0]).reshape(1, 1, -1)
    m = Matrices(2, SQUARE, [np.ones((1, 1, 4)), t, t, np.ones((1, 1, 4))])
    factors = m.elimination().factor(m.entries, lone=False)
    for transposed in (False, True):
        x, y = (np.broadcast_to(v, (1, 1, 4))[0, 0] for v in factors.solve([1.0, 0.0], transposed=transposed))
        np.testing.assert_allclose(x, [1, 4 / 3, np.nan, -1 / 3], rtol=1e-12)
        np.testing.assert_allclose(y, [0, -2 / 3, np.nan, 2 / 3], rtol=1e-12)
    np.testing.assert_array_equal(factors.negative[0, 0, [0, 1, 3]], [False, False, True])


def test_entries_of_different_batch_axes_meet() -> None:
    """One entry by variant, another by pose, a weak pivot among the variants: each of the products is solved."""
    variant = np.array([1.0, 0.0, -2.0]).reshape(1, 3, 1)
    pose = np.linspace(0.5, 2.0, 4).reshape(1, 1, 4)
    m = Matrices(2, SQUARE, [variant, pose, np.ones((1, 1, 1)), 3.0 * np.ones((1, 1, 1))])
    factors = m.elimination().factor(m.entries, lone=False)
    b: list[Value] = [1.0, np.arange(4.0).reshape(1, 1, 4)]
    for transposed in (False, True):
        check_solution(m.dense(), factors.solve(b, transposed=transposed), b, transposed=transposed)
    np.testing.assert_array_equal(np.broadcast_to(factors.negative, (1, 3, 4)), np.linalg.det(m.dense()) < 0)


@pytest.mark.parametrize("entries", [[1.0, 2.0, 2.0, 4.0], [0.0, 0.0, 1.0, 1.0]], ids=["dependent", "empty row"])
def test_one_singular_matrix_has_no_plan(entries: list[float]) -> None:
    with pytest.raises(NoPlan):
        Matrices(2, SQUARE, list(entries)).elimination().factor(entries, lone=True).solve([1.0, 0.0])
    with pytest.raises(NoPlan):
        Plan(2, SQUARE, [np.full((1, 1, 3), e) for e in entries], np.ones(2), np.ones(2))


def test_singular_throughout_is_told_whatever_was_solved_before() -> None:
    """Plans lie ready for every matrix of the same pattern; one made for a sound matrix must not hide a singular."""
    sound, broken = turning(0.3, 0.4), Matrices(2, SQUARE, [np.full((1, 1, 2), v) for v in (1.0, 2.0, 2.0, 4.0)])
    assert sound.elimination().factor(sound.entries, lone=False).singular is None
    singular = broken.elimination().factor(broken.entries, lone=False).singular
    assert singular is not None and singular.all()


@pytest.mark.parametrize("t", [1.0, 1.0 - 1e-9])
def test_entries_decided_by_rounding_are_told(t: float) -> None:
    """A = [[1, t], [t, 1]] has singular values 1 + t and 1 - t."""
    batch = np.array([0.0, 0.5, t, 2.0]).reshape(1, 1, -1)
    m = Matrices(2, SQUARE, [np.ones((1, 1, 4)), batch, batch, np.ones((1, 1, 4))])
    singular = m.elimination().factor(m.entries, lone=False).singular
    np.testing.assert_array_equal(singular, [[[False, False, True, False]]])


@pytest.mark.parametrize(("sound", "spoilt"), [(0, np.nan), (3, np.nan), (4, np.nan), (1, 0.0), (2, 0.0), (4, 0.0)])
def test_a_plan_is_made_from_a_pose_that_is_sound(sound: int, spoilt: float) -> None:
    """All but one of five are no numbers, or singular: in most cases the middle one too."""
    scale = np.where(np.arange(5) == sound, 1.0, spoilt).reshape(1, 1, -1)
    m = Matrices(2, SQUARE, [v * scale for v in (1.0, 2.0, 3.0, 4.0)])
    x = np.stack(m.elimination().factor(m.entries, lone=False).solve([5.0, 6.0]))
    np.testing.assert_allclose(x[:, 0, 0, sound], [-4.0, 4.5])
    assert not np.isfinite(np.delete(x[:, 0, 0], sound, axis=1)).any()


def test_a_copy_that_is_not_a_number_disturbs_no_other() -> None:
    m = turning(np.nan, 0.3, 0.9)
    x, _ = m.elimination().factor(m.entries, lone=False).solve([1.0, 0.0])
    np.testing.assert_allclose(np.ravel(x), [np.nan, np.cos(0.3), np.cos(0.9)], rtol=1e-14)


def test_constants_fold_away() -> None:
    """A matrix of nothing but constants leaves no arithmetic for a replay."""
    m = Matrices(2, SQUARE, [1.0, 2.0, 3.0, 4.0])
    plan = Plan(2, m.places, m.entries, np.ones(2), np.ones(2))
    factors, watched = plan.factor(m.entries)
    assert not factors and not watched
    assert plan.solve(factors, [5.0, 6.0], transposed=False) == pytest.approx([-4.0, 4.5])
    assert plan.sign == -1


def test_an_entry_given_twice_is_refused() -> None:
    with pytest.raises(AssertionError, match="twice"):
        Plan(1, [(0, 0), (0, 0)], [1.0, 2.0], np.ones(1), np.ones(1))
