"""All that the ground feels, put together: what the foundation must bear, and what would tip the frame over."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.over_cases import Asked
from linkcalc.design.survey import Quantity, Shown
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.pushing import sized_pushers
from linkcalc.parts.pose import Value

X, Y, RESULTANT, MOMENT = "ground x", "ground y", "ground force", "ground moment"
ASKED = (
    Asked(RESULTANT), Asked(X), Asked(X, -1), Asked(Y), Asked(Y, -1), Asked(MOMENT), Asked(MOMENT, -1),
)  # fmt: skip


def ground_quantities(ready: Ready, about: tuple[float, float]) -> Iterator[Quantity]:
    """Resultant of everything on the ground, and its moment about a place [m], as quantities of a survey."""
    kept: list[tuple[Shown, tuple[Value, Value, Value]]] = []

    def total(shown: Shown) -> tuple[Value, Value, Value]:
        if not kept or kept[0][0] is not shown:
            kept[:] = [(shown, _total(ready, shown, about))]
        return kept[0][1]

    yield Quantity(X, "force", lambda shown: total(shown)[0])
    yield Quantity(Y, "force", lambda shown: total(shown)[1])
    yield Quantity(RESULTANT, "force", lambda shown: np.hypot(*total(shown)[:2]))
    yield Quantity(MOMENT, "moment", lambda shown: total(shown)[2])


def _total(ready: Ready, shown: Shown, about: tuple[float, float]) -> tuple[Value, Value, Value]:
    """Force x, y [N] and moment [N m] of joints and loads on the ground."""
    x: Value = 0.0
    y: Value = 0.0
    turning: Value = 0.0
    ox, oy = about
    for side in shown.sides:
        if side.member == 0:
            x, y = x + side.fx, y + side.fy
            turning = turning + side.moment + (side.x - ox) * side.fy - (side.y - oy) * side.fx
    at, b = shown.solved.closed.at, shown.solved.balance
    for acting, size in sized_pushers(ready.pushing, at, b.effort, b.load):
        if hasattr(acting.pusher, "through"):
            continue  # the sides of the joint that it pushes through have told it
        pushes = acting.pusher.push(at)
        for (member, fx, fy, moment), pin in zip(pushes, acting.pusher.on_pins, strict=True):
            if member == 0 and not pin:
                x, y = x + size * fx, y + size * fy
                turning = turning + size * (moment - ox * fy + oy * fx)
    return x, y, turning
