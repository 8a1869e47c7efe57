"""What must hold, as text: "force at C on arm <= 2 kN at 30 deg" -> its parts."""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass

from linkcalc.faults import fault
from linkcalc.model.formulas import to_si
from linkcalc.model.functions import Quantity
from linkcalc.model.mechanism import Mechanism, strength_kind
from linkcalc.model.shapes import shown
from linkcalc.parts.contract import Size
from linkcalc.words import nearest

START, END = "start", "end"
_LONGEST = 500
_FORM = '"force at C on arm <= 2 kN", "effort <= 150 N at start" or the like is wanted'
_TEXT = re.compile(r"\s*(?P<left>[^<>=≤≥]+?)\s*(?P<relation><=|>=|=<|=>|≤|≥|<|>)\s*(?P<right>[^<>=≤≥]+?)\s*")
_SAME = {"≤": "<=", "≥": ">=", "=<": "<=", "=>": ">="}
_BARE = re.compile(r"[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?")


@dataclass(frozen=True)
class Measure:
    """A quantity that a requirement may be about.

    kind  kind of its size; "effort" and "load": as the model's effort or load has it
    word  the word before the name it is told of: "at", "in", "of"; "" if it is of the whole
    also  words that may stand in its place
    """

    kind: str
    word: str = ""
    also: tuple[str, ...] = ()


MEASURES: dict[str, Measure] = {
    "effort": Measure("effort"),
    "load": Measure("load"),
    "tare effort": Measure("effort"),
    "frictionless effort": Measure("effort"),
    "efficiency": Measure("number"),
    "force ratio": Measure("number"),
    "ideal ratio": Measure("number"),
    "force": Measure("force", "at"),
    "moment": Measure("moment", "at"),
    "tension": Measure("force", "in", ("of",)),
    "compression": Measure("force", "in"),
    "travel": Measure("length", "of"),
}


@dataclass(frozen=True)
class Requirement:
    """One thing that must hold.

    name        as the file names it
    quantity    one of MEASURES: "effort", "force ratio", "force", "tension", ...
    of          the joint, member or point it is told of, "" if of the whole
    on          the member that feels it, "" for the largest of all
    relation    "<=", ">=", "<", ">"
    value_text  the limit as written
    at          "" for the worst pose, "start", "end", or a value of the stroke as written
    """

    name: str
    quantity: str
    of: str
    on: str
    relation: str
    value_text: str
    at: str

    def kind(self, mechanism: Mechanism) -> str:
        """Kind of the limit: "force", "moment", "length" or "number"."""
        kind = MEASURES[self.quantity].kind
        parts = {"effort": mechanism.effort, "load": mechanism.load}
        return strength_kind(parts[kind]) if kind in parts else kind

    def limit(self, mechanism: Mechanism, names: Mapping[str, Quantity]) -> float:
        """The limit [SI]. Raises Faults."""
        return float(to_si(_size(self.value_text), self.kind(mechanism), mechanism.units, names))

    def place(self, mechanism: Mechanism, names: Mapping[str, Quantity]) -> float | None:
        """[rad or m] the value of the stroke it is judged at; None unless one is given. Raises Faults."""
        if self.at in ("", START, END) or mechanism.stroke is None:
            return None
        if self.at.isalpha() and self.at not in names:
            raise fault((), f"{self.at!r} is no place in the stroke", nearest(self.at, (START, END, *names)))
        return float(to_si(_size(self.at), mechanism.stroke.along.kind, mechanism.units, names))


def requirements(mechanism: Mechanism) -> tuple[Requirement, ...]:
    """The requirements of a mechanism, in the order of the file.

    Raises Faults: text that is none.
    """
    return tuple(requirement(name, text) for name, text in mechanism.requirements.items())


def requirement(name: str, text: str) -> Requirement:
    """A requirement from its text.

    >>> requirement("pin", "force at C on arm <= 2 kN at 30 deg")
    Requirement(name='pin', quantity='force', of='C', on='arm', relation='<=', value_text='2 kN', at='30 deg')

    Raises Faults.
    """
    match = _TEXT.fullmatch(text) if len(text) <= _LONGEST else None
    if not match or not match["left"].strip():
        raise fault((), f"{shown(text)} is no requirement", _FORM)
    value, _, at = (part.strip() for part in re.sub(r"\s+", " ", match["right"]).partition(" at "))
    quantity, of, on = _told_of(match["left"].split(), text)
    relation = _SAME.get(match["relation"], match["relation"])
    return Requirement(name, quantity, of, on, relation, value, at)


def _told_of(words: list[str], text: str) -> tuple[str, str, str]:
    """Quantity, what it is of, and the member that feels it."""
    for count in (2, 1):
        quantity = " ".join(words[:count])
        measure = MEASURES.get(quantity)
        if measure is None:
            continue
        rest = words[count:]
        if not measure.word and not rest:
            return quantity, "", ""
        if measure.word and len(rest) >= 2 and rest[0] in (measure.word, *measure.also):
            told, on = (rest[1:-2], rest[-1]) if rest[-2] == "on" and measure.word == "at" else (rest[1:], "")
            # a side of a rope is told by the rope and its place: "hoist at P"
            if len(told) == 1 or (len(told) == 3 and told[1] == "at" and measure.word == "at"):
                return quantity, " ".join(told), on
        form = f"'{quantity} {measure.word} NAME'" if measure.word else f"{quantity!r} alone"
        form += f" or '{quantity} at NAME on MEMBER'" if measure.word == "at" else ""
        raise fault((), f"{' '.join(words)!r} is no quantity", f"{form} is wanted")
    guess = " ".join(words[:2]) if len(words) > 1 and words[1] not in ("at", "in", "of") else words[0]
    raise fault((), f"unknown quantity {guess!r} in {text!r}", nearest(guess, MEASURES))


def _size(text: str) -> Size:
    """A number alone is in the file's unit, as it is everywhere."""
    return float(text) if _BARE.fullmatch(text) else text
