"""What is linear: sizes that make the largest effort, or its mean square, least, within bounds. Each has one optimum.

With the effort b + A z, b without what is put in and A what each unknown z adds, the least peak is the linear programme
"u least, |b + A z| <= u", and the least mean square a least-squares problem with linear constraints, solved as a least
distance to the corner of a cone (C. L. Lawson and R. J. Hanson, Solving Least Squares Problems, 1974, chapter 23).
"""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from linkcalc.parts.pose import Array, Numbers

EXACT = 1e-10  # of the effort without what is put in: nothing but rounding
_ALIKE = 1e-7  # how much of the peak may be given up for the lightest of all that balance alike
_RIDGE = 1e-9


class NoSolution(ArithmeticError):
    """The bounds leave nothing."""


@dataclass(frozen=True, eq=False)
class Linear:
    """Effort b + A z with G z + g >= 0 and low <= z <= high.

    A  (rows, unknowns)   b  (rows)   G  (limits, unknowns)   g  (limits)   low, high  (unknowns), infinite if open
    price  (unknowns) what is taken as small as may be among answers alike: 1 for a mass, a rate or a force, else 0
    """

    A: Array
    b: Array
    G: Array
    g: Array
    low: Array
    high: Array
    price: Array

    def effort(self, z: Array) -> Array:
        return np.asarray(self.b + self.A @ z)

    def peak(self, z: Array) -> float:
        return float(np.abs(self.effort(z)).max(initial=0.0))

    def past(self, z: Array) -> float:
        """How far the worst limit is passed, 0.0 where all hold."""
        return float(np.max(-(self.g + self.G @ z), initial=0.0))

    def scaled(self) -> tuple[Linear, Array]:
        """The same in unknowns that all count alike, with rows of limits that do; and what each unknown is in them."""
        size = np.abs(self.A).max(axis=0, initial=0.0)
        top = max(float(np.abs(self.b).max(initial=0.0)), 1e-300)
        unit = np.where(size > 0, top / np.where(size > 0, size, 1.0), 1.0)
        G = self.G * unit
        rows = np.abs(G).max(axis=1, initial=0.0)
        rows = np.where(rows > 0, rows, 1.0)
        return Linear(self.A * unit / top, self.b / top, G / rows[:, None], self.g / rows,
                      self.low / unit, self.high / unit, self.price), unit  # fmt: skip

    def open(self) -> tuple[Linear, Numbers, Array]:
        """Settled unknowns taken out: the rest, which they are, and the values of all (settled ones in place)."""
        still = self.low >= self.high
        z: Array = np.where(still, self.low, 0.0)
        loose = np.flatnonzero(~still)
        part = Linear(self.A[:, loose], self.effort(z), self.G[:, loose], self.g + self.G @ z,
                      self.low[loose], self.high[loose], self.price[loose])  # fmt: skip
        return part, loose, z


def least_peak(whole: Linear) -> Array:
    """(unknowns) that make the largest effort least, of all alike the smallest. Raises NoSolution."""
    part, loose, z = whole.open()
    if not loose.size:
        return _held(whole, z)
    exact = _exact(part)
    if exact is None:
        from scipy.optimize import linprog

        one, unit = part.scaled()
        n = loose.size
        A = np.block([[one.A, -np.ones((one.b.size, 1))], [-one.A, -np.ones((one.b.size, 1))],
                      [-one.G, np.zeros((one.g.size, 1))]])  # fmt: skip
        found = linprog(np.eye(n + 1)[n], A, np.concatenate([-one.b, one.b, one.g]),
                        bounds=[*zip(one.low, one.high, strict=True), (0, None)], method="highs")  # fmt: skip
        if found.x is None:
            raise NoSolution
        exact = _smallest_peak(one, found.x[:n], float(found.x[n])) * unit
    z[loose] = exact
    return z


def least_square(whole: Linear) -> Array:
    """(unknowns) that make the mean square of the effort least, of all alike the smallest. Raises NoSolution."""
    part, loose, z = whole.open()
    if not loose.size:
        return _held(whole, z)
    exact = _exact(part)
    if exact is None:
        one, unit = part.scaled()
        exact = _smallest_alike(one, _distance(one)) * unit
    z[loose] = exact
    return z


def nearest_square(whole: Linear) -> Array:
    """(unknowns) with the least mean square, whichever of all alike. Raises NoSolution."""
    part, loose, z = whole.open()
    if loose.size:
        one, unit = part.scaled()
        z[loose] = _distance(one) * unit
    return z


def _held(whole: Linear, z: Array) -> Array:
    if whole.past(z) > 1e-9 * max(1.0, float(np.abs(whole.g).max(initial=0.0))):
        raise NoSolution
    return z


def _exact(part: Linear) -> Array | None:
    """Unknowns that leave nothing at all, where there are some within the bounds; the smallest of them."""
    one, unit = part.scaled()
    free: Array = np.asarray(np.linalg.lstsq(one.A, -one.b, rcond=1e-12)[0], np.float64)
    if one.peak(free) > EXACT:
        return None
    try:
        z = _smallest_alike(one, free)
    except NoSolution:
        return None
    return z * unit if one.peak(z) <= EXACT else None


def _smallest_alike(one: Linear, z: Array) -> Array:
    """Of all unknowns with the same effort in every pose those with the smallest price. Raises NoSolution."""
    from scipy.optimize import linprog

    _, size, way = np.linalg.svd(one.A, full_matrices=True)
    rank = int((size > 1e-11 * size.max(initial=0.0)).sum())
    null = way[rank:].T
    inside = np.concatenate([one.g + one.G @ z, z - one.low, one.high - z])
    known = np.isfinite(inside)
    if not null.shape[1]:
        if inside[known].min(initial=0.0) < -1e-9:
            raise NoSolution
        return z
    rows = np.concatenate([one.G @ null, null, -null])
    found = linprog(one.price @ null, -rows[known], inside[known], bounds=(None, None), method="highs")
    if found.x is None:
        if inside[known].min(initial=0.0) < -1e-9:
            raise NoSolution
        return z
    return np.asarray(np.clip(z + null @ found.x, one.low, one.high))


def _smallest_peak(one: Linear, z: Array, peak: float) -> Array:
    """Of all unknowns with that peak those with the smallest price."""
    from scipy.optimize import linprog

    room = peak * (1 + _ALIKE) + 1e-12
    A = np.concatenate([one.A, -one.A, -one.G])
    found = linprog(one.price, A, np.concatenate([room - one.b, room + one.b, one.g]),
                    bounds=list(zip(one.low, one.high, strict=True)), method="highs")  # fmt: skip
    return z if found.x is None else np.asarray(found.x)


def _distance(one: Linear) -> Array:
    """Least squares with linear limits, by the least distance. Raises NoSolution."""
    from scipy.optimize import nnls

    n = one.low.size
    # a trace of every unknown itself, so that those the effort does not tell apart are settled too
    Q, R = np.linalg.qr(np.concatenate([one.A, _RIDGE * np.eye(n)]))
    d = -(Q.T @ np.concatenate([one.b, np.zeros(n)]))
    low, high = np.isfinite(one.low), np.isfinite(one.high)
    C = np.concatenate([one.G, np.eye(n)[low], -np.eye(n)[high]])
    c = np.concatenate([-one.g, one.low[low], -one.high[high]])
    back = np.linalg.inv(R)
    if not c.size:
        return np.asarray(back @ d)
    H, h = C @ back, c - C @ back @ d
    rows = np.maximum(np.abs(H).max(axis=1), 1e-300)
    H, h = H / rows[:, None], h / rows
    if (h <= 0).all():
        return np.asarray(back @ d)
    E = np.vstack([H.T, h])
    u, _ = nnls(E, np.eye(n + 1)[n], maxiter=100 * E.shape[1])
    r = E @ u - np.eye(n + 1)[n]
    if np.linalg.norm(r) <= 1e-10:
        raise NoSolution
    z = back @ (d - r[:n] / r[n])
    return np.asarray(np.clip(z, one.low, one.high))


def relaxed(whole: Linear) -> Linear:
    """The same with every bound taken away: what no size at all could do better."""
    n = whole.low.size
    empty = np.zeros((0, n))
    return replace(whole, G=empty, g=np.zeros(0), low=np.full(n, -np.inf), high=np.full(n, np.inf))
