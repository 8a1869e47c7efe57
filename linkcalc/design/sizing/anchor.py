"""A frame that just stands: does it tip or slide under the forces of its ground joints?"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.design.sizing.pin import LIFTING
from linkcalc.design.sizing.working import Sheet, Working
from linkcalc.faults import fault
from linkcalc.parts.contract import Value
from linkcalc.parts.pose import Array


@dataclass(frozen=True)
class Footing:
    """Where a frame stands [m], on level ground.

    left, right  x of its feet; level y of them
    weight       [N] of frame and all that moves is in the forces or here, never in both
    centre       x of the weight
    """

    left: float
    right: float
    level: float
    weight: float
    centre: float


def standing(forces: Array, places: Array, moments: Array, footing: Footing, factor: float) -> Working:
    """The frame under what its joints put on it.

    forces   [N] on the frame at each place, (place, 2, ...)
    places   [m] of them, (place, 2) or (place, 2, ...)
    moments  [N m] on the frame besides, (...), counter-clockwise plus

    Symbols: tip_left, tip_right (moments that tip it about a foot), hold_left, hold_right (of the weight), H, V, mu.

    Raises Faults: no width between the feet, a weight that is not between them, weight or factor not more than nothing.
    """
    force, place = np.asarray(forces, dtype=float), np.asarray(places, dtype=float)
    place = place.reshape(*place.shape, *[1] * (force.ndim - place.ndim))
    sheet = Sheet("frame that just stands")
    sheet.positive("width", footing.right - footing.left, "length", "between the feet")
    sheet.positive("G", footing.weight, "force", "weight that holds it down")
    if not footing.left < footing.centre < footing.right:
        raise fault("centre", "the weight does not stand between the feet", "a frame that stands by itself is wanted")
    sheet.given("xG", footing.centre - footing.left, "length", "left foot to the weight")
    sheet.positive("S", factor, "number", "factor against tipping")

    def about(x: float) -> Value:
        arms = (place[:, 0] - x) * force[:, 1] - (place[:, 1] - footing.level) * force[:, 0]
        return _plain(arms.sum(axis=0) + moments)

    how = "forces on the frame times their arms, counter-clockwise plus"
    sheet.found("Ml", about(footing.left), "moment", "moment of the joints about the left foot", how)
    sheet.found("Mr", about(footing.right), "moment", "moment of the joints about the right foot", how)
    sheet.found("H", _plain(force[:, 0].sum(axis=0)), "force", "push along the ground", "sum of the forces")
    sheet.found("Vj", _plain(force[:, 1].sum(axis=0)), "force", "upward force of the joints", "sum of the forces")
    zero = "0 N*m"
    sheet.step("tip_left", f"max(Ml, {zero})", "tips it about its left foot", "balance about the foot")
    sheet.step("hold_left", "G*xG/S", "what the weight holds there, over the factor")
    sheet.at_most("tipping about the left foot", "tip_left", "hold_left")
    sheet.step("tip_right", f"max(-Mr, {zero})", "tips it about its right foot", "balance about the foot")
    sheet.step("hold_right", "G*(width - xG)/S", "what the weight holds there, over the factor")
    sheet.at_most("tipping about the right foot", "tip_right", "hold_right")
    sheet.step("N", "G - Vj", "force on the ground")
    if np.all(np.greater(sheet["N"], 0)):
        sheet.step("mu", "abs(H)/N", "friction that keeps it from sliding")
    sheet.note("It just stands: bolts down, or a foundation, if it tips, or if the ground has less friction than mu.")
    sheet.caution(LIFTING)
    return sheet.working()


def _plain(value: Value) -> Value:
    return float(value) if np.ndim(value) == 0 else value
