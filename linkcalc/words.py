"""The one list of kinds: a class enters it by the word that the model file uses for it.

Families: "joint" and its like are tables of the file in the plural (``[slots]``); "load", "coordinate"
and "construction" are told apart by the one key that only they have (their word).
"""

from __future__ import annotations

import difflib
from collections.abc import Callable, Iterable
from typing import TypeVar

_T = TypeVar("_T", bound=type)
_KINDS: dict[str, dict[str, type]] = {}


def word(family: str, name: str) -> Callable[[_T], _T]:
    """Enter a class into a family under the word the model file uses; a word is taken once only."""

    def enter(kind: _T) -> _T:
        known = _KINDS.setdefault(family, {})
        if name in known:
            raise RuntimeError(f"{family} {name!r} is already taken by {known[name].__qualname__}")
        known[name] = kind
        kind.word = name  # type: ignore[attr-defined]
        kind.family = family  # type: ignore[attr-defined]
        return kind

    return enter


def kinds(family: str) -> dict[str, type]:
    """The classes of a family by their word, in the order of the words."""
    return dict(sorted(_KINDS.get(family, {}).items()))


def nearest(name: str, known: Iterable[str]) -> str:
    """A hint for a misspelt word: the closest known ones, else all of them, as the tail of a message."""
    pool = sorted({str(k) for k in known})
    close = difflib.get_close_matches(name, pool, n=2, cutoff=0.6)
    if not close:
        lower = {k.lower(): k for k in pool}
        close = [lower[c] for c in difflib.get_close_matches(name.lower(), list(lower), n=2, cutoff=0.6)]
    if close:
        return "did you mean " + " or ".join(repr(c) for c in close) + "?"
    return ("known: " + ", ".join(pool)) if pool else "there are none"
