"""The four-bar written out by hand for this one linkage: the quickest form of the plain script.

No general data, no loops over joints: nine closing equations and nine equilibrium equations, typed in. It shows
what the generality of `tests/reference/plain.py` costs, so that nobody is compared with a slow script.
"""

from __future__ import annotations

from math import atan2, cos, sin

import numpy as np
from scipy.optimize import root

from tests.bench.peers.linkages import FOURBAR, FOURBAR_LOAD, FOURBAR_TIP, fourbar

R1, R2, R3, R4 = FOURBAR["crank"], FOURBAR["coupler"], FOURBAR["rocker"], FOURBAR["frame"]


def _gaps(unknowns: np.ndarray, crank: float) -> list[float]:
    x1, y1, t1, x2, y2, t2, x3, y3, t3 = unknowns.tolist()
    return [
        x1,
        y1,
        t1 - crank,
        x2 - x1 - R1 * cos(t1),
        y2 - y1 - R1 * sin(t1),
        x3 - R4,
        y3,
        x2 + R2 * cos(t2) - x3 - R3 * cos(t3),
        y2 + R2 * sin(t2) - y3 - R3 * sin(t3),
    ]


def fourbar_by_hand(crank_angles: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
    """(pose,) torque on the crank [N m], and (pose, 8) x, y [N] of the forces: A on crank, B on coupler, C on
    rocker, D on rocker. The angles start near the drawing and go in small steps."""
    at = fourbar().places
    (bx, by), (cx, cy), (dx, _) = at["B"], at["C"], at["D"]
    now = np.array([0.0, 0.0, atan2(by, bx), bx, by, atan2(cy - by, cx - bx), R4, 0.0, atan2(cy, cx - dx)])
    right = np.array([0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, FOURBAR_LOAD, 0.0])
    answers = []
    for crank in crank_angles:
        now = root(_gaps, now, args=(crank,)).x
        _, _, t1, _, _, t2, _, _, t3 = now.tolist()
        ux, uy = R1 * cos(t1), R1 * sin(t1)
        vx, vy = R2 * cos(t2), R2 * sin(t2)
        wx, wy = R3 * cos(t3), R3 * sin(t3)
        matrix = [  # Ax  Ay  Bx  By  Cx  Cy  Dx  Dy  torque; moments about A, B, D
            [1, 0, -1, 0, 0, 0, 0, 0, 0],
            [0, 1, 0, -1, 0, 0, 0, 0, 0],
            [0, 0, uy, -ux, 0, 0, 0, 0, 1],
            [0, 0, 1, 0, -1, 0, 0, 0, 0],
            [0, 0, 0, 1, 0, -1, 0, 0, 0],
            [0, 0, 0, 0, vy, -vx, 0, 0, 0],
            [0, 0, 0, 0, 1, 0, 1, 0, 0],
            [0, 0, 0, 0, 0, 1, 0, 1, 0],
            [0, 0, 0, 0, -wy, wx, 0, 0, 0],
        ]
        right[8] = FOURBAR_LOAD * FOURBAR_TIP * cos(t3)
        answers.append(np.linalg.solve(matrix, right))
    solved = np.array(answers)
    return solved[:, 8], solved[:, :8]
