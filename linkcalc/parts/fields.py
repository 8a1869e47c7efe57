"""Fields of a part: what the file may say there. Reader, writer, help and docs are made from these."""

from __future__ import annotations

from dataclasses import MISSING, Field, field, fields
from typing import Any


def _made(kind: str, text: str, default: Any, **more: Any) -> Any:
    meta = {"kind": kind, "text": text, **more}
    return field(metadata=meta) if default is MISSING else field(default=default, metadata=meta)


def name(of: str, text: str, default: Any = MISSING) -> Any:
    """The name of one item: of = "point", "member", "guide" (a slot, slide or track), "rope", "load", "pusher" (a
    load or the effort)."""
    return _made("name", text, default, of=of)


def names(of: str, text: str, default: Any = MISSING, least: int = 2, most: int | None = 2) -> Any:
    """Several names, kept as a tuple."""
    return _made("names", text, default, of=of, least=least, most=most)


Range = tuple[float, float]

USUAL_FRICTION: Range = (0.0, 0.6)
"""Coefficients of friction from oiled to dry steel on steel; more is met with rubber and clean soft metals only
(common practice)."""


def size(
    unit: str,
    text: str,
    default: Any = MISSING,
    *,
    sign: str = "any",
    words: tuple[str, ...] = (),
    sensible: Range | None = None,
) -> Any:
    """A size as written; unit = its kind ("length", "angle", ...); sign = "any", "plus", "not minus", or "part":
    more than nothing and no more than 1.

    words     words that may stand in its place ("drawn", "limit")
    sensible  from where to where it is usual; an answer warns of what is not
    """
    return _made("size", text, default, unit=unit, sign=sign, words=words, sensible=sensible)


def friction(text: str, default: Any = None) -> Any:
    """A coefficient of friction; text = what of."""
    return size("number", f"coefficient of friction {text}", default, sign="not minus", sensible=USUAL_FRICTION)


def sizes(unit: str, text: str, default: Any = MISSING, *, sign: str = "any") -> Any:
    """Two sizes of one kind, kept as a tuple."""
    return _made("sizes", text, default, unit=unit, sign=sign)


def named_sizes(unit: str, names: tuple[str, ...], text: str, default: Any = MISSING) -> Any:
    """As many sizes of one kind as there are names, kept as a tuple; all more than nothing."""
    return _made("named sizes", text, default, unit=unit, names=names)


def places(unit: str, text: str, default: Any = MISSING) -> Any:
    """A size (a spacing, a step), or a list of sizes of one kind, kept as a tuple; () for none."""
    return _made("places", text, default, unit=unit)


def span(unit: str, text: str, default: Any = MISSING, *, sign: str = "not minus") -> Any:
    """A size, or the least and the most that it may be, kept as a tuple of two."""
    return _made("span", text, default, unit=unit, sign=sign)


def part(family: str, text: str, default: Any = MISSING) -> Any:
    """A part of a family within another; a bare name is the kind of the family that has a short form."""
    return _made("part", text, default, family=family)


def line(text: str, default: Any = MISSING) -> Any:
    """A line: two points, or an angle from the x axis as drawn."""
    return _made("line", text, default)


def rows(units: tuple[str, str], text: str, default: Any = MISSING) -> Any:
    """Rows of two sizes, kept as a tuple of tuples; units = the kinds of both columns."""
    return _made("rows", text, default, units=units)


def formula(unit: str, of: str, text: str, default: Any = MISSING) -> Any:
    """A formula over one more size than the dimensions: `of` is its kind and its name; unit = kind of the result."""
    return _made("formula", text, default, unit=unit, of=of)


def choice(options: tuple[str, ...], text: str, default: Any = MISSING) -> Any:
    """One word out of a few."""
    return _made("choice", text, default, options=options)


def count(text: str, default: Any = MISSING, *, least: int = 1, most: int = 1_000_000) -> Any:
    """A whole number."""
    return _made("count", text, default, least=least, most=most)


def arcs(text: str, default: Any = MISSING) -> Any:
    """Pairs of [point, radius], kept as a tuple of tuples."""
    return _made("arcs", text, default)


def parts(family: str, text: str, wanted: str, default: Any = MISSING, *, least: int = 2) -> Any:
    """Parts of a family in order, kept as a tuple; a bare name is the kind of the family that has a short form.

    wanted  what a message says should stand there
    """
    return _made("parts", text, default, family=family, wanted=wanted, least=least)


def pairs(of: str, text: str, default: Any = MISSING) -> Any:
    """Pairs of names, kept as a tuple of tuples."""
    return _made("pairs", text, default, of=of)


def part_fields(part: Any) -> tuple[Field[Any], ...]:
    """The fields of a part's class (or of a part) that the file may give."""
    return tuple(f for f in fields(part) if "kind" in f.metadata)


def required(entry: Field[Any]) -> bool:
    return entry.default is MISSING and entry.default_factory is MISSING
