"""Questions in words to a model file: the only place of these tests that touches the tool.

    force C on arm: x        component (x, y or size) of the force of a joint on a member
    line of force C on arm   direction of that force, 0 to 180 degrees, whichever sense it has
    moment guide on arm      moment of a slide or weld on a member
    axial strut              force in a two-force member, tension plus
    tension hoist            of a rope
    axial force in beam at G towards B    of a member just beside a point; shear force, bending moment alike
    effort, load, force ratio, ideal ratio
    range                    how far the stroke goes from its first to its last pose

``-x``, ``|x|`` and ``0.84*x`` stand for minus, size and multiple of any of these.
"""

from __future__ import annotations

import functools
import math
import re
from pathlib import Path
from typing import Any

import numpy as np

from linkcalc import members, read, stroke
from linkcalc.design.diagram import diagram


def ask(file: Path, words: str, case: str = "", pose: int = 0) -> float:
    """The answer in SI; case by name (the first if not given), pose by its number."""
    words = words.strip()
    if size := re.fullmatch(r"\|(.+)\|", words):
        return abs(ask(file, size[1], case, pose))
    if words.startswith("-"):
        return -ask(file, words[1:], case, pose)
    if multiple := re.fullmatch(r"([\d.]+)\*(.+)", words):
        return float(multiple[1]) * ask(file, multiple[2], case, pose)
    if inner := re.fullmatch(r"(axial force|shear force|bending moment) in (\S+) at (\S+) towards (\S+)", words):
        return _inside(file, *inner.groups())
    mechanism, answer = _solved(file)
    row = list(mechanism.cases).index(case) if case else 0
    return float(np.asarray(_asked(answer, words))[row, 0, pose])


@functools.cache
def _solved(file: Path) -> tuple[Any, Any]:
    mechanism = read(file)
    return mechanism, stroke(mechanism)


def _inside(file: Path, quantity: str, member: str, at: str, towards: str) -> float:
    """In the first pose of the first case."""
    found = diagram(members(read(file)), member)
    for one in found.stretches:
        values = {"axial force": one.axial, "shear force": one.shear, "bending moment": one.bending}[quantity]
        if (one.start, one.stop) == (at, towards) and one.way[0] == 0.0:
            return float(values[0])
        if (one.stop, one.start) == (at, towards):
            last = float(values[-1])
    return last


def _asked(answer: Any, words: str) -> Any:
    """(case, variant, pose) SI"""
    if force := re.fullmatch(r"force (\S+) on (\S+): (x|y|size)", words):
        x, y = answer.force_on(force[1], force[2])
        return {"x": x, "y": y, "size": np.hypot(x, y)}[force[3]]
    if force := re.fullmatch(r"line of force (\S+) on (\S+)", words):
        x, y = answer.force_on(force[1], force[2])
        return np.arctan2(y, x) % math.pi
    if moment := re.fullmatch(r"moment (\S+) on (\S+)", words):
        return answer.moment_on(moment[1], moment[2])
    if axial := re.fullmatch(r"axial (\S+)", words):
        return answer.axial_in(axial[1])
    if rope := re.fullmatch(r"tension (\S+)", words):
        return answer.tension_of(rope[1])
    if words == "range":
        return np.abs(answer.drive[..., -1:] - answer.drive[..., :1])
    if words in ("effort", "load", "force ratio", "ideal ratio"):
        return getattr(answer, words.replace(" ", "_"))
    raise AssertionError(f"no such question: {words!r}")
