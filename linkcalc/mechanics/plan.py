"""Order of elimination for a small sparse matrix whose pattern is the same at every pose, planned once.

The matrix is P A Q = L U. Pivots are taken where little fills in, constants before arrays, and only where they
are not small against their row in the pose the plan is made from. The elimination is recorded on
a tape; the same factors solve A x = b and its transpose, so statics costs no second factorisation.
"""

from __future__ import annotations

import heapq
from collections.abc import Sequence

import numpy as np

from linkcalc.mechanics.tape import Operand, Tape, is_constant
from linkcalc.parts.pose import Array, Value

_THRESHOLD = 0.1  # a pivot is at least this part of the largest of its row, in the pose of the plan
_WEAK = 1e-4  # a pivot below this part of its row's size in the plan is left to LAPACK
_FAINT = 1e-5  # the same against the row before the elimination, should the plan's own pose be nearly singular
_NOTHING = 1e-9  # against the size of the mechanism: no pivot
_LOOK = 4  # rows with the fewest entries that are looked at for each pivot


class NoPlan(ArithmeticError):
    """The matrix is singular in the pose of the plan: rows that found no pivot."""

    def __init__(self, rows: list[int]):
        super().__init__(f"no pivot in rows {rows}")
        self.rows = rows


class Plan:
    """Pivot order and tapes for one pattern.

    floors    sizes below which a varying pivot is weak
    size      number of rows and columns
    places    (row, column) of each entry
    entries   values of the entries in some batch: floats stay constant, arrays are inputs of the tape
    row_size, column_size  what rows are multiplied and columns divided by, to compare lengths with angles
    part      how far along the batch the pose stands that the plan is made from
    """

    def __init__(
        self,
        size: int,
        places: Sequence[tuple[int, int]],
        entries: Sequence[Value],
        row_size: Array,
        column_size: Array,
        *,
        part: float = 0.5,
    ):
        self.size = size
        self.key = signature(entries)
        self._inputs = [k for k, e in enumerate(entries) if not isinstance(e, float)]
        self._order(places, _sample(entries, part), entries, row_size, column_size)
        self._solves: dict[tuple[bool, tuple[float | None, ...]], Tape] = {}

    def _order(
        self,
        places: Sequence[tuple[int, int]],
        sample: Sequence[float],
        entries: Sequence[Value],
        row_size: Array,
        column_size: Array,
    ) -> None:
        tape = Tape(len(self._inputs))
        register = {k: r + 1 for r, k in enumerate(self._inputs)}
        rows: list[dict[int, Operand]] = [{} for _ in range(self.size)]
        sizes: list[dict[int, float]] = [{} for _ in range(self.size)]
        columns: list[set[int]] = [set() for _ in range(self.size)]
        for k, (i, j) in enumerate(places):
            e = entries[k]
            operand: Operand = e if isinstance(e, float) else register[k]
            if isinstance(operand, float) and operand == 0.0:
                continue
            if j in rows[i]:
                raise AssertionError(f"entry {i}, {j} twice")
            rows[i][j] = operand
            sizes[i][j] = sample[k] * float(row_size[i] / column_size[j])
            columns[j].add(i)

        whole = [max(map(abs, row.values()), default=0.0) for row in sizes]
        self._pivots: list[tuple[int, int]] = []
        self._inverse: list[Operand] = []
        self._lower: list[list[tuple[int, Operand]]] = []
        self._upper: list[list[tuple[int, Operand]]] = []
        pivots: list[Operand] = []
        floors: list[float] = []
        open_rows = set(range(self.size))
        queue = [(len(rows[i]), i) for i in open_rows]
        heapq.heapify(queue)
        while open_rows:
            p, q = self._choose(queue, open_rows, rows, sizes, columns)
            row, size_row = rows[p], sizes[p]
            pivot, size_pivot = row.pop(q), size_row.pop(q)
            scale = row_size[p] / column_size[q]
            largest = max(abs(size_pivot), *(abs(s) for s in size_row.values()), 0.0)
            floors.append(max(_WEAK * largest, _FAINT * whole[p]) / scale)
            pivots.append(pivot)
            inverse = tape.over(1.0, pivot)
            lower: list[tuple[int, Operand]] = []
            open_rows.discard(p)
            for j in (q, *row):
                columns[j].discard(p)
            for i in sorted(columns[q]):
                factor = tape.times(rows[i].pop(q), inverse)
                size_factor = sizes[i].pop(q) / size_pivot
                lower.append((i, factor))
                for j, operand in row.items():
                    rows[i][j] = tape.less(rows[i].get(j, 0.0), tape.times(factor, operand))
                    sizes[i][j] = sizes[i].get(j, 0.0) - size_factor * size_row[j]
                    columns[j].add(i)
                heapq.heappush(queue, (len(rows[i]), i))
            columns[q].clear()
            self._pivots.append((p, q))
            self._inverse.append(inverse)
            self._lower.append(lower)
            self._upper.append(sorted(row.items()))

        sign = _parity(self._pivots)
        self.floors = [f for o, f in zip(pivots, floors, strict=True) if not is_constant(o)]
        watched = [o for o in pivots if not is_constant(o)]
        for pivot in pivots:
            if isinstance(pivot, float) and pivot < 0:
                sign = -sign
        self.sign = sign
        factors = [o for o in self._factors() if not is_constant(o)]
        self._kept = list(dict.fromkeys(abs(int(o)) for o in factors))
        self._tape = tape.finish([*self._kept, *watched])
        self._renumber({register: k + 1 for k, register in enumerate(self._kept)})

    def _choose(
        self,
        queue: list[tuple[int, int]],
        open_rows: set[int],
        rows: list[dict[int, Operand]],
        sizes: list[dict[int, float]],
        columns: list[set[int]],
    ) -> tuple[int, int]:
        """The next pivot: least fill-in among the shortest rows; constants first, then the largest."""
        best: tuple[float, bool, float] | None = None
        place = (-1, -1)
        looked: list[tuple[int, int]] = []
        while queue and len(looked) < _LOOK:
            length, i = heapq.heappop(queue)
            if i not in open_rows or length != len(rows[i]) or any(i == r for _, r in looked):
                continue  # an old entry of this row
            looked.append((length, i))
            largest = max(map(abs, sizes[i].values()), default=0.0)
            if largest < _NOTHING:
                continue
            for j, operand in rows[i].items():
                part = abs(sizes[i][j]) / largest
                if part < _THRESHOLD:
                    continue
                merit = ((len(rows[i]) - 1) * (len(columns[j]) - 1), not is_constant(operand), -part)
                if best is None or merit < best:
                    best, place = merit, (i, j)
        for item in looked:
            if item[1] != place[0]:
                heapq.heappush(queue, item)
        if best is None:
            if not queue and not looked:
                raise NoPlan(sorted(open_rows))
            return self._desperate(open_rows, rows, sizes)
        return place

    def _desperate(
        self, open_rows: set[int], rows: list[dict[int, Operand]], sizes: list[dict[int, float]]
    ) -> tuple[int, int]:
        """No short row has a good pivot: the entry that is largest of all."""
        best, place = _NOTHING, (-1, -1)
        for i in sorted(open_rows):
            for j in rows[i]:
                if abs(sizes[i][j]) > best:
                    best, place = abs(sizes[i][j]), (i, j)
        if place[0] < 0:
            raise NoPlan(sorted(open_rows))
        return place

    def _factors(self) -> list[Operand]:
        return [
            *self._inverse,
            *(o for column in self._lower for _, o in column),
            *(o for row in self._upper for _, o in row),
        ]

    def _renumber(self, to: dict[int, int]) -> None:
        """Factors become inputs of the solving tapes."""

        def new(o: Operand) -> Operand:
            return o if isinstance(o, float) else (to[o] if o > 0 else -to[-o])

        self._inverse = [new(o) for o in self._inverse]
        self._lower = [[(i, new(o)) for i, o in column] for column in self._lower]
        self._upper = [[(j, new(o)) for j, o in row] for row in self._upper]

    # -- replay ------------------------------------------------------------------------------------------

    def factor(self, entries: Sequence[Value]) -> tuple[list[Value], list[Value]]:
        """Factors for a batch, and the pivots that vary, in the order of ``floors``."""
        out = self._tape.play([entries[k] for k in self._inputs])
        kept = len(self._kept)
        return out[:kept], out[kept:]

    def solve(self, factors: list[Value], rhs: Sequence[Value], *, transposed: bool) -> list[Value]:
        """x of A x = b, or of its transpose; constants of b (zeros above all) are folded into the tape."""
        pattern = signature(rhs)
        tape = self._solves.get((transposed, pattern))
        if tape is None:
            record = self._record_transposed if transposed else self._record_solve
            tape = self._solves[transposed, pattern] = record(pattern)
        return tape.play([*factors, *(b for b in rhs if not isinstance(b, float))])

    def _inputs_of(self, pattern: tuple[float | None, ...]) -> tuple[Tape, list[Operand]]:
        varying = sum(b is None for b in pattern)
        tape = Tape(len(self._kept) + varying)
        register = len(self._kept)
        operands: list[Operand] = []
        for b in pattern:
            if b is None:
                register += 1
                operands.append(register)
            else:
                operands.append(b)
        return tape, operands

    def _record_solve(self, pattern: tuple[float | None, ...]) -> Tape:
        tape, b = self._inputs_of(pattern)
        for (p, _), lower in zip(self._pivots, self._lower, strict=True):
            for i, factor in lower:
                b[i] = tape.less(b[i], tape.times(factor, b[p]))
        x: list[Operand] = [0.0] * self.size
        for k in reversed(range(self.size)):
            p, q = self._pivots[k]
            total = b[p]
            for j, u in self._upper[k]:
                total = tape.less(total, tape.times(u, x[j]))
            x[q] = tape.times(total, self._inverse[k])
        return tape.finish(x)

    def _record_transposed(self, pattern: tuple[float | None, ...]) -> Tape:
        tape, b = self._inputs_of(pattern)
        z: list[Operand] = [0.0] * self.size
        for k, (p, q) in enumerate(self._pivots):
            z[p] = tape.times(b[q], self._inverse[k])
            for j, u in self._upper[k]:
                b[j] = tape.less(b[j], tape.times(u, z[p]))
        for k in reversed(range(self.size)):
            p = self._pivots[k][0]
            for i, factor in self._lower[k]:
                z[p] = tape.less(z[p], tape.times(factor, z[i]))
        return tape.finish(z)


def signature(values: Sequence[Value]) -> tuple[float | None, ...]:
    """Which values are constants, and which; None stands for an array."""
    return tuple([v if isinstance(v, float) else None for v in values])


def _sample(entries: Sequence[Value], part: float) -> list[float]:
    """The entries of one pose out of the batch: the one so far along it, or the nearest where all are finite."""
    arrays = [e for e in entries if not isinstance(e, float)]
    shape = np.broadcast_shapes(*(a.shape for a in arrays)) if arrays else (1,)
    first = min(int(np.prod(shape) * part), int(np.prod(shape)) - 1)

    def pose(k: int) -> list[float]:
        at = np.unravel_index(k, shape)
        return [e if isinstance(e, float) else float(np.broadcast_to(e, shape)[at]) for e in entries]

    sample = pose(first)
    if np.isfinite(sample).all():
        return sample
    finite = np.ones(shape, bool)
    for a in arrays:
        finite &= np.isfinite(a)
    sound = np.flatnonzero(finite)
    return pose(int(sound[np.argmin(np.abs(sound - first))])) if sound.size else [1.0] * len(entries)


def _parity(pivots: list[tuple[int, int]]) -> int:
    """Sign of the permutation that takes each pivot's row to its column."""
    to = dict(pivots)
    sign, seen = 1, set[int]()
    for start in to:
        length, at = 0, start
        while at not in seen:
            seen.add(at)
            at = to[at]
            length += 1
        if length and length % 2 == 0:
            sign = -sign
    return sign
