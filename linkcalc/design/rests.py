"""Where a mechanism that nothing drives balances."""

from __future__ import annotations

from linkcalc.design.answer import Rest
from linkcalc.mechanics.prepare import Ready


def rests(ready: Ready) -> tuple[Rest, ...]:
    """All balances that are found, case by case; none where something drives the mechanism or many copies are asked."""
    if ready.loose is None or ready.loose.coordinate is not None or ready.start.fine.shape[1] > 1:
        return ()
    from linkcalc.mechanics.balances import balance_places

    names = ready.drawing.members[1:]
    return tuple(
        Rest(ready.pushing.cases[p.case], dict(zip(names, p.turns, strict=True)), p.steady)
        for p in balance_places(ready)
    )
