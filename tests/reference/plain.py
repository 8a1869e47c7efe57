"""The plain script: a root finder pose after pose, then the equilibrium of every body as one dense system.

It is what an engineer writes with numpy and scipy for a linkage at hand, straight from the equations: places in
ground axes, moments about each body's first place. Peer in the benchmark and second judge in the tests.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable
from math import hypot, pi, remainder

import numpy as np
from scipy.optimize import root

from tests.reference.layout import At, Layout
from tests.reference.linkage import Distance, Linkage, Solution, Turn


def solve(linkage: Linkage, values: Iterable[float] = (), tolerance: float | None = 1e-13) -> Solution:
    """Poses, effort and joint forces for values of the drive, each near the one before; a frame is solved as drawn.

    tolerance  of the root finder; None is scipy's own
    """
    layout = Layout(linkage)
    poses = close(layout, values, tolerance) if linkage.drive else np.array([layout.start])
    solved = [balance(layout, pose) for pose in poses]
    forces = {key: np.array([felt[i] for felt, _ in solved]) for i, key in enumerate(layout.keys)}
    effort = np.array([effort for _, effort in solved])
    return Solution(layout.bodies, poses.reshape(len(poses), -1, 3), effort, forces)


def close(layout: Layout, values: Iterable[float], tolerance: float | None) -> np.ndarray:
    """(pose, 3 n): where the bodies are; each pose starts from the one before, the first from the drawing."""
    gaps, now, found = _gaps(layout), np.array(layout.start), []
    for value in values:
        result = root(gaps, now, args=(value,), tol=tolerance)
        if np.abs(result.fun).max() > 1e-8:
            raise ArithmeticError(f"the linkage does not close at {value}: {result.message}")
        now = result.x
        found.append(now)
    return np.array(found)


def _gaps(layout: Layout) -> Callable[[np.ndarray, float], list[float]]:
    """How far every joint and the drive are from holding, as a function of the unknown places and angles."""
    pins = [(j.a, j.ua, j.va, j.b, j.ub, j.vb) for j in layout.pins]
    drive = _drive(layout)

    def gaps(unknowns: np.ndarray, target: float) -> list[float]:
        at = At(unknowns.tolist())
        x, y, c, s = at.x, at.y, at.c, at.s
        out = [drive(at, target)]
        for a, ua, va, b, ub, vb in pins:
            out.append(x[a] + c[a] * ua - s[a] * va - x[b] - c[b] * ub + s[b] * vb)
            out.append(y[a] + s[a] * ua + c[a] * va - y[b] - s[b] * ub - c[b] * vb)
        for j in layout.guides:
            (px, py), (qx, qy) = at.place((j.a, j.ua, j.va)), at.place((j.b, j.ub, j.vb))
            tx, ty = at.direction(j.b, *j.along)
            out.append(tx * (py - qy) - ty * (px - qx))
            if j.angle is not None:
                out.append(at.angle[j.a] - at.angle[j.b] - j.angle)
        return out

    return gaps


def _drive(layout: Layout) -> Callable[[At, float], float]:
    match layout.linkage.drive:
        case Turn(body):
            i = layout.index[body]
            return lambda at, target: remainder(at.angle[i] - target, 2 * pi)
        case Distance((first, second)):
            a, b = layout.local(*first), layout.local(*second)

            def missing(at: At, target: float) -> float:
                (ax, ay), (bx, by) = at.place(a), at.place(b)
                return hypot(bx - ax, by - ay) - target

            return missing
    raise TypeError(f"not a drive: {layout.linkage.drive}")


def balance(layout: Layout, pose: np.ndarray) -> tuple[list[tuple[float, float, float]], float]:
    """Forces of the joints and the effort: for every body the sums of x, of y and of moments are nothing."""
    at = At(pose.tolist())
    x, y = at.x, at.y
    matrix, right = np.zeros((3 * len(x), 3 * len(x) - 3)), np.zeros(3 * len(x))
    k = 0
    for j in layout.pins:
        px, py = at.place((j.a, j.ua, j.va))
        a, b = 3 * j.a, 3 * j.b
        matrix[a, k] = matrix[a + 1, k + 1] = 1.0
        matrix[b, k] = matrix[b + 1, k + 1] = -1.0
        matrix[a + 2, k], matrix[a + 2, k + 1] = y[j.a] - py, px - x[j.a]
        matrix[b + 2, k], matrix[b + 2, k + 1] = py - y[j.b], x[j.b] - px
        k += 2
    normals = []
    for j in layout.guides:
        px, py = at.place((j.a, j.ua, j.va))
        tx, ty = at.direction(j.b, *j.along)
        a, b, nx, ny = 3 * j.a, 3 * j.b, -ty, tx
        normals.append((nx, ny))
        matrix[a : a + 3, k] = nx, ny, (px - x[j.a]) * ny - (py - y[j.a]) * nx
        matrix[b : b + 3, k] = -nx, -ny, (py - y[j.b]) * nx - (px - x[j.b]) * ny
        k += 1
        if j.angle is not None:
            matrix[a + 2, k], matrix[b + 2, k] = 1.0, -1.0
            k += 1
    for body, px, py, fx, fy, couple in layout.effort(at) if layout.effort else ():
        matrix[3 * body : 3 * body + 3, k] += fx, fy, (px - x[body]) * fy - (py - y[body]) * fx + couple
    for load in layout.loads:
        for body, px, py, fx, fy, couple in load(at):
            right[3 * body : 3 * body + 3] -= fx, fy, (px - x[body]) * fy - (py - y[body]) * fx + couple
    sizes = iter(np.linalg.solve(matrix[3:], right[3:]).tolist())  # the ground takes what is left
    felt = [(next(sizes), next(sizes), 0.0) for _ in layout.pins]
    for j, (nx, ny) in zip(layout.guides, normals, strict=True):
        size = next(sizes)
        felt.append((size * nx, size * ny, 0.0 if j.angle is None else next(sizes)))
    return felt, next(sizes) if layout.effort else float("nan")
