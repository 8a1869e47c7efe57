"""Loads and places as a person writes them: "0..25 kg step 0.5", "5, 10, 15 kg", "main=120 mm"."""

from __future__ import annotations

import re

import numpy as np

from linkcalc.faults import Faults, fault
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import drawn
from linkcalc.parts.pose import Array
from linkcalc.words import nearest

_RANGE = re.compile(r"(?P<low>.+?)\.\.(?P<high>.+?)(?:\bstep\b(?P<step>.+))?")
_BARE = re.compile(r"[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?")
_UNIT = re.compile(r"\d\s*([A-Za-z_]+)\s*$")
_ROWS, _MOST = 10, 5000
_EDGE = 1e-9
_WANTED = 'loads are written as "0..25 kg step 0.5 kg", or as "5, 10, 20 kg"'


def loads_of(text: str, mechanism: Mechanism) -> Array:
    """(n) [kg] the loads that a text says; a unit at the end goes for the numbers before it. Raises Faults."""
    found = _RANGE.fullmatch(text.strip())
    if found is None:
        parts = [p.strip() for p in text.split(",") if p.strip()]
        if not parts:
            raise fault((), "no load is asked for: the table would be empty", _WANTED)
        unit = _unit(parts[-1])
        return np.array([_mass(p, unit, mechanism) for p in parts])
    unit = _unit(found["high"]) or _unit(found["step"] or "")
    low, high = _mass(found["low"], unit, mechanism), _mass(found["high"], unit, mechanism)
    step = (high - low) / _ROWS if found["step"] is None else _mass(found["step"], unit, mechanism)
    if not step > 0 or not high > low:
        raise fault((), f"{text!r} is empty: it goes up from the first load by the step to the second", _WANTED)
    count = int((high - low) / step * (1 + _EDGE) + _EDGE) + 1
    if count > _MOST:
        raise fault((), f"{text!r} comes to {count} loads", f"up to {_MOST} are wanted")
    return np.asarray(low + step * np.arange(count), np.float64)


def place_of(text: str, mechanism: Mechanism) -> tuple[str, float]:
    """Poise and place [m], or counterpoise and mass on it [kg]: "main=120 mm". Raises Faults."""
    name, sign, size = (part.strip() for part in text.partition("="))
    known = [*mechanism.poises, *mechanism.counterpoises]
    if not sign or not size:
        raise fault((), f"{text!r} is no place", 'NAME=PLACE is wanted, e.g. "main=120 mm"')
    if name not in known:
        raise fault((), f"unknown poise {name!r}", nearest(name, known))
    kind = "length" if name in mechanism.poises else "mass"
    return name, _size(size, kind, mechanism)


def mass_of(text: str, mechanism: Mechanism) -> float:
    """[kg] Raises Faults."""
    return _size(text, "mass", mechanism)


def length_of(text: str, mechanism: Mechanism) -> float:
    """[m] Raises Faults."""
    return _size(text, "length", mechanism)


def angle_of(text: str, mechanism: Mechanism) -> float:
    """[rad] "1 deg", or a rise over a length: "2 mm/m". Raises Faults."""
    rise, over, length = text.partition("/")
    if over:
        each = length.strip() if length.strip()[:1].isdigit() else f"1 {length.strip()}"
        return float(np.arctan(_size(rise, "length", mechanism) / _size(each, "length", mechanism)))
    return _size(text, "angle", mechanism)


def _unit(text: str) -> str:
    found = _UNIT.search(text.strip())
    return found[1] if found else ""


def _mass(text: str, unit: str, mechanism: Mechanism) -> float:
    text = text.strip()
    try:
        return _size(f"{text} {unit}" if unit and _BARE.fullmatch(text) else text, "mass", mechanism)
    except Faults as found:
        raise fault((), f"{text!r}: {found.faults[0].what}", _WANTED) from None


def _size(text: str, kind: str, mechanism: Mechanism) -> float:
    text = text.strip()
    size: float | str = float(text) if _BARE.fullmatch(text) else text
    return float(np.ravel(drawn(mechanism).value(size, kind))[0])
