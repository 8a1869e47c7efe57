"""What plain bushes are made of and bear: the table of the package, or a list of the user's own in its place."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from linkcalc import data
from linkcalc.design.sizing.lists import number, open_rows
from linkcalc.faults import Fault, Faults, fault
from linkcalc.words import nearest

Limit = tuple[float, float]
_MPA = 1e6
_KEYS = ("static", "p", "v", "pv", "temperature")


@dataclass(frozen=True)
class BushMaterial:
    """A material; each limit as a range (low, high), equal if it is one figure; None if there is none.

    static       [Pa] pressure on the projected area at rest
    p            [Pa] the same, turning
    v            [m/s] rubbing speed
    pv           [W/m2] their product
    temperature  [degC]
    source       who says so
    """

    name: str
    static: Limit | None = None
    p: Limit | None = None
    v: Limit | None = None
    pv: Limit | None = None
    temperature: float | None = None
    source: str = "given"

    def limits(self, *, moving: bool) -> Iterator[tuple[str, str, str, Limit]]:
        """Symbol, kind, name and range of each limit that counts: moving, or at rest."""
        pressure = self.p if moving else self.static or self.p
        if pressure:
            yield "p", "stress", "pressure", pressure
        if moving and self.v:
            yield "v", "speed", "rubbing speed", self.v
        if moving and self.pv:
            yield "pv", "pressure speed", "pressure times speed", self.pv


def bush_materials(path: str | Path | None = None) -> dict[str, BushMaterial]:
    """Materials by name: the table of the package, or the user's own list in its place.

    path  a TOML file like the package's (a table for each, with the keys static, p, v, pv, temperature, source), or a
          CSV file with the columns name, static, p, v, pv, temperature, source; in MPa, m/s, MPa m/s, degC; a range as
          [10, 14] or 10-14

    Raises Faults: every row that cannot be read, with its number and the reason.
    """
    if path is None:
        return {name: _material((name,), name, row) for name, row in data.table("bush_materials.toml").items()}
    found, faults = dict[str, BushMaterial](), list[Fault]()
    for row in open_rows(path, "name", ("static", "p", "v", "pv", "temperature", "source", "text")):
        try:
            if row.name in found:
                raise fault((), f"{row.name!r} stands there twice", "another name is wanted")
            found[row.name] = _material((), row.name, row.cells)
        except Faults as wrong:
            faults += [row.located(one) for one in wrong.faults]
    if faults:
        raise Faults(faults)
    return found


def bush_material(name: str, among: Mapping[str, BushMaterial] | None = None) -> BushMaterial:
    """A material by its name. Raises Faults: unknown name (nearest ones told)."""
    known = bush_materials() if among is None else among
    if name not in known:
        raise fault((), f"unknown bush material {name!r}", nearest(name, known))
    return known[name]


def _material(item: tuple[str, ...], name: str, row: Mapping[str, Any]) -> BushMaterial:
    limits = {key: _range((*item, key), row[key]) for key in _KEYS if row.get(key) not in (None, "")}
    if not limits.keys() & {"static", "p", "v", "pv"}:
        raise fault(item, "it bears nothing", "one of static, p, v, pv is wanted")
    heat = limits.pop("temperature", None)
    for key in ("static", "p", "pv"):
        if key in limits:
            limits[key] = (limits[key][0] * _MPA, limits[key][1] * _MPA)
    return BushMaterial(name, **limits, temperature=heat[0] if heat else None, source=str(row.get("source") or "given"))


def _range(item: tuple[str, ...], raw: Any) -> Limit:
    """A figure, or the two ends of a range."""
    if isinstance(raw, str) and "-" in raw[1:]:
        first, _, last = raw[1:].partition("-")
        raw = [raw[0] + first, last]
    ends = raw if isinstance(raw, (list, tuple)) else [raw, raw]
    low, high = (number(item, one) for one in ends) if len(ends) == 2 else (0.0, 0.0)
    if not 0 < low <= high:
        raise fault(item, f"{raw!r} is no range", "a figure, or two rising ones, is wanted")
    return low, high
