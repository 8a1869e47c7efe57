"""Inner forces drawn along a member: the member free with what acts on it, then N, V and M hung on its line."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from linkcalc.design.diagram import Diagram, Stretch
from linkcalc.parts.pose import Array
from linkcalc.report.blocks import Drawing, Item, Panels
from linkcalc.report.diagram_blocks import nothing
from linkcalc.report.drawing import arrows, caption_at, scaled
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number, plain
from linkcalc.report.scene import Acts

_HIGH, _LOW, _SLIM = 0.2, 0.1, 0.3
"""Height of the largest ordinate over the extent of the member; of a member slimmer than so."""
_UNSEEN = 0.005
"""Of the largest ordinate: below it no line can be seen."""
_TOLD = 0.02
"""Of the largest ordinate: smaller ones are not written beside the line."""


def draw_diagram(found: Diagram) -> Panels:
    """Four panels: what acts, axial force, shear, bending moment."""
    edge = Edge(found.stroke)
    factor = edge.one(1.0, "length")
    spots = np.concatenate([s.spots for s in found.stretches]) if found.stretches else np.zeros((1, 2))
    reach = np.ptp(spots, axis=0)
    high = (_LOW if np.min(reach) < _SLIM * np.max(reach) else _HIGH) * (float(np.max(reach)) or 1.0)
    unit = plain(edge.unit("length"))

    def panel(title: str, items: Sequence[Item]) -> Drawing:
        return Drawing(title, unit, tuple(items))

    free = [*_spine(found, factor, "bar"), *_names(found, factor), *scaled(arrows(_acts(found), edge), edge)]
    panels = [panel("What acts on it", free)]
    for title, quantity, tone, what, side in (
        ("Axial force N, tension plus", "axial force", "axial", "force", 1.0),
        ("Shear force V", "shear force", "shear", "force", 1.0),
        ("Bending moment M, on the stretched side", "bending moment", "bending", "moment", -1.0),
    ):
        items = [
            *_ordinates(found, edge, quantity, tone, what, side * high, factor),
            *_spine(found, factor, "spine"),
        ]
        panels.append(panel(f"{title} [{plain(edge.unit(what))}]", items))
    return Panels(
        title=f"{found.stroke.mechanism.title or 'Mechanism'}: inner forces of {found.member}",
        caption=caption_at(found.stroke, found.drive, found.case),
        panels=tuple(panels),
    )


def _values(one: Stretch, quantity: str) -> Array:
    return {"axial force": one.axial, "shear force": one.shear, "bending moment": one.bending}[quantity]


def _spine(found: Diagram, factor: float, shape: str) -> list[Item]:
    lines: list[list[tuple[float, float]]] = []
    arms: list[tuple[tuple[float, float], ...]] = []
    for one in found.stretches:
        a, b = ((float(x) * factor, float(y) * factor) for x, y in one.spots[[0, -1]])
        if one.arm and shape == "bar":
            arms.append((a, b))
        elif lines and np.hypot(lines[-1][-1][0] - a[0], lines[-1][-1][1] - a[1]) <= 1e-9 * abs(factor):
            lines[-1].append(b)
        else:
            lines.append([a, b])
    return [*(Item("stem", arm) for arm in arms), *(Item(shape, tuple(line)) for line in lines)]


def _names(found: Diagram, factor: float) -> list[Item]:
    """The points of the member, each once."""
    places: dict[str, tuple[float, float]] = {}
    for one in found.stretches:
        long = float(np.hypot(*(one.spots[-1] - one.spots[0])))
        t = (one.spots[-1] - one.spots[0]) / long
        start = one.spots[0] - one.way[0] * t
        if one.way[0] <= 1e-9 * long:
            places.setdefault(one.start, (float(start[0]) * factor, float(start[1]) * factor))
        places[one.stop] = (float(one.spots[-1][0]) * factor, float(one.spots[-1][1]) * factor)
    return [Item("point", (spot,), name=name) for name, spot in places.items() if not name.startswith("foot of ")]


def _acts(found: Diagram) -> list[Acts]:
    tones = {"joint", "effort", "load", "weight"}
    return [Acts(a.name, a.name if a.name in tones else a.tone, 1, "", a.spot, a.force, a.moment) for a in found.acts]


def _ordinates(
    found: Diagram, edge: Edge, quantity: str, tone: str, what: str, high: float, factor: float
) -> list[Item]:
    """The filled diagram of one quantity with the values worth telling."""
    own = _most(found, quantity)
    # forces along and across share one scale, so that the small one looks small
    most = own if what == "moment" else max(_most(found, "axial force"), _most(found, "shear force"))
    if own <= _UNSEEN * most or most <= nothing(found, what):
        shown = f"at most {number(edge.one(own, what), 4, trim=True)}" if own > nothing(found, what) else "nothing"
        return [Item("remark", (_spot(found.stretches[0].spots[0] * factor),), name=shown)]
    items: list[Item] = []
    told: list[Item] = []
    for one in found.stretches:
        values = _values(one, quantity)
        off = one.spots + np.outer(values / most * high, one.left)
        line = [_spot(p) for p in np.concatenate([one.spots, off[::-1]]) * factor]
        items.append(Item("ordinates", tuple(line), tone=tone))
        for k in _worth(values, most):
            out = one.left * np.sign(values[k]) * np.sign(high)
            spot = _spot(off[k] * factor)
            text = number(edge.one(float(values[k]), what), 4, trim=True)
            told.append(Item("value", (spot,), (float(out[0]), float(out[1])), text, tone))
    return [*items, *_once(told, 0.15 * abs(high) * factor)]


def _most(found: Diagram, quantity: str) -> float:
    return max((float(np.max(np.abs(_values(s, quantity)))) for s in found.stretches), default=0.0)


def _spot(place: Array) -> tuple[float, float]:
    return float(place[0]), float(place[1])


def _worth(values: Array, most: float) -> list[int]:
    """Places whose value is written: the ends, one of them if they are alike, and a summit between."""
    last = len(values) - 1
    picked = [0, last]
    if np.ptp(values) <= 0.01 * most:
        picked = [last // 2 if last > 1 else 0]
    top = int(np.argmax(np.abs(values)))
    if 0 < top < last and abs(values[top]) > 1.02 * max(abs(values[0]), abs(values[last])):
        picked.append(top)
    return [k for k in picked if abs(values[k]) > _TOLD * most]


def _once(told: Sequence[Item], near: float) -> list[Item]:
    """Without repeating a value that stands close by already."""
    kept: list[Item] = []
    for item in told:
        (x, y) = item.spots[0]
        if not any(k.name == item.name and np.hypot(x - k.spots[0][0], y - k.spots[0][1]) < near for k in kept):
            kept.append(item)
    return kept
