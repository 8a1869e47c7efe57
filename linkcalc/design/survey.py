"""Everything that can be asked of a solved batch, by name: the words of the requirements, the heads of the columns."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np

from linkcalc.design.inner import KINDS, inner
from linkcalc.design.strengths import strength_quantities
from linkcalc.design.told import Fitting, Spoken, spoken, watched
from linkcalc.mechanics.axial import TwoForce, axial, two_force_members
from linkcalc.mechanics.balance import Balance
from linkcalc.mechanics.pipeline import sides
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.pushing import Pushing
from linkcalc.mechanics.reactions import Side
from linkcalc.mechanics.solved import Solved
from linkcalc.model.requirements import requirements
from linkcalc.parts.pose import Array, Value

if TYPE_CHECKING:
    from linkcalc.design.inside import Inside

EFFORT_SPEED, LOAD_SPEED = "speed of the effort", "speed of the load"
ROPE_ENDS = ("first tension", "last tension")
UNBOUNDED = 1e9
"""A ratio above this is at a dead point, where it has no bound."""


@dataclass(frozen=True, eq=False)
class Shown:
    """A solved batch with what is drawn from it."""

    solved: Solved
    sides: list[Side]


@dataclass(frozen=True, eq=False)
class Quantity:
    """Something with a value in every (case, variant, pose).

    name  in trade words: "effort", "force at C", "force at C on arm", "axial force in strut", "tension of hoist"
    kind  of its size: "force", "moment", "number"
    of    its value in a shown batch
    """

    name: str
    kind: str
    of: Callable[[Shown], Value]


class Survey:
    """The quantities of one mechanism.

    first      the batch it was made from
    sides      the sides of its joints, as in every solved batch
    two_force  its two-force members
    ropes      names of its ropes
    contacts   names of its joints that push one way only
    spoken     what its loads tell of themselves
    watched    limits of its loads
    """

    def __init__(self, ready: Ready, first: Solved, *, inside: bool = False):
        """inside: with the inner forces of every member, not only of those that a requirement asks about."""
        self.ready = ready
        self.first = shown = self.show(first)
        self.sides = shown.sides
        self.two_force: tuple[TwoForce, ...] = two_force_members(shown.sides, first.closed.at, ready.pushing)
        self.ropes = tuple(dict.fromkeys(s.part_of for s in shown.sides if s.part_of))
        self.contacts = tuple(ready.chain.joints[k].name for k, _, law in ready.chain.gives if law.one_sided)
        self.spoken = spoken(ready.pushing)
        self.watched = watched(ready.pushing, ready.chain.joints)
        members = self.inside.members if inside else self._asked_about()
        self.quantities: dict[str, Quantity] = {q.name: q for q in [*self._all(), *self._inner(members)]}
        self.quantities |= {q.name: q for q in strength_quantities(self)}

    def show(self, solved: Solved) -> Shown:
        return Shown(solved, sides(self.ready, solved))

    def values(self, names: Sequence[str], shown: Shown) -> Array:
        """(names, case, variant, pose) their values."""
        out: Array = np.empty((len(names), *shown.solved.balance.status.shape))
        for k, name in enumerate(names):
            out[k] = self.quantities[name].of(shown)
        return out

    def rope_ends(self) -> Iterator[tuple[str, str, Quantity]]:
        """The tensions at both ends of ropes whose pulleys rub: name of the rope, of the tension, the quantity."""
        for rope in self.ropes:
            for end in ROPE_ENDS:
                if f"{end} of {rope}" in self.quantities:
                    yield rope, end, self.quantities[f"{end} of {rope}"]

    def side_name(self, side: Side) -> str:
        return f"pin {side.pin}" if side.member < 0 else self.ready.drawing.members[side.member]

    def _all(self) -> list[Quantity]:
        p = self.ready.pushing
        out: list[Quantity] = []
        if p.effort:
            kind = p.effort[0].pusher.kind
            out.append(Quantity("effort", kind, lambda s: s.solved.balance.effort))
            if p.effort_asked:
                out.append(Quantity("tare effort", kind, lambda s: s.solved.balance.tare))
        if p.load:
            out.append(Quantity("load", p.load[0].pusher.kind, lambda s: s.solved.balance.load))
        if p.load and p.effort:
            out.append(Quantity("force ratio", "number", lambda s: bounded(s.solved.balance.force_ratio)))
            out.append(Quantity("ideal ratio", "number", lambda s: bounded(s.solved.balance.ideal_ratio)))
        if p.effort_asked and self.ready.chain.coordinate is not None:
            out.append(Quantity(EFFORT_SPEED, "number", lambda s: s.solved.balance.effort_speed))
        if p.load and self.ready.chain.coordinate is not None:
            out.append(Quantity(LOAD_SPEED, "number", lambda s: s.solved.balance.load_speed))
        if p.rubbing and p.effort_asked:
            out.append(
                Quantity("frictionless effort", p.effort[0].pusher.kind, lambda s: s.solved.balance.frictionless)
            )
            out.append(Quantity("efficiency", "number", lambda s: efficiency(s.solved.balance, p)))
        joints: dict[str, list[int]] = {}
        for k, side in enumerate(self.sides):
            joints.setdefault(side.joint, []).append(k)
            out.append(Quantity(f"force at {side.joint} on {self.side_name(side)}", "force", _resultant([k])))
            if not isinstance(side.moment, float):
                out.append(Quantity(f"moment at {side.joint} on {self.side_name(side)}", "moment", _moment(k)))
        loaded = {pin for a in p.all for pin in a.pusher.on_pins} | {s.pin for s in self.sides}
        for joint, ks in joints.items():
            # the two sides of a joint feel the same force, unless a load on the pin itself stands between them, or one
            # of the members is several plates
            alike = len(ks) == 2 and joint not in loaded and len({self.sides[k].copies for k in ks}) == 1
            out.append(Quantity(f"force at {joint}", "force", _resultant(ks[:1] if alike else ks)))
            turned = [k for k in ks if not isinstance(self.sides[k].moment, float)]
            if turned:
                turned.sort(key=lambda k: self.sides[k].copies)  # the whole moment, if one member takes it alone
                out.append(Quantity(f"moment at {joint}", "moment", _moment(turned[0])))
        for rope in self.ropes:
            first = next(k for k, side in enumerate(self.sides) if side.part_of == rope)
            out.append(Quantity(f"tension of {rope}", "force", _carried(first)))
            if len(self.sides[first].carried) > 1:  # with friction it is not the same all along
                for end, part in zip(ROPE_ENDS, (0, -1), strict=True):
                    out.append(Quantity(f"{end} of {rope}", "force", _carried(first, part)))
        for k, one in enumerate(self.ready.chain.joints):
            if one.name in self.contacts:
                out.append(Quantity(f"room at {one.name}", "length", _room(self.ready, k)))
        for two in self.two_force:
            name = self.ready.drawing.members[two.member]
            out.append(Quantity(f"axial force in {name}", "force", _axial(two)))
        out += [Quantity(one.name, one.kind, self._told(one)) for one in self.spoken]
        out += [Quantity(one.name, "number", self._told(one.room)) for one in self.watched]
        return out

    @cached_property
    def inside(self) -> Inside:
        """What goes on within the members."""
        from linkcalc.design.inside import Inside  # with the sizing of members: most strokes do not need it

        return Inside(self.ready, self.first)

    def _asked_about(self) -> list[str]:
        """Members whose inside a requirement asks about."""
        mechanism = self.ready.drawing.mechanism
        return list(dict.fromkeys(r.of for r in requirements(mechanism) if r.inside))

    def _inner(self, members: Sequence[str]) -> Iterator[Quantity]:
        for member in members:
            for name, of in self.inside.of(member):
                yield Quantity(inner(name, member), KINDS[name], of)

    def _told(self, one: Spoken | Fitting) -> Callable[[Shown], Value]:
        return lambda shown: one.of(shown.solved, self.ready.pushing)


def efficiency(b: Balance, pushing: Pushing) -> Value:
    """What friction leaves of the effort's work; NaN where the load drives the effort back."""
    driving = np.sign(b.effort_speed) * pushing.sense * (pushing.forward or np.sign(b.effort_speed)) * b.frictionless
    with np.errstate(all="ignore"):
        return np.where(driving > 0, np.divide(b.frictionless, b.effort), np.nan)


def bounded(ratio: Value) -> Value:
    """At a dead point a ratio has no bound; rounding would show some huge number instead."""
    with np.errstate(invalid="ignore"):
        return np.where(np.abs(ratio) > UNBOUNDED, np.inf, ratio)


def _resultant(ks: Sequence[int]) -> Callable[[Shown], Value]:
    def of(shown: Shown) -> Value:
        each = [np.hypot(shown.sides[k].fx, shown.sides[k].fy) for k in ks]
        top: Value = each[0] if len(each) == 1 else np.max(np.broadcast_arrays(*each), axis=0)
        return top

    return of


def _moment(k: int) -> Callable[[Shown], Value]:
    return lambda shown: shown.sides[k].moment


def _room(ready: Ready, joint: int) -> Callable[[Shown], Value]:
    return lambda shown: ready.chain.joints[joint].gap(shown.solved.closed.at)[0]


def _carried(k: int, part: int | None = None) -> Callable[[Shown], Value]:
    """The tension of a rope in one of its parts; without: in the one that is the tightest."""

    def of(shown: Shown) -> Value:
        parts = shown.sides[k].carried
        if part is not None or len(parts) == 1:
            return parts[part or 0]
        tightest: Value = np.max(np.broadcast_arrays(*parts), axis=0)
        return tightest

    return of


def _axial(two: TwoForce) -> Callable[[Shown], Value]:
    return lambda shown: axial(two, shown.sides)
