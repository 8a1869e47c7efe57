"""A force that is written down: as rows of a table, or as a formula."""

from __future__ import annotations

from itertools import pairwise

from linkcalc.faults import fault
from linkcalc.parts.contract import Limit, Size, Sketch, Value
from linkcalc.parts.law_push import Way, nominal, sure
from linkcalc.parts.laws.formula import Formula
from linkcalc.parts.laws.table import Table

Rows = tuple[tuple[Size, Size], ...]


def law_of(
    sketch: Sketch, rows: Rows | None, formula: str | None, kinds: tuple[str, str], drawn: Value
) -> Table | Formula:
    """The law that is written.

    kinds  what it goes by, and what it gives: "length" and "force", or "angle" and "moment"
    drawn  [m] or [rad] in the drawing pose

    Raises Faults: rows that do not rise.
    """
    if rows is None:
        assert formula is not None  # one of the two is there
        force = sketch.formula(formula, kinds[1], kinds[0])
        return Formula(force, force(drawn))
    ways, forces = ([sketch.value(row[k], kinds[k]) for row in rows] for k in (0, 1))
    for number, (a, b) in enumerate(pairwise(ways), start=2):
        if sure(b <= a):
            shown = [sketch.shown(nominal(v), kinds[0]) for v in (b, a)]
            what = f"row {number} is at {shown[0]}, not beyond the row before it, at {shown[1]}"
            raise fault(("table",), what, f"rows by rising {kinds[0]} are wanted")
    return Table(ways, forces)


def edges_of(law: Table | Formula, path: Way, sketch: Sketch) -> tuple[Limit, ...]:
    """A table has ends, and no force beyond them."""
    if isinstance(law, Formula):
        return ()
    first, last = law.ways[0], law.ways[-1]
    texts = [sketch.shown(nominal(v), path.kind) for v in (first, last)]
    return (
        Limit(f"below the first row of its table, {texts[0]}", lambda at, _: path.value(at) - first),
        Limit(f"beyond the last row of its table, {texts[1]}", lambda at, _: last - path.value(at)),
    )
