"""Curved lines on a member: an arc of a circle, and a smooth curve through points.

Places are (u, v) in the frame of the member that has the line. Each curve tells, for a place near it, how far that
stands to the left of the line, the unit normal there (to the left), how far along the line its foot is, and how fast
that grows with a step along the tangent.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import Any

import numpy as np

from linkcalc.parts.contract import Value
from linkcalc.parts.pose import Array

Place = tuple[Value, Value]


@dataclass(frozen=True, eq=False)
class Foot:
    """Where a place stands beside a curve.

    left    [m] to the left of the line
    nx, ny  normal to the left
    rate    [-] how much further along a step of 1 parallel to the tangent leads; 1 on the line itself
    place   where on the line: as the curve counts it
    """

    left: Value
    nx: Value
    ny: Value
    rate: Value
    place: Value


@dataclass(frozen=True, eq=False)
class Arc:
    """Part of a circle; sense +1 if it runs counter-clockwise; travel counts from the direction of its beginning."""

    centre: Place
    radius: Value
    begin: Place
    sense: float
    length: Value

    def foot(self, u: Value, v: Value) -> Foot:
        du, dv = u - self.centre[0], v - self.centre[1]
        far = np.hypot(du, dv)
        bu, bv = self.begin
        angle = np.arctan2(bu * dv - bv * du, bu * du + bv * dv)
        # counter-clockwise the centre lies to the left
        s = self.sense
        return Foot(s * (self.radius - far), -s * du / far, -s * dv / far, self.radius / far, s * angle)

    def along(self, foot: Foot) -> Value:
        """[m] how far a foot is from the beginning of the line."""
        return self.radius * foot.place

    def places(self) -> list[tuple[float, float]]:
        """[m] places along it, to draw it."""
        whole = float(self.length / self.radius)
        first = np.arctan2(float(self.begin[1]), float(self.begin[0]))
        angles = first + self.sense * np.linspace(0.0, whole, 49)
        cu, cv, r = float(self.centre[0]), float(self.centre[1]), float(self.radius)
        return [(cu + r * float(np.cos(a)), cv + r * float(np.sin(a))) for a in angles]


def arc_through(points: Sequence[Place]) -> Arc:
    """The arc from the first of three points through the second to the third. NaN if they stand in line."""
    (ax, ay), (bx, by), (cx, cy) = points
    px, py, qx, qy = bx - ax, by - ay, cx - ax, cy - ay
    cross = 2 * (px * qy - py * qx)
    p, q = px * px + py * py, qx * qx + qy * qy
    mu, mv = (qy * p - py * q) / cross, (px * q - qx * p) / cross
    centre, radius = (ax + mu, ay + mv), np.hypot(mu, mv)
    sense = 1.0 if float(np.ravel(cross)[0]) > 0 else -1.0
    ex, ey = qx - mu, qy - mv
    turn = sense * np.arctan2(-mu * ey + mv * ex, -mu * ex - mv * ey)
    return Arc(centre, radius, (-mu / radius, -mv / radius), sense, radius * (turn % (2 * np.pi)))


_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(12)
_FINE = 8  # places an interval among which the nearest is where the search for a foot begins
_STEPS = 8


@dataclass(frozen=True, eq=False)
class Smooth:
    """A cubic spline through points over the chords between them, its ends free of curvature ("natural"); beyond its
    ends it goes straight on. (C. de Boor, A Practical Guide to Splines, Springer 1978, chapter IV.)

    knots   (points, 1, variant, 1) [m] chords added up
    powers  (2, 4, points - 1, 1, variant, 1) in each interval: u and v as cubics of what is beyond its knot
    before  (points, 1, variant, 1) [m] length of the line up to each knot
    """

    knots: Array
    powers: Array
    before: Array

    @property
    def length(self) -> Value:
        whole: Array = self.before[-1]
        return float(whole[0, 0, 0]) if whole.size == 1 else whole

    def foot(self, u: Value, v: Value) -> Foot:
        t = self._nearest(u, v)
        for _ in range(_STEPS):
            (su, du, ddu), (sv, dv, ddv) = self._at(t)
            off = (u - su) * du + (v - sv) * dv
            t = t - off / np.minimum((u - su) * ddu + (v - sv) * ddv - (du * du + dv * dv), -1e-6)
        (su, du, ddu), (sv, dv, ddv) = self._at(t)
        speed = np.hypot(du, dv)
        nx, ny = -dv / speed, du / speed
        left = (u - su) * nx + (v - sv) * ny
        rate = speed * speed / (du * du + dv * dv - (u - su) * ddu - (v - sv) * ddv)
        return Foot(left, nx, ny, rate, t)

    def places(self) -> list[tuple[float, float]]:
        """[m] places along it, to draw it."""
        line = np.linspace(0.0, float(self.knots[-1].flat[0]), 20 * len(self.knots))
        return [(float(a[0]), float(b[0])) for a, b in (self._at(float(t)) for t in line)]

    def _interval(self, t: Value) -> Any:
        return sum((t >= self._one(self.knots, k)) * 1 for k in range(1, len(self.knots) - 1)) + 0

    def _one(self, table: Array, k: Any) -> Any:
        """An entry of a table for each of a batch of intervals, or for a single one."""
        if table.shape[-2] == 1:
            return table[..., k, 0, 0, 0]
        if np.ndim(k) == 0:
            return table[..., k, :, :, :]
        return table[..., k, 0, np.arange(table.shape[-2]).reshape(1, -1, 1), 0]

    def _at(self, t: Value) -> list[tuple[Value, Value, Value]]:
        """Of u and v: place, first and second derivative by t."""
        k = self._interval(t)
        last = self._one(self.knots, len(self.knots) - 1)
        inside = np.clip(t, 0.0, last)
        w, beyond = inside - self._one(self.knots, k), t - inside
        out = []
        for axis in (0, 1):
            a, b, c, d = (self._one(self.powers[axis, n], k) for n in range(4))
            slope = b + w * (2 * c + 3 * w * d)
            out.append((a + w * (b + w * (c + w * d)) + beyond * slope, slope, (beyond == 0) * (2 * c + 6 * w * d)))
        return out

    def along(self, foot: Foot) -> Value:
        """[m] how far a foot is from the beginning of the line: twelve places of Gauss in its interval."""
        t = foot.place
        k = self._interval(t)
        start = self._one(self.knots, k)
        inside = np.clip(t, 0.0, self._one(self.knots, len(self.knots) - 1))
        half = (inside - start) / 2
        total: Value = 0.0
        for node, weight in zip(_NODES.tolist(), _WEIGHTS.tolist(), strict=True):
            (_, du, _), (_, dv, _) = self._at(start + half * (1 + node))
            total = total + weight * np.hypot(du, dv)
        (_, du, _), (_, dv, _) = self._at(t)
        along: Value = self._one(self.before, k) + half * total + (t - inside) * np.hypot(du, dv)
        return along

    @cached_property
    def _spread(self) -> tuple[Array, Array, Array]:
        """(places, 1, variant, 1) some places spread over the line, where they are looked for first: t, u, v."""
        knots = self.knots
        steps = [knots[k] + (knots[k + 1] - knots[k]) * n / _FINE for k in range(len(knots) - 1) for n in range(_FINE)]
        t = np.stack([*steps, knots[-1]])
        places = [self._at(float(one.flat[0]) if one.size == 1 else one) for one in t]
        u, v = (np.stack([np.broadcast_to(p[axis][0], knots.shape[1:]) for p in places]) for axis in (0, 1))
        return t, u, v

    def _nearest(self, u: Value, v: Value) -> Value:
        """The nearest of some places spread over the line."""
        t, su, sv = self._spread
        shape = np.broadcast_shapes(t.shape[1:], np.shape(u), np.shape(v))
        far = np.broadcast_to((u - su) ** 2 + (v - sv) ** 2, (len(t), *shape))
        best = np.take_along_axis(np.broadcast_to(t, far.shape), np.argmin(far, axis=0)[None], axis=0)[0]
        return float(best[0, 0, 0]) if np.ndim(u) == 0 and np.ndim(v) == 0 and best.size == 1 else best


def smooth_through(points: Sequence[Place]) -> Smooth:
    """The spline through three or more points in order."""
    places = np.stack([np.stack([np.broadcast_to(np.asarray(c, float), shape) for c in p])
                       for shape in [np.broadcast_shapes((1, 1, 1), *(np.shape(c) for p in points for c in p))]
                       for p in points])  # fmt: skip
    chords = np.hypot(*np.moveaxis(np.diff(places, axis=0), 1, 0))
    zero = np.zeros((1, *chords.shape[1:]))
    knots = np.concatenate([zero, np.cumsum(chords, axis=0)])
    bends = _bends(chords, places)
    powers = np.empty((2, 4, *chords.shape))
    for axis in (0, 1):
        y, m = places[:, axis], bends[:, axis]
        powers[axis, 0] = y[:-1]
        powers[axis, 1] = np.diff(y, axis=0) / chords - chords * (2 * m[:-1] + m[1:]) / 6
        powers[axis, 2] = m[:-1] / 2
        powers[axis, 3] = np.diff(m, axis=0) / (6 * chords)
    bare = Smooth(knots, powers, zero)
    lengths = []
    for k in range(len(chords)):
        total = np.zeros(chords.shape[1:])
        for node, weight in zip(_NODES, _WEIGHTS, strict=True):
            w = chords[k] * (1 + node) / 2
            du, dv = (powers[axis, 1, k] + w * (2 * powers[axis, 2, k] + 3 * w * powers[axis, 3, k]) for axis in (0, 1))
            total = total + weight * np.hypot(du, dv)
        lengths.append(chords[k] / 2 * total)
    return Smooth(bare.knots, bare.powers, np.concatenate([zero, np.cumsum(lengths, axis=0)]))


def _bends(chords: Array, places: Array) -> Array:
    """(points, 2, 1, variant, 1) second derivatives at the points: nothing at both ends, a band of three between."""
    n = len(places)
    out = np.zeros_like(places)
    slopes = np.diff(places, axis=0) / chords[:, None]
    right = 6 * np.diff(slopes, axis=0)
    diagonal = 2 * (chords[:-1] + chords[1:])
    for k in range(1, n - 2):
        factor = chords[k] / diagonal[k - 1]
        diagonal[k] = diagonal[k] - factor * chords[k]
        right[k] = right[k] - factor * right[k - 1]
    for k in range(n - 3, -1, -1):
        later = chords[k + 1] * out[k + 2] if k < n - 3 else 0.0
        out[k + 1] = (right[k] - later) / diagonal[k]
    return out
