"""Curves of one mechanism over its stroke, case by case: their samples, and their exact values anywhere."""

from __future__ import annotations

from bisect import bisect_right
from collections.abc import Collection, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import Any

import numpy as np

from linkcalc.design.survey import Shown, Survey
from linkcalc.mechanics.balance import part_of_motion
from linkcalc.mechanics.pipeline import mesh_of, solve_at
from linkcalc.mechanics.sampled import Peaks, Roots, Samples
from linkcalc.mechanics.solved import Solved
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array, Mask, Numbers


@dataclass(frozen=True)
class Wanted:
    """One extreme that is looked for.

    name  of the quantity; case its number; sense +1 the largest, -1 the smallest
    size  True: of its size, whichever sense it has
    """

    name: str
    case: int
    sense: int
    size: bool = False


@dataclass(frozen=True)
class Found:
    """An extreme or root: drive [rad or m], and the value of the quantity there."""

    drive: float
    value: float


_ASKED = ("effort", "tare effort", "load")
_SIZED = ("force at ", "pressure at ", "tension of ")
_AT_LIMIT = 1e-3
"""Speed of what is asked over the fastest, at the pose just short of a limit of motion: a dead point"""


class Curves:
    """The quantities of a solved stroke as curves.

    survey   what can be asked
    shown    the samples, at even values of the drive
    """

    def __init__(self, survey: Survey, shown: Shown, limits: Sequence[float] = ()):
        """limits: limits of motion [rad or m] that the stroke begins or ends at."""
        self.survey, self.shown = survey, shown
        self.drive: Array = shown.solved.drive[0, 0]
        self._names = list(survey.quantities)
        self._row = {name: k for k, name in enumerate(self._names)}
        self._samples = survey.values(self._names, shown)[:, :, 0]
        self.dead: list[float] = []  # dead points of effort and load, and
        self.zero: list[float] = []  # these and all reversals, once they are found
        self.nowhere = bool((shown.solved.balance.status != Status.FINE).all())
        self._samples[self._row_of_sizes(limits)] = np.inf
        sizes = np.abs(self._samples)
        self._sizes = sizes.max(axis=(1, 2), initial=0.0, where=np.isfinite(sizes)).tolist()
        self._column: dict[float, int] = {}
        self._batches: list[Shown] = []  # what was solved, one after the other
        self._first: list[int] = []  # column that each begins at
        self._values: Array = np.zeros((len(self._names), len(survey.ready.pushing.cases), 0))
        self._mesh = mesh_of(survey.ready, shown.solved) if self.drive.size > 1 else None

    def _row_of_sizes(self, limits: Sequence[float]) -> Mask:
        """(name, case, pose) where an effort or the size of a force has no bound: at a dead point of what is asked.

        A stroke that ends at a limit of motion stands a little short of it, and of a dead point there.
        """
        b, ready = self.shown.solved.balance, self.survey.ready
        dead = (b.status == Status.DEAD_POINT)[:, 0]
        if limits and self.drive.size > 1:
            parts = part_of_motion(ready.chain, self.shown.solved.closed, ready.pushing)
            part = np.broadcast_to(parts[1 if ready.pushing.load_asked else 0][:, 0], dead.shape)
            reach = np.ptp(self.drive)
            at_limit = np.any([np.abs(self.drive - limit) <= 1e-8 * reach for limit in limits], axis=0)
            dead = dead | (at_limit & (part < _AT_LIMIT))
        known = self.survey.quantities
        sized = np.array(
            [n in _ASKED or (n.startswith(_SIZED) and known[n].kind in ("force", "stress")) for n in self._names]
        )
        return sized[:, None, None] & dead

    def samples(self, name: str) -> Array:
        """(case, pose) values at the stroke's poses."""
        values: Array = self._samples[self._row[name]]
        return values

    @cached_property
    def largest_force(self) -> float:
        """[N] the largest force of any joint at any of the samples."""
        names = [f"force at {s.joint}" for s in self.survey.sides]
        return max((self.size(n) for n in dict.fromkeys(names)), default=0.0)

    def size(self, name: str) -> float:
        """The largest of a quantity's absolute values at the samples, what is not finite left out."""
        size: float = self._sizes[self._row[name]]
        return size

    def solve(self, drive: Array) -> Solved:
        """Statics at any values of the drive (values)."""
        if self._mesh is None:
            return self.shown.solved
        return solve_at(self.survey.ready, self._mesh, drive, checked=False)

    def at(self, names: Sequence[str], drive: Array) -> Array:
        """(names, case, values) at any values of the drive; what was asked before is not solved again."""
        new = np.array([d for d in dict.fromkeys(drive.tolist()) if d not in self._column])
        if new.size:
            shown = self.survey.show(self.solve(new))
            values = self.survey.values(self._names, shown)[:, :, 0]
            start = len(self._column)
            self._batches.append(shown)
            self._first.append(start)
            self._column.update((d, start + k) for k, d in enumerate(new.tolist()))
            self._values = np.concatenate([self._values, values], axis=2)
        columns = [self._column[d] for d in drive.tolist()]
        rows = [self._row[n] for n in names]
        found: Array = self._values[rows][:, :, columns]
        return found

    def seen(self, drive: float) -> tuple[Shown, int]:
        """The batch that holds a value of the drive, and its number there; solved if it was not asked before."""
        if self._mesh is None:
            return self.shown, 0
        self.at([], np.array([drive]))
        column = self._column[drive]
        batch = bisect_right(self._first, column) - 1
        return self._batches[batch], column - self._first[batch]

    def extremes(self, wanted: Sequence[Wanted]) -> list[Found]:
        """All the extremes asked for, found together. Of a size, the value comes with the sign it has there."""
        found = Extremes(self, wanted).found()
        return [found[w] for w in wanted]


class Extremes:
    """Extremes looked for together: foretold places first, then found exactly."""

    def __init__(self, curves: Curves, wanted: Sequence[Wanted]):
        self._curves, self.wanted = curves, tuple(wanted)
        if not wanted:
            return
        self._names, self._which = _numbered([w.name for w in wanted])
        self._case = np.array([w.case for w in wanted], int)
        self._sense = np.array([w.sense for w in wanted], float)
        self._size = np.array([w.size for w in wanted], bool)
        self._raw = np.stack([curves.samples(n) for n in self._names])[self._which, self._case]
        self._peaks = Peaks(Samples(curves.drive, self._seen(self._raw, slice(None))))

    @property
    def places(self) -> Array:
        """Where the samples foretell them."""
        return self._peaks.place

    @property
    def foretold(self) -> Array:
        """(wanted) what the samples foretell each of them to be, of what is to be largest; -inf if it has no value."""
        return self._peaks.foretold

    def places_of(self, wanted: Collection[Wanted]) -> Array:
        """Where the samples foretell some of them."""
        chosen = np.array([w in wanted for w in self.wanted], bool)
        return self._peaks.place[chosen[self._peaks.curve]]

    def found(self, besides: Collection[Wanted] = (), only: Collection[Wanted] | None = None) -> dict[Wanted, Found]:
        """All of them, or only some, but for those that are known already."""
        endless = self._endless(besides)
        left = [
            k
            for k, w in enumerate(self.wanted)
            if w not in besides and w not in endless and (only is None or w in only)
        ]
        if not left:
            return endless
        signs = np.ones(len(self._case))

        def f(x: Array, k: Numbers) -> Array:
            y = self._curves.at(self._names, x)[self._which[k], self._case[k], np.arange(x.size)]
            signs[k] = np.where(y < 0, -1.0, 1.0)
            return self._seen(y, k)

        only = np.array(left)
        place, best = self._peaks.confirmed(f, only)
        value = self._sense[only] * best
        if self._size.any():
            drive = self._curves.drive
            nearest = self._raw[only, np.abs(drive - place[:, None]).argmin(axis=1)]
            told = np.where(np.isfinite(nearest), nearest, signs[only])
            value = np.where(self._size[only] & (told < 0), -value, value)
        found = {self.wanted[k]: Found(float(p), float(v)) for k, p, v in zip(left, place, value, strict=True)}
        return found | endless

    def _endless(self, besides: Collection[Wanted]) -> dict[Wanted, Found]:
        """Those that have no bound at one of the poses themselves: a stroke may begin or end at a dead point."""
        where = np.isposinf(self._seen(self._raw, slice(None))) if self.wanted else np.zeros((0, 1), bool)
        return {
            w: Found(float(self._curves.drive[np.argmax(row)]), w.sense * np.inf)
            for w, row in zip(self.wanted, where, strict=True)
            if row.any() and w not in besides
        }

    def _seen(self, y: Array, k: Any) -> Array:
        """What is to be largest; a row a curve, or one value each."""
        sense, size = self._sense[k], self._size[k]
        if y.ndim == 2:
            sense, size = sense[:, None], size[:, None]
        seen: Array = sense * np.where(size, np.abs(y), y)
        return seen


class Zeros:
    """Where quantities change their sign: foretold places first, then found exactly.

    alike  names of those that are the same in all cases
    """

    def __init__(self, curves: Curves, names: Sequence[str]):
        self._curves, self._names = curves, list(names)
        samples = np.stack([curves.samples(n) for n in names]) if names else np.zeros((0, 1, curves.drive.size))
        # what is alike in all cases is told once, for case 0
        alike = [bool(np.all(s == s[:1])) for s in samples]
        self.alike = {name for name, same in zip(self._names, alike, strict=True) if same}
        which = [(n, c) for n in range(len(alike)) for c in range(1 if alike[n] else samples.shape[1])]
        self._rows, self._cases = np.array(which, int).reshape(-1, 2).T
        self._roots = Roots(Samples(curves.drive, samples[self._rows, self._cases]))

    @property
    def places(self) -> Array:
        """Where the samples foretell them."""
        return self._roots.place

    def names(self) -> list[str]:
        """Name of the quantity of each of them."""
        return [self._names[self._rows[k]] for k in self._roots.curve]

    def found(self) -> list[tuple[str, int, float]]:
        """(name, case, drive) of each, exactly."""

        def f(x: Array, k: Numbers) -> Array:
            return self._curves.at(self._names, x)[self._rows[k], self._cases[k], np.arange(x.size)]

        cases = [int(self._cases[k]) for k in self._roots.curve]
        return list(zip(self.names(), cases, self._roots.confirmed(f).tolist(), strict=True))


def _numbered(names: Sequence[str]) -> tuple[list[str], Numbers]:
    unique = list(dict.fromkeys(names))
    return unique, np.array([unique.index(n) for n in names], np.intp)
