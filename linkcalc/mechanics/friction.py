"""Friction: what each joint's reaction costs, solved together with the reactions it depends on.

Statics is linear in the frictions: every multiplier, and the effort, is its frictionless value plus a response to each
friction of 1. So all that is left is one unknown a rubbing joint, its normal force N = |reaction(N)|. From the
frictionless values the iteration N <- |reaction(N)| contracts by about the friction angle; where it does not (close to
jamming), Newton goes on, with the friction raised step by step from nothing. What then finds no answer jams.

What teeth push each other apart with is such an unknown too, but pushes the same way in either sense of motion: it
is no friction, and belongs to the frictionless answer.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.motion import Closed
from linkcalc.mechanics.pushing import Column, add_pushes
from linkcalc.parts.contract import Rub
from linkcalc.parts.pose import Array, Mask, Value

_ROUNDS = 40
_CLOSE = 1e-14  # of the largest normal force: no use in going on
_SURE = 1e-13  # of the largest normal force: what is not that close goes to Newton
_RAISES = 10
_NEWTON = 30


@dataclass(frozen=True, eq=False)
class Rubbed:
    """Friction of a batch, (case, variant, pose).

    amounts  force or couple of each rub, along its push, signed [N] or [N m]
    columns  what each does to the coordinates, for 1
    unknown  what the unknown (effort or load) becomes
    frictionless  the same with only what always pushes
    negative the multipliers, negative, friction counted
    jammed   where there is no answer, None: nowhere
    """

    amounts: list[Value]
    columns: list[Column]
    unknown: Value
    frictionless: Value
    negative: list[Value]
    jammed: Mask | None


def rub(
    chain: Chain, closed: Closed, sense: Value, unit: Column, unit_speed: Value,
    unknown: Value, negative: Sequence[Value], given: Sequence[Value], beside: Sequence[Value] = (),
) -> Rubbed:  # fmt: skip
    """Add friction and the like to an answer without. A chain that is not driven has no friction.

    sense       which way the drive moves, +1 or -1: float or (case, 1, 1)
    unit        what the unknown does to the coordinates for a strength of 1; unit_speed its speed along itself
    unknown, negative  the answer without
    given       negative multipliers of the rows that give, which their gaps tell
    beside      what the unknown strains beside that, see ``Sharing.beside``
    """
    columns, responses, weights = [], [], []
    for number, one in chain.rubs:
        push: Column = [0.0] * chain.columns
        pushes = one.push(closed.at)
        add_pushes(push, 1.0, pushes)
        speed = _power(closed.speed, push) if closed.speed else 0.0
        answer = -np.divide(speed, unit_speed) if closed.speed else 0.0
        whole = [_sum(q, _times(answer, u)) for q, u in zip(push, unit, strict=True)]
        columns.append(push)
        if chain.sharing is not None:
            own = chain.sharing.beside(closed.at, [(chain.joints[number].on_pin, 1.0, pushes[0])])
            whole += [_sum(q, _times(answer, u)) for q, u in zip(own, beside, strict=True)]
        responses.append((closed.factored.solve(whole, transposed=True), answer))
        weights.append(one.factor if one.always else -one.factor * np.sign(sense * speed))
    still = [0.0] * len(given)
    before, gained = chain.whole(negative, given), [chain.whole(r, still) for r, _ in responses]
    amounts, jammed = _amounts(chain, before, gained, weights)
    rows = list(negative)
    for amount, (response, _) in zip(amounts, responses, strict=True):
        rows = [_sum(z, _times(amount, r)) for z, r in zip(rows, response, strict=True)]
    answers = [answer for _, answer in responses]
    told = frictionless = _answered(unknown, amounts, answers)
    if chain.rubbing:
        always = [w if one.always else 0.0 for w, (_, one) in zip(weights, chain.rubs, strict=True)]
        if any(one.always for _, one in chain.rubs):
            without, _ = _amounts(chain, before, gained, always)
            frictionless = _answered(unknown, without, answers)
        else:
            frictionless = unknown
    return Rubbed(amounts, columns, told, frictionless, rows, jammed)


def _answered(unknown: Value, amounts: Sequence[Value], answers: Sequence[Value]) -> Value:
    for amount, answer in zip(amounts, answers, strict=True):
        unknown = _sum(unknown, _times(amount, answer))
    return unknown


def _amounts(
    chain: Chain, negative: Sequence[Value], responses: Sequence[Sequence[Value]],
    weights: Sequence[Value],
) -> tuple[list[Value], Mask | None]:  # fmt: skip
    """Friction of each rub: weight times normal force, the normal forces found together."""
    forms = [_forms(chain, k, one) for k, one in chain.rubs]

    def reaction(rows: Sequence[Value], form: Sequence[tuple[int, Value]]) -> Value:
        total: Value = 0.0
        for row, coefficient in form:
            total = _sum(total, _times(coefficient, rows[row]))
        return total

    base = [[[reaction(negative, f) for f in part] for part in parts] for parts in forms]
    gain = [[[[reaction(r, f) for r in responses] for f in part] for part in parts] for parts in forms]

    def normal(k: int, amounts: Sequence[Value]) -> Value:
        total: Value = 0.0
        for part, gains in zip(base[k], gain[k], strict=True):
            sides = []
            for value, each in zip(part, gains, strict=True):
                side = value
                for other, amount in zip(each, amounts, strict=True):
                    side = _sum(side, _times(other, amount))
                sides.append(side)
            total = _sum(total, np.abs(sides[0]) if len(sides) == 1 else np.hypot(sides[0], sides[1]))
        return total

    every = range(len(forms))
    normals = [normal(k, [0.0 for _ in every]) for k in every]
    apart: Value = np.inf
    coming: Value = np.inf
    for _ in range(_ROUNDS):
        amounts = [w * n for w, n in zip(weights, normals, strict=True)]
        following = [normal(k, amounts) for k in every]
        last, apart = apart, _largest([np.abs(np.subtract(a, b)) for a, b in zip(following, normals, strict=True)])
        normals = following
        # what the next round would still change is foretold by how much less this one changed than the last
        with np.errstate(all="ignore"):
            coming = apart * np.where(np.isfinite(last), np.minimum(np.divide(apart, last), 1.0), 1.0)
        if not np.any(coming > _CLOSE * _largest(following)):
            break
    doubt = ~(np.asarray(coming) <= _SURE * _largest(normals))
    jammed: Mask | None = None
    if doubt.any():
        normals, jammed = _raised(base, gain, weights, normals, doubt)
    return [w * n for w, n in zip(weights, normals, strict=True)], jammed


def _raised(
    base: list[list[list[Value]]],
    gain: list[list[list[list[Value]]]],
    weights: Sequence[Value],
    normals: Sequence[Value],
    doubt: Mask,
) -> tuple[list[Value], Mask | None]:
    """Newton on the entries in doubt, the friction raised from nothing; those without an answer jam."""
    shape = np.broadcast_shapes(doubt.shape, *(np.shape(n) for n in normals), *(np.shape(w) for w in weights))
    where = np.nonzero(np.broadcast_to(doubt, shape))
    m = len(normals)

    def pick(value: Value) -> Array:
        return np.broadcast_to(value, shape)[where]

    w = np.stack([pick(x) for x in weights], axis=1)  # (picked, m)
    parts = [
        [(np.stack([pick(v) for v in part], 1), np.stack([np.stack([pick(g) for g in each], 1) for each in gains], 1))
         for part, gains in zip(base[k], gain[k], strict=True)]
        for k in range(m)
    ]  # fmt: skip
    n = np.zeros((where[0].size, m))
    good = np.ones(where[0].size, bool)
    for scale in np.linspace(0.0, 1.0, _RAISES + 1):
        for _ in range(_NEWTON):
            found, slope = np.zeros_like(n), np.zeros((*n.shape, m))
            for k in range(m):
                for b, g in parts[k]:
                    sides = b + scale * np.einsum("ifj,ij->if", g, w * n)
                    size = np.linalg.norm(sides, axis=1)
                    found[:, k] += size
                    lead = np.divide(sides, size[:, None], out=np.zeros_like(sides), where=size[:, None] > 0)
                    slope[:, k] += scale * np.einsum("if,ifj->ij", lead, g) * w
            gap = found - n
            with np.errstate(all="ignore"):
                matrix = slope - np.eye(m)
                finite = np.isfinite(matrix).all(axis=(1, 2)) & np.isfinite(gap).all(axis=1)
                step = np.zeros_like(n)
                if finite.any():
                    step[finite] = _solved(matrix[finite], gap[finite])
            n = n - step
            if np.all(np.abs(step) <= 1e-14 * np.maximum(np.abs(n).max(axis=1, keepdims=True), 1e-300)):
                break
        # a normal force is no minus: past the pose where it ran to infinity it would come back from the other side
        good &= np.isfinite(n).all(axis=1) & (n >= -1e-9 * np.abs(n).max(axis=1, keepdims=True)).all(axis=1)
        good &= np.abs(gap).max(axis=1) <= 1e-9 * np.maximum(np.abs(n).max(axis=1), 1e-300)
    out: list[Value] = []
    for k in range(m):
        full = np.array(np.broadcast_to(normals[k], shape), float)
        full[where] = np.where(good, n[:, k], np.nan)
        out.append(full)
    jammed = np.zeros(shape, bool)
    jammed[where] = ~good
    return out, jammed if jammed.any() else None


def _solved(matrix: Array, gap: Array) -> Array:
    try:
        return np.asarray(np.linalg.solve(matrix, gap[:, :, None])[:, :, 0], np.float64)
    except np.linalg.LinAlgError:
        return np.full(gap.shape, np.nan)


def _forms(chain: Chain, joint: int, one: Rub) -> list[list[list[tuple[int, Value]]]]:
    first = chain.first_row[joint]
    return [[[(first + i, c) for i, c in enumerate(form)] for form in part] for part in one.normals]


def _largest(values: Sequence[Value]) -> Value:
    top: Value = 0.0
    for value in values:
        top = np.maximum(top, value)
    return top


def _power(speed: Sequence[Value], push: Column) -> Value:
    total: Value = 0.0
    for v, q in zip(speed, push, strict=True):
        total = _sum(total, _times(q, v))
    return total


def _zero(value: Value) -> bool:
    return isinstance(value, float) and value == 0.0


def _times(a: Value, b: Value) -> Value:
    if _zero(a) or _zero(b):
        return 0.0
    return b if isinstance(a, float) and a == 1.0 else a * b


def _sum(a: Value, b: Value) -> Value:
    if _zero(a):
        return b
    return a if _zero(b) else a + b
