"""Sizes of pins, bushes, bearings and eyes under what their joints must carry: required, chosen, how far used."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass, replace

import numpy as np

from linkcalc.design.answer import Felt
from linkcalc.design.pin_stacks import stack_of
from linkcalc.design.pins_answer import JointLoad, Peak, Sized, Swing
from linkcalc.design.sizing.bearing_list import Bearing, bearing, kinds
from linkcalc.design.sizing.bush import bush, choose_bush
from linkcalc.design.sizing.bush_materials import BushMaterial, bush_material
from linkcalc.design.sizing.lug import lug
from linkcalc.design.sizing.materials import Material, material
from linkcalc.design.sizing.model_pins import PinSpec, located
from linkcalc.design.sizing.pin import choose_pin, least_diameter, sheared_pin, stacked_pin
from linkcalc.design.sizing.rolling import Duty, choose_bearing, rolling_bearing
from linkcalc.design.sizing.working import Choice, Working
from linkcalc.faults import Faults
from linkcalc.model.mechanism import Mechanism
from linkcalc.parts.pose import Value

Mean = Callable[[float], float]
"""Exponent of a life -> [N] mean load over the motion."""


@dataclass(frozen=True, eq=False)
class Shelf:
    """What sizes are taken from.

    inch       pins in inch sizes
    bearings   the list of rolling bearings
    materials  of bushes, by name; None: the table of the package
    """

    inch: bool
    bearings: tuple[Bearing, ...]
    materials: dict[str, BushMaterial] | None = None


class PinSizes:
    """The sizes of one pin.

    joint   what it carries; poses  what its members feel where the pin is bent, sheared or loaded most
    rate    [1/s] strokes there and back; 0 if none was stated
    mean    mean load of its widest swing
    """

    def __init__(
        self, joint: JointLoad, poses: Sequence[Peak], spec: PinSpec, mechanism: Mechanism, shelf: Shelf, *,
        rate: float, mean: Mean,
    ):  # fmt: skip
        self._joint, self._spec, self._mechanism, self._shelf = joint, spec, mechanism, shelf
        self._poses: list[tuple[Felt, ...]] = [p.felt for p in poses if p.felt and np.isfinite(p.value)]
        self._copies = {name: member.copies for name, member in mechanism.members.items()}
        self._rate, self._mean = rate, mean

    def all(self) -> tuple[Sized, ...]:
        """The pin and what is told of on it; none where its force has no bound. Raises Faults, located at the pin."""
        force = self._joint.largest.value
        if not np.isfinite(force) or not force or not self._poses:
            return ()
        try:
            pin = self._pin()
            bore = self._spec.diameter or (pin.size if np.isfinite(pin.size) else None)
            return (pin, *self._eyes(), *self._bush(bore), *self._bearing(bore))
        except Faults as found:
            raise located(self._joint.joint, found) from None

    def _pin(self) -> Sized:
        spec, thick = self._spec, 0.0
        if spec.diameter is not None:
            of = material(spec.material, self._mechanism, spec.diameter)
            check = self._check(of)
            pin = self._told("pin", check(spec.diameter), None, spec.diameter, least_diameter(check))
            return self._with_stack(pin, of)
        while True:
            # the yield stress of a bar falls with its thickness: looked up again for the size that comes out
            of = material(spec.material, self._mechanism, thick)
            choice = choose_pin(self._check(of), inch=self._shelf.inch)
            size = float(choice.working["d"])
            if material(spec.material, self._mechanism, size).yields >= of.yields:
                pin = self._told("pin", choice.working, choice, size if choice.chosen else np.nan)
                return self._with_stack(pin, of)
            thick = size

    def _with_stack(self, pin: Sized, of: Material) -> Sized:
        """The pin with its plates in the pose that uses it most."""
        if not self._spec.stack:
            return pin
        whole = stacked_pin(
            stack_of(self._spec.stack, self._poses, self._copies), float(pin.working["d"]), of, self._spec.factor
        )
        worst = self._poses[int(np.argmax(np.atleast_1d(whole.utilisation)))]
        return replace(pin, stack=stack_of(self._spec.stack, [worst], self._copies))

    def _check(self, of: Material) -> Callable[[float], Working]:
        """The calculation of the pin, by its diameter."""
        spec, force = self._spec, self._joint.largest.value
        if not spec.stack:
            return lambda diameter: sheared_pin(force, diameter, 1, of, spec.factor)
        stack = stack_of(spec.stack, self._poses, self._copies)
        return lambda diameter: _worst_pose(stacked_pin(stack, diameter, of, spec.factor))

    def _eyes(self) -> Iterator[Sized]:
        for side in self._joint.sides:
            if side.member in self._spec.lugs and np.isfinite(side.largest.value):
                sizes = self._spec.lugs[side.member]
                # what a member of several copies feels is that of one of its plates already
                plates = max(1, sum(p.member == side.member for p in self._spec.stack) // self._copies[side.member])
                of = material(self._spec.material, self._mechanism, sizes.thick)
                working = lug(side.largest.value / plates, sizes, of, self._spec.factor)
                yield self._told(f"eye of {side.member}", working, None, np.nan)

    def _bush(self, bore: float | None) -> Iterator[Sized]:
        spec, swing = self._spec, self._widest()
        if spec.bush is None or bore is None:
            return
        of, force = bush_material(spec.bush, self._shelf.materials), self._force(swing)
        motion = self._motion(swing)
        if spec.length is not None:
            yield self._told("bush", bush(force, bore, spec.length, of, **motion), None, spec.length)
            return
        choice = choose_bush(force, of, bore=bore, **motion)
        size = float(choice.working["b"]) if choice.chosen else np.nan
        yield self._told("bush", choice.working, choice, size)

    def _bearing(self, bore: float | None) -> Iterator[Sized]:
        spec, swing = self._spec, self._widest()
        if spec.bearing is None:
            return
        duty = Duty(self._force(swing), self._mean if swing else None, swing.path if swing else 0.0, spec.life)
        if spec.bearing in kinds():
            choice = choose_bearing(self._shelf.bearings, duty, kind=spec.bearing, least_bore=bore)
            yield self._told("bearing", choice.working, choice, np.nan)
            return
        one = bearing(spec.bearing, self._shelf.bearings)
        yield self._told("bearing", rolling_bearing(one, duty), None, np.nan, chosen=one.designation)

    def _widest(self) -> Swing | None:
        return self._joint.swing

    def _force(self, swing: Swing | None) -> float:
        """[N] the worst force between the two that move most against one another."""
        sides = [s.largest.value for s in self._joint.sides if swing is None or s.member == swing.member]
        return max([v for v in sides if np.isfinite(v)], default=self._joint.largest.value)

    def _motion(self, swing: Swing | None) -> dict[str, float]:
        if swing is None or np.isnan(swing.mean_load):
            return {}
        return {"swing": swing.path, "rate": self._rate, "mean_force": swing.mean_load}

    def _told(
        self, item: str, working: Working, choice: Choice | None, size: float, required: float | None = None,
        chosen: str = "",
    ) -> Sized:  # fmt: skip
        titled = replace(working, title=f"{self._joint.joint}: {working.title}")
        if choice is not None:
            choice = replace(choice, working=titled)
            required, chosen = choice.required, choice.chosen
        return Sized(item, required, chosen, size, titled, choice)


def _worst_pose(working: Working) -> Working:
    """The working of the pose that uses most of what is allowed, in single numbers that can be checked by hand."""
    used = np.atleast_1d(np.asarray(working.utilisation))
    k = int(np.argmax(used))

    def one(value: Value) -> Value:
        return float(np.asarray(value)[k]) if np.ndim(value) else value

    entries = tuple(replace(e, value=one(e.value)) for e in working.entries)
    checks = tuple(replace(c, utilisation=one(c.utilisation)) for c in working.checks)
    return replace(working, entries=entries, checks=checks)
