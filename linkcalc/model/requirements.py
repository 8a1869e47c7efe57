"""What must hold, as text: "force at C on arm <= 2 kN at 30 deg" -> its parts."""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache

from linkcalc.faults import fault
from linkcalc.model.formulas import to_si
from linkcalc.model.functions import Quantity
from linkcalc.model.mechanism import Mechanism, strength_kind
from linkcalc.model.shapes import shown
from linkcalc.parts.contract import Size
from linkcalc.words import kinds, nearest

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
    of    what that name is the name of
    """

    kind: str
    word: str = ""
    of: str = ""


JOINT, MEMBER, DRAWN, MOVER, LOADING = "joint", "member", "member or rope", "point, slot, slide or track", "load"
PIN = "pin"
ROPE = "rope"
PRESSED = "pin, slot, slide or track"
SAFETY = "safety factor"
_WHOLE = {
    "effort": "effort",
    "load": "load",
    "tare effort": "effort",
    "frictionless effort": "effort",
    "efficiency": "number",
    "force ratio": "number",
    "ideal ratio": "number",
}
_MEASURES = (
    ("force", Measure("force", "at", JOINT)),
    ("moment", Measure("moment", "at", JOINT)),
    ("tension", Measure("force", "in", DRAWN)),
    ("tension", Measure("force", "of", DRAWN)),
    ("first tension", Measure("force", "of", ROPE)),
    ("last tension", Measure("force", "of", ROPE)),
    ("compression", Measure("force", "in", MEMBER)),
    ("travel", Measure("length", "of", MOVER)),
    ("bending moment", Measure("moment", "in", MEMBER)),
    ("shear force", Measure("force", "in", MEMBER)),
    ("axial force", Measure("force", "in", MEMBER)),
    ("stress", Measure("stress", "in", MEMBER)),
    ("buckling margin", Measure("number", "of", MEMBER)),
    ("utilisation", Measure("number", "of", MEMBER)),
    ("stress", Measure("stress", "in pin", PIN)),
    ("pressure", Measure("stress", "at", PRESSED)),
    (SAFETY, Measure("number", "of", ROPE)),
    ("life", Measure("number", "at", PIN)),
)
INNER = ("bending moment", "shear force", "axial force", "stress", "buckling margin", "utilisation")
"""What goes on within a member, at its worst place."""
NEEDS = {"stress": ("section",), "buckling margin": ("section", "material"), "utilisation": ("section", "material")}
"""Keys that the member must have for it."""
EXAMPLES = {"section": "section = { flat = [40, 10] }", "material": 'material = "S355"'}


@cache
def measures() -> dict[tuple[str, str], Measure]:
    """(quantity, word after it) -> what it is; those of the whole, of joints and members, and what loads tell."""
    told = {name: kind for load in kinds("load").values() for name, kind in getattr(load, "tells", {}).items()}
    return {
        **{(name, ""): Measure(kind) for name, kind in _WHOLE.items()},
        **{(name, one.word): one for name, one in _MEASURES},
        **{(name, "of"): Measure(kind, "of", LOADING) for name, kind in told.items()},
    }


@dataclass(frozen=True)
class Requirement:
    """One thing that must hold.

    name        as the file names it
    quantity    one of measures(): "effort", "force ratio", "force", "tension", "length", ...
    word        the word before the name: "at", "in", "of", "" if it is of the whole
    of          the joint, member, point or load it is told of, "" if of the whole
    on          the member that feels it, "" for the largest of all
    relation    "<=", ">=", "<", ">"
    value_text  the limit as written
    at          "" for the worst pose, "start", "end", or a value of the stroke as written
    """

    name: str
    quantity: str
    word: str
    of: str
    on: str
    relation: str
    value_text: str
    at: str

    @property
    def measure(self) -> Measure:
        return measures()[self.quantity, self.word]

    @property
    def inside(self) -> bool:
        """True for what goes on within a member; "stress in pin C" is that of a pin."""
        return self.quantity in INNER and self.measure.of == MEMBER

    @property
    def strength(self) -> bool:
        """True for what a pin, guide or rope bears beside its force."""
        return self.measure.of in (PIN, PRESSED) or self.quantity == SAFETY

    def kind(self, mechanism: Mechanism) -> str:
        """Kind of the limit: "force", "moment", "length" or "number"."""
        kind = self.measure.kind
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

    >>> requirement("p", "force at C on arm <= 2 kN at 30 deg")
    Requirement(name='p', quantity='force', word='at', of='C', on='arm', relation='<=', value_text='2 kN', at='30 deg')

    Raises Faults.
    """
    match = _TEXT.fullmatch(text) if len(text) <= _LONGEST else None
    if not match or not match["left"].strip():
        raise fault((), f"{shown(text)} is no requirement", _FORM)
    value, _, at = (part.strip() for part in re.sub(r"\s+", " ", match["right"]).partition(" at "))
    quantity, word, of, on = _told_of(match["left"].split(), text)
    relation = _SAME.get(match["relation"], match["relation"])
    return Requirement(name, quantity, word, of, on, relation, value, at)


def _told_of(words: list[str], text: str) -> tuple[str, str, str, str]:
    """Quantity, the word after it, what it is of, and the member that feels it."""
    known = measures()
    names = list(dict.fromkeys(name for name, _ in known))
    for count in (2, 1):
        quantity, rest = " ".join(words[:count]), words[count:]
        if quantity not in names:
            continue
        word = rest[0] if rest else ""
        if len(rest) == 3 and (quantity, f"{word} {PIN}") in known and rest[1] == PIN:
            return quantity, f"{word} {PIN}", rest[2], ""  # "stress in pin C"; "stress in C" is that of a member
        if not rest and (quantity, word) in known:
            return quantity, "", "", ""
        if len(rest) >= 2 and (quantity, word) in known:
            told, on = (rest[1:-2], rest[-1]) if rest[-2] == "on" and word == "at" else (rest[1:], "")
            # a side of a rope is told by the rope and its place: "hoist at P"
            if len(told) == 1 or (len(told) == 3 and told[1] == "at" and word == "at"):
                return quantity, word, " ".join(told), on
        forms = [f"'{quantity} {w} NAME'" if w else f"{quantity!r} alone" for name, w in known if name == quantity]
        forms += [f"'{quantity} at NAME on MEMBER'"] if (quantity, "at") in known else []
        raise fault((), f"{' '.join(words)!r} is no quantity", f"{' or '.join(forms)} is wanted")
    guess = " ".join(words[:2]) if len(words) > 1 and words[1] not in ("at", "in", "of") else words[0]
    raise fault((), f"unknown quantity {guess!r} in {text!r}", nearest(guess, names))


def _size(text: str) -> Size:
    """A number alone is in the file's unit, as it is everywhere."""
    return float(text) if _BARE.fullmatch(text) else text
