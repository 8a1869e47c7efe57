"""The mechanism as plain data: what a model file says, word for word, and what Python may build instead.

Sizes stay as written (a number in the file's unit, a quantity or a formula as text), so that writing and reading
again changes nothing. ``sketch.py`` turns them into SI numbers.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

from linkcalc.parts.contract import Size

GROUND = "ground"
DRAWN, LOWER, UPPER = "drawn", "lower limit", "upper limit"


@dataclass(frozen=True)
class Units:
    """What bare numbers mean, kind by kind, and the units that answers come in."""

    length: str = "mm"
    angle: str = "deg"
    force: str = "N"
    mass: str = "kg"
    moment: str = "N*m"
    stress: str = "MPa"
    stiffness: str = "N/mm"
    acceleration: str = "m/s^2"
    number: str = ""

    def of(self, kind: str) -> str:
        """The unit of a kind of size: "length" -> "mm"."""
        unit: str = getattr(self, kind)
        return unit


@dataclass(frozen=True)
class Dimension:
    """A named size. Others may use it in formulas.

    tol           as a length: plus and minus; as a pair: (lower, upper) departures, for a tolerance study
    distribution  how the copies scatter within the tolerance: "normal" (3 sigma), "uniform", "triangular"
    """

    size: Size
    tol: Size | tuple[Size, Size] | None = None
    distribution: str = "normal"


@dataclass(frozen=True)
class Member:
    """A rigid part.

    points  the points it carries, in order; its own x axis runs from the first to the last
    path    the line of its body through points, for drawing and inner forces; else the points in order
    mass    own mass; None is weightless
    centre  point of its centre of mass; else the middle of the path (mass spread evenly along it)
    """

    points: tuple[str, ...]
    path: tuple[str, ...] = ()
    mass: Size | None = None
    centre: str | None = None


@dataclass(frozen=True)
class Gravity:
    """Field of gravity; weights of members and hung masses follow it."""

    size: Size = "9.80665 m/s^2"
    direction: Size = "-90 deg"


@dataclass(frozen=True)
class Stroke:
    """The range of motion that is stepped through.

    along  a coordinate part: Turn, Distance, Travel
    start  where it begins ("from" in a file): a size, "drawn", "lower limit" or "upper limit"
    stop   where it ends ("to" in a file): a size, "lower limit" or "upper limit": as far as it goes
    poses  how many poses, both ends counted
    """

    along: Any
    start: Size = DRAWN
    stop: Size = UPPER
    poses: int = 61


@dataclass(frozen=True)
class Case:
    """A load case: how it differs from the model as written.

    scale         load name -> factor on it
    drop          loads that are left out
    add           loads that only this case has, by name
    effort        an effort that stands in for the model's
    gravity_turn  turns the field of gravity, counter-clockwise plus
    gravity_scale factor on the field of gravity
    """

    scale: Mapping[str, float] = field(default_factory=dict)
    drop: tuple[str, ...] = ()
    add: Mapping[str, Any] = field(default_factory=dict)
    effort: Any = None
    gravity_turn: Size = 0
    gravity_scale: float = 1.0


@dataclass(frozen=True)
class Mechanism:
    """A planar mechanism, as written.

    points    name -> construction (Coordinates, Polar, Meets, OnLine, Mirror, Crossing)
    members   name -> Member; "ground" is the one that does not move
    joints    word of the kind -> name -> part: {"slot": {...}, "slide": {...}, "weld": {...}}
    effort    the effort (Force, Torque or Pair); None for a frame
    load      the load whose ratio to the effort is asked; None if there is none
    loads     the other loads, by name
    stroke    None: solved in the drawing pose only
    cases     name -> Case; empty: one case, the model as written
    requirements  name -> text, e.g. "effort <= 150 N"
    source    file it was read from, "" if built in Python; not compared
    """

    title: str = ""
    units: Units = Units()
    dimensions: Mapping[str, Dimension] = field(default_factory=dict)
    points: Mapping[str, Any] = field(default_factory=dict)
    members: Mapping[str, Member] = field(default_factory=dict)
    joints: Mapping[str, Mapping[str, Any]] = field(default_factory=dict)
    gravity: Gravity = Gravity()
    effort: Any = None
    load: Any = None
    loads: Mapping[str, Any] = field(default_factory=dict)
    stroke: Stroke | None = None
    cases: Mapping[str, Case] = field(default_factory=dict)
    requirements: Mapping[str, str] = field(default_factory=dict)
    note: str = ""
    source: str = field(default="", compare=False)
