"""Lists of rolling bearings: the user's own, or a small sample."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from pathlib import Path

from linkcalc import data
from linkcalc.design.sizing.lists import Row, number, open_rows, rows_of
from linkcalc.faults import Fault, Faults, fault
from linkcalc.model.mechanism import Units
from linkcalc.model.units import unit
from linkcalc.words import nearest

SAMPLE = "Sample bearings with rounded figures that stand for no maker: for trying out only. Take a list of your own."
_SIZES = {"bore": "length", "outside": "length", "width": "length", "C": "force", "C0": "force"}
_COLUMNS = (*_SIZES, "kind")


@dataclass(frozen=True)
class Bearing:
    """A rolling bearing of a list.

    bore, outside, width  [m]
    C, C0                 [N] dynamic and static load rating
    kind                  "ball", "roller" or "needle"
    sample                True if its figures stand for no maker
    """

    designation: str
    bore: float
    outside: float
    width: float
    C: float
    C0: float
    kind: str
    sample: bool = False

    @property
    def exponent(self) -> float:
        """[-] of the life: 3 for balls, 10/3 for rollers and needles (ISO 281)."""
        return float(kinds()[self.kind])


def kinds() -> Mapping[str, float]:
    """Kinds of bearings and the exponents of their life."""
    return {name: p for name, p in data.table("bearings.toml")["exponent"].items() if name != "source"}


def bearings(path: str | Path | None = None, units: Units | None = None) -> tuple[Bearing, ...]:
    """The bearings of a list, the smallest first.

    path   a CSV file with the columns designation, bore, outside, width, C, C0, kind, whose heads may carry a unit
           ("C [kN]"); None: the sample
    units  of columns whose head has none: those of the model; mm and N if left out

    Raises Faults: every row that cannot be read, with its number and the reason.
    """
    if path is None:
        name = "bearings_sample.csv"
        rows = rows_of(data.text(name), name, "designation", _COLUMNS, _COLUMNS)
    else:
        rows = open_rows(path, "designation", _COLUMNS, _COLUMNS)
    factors = _factors(rows[0], units or Units())
    found, faults, taken = list[Bearing](), list[Fault](), dict[str, int]()
    for row in rows:
        wrong = list(_wrong(row, taken))
        taken.setdefault(row.name, row.count)
        if wrong:
            faults += [row.located(one) for one in wrong]
            continue
        sizes = {key: float(row.cells[key]) * factors[key] for key in _SIZES}
        found.append(Bearing(row.name, **sizes, kind=row.cells["kind"], sample=path is None))
    if faults:
        raise Faults(faults)
    return tuple(sorted(found, key=lambda b: (b.outside, b.width, b.bore, b.C)))


def bearing(designation: str, among: Iterable[Bearing]) -> Bearing:
    """One of a list by its designation. Raises Faults: unknown (nearest ones told)."""
    known = {b.designation: b for b in among}
    if designation not in known:
        raise fault((), f"unknown bearing {designation!r}", nearest(designation, known))
    return known[designation]


def _factors(row: Row, units: Units) -> dict[str, float]:
    """Of each column how much of SI its unit is."""
    faults, factors = list[Fault](), dict[str, float]()
    for key, kind in _SIZES.items():
        try:
            factors[key] = unit(row.units.get(key) or units.of(kind), kind).factor
        except Faults as found:
            faults += [Fault((key,), f.what, f.wanted, row.file, row.head) for f in found.faults]
    if faults:
        raise Faults(faults)
    return factors


def _wrong(row: Row, taken: Mapping[str, int]) -> Iterable[Fault]:
    """What is wrong with a row."""
    if row.name in taken:
        yield Fault((), f"{row.name!r} stands in row {taken[row.name]} already", "another designation is wanted")
    if row.cells["kind"] not in kinds():
        yield Fault(("kind",), f"unknown kind {row.cells['kind']!r}", nearest(row.cells["kind"], kinds()))
    values = {}
    for key in _SIZES:
        try:
            values[key] = number(key, row.cells[key])
        except Faults as found:
            yield from found.faults
    for key, value in values.items():
        if value <= 0:
            yield Fault((key,), f"{value:g} cannot stand here", "more than nothing is wanted")
    same = row.units.get("bore") == row.units.get("outside")
    if same and 0 < values.get("outside", 0) <= values.get("bore", 0):
        yield Fault(("outside",), f"{values['outside']:g} is not larger than the bore, {values['bore']:g}")
