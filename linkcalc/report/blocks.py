"""What a report is made of, as plain data: no format and no library shows in here.

Numbers stand in the units that the model file asks for; a block carries the unit beside them.
"""

from __future__ import annotations

from dataclasses import dataclass, field

Cell = str | float | int | None
Places = tuple[tuple[float, float], ...]


@dataclass(frozen=True)
class Heading:
    """A heading; level 1 is the title of the whole."""

    text: str
    level: int = 2


@dataclass(frozen=True)
class Note:
    """A sentence or two; label = what kind of note it is ("caution", "warning"), "" for plain text."""

    text: str
    label: str = ""


@dataclass(frozen=True)
class Lines:
    """Lines that stay as they are, such as formulas, under a title."""

    title: str
    lines: tuple[str, ...]


@dataclass(frozen=True)
class Column:
    """A column of a table.

    head    what stands in it
    unit    its unit, "" for text and plain numbers
    digits  significant digits where it is printed for reading; CSV and JSON always give all
    places  decimal places in print, in place of digits: for a column that is stepped evenly
    zero    printed as 0 if smaller: what rounding leaves of an exact nothing
    """

    head: str
    unit: str = ""
    digits: int = 4
    places: int | None = None
    zero: float = 0.0

    @property
    def title(self) -> str:
        """Head and unit on one line: "effort [N]"."""
        return f"{self.head} [{self.unit}]" if self.unit else self.head


@dataclass(frozen=True)
class Table:
    """Rows of cells under columns; nan and None are gaps.

    keys  how many columns at the left name the row; they are repeated where a table is split to fit a page
    """

    columns: tuple[Column, ...]
    rows: tuple[tuple[Cell, ...], ...]
    title: str = ""
    keys: int = 1


@dataclass(frozen=True)
class Axis:
    """What is measured along an axis of a chart, and in which unit."""

    text: str
    unit: str = ""

    @property
    def title(self) -> str:
        return f"{self.text} [{self.unit}]" if self.unit else self.text


@dataclass(frozen=True)
class Curve:
    """A line over the stroke.

    name    what it is
    values  one a pose, nan where there is none
    hue     index of its colour; curves of the same thing share it
    case    index of its load case: the style of its line
    broad   drawn broad and beneath: what other curves are held against
    """

    name: str
    values: tuple[float, ...]
    hue: int = 0
    case: int = 0
    broad: bool = False


@dataclass(frozen=True)
class Flag:
    """A marked place on a chart: something that happens at an exact drive.

    kind   "largest", "smallest", "reversal", ...
    value  height of the mark, nan for a mark on the drive axis
    """

    kind: str
    drive: float
    value: float
    text: str
    hue: int = 0


@dataclass(frozen=True)
class Panel:
    """One set of axes: curves of one unit."""

    axis: Axis
    curves: tuple[Curve, ...]
    flags: tuple[Flag, ...] = ()


@dataclass(frozen=True)
class Chart:
    """Curves over the stroke, panel under panel, all over the same drive.

    drive  one value a pose, in the order of the stroke
    cases  what to write in the key for each line style, "" for nothing
    lines  what happens to the whole mechanism at one drive (dead points, limits)
    """

    title: str
    axis: Axis
    drive: tuple[float, ...]
    cases: tuple[str, ...]
    panels: tuple[Panel, ...]
    lines: tuple[Flag, ...] = ()


@dataclass(frozen=True)
class Item:
    """One thing on a drawing. The shape says how it looks; a new shape is one more entry in ``shapes.py``.

    shape   "bar", "ground", "pin", "slot", "slide", "weld", "force", "torque", "path", ...
    spots   places in the drawing's unit
    along   unit direction of a line or arrow, (0, 0) if it has none
    name    what to write beside it
    tone    "plain"; "ghost" for another pose; "ground" for what stands on it; "effort", "load", "joint" for a force
    size    how large it is drawn, as a part of the largest of its shape
    hue     index of its fill
    """

    shape: str
    spots: Places
    along: tuple[float, float] = (0.0, 0.0)
    name: str = ""
    tone: str = "plain"
    size: float = 1.0
    hue: int = 0


@dataclass(frozen=True)
class Drawing:
    """A mechanism, or one member of it, drawn to scale.

    unit     of all places on it
    items    drawn in this order, the last on top
    caption  what it shows, under the title
    tables   printed under it
    """

    title: str
    unit: str
    items: tuple[Item, ...]
    caption: str = ""
    tables: tuple[Table, ...] = field(default=())


@dataclass(frozen=True)
class Panels:
    """Drawings of the same thing side by side, to one scale."""

    title: str
    caption: str
    panels: tuple[Drawing, ...]


@dataclass(frozen=True)
class Rose:
    """Where a force points and how large it is there, on its own scale.

    title    what it is of: "D on arm"
    sectors  the largest force into each of as many equal sectors, counter-clockwise, the first about the axis
    curves   for each case the places (x, y) of the tip of the force
    worst    place of the tip of the largest
    free     [rad] from, to: the sector without force; None if there is none
    lines    printed under it
    """

    title: str
    sectors: tuple[float, ...]
    curves: tuple[Places, ...]
    worst: tuple[float, float]
    free: tuple[float, float] | None
    lines: tuple[str, ...]


@dataclass(frozen=True)
class Roses:
    """Load roses side by side."""

    title: str
    caption: str
    roses: tuple[Rose, ...]


@dataclass(frozen=True)
class PinDiagram:
    """A pin across its plates, with what they do to it along it.

    title   what it is of: "K, 10 mm"
    plates  (name, start, stop) along the pin
    places  along the pin, where the curves are told
    shear, moment  name -> values at the places: components and resultant
    peaks   (place, size, words) of the largest shear and of the largest moment
    """

    title: str
    diameter: float
    plates: tuple[tuple[str, float, float], ...]
    places: tuple[float, ...]
    shear: tuple[Curve, ...]
    moment: tuple[Curve, ...]
    peaks: tuple[tuple[float, float, str], tuple[float, float, str]]


@dataclass(frozen=True)
class PinDiagrams:
    """Pins side by side, each in the pose that uses it most."""

    title: str
    caption: str
    axes: tuple[Axis, Axis, Axis]  # along the pin, shear, moment
    pins: tuple[PinDiagram, ...]


Block = Heading | Note | Lines | Table | Chart | Drawing | Roses | PinDiagrams
