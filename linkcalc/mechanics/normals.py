"""Normal forces of rubbing joints that hang on each other: N = |b + G (w N)|, in every entry of a batch.

From the frictionless N = |b| the iteration contracts by about the angle of friction; where it does not (close to
jamming), Newton goes on, with the friction raised step by step from nothing. What then finds no answer jams. One answer
only is certain where the iteration contracts everywhere; where that is not certain others are looked for.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.batch import tops
from linkcalc.parts.pose import Array, Mask, Numbers, Value, zero

_ROUNDS = 40
_CLOSE = 1e-13  # of the largest normal force: no use in going on
_SURE = 1e-12  # of the largest normal force: what is not that close goes to Newton
_RAISES = 10
_NEWTON = 30
_APART = 1e-6  # of the largest normal force: farther apart are two answers
_STARTS = (3.0, 30.0)  # of the normal forces without friction: where other answers are looked for from
_SEARCHED = 4096  # entries: more at once are copies by the thousand, of which nobody reads a warning each

Side = tuple[Value, list[Value]]
"""One component of a reaction: without friction, and its response to a friction of 1 of each rub."""
Reaction = Sequence[Sequence[Side]]
"""The parts that a normal force is the sum of, each the components of a vector."""


@dataclass(frozen=True, eq=False)
class Normals:
    """Normal forces of all rubs.

    sizes    [N] each, (case, variant, pose); NaN where it jams
    jammed   where there is no answer; None: nowhere
    several  where there is another answer beside the one that hangs together with that without friction; None: nowhere
    """

    sizes: list[Array]
    jammed: Mask | None = None
    several: Mask | None = None


def normals(reactions: Sequence[Reaction], weights: Sequence[Value]) -> Normals:
    """Find them.

    reactions  of each rub the parts that its normal force is the sum of, each part the components of a vector
    weights    of each rub: friction over normal force, signed
    """
    values = [v for rub in reactions for part in rub for b, g in part for v in (b, *g)]
    shape = np.broadcast_shapes((1, 1, 1), *{np.shape(v) for v in (*values, *weights)})
    work = _Work(shape)
    found = [np.empty(shape) for _ in reactions]
    amounts: list[Value] = [0.0] * len(found)
    for rub, size in zip(reactions, found, strict=True):
        work.normal(rub, amounts, size)
    amounts = [np.multiply(w, n) for w, n in zip(weights, found, strict=True)]
    apart = coming = np.full(shape, np.inf)
    most = np.maximum.reduce(found) if found else apart
    new = np.empty(shape)
    for done in range(_ROUNDS):
        last, apart = apart, np.zeros(shape)
        for k, rub in enumerate(reactions):
            work.normal(rub, amounts, new)  # with what this round has found already
            np.subtract(new, found[k], out=work.side)
            np.maximum(apart, np.abs(work.side, out=work.side), out=apart)
            found[k], new = new, found[k]
            amounts[k] = np.multiply(weights[k], found[k])
        # what the next round would still change is foretold by how much less this one changed than the last
        coming = apart
        if done:
            slower = np.divide(apart, last, out=work.side)
            coming = apart * np.minimum(slower, 1.0, out=slower)
        if not np.any(coming > _CLOSE * most):
            break
    most = np.maximum.reduce(found)
    doubt: Mask = np.asarray(~(coming <= _SURE * most))
    open_: Mask | None = _open(reactions, weights, shape)
    if open_ is None and not doubt.any():
        return Normals(found)
    return _settled(reactions, weights, found, doubt, doubt if open_ is None else doubt | open_)


class _Work:
    """Arrays that are used again and again: half of the time would go into making new ones."""

    def __init__(self, shape: tuple[int, ...]):
        self.side, self._square, self._term = np.empty(shape), np.empty(shape), np.empty(shape)

    def normal(self, rub: Reaction, amounts: Sequence[Value], out: Array) -> None:
        """Normal force of a rub, with these frictions."""
        side, square, term = self.side, self._square, self._term
        for n, part in enumerate(rub):
            for f, (base, gains) in enumerate(part):
                side[...] = base
                for gain, amount in zip(gains, amounts, strict=True):
                    if not (zero(gain) or zero(amount)):
                        side += np.multiply(gain, amount, out=term)
                if len(part) > 1:
                    np.multiply(side, side, out=term if f else square)
                    if f:
                        square += term
            size = np.sqrt(square, out=square) if len(part) > 1 else np.abs(side, out=side)
            if n:
                out += size
            else:
                out[...] = size


def _open(reactions: Sequence[Reaction], weights: Sequence[Value], shape: tuple[int, ...]) -> Mask | None:
    """Where more than one answer cannot be ruled out: the largest row sum of |G w| is 1 or more. None: nowhere."""
    top = tops(list(weights))
    rows = [
        sum(_size([tops(g) for _, g in part], k) * most for part in rub for k, most in enumerate(top))
        for rub in reactions
    ]
    if max(rows) < 1:
        return None
    bound: Value = 0.0
    for rub in reactions:
        row = sum(
            np.abs(w) * np.sqrt(sum(np.square(g[k]) for _, g in part)) for part in rub for k, w in enumerate(weights)
        )
        bound = np.maximum(bound, row)
    found: Mask = np.array(np.broadcast_to(~(np.asarray(bound) < 1), shape))
    return found if found.any() else None


def _size(parts: Sequence[Sequence[float]], k: int) -> float:
    return float(sum(p[k] ** 2 for p in parts) ** 0.5)


def _settled(
    reactions: Sequence[Reaction],
    weights: Sequence[Value],
    found: list[Array],
    doubt: Mask,
    open_: Mask,
) -> Normals:
    """The entries in doubt by Newton, the friction raised from nothing; those without an answer jam. Of the open ones,
    whether there are others."""
    where = np.nonzero(open_)
    few = _Few(reactions, weights, where, open_.shape)
    n = np.stack([size[where] for size in found], axis=1)
    again = doubt[where]
    good = np.ones(len(n), bool)
    if again.any():
        raised, good = few.raised()
        n[again] = np.where(good[:, None], raised, np.nan)[again]
    several = np.zeros(open_.shape, bool)
    if len(n) <= _SEARCHED:
        several[where] = few.others(n) & ~(again & ~good)
    jammed = np.zeros(open_.shape, bool)
    jammed[where] = again & ~good
    for k, size in enumerate(found):
        size[where] = n[:, k]
    return Normals(found, jammed if jammed.any() else None, several if several.any() else None)


class _Few:
    """The same equations in a few picked entries, as arrays (picked, ...), for Newton."""

    def __init__(
        self, reactions: Sequence[Reaction], weights: Sequence[Value], where: tuple[Numbers, ...],
        shape: tuple[int, ...],
    ):  # fmt: skip
        def pick(value: Value) -> Array:
            return np.broadcast_to(value, shape)[where]

        self._w = np.stack([pick(x) for x in weights], axis=1)
        self._parts = [
            [
                (
                    np.stack([pick(b) for b, _ in part], 1),
                    np.stack([np.stack([pick(x) for x in g], 1) for _, g in part], 1),
                )
                for part in rub
            ]
            for rub in reactions
        ]

    def raised(self) -> tuple[Array, Mask]:
        """Answers that hang together with that without friction, and where there are any."""
        n = np.zeros_like(self._w)
        good = np.ones(len(n), bool)
        for scale in np.linspace(0.0, 1.0, _RAISES + 1):
            n, fine = self._newton(n, scale)
            good &= fine
        return n, good

    def others(self, known: Array) -> Mask:
        """Where Newton from elsewhere comes to another answer than the known one."""
        bare, _ = self._at(np.zeros_like(self._w), 1.0)
        several = np.zeros(len(known), bool)
        for k in range(self._w.shape[1]):
            for start in _STARTS:
                n = np.array(bare)
                n[:, k] = start * bare.max(axis=1)
                n, fine = self._newton(n, 1.0)
                several |= fine & (np.abs(n - known).max(axis=1) > _APART * np.abs(n).max(axis=1))
        return several

    def _at(self, n: Array, scale: float) -> tuple[Array, Array]:
        """|b + G w n|, and its slope by n."""
        found, slope = np.zeros_like(n), np.zeros((*n.shape, n.shape[1]))
        for k, parts in enumerate(self._parts):
            for b, g in parts:
                sides = b + scale * np.einsum("ifj,ij->if", g, self._w * n)
                size = np.linalg.norm(sides, axis=1)
                found[:, k] += size
                lead = np.divide(sides, size[:, None], out=np.zeros_like(sides), where=size[:, None] > 0)
                slope[:, k] += scale * np.einsum("if,ifj->ij", lead, g) * self._w
        return found, slope

    def _newton(self, n: Array, scale: float) -> tuple[Array, Mask]:
        """From n on, and where it has arrived at normal forces that are none below nothing."""
        gap = np.zeros_like(n)
        with np.errstate(all="ignore"):
            for _ in range(_NEWTON):
                found, slope = self._at(n, scale)
                gap = found - n
                matrix = slope - np.eye(n.shape[1])
                finite = np.isfinite(matrix).all(axis=(1, 2)) & np.isfinite(gap).all(axis=1)
                step = np.zeros_like(n)
                if finite.any():
                    step[finite] = _solved(matrix[finite], gap[finite])
                n = n - step
                if np.all(np.abs(step) <= 1e-14 * np.maximum(np.abs(n).max(axis=1, keepdims=True), 1e-300)):
                    break
            # a normal force is no minus: past the pose where it ran to infinity it would come back from the other side
            most = np.abs(n).max(axis=1)
            good = np.isfinite(n).all(axis=1) & (n >= -1e-9 * most[:, None]).all(axis=1)
            good &= np.abs(gap).max(axis=1) <= 1e-9 * np.maximum(most, 1e-300)
        return n, good


def _solved(matrix: Array, gap: Array) -> Array:
    try:
        return np.asarray(np.linalg.solve(matrix, gap[:, :, None])[:, :, 0], np.float64)
    except np.linalg.LinAlgError:
        return np.full(gap.shape, np.nan)
