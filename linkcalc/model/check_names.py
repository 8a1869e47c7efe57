"""Names that nothing has, and names that two things have."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass
from typing import Any

from linkcalc.model import walk
from linkcalc.model.gather import Gather
from linkcalc.model.materials import material_names
from linkcalc.model.mechanism import GROUND, Mechanism
from linkcalc.words import kinds, nearest

_LOAD, _EFFORT = "load", "effort"


@dataclass(frozen=True)
class Known:
    """Names that stand in a file, those of things that could not be read included: a name is not unknown because
    something else is wrong with what it names."""

    points: tuple[str, ...]
    members: tuple[str, ...]
    joints: tuple[str, ...]
    loads: tuple[str, ...]
    dimensions: tuple[str, ...]
    ropes: tuple[str, ...] = ()
    materials: tuple[str, ...] = ()
    pushers: tuple[str, ...] = ()
    cases: tuple[str, ...] = ()

    @classmethod
    def of(cls, tree: Mapping[str, Any]) -> Known:
        def names(table: str) -> tuple[str, ...]:
            found = tree.get(table)
            return tuple(found) if isinstance(found, Mapping) else ()

        joints = tuple(name for word in kinds("joint") for name in names(f"{word}s"))
        loads = (*((_LOAD,) if "load" in tree else ()), *names("loads"))
        pushers = (*((_EFFORT,) if _EFFORT in tree else ()), *loads)
        members = (GROUND, *(m for m in names("members") if m != GROUND))
        dimensions, ropes, own = names("dimensions"), names("ropes"), names("materials")
        cases = names("cases")
        return cls(names("points"), members, joints, loads, dimensions, ropes, own, pushers, cases)

    def table(self, of: str) -> tuple[str, ...]:
        """The names that a field may give: of = "point", "member", "guide", "load", "rope", "material", "pusher",
        "case"."""
        if of == "material":
            return material_names(self.materials)
        tables = {"point": self.points, "member": self.members, "guide": self.joints, "load": self.loads}
        return {**tables, "rope": self.ropes, "pusher": self.pushers, "case": self.cases}[of]


def _one(value: Any, of: str) -> Iterator[tuple[str, str]]:
    yield of, value


def _many(value: Any, of: str) -> Iterator[tuple[str, str]]:
    for name in value:
        yield of, name


def _line(value: Any, of: str) -> Iterator[tuple[str, str]]:  # noqa: ARG001
    if isinstance(value, tuple):
        yield from _many(value, "point")


def _arcs(value: Any, of: str) -> Iterator[tuple[str, str]]:  # noqa: ARG001
    for centre, _ in value:
        yield "point", centre


def _pairs(value: Any, of: str) -> Iterator[tuple[str, str]]:
    for pair in value:
        yield from _many(pair, of)


_NAMES: dict[str, Callable[[Any, str], Iterator[tuple[str, str]]]] = {
    "name": _one, "names": _many, "line": _line, "arcs": _arcs, "pairs": _pairs,
    "factors": lambda value, _: _many(value, "load"),
}  # fmt: skip
"""Kind of field -> the names it gives, each with what it names."""


def check_names(mechanism: Mechanism, known: Known, gather: Gather) -> None:
    """Names of points, members, slots and loads that nothing has."""
    for part in walk.everything(mechanism):
        for item, entry, value in part.fields():
            names = _NAMES.get(entry.metadata["kind"])
            for of, name in names(value, entry.metadata.get("of", "")) if names else ():
                own = getattr(part.part, "add", {}) if of == "load" and entry.name == "scale" else {}
                if name not in known.table(of) and name not in own:
                    kind = {"guide": "slot, slide or track", "pusher": "load"}.get(of, of)
                    gather.add(item, f"unknown {kind} {name!r}", nearest(name, known.table(of)))


def check_clashes(mechanism: Mechanism, gather: Gather) -> None:
    """Two things of one name whose answers could not be told apart: forces are told by joint and by load."""
    taken = dict.fromkeys(mechanism.points, "a point")
    for item, _ in walk.joints(mechanism):
        name = item[-1]
        if name in taken:
            gather.add(item, f"{name!r} is {taken[name]} already", "another name is wanted")
        taken[name] = f"one of [{item[0]}]"
    carried = [point for member in mechanism.members.values() for point in dict.fromkeys(member.points)]
    free = {point for point in mechanism.points if carried.count(point) < 2}
    for item, _ in walk.loads(mechanism):
        name = item[-1]
        if len(item) == 1 or item[-2] not in ("loads", "add"):
            continue
        if name in (_LOAD, _EFFORT):
            gather.add(item, f"{name!r} is the main {name}", "another name is wanted")
        elif name in taken and name not in free:
            what = "a pin" if name in mechanism.points else taken[name]
            gather.add(item, f"{name!r} is {what} already", "another name is wanted")
        elif item[0] == "cases" and name in mechanism.loads:
            gather.add(item, f"{name!r} is one of [loads] already", "another name is wanted")
