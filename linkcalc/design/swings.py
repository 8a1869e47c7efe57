"""How the members of a joint move against one another over the stroke, and what they carry on the way."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from linkcalc.design.curves import Curves, Zeros
from linkcalc.design.felt import one_of
from linkcalc.design.over_cases import Asked, worst_cases
from linkcalc.design.pins_answer import Swing
from linkcalc.design.survey import Quantity, Shown
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.quadrature import Integral
from linkcalc.parts.pose import TURN, Array, Poses, Value

_STILL = 1e-9
"""Of the fastest turn or slide of the mechanism: a speed that is nothing but rounding."""


@dataclass(frozen=True)
class Pair:
    """Two members of a joint that move against one another.

    joint          as the sides are called
    member, other  indices; the second is the one that stands for the pin, or has the guide
    guide          the joint itself where it slides along its line; None where it turns
    pin            True where they turn on a pin, not in a guide
    """

    joint: str
    member: int
    other: int
    guide: Any = None
    pin: bool = False

    @property
    def kind(self) -> str:
        return "length" if self.guide else "angle"

    @property
    def speed_name(self) -> str:
        return f"{'sliding' if self.guide else 'turning'} speed at {self.joint} of {self.member} on {self.other}"

    def place(self, at: Poses) -> Value:
        """[rad or m] how far it has turned (within half a turn) or slid."""
        if self.guide:
            travel: Value = self.guide.travel(at)
            return travel
        c, s = at.c, at.s
        a, b = self.member, self.other
        turned: Value = np.arctan2(s[a] * c[b] - c[a] * s[b], c[a] * c[b] + s[a] * s[b])
        return turned

    def speed(self, shown: Shown) -> Value:
        """The same for a unit speed of the stroke."""
        closed = shown.solved.closed
        row = self.guide.travel_slope(closed.at) if self.guide else ((self.member, TURN, 1.0), (self.other, TURN, -1.0))
        total: Value = 0.0
        for member, which, value in row:
            if member:
                total = total + value * closed.speed[3 * (member - 1) + which]
        return total


def pairs_of(chain: Chain) -> list[Pair]:
    """All pairs of members that turn or slide against one another, in the order of the joints."""
    out = []
    for joint in chain.joints:
        if hasattr(joint, "contacts"):
            continue  # a rope runs over its wheels: no pair of members
        a, b = joint.members[:2]
        if not any(joint.angular):
            out.append(Pair(joint.name, a, b, pin=joint.word == "pin"))
        if hasattr(joint, "travel"):
            out.append(Pair(joint.name, a, b, joint))
    return out


def speeds(pairs: Sequence[Pair]) -> Iterator[Quantity]:
    """The speeds of the pairs as quantities of a survey."""
    for pair in pairs:
        yield Quantity(pair.speed_name, "number", pair.speed)


@dataclass(frozen=True, eq=False)
class _Way:
    """How a pair goes in one case: the ends of the stroke with the turning places between, and where it is there."""

    nodes: Array
    places: Array

    @property
    def path(self) -> float:
        return float(np.abs(np.diff(self.places)).sum())


class Swings:
    """The swings of all pairs over a stroke. Free members settle in each case by themselves: each then has its own."""

    def __init__(self, curves: Curves, pairs: Sequence[Pair]):
        self._curves, self._pairs = curves, pairs
        self._cases = curves.survey.ready.pushing.cases
        drive = curves.drive
        self._reach = abs(float(drive[-1] - drive[0]))
        moving = [p for p in pairs if self._moves(p)]
        zeros = Zeros(curves, [p.speed_name for p in moving])
        self._back: dict[tuple[str, int], list[float]] = {}
        for name, case, place in zeros.found():
            for each in range(len(self._cases)) if name in zeros.alike else (case,):
                self._back.setdefault((name, each), []).append(place)
        found = worst_cases(curves, [Asked(p.speed_name, 1, True) for p in moving])
        self._fastest = {p: f for p, (_, f) in zip(moving, found, strict=True)}
        # positions are the same in all cases, but where free members settle
        self._ways = {p: [self._way(p, case) for case in range(self._apart)] for p in pairs}

    @property
    def _apart(self) -> int:
        return len(self._cases) if self._curves.survey.ready.loose is not None else 1

    @property
    def members(self) -> tuple[str, ...]:
        """Names of the members, by index."""
        return self._curves.survey.ready.drawing.members

    def _moves(self, pair: Pair) -> bool:
        """False for members that stand still against one another but for rounding."""
        alike = max((self._curves.size(p.speed_name) for p in self._pairs if p.kind == pair.kind), default=0.0)
        return self._curves.size(pair.speed_name) > _STILL * alike

    def swing(self, pair: Pair, *, radius: float, time: float) -> Swing:
        """One of them, of the case in which it goes the longest way.

        radius  [m] of the pin, nan if unknown
        time    [s] of a stroke, nan if not stated
        """
        way = max(self._ways[pair], key=lambda w: w.path)
        arm = 1.0 if pair.guide else radius
        fastest = self._fastest.get(pair)
        quick = abs(fastest.value) if fastest else 0.0
        mean, case = self.mean(pair)
        return Swing(
            self.members[pair.member], self.members[pair.other], pair.kind, float(way.places.min()),
            float(way.places.max()), way.path, tuple(way.nodes[1:-1].tolist()), quick,
            fastest.drive if fastest else float("nan"), mean, case,
            way=way.path * arm, speed=quick * arm * self._reach / time, mean_speed=way.path * arm / time,
        )  # fmt: skip

    def _way(self, pair: Pair, case: int) -> _Way:
        """Where the pair is at the ends of the stroke and where it turns back, turns wound on over all poses."""
        curves = self._curves
        start, end = float(curves.drive[0]), float(curves.drive[-1])
        back = self._back.get((pair.speed_name, case), [])
        nodes = np.array([start, *sorted(back, reverse=end < start), end])
        seen = [curves.seen(node) for node in nodes.tolist()]
        known = pair.place(curves.shown.solved.closed.at)
        values = np.array(
            [one_of(known, case, k) for k in range(curves.drive.size)]
            + [one_of(pair.place(shown.solved.closed.at), case, k) for shown, k in seen]
        )
        if not pair.guide:
            order = np.argsort(np.concatenate([curves.drive, nodes]), kind="stable")
            values[order] = np.unwrap(values[order])
        return _Way(nodes, values[curves.drive.size :])

    def mean(self, pair: Pair, exponent: float = 3.0) -> tuple[float, str]:
        """[N] mean of the force on the first member over the way, and the case where it is largest.

        The root of that exponent of the mean of its power: 3 root-mean-cube. nan where nothing moves.
        """
        curves = self._curves
        # the point of a guide may be a pin that is no member; the other side of it always is one
        name = f"force at {pair.joint} on {self.members[pair.member if pair.pin else pair.other]}"
        if name not in curves.survey.quantities or not self._moves(pair):
            return float("nan"), ""
        force = np.abs(curves.samples(name))
        top = float(np.max(force, initial=0.0, where=np.isfinite(force))) or 1.0
        powers, speed = (force / top) ** exponent, curves.samples(pair.speed_name)
        # where it rubs a case is moved through there and back, and the way back has its own forces
        ways = 2 if curves.survey.ready.pushing.rubbing and len(self._cases) % 2 == 0 else 1
        work, way = np.zeros(len(self._cases)), np.zeros(len(self._cases))
        for case in range(len(self._cases)):
            nodes = self._ways[pair][case % self._apart].nodes
            both = np.stack([powers[case] * speed[case], speed[case]])
            with np.errstate(invalid="ignore"):  # a force without bound at the end of the stroke
                work[case], way[case] = np.abs(np.diff(Integral(curves.drive, both).to(nodes), axis=1)).sum(axis=1)
        work, way = work.reshape(-1, ways).sum(axis=1), way.reshape(-1, ways).sum(axis=1)
        means = np.where(np.isnan(work), -np.inf, top * (work / way) ** (1 / exponent))
        means = np.where(np.isposinf(powers).any(axis=1).reshape(-1, ways).any(axis=1), np.inf, means)
        k = int(np.argmax(means))
        if means[k] == -np.inf:
            return float("nan"), ""
        return float(means[k]), self._cases[k * ways]
