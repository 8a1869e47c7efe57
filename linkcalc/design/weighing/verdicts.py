"""Errors at some loads with all their causes, and whether a class allows them, range by range."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

import numpy as np

from linkcalc.design.weighing.accuracy import Accuracy
from linkcalc.design.weighing.answer import Band
from linkcalc.design.weighing.errors import Cause, Judge, Progress, Scatter, causes, dead_band, scatter
from linkcalc.design.weighing.setting import Balancing, Setting
from linkcalc.model.mechanism import Mechanism
from linkcalc.parts.pose import Array, Mask

_EXACT = 1e-9
_GRAVITY = 1e-3


class Wrong:
    """How wrong a scale is at some setting: the same causes and the same copies each time."""

    def __init__(
        self, mechanism: Mechanism, bare: Mechanism, balancing: Balancing, zeroed: bool,
        sizes: Mapping[str, Array] | None, accuracy: Accuracy | None, turned: float, mark_error: float,
    ):  # fmt: skip
        self._mechanism, self._bare, self._balancing, self._zeroed = mechanism, bare, balancing, zeroed
        self._sizes, self._accuracy, self._turned, self._mark_error = sizes, accuracy, turned, mark_error

    def found(
        self, setting: Setting, progress: Progress | None
    ) -> tuple[Judge, Array, tuple[Cause, ...], Scatter | None]:
        """Its judge, half the dead band [kg], cause by cause, and the copies."""
        judge = Judge(self._balancing, setting, zeroed=self._zeroed)
        band = dead_band(self._mechanism, self._balancing, setting)
        reasons = tuple(causes(judge, self._bare, turned=self._turned, mark_error=self._mark_error, band=band))
        limit = None if self._accuracy is None else self._accuracy.limit(setting.loads)
        spread = None if self._sizes is None else scatter(judge, self._bare, self._sizes, limit, progress)
        return judge, band, reasons, spread


def bands_of(
    known: Sequence[tuple[Array, Array, Scatter | None]], accuracy: Accuracy, most: float
) -> Iterator[Band]:  # fmt: skip
    """The worst in each range of loads of one limit.

    known  loads [kg] with the errors [kg] that are held against the class, and the copies
    """
    loads, errors = (np.concatenate([one[k] for one in known]) for k in (0, 1))
    for low, high, limit in accuracy.bands(most):
        inside = _among(loads, low, high)
        k = int(np.argmax(np.where(inside, errors, -1.0)))
        error, at = (float(errors[k]), float(loads[k])) if inside.any() else (float("nan"), float("nan"))
        shares = [s.within[_among(own, low, high)] for own, _, s in known if s is not None]
        share = float(min(part.min(initial=1.0) for part in shares)) if shares else float("nan")
        yield Band(low, high, limit, error, at, share)


def _among(loads: Array, low: float, high: float) -> Mask:
    return ((loads > low * (1 + _EXACT)) | (low == 0.0)) & (loads <= high * (1 + _EXACT))


def gravity(judge: Judge, setting: Setting) -> Array:
    """(n) [kg] error for 0.1 % more gravity: nothing where masses balance masses, and no more than springs and forces
    make of it where the empty scale is not set to zero again."""
    if judge.zeroed:
        return np.zeros(setting.loads.size)
    scale = judge.balancing.scale
    terms = scale.terms(setting.loads + judge.balancing.tare)
    return np.asarray(np.broadcast_to(-_GRAVITY * terms.fixed[:, 0] / terms.load[:, 0], setting.loads.shape))
