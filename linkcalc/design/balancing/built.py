"""A model with what was found put in: an ordinary model, that any command takes."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import replace
from typing import Any

import numpy as np

from linkcalc.design.balancing.block import Block
from linkcalc.model.check import check
from linkcalc.model.mechanism import GROUND, Case, Mechanism, Member
from linkcalc.model.sketch import drawn
from linkcalc.model.units import from_si
from linkcalc.parts.law_push import nominal
from linkcalc.parts.points.coordinates import Coordinates

_DIGITS = 13
"""Significant digits of a size that is not rounded to a step."""
_SAME = 1e-9  # of the drawing: two places are one
AGED = "aged"


def without(mechanism: Mechanism, find: Mapping[str, Any]) -> Mechanism:
    """The model without its [balance], and without the loads that something else takes the place of."""
    gone = {part.instead_of for part in find.values() if part.instead_of}
    loads = {name: load for name, load in mechanism.loads.items() if name not in gone}
    load = None if "load" in gone else mechanism.load
    cases = {name: _rid(case, gone) for name, case in mechanism.cases.items()}
    return replace(mechanism, loads=loads, load=load, cases=cases, balance=None)


def _rid(case: Case, gone: set[str]) -> Case:
    scale = {name: factor for name, factor in case.scale.items() if name not in gone}
    return replace(case, scale=scale, drop=tuple(name for name in case.drop if name not in gone))


def built(
    mechanism: Mechanism, find: Mapping[str, Any], blocks: Iterable[Block], found: Iterable[dict[str, float]]
) -> Mechanism:
    """The model with all of it in, checked; cases come twice, new and aged, where springs lose force.

    Raises Faults: what is found does not go with the rest of the model.
    """
    names = {part.instead_of for part in find.values() if part.instead_of}
    kept = {name: load for name, load in mechanism.loads.items() if name not in names}
    model = replace(without(mechanism, find), loads=kept)
    aged: dict[str, float] = {}
    again: dict[str, str] = {}
    for block, values in zip(blocks, found, strict=True):
        model, loads = _put(model, block, values)
        if block.part.instead_of and loads:
            again[block.part.instead_of] = loads[0]
        aged |= {name: 1.0 - block.loss for name in loads if block.loss}
    model = _cases_again(model, mechanism, again)
    return check(_with_ages(model, aged) if aged else model)


def _put(mechanism: Mechanism, block: Block, values: dict[str, float]) -> tuple[Mechanism, list[str]]:
    written = block.written(values)
    if not written.number:
        return mechanism, []
    points, members = dict(mechanism.points), dict(mechanism.members)
    named: list[str] = []
    carriers: list[str] = []
    for suffix, member, told, (x, y) in written.places:
        point = told or _there(mechanism, member, x, y)
        if not point:
            point = free_name(f"{block.name}_{suffix}", [*points, *mechanism.loads])
            points[point] = Coordinates(written_size(mechanism, x, "length"), written_size(mechanism, y, "length"))
            members[member] = with_point(members.get(member, Member(())), point, ground=member == GROUND)
            carriers.append("")
        else:
            several = sum(point in m.points for m in members.values()) > 1
            if member == GROUND and not any(point in m.points for m in members.values()):
                members[member] = with_point(members.get(member, Member(())), point, ground=True)
            carriers.append(member if several else "")
        named.append(point)
    if any(carriers):
        carriers = [c or m for c, (_, m, _, _) in zip(carriers, written.places, strict=True)]
    load = written.load(tuple(named), tuple(carriers), lambda size, kind: written_size(mechanism, size, kind))
    taken = {*mechanism.loads, *points}
    names = [free_name(block.name if k == 0 else f"{block.name}_{k + 1}", taken) for k in range(written.number)]
    loads = {**mechanism.loads, **dict.fromkeys(names, load)}
    return replace(mechanism, points=points, members=members, loads=loads), names


def _there(mechanism: Mechanism, member: str, x: float, y: float) -> str:
    """A point that the member carries at that place [m] already, "" if there is none."""
    sketch = drawn(mechanism)
    for point in mechanism.members.get(member, Member(())).points:
        px, py = sketch.point(point)
        if np.hypot(nominal(px) - x, nominal(py) - y) <= _SAME * sketch.size:
            return point
    return ""


def with_point(member: Member, point: str, *, ground: bool) -> Member:
    """A member that carries one point more; its body, its centre of mass and its own axis stay where they are."""
    if ground or not member.points:
        return replace(member, points=(*member.points, point))
    if len(member.points) == 1:
        centre = member.centre or (member.points[0] if member.mass is not None else None)
        return replace(member, points=(*member.points, point), centre=centre)
    points = (*member.points[:-1], point, member.points[-1])
    return replace(member, points=points, path=member.path or member.points)


def free_name(name: str, taken: Iterable[str]) -> str:
    """The name, or the first of name_2, name_3, ... that nothing has."""
    used = set(taken)
    if name not in used:
        return name
    return next(n for n in (f"{name}_{k}" for k in range(2, 10_000)) if n not in used)


def written_size(mechanism: Mechanism, size: float, kind: str) -> float:
    """A size [SI] as a bare number of the file."""
    return float(f"{float(from_si(size, kind, mechanism.units)):.{_DIGITS}g}")


def _cases_again(model: Mechanism, original: Mechanism, again: Mapping[str, str]) -> Mechanism:
    """What cases said of a load that was replaced holds for what takes its place."""
    cases = dict(model.cases)
    for name, case in original.cases.items():
        scale = {again[k]: v for k, v in case.scale.items() if k in again}
        drop = tuple(again[k] for k in case.drop if k in again)
        if scale or drop:
            cases[name] = replace(cases[name], scale={**cases[name].scale, **scale}, drop=(*cases[name].drop, *drop))
    return replace(model, cases=cases)


def _with_ages(model: Mechanism, aged: Mapping[str, float]) -> Mechanism:
    cases: dict[str, Case] = {}
    for name, case in (model.cases or {"new": Case()}).items():
        old = f"{name} {AGED}" if model.cases else AGED
        cases[name] = case
        scale = {k: case.scale.get(k, 1.0) * factor for k, factor in aged.items() if k not in case.drop}
        cases[free_name(old, model.cases)] = replace(case, scale={**case.scale, **scale})
    return replace(model, cases=cases)
