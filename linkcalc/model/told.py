"""What loads tell of themselves beside their push, and what of it an answer gives."""

from __future__ import annotations

from collections.abc import Iterable

from linkcalc.model.parts_list import EFFORT, LOAD
from linkcalc.parts.contract import Joint, Limit, Pusher, Told

_STRENGTH = ("force", "torque")


def told_by(pusher: Pusher) -> tuple[Told, ...]:
    """Everything a load tells; of the effort and the load without their strength, which the answer gives anyhow."""
    told: tuple[Told, ...] = pusher.told() if hasattr(pusher, "told") else ()
    return tuple(t for t in told if not (pusher.name in (EFFORT, LOAD) and t.name in _STRENGTH))


def limits_of(part: Pusher | Joint) -> tuple[Limit, ...]:
    """What should hold of a load or joint in every pose."""
    found: tuple[Limit, ...] = part.limits() if hasattr(part, "limits") else ()
    return found


def cautions_of(pushers: Iterable[Pusher]) -> dict[str, list[str]]:
    """What can hurt -> names of the loads that it is so with."""
    found: dict[str, list[str]] = {}
    for pusher in pushers:
        for text in getattr(pusher, "cautions", ()):
            if pusher.name not in found.setdefault(text, []):
                found[text].append(pusher.name)
    return found
