"""Sizes that come to nothing: of the wrong kind, not finite, minus where there is no minus."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import Field
from typing import Any

import numpy as np

from linkcalc.faults import fault
from linkcalc.model import walk
from linkcalc.model.check_names import Known
from linkcalc.model.dimensions import reckon, reckon_tolerances
from linkcalc.model.formulas import to_si
from linkcalc.model.functions import Quantity
from linkcalc.model.gather import Gather
from linkcalc.model.mechanism import EFFORT_KIND, Mechanism, strength_kind
from linkcalc.model.temperature import TEMPERATURE
from linkcalc.model.tokens import names_in
from linkcalc.model.units import show
from linkcalc.parts.contract import Size

_WANTED = {"plus": "more than nothing", "not minus": "nothing or more", "part": "more than nothing, up to 1,"}


def check_sizes(mechanism: Mechanism, known: Known, gather: Gather) -> None:
    """Dimensions, their tolerances, and every size in the model."""
    broken = [name for name in known.dimensions if name not in mechanism.dimensions]
    dimensions = reckon(mechanism, {}, gather, broken)
    reckon_tolerances(mechanism, dimensions, gather)
    if gather.touches("units"):
        return
    effort = strength_kind(mechanism.effort) if mechanism.effort is not None else "force"
    for part in walk.everything(mechanism):
        along = getattr(part.part, "along", None)
        for item, entry, value in part.fields():
            for size, kind, sign in _sizes(entry, value, getattr(along, "kind", "")):
                with gather.at(*item):
                    _check(size, effort if kind == EFFORT_KIND else kind, sign, entry, mechanism, dimensions, known)


def _sizes(entry: Field[Any], value: Any, stepped: str) -> Iterator[tuple[Size, str, str]]:
    """The sizes in a field, each with its kind and the sign it may have."""
    meta = entry.metadata
    if meta["kind"] == "size" and value not in meta["words"]:
        yield value, meta["unit"] or stepped, meta["sign"]
    elif meta["kind"] == "sizes":
        for one in value:
            yield one, meta["unit"], meta["sign"]
    elif meta["kind"] == "named sizes":
        for one in value:
            yield one, meta["unit"], "plus"
    elif meta["kind"] == "places":
        for one in value if isinstance(value, tuple) else (value,):
            yield one, meta["unit"], "not minus" if isinstance(value, tuple) else "plus"
    elif meta["kind"] == "span":
        for one in value if isinstance(value, tuple) else (value,):
            yield one, meta["unit"], meta["sign"]
    elif meta["kind"] == "line" and not isinstance(value, tuple):
        yield value, "angle", "any"
    elif meta["kind"] == "arcs":
        for _, radius in value:
            yield radius, "length", "plus"
    elif meta["kind"] == "rows":
        for row in value:
            for one, kind in zip(row, meta["units"], strict=True):
                yield one, kind, "any"


def _check(
    size: Size,
    kind: str,
    sign: str,
    entry: Field[Any],
    mechanism: Mechanism,
    dimensions: dict[str, Quantity],
    known: Known,
) -> None:
    words = entry.metadata.get("words", ())
    if isinstance(size, str) and kind != TEMPERATURE:
        if words and size.replace(" ", "").isalpha() and size not in known.dimensions:
            wanted = ", ".join(f"{word!r}" for word in words)
            raise fault((), f"unknown word {size!r}", f"a size is wanted, or one of {wanted}")
        if any(name not in dimensions for name in names_in(size, known.dimensions)):
            return  # what is wrong with the dimension is told there
    value = to_si(size, kind, mechanism.units, dimensions)
    least = _WANTED.get(sign)
    low = np.any(np.less(value, 0)) or (sign != "not minus" and np.any(np.equal(value, 0)))
    if least and (low or (sign == "part" and np.any(np.greater(value, 1)))):
        raise fault((), f"{show(float(value), kind, mechanism.units)} cannot stand here", f"{least} is wanted")
