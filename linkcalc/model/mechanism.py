"""The mechanism as plain data: what a model file says, word for word, and what Python may build instead.

Sizes stay as written (a number in the file's unit, a quantity or a formula as text), so that writing and reading
again changes nothing. ``sketch.py`` turns them into SI numbers.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import MISSING, dataclass, field
from typing import Any

from linkcalc.model.poises import Counterpoise, Poise
from linkcalc.parts import fields
from linkcalc.parts.contract import Size

GROUND = "ground"
STACKED = 'plates are wanted in order, e.g. [["fork", 8], ["rod", 16, 0.5], ["fork", 8, 0.5]]'
ENDS = ("pinned", "fixed and pinned", "fixed", "fixed and free")
DISTRIBUTIONS = ("normal", "uniform", "triangular")
LEAST_PEAK, LEAST_SQUARE = "least peak", "least mean square"
EFFORT_KIND = "effort"
"""Kind of a size that is a force or a moment as the effort is."""
DRAWN, LOWER, UPPER = "drawn", "lower limit", "upper limit"


def _entry(shape: str, text: str, default: Any = None, **more: Any) -> Any:
    """A field of the model whose shape is not one of the parts' fields; ``shapes.py`` reads and writes it."""
    meta = {"kind": shape, "text": text, **more}
    if default is dict:
        return field(default_factory=dict, metadata=meta)
    return field(metadata=meta) if default is MISSING else field(default=default, metadata=meta)


_POWERS = {"area": 2, "section modulus": 3, "second moment": 4}
"""Kinds that have no unit of their own, but a power of that of length."""


def _unit(of: str, default: str) -> Any:
    return _entry("unit", f"unit of a bare {of}, and of answers", default, unit=of)


@dataclass(frozen=True)
class Units:
    """What bare numbers mean, kind by kind, and the units that answers come in."""

    length: str = _unit("length", "mm")
    angle: str = _unit("angle", "deg")
    force: str = _unit("force", "N")
    mass: str = _unit("mass", "kg")
    moment: str = _unit("moment", "N*m")
    stress: str = _unit("stress", "MPa")
    stiffness: str = _unit("stiffness", "N/mm")
    acceleration: str = _unit("acceleration", "m/s^2")
    torsion_stiffness: str = _unit("torsion stiffness", "N*m/deg")
    pressure: str = _unit("pressure", "bar")
    line_load: str = _unit("line load", "N/mm")
    volume: str = _unit("volume", "cm^3")
    temperature: str = fields.choice(("degC", "degF", "K"), "scale of a bare temperature", "degC")
    number = ""

    def of(self, kind: str) -> str:
        """The unit of a kind of size: "length" -> "mm", "area" -> "mm^2"."""
        if kind in _POWERS:
            return f"{self.length}^{_POWERS[kind]}"
        unit: str = getattr(self, kind.replace(" ", "_"))
        return unit


@dataclass(frozen=True)
class Dimension:
    """A named size. Others may use it in formulas.

    tol           as a length: plus and minus; as a pair: (lower, upper) departures, for a tolerance study
    distribution  how the copies scatter within the tolerance: "normal" (3 sigma), "uniform", "triangular"
    """

    size: Size = _entry("own size", "how large: a bare number is a length, anything else carries its unit", MISSING)
    tol: Size | tuple[Size, Size] | None = _entry("tol", "plus and minus, or lower and upper departure")
    distribution: str = fields.choice(DISTRIBUTIONS, "how copies scatter within the tolerance", "normal")

    short = "size"


@dataclass(frozen=True)
class Member:
    """A rigid part.

    points  the points it carries, in order; its own x axis runs from the first to the last
    path    the line of its body through points, for drawing and inner forces; else the points in order
    mass    own mass; None is weightless
    stiffness  force over stretch along the line of its two pins; None: it does not stretch
    centre  point of its centre of mass; else the middle of the path (mass spread evenly along it)
    section      a section part (Flat, Round, Tube, ...), for its stress
    material     name of its material; factor against its yield stress
    bend_radius  of the middle line at the corners of its path
    ends, ends_across  of a two-force member: how its ends are held against buckling, in the plane and out of it
    copies  how many equal plates side by side it stands for: mass and stiffness are those of one, and so are the
            forces on it that answers tell; all of them together are what holds and weighs
    """

    points: tuple[str, ...] = fields.names("point", "the points it carries, in order", least=0, most=None)
    path: tuple[str, ...] = fields.names("point", "the line of its body", (), least=2, most=None)
    mass: Size | None = fields.size("mass", "own mass", None, sign="not minus")
    centre: str | None = fields.name("point", "point at its centre of mass; else the middle of the path", None)
    stiffness: Size | None = fields.size(
        "stiffness", "force over stretch along the line of its two pins", None, sign="plus"
    )
    section: Any = _entry("part", "its section: a round, a tube, a flat, ...", family="section")
    material: str | None = fields.name("material", "what it is made of", None)
    factor: Size | None = fields.size("number", "factor against yield, and against buckling", None, sign="plus")
    bend_radius: Size | None = fields.size(
        "length", "radius of its middle line where the path bends; sharp if left out", None, sign="plus"
    )
    ends: Size = fields.size(
        "number", "of a two-force member: how its ends are held in the plane, or the length factor", "pinned",
        sign="plus", words=ENDS,
    )  # fmt: skip
    ends_across: Size | None = fields.size(
        "number", "the same out of the plane; as in the plane if left out", None, sign="plus", words=ENDS
    )
    copies: int = fields.count("how many equal plates side by side it stands for", 1, most=100)

    short = "points"


@dataclass(frozen=True)
class Gravity:
    """Field of gravity; weights of members and hung masses follow it."""

    size: Size = fields.size("acceleration", "how strong", "9.80665 m/s^2", sign="not minus")
    direction: Size = fields.size("angle", "where it pulls, from the x axis", "-90 deg")


@dataclass(frozen=True)
class Friction:
    """Friction of all joints that say nothing of their own."""

    pins: Size | None = fields.friction("in pins")
    diameter: Size | None = fields.size("length", "diameter of the pins", None, sign="plus")
    slots: Size | None = fields.friction("in slots")
    slides: Size | None = fields.friction("in slides")
    sheave_efficiency: Size | None = fields.size(
        "number", "efficiency of pulleys of ropes", None, sign="part", sensible=(0.5, 1)
    )


@dataclass(frozen=True)
class MaterialEntry:
    """A material of the user's own; it stands before one of the same name in the table of the package.

    yield_  yield stress ("yield" in a file), or 0.2 % proof stress
    """

    yield_: Size = fields.size("stress", "yield or 0.2 % proof stress", sign="plus")
    ultimate: Size | None = fields.size("stress", "tensile strength", None, sign="plus")
    modulus: Size | None = fields.size("stress", "modulus of elasticity", None, sign="plus")

    short = "yield"


@dataclass(frozen=True)
class Pin:
    """What one pin has of its own.

    stack  the plates across it in order (Plate), each as often as it comes; () if it is not told
    """

    friction: Size | None = fields.friction("of the pin")
    diameter: Size | None = fields.size("length", "its diameter", None, sign="plus")
    friction_radius: Size | None = fields.size(
        "length", "radius of its friction circle, instead of coefficient and diameter", None, sign="not minus"
    )
    stiffness: Size | None = fields.size("stiffness", "of pin and bush, alike in all directions", None, sign="plus")
    material: str | None = fields.name("material", "what it is made of", None)
    factor: Size | None = fields.size("number", "factor against yield", None, sign="plus")
    stack: tuple[Any, ...] = fields.parts("layer", "the plates across it, in order", STACKED, ())
    bush: str | None = _entry("text", "material of its plain bush", None)
    length: Size | None = fields.size("length", "length of its bush; one of the series if left out", None, sign="plus")
    bearing: str | None = _entry("text", "its rolling bearing: a designation of the list, or a kind", None)
    life: Size | None = fields.size("number", "strokes, there and back, that its bearing must last", None, sign="plus")


@dataclass(frozen=True)
class Stroke:
    """The range of motion that is stepped through.

    along  a coordinate part: Turn, Distance, Travel
    start  where it begins ("from" in a file): a size, "drawn", "lower limit" or "upper limit"
    stop   where it ends ("to" in a file): a size, "lower limit" or "upper limit": as far as it goes
    poses  how many poses, both ends counted
    """

    along: Any = _entry("coordinate", "what is stepped", MISSING)
    start: Size = fields.size("", "where it begins", DRAWN, words=(DRAWN, LOWER, UPPER))
    stop: Size = fields.size("", "where it ends", UPPER, words=(LOWER, UPPER))
    poses: int = fields.count("how many poses, both ends counted", 61, least=2, most=100_000)

    keys = {"start": "from", "stop": "to"}  # noqa: RUF012


@dataclass(frozen=True)
class GravityChange:
    """How a load case changes the field of gravity: turned, counter-clockwise plus, and scaled."""

    turn: Size = fields.size("angle", "turns it, counter-clockwise plus", 0)
    scale: float = _entry("factor", "factor on its strength", 1.0)


@dataclass(frozen=True)
class Case:
    """A load case: how it differs from the model as written.

    scale         load name -> factor on it
    drop          loads that are left out
    add           loads that only this case has, by name
    effort        an effort that stands in for the model's
    gravity       how the field of gravity is turned and scaled
    temperature   of the surroundings in this case; None: as in the model
    """

    scale: Mapping[str, float] = _entry("factors", "factors on loads, by name", dict)
    drop: tuple[str, ...] = fields.names("load", "loads left out", (), least=0, most=None)
    add: Mapping[str, Any] = _entry("named parts", "loads that only this case has", dict, family="load")
    effort: Any = _entry("part", "an effort in place of the model's", family="load", asks="size")
    gravity: GravityChange = _entry("table", "the field of gravity turned or scaled", GravityChange(), of=GravityChange)
    temperature: Size | None = fields.size("temperature", "of the surroundings in this case", None)


@dataclass(frozen=True)
class Balancing:
    """What may be put in to take the effort out of the hand, and what is wanted of it.

    goal   what is made small over the whole stroke and the cases: the largest effort, or its mean square
    cases  over which cases; () for all
    stays_at_start, stays_at_end  effort that it must take to leave the end of the stroke: it stays there by itself
    find   name -> Counterweight, Coil, GasStrut
    """

    goal: str = fields.choice((LEAST_PEAK, LEAST_SQUARE), "what is made small", LEAST_PEAK)
    cases: tuple[str, ...] = fields.names("case", "over which cases; all if left out", (), least=1, most=None)
    stays_at_start: Size | None = fields.size(EFFORT_KIND, "effort that it takes to leave the start", None)
    stays_at_end: Size | None = fields.size(EFFORT_KIND, "effort that it takes to leave the end", None)
    find: Mapping[str, Any] = _entry("named parts", "what may be put in, by name", dict, family="balancer")


@dataclass(frozen=True)
class Mechanism:
    """A planar mechanism, as written.

    points    name -> construction (Coordinates, Polar, Meets, OnLine, Mirror, Crossing)
    members   name -> Member; "ground" is the one that does not move
    free      members that nothing drives or holds: they settle where they balance
    joints    word of the kind -> name -> part: {"slot": {...}, "slide": {...}, "weld": {...}}
    friction  of all joints that say nothing of their own
    pins      point -> Pin: what single pins have of their own
    materials name -> MaterialEntry: the user's own, before those of the table
    effort    the effort (Force, Torque or Pair); None for a frame
    load      the load whose ratio to the effort is asked; None if there is none
    loads     the other loads, by name
    poises    name -> Poise: masses that slide along a bar of a scale
    counterpoises  name -> Counterpoise: hangers that weights are put on
    stroke    None: solved in the drawing pose only
    cases     name -> Case; empty: one case, the model as written
    requirements  name -> text, e.g. "effort <= 150 N"
    balance   what the command "balance" may put in; nothing of it acts
    source    file it was read from, "" if built in Python; not compared
    checked   True once everything in it has been found in order (what is replaced starts anew); not compared
    """

    title: str = _entry("text", "shown in answers", "")
    note: str = _entry("text", "shown in answers", "")
    temperature: Size = fields.size("temperature", "of the surroundings, for what hangs on it", "20 degC")
    units: Units = _entry("table", "what bare numbers mean, and what answers come in", Units(), of=Units)
    dimensions: Mapping[str, Dimension] = _entry("named tables", "named sizes", dict, of=Dimension)
    points: Mapping[str, Any] = _entry("named parts", "where things are drawn", dict, family="construction")
    members: Mapping[str, Member] = _entry("named tables", "rigid parts", dict, of=Member)
    free: tuple[str, ...] = fields.names("member", "members that settle where they balance", (), least=0, most=None)
    joints: Mapping[str, Mapping[str, Any]] = _entry("joints", "joints other than pins", dict)
    friction: Friction = _entry("table", "friction of all joints", Friction(), of=Friction)
    pins: Mapping[str, Pin] = _entry("named tables", "what single pins have of their own", dict, of=Pin)
    materials: Mapping[str, MaterialEntry] = _entry("named tables", "the user's own materials", dict, of=MaterialEntry)
    gravity: Gravity = _entry("table", "field of gravity", Gravity(), of=Gravity)
    effort: Any = _entry("part", "what goes in", family="load", asks="size")
    load: Any = _entry("part", "what comes out or is held", family="load")
    loads: Mapping[str, Any] = _entry("named parts", "other loads", dict, family="load")
    poises: Mapping[str, Poise] = _entry("named tables", "masses that slide along a bar", dict, of=Poise)
    counterpoises: Mapping[str, Counterpoise] = _entry(
        "named tables", "hangers that weights are put on", dict, of=Counterpoise
    )
    stroke: Stroke | None = _entry("table", "what is stepped", of=Stroke)
    cases: Mapping[str, Case] = _entry("named tables", "load cases", dict, of=Case, blanks=True)
    balance: Balancing | None = _entry("table", "what may be put in to balance it", of=Balancing)
    requirements: Mapping[str, str] = _entry("named texts", "what must hold", dict, blanks=True)
    source: str = field(default="", compare=False)
    checked: bool = field(default=False, init=False, compare=False, repr=False)


def strength_kind(load: Any) -> str:
    """Kind of the strength of an effort or load: "force" or "moment"; a hung mass pulls with a force."""
    size = next((f.metadata["unit"] for f in fields.part_fields(load) if f.name == "size"), "force")
    kind: str = getattr(load, "gives", size)
    return kind


def asked_by(load: Any) -> str:
    """The key of an effort or load (or of its kind) that is left out when it is what is asked for."""
    key: str = getattr(load, "asked", "size")
    return key
