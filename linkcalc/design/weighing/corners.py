"""The load moved about: what the indication makes of it, which lever is to blame, and what would cure it.

A platform that only goes up and down as the beam tilts weighs alike wherever the load stands. If it turns besides, by w
for each radian of the beam, a load that is moved by s along the level does so much more: w s / (its own way).
"""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from linkcalc.design.weighing.errors import Judge
from linkcalc.design.weighing.scale import Scale
from linkcalc.model.dimensions import evaluate, tolerances
from linkcalc.model.functions import Quantity
from linkcalc.model.mechanism import GROUND, Mechanism
from linkcalc.model.units import KINDS
from linkcalc.parts.loads.weight import Weight
from linkcalc.parts.pose import Array

_STILL = 1e-9  # turn of the platform over that of the beam: it does not turn
_ROUNDS = 40
_WIDEST = 0.5  # of its size: how far a cure is looked for
_CLOSE = 1e-12
_MATTERS = 1e-6  # of the strongest: a dimension that the turn hangs on


@dataclass(frozen=True)
class Corner:
    """The load at one point. multiple: moment at the beam over that at the model's own point; error [kg]."""

    point: str
    multiple: float
    error: float


@dataclass(frozen=True)
class Support:
    """Where the platform rests. multiple: of a load there, over that at the model's own point of load."""

    joint: str
    on: str
    multiple: float


@dataclass(frozen=True)
class Cure:
    """A dimension by which the place of the load can be made to matter nothing.

    size   [SI] as it is; slope [kg/SI] change of the error at the farthest corner with it
    wanted [SI] size at which it does not matter; nan if none is near
    by_tolerance [kg] error at that corner by its tolerance; nan without one
    """

    name: str
    kind: str
    size: float
    slope: float
    wanted: float
    by_tolerance: float


@dataclass(frozen=True)
class Corners:
    """load [kg]; member: what carries it; turn: [-] of it for each radian of the beam; limit [kg] of the class, nan
    without one."""

    load: float
    member: str
    turn: float
    corners: tuple[Corner, ...]
    supports: tuple[Support, ...]
    cures: tuple[Cure, ...]
    limit: float = float("nan")

    @property
    def worst(self) -> Corner:
        return max(self.corners, key=lambda c: abs(c.error))

    @property
    def holds(self) -> bool:
        """True unless the class does not allow the worst error."""
        return not abs(self.worst.error) > self.limit * (1 + 1e-9)

    @property
    def free(self) -> bool:
        """True if the place of the load does not matter."""
        return abs(self.turn) <= _STILL


def corners(judge: Judge, bare: Mechanism, points: tuple[str, ...], load: float) -> Corners | None:
    """A test load [kg] at points of what carries it. None: it hangs on a pin itself, or has no second place.

    judge  of that one load
    """
    nominal = judge.balancing.scale
    here = bare.load
    assert isinstance(here, Weight)
    own = here.on or next(iter(nominal.drawing.carriers(here.mass_at)), GROUND)
    member = bare.members.get(own)
    if member is None or own in (GROUND, nominal.beam_name):
        return None
    points = points or tuple(p for p in member.points if p != here.mass_at)
    if not points or len(nominal.drawing.carriers(here.mass_at)) > 1:
        return None
    base = float(nominal.terms(np.array([load])).load[0, 0])
    found = []
    for point in points:
        moved = replace(bare, load=replace(here, mass_at=point, on=own))
        scale = Scale(moved, nominal.beam_name)
        multiple = float(scale.terms(np.array([load])).load[0, 0]) / base
        found.append(Corner(point, multiple, float(judge.errors(scale)[0, 0])))
    turn = _turn(nominal, own, load)
    cures = () if nominal.settles else _cures(judge, bare, own, _lever(nominal, points, here.mass_at, load, base), load)
    return Corners(load, own, float(turn[0]), tuple(found), tuple(_supports(nominal, own, load, base)), cures)


def _speeds(scale: Scale, load: float) -> list[Array]:
    closed = scale.closed(scale.pushing(np.array([load]), {}))
    return [np.ones((1, 1, 1)) * v for v in closed.speed]


def _turn(scale: Scale, member: str, load: float) -> Array:
    """(copies) turn of a member for each radian of the beam."""
    return np.asarray(_speeds(scale, load)[3 * scale.drawing.member(member) - 1][0, :, 0])


def _supports(scale: Scale, member: str, load: float, base: float) -> list[Support]:
    """The joints under the platform, each with the multiple of its levers."""
    closed = scale.closed(scale.pushing(np.array([load]), {}))
    index = scale.drawing.member(member)
    field = float(np.max(scale.ready.pushing.field))
    down = [float(np.ravel(d)[0]) for d in scale.ready.pushing.down]
    out = []
    for joint in scale.ready.chain.joints:
        if index not in joint.members:
            continue
        x, y = closed.at.spot(joint.site)
        ox, oy = closed.at.x[index], closed.at.y[index]
        vx, vy, w = (closed.speed[3 * index - 3 + k] for k in range(3))
        way = (vx - w * (y - oy)) * down[0] + (vy + w * (x - ox)) * down[1]
        other = next((m for m in joint.members if m != index), index)
        out.append(Support(joint.name, scale.drawing.members[other], float(np.ravel(way)[0]) * field / base))
    return out


def _lever(scale: Scale, points: tuple[str, ...], own: str, load: float, base: float) -> float:
    """[kg] error at the farthest of the points for a platform that turns as much as the beam."""
    down = [float(np.ravel(d)[0]) for d in scale.ready.pushing.down]

    def along(point: str) -> float:
        # along the level, to the right of gravity: what a turn carries up
        x, y = (float(np.ravel(v)[0]) for v in scale.drawing.point(point))
        return x * down[1] - y * down[0]

    far = max((along(p) - along(own) for p in points), key=abs)
    return load * far * float(np.max(scale.ready.pushing.field)) / base


def _cures(judge: Judge, bare: Mechanism, member: str, lever: float, load: float) -> tuple[Cure, ...]:
    """For each length the size at which the platform would not turn, by the secant rule on all of them at once."""
    nominal = judge.balancing.scale
    sizes = evaluate(bare)
    lengths = {n: float(np.ravel(q.value)[0]) for n, q in sizes.items() if _free(n, q, bare)}
    if not lengths:
        return ()
    names, own = list(lengths), np.array(list(lengths.values()))

    def turns(values: Array) -> Array:
        varied = {n: np.where(np.arange(len(names)) == k, values[k], own[k]) for k, n in enumerate(names)}
        copies = Scale(bare, nominal.beam_name, {n: v.reshape(1, -1, 1) for n, v in varied.items()}, like=nominal)
        return np.broadcast_to(_turn(copies, member, load), own.shape)

    before, last = turns(own), own
    here = own * (1 + 1e-4)
    slope: Array | None = None
    with np.errstate(all="ignore"):
        for _ in range(_ROUNDS):
            now = turns(here)
            rate = (now - before) / (here - last)
            slope = rate if slope is None else slope
            step = np.where(np.isfinite(rate) & (rate != 0), -now / rate, 0.0)
            before, last = now, here
            here = np.clip(here + step, own * (1 - _WIDEST), own * (1 + _WIDEST))
            if np.all(np.abs(here - last) <= _CLOSE * np.abs(own)):
                break
        left = np.abs(turns(here))
    assert slope is not None
    strength = np.abs(slope * own)
    matters = strength > _MATTERS * max(float(strength.max()), _STILL)
    wanted = np.where(left <= _STILL, here, np.nan)
    tol = {n: max(abs(t.lower), abs(t.upper)) for n, t in tolerances(bare).items()}
    return tuple(
        Cure(n, "length", float(own[k]), float(lever * slope[k]), float(wanted[k]),
             abs(float(lever * slope[k])) * tol.get(n, float("nan")))
        for k, n in enumerate(names) if matters[k]
    )  # fmt: skip


def _free(name: str, size: Quantity, bare: Mechanism) -> bool:
    """True for a length that is given, not reckoned from others."""
    given = bare.dimensions[name].size
    formula = isinstance(given, str) and any(other in given for other in bare.dimensions)
    return size.dims == KINDS["length"] and not formula
