"""Loads spread along the edges of a body: how strong they are at each place, and what they come to beyond a cut."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.mechanics.acts import Act
from linkcalc.mechanics.body import Body
from linkcalc.parts.pose import Array, Numbers, Value


def along_edges(body: Body, spread: Sequence[Act], shape: tuple[int, ...]) -> Array:
    """(edge, end, 2, case, variant, pose) [N/m] how strongly spread loads act at both ends of each edge."""
    load = np.zeros((len(body.starts), 2, 2, *shape))
    for act in spread:
        assert act.spread is not None
        lines = [
            tuple(np.array([float(np.ravel(w)[0]) for w in (s.u, s.v)]) for s in line) for line in act.spread.lines
        ]
        longs = np.array([np.hypot(*(b - a)) for a, b in lines])
        whole = float(longs.sum())
        force = stacked([(act.fu, act.fv)], shape)[0] / (whole or 1.0)
        low, high = act.spread.ends
        begin = np.concatenate([[0.0], np.cumsum(longs)])
        for (a, b), long, first in zip(lines, longs, begin, strict=False):
            for k in range(len(body.starts)):
                span = _on_line(body, k, a, b, float(long))
                if span is not None:
                    for end, s in enumerate(span):
                        load[k, end] += force * (low + (high - low) * (first + s) / whole)
    return load


def _on_line(body: Body, edge: int, a: Array, b: Array, long: float) -> tuple[float, float] | None:
    """[m] how far along a line from a to b an edge begins and ends; None if it does not lie on it."""
    if long <= body.slack:
        return None
    t = (b - a) / long
    found = []
    for node in (body.starts[edge], body.stops[edge]):
        arm = body.nodes[node] - a
        s, off = float(arm @ t), float(arm[1] * t[0] - arm[0] * t[1])
        if abs(off) > body.slack or not -body.slack <= s <= long + body.slack:
            return None
        found.append(s)
    return found[0], found[1]


def load_at(body: Body, load: Array, edge: Numbers, start: Array) -> tuple[Array, Array]:
    """(piece, 2, ...) [N/m] spread load at the start of each piece, and its rise [N/m²] along it."""
    rise = (load[:, 1] - load[:, 0]) / body.long[:, None, None, None, None]
    rise, first = _of_piece(rise, edge), _of_piece(load[:, 0], edge)
    return first + rise * start[:, None], rise


def _of_piece(of_edge: Array, edge: Numbers) -> Array:
    """(edge, 2, case, variant, pose) -> (piece, 2, case, variant, pose), by the edge of each piece in each pose."""
    index = np.broadcast_to(edge[:, None], (len(edge), *of_edge.shape[1:]))
    return np.take_along_axis(of_edge, index, axis=0) if len(of_edge) != 1 else np.broadcast_to(of_edge, index.shape)


def loaded_beyond(body: Body, load: Array, edge: Numbers, start: Array) -> tuple[Array, Array]:
    """What spread loads beyond the start of each piece come to: force (piece, 2, ...), moment about the origin."""
    long = body.long[:, None, None, None, None]
    whole = (load[:, 0] + load[:, 1]) / 2 * long  # (edge, 2, ...)
    t = body.along[:, :, None, None, None]
    at = body.nodes[list(body.starts)][:, :, None, None, None]
    first = load[:, 0] * long**2 / 2 + (load[:, 1] - load[:, 0]) * long**2 / 3  # first moment along the edge
    turning = cross(at, whole) + cross(t, first)
    beyond = body.beyond.astype(float)[edge]  # (piece, ..., edge)
    total = np.einsum("k...e,ei...->ki...", beyond, whole)
    about = np.einsum("k...e,e...->k...", beyond, turning)
    # and what is left of the edge itself
    q, rise = load_at(body, load, edge, start)
    rest = (body.long[edge] - start)[:, None]
    more = q * rest + rise * rest**2 / 2
    lever = q * rest**2 / 2 + rise * rest**3 / 3
    way = np.moveaxis(body.along[edge], -1, 1)
    cut = np.moveaxis(body.nodes[np.array(body.starts)][edge], -1, 1) + start[:, None] * way
    return total + more, about + cross(cut, more) + cross(way, lever)


def stacked(rows: Sequence[Sequence[Value]], shape: tuple[int, ...]) -> Array:
    out: Array = np.empty((len(rows), len(rows[0]) if rows else 2, *shape))
    for row, values in zip(out, rows, strict=True):
        for part, value in zip(row, values, strict=True):
            part[...] = value
    return out


def cross(a: Array, b: Array) -> Array:
    """Of vectors whose components are the second axis."""
    return a[:, 0] * b[:, 1] - a[:, 1] * b[:, 0]
