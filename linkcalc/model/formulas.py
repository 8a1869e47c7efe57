"""Formulas over named sizes: "3*link", "lean + 90 deg", "hypot(a, b)/2", "1 3/8 in".

Read and reckoned in one pass by a small descent over the operators, so that nothing but arithmetic can be reached
and nothing can run long. Every value carries its dimension. Floats and arrays of copies go through the same code.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping
from fractions import Fraction
from typing import NamedTuple

import numpy as np

from linkcalc.faults import fault
from linkcalc.model import units as u
from linkcalc.model.functions import FUNCTIONS, Quantity, settled
from linkcalc.model.mechanism import Units
from linkcalc.parts.contract import Size, Value
from linkcalc.words import nearest

_LONGEST, _DEEPEST, _LARGEST_POWER = 500, 40, 100
_HUGE = 1e300
_SPACE = re.compile(r"\s+")
_FRACTION = re.compile(r"(?:(\d+)\s+)?(\d+)\s*/\s*(\d+)(?![\d.]|[eE][+-]?\d)(?=\s*[A-Za-z_])|(\d+)\s+(\d+)\s*/\s*(\d+)")
_DECIMAL = re.compile(r"(\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?")
_NAME = re.compile(r"[^\W\d]\w*")
_SIGN = re.compile(r"[-+*/^(),]")
_UNIT_WORD = re.compile(r"\s*([A-Za-z_]+)(?!\w*\s*\()(\s*\^\s*-?\d+(?![\d.])|\d+)?")
_UNIT_MORE = re.compile(r"(?:(\s*[*/]\s*)|([.-])|(\s+))([A-Za-z_]+)(?!\w*\s*\()(\s*\^\s*-?\d+(?![\d.])|\d+)?")
_NOTHING: Mapping[str, Quantity] = {}


class Token(NamedTuple):
    """kind: "value", "name", "sign" or "end"; text as folded."""

    kind: str
    text: str
    value: Quantity


_END = Token("end", "", Quantity(0.0, u.NUMBER))


def evaluate(text: str, names: Mapping[str, Quantity] = _NOTHING) -> Quantity:
    """What a formula comes to.

    names  what its words stand for, SI; values float or (1, variant, 1)
    ->     value [SI], float or (1, variant, 1), and its dimension

    >>> evaluate("3/8 in + 2*t", {"t": Quantity(0.001, (1, 0, 0, 0))})
    Quantity(value=0.011525, dims=(1, 0, 0, 0))

    Raises Faults: not a formula, unknown word, dimensions that do not fit, no finite value.
    """
    return _Reader(text, names).whole()


def names_in(text: str, known: Iterable[str]) -> tuple[str, ...]:
    """The names among the known ones that a formula uses; () if it is no formula.

    Raises Faults.
    """
    names = {name: Quantity(1.0, u.NUMBER) for name in known}
    return tuple(dict.fromkeys(t.text for t in _tokens(text, names) if t.kind == "name" and t.text in names))


def to_si(size: Size, kind: str, units: Units, names: Mapping[str, Quantity] = _NOTHING) -> Value:
    """A size as written -> SI: a bare number is in the file's unit of that kind, a text carries its own.

    >>> to_si(40, "length", Units()), to_si("1/4 in", "length", Units())
    (0.04, 0.00635)

    Raises Faults: wrong kind, unknown unit or name, not a formula, not finite.
    """
    example = f"e.g. 12 {units.of(kind)}" if kind != "number" else "e.g. 0.5"
    if isinstance(size, str):
        found = evaluate(size, names)
        if found.dims != u.KINDS[kind]:
            example += f", or {size.strip()} without quotes" if found.dims == u.NUMBER and _bare(size) else ""
            raise fault((), f"{size} is {u.a(found.dims)}", f"{u.a(u.KINDS[kind])} is wanted ({example})")
        return found.value
    if isinstance(size, bool) or not isinstance(size, (int, float)):
        raise fault((), f"{size!r} is no size", f"{u.a(u.KINDS[kind])} is wanted ({example})")
    value = float(size) * u.unit(units.of(kind)).factor if -_HUGE < size < _HUGE else np.inf
    if not np.isfinite(value):
        raise fault((), "not a finite number", f"{u.a(u.KINDS[kind])} is wanted ({example})")
    return value


def _bare(text: str) -> bool:
    return bool(_DECIMAL.fullmatch(text.strip().lstrip("+-")))


def _tokens(text: str, names: Mapping[str, Quantity]) -> list[Token]:
    if len(text) > _LONGEST:
        raise fault((), f"a formula of {len(text)} characters", f"at most {_LONGEST} are read")
    folded, place, tokens = u.fold(text), 0, list[Token]()
    while place < len(folded):
        if space := _SPACE.match(folded, place):
            place = space.end()
        elif number := _FRACTION.match(folded, place) or _DECIMAL.match(folded, place):
            if number.re is _FRACTION and tokens and tokens[-1].text in ("/", "^"):
                raise fault((), f"{text!r} can be read in two ways", f"write ({number[0].strip()} ...) in brackets")
            unit_end = _unit_end(folded, number.end(), names)
            unit = u.unit(folded[number.end() : unit_end])
            tokens.append(Token("value", folded[place:unit_end], Quantity(_number(number) * unit.factor, unit.dims)))
            place = unit_end
        elif word := _NAME.match(folded, place):
            tokens.append(Token("name", word[0], _END.value))
            place = word.end()
        elif sign := _SIGN.match(folded, place):
            tokens.append(Token("sign", sign[0], _END.value))
            place = sign.end()
        else:
            raise fault(
                (), f"{folded[place]!r} cannot stand in {text!r}", "a number with a unit or a formula is wanted"
            )
    return [*tokens, _END]


def _number(match: re.Match[str]) -> float:
    if match.re is _DECIMAL:
        return float(match[0])
    whole, over, under = (int(match[i] or match[i + 3] or 0) for i in (1, 2, 3))
    if under == 0:
        raise fault((), "division by zero")
    return float(whole + Fraction(over, under))


def _unit_end(text: str, place: int, names: Mapping[str, Quantity]) -> int:
    """Where the unit of a number ends that stands before `place`; the same place if it has none."""
    first = _UNIT_WORD.match(text, place)
    if not first:
        return place
    if u.known(first[1], names) is None:
        if first[1] in names:
            raise fault((), f"no sign between {text[:place].split()[-1]} and {first[1]}", f"write *{first[1]}")
        raise fault((), f"unknown unit {first[1]!r}", u.hint(first[1]))
    place = first.end()
    while more := _UNIT_MORE.match(text, place):
        product, tight, space, word = more[1], more[2], more[3], more[4]
        if u.known(word, names) is None or (tight == "-" and word in names):
            break
        if word in names and not space:
            raise fault(
                (),
                f"{word!r} is a unit as well as a dimension of this model in {text!r}",
                f"for the unit leave out the sign {(product or tight).strip()!r} before it, "
                "for the dimension put the quantity in brackets: (12 N)*m",
            )
        place = more.end()
    return place


class _Reader:
    """One formula being read; each level of binding is one method."""

    def __init__(self, text: str, names: Mapping[str, Quantity]):
        self.text, self.names = text, names
        self.tokens = _tokens(text, names)
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
        before = self.tokens[self.place - 1] if self.place else _END
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
                to, word = ("to", "added") if sign == "+" else ("from", "taken")
                what, other = (right, left) if sign == "-" else (left, right)
                raise fault(
                    (), f"{u.a(what.dims)} cannot be {word} {to} {u.a(other.dims)} in {self.text!r}", _same(left, right)
                )
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
        return settled(np.power(base.value, power.value), dims, self.text)

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
