"""Gathering faults, so that one pass over a model tells all that is wrong with it."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import replace
from typing import TypeVar

from linkcalc.faults import Fault, Faults

Item = tuple[str, ...]
T = TypeVar("T")


class Gather:
    """What was found wrong so far.

    faults  in the order found
    """

    def __init__(self) -> None:
        self.faults: list[Fault] = []

    def add(self, item: Item, what: str, wanted: str = "") -> None:
        self.faults.append(Fault(item, what, wanted))

    @contextmanager
    def at(self, *item: str) -> Iterator[None]:
        """Faults raised inside are kept, their item being told from here, and the work goes on after the block."""
        try:
            yield
        except Faults as found:
            self._keep(found, item)

    def attempt(self, item: Item, read: Callable[[], T], otherwise: T) -> T:
        """What `read` gives; `otherwise`, with its faults kept, if it raises any."""
        try:
            return read()
        except Faults as found:
            self._keep(found, item)
            return otherwise

    def _keep(self, found: Faults, item: Item) -> None:
        self.faults += [replace(f, item=item + f.item) for f in found.faults]

    def touches(self, *item: str) -> bool:
        """True if something beneath this item was found wrong."""
        return any(f.item[: len(item)] == item for f in self.faults)

    def raise_any(self) -> None:
        """Raise everything found, if anything was.

        Raises Faults.
        """
        if self.faults:
            raise Faults(self.faults)
