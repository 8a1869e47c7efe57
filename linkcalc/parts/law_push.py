"""What pushes by a law along a path: springs of all kinds, cylinders, screws, tables of force.

A law knows how strong from how long, a path knows how long and who is pushed which way: any law goes with any path.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

import numpy as np

from linkcalc.parts.contract import Limit, Mark, Poses, Push, Site, Sketch, Told, Value
from linkcalc.parts.laws import Law
from linkcalc.parts.lines import rubless
from linkcalc.parts.pose import Mask


class Way(Protocol):
    """A path, as a law sees it.

    kind      of what the law goes by: "length" or "angle"
    strength  kind of the push: "force" or "moment"
    """

    kind: str
    strength: str

    @property
    def on_pins(self) -> tuple[str, ...]: ...
    @property
    def sites(self) -> tuple[Site, ...]: ...

    def value(self, at: Poses) -> Value:
        """[m] or [rad]"""

    def push(self, at: Poses) -> tuple[Push, ...]:
        """for 1 N apart, or 1 N m opening"""

    def mark(self, at: Poses, shape: str, name: str) -> Mark: ...


@dataclass(frozen=True, eq=False)
class LawPush:
    """A law along a path.

    word         its kind, which is also the shape it is drawn by
    sense        +1.0: plus pushes apart; -1.0: plus draws together
    more         what it tells beside force and length
    edges        what should hold in every pose
    cautions     what can hurt
    temperature  [K] at which it is as strong as it says; None: it does not hang on it
    seal         [N] friction within it, whatever it pushes, against its motion
    """

    name: str
    word: str
    law: Law
    path: Way
    sense: float = 1.0
    more: tuple[Told, ...] = ()
    edges: tuple[Limit, ...] = ()
    cautions: tuple[str, ...] = ()
    temperature: float | None = None
    seal: Value = 0.0

    @property
    def kind(self) -> str:
        return self.path.strength

    @property
    def size(self) -> Value | None:
        return self.law.size

    @property
    def partial(self) -> bool:
        return self.law.partial

    @property
    def on_pins(self) -> tuple[str, ...]:
        return self.path.on_pins

    @property
    def sites(self) -> tuple[Site, ...]:
        return self.path.sites

    def strength(self, at: Poses) -> Value:
        return self.law.force(self.path.value(at))

    def push(self, at: Poses) -> tuple[Push, ...]:
        pushes = self.path.push(at)
        if self.sense == 1.0:
            return pushes
        return tuple((member, -fx, -fy, -moment) for member, fx, fy, moment in pushes)

    def mark(self, at: Poses) -> Mark:
        return self.path.mark(at, self.word, self.name)

    def told(self) -> tuple[Told, ...]:
        """Its strength, the length or angle it goes by, and what its kind adds."""
        strong = "torque" if self.path.strength == "moment" else "force"
        return (
            Told(strong, self.path.strength, lambda _, strength, __: strength),
            Told(self.path.kind, self.path.kind, lambda at, *_: self.path.value(at)),
            *self._through_seal(),
            *self.more,
        )

    def _through_seal(self) -> tuple[Told, ...]:
        """What its pins feel of it, where that is not the same as what its law gives."""
        if rubless(self.seal):
            return ()
        return (Told(ROD_FORCE, "force", lambda _, strength, motion: strength - self.seal * motion),)

    def limits(self) -> tuple[Limit, ...]:
        return self.edges


ROD_FORCE = "rod force"
"""What the pins of a load feel whose seals rub: its force less their friction when it moves along its force, plus it
when it moves against."""
TELLS_FORCE = {"force": "force", "length": "length"}
TELLS_TORQUE = {"torque": "moment", "angle": "angle"}


def between(path: Way, sketch: Sketch, shortest: Value | None, longest: Value | None, told: str) -> tuple[Limit, ...]:
    """Limits of a length; told: whose they are in a message, "its shortest, 40 mm"."""
    out: list[Limit] = []
    if shortest is not None:
        text = f"shorter than {told} shortest, {sketch.shown(nominal(shortest))}"
        out.append(Limit(text, lambda at, _: path.value(at) - shortest))
    if longest is not None:
        text = f"longer than {told} longest, {sketch.shown(nominal(longest))}"
        out.append(Limit(text, lambda at, _: longest - path.value(at)))
    return tuple(out)


def nominal(value: Value) -> float:
    """One number of a size, for a message; of many copies the first."""
    return float(np.ravel(value)[0])


def sure(condition: bool | Mask) -> bool:
    """True if it holds; of many copies for every one: a single copy that is out of order is no fault of the model."""
    return bool(np.all(condition))
