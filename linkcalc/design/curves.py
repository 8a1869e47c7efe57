"""Curves of one mechanism over its stroke, case by case: their samples, and their exact values anywhere."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from linkcalc.design.survey import Shown, Survey
from linkcalc.mechanics.mesh import Mesh
from linkcalc.mechanics.pipeline import Solved, solve_at
from linkcalc.mechanics.sampled import Samples, sampled_peaks, sampled_roots
from linkcalc.parts.pose import Array


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


class Curves:
    """The quantities of a solved stroke as curves.

    survey   what can be asked
    shown    the samples, at even values of the drive
    """

    def __init__(self, survey: Survey, shown: Shown):
        self.survey, self.shown = survey, shown
        self.drive: Array = shown.solved.drive[0, 0]
        self._mesh = Mesh(self.drive, [shown.solved.closed]) if self.drive.size > 1 else None

    def samples(self, name: str) -> Array:
        """(case, pose) values at the stroke's poses."""
        values: Array = self.survey.values([name], self.shown)[0, :, 0]
        return values

    def solve(self, drive: Array) -> Solved:
        """Statics at any values of the drive (values)."""
        if self._mesh is None:
            return self.shown.solved
        return solve_at(self.survey.ready, self._mesh, drive)

    def at(self, names: Sequence[str], drive: Array) -> Array:
        """(names, case, values) at any values of the drive."""
        values: Array = self.survey.values(names, self.survey.show(self.solve(drive)))[:, :, 0]
        return values

    def extremes(self, wanted: Sequence[Wanted]) -> list[Found]:
        """All the extremes asked for, found together."""
        names, which = _numbered([w.name for w in wanted])
        cases = np.array([w.case for w in wanted], int)
        sense = np.array([w.sense for w in wanted], float)
        size = np.array([w.size for w in wanted], bool)
        if not wanted:
            return []
        all_samples = np.stack([self.samples(n) for n in names])[which, cases]

        def seen(y: Array, k: NDArray[np.intp]) -> Array:
            return sense[k] * np.where(size[k], np.abs(y), y)

        def f(x: Array, k: NDArray[np.intp]) -> Array:
            return seen(self.at(names, x)[which[k], cases[k], np.arange(x.size)], k)

        every = np.arange(len(wanted))
        seen_samples = sense[:, None] * np.where(size[:, None], np.abs(all_samples), all_samples)
        place, best = sampled_peaks(f, Samples(self.drive, seen_samples))
        exact = self.at(names, place)[which, cases, every] if self._mesh else all_samples[:, 0]
        # the sign that the size hides is the one at the place
        value = np.where(size, np.copysign(best * sense, exact), best * sense)
        return [Found(float(p), float(v)) for p, v in zip(place, value, strict=True)]

    def zeros(self, name: str) -> list[tuple[int, float]]:
        """Where a quantity changes its sign: (case, drive), exactly."""
        samples = self.samples(name)
        samples = samples[:1] if np.all(samples == samples[:1]) else samples

        def f(x: Array, k: NDArray[np.intp]) -> Array:
            return self.at([name], x)[0, k, np.arange(x.size)]

        place, case = sampled_roots(f, Samples(self.drive, samples))
        return [(int(c), float(p)) for c, p in zip(case, place, strict=True)]


def _numbered(names: Sequence[str]) -> tuple[list[str], NDArray[np.intp]]:
    unique = list(dict.fromkeys(names))
    return unique, np.array([unique.index(n) for n in names], np.intp)
