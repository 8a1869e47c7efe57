"""Friction: what each joint's reaction costs, solved together with the reactions it depends on.

Statics is linear in the frictions: every multiplier, and the effort, is its frictionless value plus a response to each
friction of 1. So all that is left is one unknown a rubbing joint, its normal force (see ``normals``).

What teeth push each other apart with is such an unknown too, but pushes the same way in either sense of motion: it
is no friction, and belongs to the frictionless answer.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np

from linkcalc.mechanics.arith import plus, times
from linkcalc.mechanics.chain import Chain, pins_strained
from linkcalc.mechanics.drag import Drags, Drive, Pull, Response, drags
from linkcalc.mechanics.normals import Normals, Side, normals
from linkcalc.mechanics.pushing import Column, Pushing, add_pushes, present, seal, through
from linkcalc.parts.lines import rubless
from linkcalc.parts.pose import Mask, Value


@dataclass(frozen=True, eq=False)
class Rubbed:
    """Friction of a batch, (case, variant, pose).

    unknown  what the unknown (effort or load) becomes; NaN here means that nothing rubs
    frictionless  the same with only what always pushes
    negative the multipliers, negative, friction counted
    amounts  friction force or couple of each rub, along its push, signed [N] or [N m]
    parts    for each rope that loses on its pulleys the pulls in its parts over that in its last
    seals    friction within each pusher, along its push [N]; empty if none has any
    acting   all of it as sizes, each with what it does to the coordinates for 1
    jammed   where there is no answer, None: nowhere
    several  where there is another answer besides, None: nowhere
    """

    unknown: Value = np.nan
    frictionless: Value = np.nan
    negative: list[Value] = field(default_factory=list)
    amounts: list[Value] = field(default_factory=list)
    parts: list[list[Value]] = field(default_factory=list)
    seals: list[Value] = field(default_factory=list)
    acting: list[tuple[Value, Column]] = field(default_factory=list)
    jammed: Mask | None = None
    several: Mask | None = None


def rub(chain: Chain, drive: Drive, pushing: Pushing, sense: Value, bare: Response, given: Sequence[Value]) -> Rubbed:
    """Add friction and the like to an answer without: first that of seals, which is known, then that of ropes, which
    is in proportion to their pull, at last that of pins and guides, which hangs on all of it.

    sense  which way the drive moves, +1 or -1: float or (case, 1, 1)
    bare   the answer without
    given  negative multipliers of the rows that give, which their gaps tell
    """
    found, slack = _rub(chain, drive, pushing, [sense] * len(chain.drags), sense, bare, given)
    if any(np.any(mask) for mask in slack):
        # no rope: a warning tells it. Where it would have to push, friction still must not give power
        ways = [np.where(mask, -1.0, 1.0) * sense for mask in slack]
        found, _ = _rub(chain, drive, pushing, ways, sense, bare, given)
    return found


def _rub(
    chain: Chain, drive: Drive, pushing: Pushing, ways: Sequence[Value], sense: Value, bare: Response,
    given: Sequence[Value],
) -> tuple[Rubbed, list[Mask]]:  # fmt: skip
    """The same, with which way each rope resists; and where ropes would have to push."""
    rubbing = pushing.rubbing and drive.moves
    seals, held = _sealed(chain, drive, pushing, sense) if rubbing else ([], [])
    start = bare
    for amount, column, beside in held:
        start = _with(start, amount, drive.respond(column, beside))
    pulls = [_pull(chain, pushing, drive, k) for k, _ in chain.drags] if rubbing else []
    ropes = drags(chain, drive, ways, pulls) if rubbing else Drags()
    if pulls:
        start = ropes.from_nothing(start.rows, start.unknown)
    columns, plain, weights = [], [], []
    for number, one in chain.rubs:
        push: Column = [0.0] * chain.columns
        pushes = one.push(drive.closed.at)
        add_pushes(push, 1.0, pushes)
        columns.append(push)
        on_pin = [(chain.joints[number].on_pin, 1.0, pushes[0])]
        plain.append(drive.respond(push, chain.sharing.beside(drive.closed.at, on_pin) if chain.sharing else ()))
        weights.append(one.factor if one.always else -one.factor * np.sign(sense * drive.moving(chain, push)))
    responses = [ropes.through(one) for one in plain] if pulls else plain
    found = _normals(chain, start, responses, weights, given)
    amounts: list[Value] = [w * n for w, n in zip(weights, found.sizes, strict=True)]
    for amount, response in zip(amounts, responses, strict=True):
        start = _with(start, amount, response)
    dragged = [(p.of(start.rows, start.unknown), c) for p, c in zip(pulls, ropes.columns, strict=True)]
    acting = [*((amount, column) for amount, column, _ in held), *dragged, *zip(amounts, columns, strict=True)]
    jammed = found.jammed
    if ropes.jammed is not None:
        jammed = ropes.jammed if jammed is None else jammed | ropes.jammed
    slack = [np.asarray(pull < 0) for pull, _ in dragged]
    without = _frictionless(chain, bare, plain, weights, given) if rubbing else start.unknown
    told = Rubbed(
        start.unknown, without, start.rows, amounts, ropes.parts, seals, acting, jammed, found.several
    )  # fmt: skip
    return told, slack


def _frictionless(
    chain: Chain, bare: Response, plain: Sequence[Response], weights: Sequence[Value], given: Sequence[Value]
) -> Value:
    """The unknown with only what always pushes."""
    if not any(one.always for _, one in chain.rubs):
        return bare.unknown
    always = [w if one.always else 0.0 for w, (_, one) in zip(weights, chain.rubs, strict=True)]
    told = bare.unknown
    for weight, size, response in zip(always, _normals(chain, bare, plain, always, given).sizes, plain, strict=True):
        told = told + weight * size * response.unknown
    return told


def _normals(
    chain: Chain, start: Response, responses: Sequence[Response], weights: Sequence[Value], given: Sequence[Value]
) -> Normals:
    if not chain.rubs:
        return Normals([])
    still = [0.0] * len(given)
    whole = [chain.whole(r.rows, still) for r in responses]
    return normals(_reactions(chain, chain.whole(start.rows, given), whole), weights)


def _with(start: Response, amount: Value, one: Response) -> Response:
    rows = [plus(z, times(amount, r)) for z, r in zip(start.rows, one.rows, strict=True)]
    return Response(rows, start.unknown + amount * one.unknown)


def _pull(chain: Chain, pushing: Pushing, drive: Drive, joint: int) -> Pull:
    """Where the pull of a rope comes from."""
    if chain.joints[joint].angular:
        return Pull(chain.row_joint.index(joint))
    return Pull(None, *through(pushing, chain.joints[joint].name, drive.closed.at))


def _sealed(
    chain: Chain, drive: Drive, pushing: Pushing, sense: Value
) -> tuple[list[Value], list[tuple[Value, Column, list[Value]]]]:
    """Friction within each pusher, along its push; and of those that have any with what it does and strains for 1."""
    seals: list[Value] = []
    held: list[tuple[Value, Column, list[Value]]] = []
    for acting in pushing.all:
        within = seal(acting)
        if rubless(within):
            seals.append(0.0)
            continue
        push: Column = [0.0] * chain.columns
        add_pushes(push, 1.0, acting.pusher.push(drive.closed.at))
        seals.append(-within * present(acting) * np.sign(sense * drive.moving(chain, push)))
        held.append((seals[-1], push, pins_strained(chain, drive.closed.at, [(acting, 1.0)])))
    return (seals, held) if held else ([], [])


def _reactions(chain: Chain, start: Sequence[Value], responses: Sequence[Sequence[Value]]) -> list[list[list[Side]]]:
    """The components that the normal force of each rub is made of, as they hang on the frictions."""

    def along(rows: Sequence[Value], form: Sequence[Value], first: int) -> Value:
        total: Value = 0.0
        for row, coefficient in enumerate(form, first):
            total = plus(total, times(coefficient, rows[row]))
        return total

    return [
        [
            [(along(start, form, chain.first_row[k]), [along(r, form, chain.first_row[k]) for r in responses])
             for form in part]
            for part in one.normals
        ]
        for k, one in chain.rubs
    ]  # fmt: skip
