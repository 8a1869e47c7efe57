"""Reading a model file: every fault in it is told at once, with file, line and item."""

from __future__ import annotations

from pathlib import Path

from linkcalc.model.check import checked, in_order
from linkcalc.model.gather import Gather
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.source import Source, open_source


def read(path: str | Path) -> Mechanism:
    """The mechanism in a model file.

    Raises Faults: everything that is wrong with the file, in its order.
    """
    return _mechanism(open_source(Path(path)), str(path))


def parse(text: str, name: str = "model") -> Mechanism:
    """The mechanism in a text, as a model file would hold it; `name` is what messages call the text.

    Raises Faults.
    """
    return _mechanism(Source(text, name))


def _mechanism(source: Source, path: str = "") -> Mechanism:
    gather = Gather()
    found = checked(source.tree, gather)
    if gather.faults:
        raise source.located(gather.faults)
    return in_order(found, path)
