"""What a question returns: frozen dataclasses of named arrays in SI, with what they mean beside them.

Arrays carry their components first, then always the batch (case, variant, pose), each of size 1 if idle.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field, fields
from typing import Any

import numpy as np

from linkcalc.model.mechanism import Mechanism
from linkcalc.parts.contract import Mark
from linkcalc.parts.pose import Array, Codes

SCHEMA = 1


def quantity(kind: str, *, axes: tuple[str, ...], text: str, when: str = "") -> Any:
    """A field that is an array. kind = "force", "moment", "angle", "length", "number", "ratio", or "drive", "effort",
    "load" where the model decides; axes = names of its axes; text = the head of its column, its axis, its key."""
    return field(metadata={"quantity": kind, "axes": axes, "text": text, "when": when})


def quantities(answer: Any) -> dict[str, Mapping[str, Any]]:
    """The array fields of an answer: name -> metadata."""
    return {f.name: f.metadata for f in fields(answer) if "quantity" in f.metadata}


def plate(member: str, copies: int) -> str:
    """A member in a table: "strut", or "strut (1 of 2)" where what is told is that of one of several plates."""
    return f"{member} (1 of {copies})" if copies > 1 else member


BATCH = ("case", "variant", "pose")


@dataclass(frozen=True)
class Bearing:
    """One member's side of a joint: where that member feels its force.

    joint   name of the joint (a pin is named by its point)
    word    its kind: "pin", "slot", "slide", "weld"
    member  the member that feels it, "ground" included
    copies  how many equal plates the member stands for; the force is that on one of them
    """

    joint: str
    word: str
    member: str
    copies: int = 1

    @property
    def text(self) -> str:
        """The member for a table: "strut", or "strut (1 of 2)" where the force is that on one of several plates."""
        return plate(self.member, self.copies)


@dataclass(frozen=True)
class Reading:
    """What a load tells of itself over the stroke, beside its push.

    load      its name, "effort" and "load" included
    quantity  "force", "length", "pressure", ...
    kind      kind of its size
    values    (case, variant, pose) SI, nan in a case that is without it
    """

    load: str
    quantity: str
    kind: str
    values: Array

    @property
    def name(self) -> str:
        """As requirements call it: "length of return"."""
        return f"{self.quantity} of {self.load}"


@dataclass(frozen=True)
class Felt:
    """What one member feels at a joint in one exact pose.

    force          [N] size of the force of the joint on it
    direction      [rad] where that points, from the x axis; nan if there is no force
    own_direction  [rad] the same from the member's own x axis (first point to last); nan for a pin itself
    """

    member: str
    force: float
    direction: float
    own_direction: float


@dataclass(frozen=True)
class Event:
    """Something that happens at an exact pose.

    kind      "largest", "smallest", "reversal", "dead point", "slack", "limit", "contact made", "contact lost",
              "snap-through", "opposite peak" (of an effort that changes its sense, the largest of the lesser sense)
    quantity  what it happens to, in the words of the requirements: "effort", "force ratio", "force at C", "strut"
    case      name of the load case, "" if it is the same for all
    drive     [rad or m] value of the stepped coordinate, found by root finding, not by sampling
    value     SI; nan if the event has none
    value_kind  kind of the value ("force", "moment", "number", ...)
    felt      of a largest joint force what each member of the joint feels there; else empty
    """

    kind: str
    quantity: str
    case: str
    drive: float
    value: float
    value_kind: str
    felt: tuple[Felt, ...] = ()


@dataclass(frozen=True)
class Rest:
    """A position in which the free members balance.

    case    name of the load case
    turns   member -> [rad] its turn from the drawing pose
    steady  +1 stable: it comes back when it is moved a little; 0 neutral: it stays; -1 unstable: it falls away
    """

    case: str
    turns: Mapping[str, float]
    steady: int

    @property
    def text(self) -> str:
        return STEADY[self.steady]


STEADY = {1: "stable", 0: "neutral", -1: "unstable"}


@dataclass(frozen=True)
class Verdict:
    """A requirement judged at its worst pose.

    worst  SI value there; limit  SI; kind  of both; drive  [rad or m]; nan where the model has no stroke
    """

    name: str
    text: str
    holds: bool
    worst: float
    limit: float
    kind: str
    case: str
    drive: float


@dataclass(frozen=True)
class Caveat:
    """A warning that belongs to the answer: what a designer must not miss.

    item  what it is about: "stroke", "effort", a joint, a member
    """

    item: str
    text: str


@dataclass(frozen=True)
class Checks:
    """How well the answer satisfies its own equations, each the worst over the whole batch.

    closure      largest gap of a joint over the size of the mechanism [-]
    equilibrium  largest unbalanced force of a member over the largest force [-]
    virtual_work difference of the effort from equilibrium and from velocities, over the effort's size [-]
    """

    closure: float
    equilibrium: float
    virtual_work: float


@dataclass(frozen=True)
class StrokeAnswer:
    """The stroke of a mechanism: effort, load, ratios and every joint force at each pose.

    Units are SI; ``kinds`` tells which kind of size effort, load and drive are. A frame or a mechanism without
    stroke has one pose and a drive of nan. A failed entry is nan and has a status other than 0.
    """

    mechanism: Mechanism
    cases: tuple[str, ...]
    kinds: Mapping[str, str]  # "drive", "effort", "load" -> kind; a missing key: the model has none
    drive_name: str  # "turn of handle", "travel of ram"; "" without a stroke
    bearings: tuple[Bearing, ...]
    two_force: tuple[str, ...]  # names of the two-force members, in the order of `axial`
    ropes: tuple[str, ...]  # names of the ropes, in the order of `tension`
    status: Codes  # (case, variant, pose) mechanics.state.Status
    checks: Checks
    rubs: bool  # True if joints have friction: each case then comes twice, moving along the stroke and moving back
    loose: bool  # True if free members settle: each case then has poses of its own
    drive: Array = quantity("drive", axes=("one", "variant", "pose"), text="stepped coordinate")
    effort: Array = quantity("effort", axes=BATCH, text="effort")
    load: Array = quantity("load", axes=BATCH, text="load")
    tare_effort: Array = quantity("effort", axes=BATCH, text="tare effort")
    frictionless_effort: Array = quantity("effort", axes=BATCH, text="effort without friction", when="rubs")
    efficiency: Array = quantity("number", axes=BATCH, text="efficiency", when="rubs")
    force_ratio: Array = quantity("ratio", axes=BATCH, text="force ratio")
    ideal_ratio: Array = quantity("ratio", axes=BATCH, text="ideal ratio")
    force: Array = quantity("force", axes=("bearing", "xy", *BATCH), text="force of the joint on the member")
    moment: Array = quantity("moment", axes=("bearing", *BATCH), text="moment of the joint on the member")
    axial: Array = quantity("force", axes=("two-force member", *BATCH), text="axial force, tension plus")
    tension: Array = quantity("force", axes=("rope", *BATCH), text="tension of a rope, pull plus")
    # axis "one" is that of the cases where free members settle
    x: Array = quantity("length", axes=("member", "one", "variant", "pose"), text="x of the member's first point")
    y: Array = quantity("length", axes=("member", "one", "variant", "pose"), text="y of the member's first point")
    turn: Array = quantity("angle", axes=("member", "one", "variant", "pose"), text="turn from the drawing pose")
    steady: Array = quantity("number", axes=BATCH, text="free members: 1 stable, 0 neutral, -1 unstable", when="loose")
    events: tuple[Event, ...] = ()
    verdicts: tuple[Verdict, ...] = ()
    caveats: tuple[Caveat, ...] = ()
    cautions: tuple[Caveat, ...] = ()  # what can hurt; item: the loads that it is so with
    readings: tuple[Reading, ...] = ()  # what loads tell of themselves, and ropes of their ends
    rests: tuple[Rest, ...] = ()  # where free members balance that nothing drives
    marks: tuple[Mark, ...] = ()  # joints and loads in the drawing pose

    # -- reading one thing out of the arrays ------------------------------------------------------------

    def bearing(self, joint: str, member: str) -> int:
        """Index of a member's side of a joint; KeyError with the known ones if there is none."""
        for i, b in enumerate(self.bearings):
            if (b.joint, b.member) == (joint, member):
                return i
        known = ", ".join(f"{b.joint} on {b.member}" for b in self.bearings)
        raise KeyError(f"no force of {joint} on {member}; known: {known}")

    def force_on(self, joint: str, member: str) -> Array:
        """(2, case, variant, pose) [N] force of a joint on a member, ground axes."""
        return self.force[self.bearing(joint, member)]

    def moment_on(self, joint: str, member: str) -> Array:
        """(case, variant, pose) [N m] moment of a joint on a member, about the joint's place."""
        return self.moment[self.bearing(joint, member)]

    def joint_force(self, joint: str) -> Array:
        """(case, variant, pose) [N] the largest resultant that any member feels at a joint."""
        sides = [np.hypot(*self.force[i]) for i, b in enumerate(self.bearings) if b.joint == joint]
        if not sides:
            raise KeyError(f"no joint {joint}; known: {', '.join(self.joints)}")
        largest: Array = np.max(sides, axis=0)
        return largest

    def axial_in(self, member: str) -> Array:
        """(case, variant, pose) [N] axial force of a two-force member, tension plus."""
        if member not in self.two_force:
            raise KeyError(f"{member} is no two-force member; they are: {', '.join(self.two_force) or 'none'}")
        return self.axial[self.two_force.index(member)]

    def tension_of(self, rope: str) -> Array:
        """(case, variant, pose) [N] tension of a rope, pull plus."""
        if rope not in self.ropes:
            raise KeyError(f"no rope {rope}; known: {', '.join(self.ropes) or 'none'}")
        tension: Array = self.tension[self.ropes.index(rope)]
        return tension

    def reading(self, name: str) -> Array:
        """(case, variant, pose) [SI] what a load tells of itself: "length of return"; KeyError with the known ones."""
        for reading in self.readings:
            if reading.name == name:
                return reading.values
        raise KeyError(f"no {name}; known: {', '.join(r.name for r in self.readings) or 'none'}")

    @property
    def joints(self) -> tuple[str, ...]:
        """Names of the joints, each once, in order."""
        return tuple(dict.fromkeys(b.joint for b in self.bearings))

    @property
    def holds(self) -> bool:
        """True if no requirement fails, and at least one pose has an answer."""
        return all(v.holds for v in self.verdicts) and bool((self.status == 0).any())
