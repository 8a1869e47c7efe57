"""What ``weigh`` returns: frozen dataclasses of named arrays in SI, masses in kg."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from linkcalc.design.answer import Caveat
from linkcalc.design.weighing.accuracy import Accuracy
from linkcalc.design.weighing.corners import Corners
from linkcalc.design.weighing.errors import Cause, Scatter, largest, likely
from linkcalc.model.mechanism import Mechanism
from linkcalc.parts.pose import Array, Codes


@dataclass(frozen=True, eq=False)
class Bar:
    """The marks of one poise on its bar, (marks).

    use        "load", "tare", "zero"
    notched    True for notches, False for lines
    loads      [kg] what it balances there
    places     [m] along the bar, from the first point of its line
    x, y       [m] of the mark on the line as drawn, from the fulcrum
    departure  [m] of the place from even spacing between the first mark and the last
    worth      [kg/m] load for each metre
    ends       [m] places of nothing and of the most; length [m] of the line; along: its points
    """

    name: str
    use: str
    notched: bool
    loads: Array
    places: Array
    x: Array
    y: Array
    departure: Array
    worth: float
    ends: tuple[float, float]
    length: float
    along: tuple[str, str]

    @property
    def spacing(self) -> Array:
        """(marks) [m] from the mark before; nan for the first"""
        return np.concatenate([[np.nan], np.abs(np.diff(self.places))])

    @property
    def uneven(self) -> float:
        """[m] the largest departure from even spacing"""
        return float(np.max(np.abs(self.departure), initial=0.0))


@dataclass(frozen=True, eq=False)
class Tilt:
    """How the balanced beam tilts, (n) at each load.

    stiffness  [N m/rad]; steady: +1 stable, 0 neutral, -1 unstable
    per_load   [rad/kg] for a load more, minus where it sinks clockwise
    per_place  [rad/m] for the fine poise a metre on; nan without one
    pointer    the point whose way is told; arm [m] from the fulcrum
    unstable   [kg] load from which on the beam is unstable; nan if it never is, or always
    """

    stiffness: Array
    steady: Codes
    per_load: Array
    per_place: Array
    pointer: str
    arm: float
    unstable: float


@dataclass(frozen=True)
class Asked:
    """What the class asks of the motion for an extra load.

    load    [kg] on the scale; extra [kg] put on besides
    gives   [m] way of the pointer, exact; nan if the beam does not come to rest near
    wanted  [m] at least
    """

    load: float
    extra: float
    gives: float
    wanted: float

    @property
    def holds(self) -> bool:
        return bool(self.gives >= self.wanted)


@dataclass(frozen=True)
class Band:
    """A range of loads of one limit of error.

    low, high  [kg] loads; limit [kg]
    error      [kg] the worst found there; at: [kg] the load it is found at; nan: the scale does not weigh there
    within     part of the copies within the limit; nan without copies
    """

    low: float
    high: float
    limit: float
    error: float
    at: float
    within: float = float("nan")

    @property
    def holds(self) -> bool:
        return not self.error > self.limit * (1 + 1e-9)


@dataclass(frozen=True, eq=False)
class WeighAnswer:
    """A scale, asked for some loads; (n) arrays.

    beam       name of the beam; fulcrum: the point it turns about
    least, capacity  [kg] loads with everything at nothing and at the most
    loads      [kg]; tare [kg] balanced besides
    places     poise -> [m] where it stands; hung: counterpoise -> [kg]; left [kg] unbalanced, where only notches are
    ratios     counterpoise -> load over the mass on it
    zero       [m] place of the zero poise, nan without one; tare_place likewise
    asked_load [kg] load for the places that were given; nan if none were
    causes     errors cause by cause; likely and largest [kg] their root sum of squares, and their plain sum
    dead_band  [kg] half of it, by friction
    gravity    [kg] (n) error for 0.1 % more gravity
    holds      False if a limit of the class fails
    """

    mechanism: Mechanism
    case: str
    beam: str
    fulcrum: str
    least: float
    capacity: float
    loads: Array
    tare: float
    places: Mapping[str, Array]
    hung: Mapping[str, Array]
    left: Array
    ratios: Mapping[str, float]
    zero: float
    tare_place: float
    asked_load: float
    bars: tuple[Bar, ...]
    tilt: Tilt
    zeroed: bool
    causes: tuple[Cause, ...]
    dead_band: Array
    gravity: Array
    scatter: Scatter | None
    accuracy: Accuracy | None
    asked: tuple[Asked, ...]
    bands: tuple[Band, ...]
    corners: Corners | None
    caveats: tuple[Caveat, ...]
    cautions: tuple[Caveat, ...]

    @property
    def likely(self) -> Array:
        """(n) [kg] root of the sum of squares of all causes, friction added plainly"""
        return likely(self.causes, self.loads.size)

    @property
    def largest(self) -> Array:
        """(n) [kg] all causes at their worst together"""
        return largest(self.causes, self.loads.size)

    @property
    def holds(self) -> bool:
        moved = self.corners is None or self.corners.holds
        return moved and all(b.holds for b in self.bands) and all(a.holds for a in self.asked)
