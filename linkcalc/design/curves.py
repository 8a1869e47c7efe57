"""Curves of one mechanism over its stroke, case by case: their samples, and their exact values anywhere."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

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
        self._samples: dict[str, Array] = {}
        self._mesh = Mesh(self.drive, [shown.solved.closed]) if self.drive.size > 1 else None

    def samples(self, name: str) -> Array:
        """(case, pose) values at the stroke's poses."""
        if name not in self._samples:
            self._samples[name] = self.survey.values([name], self.shown)[0, :, 0]
        return self._samples[name]

    @cached_property
    def largest_force(self) -> float:
        """[N] the largest force of any joint at any of the samples."""
        names = [f"force at {s.joint}" for s in self.survey.sides]
        return max((size_of(self.samples(n)) for n in dict.fromkeys(names)), default=0.0)

    def solve(self, drive: Array) -> Solved:
        """Statics at any values of the drive (values)."""
        if self._mesh is None:
            return self.shown.solved
        return solve_at(self.survey.ready, self._mesh, drive, checked=False)

    def at(self, names: Sequence[str], drive: Array) -> Array:
        """(names, case, values) at any values of the drive."""
        values: Array = self.survey.values(names, self.survey.show(self.solve(drive)))[:, :, 0]
        return values

    def extremes(self, wanted: Sequence[Wanted]) -> list[Found]:
        """All the extremes asked for, found together. Of a size, the value comes with the sign it has there."""
        if not wanted:
            return []
        names, which = _numbered([w.name for w in wanted])
        cases = np.array([w.case for w in wanted], int)
        sense = np.array([w.sense for w in wanted], float)
        size = np.array([w.size for w in wanted], bool)
        raw = np.stack([self.samples(n) for n in names])[which, cases]
        signs = np.ones(len(wanted))

        def seen(y: Array, k: NDArray[np.intp]) -> Array:
            return sense[k] * np.where(size[k], np.abs(y), y)

        def f(x: Array, k: NDArray[np.intp]) -> Array:
            y = self.at(names, x)[which[k], cases[k], np.arange(x.size)]
            signs[k] = np.where(y < 0, -1.0, 1.0)
            return seen(y, k)

        samples = Samples(self.drive, sense[:, None] * np.where(size[:, None], np.abs(raw), raw))
        place, best = sampled_peaks(f, samples)
        nearest = raw[np.arange(len(wanted)), np.abs(self.drive - place[:, None]).argmin(axis=1)]
        signs = np.where(np.isfinite(nearest), np.sign(nearest), signs)
        value = np.where(size, sense * best * np.where(signs < 0, -1.0, 1.0), sense * best)
        return [Found(float(p), float(v)) for p, v in zip(place, value, strict=True)]

    def zeros(self, names: Sequence[str]) -> list[tuple[str, int, float]]:
        """Where quantities change their sign, exactly: (name, case, drive). What is alike in all cases is told once,
        for case 0."""
        if not names:
            return []
        samples = np.stack([self.samples(n) for n in names])
        alike = [bool(np.all(s == s[:1])) for s in samples]
        which = [(n, c) for n in range(len(names)) for c in range(1 if alike[n] else samples.shape[1])]
        rows, cases = (np.array(v, int) for v in zip(*which, strict=True))

        def f(x: Array, k: NDArray[np.intp]) -> Array:
            return self.at(names, x)[rows[k], cases[k], np.arange(x.size)]

        place, curve = sampled_roots(f, Samples(self.drive, samples[rows, cases]))
        return [(names[rows[k]], int(cases[k]), float(p)) for p, k in zip(place, curve, strict=True)]


def size_of(values: Array) -> float:
    """The largest of absolute values, what is not finite left out."""
    return float(np.max(np.abs(values), initial=0.0, where=np.isfinite(values)))


def _numbered(names: Sequence[str]) -> tuple[list[str], NDArray[np.intp]]:
    unique = list(dict.fromkeys(names))
    return unique, np.array([unique.index(n) for n in names], np.intp)
