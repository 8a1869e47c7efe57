"""The pin as a beam across its plates: shear and bending moment along it, in two planes.

The pin is taken as stiff against the plates, and all plates as equally yielding over their thickness. Then the plates
of one member share its force by thickness, the pressure along each plate is even, and what would tip the pin is taken
up by a pressure that rises evenly across each member's plates, by one slope for the whole pin. A fork that holds a rod
in its middle has no such slope, and its moment is the usual one of a clevis.

With z along the pin, zm the middle of a member's plates by thickness, F the force of the member on the pin, T the whole
thickness of its plates, s the one slope:

    w(z) = F/T + s (z - zm)                on the member's plates
    s = - sum(F zm) / sum(I)               I = integral of (z - zm)² over the member's plates

so that forces and moments balance whatever the stack is, and shear and moment vanish at the free ends.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import cached_property
from itertools import pairwise

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts.pose import Array
from linkcalc.words import nearest

_BALANCED, _NOTHING = 1e-6, 1e-13
_STATIONS, _ZOOMS = 24, 4
_LEVEL = 1e-9


@dataclass(frozen=True)
class StackPlate:
    """A plate on the pin [m]; gap: between it and the plate before it."""

    member: str
    thickness: float
    gap: float = 0.0


@dataclass(frozen=True, eq=False)
class Peak:
    """The largest resultant along the pin.

    value      [N] or [N m], (...) as the batch of the forces
    place      [m] from the free face of the first plate, (...)
    direction  [rad] of the vector there, from the x axis of the forces, (...)
    """

    value: Array
    place: Array
    direction: Array


@dataclass(frozen=True, eq=False)
class PinStack:
    """A pin under the true forces of its plates.

    plates  in order across the pin
    starts  [m] where each begins, (plate,), from the free face of the first
    stops   [m] where each ends, (plate,)
    forces  [N] of each plate on the pin, (plate, 2, ...)
    middles [N/m] even part of the line load on each, (plate, 2, ...)
    tips    [N/m2] slope of the line load, the same on all, (2, ...)
    centres [m] where the sloping part of each plate is nothing, (plate,)
    """

    plates: tuple[StackPlate, ...]
    starts: Array
    stops: Array
    forces: Array
    middles: Array
    tips: Array
    centres: Array

    @property
    def line_load(self) -> Array:
        """[N/m] largest line load on each plate: at one of its faces, (plate, ...)."""
        ends = np.stack([self.starts, self.stops]) - self.centres
        ends = ends.reshape(2, -1, *[1] * (self.forces.ndim - 1))
        return np.hypot(*np.moveaxis(self.middles + self.tips * ends, 2, 0)).max(axis=0)

    @property
    def length(self) -> float:
        """[m] from the first free face to the last."""
        return float(self.stops[-1])

    def shear(self, z: Array) -> Array:
        """[N] sum of the forces on the pin before z, (2, *z.shape, ...)."""
        return self._along(z)[0]

    def moment(self, z: Array) -> Array:
        """[N m] their moment about the section at z, (2, *z.shape, ...): its slope along z is the shear.

        Components as those of the forces: the moment of forces along x, and of forces along y.
        """
        return self._along(z)[1]

    def stations(self, count: int = _STATIONS) -> Array:
        """[m] places along the pin for a diagram, (station,): every face, and `count` parts between faces."""
        faces = np.unique(np.concatenate([self.starts, self.stops]))
        parts = [np.linspace(a, b, count, endpoint=False) for a, b in pairwise(faces)]
        return np.concatenate([*parts, faces[-1:]])

    @cached_property
    def peak_shear(self) -> Peak:
        """Largest resultant shear."""
        return self._peak(0)

    @cached_property
    def peak_moment(self) -> Peak:
        """Largest resultant bending moment."""
        return self._peak(1)

    def equivalent(self, diameter: float) -> Peak:
        """[Pa] largest von Mises stress along a solid round pin, of bending and mean shear of the same section:
        sqrt((32 M/(pi d^3))^2 + 3 (4 V/(pi d^2))^2). Its direction is that of nothing: nan.
        """
        area, modulus = np.pi * diameter**2 / 4, np.pi * diameter**3 / 32

        def stress(z: Array) -> Array:
            shear, moment = (np.hypot(*one) for one in self._along(z))
            return np.sqrt((moment / modulus) ** 2 + 3 * (shear / area) ** 2)

        value, place = self._largest(stress)
        return Peak(value, place, np.full_like(value, np.nan))

    def _peak(self, which: int) -> Peak:
        value, place = self._largest(lambda z: np.hypot(*self._along(z)[which]))
        at = self._each(place, which)
        return Peak(value, place, np.arctan2(at[1], at[0]))

    def _each(self, place: Array, which: int) -> Array:
        """The vector at a place of its own for each entry of the batch, (2, ...)."""
        return self._along(place[None])[which][:, 0]

    def _largest(self, of: object) -> tuple[Array, Array]:
        """Largest of a function of z over the pin and where, entry by entry: the best of many stations, then of
        many between its neighbours, and so on. The function is smooth between faces and faces are stations."""
        z = self.stations()
        best = np.argmax(of(z), axis=0)  # type: ignore[operator]
        low, high = z[np.maximum(best - 1, 0)], z[np.minimum(best + 1, len(z) - 1)]
        place = z[best]
        for _ in range(_ZOOMS):
            inner = np.linspace(low, high, 2 * _STATIONS + 1)
            inner = np.concatenate([inner, place[None]])
            values = of(inner)  # type: ignore[operator]
            # a place is left for a better one only: where the shear stays the same the face is told
            better = values.max(axis=0) > values[-1] * (1 + _LEVEL)
            at = np.where(better, np.argmax(values, axis=0), len(inner) - 1)[None]
            place = np.take_along_axis(inner, at, 0)[0]
            step = (high - low) / (2 * _STATIONS)
            low, high = np.maximum(place - step, 0.0), np.minimum(place + step, self.length)
        return np.take_along_axis(values, at, 0)[0], place

    def _along(self, z: Array) -> tuple[Array, Array]:
        """Shear and moment at z: (station,) for all entries alike, or (station, ...) with places of their own."""
        batch = self.forces.ndim - 2
        if z.ndim == 1:
            z = z.reshape(-1, *[1] * batch)
        shear, moment = 0.0, 0.0
        for k, (start, stop) in enumerate(zip(self.starts, self.stops, strict=True)):
            u = np.clip(z, start, stop) - start  # how much of the plate lies before z
            arm = z - start
            first = (self.middles[k] + self.tips * (start - self.centres[k]))[:, None]  # line load where it begins
            slope = self.tips[:, None]
            shear = shear + first * u + slope * u**2 / 2
            moment = moment + first * (u * arm - u**2 / 2) + slope * (u**2 * arm / 2 - u**3 / 3)
        return np.asarray(shear), np.asarray(moment)


def pin_stack(plates: Sequence[StackPlate], forces: Mapping[str, Array]) -> PinStack:
    """The pin under the forces of the members whose plates lie on it.

    plates  in order across the pin; a member may have several
    forces  [N] of each member on the pin, (2, ...): x and y; the batch may have any shape

    Raises Faults: a member without a plate, a plate of a member without a force, sizes that are none, forces that do
    not balance.
    """
    order = list(dict.fromkeys(p.member for p in plates))
    for k, plate in enumerate(plates, 1):
        item = ("stack", str(k))
        if plate.member not in forces:
            raise fault(item, f"{plate.member!r} puts no force on this pin", nearest(plate.member, forces))
        if not plate.thickness > 0 or not plate.gap >= 0:
            raise fault(item, "a plate of no thickness, or a gap of less than nothing", "sizes of the stack are wanted")
    lacking = [name for name in forces if name not in order and np.any(np.asarray(forces[name]) != 0)]
    if lacking or not plates:
        wanted = "every member on the pin is wanted, in order across it"
        raise fault("stack", f"no plate of {' and '.join(lacking)}" if lacking else "no plates", wanted)
    thick = np.array([p.thickness for p in plates])
    # the gap before the first plate is none
    starts = np.cumsum([0.0, *(p.gap for p in plates[1:])]) + np.concatenate([[0.0], np.cumsum(thick)[:-1]])
    stops = starts + thick
    of = np.array([order.index(p.member) for p in plates])
    each = np.stack(np.broadcast_arrays(*(np.asarray(forces[name], dtype=float) for name in order)))
    largest = _must_balance(each)
    each = np.where(np.abs(each) > _NOTHING * largest, each, 0.0)  # what rounding leaves of an exact nothing
    whole = np.bincount(of, thick)
    middle = np.bincount(of, thick * (starts + stops) / 2) / whole
    centres = middle[of]
    spread = float(np.sum(((stops - centres) ** 3 - (starts - centres) ** 3) / 3))
    ones = [1] * (each.ndim - 1)
    tips = -np.sum(each * middle.reshape(-1, *ones), axis=0) / spread
    middles = (each / whole.reshape(-1, *ones))[of]
    lean = ((starts + stops) / 2 - centres).reshape(-1, *ones)
    on_plate = (middles + tips * lean) * thick.reshape(-1, *ones)
    return PinStack(tuple(plates), starts, stops, on_plate, middles, tips, centres)


def _must_balance(each: Array) -> Array:
    """[N] the largest force, (...). Raises Faults."""
    largest: Array = np.nanmax(np.hypot(each[:, 0], each[:, 1]), axis=0, initial=0.0)
    left = np.hypot(*np.sum(each, axis=0))
    if np.any(left > _BALANCED * largest):
        worst = float(np.nanmax(left))
        wanted = "the plates of all that pushes on the pin are wanted, loads and ropes too"
        raise fault("stack", f"the forces on the pin do not balance: {worst:.4g} N are left over", wanted)
    return largest
