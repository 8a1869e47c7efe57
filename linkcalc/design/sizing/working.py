"""The record of a calculation: what went in, each formula with its source and result, what is allowed, how far it is
used. A formula is kept as the text that was reckoned, so that a sheet shows what was done and nothing else.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from types import MappingProxyType

import numpy as np

from linkcalc.faults import fault
from linkcalc.model.formulas import evaluate
from linkcalc.model.functions import Quantity
from linkcalc.model.units import KINDS, Dims
from linkcalc.parts.contract import Value

DIMS: Mapping[str, Dims] = MappingProxyType({
    **KINDS, "area": (2, 0, 0, 0), "section modulus": (3, 0, 0, 0), "second moment": (4, 0, 0, 0),
    "speed": (1, 0, -1, 0), "pressure speed": (0, 1, -3, 0), "rate": (0, 0, -1, 0),
    "pressure rise": (-1, 1, -2, 0), "compliance": (1, -1, 2, 0), "time": (0, 0, 1, 0),
})  # fmt: skip
"""Kind of a quantity -> exponents of length, mass, time, angle."""


@dataclass(frozen=True, eq=False)
class Entry:
    """A quantity of a working.

    symbol   what formulas call it
    text     what it is
    value    [SI] float, or an array of any shape (cases, poses)
    dims     exponents of length, mass, time, angle
    formula  the formula it comes from; "" for what was given
    how      where it comes from, if neither given nor by a formula ("largest along the pin")
    source   who says so
    """

    symbol: str
    text: str
    value: Value
    dims: Dims
    formula: str = ""
    how: str = ""
    source: str = ""


@dataclass(frozen=True, eq=False)
class Check:
    """A quantity against what is allowed.

    name         what is checked: "shear of the pin"
    symbol       the quantity
    limit        the quantity it is held against
    at_least     True if the quantity must reach the limit, False if it must not pass it
    utilisation  [-] used part of what is allowed, 1 at the limit; float or array
    """

    name: str
    symbol: str
    limit: str
    at_least: bool
    utilisation: Value


@dataclass(frozen=True, eq=False)
class Working:
    """A calculation that somebody else can check by hand.

    title     what was reckoned: "pin"
    entries   what was given and what was reckoned, in order
    checks    against what is allowed
    notes     what was assumed
    cautions  what can hurt, and what this does not cover
    """

    title: str
    entries: tuple[Entry, ...]
    checks: tuple[Check, ...] = ()
    notes: tuple[str, ...] = ()
    cautions: tuple[str, ...] = ()

    @property
    def inputs(self) -> tuple[Entry, ...]:
        """What was given."""
        return tuple(e for e in self.entries if not e.formula and not e.how)

    @property
    def steps(self) -> tuple[Entry, ...]:
        """What was reckoned."""
        return tuple(e for e in self.entries if e.formula or e.how)

    def entry(self, symbol: str) -> Entry:
        """The quantity of that symbol. Raises KeyError."""
        for e in self.entries:
            if e.symbol == symbol:
                return e
        raise KeyError(symbol)

    def __getitem__(self, symbol: str) -> Value:
        """[SI] value of the quantity of that symbol."""
        return self.entry(symbol).value

    @property
    def utilisation(self) -> Value:
        """[-] that of the check that governs, entry by entry for arrays; 0.0 if nothing is checked."""
        worst: Value = 0.0
        for check in self.checks:
            worst = np.maximum(worst, check.utilisation)
        return float(worst) if np.ndim(worst) == 0 else worst

    @property
    def governs(self) -> str:
        """Name of the check that comes nearest to its limit (for arrays: in its worst entry); "" without checks."""
        return max(self.checks, key=lambda c: float(np.max(c.utilisation))).name if self.checks else ""

    @property
    def passes(self) -> bool:
        """True if nothing passes its limit in any entry."""
        return bool(np.all(np.less_equal(self.utilisation, 1 + _ROUNDING)))


_ROUNDING = 1e-9  # a size that is found by trying meets its limit to about this


@dataclass(frozen=True, eq=False)
class Choice:
    """A size that was looked for.

    required  [m] the smallest that would do, of any size; None where sizes are taken from a list only
    chosen    what it is called: "16 mm", a designation; "" if none passes
    working   that of the chosen one; of the largest tried if none passes
    smaller   what the next smaller is called, "" if there is none
    why       why the next smaller does not do, or why none does
    series    whose sizes it was chosen from, "" for a list
    """

    required: float | None
    chosen: str
    working: Working
    smaller: str = ""
    why: str = ""
    series: str = ""


@dataclass
class Sheet:
    """A working while it is being written."""

    title: str
    _entries: list[Entry] = field(default_factory=list)
    _checks: list[Check] = field(default_factory=list)
    _notes: list[str] = field(default_factory=list)
    _cautions: list[str] = field(default_factory=list)
    _names: dict[str, Quantity] = field(default_factory=dict)

    def __contains__(self, symbol: object) -> bool:
        return symbol in self._names

    def __getitem__(self, symbol: str) -> Value:
        return self._names[symbol].value

    def given(self, symbol: str, value: Value, kind: str, text: str, source: str = "") -> None:
        """What goes in [SI]."""
        self._add(Entry(symbol, text, value, DIMS[kind], source=source))

    def positive(self, symbol: str, value: Value, kind: str, text: str, source: str = "") -> None:
        """What goes in and must be more than nothing. Raises Faults."""
        must_be_positive(text, value)
        self.given(symbol, value, kind, text, source)

    def found(self, symbol: str, value: Value, kind: str, text: str, how: str, source: str = "") -> None:
        """What was found otherwise than by a formula [SI]."""
        self._add(Entry(symbol, text, value, DIMS[kind], how=how, source=source))

    def step(self, symbol: str, formula: str, text: str, source: str = "") -> Value:
        """Reckon a formula over what stands above; its result [SI]. Raises Faults: it has no finite value."""
        value, dims = evaluate(formula, self._names)
        self._add(Entry(symbol, text, value, dims, formula=formula, source=source))
        return value

    def take(self, part: Working) -> None:
        """What another sheet has reckoned; its checks, notes and cautions are left."""
        for entry in part.entries:
            self._add(entry)

    def at_most(self, name: str, symbol: str, limit: str) -> None:
        """Hold the size of a quantity against what it must not pass."""
        used = np.abs(self._names[symbol].value) / self._names[limit].value
        self._checks.append(Check(name, symbol, limit, False, used if np.ndim(used) else float(used)))

    def at_least(self, name: str, symbol: str, limit: str) -> None:
        """Hold a quantity against what it must reach."""
        used = self._names[limit].value / self._names[symbol].value
        self._checks.append(Check(name, symbol, limit, True, used if np.ndim(used) else float(used)))

    def note(self, text: str) -> None:
        self._notes.append(text)

    def caution(self, text: str) -> None:
        self._cautions.append(text)

    def working(self) -> Working:
        """What was written so far."""
        parts = (self._entries, self._checks, self._notes, self._cautions)
        return Working(self.title, *(tuple(p) for p in parts))  # type: ignore[arg-type]

    def _add(self, entry: Entry) -> None:
        if entry.symbol in self._names:
            raise RuntimeError(f"{entry.symbol!r} is taken twice in {self.title!r}")
        self._entries.append(entry)
        self._names[entry.symbol] = Quantity(entry.value, entry.dims)


def must_be_positive(what: str, value: Value) -> None:
    """Raises Faults: not more than nothing, or not finite."""
    if not np.all(np.isfinite(value) & np.greater(value, 0)):
        shown = f"{float(value):g}" if np.ndim(value) == 0 else "one of them"
        raise fault((), f"{what}: {shown} cannot stand here", "more than nothing is wanted")
