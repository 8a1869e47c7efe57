"""Friction of ropes: the pull steps at each pulley that rubs, by a ratio that the senses of motion alone tell.

So it is linear in the pull of the rope's last part, T: what friction does is T times a known column, and T itself is
T0 + G T with the response G of T to that column. Solved at once, for all ropes together.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any

import numpy as np

from linkcalc.mechanics.arith import less, plus, times
from linkcalc.mechanics.batch import tops
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.motion import Closed, fastest
from linkcalc.mechanics.pushing import Column, add_pushes
from linkcalc.mechanics.sums import dot
from linkcalc.parts.contract import Drag, Push
from linkcalc.parts.pose import TURN, Array, Mask, Value, zero

STANDS = 1e-12  # speed over the fastest in the mechanism: what is slower stands still but for rounding


@dataclass(frozen=True, eq=False)
class Response:
    """What a push of 1 does to the multipliers (negative), and to the unknown, which takes up its power."""

    rows: list[Value]
    unknown: Value


@dataclass(frozen=True, eq=False)
class Drive:
    """A batch of poses with what is asked for in them.

    unit        what the unknown does to the coordinates for a strength of 1
    unit_speed  its speed along itself
    beside      what it strains beside that, see ``Sharing.beside``
    """

    closed: Closed
    unit: Column
    unit_speed: Value
    beside: Sequence[Value] = ()

    @property
    def moves(self) -> bool:
        """False for a chain that nothing drives."""
        return bool(self.closed.speed)

    @cached_property
    def _tops(self) -> list[float]:
        return tops(self.closed.speed)

    def speed(self, push: Column) -> Value:
        """Of a push along itself."""
        return dot(self.closed.speed, push) if self.moves else 0.0

    def moving(self, chain: Chain, push: Column) -> Value:
        """The same, made an exact 0 where it stands still but for rounding."""
        if not self.moves:
            return 0.0
        speed = self.speed(push)
        turning = all(zero(q) for k, q in enumerate(push) if k % 3 != TURN)
        arm = chain.size if turning else 1.0
        top = max((t * size for t, size in zip(self._tops, chain.sizes, strict=True)), default=0.0)
        # one bound for the whole batch settles nearly every batch, and costs no temporary arrays
        if float(np.min(np.abs(speed))) * arm > STANDS * top:
            return speed
        still = ~(np.abs(speed) * arm > STANDS * fastest(chain, self.closed.speed))
        return np.where(still & np.isfinite(speed), 0.0, speed)

    def respond(self, push: Column, beside: Sequence[Value] = ()) -> Response:
        """Response to a push, and to what it strains beside that."""
        answer = -np.divide(self.speed(push), self.unit_speed) if self.moves else 0.0
        whole = [plus(q, times(answer, u)) for q, u in zip(push, self.unit, strict=True)]
        whole += [plus(q, times(answer, u)) for q, u in zip(beside, self.beside, strict=True)]
        return Response(self.closed.factored.solve(whole, transposed=True), answer)


@dataclass(frozen=True, eq=False)
class Pull:
    """Where the pull of a rope comes from: a row of the chain; or (row None) pushers at its hauling end: known [N], and
    so much of the unknown."""

    row: int | None
    known: Value = 0.0
    part: Value = 0.0

    def of(self, negative: Sequence[Value], unknown: Value) -> Value:
        if self.row is not None:
            return 0.0 - negative[self.row]
        return plus(self.known, times(self.part, unknown))

    def gain(self, response: Response) -> Value:
        return 0.0 - response.rows[self.row] if self.row is not None else times(self.part, response.unknown)


@dataclass(frozen=True, eq=False)
class Drags:
    """Friction of all ropes of a batch, (case, variant, pose).

    parts      for each rope the pulls in its parts over that in its last
    pulls      where that one comes from
    columns    what friction does to the coordinates for a pull of 1
    responses  to those
    inverse    of 1 - G, a row each; NaN where it jams
    jammed     where no pull however large answers; None: nowhere
    """

    parts: list[list[Value]] = field(default_factory=list)
    pulls: list[Pull] = field(default_factory=list)
    columns: list[Column] = field(default_factory=list)
    responses: list[Response] = field(default_factory=list)
    inverse: list[list[Value]] = field(default_factory=list)
    jammed: Mask | None = None

    def through(self, start: Response) -> Response:
        """A response with what the ropes add to it."""
        return self._more([p.gain(start) for p in self.pulls], start)

    def from_nothing(self, negative: Sequence[Value], unknown: Value) -> Response:
        """The frictionless answer with the ropes' friction."""
        return self._more([p.of(negative, unknown) for p in self.pulls], Response(list(negative), unknown))

    def _more(self, gains: Sequence[Value], start: Response) -> Response:
        rows, unknown = start.rows, start.unknown
        for line, response in zip(self.inverse, self.responses, strict=True):
            pull: Value = 0.0
            for a, b in zip(line, gains, strict=True):
                pull = plus(pull, times(a, b))
            rows = [plus(z, times(pull, r)) for z, r in zip(rows, response.rows, strict=True)]
            unknown = plus(unknown, times(pull, response.unknown))
        return Response(rows, unknown)


def drags(chain: Chain, drive: Drive, ways: Sequence[Value], pulls: Sequence[Pull]) -> Drags:
    """Friction of the ropes.

    ways  for each rope which way the drive moves, +1 or -1
    """
    if not chain.drags:
        return Drags()
    parts, columns, responses = [], [], []
    for (number, drag), sense in zip(chain.drags, ways, strict=True):
        spans = drag.spans(drive.closed.at)
        ratios = _parts(chain, drag, drive, sense, spans)
        column: Column = [0.0] * chain.columns
        for part, span in zip(ratios[:-1], spans[:-1], strict=True):
            add_pushes(column, less(part, 1.0), span)
        parts.append(ratios)
        columns.append(column)
        responses.append(drive.respond(column, _strained(chain, drive, number, ratios)))
    gain = [[p.gain(r) for r in responses] for p in pulls]
    inverse, jammed = _inverse(gain)
    return Drags(parts, list(pulls), columns, responses, inverse, jammed)


def _strained(chain: Chain, drive: Drive, number: int, parts: Sequence[Value]) -> Sequence[Value]:
    """What the difference to an even pull strains by acting on pins themselves."""
    if chain.sharing is None:
        return ()
    joint: Any = chain.joints[number]
    more = joint.contacts(drive.closed.at, [less(part, 1.0) for part in parts])
    return chain.sharing.beside(drive.closed.at, [(c.on_pin, 1.0, (c.site.member, c.fx, c.fy, 0.0)) for c in more])


def _parts(chain: Chain, drag: Drag, drive: Drive, sense: Value, spans: Sequence[Sequence[Push]]) -> list[Value]:
    """Pull in each part over that in the last. It runs on over a place as fast as the parts before it get shorter."""
    one: Column = [0.0] * chain.columns
    beyond: list[Value] = []
    for span, ratio in zip(spans, drag.ratios(drive.closed.at), strict=False):
        add_pushes(one, 1.0, span)
        if isinstance(ratio, float) and ratio == 1.0:
            beyond.append(1.0)
            continue
        way = np.sign(sense * drive.moving(chain, one))
        beyond.append(np.where(way > 0, ratio, np.where(way < 0, 1.0 / ratio, 1.0)))
    out: list[Value] = [1.0]
    for step in reversed(beyond):
        out.append(out[-1] if isinstance(step, float) and step == 1.0 else out[-1] / step)
    return out[::-1]


def _inverse(gain: list[list[Value]]) -> tuple[list[list[Value]], Mask | None]:
    """Of 1 - G. Friction raised from nothing to t of itself gives 1 - t G: it jams if that was singular on the way."""
    m = len(gain)
    if m == 1:
        left = np.asarray(1.0 - gain[0][0])
        jammed = ~(left > 0)
        return [[np.where(jammed, np.nan, 1.0 / np.where(jammed, 1.0, left))]], jammed if jammed.any() else None
    shape = np.broadcast_shapes((1, 1, 1), *(np.shape(g) for row in gain for g in row))
    stacked: Array = np.stack([np.stack([np.broadcast_to(g, shape) for g in row], -1) for row in gain], -2)
    sound = np.asarray(np.isfinite(stacked).all(axis=(-2, -1), keepdims=True))
    roots = np.linalg.eigvals(np.where(sound, stacked, 0.0))
    stuck: Mask = np.asarray(~sound[..., 0, 0] | ((np.abs(roots.imag) < 1e-12) & (roots.real >= 1)).any(axis=-1))
    left = np.eye(m) - np.where(stuck[..., np.newaxis, np.newaxis], 0.0, stacked)
    inverse = np.asarray(np.linalg.inv(left), np.float64)
    inverse[stuck] = np.nan
    return [[inverse[..., i, j] for j in range(m)] for i in range(m)], stuck if stuck.any() else None
