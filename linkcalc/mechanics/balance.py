"""Statics of closed poses: the effort (or the load) from virtual work, then every joint force from equilibrium.

With the Jacobian J of joints and drive, and Q what pushes: Jᵀ λ + Q = 0. The multipliers λ of the joints are their
forces; the last one, of the drive, is what the drive would have to hold, and must vanish when the unknown is right.
The unknown itself follows from the speeds v = dq/d(drive): v·Q = 0. That the last multiplier then is nothing is the
built-in check of equilibrium against virtual work.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from typing import Any

import numpy as np

from linkcalc.mechanics.batch import tops
from linkcalc.mechanics.chain import Chain, pins_strained
from linkcalc.mechanics.drag import Drive, Response
from linkcalc.mechanics.friction import Rubbed, rub
from linkcalc.mechanics.motion import Closed, fastest
from linkcalc.mechanics.pushing import Column, Pushing, acts, add_pushes, column, sized_pushers, strength, unknown
from linkcalc.mechanics.state import Status
from linkcalc.mechanics.sums import dot
from linkcalc.parts.pose import Array, Codes, Mask, Value, zero

DEAD = 1e-9  # speed of the effort, over the fastest in the mechanism, below which no answer is given


@dataclass(frozen=True, eq=False)
class Balance:
    """Statics of a batch; arrays (case, variant, pose) or floats, NaN where there is none.

    effort, load  [N] or [N m]; tare is the effort with the load away
    effort_speed, load_speed  speed of effort and load along their own direction, per unit of the drive
    multipliers   one a row of the chain: joint forces, then the drive's, which must vanish
    unbalance     largest generalised force left over, over the largest force that acts
    disagreement  of equilibrium and virtual work, over the size of the effort
    status        Status of each entry
    frictionless  what the effort would be without friction
    friction      friction (or the like) of each of the chain's rubs, along its push [N] or [N m]
    parts         for each of the chain's drags the pulls in its parts over that in its last
    seals         friction within each of the pushers, along its push [N]; empty if none has any
    acting        all of that as sizes, each with what it does to the coordinates for 1
    several       where friction has another answer beside the one told; None: nowhere that is known
    """

    effort: Value
    load: Value
    tare: Value
    effort_speed: Value
    load_speed: Value
    multipliers: list[Value]
    unbalance: Array
    disagreement: Array
    status: Codes
    frictionless: Value = np.nan
    friction: list[Value] = field(default_factory=list)
    parts: list[list[Value]] = field(default_factory=list)
    seals: list[Value] = field(default_factory=list)
    acting: list[tuple[Value, Column]] = field(default_factory=list)
    several: Mask | None = None

    @property
    def force_ratio(self) -> Value:
        """Load over effort; NaN in a case that has no load."""
        with np.errstate(all="ignore"):
            return np.divide(np.where(np.equal(self.load, 0.0), np.nan, self.load), self.effort)

    @property
    def ideal_ratio(self) -> Value:
        """Velocity ratio of the geometry alone; NaN without a load."""
        if zero(self.load_speed):
            return np.nan
        with np.errstate(all="ignore"):
            return -np.divide(self.effort_speed, self.load_speed)


def balance(chain: Chain, closed: Closed, pushing: Pushing, *, checked: bool = True) -> Balance:
    """Solve the statics of a batch of closed poses.

    checked  put the forces back into the equations; else ``unbalance`` and ``disagreement`` are NaN
    """
    at, speed, n = closed.at, closed.speed, chain.columns
    rest = column(pushing.rest, at, n, unit=False)
    given, giving = chain.given(at, chain.floor) if chain.gives else ([], [])
    add_pushes(rest, 1.0, giving)
    load_unit = column(pushing.load, at, n, unit=True)
    effort_unit = column(pushing.effort, at, n, unit=True)
    rest_power, load_speed, effort_speed = (_power(speed, q) for q in (rest, load_unit, effort_unit))
    effort: Value = np.nan
    load: Value = np.nan
    tare: Value = np.nan
    dead: Mask | None = None
    with np.errstate(all="ignore"):
        if pushing.load and not pushing.load_asked:
            load = strength(pushing.load, at)
        if pushing.load_asked:
            effort = strength(pushing.effort, at) if pushing.effort else 0.0
            load = -np.divide(rest_power + effort * effort_speed, load_speed)
            dead = _dead(chain, speed, load_unit, load_speed)
        elif pushing.effort:
            tare = -np.divide(rest_power, effort_speed)
            effort = tare - np.divide(load * load_speed, effort_speed) if pushing.load else tare
            dead = _dead(chain, speed, effort_unit, effort_speed)
        if dead is not None and dead.any():
            effort, load, tare = (np.where(dead, np.nan, v) for v in (effort, load, tare))
        lost = _lost(closed)
        if lost is not None:
            told = (effort, load, tare, effort_speed, load_speed)
            effort, load, tare, effort_speed, load_speed = (np.where(lost, np.nan, v) for v in told)
        total = _sum(
            rest, (load, load_unit) if pushing.load else None, (effort, effort_unit) if pushing.effort else None
        )
        beside = pins_strained(chain, at, sized_pushers(pushing, at, effort, load))
        negative = closed.factored.solve([*total, *beside], transposed=True)
        frictionless = effort
        rubbed = Rubbed()
        if (pushing.rubbing and speed) or any(one.always for _, one in chain.rubs):
            asked, asked_speed = (load_unit, load_speed) if pushing.load_asked else (effort_unit, effort_speed)
            sense = pushing.sense * (pushing.forward or np.sign(effort_speed))
            start = Response(negative, load if pushing.load_asked else effort)
            strained = pins_strained(chain, at, acts(pushing.load if pushing.load_asked else pushing.effort))
            drive = Drive(closed, asked, asked_speed, strained)
            rubbed = rub(chain, drive, pushing, sense, start, [-g for g in given])
            total = _sum(total, (rubbed.unknown - start.unknown, asked), *rubbed.acting)
            frictionless = effort if pushing.load_asked else rubbed.frictionless
            effort, load = (effort, rubbed.unknown) if pushing.load_asked else (rubbed.unknown, load)
            negative = rubbed.negative
        if chain.floor and speed:
            effort, frictionless, tare = (_cleared(chain, speed, e, effort_speed) for e in (effort, frictionless, tare))
        unbalance = disagreement = _UNCHECKED
        if checked:
            unbalance, disagreement = _checks(chain, closed.entries, negative, total, effort_unit, effort_speed, effort)
    multipliers = chain.whole([-v if lost is None else np.where(lost, np.nan, -v) for v in negative], given)
    status = _status(closed, multipliers, dead, len(pushing.cases))
    if rubbed.jammed is not None:
        status = np.where(rubbed.jammed & (status == Status.SINGULAR), np.int8(Status.JAMMED), status)
    whole = Balance(
        effort,
        load,
        tare,
        effort_speed,
        load_speed,
        multipliers,
        unbalance,
        disagreement,
        status,
        frictionless,
        rubbed.amounts,
        rubbed.parts,
        rubbed.seals,
        rubbed.acting,
        rubbed.several,
    )
    without = unknown(pushing.all, at)
    return whole if without is None else failed(whole, without & closed.fine, Status.NO_FORCE)


def _lost(closed: Closed) -> Mask | None:
    """Where there is no pose to speak of, or one that the joints do not hold: nothing is told. None: nowhere."""
    lost = closed.factored.singular
    if closed.fine.all():
        return lost
    return ~closed.fine if lost is None else lost | ~closed.fine


def failed(told: Balance, where: Mask, status: Status) -> Balance:
    """The same with some entries failed: not a number, and a status that says why."""
    shape = told.status.shape
    names = ("effort", "load", "tare", "effort_speed", "load_speed", "frictionless")
    masked: Any = {name: np.where(where, np.nan, getattr(told, name)) for name in names}
    multipliers: list[Value] = [np.where(where, np.nan, m) for m in told.multipliers]
    friction: list[Value] = [np.where(where, np.nan, f) for f in told.friction]
    codes = np.where(np.broadcast_to(where, shape), np.int8(status), told.status)
    return replace(told, **masked, multipliers=multipliers, friction=friction, status=codes)


def _cleared(chain: Chain, speed: Sequence[Value], effort: Value, effort_speed: Value) -> Value:
    """What is nothing but rounding of forces that follow from how far something gives is nothing."""
    return np.where(np.abs(effort * effort_speed) <= chain.floor * fastest(chain, speed), 0.0, effort)


def _power(speed: Sequence[Value], push: Column) -> Value:
    return dot(speed, push) if speed else 0.0


_UNCHECKED = np.full((1, 1, 1), np.nan)


def _dead(chain: Chain, speed: Sequence[Value], push: Column, power: Value) -> Mask | None:
    """Where an effort does no work though the mechanism moves: nothing finite answers there. None: nowhere."""
    # one bound for the whole batch settles nearly every batch, and costs no temporary arrays
    top = max((t * size for t, size in zip(tops(speed), chain.sizes, strict=True)), default=0.0)
    force = max(t / size for t, size in zip(tops(push), chain.sizes, strict=True))
    if float(np.min(np.abs(power))) > DEAD * top * force:
        return None
    return np.asarray(np.abs(power) <= DEAD * fastest(chain, speed) * _strongest(chain, push))


def _strongest(chain: Chain, push: Column) -> Value:
    """Largest generalised force, moments counted at the size of the mechanism."""
    force: Value = 0.0
    for q, size in zip(push, chain.column_size, strict=True):
        if not zero(q):
            force = np.maximum(force, np.abs(q) / size)
    return force


def _sum(rest: Column, *more: tuple[Value, Column] | None) -> Column:
    total = list(rest)
    for item in more:
        if item is None:
            continue
        size, unit = item
        for k, q in enumerate(unit):
            if not zero(q):
                total[k] = total[k] + size * q
    return total


def _checks(
    chain: Chain,
    entries: Sequence[Value],
    negative: Sequence[Value],
    total: Column,
    effort_unit: Column,
    effort_speed: Value,
    effort: Value,
) -> tuple[Array, Array]:
    """What is left of the equations of equilibrium, and of the drive's multiplier; places that are held do not hold."""
    held = range(chain.joint_rows, chain.joint_rows + len(chain.holds))
    left: Column = [-q if not zero(q) else 0.0 for q in total]
    for (i, j), e in zip(chain.places, entries, strict=True):
        if not (zero(negative[i]) or i in held):
            left[j] = left[j] + e * negative[i]
    most: Value = 1e-300
    for m, size in zip([*negative, *total], [*(1.0 / chain.row_size), *(1.0 / chain.column_size)], strict=True):
        if not zero(m):
            most = np.maximum(most, np.abs(m) if size == 1.0 else np.abs(m) * size)
    over: Value = 0.0
    for m, size in zip(left, 1.0 / chain.column_size, strict=True):
        if not zero(m):
            over = np.maximum(over, np.abs(m) if size == 1.0 else np.abs(m) * size)
    unbalance = np.asarray(over / most, float)
    if not any(not zero(q) for q in effort_unit) or chain.rows == chain.joint_rows:
        return unbalance, np.zeros_like(unbalance)
    work = np.maximum(np.abs(effort * effort_speed), DEAD * most * (chain.size if chain.row_size[-1] != 1.0 else 1.0))
    return unbalance, np.asarray(np.abs(negative[-1]) / work, float)


def _status(closed: Closed, multipliers: Sequence[Value], dead: Mask | None, cases: int) -> Codes:
    # cases that turn out alike are several all the same: who asks for the second must find it
    shape = np.broadcast_shapes((cases, 1, 1), closed.fine.shape, *{np.shape(m) for m in multipliers})
    status = np.zeros(shape, np.int8)
    for m, top in zip(multipliers, tops(multipliers), strict=True):
        if not math.isfinite(top):
            status[np.broadcast_to(~np.isfinite(m), shape)] = Status.SINGULAR
    if dead is not None:
        status[np.broadcast_to(dead, shape)] = Status.DEAD_POINT
    if not closed.fine.all():
        status[~np.broadcast_to(closed.fine, shape)] = Status.OUT_OF_REACH
    return status


def part_of_motion(chain: Chain, closed: Closed, pushing: Pushing) -> tuple[Array, Array]:
    """Speed of effort and load along their own direction over the fastest motion in the mechanism, 0 at a dead point.

    Two arrays (case, variant, pose); 1 where there is no effort or load.
    """
    out = [np.ones((1, 1, 1)), np.ones((1, 1, 1))]
    top = fastest(chain, closed.speed)
    for k, acting in enumerate((pushing.effort, pushing.load)):
        if acting:
            push = column(acting, closed.at, chain.columns, unit=True)
            whole = np.asarray(top * _strongest(chain, push))
            part = np.abs(_power(closed.speed, push)) / np.where(whole > 0, whole, 1.0)
            out[k] = np.ones((1, 1, 1)) * np.where(whole > 0, part, 1.0)
    return out[0], out[1]
