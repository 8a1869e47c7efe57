"""The edge where SI becomes the units of the model file, once for all formats."""

from __future__ import annotations

import math

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.mechanism import Units
from linkcalc.model.units import from_si
from linkcalc.parts.pose import Array
from linkcalc.report.numbers import number, plain
from linkcalc.report.quantities import unit_of

# unit of load over effort, where one is a force and the other a torque: a ratio keeps SI whatever the file's units
_RATIOS = {("force", "moment"): "1/m", ("moment", "force"): "m"}
_SPEED = (1, 0, -1, 0)
# what rounding leaves of an exact nothing, as a part of the largest of its kind
_NOISE = 1e-8


def _largest(values: Array) -> float:
    return float(np.max(np.abs(values), initial=0.0, where=np.isfinite(values)))


class Edge:
    """Units of an answer; `what` is a kind of size ("force", "length"), or "drive", "effort", "load" as it has them."""

    def __init__(self, answer: StrokeAnswer):
        self._units = answer.mechanism.units
        self._kinds = answer.kinds
        force = _largest(answer.force)
        turning = [answer.moment] + [getattr(answer, k) for k in ("effort", "load") if answer.kinds.get(k) == "moment"]
        reach = max(_largest(answer.x - answer.x[:1]), _largest(answer.y - answer.y[:1]))
        moment = max(force * reach, *(_largest(m) for m in turning))
        self._noise = {"force": force * _NOISE, "moment": moment * _NOISE}

    def kind(self, what: str) -> str:
        """The kind of size behind "drive", "effort", "load"; any other is one already."""
        return self._kinds.get(what, "number" if what in ("drive", "effort", "load", "ratio") else what)

    @property
    def units(self) -> Units:
        """The units of the model file."""
        return self._units

    def unit(self, what: str) -> str:
        """Its unit as the file writes it: "N*m"."""
        if what == "ratio":
            return _RATIOS.get((self._kinds.get("load", ""), self._kinds.get("effort", "")), "")
        return self._units.of(self.kind(what))

    def out(self, values: Array | float, what: str) -> Array:
        """SI -> the file's unit."""
        return np.asarray(from_si(np.asarray(values, dtype=np.float64), self.kind(what), self._units))

    def one(self, value: float, what: str) -> float:
        """SI -> the file's unit, one number."""
        return float(from_si(value, self.kind(what), self._units))

    @property
    def speed_unit(self) -> str:
        """Speeds of rubbing have the units of the trade: metres a second, or feet a minute beside inches."""
        return unit_of(_SPEED, self._units)[0]

    def speed(self, value: float) -> float:
        """[m/s] -> that unit."""
        return value / unit_of(_SPEED, self._units)[1]

    def zero(self, what: str) -> float:
        """[file's unit] what is smaller is written as 0."""
        return self.one(self._noise.get(self.kind(what), 0.0), what)

    def drive_places(self, drive: Array) -> int:
        """Decimal places that tell a drive to about a hundred-thousandth of the stroke."""
        real = self.out(drive[np.isfinite(drive)], "drive")
        reach = float(np.ptp(real)) if real.size else 0.0
        return int(np.clip(4 - np.floor(np.log10(reach)), 0, 8)) if reach > 0 else 3

    def text(self, value: float, what: str, digits: int = 4) -> str:
        """A number with its unit for reading: "123.4 N"."""
        shown = number(self.one(value, what), digits, zero=self.zero(what), trim=True)
        return shown if math.isinf(value) else f"{shown} {plain(self.unit(what))}".strip()
