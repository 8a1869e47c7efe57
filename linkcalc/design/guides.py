"""Slots, slides and tracks: the force square to their line, and where it passes to the other side of the guide."""

from __future__ import annotations

from collections.abc import Callable, Iterator

from linkcalc.design.curves import Curves, Zeros
from linkcalc.design.events import carries_nothing
from linkcalc.design.pins_answer import Reversal
from linkcalc.design.survey import Quantity, Shown
from linkcalc.mechanics.chain import Chain
from linkcalc.parts.pose import Value

_NORMAL = "normal force at "


def normal_forces(chain: Chain) -> Iterator[Quantity]:
    """Force square to the line of each guide, plus on the guided member's left, as quantities of a survey."""
    for joint, row in zip(chain.joints, chain.first_row, strict=True):
        if hasattr(joint, "travel"):
            yield Quantity(_NORMAL + joint.name, "force", _multiplier(row))


def guide_reversals(curves: Curves) -> Iterator[Reversal]:
    """Where guides bear on their other side from then on."""
    names = [n for n in curves.survey.quantities if n.startswith(_NORMAL) and not carries_nothing(curves, n)]
    if curves.drive.size < 2:
        return
    zeros = Zeros(curves, names)
    for name, case, drive in zeros.found():
        of = "" if name in zeros.alike else curves.survey.ready.pushing.cases[case]
        yield Reversal(name.removeprefix(_NORMAL), of, drive)


def _multiplier(row: int) -> Callable[[Shown], Value]:
    return lambda shown: shown.solved.balance.multipliers[row]
