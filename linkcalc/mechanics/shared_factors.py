"""Factors of a chain whose joints share forces: the square system of ``redundancy``, solved like any other."""

from __future__ import annotations

from collections.abc import Sequence
from functools import cached_property

import numpy as np

from linkcalc.mechanics.eliminate import Elimination, Factors, Single
from linkcalc.mechanics.redundancy import Places
from linkcalc.parts.pose import Array, Mask, Value


class SharedElimination:
    """Solver for one pattern of J and C.

    places    (row, column) of each entry of J; row_size, column_size as of the chain
    """

    def __init__(self, places: Sequence[tuple[int, int]], row_size: Array, column_size: Array):
        self.places, self.row_size, self.column_size = tuple(places), row_size, column_size
        self._inner: Elimination | None = None
        self._pattern: tuple[tuple[int, int], ...] = ()

    def factor(self, entries: Sequence[Value], gives: Places, *, lone: bool) -> SharedFactors:
        """Factors of a batch. Raises NoPlan where all are singular."""
        rows = self.row_size.size
        if self._inner is None or self._pattern != tuple(gives):
            self._pattern = tuple(gives)
            places = [
                *gives,
                *((i, rows + j) for i, j in self.places),
                *((rows + j, i) for i, j in self.places),
            ]
            # a multiplier times the size of its row is a force, and so is a generalised force over that of its column
            row_size = np.concatenate([self.row_size, 1.0 / self.column_size])
            column_size = np.concatenate([1.0 / self.row_size, self.column_size])
            self._inner = Elimination(row_size.size, places, row_size, column_size)
        whole = [*(-g for g in gives.values()), *entries, *entries]
        inner = Single(self._inner, whole) if lone else self._inner.factor(whole, lone=False)
        return SharedFactors(self, inner, entries, lone)


class SharedFactors:
    """Solves J d = gap, and Jᵀ z = Q with the least energy."""

    def __init__(self, owner: SharedElimination, inner: Factors, entries: Sequence[Value], lone: bool):
        self._owner, self._inner, self._entries, self._lone = owner, inner, entries, lone

    @property
    def negative(self) -> Mask:
        """Never: the determinant of the square system does not change its sign."""
        return np.full((1, 1, 1), False)

    @property
    def singular(self) -> Mask | None:
        return self._inner.singular

    @cached_property
    def polar(self) -> Array | None:
        """(rows, columns) of a lone J: the nearest matrix with orthonormal columns."""
        if not self._lone:
            return None
        matrix = np.zeros((self._owner.row_size.size, self._owner.column_size.size))
        for (i, j), e in zip(self._owner.places, self._entries, strict=True):
            matrix[i, j] = e
        u, _, vt = np.linalg.svd(matrix * self._owner.row_size[:, None] / self._owner.column_size, full_matrices=False)
        return np.asarray(u @ vt)

    def solve(self, rhs: Sequence[Value], *, transposed: bool = False) -> list[Value]:
        """d for the gaps of all rows; or, transposed, z for a generalised force on every column.

        Forces on pins themselves may follow those on the columns: see ``Sharing.beside``.
        """
        rows, columns = self._owner.row_size.size, self._owner.column_size.size
        if not transposed:
            return self._inner.solve([*rhs, *[0.0] * columns])[rows:]
        force, beside = rhs[:columns], [*rhs[columns:]]
        return self._inner.solve([*beside, *[0.0] * (rows - len(beside)), *force])[:rows]
