"""Units: unit text <-> SI factor and dimension; what is shown to people.

The truth is the pint library. Importing it takes longer than a whole stroke, so the usual unit words are kept in
``units.json`` beside this file and pint is asked only for others. ``python -m linkcalc.model.units`` makes the
table anew. An angle is a dimension of its own here: a length cannot be taken for an angle, nor a number for one.
"""

from __future__ import annotations

import json
import math
import re
from collections.abc import Container
from fractions import Fraction
from functools import cache
from pathlib import Path
from typing import Any, NamedTuple

from linkcalc.faults import fault
from linkcalc.model.mechanism import Units
from linkcalc.parts.contract import Value
from linkcalc.words import nearest

Power = int | Fraction
Dims = tuple[Power, Power, Power, Power]
"""Exponents of length, mass, time, angle."""

NUMBER: Dims = (0, 0, 0, 0)
ANGLE: Dims = (0, 0, 0, 1)
KINDS: dict[str, Dims] = {
    "number": NUMBER,
    "length": (1, 0, 0, 0),
    "angle": ANGLE,
    "force": (1, 1, -2, 0),
    "mass": (0, 1, 0, 0),
    "moment": (2, 1, -2, 0),
    "stress": (-1, 1, -2, 0),
    "stiffness": (0, 1, -2, 0),
    "line load": (0, 1, -2, 0),
    "acceleration": (1, 0, -2, 0),
    "torsion stiffness": (2, 1, -2, -1),
    "pressure": (-1, 1, -2, 0),
    "volume": (3, 0, 0, 0),
    "area": (2, 0, 0, 0),
    "second moment": (4, 0, 0, 0),
    "section modulus": (3, 0, 0, 0),
}
_TABLE = Path(__file__).with_name("units.json")
_WORD = re.compile(r"[A-Za-z_]+")
_FACTOR = re.compile(r"\s*([A-Za-z_]+)(?:\s*\^\s*(-?\d+)|(\d+))?")
_TIMES = re.compile(r"\s*([*/.-])\s*|\s+")
_FOLDS = str.maketrans({
    "·": "*", "⋅": "*", "×": "*", "•": "*", "²": "^2", "³": "^3", "°": " deg ", "µ": "u", "μ": "u", "−": "-",
    '"': " in ", "″": " in ", "'": " ft ", "′": " ft ",
})  # fmt: skip


class Unit(NamedTuple):
    """factor: how much of SI one of it is; dims: exponents of length, mass, time, angle."""

    factor: float
    dims: Dims


def fold(text: str) -> str:
    """The one spelling of signs: degree, inch and product signs, raised figures.

    >>> fold("9.81 m/s²"), fold("2·link").strip()
    ('9.81 m/s^2', '2*link')
    """
    return text.translate(_FOLDS).replace("**", "^")


def unit(text: str, kind: str = "") -> Unit:
    """A unit as written: "mm", "N*m", "Nm", "in-lbf", "kg m/s^2"; kind, if given, must be its kind.

    >>> unit("N/mm")
    Unit(factor=1000.0, dims=(0, 1, -2, 0))

    Raises Faults: unknown word, not a unit, wrong kind.
    """
    found = _parse(text, kind or "length")
    if kind and found.dims != KINDS[kind]:
        raise fault((), f"{text!r} is a unit of {name(found.dims)}", f"a unit of {kind} is wanted, {_examples(kind)}")
    return found


@cache
def _parse(text: str, kind: str) -> Unit:
    folded = fold(text).strip()
    factor, dims, place, divide = 1.0, NUMBER, 0, False
    if not folded:
        return Unit(1.0, NUMBER)
    while place < len(folded):
        match = _FACTOR.match(folded, place)
        if not match:
            raise fault((), f"{text!r} is not a unit", "a unit is wanted, e.g. mm, N*m or m/s^2")
        base = known(match[1])
        if base is None:
            raise fault((), f"unknown unit {match[1]!r}", hint(match[1], kind))
        power = int(match[2] or match[3] or 1) * (-1 if divide else 1)
        if abs(power) > 9:
            raise fault((), f"{text!r} is not a unit", "powers go up to 9")
        factor *= base.factor**power
        dims = times(dims, raised(base.dims, power))
        place = match.end()
        op = _TIMES.match(folded, place)
        if place < len(folded) and not op:
            raise fault((), f"{text!r} is not a unit", "a unit is wanted, e.g. mm, N*m or m/s^2")
        if op:
            place, divide = op.end(), op[1] == "/"
    if op:
        raise fault((), f"{text!r} is not a unit", "a unit is wanted, e.g. mm, N*m or m/s^2")
    return Unit(factor, dims)


def known(word: str, taken: Container[str] = ()) -> Unit | None:
    """One unit word; None if nobody knows it, or if it is no unit of mechanics (a temperature).

    taken  words that have another meaning here, so that only a usual unit may still be meant
    """
    quick = _quick().get(word)
    return quick if quick or word in taken or len(word) > 40 else _asked(word)


def hint(word: str, kind: str = "length") -> str:
    """The nearest known unit words for a misspelt one."""
    close = nearest(word, _quick())
    return close if close.startswith("did") else _examples(kind)


def times(a: Dims, b: Dims, sign: int = 1) -> Dims:
    """Dimension of a product; of a quotient with sign -1."""
    return a[0] + sign * b[0], a[1] + sign * b[1], a[2] + sign * b[2], a[3] + sign * b[3]


def raised(a: Dims, power: Power) -> Dims:
    """Dimension of a power."""
    return _whole(a[0] * power), _whole(a[1] * power), _whole(a[2] * power), _whole(a[3] * power)


def kind_of(dims: Dims) -> str:
    """The kind with these exponents, "" if it has no name."""
    return next((kind for kind, other in KINDS.items() if other == dims), "")


def name(dims: Dims) -> str:
    """A dimension in words: "length", "plain number", "length^2 mass"."""
    kind = kind_of(dims)
    if kind:
        return "plain number" if kind == "number" else kind
    axes = zip(("length", "mass", "time", "angle"), dims, strict=True)
    return " ".join(axis if power == 1 else f"{axis}^{power}" for axis, power in axes if power)


def a(dims: Dims) -> str:
    """With its article: "a length", "an angle"."""
    text = name(dims)
    return f"an {text}" if text[0] in "aeiou" else f"a {text}"


def a_kind(kind: str) -> str:
    """A kind of size with its article: "a length"; stress and pressure keep their own names."""
    text = "plain number" if kind == "number" else kind
    return f"an {text}" if text[0] in "aeiou" else f"a {text}"


def from_si(value: Value, kind: str, units: Units) -> Value:
    """[SI] -> the unit of that kind in the file."""
    return value / unit(units.of(kind)).factor


def show(value: float, kind: str, units: Units, digits: int = 4) -> str:
    """A number for people, in the file's unit, rounded to so many digits but never in powers of ten.

    >>> show(0.0123456, "length", Units()), show(-1234.5678, "force", Units(force="kN"))
    ('12.35 mm', '-1.235 kN')
    """
    number = float(from_si(value, kind, units))
    if not math.isfinite(number):
        return "no value"
    places = max(0, digits - 1 - math.floor(math.log10(abs(number)))) if number else 0
    text = f"{number:.{min(places, 12)}f}"
    text = text.rstrip("0").rstrip(".") if "." in text else text
    return f"{'0' if text == '-0' else text} {units.of(kind).replace('*', ' ')}".strip()


def _examples(kind: str) -> str:
    words = [word for word, known in _quick().items() if known.dims == KINDS[kind]][:3]
    return "e.g. " + (", ".join(words) or Units().of(kind))


@cache
def _quick() -> dict[str, Unit]:
    rows = json.loads(_TABLE.read_text(encoding="utf-8"))
    return {word: Unit(factor, tuple(dims)) for word, (factor, dims) in rows.items()}


@cache
def _asked(word: str) -> Unit | None:
    """What pint says of one word. Only words go to it, never an expression."""
    import pint

    registry = _registry()
    try:
        factor, base = registry.get_base_units(word)
    except (pint.PintError, AttributeError, TypeError, ValueError):
        return None
    powers = {str(axis): power for axis, power in base._units.items()}  # the only place pint keeps a radian
    axes = ("meter", "kilogram", "second", "radian")
    if not powers.keys() <= set(axes):
        return None
    length, mass, time, angle = (_whole(powers.get(axis, 0)) for axis in axes)
    return Unit(float(factor), (length, mass, time, angle))


def _whole(power: Any) -> Power:
    exact = Fraction(power).limit_denominator(12)
    return int(exact) if exact.denominator == 1 else exact


@cache
def _registry() -> Any:
    import pint

    return pint.UnitRegistry(non_int_type=Fraction)


# words of the trade that pint does not know or takes for something else, and what they are
_ALIASES = {
    "Nm": "N*m", "Nmm": "N*mm", "kNm": "kN*m", "daNm": "daN*m", "kp": "kgf", "lbm": "lb", "rev": "turn", "tf": "t*g_0",
    "gn": "g_0", "inlbf": "in*lbf", "ftlbf": "ft*lbf",
}  # fmt: skip
_USUAL = """mm cm m km um in inch inches ft foot feet yd thou deg degree degrees rad mrad turn gon arcmin
N kN MN mN daN kgf gf lbf ozf kip kg g mg t tonne lb lbs oz slug Pa kPa MPa GPa hPa bar mbar psi ksi s ms min J g_0"""


def table() -> dict[str, tuple[float, Dims]]:
    """The table of usual words as pint gives it."""
    rows = {word: _asked(word) for word in _USUAL.split()}
    rows |= {word: _product(text) for word, text in _ALIASES.items()}
    return {word: (row.factor, row.dims) for word, row in rows.items() if row}


def _product(text: str) -> Unit:
    """An alias, multiplied out exactly before it becomes a float."""
    factor, dims = Fraction(1), NUMBER
    for word in text.split("*"):
        factor *= Fraction(_registry().get_base_units(word)[0])
        base = _asked(word)
        dims = times(dims, base.dims if base else NUMBER)
    return Unit(float(factor), dims)


if __name__ == "__main__":
    lines = (f"  {json.dumps(word)}: {json.dumps(row)}" for word, row in table().items())
    _TABLE.write_text("{\n" + ",\n".join(lines) + "\n}\n", encoding="utf-8")
