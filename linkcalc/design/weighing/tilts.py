"""How the balanced beam tilts for a little more load, from the joint forces and the heights of everything."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.weighing.accuracy import Accuracy
from linkcalc.design.weighing.answer import Asked, Tilt
from linkcalc.design.weighing.setting import Balancing, Setting
from linkcalc.faults import fault
from linkcalc.mechanics.scales import tilted, tilting
from linkcalc.model.units import show
from linkcalc.words import nearest


def tilt(balancing: Balancing, setting: Setting, pointer: str | None) -> Tilt:
    """Raises Faults: the beam topples at every load, or has no such point."""
    scale = balancing.scale
    name, arm = _pointer(balancing, pointer)
    loads = setting.loads + balancing.tare - setting.left
    pushing = scale.pushing(loads, setting.at(scale))
    closed = scale.closed(pushing)
    found = tilting(scale.ready, closed, pushing, scale.beam, pushing.load)
    n = setting.loads.size
    if found is None:
        raise fault(
            ("members", scale.beam_name),
            "its tilt cannot be told: joints hold more than needed, or the drawn pose is a special one",
            "leave a joint out, or draw the scale a little off that pose",
        )
    stiffness, steady = found.stiffness[:, 0, 0], found.steady[:, 0, 0]
    if np.all(steady < 0):
        units = scale.mechanism.units
        text = show(float(stiffness[0]), "torsion stiffness", units)
        what = f"it topples at every load: moved a little it falls away ({text})"
        cure = "lower its centre of mass, or the edges that the load and the rods hang on, below the fulcrum"
        raise fault(("members", scale.beam_name), what, cure)
    neutral = steady == 0
    with np.errstate(all="ignore"):
        per_load = found.turning[0][:, 0, 0] * np.ravel(np.asarray(pushing.field, float))
        k = balancing.fine
        per_place = np.full(n, np.nan)
        if k is not None:
            per_place = scale.terms(loads).slope[k][:, 0] / stiffness
    return Tilt(
        np.where(neutral, 0.0, stiffness), steady, np.where(neutral, np.nan, per_load),
        np.where(neutral, np.nan, per_place), name, arm, _turning_point(setting, stiffness),
    )  # fmt: skip


def _turning_point(setting: Setting, stiffness: np.ndarray) -> float:
    """[kg] the load at which the stiffness is nothing: it is linear in the load while the poises take it evenly."""
    order = np.argsort(setting.loads)
    loads, k = setting.loads[order], stiffness[order]
    signs = np.flatnonzero((k[:-1] > 0) & (k[1:] <= 0))
    a, b = (signs[0], signs[0] + 1) if signs.size else (0, -1)
    if not signs.size and (k[0] <= 0 or not k[0] - k[-1] > 1e-6 * abs(k[0])):
        return float("nan")
    return float(loads[a] + k[a] * (loads[b] - loads[a]) / (k[a] - k[b]))


def _pointer(balancing: Balancing, asked: str | None) -> tuple[str, float]:
    scale = balancing.scale
    points = scale.mechanism.members[scale.beam_name].points
    if asked is not None and asked not in points:
        what = f"{asked!r} is no point of {scale.beam_name}"
        raise fault((), what, nearest(asked, points))
    fx, fy = scale.drawing.point(scale.fulcrum())

    def reach(point: str) -> float:
        x, y = scale.drawing.point(point)
        return float(np.ravel(np.hypot(x - fx, y - fy))[0])

    name = asked or max(points, key=reach)
    return name, reach(name)


def asked_of(balancing: Balancing, judged: Accuracy, found: Tilt, most: float) -> Iterator[Asked]:
    """What the class wants to see for an extra load, at nothing and at the most."""
    scale = balancing.scale
    for load in (max(0.0, balancing.least), most):
        wanted = judged.extra(load, most, found.arm)
        if wanted is None:
            continue
        extra, way = wanted
        setting = balancing.setting(np.array([load]))
        total = setting.loads + balancing.tare - setting.left
        closed = scale.closed(scale.pushing(total, setting.at(scale)))
        pushing = scale.pushing(total + extra, setting.at(scale))
        turn = float(tilted(scale.ready, closed, pushing, scale.beam)[0, 0, 0])
        yield Asked(load, extra, abs(np.sin(turn)) * found.arm, way)
