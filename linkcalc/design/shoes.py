"""Pressure at the edges of guides and safety of ropes, in every case and pose: quantities of a survey."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from typing import Any

import numpy as np

from linkcalc.design.survey import Quantity, Shown
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array, Value
from linkcalc.parts.shoes import Shoe

PRESSURE, NEEDED, SAFETY = "pressure at ", "length needed at ", "safety factor of "


def shoes(ready: Ready) -> Mapping[str, Shoe]:
    """Guide -> what it bears on, of those that are told."""
    each = ((joint.name, getattr(joint, "shoe", None)) for joint in ready.chain.joints)
    return {name: shoe for name, shoe in each if shoe is not None}


def pressure(ready: Ready, guide: str) -> Quantity:
    """[Pa] at the edge of a guide: N/(l b) + 6 M/(l² b), see design/sizing/guide.py."""
    shoe, both = shoes(ready)[guide], on_shoe(ready, guide)

    def of(shown: Shown) -> Value:
        normal, moment = both(shown)
        return (np.abs(normal) + 6 * np.abs(moment) / shoe.length) / (shoe.length * shoe.width)

    return Quantity(PRESSURE + guide, "stress", of)


def needed_length(ready: Ready, guide: str) -> Quantity:
    """[m] length at which the edge would be pressed as much as is allowed, forces and width being as they are: the root
    of p l² b = N l + 6 M."""
    shoe, both = shoes(ready)[guide], on_shoe(ready, guide)
    assert shoe.allowed is not None
    bears = shoe.allowed * shoe.width  # [N/m]

    def of(shown: Shown) -> Value:
        normal, moment = (np.abs(v) for v in both(shown))
        return (normal + np.sqrt(normal**2 + 24 * moment * bears)) / (2 * bears)

    return Quantity(NEEDED + guide, "length", of)


def on_shoe(ready: Ready, guide: str) -> Callable[[Shown], tuple[Value, Value]]:
    """Normal force [N] and moment [N m] on one block of a guide; of twin plates each has its own."""
    chain = ready.chain
    k = next(k for k, joint in enumerate(chain.joints) if joint.name == guide)
    joint, row = chain.joints[k], chain.first_row[k]
    # a block on the pin of several members is one, whichever of them is named first
    members = joint.members[1:] if joint.on_pin else joint.members
    blocks = max(ready.plates[m] for m in members)

    def of(shown: Shown) -> tuple[Value, Value]:
        rows = shown.solved.balance.multipliers
        moment = rows[row + 1] if len(joint.angular) > 1 else 0.0
        return rows[row] / blocks, moment / blocks

    return of


def safety(ready: Ready, rope: str, tension: Callable[[Shown], Value]) -> Quantity:
    """[-] breaking load of a rope over its tension; without bound where it hangs slack, nothing at a dead point."""
    breaks = rope_of(ready, rope).breaks

    def of(shown: Shown) -> Array:
        pull, dead = np.asarray(tension(shown)), shown.solved.balance.status == Status.DEAD_POINT
        with np.errstate(divide="ignore", invalid="ignore"):
            factor = np.where(pull > 0, breaks / pull, np.where(np.isnan(pull), np.nan, np.inf))
        return np.where(dead, 0.0, factor)

    return Quantity(SAFETY + rope, "number", of)


def rope_of(ready: Ready, rope: str) -> Any:
    """The joint of a rope."""
    return next(joint for joint in ready.drawing.joints if joint.name == rope)


def told_shoes(ready: Ready) -> Iterator[Quantity]:
    """What the sizes of guides go by."""
    for guide, shoe in shoes(ready).items():
        yield pressure(ready, guide)
        if shoe.allowed is not None:
            yield needed_length(ready, guide)
