"""All positions in which free members balance, of a mechanism that nothing drives: searched from many places at once.

From each start the members come to rest where they would (stable balances), and Newton goes to the nearest balance of
any kind. The starts are the same in every run. A search of many starts finds what a person would call all of them; it
is no proof that there are no more.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.held import rates_of
from linkcalc.mechanics.loose import Places
from linkcalc.mechanics.motion import rolled, single
from linkcalc.mechanics.plan import NoPlan
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.settle import Settled, come_to_rest, settle
from linkcalc.parts.contract import TURN
from linkcalc.parts.pose import Array, Poses, Value

_STARTS = 48
_APART = 1e-6  # of a radian or the size: two balances are the same


@dataclass(frozen=True)
class BalancePlace:
    """One balance of one case.

    case    its number
    turns   [rad] of each moving member from the drawing pose, within half a turn
    x, y    [m] of each moving member's first point
    steady  +1 stable, 0 neutral, -1 unstable
    """

    case: int
    turns: tuple[float, ...]
    x: tuple[float, ...]
    y: tuple[float, ...]
    steady: int


def balance_places(ready: Ready) -> tuple[BalancePlace, ...]:
    """All balances that were found, case by case, stable ones first."""
    loose = ready.loose
    assert loose is not None
    places = loose.places(ready.start.at)
    assert places is not None
    found: list[BalancePlace] = []
    for relax in (True, False):
        try:
            starts = _starts(ready, places)
            if relax:
                rest = come_to_rest(loose, starts, None, ready.pushing, 0.0)
                assert rest is not None
                settled = rest[0]
            else:
                settled = settle(loose, places, starts, None, ready.pushing, 0.0)
        except NoPlan:
            continue
        for place in _told(settled):
            if not any(p.case == place.case and _same(p, place, loose.bare.size) for p in found):
                found.append(place)
    return tuple(sorted(found, key=lambda p: (p.case, -p.steady, p.turns)))


def _starts(ready: Ready, places: Places) -> Poses:
    """The settled pose, and others with the places shifted by up to half a turn or half the size: (1, 1, starts)."""
    rng = np.random.default_rng(12)
    way = np.zeros((ready.chain.columns, _STARTS))
    for place, rate in zip(places, rates_of(ready.chain, ready.start), strict=True):
        reach = np.pi if place.which == TURN else ready.chain.size / 2
        shift = np.concatenate([[0.0], reach * rng.uniform(-1, 1, _STARTS - 1)])
        way += np.outer(single(rate), shift)
    return rolled(_spread(ready.start.at), list(way))


def _spread(at: Poses) -> Poses:
    def first(values: Sequence[Value]) -> list[Value]:
        return [float(np.ravel(v)[0]) if k == 0 else np.full((1, 1, _STARTS), float(np.ravel(v)[0]))
                for k, v in enumerate(values)]  # fmt: skip

    return Poses(first(at.x), first(at.y), first(at.c), first(at.s), at.down, at.field)


def _told(settled: Settled) -> Iterator[BalancePlace]:
    closed = settled.closed
    at, shape = closed.at, closed.fine.shape
    members = range(1, len(at.x))
    x, y, c, s = (np.array([np.broadcast_to(v[m], shape) for m in members]) for v in (at.x, at.y, at.c, at.s))
    turn: Array = np.arctan2(s, c)
    for case, _, pose in zip(*np.nonzero(closed.fine), strict=True):
        where = (slice(None), case, 0, pose)
        yield BalancePlace(
            int(case), tuple(turn[where].tolist()), tuple(x[where].tolist()), tuple(y[where].tolist()),
            int(settled.steady[case, 0, pose]),
        )  # fmt: skip


def _same(a: BalancePlace, b: BalancePlace, size: float) -> bool:
    turns = max(abs((p - q + np.pi) % (2 * np.pi) - np.pi) for p, q in zip(a.turns, b.turns, strict=True))
    ways = max(abs(p - q) for p, q in zip((*a.x, *a.y), (*b.x, *b.y), strict=True))
    return turns <= _APART and ways <= _APART * size
