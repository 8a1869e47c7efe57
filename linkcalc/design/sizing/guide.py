"""Slots and slides: pressure along a guide of given length under a normal force and a moment."""

from __future__ import annotations

import numpy as np

from linkcalc.design.sizing.working import Sheet, Working, must_be_positive
from linkcalc.parts.contract import Value


def guide(normal: Value, moment: Value, length: float, width: float, allowed: float | None = None) -> Working:
    """A block or ram that lies against a straight guide on both sides, without play.

    normal   [N] square to the guide, through the middle of the block; moment [N m]; floats or arrays alike
    length   [m] of the block along the guide; width [m] across
    allowed  [Pa] pressure; None: none is held against

    The pressure is straight along the block: p = N/(l b) at its middle, and 6 M/(l² b) more at its ends; where that is
    more than the other, the far end presses on the other side. Symbols: p_mean, p_moment, p_edge, F_end.

    Raises Faults: sizes not more than nothing.
    """
    sheet = Sheet("guide")
    sheet.given("N", np.abs(normal), "force", "normal force")
    sheet.given("M", np.abs(moment), "moment", "moment on the guide")
    sheet.positive("l", length, "length", "length of the guided block")
    sheet.positive("b", width, "length", "width of the guide")
    sheet.step("p_mean", "N/(l*b)", "pressure in the middle")
    sheet.step("p_moment", "6*M/(l^2*b)", "more at one end, less at the other", "straight pressure; balance")
    sheet.step("p_edge", "p_mean + p_moment", "pressure at the edge")
    sheet.step("F_end", "N/2 + M/l", "force at the worse end", "if it bears at its two ends only; balance")
    if allowed is not None:
        must_be_positive("allowed pressure", allowed)
        sheet.given("p_allow", allowed, "stress", "allowed pressure")
        sheet.at_most("pressure at the edge of the guide", "p_edge", "p_allow")
    sheet.note("Straight pressure over both faces without play; with play it bears at its two ends: see F_end.")
    return sheet.working()
