"""The parts of gears and racks that come into mesh over the stroke: what must have teeth."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.parts.contract import Joint, Mark
from linkcalc.parts.pose import Array, Poses
from linkcalc.report.blocks import Item
from linkcalc.report.scene import Scene, Spot

_BESIDE = np.radians(12.0)
"""Drawn beyond the last place of contact, as segments are cut."""
_WHOLE = 1.9 * np.pi


def toothed(scene: Scene, at: Poses, joint: Joint, mark: Mark, only: int | None = None) -> Iterator[Item]:
    """A segment, or a whole wheel, of each member of a joint with teeth, in one pose; of a rack its toothed line.

    only  index of the one member to draw
    """
    poses = [scene.at(p) for p in range(scene.answer.drive.shape[-1]) if scene.known(p)]
    marks = [joint.mark(there) for there in poses]
    for k, member in enumerate(joint.members):
        if only not in (None, member):
            continue
        hue = list(scene.answer.mechanism.members).index(scene.sketch.members[member])
        tone = "plain" if member else "ground"
        if k < len(mark.rounds):
            x, y, radius = mark.rounds[k]
            seen = [m.spots[0] for m in marks]
            turns = np.array([_turn(there, member) for there in poses])
            angles = [np.arctan2(v - m.rounds[k][1], u - m.rounds[k][0]) for (u, v), m in zip(seen, marks, strict=True)]
            arc = _arc(np.unwrap(np.array(angles) - turns) + _turn(at, member))
            rim = tuple((x + radius * float(np.cos(t)), y + radius * float(np.sin(t))) for t in arc)
            whole = float(np.ptp(arc)) > _WHOLE
            if _ring(mark, k):
                yield Item("rim", rim, tone=tone, hue=hue)
            else:
                yield Item("segment", rim if whole else ((x, y), *rim), tone=tone, hue=hue)
        else:
            yield Item("rim", _way(at, member, poses, marks), tone=tone, hue=hue)


def _turn(at: Poses, member: int) -> float:
    return float(np.arctan2(at.s[member], at.c[member]))


def _ring(mark: Mark, k: int) -> bool:
    """True of the larger of two circles of which one lies in the other."""
    if len(mark.rounds) < 2 or not mark.line:
        return False
    radius, (ax, ay), (bx, by) = mark.rounds[k][2], *mark.line[:2]
    return radius > float(np.hypot(bx - ax, by - ay)) and radius == max(r for _, _, r in mark.rounds)


def _arc(angles: Array) -> Array:
    """Angles along the arc that is in mesh sometime; all round if that is nearly all or cannot be told."""
    low, high = float(angles.min()) - _BESIDE, float(angles.max()) + _BESIDE
    if high - low > _WHOLE or np.abs(np.diff(angles)).max(initial=0.0) > np.pi / 2:
        low, high = 0.0, 2 * np.pi
    return np.linspace(low, high, max(8, int((high - low) / 0.04)))


def _way(at: Poses, member: int, poses: list[Poses], marks: list[Mark]) -> tuple[Spot, Spot]:
    """Both ends of the part of a rack that is in mesh sometime."""

    def own(there: Poses, spot: Spot) -> Spot:
        dx, dy = spot[0] - float(there.x[member]), spot[1] - float(there.y[member])
        c, s = float(there.c[member]), float(there.s[member])
        return c * dx + s * dy, c * dy - s * dx

    spots = np.array([own(there, m.spots[0]) for there, m in zip(poses, marks, strict=True)])
    u, v = own(poses[0], (float(poses[0].x[member]) + marks[0].along[0], float(poses[0].y[member]) + marks[0].along[1]))
    along = spots @ np.array([u, v])
    more = _BESIDE * marks[0].rounds[0][2]
    ends = [spots[0] + (t - along[0]) * np.array([u, v]) for t in (along.min() - more, along.max() + more)]
    (ax, ay), (bx, by) = (at.turned(member, float(p), float(q)) for p, q in ends)
    x, y = float(at.x[member]), float(at.y[member])
    return (x + float(ax), y + float(ay)), (x + float(bx), y + float(by))
