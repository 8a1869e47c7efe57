"""What a part must be able to say, documented once.

A *part* is a frozen dataclass of what the file says (``Slot``, ``Force``, ``Turn``). Asked with a ``Sketch``, it
gives its equations: one or more of the numeric classes below. The engine knows those, and no part by name.

Signs, everywhere: SI units, radians; x right, y up; counter-clockwise plus. A joint's force is the force on its
first member. An entry of a slope is (member, coordinate, value); entries of the ground (member 0) may be given,
the engine leaves them out. A value that is a Python float never changes with the pose; an array does.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Protocol

from linkcalc.parts.along import Moved
from linkcalc.parts.marks import Contact, Mark, Spread
from linkcalc.parts.pose import TURN, Array, Poses, Site, Value, X, Y
from linkcalc.parts.telling import Limit, Telling, Told

__all__ = [
    "TURN", "Array", "Contact", "Coordinate", "Drag", "Drive", "Entry", "Give", "Hauled", "Joint", "Limit",
    "Mark", "Poses", "Push", "Pusher", "Row", "Rub", "Site", "Size", "Sketch", "Spread", "Telling", "Told",
    "Travelled", "Value", "X", "Y",
]  # fmt: skip

Size = float | int | str
"""A size as written: a bare number in the file's unit, a quantity ("3/8 in") or a formula ("3*link")."""

Entry = tuple[int, int, Value]
Row = Sequence[Entry]
Push = tuple[int, Value, Value, Value]
"""(member, force x [N], force y [N], moment about the member's origin [N m])"""


class Sketch(Protocol):
    """What a part may ask of the mechanism as drawn. Everything in SI; batches are (1, variant, 1)."""

    @property
    def drawn(self) -> Poses:
        """all members in the drawing pose"""

    @property
    def size(self) -> float:
        """[m] the largest extent of the drawing: the length that others are compared with"""

    def value(self, size: Size, kind: str) -> Value:
        """a size as written -> SI; kind is "length", "angle", "force", "mass", "moment", ..."""

    def point(self, name: str) -> tuple[Value, Value]:
        """[m] the drawn place of a point"""

    def shown(self, size: float, kind: str = "length") -> str:
        """a size [SI] for a message, in the file's unit"""

    def formula(self, text: str, kind: str, of: str) -> Callable[[Value], Value]:
        """a formula over one size more, named by its kind ("length", "angle"), and over the dimensions [SI]"""

    def site(self, point: str, member: str | None = None) -> Site:
        """a point as a member carries it; without a member: the pin itself, by the member that stands for it"""

    def member(self, name: str) -> int:
        """index of a member, 0 for "ground" """

    def carriers(self, point: str) -> tuple[str, ...]:
        """members that name the point, in the order of the file"""

    def first_point(self, member: str) -> str:
        """the point at the origin of the member's frame"""

    def shared_point(self, member: str, other: str) -> str | None:
        """the first point of a member that another carries too, None if there is none"""

    def own_axis(self, member: str) -> Value:
        """[rad] direction of the member's own x axis (first to last point) in the drawing pose"""

    def coefficient(self, kind: str, own: Size | None) -> Value:
        """[-] coefficient of friction: a joint's own, else that of its kind ("pins", "slots", "slides"), else 0.0"""

    def sheave_efficiency(self) -> Value:
        """[-] efficiency of all pulleys that say nothing of their own, 1.0 if none is told"""

    def travelled(self, name: str) -> Travelled:
        """the slot, slide or track of that name, for a stroke along it"""

    def hauled(self, name: str) -> Hauled:
        """the rope of that name, to draw it in at its hauling end"""

    def moved(self, name: str) -> Moved:
        """the load of that name that moves along a line"""


@dataclass(frozen=True, eq=False)
class Rub:
    """Friction at a joint, or another push that grows with the joint's own reaction.

    normals  the normal force is the sum of these parts; each is the size of a vector whose components are linear
             forms of the joint's multipliers, one coefficient a row: ((1, 0), (0, 1)) is the resultant of a pin
    factor   friction for a normal force of 1: a coefficient [-], or the radius of the friction circle [m]
    push     (poses) -> what a friction of 1 would do to each member if it pushed along the relative motion; its power
             tells which way that is
    always   True if it acts along its push whichever way the joint moves, and without a motion too: teeth apart
    """

    normals: tuple[tuple[tuple[Value, ...], ...], ...]
    factor: Value
    push: Callable[[Poses], tuple[Push, ...]]
    always: bool = False


class Give(Protocol):
    """A law between the gap of a joint's row and its multiplier: what an elastic link, pin or contact does.

    stiffness  [N/m] or [N m/rad]
    one_sided  True if it pushes one way only and lets go the other way
    """

    @property
    def stiffness(self) -> Value: ...
    @property
    def one_sided(self) -> bool: ...

    def force(self, gap: Value) -> Value:
        """[N] or [N m] the row's multiplier at a gap [m] or [rad], elementwise"""


@dataclass(frozen=True, eq=False)
class Drag:
    """Friction of a joint whose pull is not the same all along, in ratios that the senses of motion tell: a rope.

    spans   (poses) -> for each part of it, what a pull of 1 in that part does to each member
    ratios  (poses) -> for each place between two: pull beyond it over pull before it when the joint runs on over it,
            1 or more; the float 1.0 without friction
    """

    spans: Callable[[Poses], tuple[tuple[Push, ...], ...]]
    ratios: Callable[[Poses], tuple[Value, ...]]


class Joint(Protocol):
    """Something that holds members together: rows of constraint equations.

    One that gives has, besides, ``gives``: for each row a Give, or None where it holds. One that acts at several places
    has ``contacts(at, parts)``: a Contact for each of them. It has one row, whose multiplier they are told for; or
    none, if it holds nothing and only passes on what a pusher does (``Hauled``). If its pull changes along it,
    ``drag()`` gives its Drag; the multiplier is the pull in its last part, and ``parts`` are the pulls of all its parts
    over that one. ``limits()``, if it is there, tells what should hold in every pose.
    A guide has, besides, ``shoe``: the Shoe it bears on, or None. A rope has ``breaks``: its breaking load [N], and
    ``factor`` [-], each None if it is not told. A kind with keys that say nothing alone has ``goes_with``: of each such
    key the keys that must be there too.
    One with teeth has ``place(at)``, where its force is told, for that moves on its members: (x, y) [m]; ``grain``:
    its gap is known but for multiples of that [m]; ``astray(at)``: how far its centres have moved apart [m].

    One that can share a force with joints that hold the same has, besides, ``share``: its stiffness [N/m], or None.
    Its angular row is as stiff as its ``turning_stiffness`` [N m/rad], or else as two halves of that stiffness are at a
    ``lever`` [m] each; None: at half the extent of the drawing.

    name, word   what the file calls it, and its kind
    members      indices of the members it joins; the first is the one its force acts on
    site         where its force is told, carried by the first member
    on_pin       name of the pin that the first member's side acts on itself, "" if it acts on that member
    angular      one bool a row: True where the gap is an angle [rad], not a length [m]
    """

    word: str
    on_pin: str
    angular: tuple[bool, ...]

    @property
    def name(self) -> str: ...
    @property
    def members(self) -> tuple[int, ...]: ...
    @property
    def site(self) -> Site: ...

    def gap(self, at: Poses) -> tuple[Value, ...]:
        """One value a row, zero when the joint holds [m] or [rad]."""

    def slope(self, at: Poses) -> tuple[Row, ...]:
        """Derivative of each gap by the coordinates of the members, sparse. A row's multiplier times its slope
        is the generalised force it puts on each member."""

    def rubs(self) -> tuple[Rub, ...]:
        """Its friction and the like; empty if it has none."""

    def mark(self, at: Poses) -> Mark:
        """How to draw it in a single pose."""


class Travelled(Protocol):
    """A joint along which a travel can be measured (slot, slide, track).

    One whose line has ends has, besides, ``span``: its length [m], travel counting from its beginning.
    """

    def travel(self, at: Poses) -> Value:
        """[m] how far along the line"""

    def travel_slope(self, at: Poses) -> Row: ...


class Hauled(Protocol):
    """A joint that can be drawn in at one end (rope)."""

    @property
    def name(self) -> str: ...
    @property
    def hauled(self) -> bool:
        """True if it has such an end"""

    @property
    def pins(self) -> tuple[str, ...]:
        """for each of its contacts the name of the pin that takes it, "" if a member does"""

    @property
    def sites(self) -> tuple[Site, ...]:
        """for each of its contacts where it acts"""

    def haul(self, at: Poses) -> Value:
        """[m] how much has been drawn in since the drawing pose"""

    def haul_slope(self, at: Poses) -> Row: ...
    def contacts(self, at: Poses, parts: Sequence[Value] = ()) -> tuple[Contact, ...]: ...
    def mark(self, at: Poses) -> Mark: ...


class Pusher(Protocol):
    """Something that pushes: a force, torque, weight or pair.

    One whose push comes through a joint has, besides, ``through``: the name of the joint, whose contacts tell it.
    One that is spread along members has, besides, ``spread``: for each entry of its push a Spread, or None.
    One that moves along a member has, besides, ``arms(at)``: for each entry of its push where it goes in, in place of
    the ``sites``: from the origin of the member, ground axes [m].

    name, word   what the file calls it, and its kind
    kind         kind of its strength: "force" or "moment"
    size         as the file gives it, SI (a weight: its mass), float or (1, variant, 1); None for the one unknown
    on_pins      for each entry of its push: the name of the pin that takes it, "" if a member does
    sites        for each entry of its push: where it goes into the member
    """

    word: str
    kind: str

    @property
    def name(self) -> str: ...
    @property
    def size(self) -> Value | None: ...
    @property
    def on_pins(self) -> tuple[str, ...]: ...
    @property
    def sites(self) -> tuple[Site, ...]: ...

    def strength(self, at: Poses) -> Value:
        """[N] or [N m] how strong it is; not asked of the unknown"""

    def push(self, at: Poses) -> tuple[Push, ...]:
        """What it does to each member, for a strength of 1."""

    def mark(self, at: Poses) -> Mark:
        """How to draw it in a single pose."""


class Drive(Protocol):
    """A coordinate held at a target: one more constraint row; angular as for a joint's rows."""

    @property
    def angular(self) -> bool: ...

    def gap(self, at: Poses) -> Value: ...
    def slope(self, at: Poses) -> Row: ...


class Coordinate(Protocol):
    """What is stepped: a turn, a distance, a travel.

    kind  "angle" or "length"
    """

    kind: str

    def value(self, at: Poses) -> Value:
        """its value [rad or m]; an angle comes within half a turn of zero, wound on by the caller"""

    def hold(self, target: Value) -> Drive:
        """the row that keeps it at a target (1, variant, pose)"""
