"""Solve a batch of sparse systems and their transposes: replay the plan, and LAPACK where a pivot is small.

A fixed order of pivots can meet a small one at some poses; those entries, and only those, are solved densely.
If they become many, the order is planned anew from the batch at hand.
"""

from __future__ import annotations

from collections.abc import Sequence
from contextlib import suppress
from functools import cached_property
from typing import Any, Protocol

import numpy as np

from linkcalc.mechanics.batch import lows
from linkcalc.mechanics.plan import NoPlan, Plan, signature
from linkcalc.parts.pose import Array, Mask, Numbers, Value

SMALL = 48  # rows up to which a single matrix goes to LAPACK
_MOST = 64  # plans that are kept
_KEPT: dict[Any, Plan] = {}
"""Plans made before, the latest last: a search asks of the same mechanism again and again."""
_SINGULAR = 1e-7  # smallest over largest singular value: a pose closed to rounding is known to its square root only
_BESIDE = (0.5, 0.2, 0.8)  # of the batch: where a plan is made from
_MANY = 0.05  # part of a batch with weak pivots that calls for a new plan


class Elimination:
    """Solver for one pattern of entries; plans lie ready from one batch to the next.

    size      rows and columns
    places    (row, column) of each entry, no place twice
    row_size, column_size  (size,) what rows are multiplied and columns divided by before sizes are compared
    """

    def __init__(self, size: int, places: Sequence[tuple[int, int]], row_size: Array, column_size: Array):
        self.size, self.places = size, tuple(places)
        self.row_size, self.column_size = row_size, column_size
        self.scale = row_size[:, None] / column_size
        self.row_index, self.column_index = (list(k) for k in zip(*self.places, strict=True))
        self._same = (self.places, row_size.tobytes(), column_size.tobytes())
        self._plans: dict[tuple[float | None, ...], Plan] = {}

    def factor(self, entries: Sequence[Value], *, lone: bool) -> Factors:
        """Factors of a batch of matrices, or of a lone one. Raises NoPlan if they are singular throughout."""
        if lone and self.size <= SMALL:
            return Single(self, entries)
        key = signature(entries)
        plan = self._plans.get(key) or _KEPT.get((self._same, key))
        fresh = plan is None
        if plan is None:
            plan = self._plan(entries, key)
        factors, pivots, weak = self._replay(plan, entries)
        if weak is not None and not fresh and np.mean(weak) > _MANY:
            try:
                plan = self._plan(entries, key)
                factors, pivots, weak = self._replay(plan, entries)
            except NoPlan:
                pass
        return Factored(self, plan, factors, pivots, entries, weak)

    def _plan(self, entries: Sequence[Value], key: tuple[float | None, ...]) -> Plan:
        plan = self._plans[key] = self._made(entries)
        whole = (self._same, key)
        _KEPT.pop(whole, None)
        _KEPT[whole] = plan
        if len(_KEPT) > _MOST:
            del _KEPT[next(iter(_KEPT))]
        return plan

    def _made(self, entries: Sequence[Value]) -> Plan:
        """A plan from the middle of the batch, or from a pose beside it if the middle one is singular."""
        *beside, last = _BESIDE
        for part in beside:
            with suppress(NoPlan):
                return Plan(self.size, self.places, entries, self.row_size, self.column_size, part=part)
        return Plan(self.size, self.places, entries, self.row_size, self.column_size, part=last)

    def _replay(self, plan: Plan, entries: Sequence[Value]) -> tuple[list[Value], list[Value], Mask | None]:
        """Factors, the pivots that vary, and where one of them is weak (None: nowhere)."""
        with np.errstate(all="ignore"):
            factors, pivots = plan.factor(entries)
        weak: Mask | None = None
        for pivot, low, floor in zip(pivots, lows(pivots), plan.floors, strict=True):
            if not low >= floor:
                bad = ~(np.abs(pivot) >= floor)
                weak = bad if weak is None else weak | bad
        if weak is not None:
            weak = np.broadcast_to(weak, np.broadcast_shapes(weak.shape, *{np.shape(e) for e in entries}))
        return factors, pivots, weak

    def dense(self, entries: Sequence[Value], where: tuple[Numbers, ...], shape: tuple[int, ...]) -> Array:
        """(picked, size, size) matrices of some entries of the batch."""
        out = np.zeros((where[0].size, self.size, self.size))
        for (i, j), e in zip(self.places, entries, strict=True):
            out[:, i, j] = e if isinstance(e, float) else np.broadcast_to(e, shape)[where]
        return out


class Factors(Protocol):
    """What a factored batch can do.

    negative  (1, variant, pose) True where the determinant is below zero: it changes on another branch
    singular  (1, variant, pose) True where rounding decides what is solved; None: nowhere
    polar     the orthogonal part of a lone matrix, which jumps where the matrix passes through a singular one; of
              a batch it is not worked out, and None
    """

    @property
    def negative(self) -> Mask: ...

    @property
    def singular(self) -> Mask | None: ...

    @property
    def polar(self) -> Array | None: ...

    def solve(self, rhs: Sequence[Value], *, transposed: bool = False) -> list[Value]: ...


class Single:
    """One matrix of plain floats, solved densely: for a small one this is quicker than any plan."""

    singular = None

    def __init__(self, owner: Elimination, entries: Sequence[Value]):
        matrix = np.zeros((owner.size, owner.size))
        matrix[owner.row_index, owner.column_index] = entries
        self._row, self._column = owner.row_size, owner.column_size
        self._scaled = matrix * owner.scale

    @cached_property
    def negative(self) -> Mask:
        return np.full((1, 1, 1), np.linalg.slogdet(self._scaled)[0] < 0)

    @cached_property
    def polar(self) -> Array | None:
        """(size, size) the nearest orthogonal matrix."""
        u, _, vt = np.linalg.svd(self._scaled)
        return np.asarray(u @ vt)

    def solve(self, rhs: Sequence[Value], *, transposed: bool = False) -> list[Value]:
        b = np.array(rhs, float)
        try:
            if transposed:
                return list((np.linalg.solve(self._scaled.T, b / self._column) * self._row).tolist())
            return list((np.linalg.solve(self._scaled, b * self._row) / self._column).tolist())
        except np.linalg.LinAlgError:
            raise NoPlan(list(range(b.size))) from None


class Factored:
    """Factors of a batch, replayed from a plan; entries with a weak pivot are kept as dense matrices."""

    polar = None

    def __init__(
        self,
        owner: Elimination,
        plan: Plan,
        factors: list[Value],
        pivots: list[Value],
        entries: Sequence[Value],
        weak: Mask | None,
    ):
        self._owner, self._plan, self._factors, self._pivots = owner, plan, factors, pivots
        self._where: tuple[Numbers, ...] = ()
        if weak is not None:
            self._shape = weak.shape
            self._where = np.nonzero(weak)
            self._matrices = owner.dense(entries, self._where, self._shape)

    @cached_property
    def negative(self) -> Mask:
        """(1, variant, pose) True where the determinant is below zero."""
        negative: Mask = np.full((1, 1, 1), self._plan.sign < 0)
        for pivot in self._pivots:
            negative = negative ^ np.less(pivot, 0.0)
        if self._where:
            negative = np.array(np.broadcast_to(negative, self._shape))
            negative[self._where] = _negative_determinant(self._matrices)
        return negative

    @cached_property
    def singular(self) -> Mask | None:
        """(1, variant, pose) True where rounding decides what is solved; None: nowhere."""
        if not self._where:
            return None
        finite = np.isfinite(self._matrices).all(axis=(1, 2))
        sizes = np.linalg.svd(self._matrices[finite] * self._owner.scale, compute_uv=False)
        out: Mask = np.zeros(self._shape, bool)
        out[tuple(k[finite] for k in self._where)] = sizes[:, -1] <= _SINGULAR * sizes[:, 0]
        return out if out.any() else None

    def solve(self, rhs: Sequence[Value], *, transposed: bool = False) -> list[Value]:
        """x of A x = b, or of its transpose.

        rhs  size entries, floats or arrays that broadcast with the batch; NaN comes out where A is singular
        """
        with np.errstate(all="ignore"):
            x = self._plan.solve(self._factors, rhs, transposed=transposed)
        return self._mended(x, rhs, transposed) if self._where else x

    def _mended(self, x: list[Value], rhs: Sequence[Value], transposed: bool) -> list[Value]:
        shape = np.broadcast_shapes(self._shape, *(np.shape(b) for b in rhs))
        # poses that are the same in all cases are solved for all at once; free members make each case its own poses
        alike = self._shape[0] == 1
        where: Any = (slice(None), *self._where[1:]) if alike else self._where
        picked = [np.broadcast_to(b, shape)[where] for b in rhs]  # each (case, picked), or (picked)
        b = np.moveaxis(np.stack(picked), 2, 0) if alike else np.stack(picked, axis=1)[:, :, None]
        a = np.swapaxes(self._matrices, 1, 2) if transposed else self._matrices
        row = self._owner.column_size if transposed else self._owner.row_size
        column = self._owner.row_size if transposed else self._owner.column_size
        if transposed:
            row, column = 1.0 / row, 1.0 / column
        solved = solve_each(a * row[:, None] / column, b * row[:, None]) / column[:, None]
        out: list[Value] = []
        for k in range(len(x)):
            full = np.array(np.broadcast_to(x[k], shape))
            full[where] = solved[:, k, :].T if alike else solved[:, k, 0]
            out.append(full)
        return out


def solve_each(a: Array, b: Array) -> Array:
    """x of a x = b for many small matrices, (n, size, size) and (n, size, k); NaN where one is singular."""
    try:
        return np.asarray(np.linalg.solve(a, b), np.float64)
    except np.linalg.LinAlgError:
        out = np.full(b.shape, np.nan)
        for k in range(len(a)):
            try:
                out[k] = np.linalg.solve(a[k], b[k])
            except np.linalg.LinAlgError:
                continue
        return out


def _negative_determinant(a: Array) -> Mask:
    finite = np.isfinite(a).all(axis=(1, 2))
    sign = np.zeros(len(a))
    sign[finite] = np.linalg.slogdet(a[finite])[0]
    return sign < 0
