"""Joints that hold again what others hold: the forces they share are those that strain all of them least.

Equilibrium alone, Jᵀ z = Q, leaves the multipliers of a mechanism open that is held more often than needed. Of all that
balance, elastic joints take those with the least energy, the sum of z²/2k (Castigliano). With the small movements d
of the members on their joints that is one square system, whatever row repeats which:

    [-C  J] [z]   [gap]          C: 1/k of each row, 0 for the drive
    [Jᵀ  0] [d] = [ Q ]

With gaps on its right side it closes the loops (z is nothing where they can be closed), with Q it gives the forces.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from linkcalc.parts.contract import Joint, Push, X, Y
from linkcalc.parts.pose import Poses, Value

_SOFTEST = 1e-3
"""Give of the softest row over the size of the entries of J: small, so that a nearly singular pose is still told from a
singular one, but not so small that rounding blurs the shares."""

Places = dict[tuple[int, int], Value]
Form = dict[int, Value]


@dataclass(frozen=True, eq=False)
class Hub:
    """The side of a pin on which the member stands that stands for it: it feels what all others there leave over.

    give  how far it gives for a force of 1
    rows  first row of each of the pin's joints
    """

    name: str
    give: Value
    rows: tuple[int, ...]


class Sharing:
    """How the joints of a chain give way.

    names   those among which forces are shared
    excess  constraints that say again what others say
    given   True if the file gives their stiffness, False if all are alike
    """

    def __init__(self, joints: Sequence[Joint], names: Sequence[str], excess: int, size: float):
        """size: [m] of the mechanism, the length that moments are compared by."""
        self.joints, self.names, self.excess = tuple(joints), tuple(names), excess
        known = [k for k in map(stiffness, joints) if k is not None]
        self.given = bool(known)
        # a joint without a share may have any stiffness
        other = max((float(np.ravel(k)[0]) for k in known), default=1.0)
        self._first: list[int] = []
        self._give: list[Value] = []
        sizes: list[float] = []
        for joint in joints:
            self._first.append(len(self._give))
            for give, angular in zip(gives(joint, other, size), joint.angular, strict=True):
                self._give.append(give)
                sizes.append(float(np.ravel(give)[0]) * (size**2 if angular else 1.0))
        self._give = [_SOFTEST / max(sizes) * give for give in self._give]
        self._hubs = tuple(self._pins())

    def _pins(self) -> Iterator[Hub]:
        """Every pin; each of its sides gives half of what two of them give together."""
        pins: dict[str, list[int]] = {}
        for row, joint in zip(self._first, self.joints, strict=True):
            if joint.word == "pin":
                pins.setdefault(joint.name, []).append(row)
        for name, rows in pins.items():
            half = self._give[rows[0]] / 2
            for row in rows:
                self._give[row] = self._give[row + 1] = half
            yield Hub(name, half, tuple(rows))

    def places(self, at: Poses) -> Places:
        """(row, row) -> entry of C: the square of every row's force, and of the force on each pin's hub."""
        out: Places = {(k, k): give for k, give in enumerate(self._give)}
        for hub in self._hubs:
            for form in self._forms(hub, at):
                for i, a in form.items():
                    for j, b in form.items():
                        out[i, j] = out.get((i, j), 0.0) + hub.give * a * b
        return out

    def beside(self, at: Poses, pushes: Sequence[tuple[str, Value, Push]]) -> list[Value]:
        """What pushes on pins themselves strain: (rows) for the upper half of the right side.

        pushes  name of the pin, "" for a member; how large; and the push for a size of 1
        """
        out: list[Value] = [0.0] * len(self._give)
        for hub in self._hubs:
            fx: Value = 0.0
            fy: Value = 0.0
            for name, size, (_, x, y, _) in pushes:
                if name == hub.name:
                    fx, fy = fx + size * x, fy + size * y
            for form, force in zip(self._forms(hub, at), (fx, fy), strict=True):
                if isinstance(force, float) and force == 0.0:
                    continue
                for row, part in form.items():
                    out[row] = out[row] - hub.give * part * force
        return out

    def _forms(self, hub: Hub, at: Poses) -> tuple[Form, Form]:
        """x and y of the force on a hub: row -> part of it for a multiplier of 1."""
        x: Form = dict.fromkeys(hub.rows, -1.0)
        y: Form = {row + 1: -1.0 for row in hub.rows}
        for first, joint in zip(self._first, self.joints, strict=True):
            if joint.on_pin == hub.name:
                for row, slope in enumerate(joint.slope(at), first):
                    for member, which, value in slope:
                        if member == joint.members[0] and which in (X, Y):
                            (x, y)[which][row] = value
            for fx, fy in _contacts(joint, hub.name, at):
                x[first], y[first] = x.get(first, 0.0) + fx, y.get(first, 0.0) + fy
        return x, y


def _contacts(joint: Any, pin: str, at: Poses) -> list[tuple[Value, Value]]:
    """Forces on a pin of a joint that acts at several places, for a multiplier of 1."""
    if not hasattr(joint, "contacts") or not joint.angular:
        return []
    return [(c.fx, c.fy) for c in joint.contacts(at) if c.on_pin == pin]


def stiffness(joint: Any) -> Value | None:
    """[N/m] by how stiff a joint is it shares its force; None: the file does not say."""
    found: Value | None = getattr(joint, "share", None)
    return found


def gives(joint: Any, other: float, size: float) -> Iterator[Value]:
    """1/k of each row of a joint: [m/N] and [rad/(N m)].

    other  [N/m] stiffness of one that has none of its own
    size   [m] twice the lever of its moments, if it has none of its own
    """
    k = stiffness(joint)
    k = other if k is None else k
    turning, lever = getattr(joint, "turning_stiffness", None), getattr(joint, "lever", None)
    if turning is None:
        turning = k * (size / 2 if lever is None else lever) ** 2
    for angular in joint.angular:
        yield 1.0 / (turning if angular else k)
