"""What parts say of themselves as plain data: how they are drawn, where they act, how they are spread."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts.pose import Site, Value


@dataclass(frozen=True)
class Mark:
    """How a part is drawn, as plain data; the report layer knows how each shape looks.

    shape   "pin", "slot", "slide", "weld", "force", "torque", "pair", "weight", ...
    spots   places in ground axes [m], one pose: ((x, y), ...)
    along   direction of the line or arrow (x, y), (0, 0) if it has none
    name    what to write beside it
    line    its own line, if it has one that is neither straight nor a member's: ((x, y), ...)
    rounds  circles that belong to it: ((x, y, radius), ...); of teeth in mesh in the order of the members
    """

    shape: str
    spots: tuple[tuple[float, float], ...]
    along: tuple[float, float] = (0.0, 0.0)
    name: str = ""
    line: tuple[tuple[float, float], ...] = ()
    rounds: tuple[tuple[float, float, float], ...] = ()


@dataclass(frozen=True, eq=False)
class Contact:
    """One of the places where a joint acts, if it acts at more than one.

    name    what this side of the joint is called: "hoist at P"
    site    the place, and the member that feels it there
    on_pin  name of the pin that it acts on itself, "" if it acts on that member
    fx, fy  [-] force there for a multiplier of 1, ground axes
    moment  [m] moment about that place for a multiplier of 1; the float 0.0 where there can be none
    """

    name: str
    site: Site
    on_pin: str
    fx: Value
    fy: Value
    moment: Value


@dataclass(frozen=True, eq=False)
class Spread:
    """How a push is spread along its member: it has the same resultant, but bends the member less.

    lines  straight lines on the member, each by its ends; the push is spread along all of them
    ends   how strong it is at the beginning of the first and the end of the last, each over its mean; it changes
           evenly along the way between
    """

    lines: tuple[tuple[Site, Site], ...]
    ends: tuple[float, float] = (1.0, 1.0)
