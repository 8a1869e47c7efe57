"""The only exceptions raised on purpose: what is wrong, where, and what would be right.

Faults            one or many, raised once, after everything was looked at
  Fault           one of them: where (item path), what, wanted
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace


@dataclass(frozen=True)
class Fault:
    """One thing wrong with the input.

    item    path of the item in the model, as keys: ("points", "C", "meets"); () for the whole file
    what    what is wrong, one clause
    wanted  what would be right, one clause; "" when the cure is plain
    file    name of the file, filled in by the reader
    line    line in the file, 1 first; 0 when unknown
    """

    item: tuple[str, ...]
    what: str
    wanted: str = ""
    file: str = ""
    line: int = 0

    def located(self, file: str, line: int) -> Fault:
        return replace(self, file=self.file or file, line=self.line or line)

    def __str__(self) -> str:
        place = self.file + (f":{self.line}" if self.line else "")
        item = ".".join(self.item)
        head = ": ".join(p for p in (place, item) if p)
        text = f"{head}: {self.what}" if head else self.what
        return f"{text}; {self.wanted}" if self.wanted else text


class Faults(ValueError):
    """Everything found wrong in one pass, in the order of the file."""

    def __init__(self, faults: Fault | Iterable[Fault]):
        self.faults: tuple[Fault, ...] = (faults,) if isinstance(faults, Fault) else tuple(faults)
        super().__init__("\n".join(str(f) for f in self.faults))


def fault(item: tuple[str, ...] | str, what: str, wanted: str = "") -> Faults:
    """A single fault, ready to raise."""
    return Faults(Fault((item,) if isinstance(item, str) else tuple(item), what, wanted))
