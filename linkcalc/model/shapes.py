"""What may stand at one key of a model file: a name, a size, a line, ... Each shape is read by one function, which
gives the value as the parts keep it or raises what is wrong with it."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Any

from linkcalc.faults import fault
from linkcalc.model.units import unit
from linkcalc.words import nearest

Meta = Mapping[str, Any]
_SIZE = 'a number, a quantity ("12 mm") or a formula is wanted'


def shown(raw: Any) -> str:
    """A value of the wrong kind, as a message tells it."""
    if isinstance(raw, bool):
        return "true" if raw else "false"
    if isinstance(raw, (Mapping, list, tuple)):
        return "a table" if isinstance(raw, Mapping) else "a list"
    text = repr(raw) if isinstance(raw, (str, float)) or (isinstance(raw, int) and abs(raw) < 1e30) else "this"
    return text if len(text) < 50 else text[:46] + "...'"


def _name(raw: Any, meta: Meta) -> str:
    if not isinstance(raw, str):
        raise fault((), f"{shown(raw)} is no name", f"the name of a {meta['of']} is wanted")
    return raw


def _names(raw: Any, meta: Meta) -> tuple[str, ...]:
    least, most = meta["least"], meta["most"]
    wanted = f"{_count(least)} names are wanted, e.g. {_example(max(least, 2))}"
    if least != most:
        wanted = f"a list of names is wanted, e.g. {_example(max(least, 2))}"
    if not isinstance(raw, (list, tuple)) or not all(isinstance(n, str) for n in raw):
        raise fault(
            (), f"{shown(raw)} {'holds more than names' if isinstance(raw, (list, tuple)) else 'is no list'}", wanted
        )
    if len(raw) < least or (most is not None and len(raw) > most):
        raise fault((), f"a list of {len(raw)}", wanted)
    return tuple(raw)


def size(raw: Any) -> Any:
    """A size as written, whatever it comes to. Raises Faults."""
    if isinstance(raw, bool) or not isinstance(raw, (int, float, str)):
        raise fault((), f"{shown(raw)} is no size", _SIZE)
    return raw


def _size(raw: Any, meta: Meta) -> Any:  # noqa: ARG001
    return size(raw)


def _sizes(raw: Any, meta: Meta) -> tuple[Any, Any]:
    if not isinstance(raw, (list, tuple)) or len(raw) != 2:
        what = f"a list of {len(raw)}" if isinstance(raw, (list, tuple)) else f"{shown(raw)} is no list"
        raise fault((), what, f"two sizes are wanted, each a {meta['unit']}: [20, 30]")
    return size(raw[0]), size(raw[1])


def _named_sizes(raw: Any, meta: Meta) -> tuple[Any, ...]:
    names = meta["names"]
    wanted = f"[{', '.join(names)}] is wanted"
    if not isinstance(raw, (list, tuple)) or len(raw) != len(names):
        what = f"a list of {len(raw)}" if isinstance(raw, (list, tuple)) else f"{shown(raw)} is no list"
        raise fault((), what, wanted)
    return tuple(size(one) for one in raw)


def _places(raw: Any, meta: Meta) -> Any:
    if not isinstance(raw, (list, tuple)):
        return size(raw)
    if not raw:
        raise fault((), "an empty list", f"a {meta['unit']} is wanted, or a list of some: [20, 30]")
    return tuple(size(one) for one in raw)


def _span(raw: Any, meta: Meta) -> Any:
    if not isinstance(raw, (list, tuple)):
        return size(raw)
    if len(raw) != 2:
        raise fault((), f"a list of {len(raw)}", f"a {meta['unit']}, or its least and its most are wanted: [20, 30]")
    return size(raw[0]), size(raw[1])


def _line(raw: Any, meta: Meta) -> Any:  # noqa: ARG001
    if not isinstance(raw, (list, tuple)):
        return size(raw)
    if len(raw) != 2 or not all(isinstance(n, str) for n in raw):
        raise fault((), "no line", 'two points are wanted, e.g. ["A", "B"], or an angle')
    return tuple(raw)


def _choice(raw: Any, meta: Meta) -> str:
    if raw not in meta["options"]:
        raise fault((), f"{shown(raw)} is not known here", "one of " + ", ".join(map(repr, meta["options"])))
    return str(raw)


def _whole(raw: Any, meta: Meta) -> int:
    least, most = meta["least"], meta["most"]
    if isinstance(raw, bool) or not isinstance(raw, int) or not least <= raw <= most:
        raise fault((), f"{shown(raw)} cannot stand here", f"a whole number from {least} to {most} is wanted")
    return raw


def _arcs(raw: Any, meta: Meta) -> tuple[tuple[str, Any], ...]:  # noqa: ARG001
    pairs = _twos(raw, '[["A", 40], ["B", 50]]')
    if not all(isinstance(centre, str) for centre, _ in pairs):
        raise fault((), "an arc without a centre", 'two arcs are wanted: [["A", 40], ["B", 50]]')
    return tuple((centre, size(radius)) for centre, radius in pairs)


def _rows(raw: Any, meta: Meta) -> tuple[tuple[Any, Any], ...]:
    example = f"rows of {' and '.join(meta['units'])} are wanted, e.g. [[10, 200], [20, 350]]"
    if not isinstance(raw, (list, tuple)) or not all(isinstance(row, (list, tuple)) and len(row) == 2 for row in raw):
        raise fault(
            (),
            f"{shown(raw)} of another form" if isinstance(raw, (list, tuple)) else f"{shown(raw)} is no list",
            example,
        )
    if len(raw) < 2:
        raise fault((), f"a table of {len(raw)} row{'s' * (len(raw) != 1)}", f"two or more {example}")
    return tuple((size(row[0]), size(row[1])) for row in raw)


def _formula(raw: Any, meta: Meta) -> str:
    if not isinstance(raw, str):
        raise fault((), f"{shown(raw)} is no formula", f"a formula over {meta['of']!r} in quotes is wanted")
    return raw


def _pairs(raw: Any, meta: Meta) -> tuple[tuple[str, str], ...]:
    pairs = _twos(raw, '[["A", "B"], ["C", "D"]]')
    return tuple((_name(a, meta), _name(b, meta)) for a, b in pairs)


def _twos(raw: Any, example: str) -> list[tuple[Any, Any]]:
    if not isinstance(raw, (list, tuple)) or [len(r) if isinstance(r, (list, tuple)) else 0 for r in raw] != [2, 2]:
        raise fault((), f"{shown(raw)} of another form", f"two pairs are wanted: {example}")
    return [(one[0], one[1]) for one in raw]


def _unit(raw: Any, meta: Meta) -> str:
    if not isinstance(raw, str):
        raise fault((), f"{shown(raw)} is no unit", 'a unit is wanted, e.g. "mm"')
    unit(raw, meta["unit"])
    return raw


def _tol(raw: Any, meta: Meta) -> Any:  # noqa: ARG001
    if not isinstance(raw, (list, tuple)):
        return size(raw)
    if len(raw) != 2:
        raise fault((), f"a list of {len(raw)}", "plus and minus: 0.05, or lower and upper: [-0.1, 0.05]")
    return size(raw[0]), size(raw[1])


def _factor(raw: Any, meta: Meta) -> float:  # noqa: ARG001
    if isinstance(raw, bool) or not isinstance(raw, (int, float)) or not abs(raw) < 1e30:
        raise fault((), f"{shown(raw)} is no factor", "a number is wanted, e.g. 1.5")
    return float(raw)


def _factors(raw: Any, meta: Meta) -> dict[str, float]:
    if not isinstance(raw, Mapping):
        raise fault((), f"{shown(raw)} is no table", "factors by name are wanted, e.g. { load = 1.5 }")
    return {name: _factor(value, meta) for name, value in raw.items()}


def _text(raw: Any, meta: Meta) -> str:  # noqa: ARG001
    if not isinstance(raw, str):
        raise fault((), f"{shown(raw)} is no text", "a text in quotes is wanted")
    return raw


def _count(number: int) -> str:
    return {1: "one", 2: "two", 3: "three"}.get(number, str(number))


def _example(number: int) -> str:
    return "[" + ", ".join(f'"{letter}"' for letter in "ABCD"[:number]) + "]"


SHAPES: dict[str, Callable[[Any, Meta], Any]] = {
    "name": _name, "names": _names, "size": _size, "sizes": _sizes, "named sizes": _named_sizes, "span": _span,
    "own size": _size, "line": _line, "places": _places, "choice": _choice,
    "count": _whole, "arcs": _arcs, "pairs": _pairs, "unit": _unit, "tol": _tol, "factor": _factor,
    "factors": _factors, "text": _text, "rows": _rows, "formula": _formula,
}  # fmt: skip


def unknown_key(key: str, known: list[str]) -> tuple[str, str]:
    """What to say of a key that is not listed."""
    return f"unknown key {key!r}", nearest(key, known)
