"""A formula cut into numbers with their units, names and signs."""

from __future__ import annotations

import re
from collections.abc import Container
from fractions import Fraction
from typing import NamedTuple

from linkcalc.faults import fault
from linkcalc.model import units as u
from linkcalc.model.functions import Quantity

_LONGEST = 500
_SPACE = re.compile(r"\s+")
_FRACTION = re.compile(r"(?:(\d+)\s+)?(\d+)\s*/\s*(\d+)(?![\d.]|[eE][+-]?\d)(?=\s*[A-Za-z_])|(\d+)\s+(\d+)\s*/\s*(\d+)")
_DECIMAL = re.compile(r"(\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?")
_NAME = re.compile(r"[^\W\d]\w*")
_SIGN = re.compile(r"[-+*/^(),]")
_UNIT_WORD = re.compile(r"\s*([A-Za-z_]+)(?![^\W\d])(?!\w*\s*\()(\s*\^\s*-?\d+(?![\d.])|\d+)?")
_UNIT_MORE = re.compile(
    r"(?:(\s*[*/]\s*)|([.-])|(\s+))([A-Za-z_]+)(?![^\W\d])(?!\w*\s*\()(\s*\^\s*-?\d+(?![\d.])|\d+)?"
)


class Token(NamedTuple):
    """kind: "value", "name", "sign" or "end"; text as folded."""

    kind: str
    text: str
    value: Quantity


END = Token("end", "", Quantity(0.0, u.NUMBER))


def names_in(text: str, known: Container[str]) -> tuple[str, ...]:
    """The names among the known ones that a formula uses; () if it is no formula.

    Raises Faults.
    """
    return tuple(dict.fromkeys(t.text for t in tokens_of(text, known) if t.kind == "name" and t.text in known))


def tokens_of(text: str, names: Container[str]) -> list[Token]:
    """A formula cut into its parts; the last one is END.

    names  words that stand for a size here, so that they are no units

    Raises Faults: signs that mean nothing, unknown units, a text that can be read in two ways.
    """
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
            tokens.append(Token("name", word[0], END.value))
            place = word.end()
        elif sign := _SIGN.match(folded, place):
            tokens.append(Token("sign", sign[0], END.value))
            place = sign.end()
        else:
            raise fault(
                (), f"{folded[place]!r} cannot stand in {text!r}", "a number with a unit or a formula is wanted"
            )
    return [*tokens, END]


def _number(match: re.Match[str]) -> float:
    if match.re is _DECIMAL:
        return float(match[0])
    whole, over, under = (int(match[i] or match[i + 3] or 0) for i in (1, 2, 3))
    if under == 0:
        raise fault((), "division by zero")
    return float(whole + Fraction(over, under))


def _unit_end(text: str, place: int, names: Container[str]) -> int:
    """Where the unit of a number ends that stands before `place`; the same place if it has none."""
    first = _UNIT_WORD.match(text, place)
    if not first:
        return place
    whole = _whole_word(text, first.start(1))
    if whole in names and u.known(whole, names) is None:
        return place
    if u.known(first[1], names) is None:
        raise fault((), f"unknown unit {first[1]!r}", u.hint(first[1]))
    place = first.end()
    while more := _UNIT_MORE.match(text, place):
        product, tight, space, word = more[1], more[2], more[3], more[4]
        whole = _whole_word(text, more.start(4))
        if u.known(word, names) is None or (whole in names and (tight == "-" or whole != word)):
            break
        if whole in names and not space:
            raise fault(
                (),
                f"{word!r} is a unit as well as a dimension of this model in {text!r}",
                f"for the unit leave out the sign {(product or tight).strip()!r} before it, "
                "for the dimension put the quantity in brackets: (12 N)*m",
            )
        place = more.end()
    return place


def _whole_word(text: str, place: int) -> str:
    """The word that begins there, figures included."""
    match = _NAME.match(text, place)
    return match[0] if match else ""
