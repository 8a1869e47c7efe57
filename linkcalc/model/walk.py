"""Every field that a mechanism fills in, with its place in the file: what the checks go over."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import Field
from typing import Any, NamedTuple

from linkcalc.model.gather import Item
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.tree import key_of
from linkcalc.parts.fields import part_fields


class Part(NamedTuple):
    """A dataclass of the model and its place in the file."""

    item: Item
    part: Any

    def fields(self) -> Iterator[tuple[Item, Field[Any], Any]]:
        """Its fields that are given, those of parts within it too: place, field, value."""
        for entry in part_fields(self.part):
            value = getattr(self.part, entry.name)
            item = (*self.item, key_of(type(self.part), entry))
            if entry.metadata["kind"] == "parts":
                for k, one in enumerate(value, 1):
                    yield from Part((*item, str(k)), one).fields()
            elif value is not None:
                yield item, entry, value


def joints(mechanism: Mechanism) -> Iterator[Part]:
    """Slots, slides, welds."""
    for word, parts in mechanism.joints.items():
        for name, part in parts.items():
            yield Part((f"{word}s", name), part)


def loads(mechanism: Mechanism) -> Iterator[Part]:
    """Effort, load, loads, and what the cases add to them."""
    for name, part in (("effort", mechanism.effort), ("load", mechanism.load)):
        if part is not None:
            yield Part((name,), part)
    for name, part in mechanism.loads.items():
        yield Part(("loads", name), part)
    for case_name, case in mechanism.cases.items():
        if case.effort is not None:
            yield Part(("cases", case_name, "effort"), case.effort)
        for name, part in case.add.items():
            yield Part(("cases", case_name, "add", name), part)


def balancers(mechanism: Mechanism) -> Iterator[Part]:
    """Poises and counterpoises."""
    for name, poise in mechanism.poises.items():
        yield Part(("poises", name), poise)
    for name, counterpoise in mechanism.counterpoises.items():
        yield Part(("counterpoises", name), counterpoise)


def everything(mechanism: Mechanism) -> Iterator[Part]:
    """All parts of a mechanism, down to the cases."""
    for name, part in mechanism.points.items():
        yield Part(("points", name), part)
    for name, member in mechanism.members.items():
        yield Part(("members", name), member)
        if member.section is not None:
            yield Part(("members", name, "section"), member.section)
    yield from joints(mechanism)
    for point, pin in mechanism.pins.items():
        yield Part(("pins", point), pin)
    for name, material in mechanism.materials.items():
        yield Part(("materials", name), material)
    yield Part(("friction",), mechanism.friction)
    yield Part((), mechanism)
    yield Part(("gravity",), mechanism.gravity)
    yield from loads(mechanism)
    yield from balancers(mechanism)
    if mechanism.stroke is not None:
        yield Part(("stroke",), mechanism.stroke)
        yield Part(("stroke",), mechanism.stroke.along)
    if mechanism.balance is not None:
        yield Part(("balance",), mechanism.balance)
        for name, one in mechanism.balance.find.items():
            yield Part(("balance", "find", name), one)
            if getattr(one, "place", None) is not None:
                yield Part(("balance", "find", name, "place"), one.place)
    for name, case in mechanism.cases.items():
        yield Part(("cases", name), case)
        yield Part(("cases", name, "gravity"), case.gravity)
