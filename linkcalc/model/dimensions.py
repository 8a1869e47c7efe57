"""Named sizes in SI: formulas reckoned in the order they need, and the tolerances they carry."""

from __future__ import annotations

from collections.abc import Collection, Mapping
from dataclasses import dataclass

import numpy as np

from linkcalc.faults import fault
from linkcalc.model import units as u
from linkcalc.model.formulas import evaluate as formula
from linkcalc.model.formulas import to_si
from linkcalc.model.functions import FUNCTIONS, Quantity
from linkcalc.model.gather import Gather
from linkcalc.model.mechanism import Dimension, Mechanism
from linkcalc.model.order import ordered
from linkcalc.model.tokens import names_in
from linkcalc.parts.contract import Size, Value
from linkcalc.words import nearest

Overrides = Mapping[str, Value]
"""Dimension name -> SI value in place of its own: a float, or copies as (1, variant, 1)."""


@dataclass(frozen=True)
class Tolerance:
    """How far a dimension may depart from its size.

    lower, upper  [SI] departures, lower is minus
    distribution  "normal" (the tolerance is 3 standard deviations), "uniform" or "triangular"
    kind          kind of the dimension: "length", "angle", ...
    """

    lower: float
    upper: float
    distribution: str
    kind: str


def evaluate(mechanism: Mechanism, overrides: Overrides | None = None) -> dict[str, Quantity]:
    """Every dimension: its value [SI], float or (1, variant, 1), and its exponents.

    Raises Faults: circles, unknown names, formulas that do not hold.
    """
    gather = Gather()
    found = reckon(mechanism, overrides or {}, gather)
    gather.raise_any()
    return found


def reckon(
    mechanism: Mechanism, overrides: Overrides, gather: Gather, broken: Collection[str] = ()
) -> dict[str, Quantity]:
    """The dimensions that can be reckoned; what is wrong with the others goes into `gather`.

    broken  names of dimensions that are left out because something was wrong with them already
    """
    names = [*mechanism.dimensions, *broken]
    for name in overrides:
        if name not in names:
            gather.add(("dimensions", name), f"unknown dimension {name!r}", nearest(name, names))
    needs: dict[str, tuple[str, ...]] = {}
    for name, dimension in mechanism.dimensions.items():
        with gather.at("dimensions", name):
            _check_name(name)
            needs[name] = names_in(dimension.size, names) if isinstance(dimension.size, str) else ()
    order, circles = ordered(needs)
    for circle in circles:
        gather.add(("dimensions", circle[0]), f"hangs on itself: {' -> '.join(circle)}", "give one of them a size")
    found: dict[str, Quantity] = {}
    for name in order:
        if all(need in found for need in needs[name]):
            with gather.at("dimensions", name):
                value = _sized(mechanism.dimensions[name].size, mechanism, found)
                found[name] = Quantity(_override(overrides[name]), value.dims) if name in overrides else value
    return found


def tolerances(mechanism: Mechanism) -> dict[str, Tolerance]:
    """The dimensions that carry a tolerance, for a tolerance study.

    Raises Faults: tolerances of another kind than the size, or with the limits crossed.
    """
    gather = Gather()
    found = reckon_tolerances(mechanism, reckon(mechanism, {}, gather), gather)
    gather.raise_any()
    return found


def reckon_tolerances(mechanism: Mechanism, sizes: Mapping[str, Quantity], gather: Gather) -> dict[str, Tolerance]:
    """The tolerances that can be reckoned; what is wrong with the others goes into `gather`."""
    found: dict[str, Tolerance] = {}
    for name, dimension in mechanism.dimensions.items():
        if dimension.tol is not None and name in sizes:
            with gather.at("dimensions", name, "tol"):
                found[name] = _tolerance(dimension, sizes[name].dims, mechanism, sizes)
    return found


def _check_name(name: str) -> None:
    if not name.isidentifier():
        raise fault((), f"{name!r} cannot stand in a formula", "a name of letters, digits and _ is wanted")
    if name in FUNCTIONS or name == "pi":
        raise fault((), f"{name!r} has a meaning in formulas already", "another name is wanted")


def _sized(size: Size, mechanism: Mechanism, names: Mapping[str, Quantity]) -> Quantity:
    """A bare number is a length in the file's unit."""
    if isinstance(size, str):
        return formula(size, names)
    return Quantity(to_si(size, "length", mechanism.units), u.KINDS["length"])


def _override(value: Value) -> Value:
    return float(value) if np.ndim(value) == 0 else np.asarray(value, float)


def _tolerance(dimension: Dimension, dims: u.Dims, mechanism: Mechanism, names: Mapping[str, Quantity]) -> Tolerance:
    kind = u.kind_of(dims)
    if not kind:
        raise fault((), f"the dimension is a {u.name(dims)}", "only sizes of a usual kind carry a tolerance")
    tol = dimension.tol if isinstance(dimension.tol, tuple) else (dimension.tol or 0,)
    limits = [float(to_si(t, kind, mechanism.units, names)) for t in tol]
    lower, upper = limits if len(limits) == 2 else (-limits[0], limits[0])
    if lower > upper:
        wanted = "plus and minus: 0.05, or the lower departure first: [-0.1, 0.05]"
        raise fault((), "the lower limit is above the upper one", wanted)
    return Tolerance(lower, upper, dimension.distribution, kind)
