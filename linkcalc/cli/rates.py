"""Rates and times of the stroke as a person writes them."""

from __future__ import annotations

from linkcalc.cli.files import option_fault
from linkcalc.faults import Faults
from linkcalc.model.units import unit

_SECOND = (0, 0, 1, 0)


def time_of(text: str) -> float:
    """[s] of "2 s", "0.5 min"; a bare number is in seconds. Raises Faults."""
    value, word = _split("--time", text, '"2 s" or "0.5 min" is wanted')
    return value * _seconds("--time", text, word or "s")


def rate_of(text: str) -> float:
    """[1/s] of "20/min", "0.5/s", "20 a minute"; a bare number is a minute. Raises Faults."""
    number, slash, word = text.partition("/")
    wanted = '"20/min" or "0.5/s" is wanted'
    value, rest = _split("--rate", number, wanted)
    if rest or (slash and not word.strip()):
        raise option_fault("--rate", f"{text} is no rate", wanted)
    return value / _seconds("--rate", text, word.strip() or "min")


def _split(option: str, text: str, wanted: str) -> tuple[float, str]:
    parts = text.split()
    number = "".join(c for c in parts[0] if c in "+-.0123456789") if parts else ""
    word = (parts[0][len(number) :] + " ".join(parts[1:])) if parts else ""
    try:
        value = float(number)
    except ValueError:
        raise option_fault(option, f"{text.strip() or 'nothing'} has no number", wanted) from None
    if not value > 0:
        raise option_fault(option, f"{text.strip()} is not more than nothing", wanted)
    return value, word


def _seconds(option: str, text: str, word: str) -> float:
    try:
        found = unit(word)
    except Faults as bad:
        raise option_fault(option, f"{text}: {bad.faults[0].what}", "s, min or h is wanted") from None
    if found.dims != _SECOND:
        raise option_fault(option, f"{text}: {word!r} is no unit of time", "s, min or h is wanted")
    return found.factor
