"""Inner forces of a member: what holds it together at every cut, piece by piece along its body, in a batch of poses.

A cut parts the body in two. What acts on the branch beyond it is balanced by the force and moment in the cut:

    N  along the body, tension plus
    V  across it: slope of M; plus if the part before the cut pushes the part beyond it to the left
    M  bending moment: plus stretches the right side, seen along the body from its first point

which on a level member, walked from left to right, are the usual signs of a beam: sagging is plus. Between places
where something acts V' = q_n, N' = -q_t and M' = V for a load of q per length to the left and along the body, so that
M is at most a cubic of the way along a piece where the load changes evenly.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from linkcalc.mechanics.acts import Act
from linkcalc.mechanics.body import Body
from linkcalc.mechanics.spread import along_edges, cross, load_at, loaded_beyond, stacked
from linkcalc.parts.pose import Array, Mask, Numbers, Value

POWERS = 4
"""Of the polynomials along a piece: 1, x, x², x³."""


@dataclass(frozen=True, eq=False)
class Pieces:
    """The body in pieces without a load at a point between: polynomials of the way x from the start of each.

    edge     (piece, case or 1, variant, pose) number of the edge of the body
    start    [m] way along that edge where the piece begins; long [m] how long it is
    real     False for what is no piece here: one without length
    axial, shear, bending  (power, piece, case, variant, pose)
    spread   True if some load is spread along the member: else N and V are constant, M is straight
    """

    edge: Numbers
    start: Array
    long: Array
    real: Mask
    axial: Array
    shear: Array
    bending: Array
    spread: bool


@dataclass(frozen=True, eq=False)
class Largest:
    """The largest of something along a member: (case, variant, pose) each.

    value  with the sign it has there
    edge   number of the edge, -1 where there is no number
    way    [m] along that edge
    piece  number of the piece
    """

    value: Array
    edge: Numbers
    way: Array
    piece: Numbers


def pieces(body: Body, acts: Sequence[Act], shape: tuple[int, ...]) -> Pieces:
    """Cut a body at everything that acts on it.

    shape  (case, variant, pose) of the batch
    """
    spread = [a for a in acts if a.spread is not None]
    place = stacked([(a.u, a.v) for a in acts], shape)  # (act, 2, ...)
    force = stacked([(a.fu, a.fv) for a in acts], shape)
    moment = stacked([(a.moment,) for a in acts], shape)[:, 0] + cross(place, force)  # about the member's origin
    single = np.array([a.spread is None for a in acts], bool)
    place, force, moment = place[single], force[single], moment[single]
    load = along_edges(body, spread, shape)  # (edge, end, 2, ...) [N/m]
    act_edge, act_way = _attached(body, place)
    count = len(body.starts)
    still = np.broadcast_shapes((1, 1, 1), act_way.shape[1:])
    edge = np.concatenate([np.broadcast_to(np.arange(count)[:, None, None, None], (count, *still)), act_edge])
    start = np.concatenate([np.zeros((count, *still)), act_way])
    # the nearest place beyond on the same edge where something acts, or the end of the edge
    later = (act_edge[None] == edge[:, None]) & (act_way[None] > start[:, None])
    stop = np.min(np.where(later, act_way[None], np.inf), axis=1, initial=np.inf)
    stop = np.minimum(stop, body.long[edge])
    beyond = later | (body.beyond[edge[:, None], act_edge[None]])
    total = np.einsum("ka...,ai...->ki...", beyond.astype(float), force)
    about = np.einsum("ka...,a...->k...", beyond.astype(float), moment)
    if spread:
        more, turning = loaded_beyond(body, load, edge, start)
        total, about = total + more, about + turning
    at = body.nodes[np.array(body.starts)][edge] + start[..., None] * body.along[edge]
    at = np.moveaxis(at, -1, 1)
    about = about - cross(at, total)
    t = np.moveaxis(body.along[edge], -1, 1)
    axial, shear, bending = (np.zeros((POWERS, len(edge), *shape)) for _ in range(3))
    axial[0] = (t * total).sum(axis=1)
    shear[0] = -(t[:, 0] * total[:, 1] - t[:, 1] * total[:, 0])
    bending[0], bending[1] = about, shear[0]
    if spread:
        first, rise = load_at(body, load, edge, start)
        for k, q in enumerate((first, rise), 1):
            axial[k] = -(t * q).sum(axis=1) / k
            shear[k] = (t[:, 0] * q[:, 1] - t[:, 1] * q[:, 0]) / k
            bending[k + 1] = shear[k] / (k + 1)
    long = stop - start
    return Pieces(edge, start, long, long > 0.0, axial, shear, bending, bool(spread))


def largest(found: Pieces, power: Array, *, sense: int = 0, ways: Sequence[Array] | None = None) -> Largest:
    """The largest size of a polynomial along all pieces of each entry.

    power  (power, piece, case, variant, pose), such as ``found.bending``
    sense  0 whichever sign it has; +1 the largest, -1 the smallest
    ways   [m] from the start of the pieces, to look at no other places
    """
    if ways is None:
        ways = [np.zeros_like(found.long), found.long, *(_turns(power, found.long) if found.spread else ())]
    best: Array = np.full(power.shape[1:], -np.inf)
    value, way = np.zeros(power.shape[1:]), np.zeros(power.shape[1:])
    for x in ways:
        y = _horner(power, x)
        rank = np.where(found.real, np.abs(y) if sense == 0 else sense * y, -np.inf)
        # two signs of one size: the first found stands, so that rounding does not choose
        better = rank > best
        best, value = np.where(better, rank, best), np.where(better, y, value)
        way = np.where(better, x, way)
    top = np.argmax(np.where(np.isnan(best), -np.inf, best), axis=0)[None]
    lost = np.isnan(power[0]).any(axis=0)

    def chosen(values: Any) -> Any:
        return np.take_along_axis(np.broadcast_to(values, power.shape[1:]), top, axis=0)[0]

    edge = np.where(lost, -1, chosen(found.edge))
    value, way = (np.where(lost, np.nan, chosen(v)) for v in (value, found.start + way))
    return Largest(value, edge, way, top[0])


def forces_at(found: Pieces, at: Largest, case: int, pose: int) -> tuple[float, float, float]:
    """N, V and M at such a place, in one entry."""
    piece, way = int(at.piece[case, 0, pose]), float(at.way[case, 0, pose])
    x = way - float(np.broadcast_to(found.start, found.axial.shape[1:])[piece, case, 0, pose])
    axial, shear, bending = (
        float(np.polynomial.polynomial.polyval(x, q[:, piece, case, 0, pose]))
        for q in (found.axial, found.shear, found.bending)
    )
    return axial, shear, bending


def fibre_stress(body: Body, found: Pieces, area: float, modulus: float, curved: float = 1.0) -> Largest:
    """[Pa] the largest size of the stress of axial force and bending at an outermost fibre, |N|/A + |M|/W.

    area, modulus  [m2], [m3] of the section, the same throughout
    curved         how much more than straight the inner fibre carries at the corners of the path

    Both fibres are looked at; the value has the sign of the stress at the one where both act the same way.
    """
    direct, bent = found.axial / area, found.bending / modulus
    both = [largest(found, direct + bent), largest(found, direct - bent)]
    if curved != 1.0:
        both += _at_corners(body, found, direct, bent * curved)
    best = both[0]
    for other in both[1:]:
        better = np.abs(other.value) > np.abs(best.value)
        names = ("value", "edge", "way", "piece")
        best = Largest(*(np.where(better, getattr(other, n), getattr(best, n)) for n in names))
    return best


def _at_corners(body: Body, found: Pieces, direct: Array, bent: Array) -> list[Largest]:
    """The largest stress of both fibres at either end of pieces that lies on a corner."""
    corners = np.isin(np.arange(len(body.names)), body.corners())
    starts, stops = (corners[list(nodes)][found.edge] for nodes in (body.starts, body.stops))
    begins = starts & (found.start == 0.0)
    ends = stops & (found.start + found.long >= body.long[found.edge] - body.slack)
    out = []
    for where, x in ((begins, np.zeros_like(found.long)), (ends, found.long)):
        at = replace(found, real=found.real & where)
        out += [largest(at, direct + bent, ways=[x]), largest(at, direct - bent, ways=[x])]
    return out


def unbalance(acts: Sequence[Act], shape: tuple[int, ...]) -> tuple[Array, Array]:
    """What all that acts on a member leaves over: force [N] and moment about its origin [N m], (case, variant, pose).

    It is what the diagrams end with instead of nothing.
    """
    place, force = (stacked(v, shape) for v in ([(a.u, a.v) for a in acts], [(a.fu, a.fv) for a in acts]))
    moment = stacked([(a.moment,) for a in acts], shape)[:, 0]
    return np.hypot(*force.sum(axis=0)), np.abs((moment + cross(place, force)).sum(axis=0))


def _attached(body: Body, place: Array) -> tuple[Numbers, Array]:
    """For each act the edge it goes into and the way along it [m]: the nearest place of the body."""
    # poses hold for all cases, so that this is worked out for one
    place = place[:, :, :1]
    first, t, long = body.nodes[list(body.starts)], body.along, body.long
    arm = place[:, None] - first[None, :, :, None, None, None]
    way = (arm * t[None, :, :, None, None, None]).sum(axis=2)
    room = long[None, :, None, None, None]
    way = np.where(way <= body.slack, 0.0, np.where(way >= room - body.slack, room, way))
    off = np.hypot(*np.moveaxis(arm - way[:, :, None] * t[None, :, :, None, None, None], 2, 0))
    edge = np.argmin(np.where(np.isnan(off), np.inf, off), axis=1)
    return edge, np.take_along_axis(way, edge[:, None], axis=1)[:, 0]


def off_body(body: Body, place: tuple[Value, Value]) -> Array:
    """[m] how far a place (own frame) is from the body."""
    at = np.stack([np.asarray(v, float) for v in np.broadcast_arrays(*place)])[None]
    at = at.reshape(1, 2, *((1,) * (5 - at.ndim)), *at.shape[2:])
    edge, way = _attached(body, at)
    foot = body.nodes[np.array(body.starts)][edge] + way[..., None] * body.along[edge]
    return np.hypot(*(at[:, :, :1] - np.moveaxis(foot, -1, 1))[0])


def _turns(power: Array, long: Array) -> list[Array]:
    """Where a cubic may be largest between the ends of its piece: zeros of its slope, kept within the piece."""
    a, b, c = 3 * power[3], 2 * power[2], power[1]
    with np.errstate(all="ignore"):
        root = np.sqrt(np.maximum(b * b - 4 * a * c, 0.0))
        q = -(b + np.where(b < 0, -1.0, 1.0) * root) / 2
        found = [q / a, c / q]
    return [np.clip(np.where(np.isfinite(x), x, 0.0), 0.0, long) for x in found]


def _horner(power: Array, x: Array) -> Array:
    total = power[-1]
    for part in power[-2::-1]:
        total = total * x + part
    return total
