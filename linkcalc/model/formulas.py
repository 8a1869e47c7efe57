"""Formulas over named sizes: "3*link", "lean + 90 deg", "hypot(a, b)/2", "1 3/8 in".

Read and reckoned in one pass by a small descent over the operators, so that nothing but arithmetic can be reached
and nothing can run long. Every value carries its dimension. Floats and arrays of copies go through the same code.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from fractions import Fraction

import numpy as np

from linkcalc.faults import fault
from linkcalc.model import units as u
from linkcalc.model.functions import FUNCTIONS, Quantity, settled
from linkcalc.model.mechanism import Units
from linkcalc.model.temperature import TEMPERATURE, kelvin
from linkcalc.model.tokens import END, Token, tokens_of
from linkcalc.parts.contract import Size, Value
from linkcalc.words import nearest

_DEEPEST, _LARGEST_POWER = 40, 100
_REACH = 1e30  # [SI] beyond anything that is drawn; keeps squares and products finite
_BARE = re.compile(r"\s*[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?\s*")
_NOTHING: Mapping[str, Quantity] = {}


def evaluate(text: str, names: Mapping[str, Quantity] = _NOTHING) -> Quantity:
    """What a formula comes to.

    names  what its words stand for, SI; values float or (1, variant, 1)
    ->     value [SI], float or (1, variant, 1), and its dimension

    >>> evaluate("1/4 in + 2*t", {"t": Quantity(0.001, (1, 0, 0, 0))})
    Quantity(value=0.00835, dims=(1, 0, 0, 0))

    Raises Faults: not a formula, unknown word, dimensions that do not fit, no finite value.
    """
    return _Reader(text, names).whole()


def to_si(size: Size, kind: str, units: Units, names: Mapping[str, Quantity] = _NOTHING) -> Value:
    """A size as written -> SI: a bare number is in the file's unit of that kind, a text carries its own.

    >>> to_si(40, "length", Units()), to_si("1/4 in", "length", Units())
    (0.04, 0.00635)

    Raises Faults: wrong kind, unknown unit or name, not a formula, not finite.
    """
    if kind == TEMPERATURE:
        return kelvin(size, units)
    example = f"e.g. 12 {units.of(kind)}" if kind != "number" else "e.g. 0.5"
    if isinstance(size, str):
        found = evaluate(size, names)
        if found.dims != u.KINDS[kind]:
            example += f", or {size.strip()} without quotes" if found.dims == u.NUMBER and _BARE.fullmatch(size) else ""
            raise fault((), f"{size} is {u.a(found.dims)}", f"{u.a_kind(kind)} is wanted ({example})")
        if np.ndim(found.value) == 0 and abs(float(found.value)) > _REACH:
            raise fault((), f"{size} is beyond all measure", f"{u.a_kind(kind)} is wanted ({example})")
        return found.value
    if isinstance(size, bool) or not isinstance(size, (int, float)):
        raise fault((), f"{size!r} is no size", f"{u.a_kind(kind)} is wanted ({example})")
    if not -_REACH < size < _REACH:
        what = f"{size} is no number" if size != size or abs(size) == np.inf else "a number beyond all measure"
        raise fault((), what, f"{u.a_kind(kind)} is wanted ({example})")
    return float(size) * u.unit(units.of(kind)).factor


class _Reader:
    """One formula being read; each level of binding is one method."""

    def __init__(self, text: str, names: Mapping[str, Quantity]):
        self.text, self.names = text, names
        self.tokens = tokens_of(text, names)
        self.place = self.depth = 0

    def whole(self) -> Quantity:
        if len(self.tokens) == 1:
            raise fault((), "an empty text", "a number with a unit or a formula is wanted")
        with np.errstate(all="ignore"):
            found = self.sum()
        if self.next.kind != "end":
            self.stray()
        return found

    @property
    def next(self) -> Token:
        return self.tokens[self.place]

    def take(self, *signs: str) -> str:
        """The next sign if it is one of these, "" if not."""
        token = self.next
        if token.kind == "sign" and token.text in signs:
            self.place += 1
            return token.text
        return ""

    def stray(self) -> None:
        token = self.next
        what = f"{token.text!r} cannot stand there" if token.kind != "end" else "the formula is not finished"
        wanted = "write a decimal point, not a comma" if re.search(r"\d,\d", self.text) else ""
        before = self.tokens[self.place - 1] if self.place else END
        if before.kind == "value" and token.kind in ("name", "value"):
            wanted = f"put a sign between {before.text.strip()!r} and {token.text.strip()!r}"
        raise fault((), f"{what} in {self.text!r}", wanted)

    def sum(self) -> Quantity:
        self.depth += 1
        if self.depth > _DEEPEST:
            raise fault((), "brackets or signs stand too deep in one another", f"at most {_DEEPEST} deep")
        left = self.product()
        while sign := self.take("+", "-"):
            right = self.product()
            if left.dims != right.dims:
                verb = "added to" if sign == "+" else "taken from"
                what = f"{u.a(right.dims)} cannot be {verb} {u.a(left.dims)} in {self.text!r}"
                raise fault((), what, _same(left, right))
            left = settled(left.value + right.value if sign == "+" else left.value - right.value, left.dims, self.text)
        self.depth -= 1
        return left

    def product(self) -> Quantity:
        left = self.signed()
        while sign := self.take("*", "/"):
            right = self.signed()
            if sign == "*":
                left = settled(left.value * right.value, u.times(left.dims, right.dims), self.text)
                continue
            if np.ndim(right.value) == 0 and right.value == 0:
                raise fault((), f"division by zero in {self.text!r}")
            left = settled(left.value / right.value, u.times(left.dims, right.dims, -1), self.text)
        return left

    def signed(self) -> Quantity:
        minus = False
        while sign := self.take("+", "-"):
            minus ^= sign == "-"
        found = self.power()
        return Quantity(-found.value, found.dims) if minus else found

    def power(self) -> Quantity:
        base = self.atom()
        if not self.take("^"):
            return base
        self.depth += 1
        if self.depth > _DEEPEST:
            raise fault((), "brackets or signs stand too deep in one another", f"at most {_DEEPEST} deep")
        power = self.signed()
        self.depth -= 1
        if power.dims != u.NUMBER or (np.ndim(power.value) and base.dims != u.NUMBER):
            raise fault((), f"{u.a(power.dims)} cannot be a power in {self.text!r}", "a plain number is wanted")
        if np.any(np.abs(power.value) > _LARGEST_POWER):
            raise fault((), f"too large a power in {self.text!r}", f"powers go up to {_LARGEST_POWER}")
        dims = base.dims
        if dims != u.NUMBER:
            dims = u.raised(dims, Fraction(float(power.value)).limit_denominator(12))
        # a copy without a value has none as a power either, though numpy takes the power 0 of anything for 1
        lost = np.isnan(base.value) | np.isnan(power.value)
        return settled(np.where(lost, np.nan, np.power(base.value, power.value)), dims, self.text)

    def atom(self) -> Quantity:
        token = self.next
        if token.kind == "value":
            self.place += 1
            return settled(token.value.value, token.value.dims, self.text)
        if self.take("("):
            found = self.sum()
            if not self.take(")"):
                self.stray()
            return found
        if token.kind != "name":
            self.stray()
        self.place += 1
        if self.take("("):
            return self.call(token.text)
        if token.text in self.names:
            return self.names[token.text]
        if token.text == "pi":
            return Quantity(np.pi, u.NUMBER)
        raise fault((), f"unknown name {token.text!r} in {self.text!r}", self.meant(token.text))

    def meant(self, word: str) -> str:
        if u.known(word):
            return f"a unit follows a number: 1 {word}"
        if word in FUNCTIONS:
            return f"a function has brackets: {word}(...)"
        return nearest(word, self.names) if self.names else "the model has no dimensions"

    def call(self, word: str) -> Quantity:
        if word not in FUNCTIONS:
            raise fault((), f"unknown function {word!r} in {self.text!r}", nearest(word, FUNCTIONS))
        given = [self.sum()]
        while self.take(","):
            given.append(self.sum())
        if not self.take(")"):
            self.stray()
        return FUNCTIONS[word](word, given, self.text)


def _same(left: Quantity, right: Quantity) -> str:
    plain, other = (right, left) if right.dims == u.NUMBER else (left, right)
    kind = u.kind_of(other.dims)
    if plain.dims == u.NUMBER and kind:
        return f"a number needs its unit, e.g. 12 {Units().of(kind)}"
    return "both must be of one kind"
