"""From the words of a model file to blocks of numbers, with all that is wrong with the bounds."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from functools import singledispatch
from typing import Any

import numpy as np

from linkcalc.design.balancing.block import Block, Unknown
from linkcalc.design.balancing.counterweight import CounterweightBlock
from linkcalc.design.balancing.spring import CoilBlock, End, GasBlock
from linkcalc.faults import Fault, Faults, fault
from linkcalc.mechanics.prepare import Ready
from linkcalc.model.mechanism import GROUND
from linkcalc.model.sketch import Drawing
from linkcalc.model.units import show
from linkcalc.parts.balancers.coil import ENDS, Coil
from linkcalc.parts.balancers.counterweight import Counterweight
from linkcalc.parts.balancers.gas_strut import GasStrut
from linkcalc.parts.contract import Size
from linkcalc.parts.law_push import nominal
from linkcalc.parts.pose import Value
from linkcalc.parts.rooms import Room
from linkcalc.parts.rooms.within import Within
from linkcalc.words import nearest


def blocks(ready: Ready, find: Mapping[str, Any]) -> tuple[Block, ...]:
    """A block for each thing that is to be put in. Raises Faults, all that are found."""
    found, wrong = [], list[Fault]()
    for name, part in find.items():
        try:
            found.append(_block(part, _Asked(ready, name)))
        except Faults as faults:
            wrong += [Fault(("balance", "find", name, *f.item), f.what, f.wanted) for f in faults.faults]
    if wrong:
        raise Faults(wrong)
    return tuple(found)


class _Asked:
    """What the file says of one part, as numbers."""

    def __init__(self, ready: Ready, name: str):
        self.ready, self.name, self.sketch = ready, name, ready.drawing

    def one(self, size: Size | None, kind: str) -> float | None:
        return None if size is None else nominal(self.sketch.value(size, kind))

    def sure(self, size: Size, kind: str) -> float:
        return nominal(self.sketch.value(size, kind))

    def unknown(self, key: str, name: str, span: Any, kind: str, step: Size | None = None) -> Unknown:
        """Raises Faults: bounds the wrong way round."""
        if span is None:
            low, high = 0.0, np.inf
        elif isinstance(span, tuple):
            low, high = (self.sure(s, kind) for s in span)
        else:
            low = high = self.sure(span, kind)
        if low > high:
            texts = [show(v, kind, self.sketch.mechanism.units) for v in (low, high)]
            raise fault((key,), f"from {texts[0]} to {texts[1]} is the wrong way round", "[least, most] is wanted")
        rounded = 0.0 if step is None else self.sure(step, kind)
        if rounded and low < high and np.floor(high / rounded + 1e-9) * rounded < low - 1e-12 * abs(low):
            what = f"no whole step of {show(rounded, kind, self.sketch.mechanism.units)} lies within the bounds"
            raise fault((key,), what, "wider bounds or a smaller step are wanted")
        return Unknown(name, kind, low, high, rounded)

    def origin(self, member: int) -> tuple[float, float]:
        x, y = self.sketch.origins[member]
        return nominal(x), nominal(y)


@singledispatch
def _block(part: Any, asked: _Asked) -> Block:  # noqa: ARG001
    raise TypeError(f"no way to balance with {type(part).__name__}")


@_block.register
def _counterweight(part: Counterweight, asked: _Asked) -> Block:
    sketch = asked.sketch
    member = sketch.member(part.mass_on)
    if part.mass_on == GROUND:
        moving = [m for m in sketch.members if m != GROUND]
        raise fault(("mass_on",), "the ground does not move: a mass on it balances nothing", nearest("", moving))
    place = part.place or _reach(sketch, part.mass_on)
    room = _located(("place",), lambda: place.room(sketch))
    if room.point and part.mass_on not in sketch.carriers(room.point):
        wanted = nearest(room.point, sketch.mechanism.members[part.mass_on].points)
        raise fault(("place",), f"{part.mass_on} does not carry {room.point}", wanted)
    mass = asked.unknown("mass", "mass", part.mass, "mass", part.mass_step)
    step = asked.one(part.place_step, "length") or 0.0
    return CounterweightBlock(asked.name, part, member, asked.origin(member), room, mass, step)


def _reach(sketch: Drawing, member: str) -> Within:
    """Left out: as far from the member's first point as its points go."""
    first = sketch.first_point(member)
    x, y = sketch.point(first)
    others = [sketch.point(p) for p in sketch.mechanism.members[member].points]
    far = max(float(np.hypot(nominal(px) - nominal(x), nominal(py) - nominal(y))) for px, py in others)
    if not far > 0:
        raise fault(("place",), f"{member} has one point only: how far out may it be?", "a place is wanted")
    return Within(f"{far!r} m", first)


def _ends(rooms: tuple[Any, ...], key: str, asked: _Asked) -> tuple[End, End]:
    if len(rooms) != 2:
        raise fault((key,), f"a list of {len(rooms)}", ENDS)
    first, second = (_end(room, key, k, asked) for k, room in enumerate(rooms, 1))
    if first.member == second.member:
        what = f"both ends are on {asked.sketch.members[first.member]}: it does nothing"
        raise fault((key,), what, "places on two members are wanted, each with its 'on'")
    return first, second


def _end(place: Any, key: str, which: int, asked: _Asked) -> End:
    sketch, item = asked.sketch, (key, str(which))
    room: Room = _located(item, lambda: place.room(sketch))
    carriers = [set(sketch.carriers(p)) for p in place.points]
    if place.on is not None:
        if room.point and place.on not in carriers[0]:
            raise fault((*item, "on"), f"{place.on} does not carry {room.point}", nearest(place.on, carriers[0]))
        member = sketch.member(place.on)
        return End(room, member, asked.origin(member), place.on)
    if room.point:
        if not carriers[0]:
            raise fault(item, f"no member carries {room.point}", f"name it in a member, or add its 'on' = {GROUND!r}")
        alone = len(carriers[0]) == 1
        name = sketch.hub(room.point)
        member = sketch.member(name)
        return End(room, member, asked.origin(member), name if alone else "")
    shared = set.intersection(*carriers)
    if len(shared) != 1:
        raise fault(item, "it is not told which member has it", "add on = MEMBER")
    name = shared.pop()
    member = sketch.member(name)
    return End(room, member, asked.origin(member), name)


@_block.register
def _coil(part: Coil, asked: _Asked) -> Block:
    ends = _ends(part.spring, "spring", asked)
    free = asked.unknown("free_length", "free length", part.free_length, "length", part.length_step)
    shortest, longest = asked.one(part.shortest, "length"), asked.one(part.longest, "length")
    if shortest is not None and longest is not None and longest <= shortest:
        raise fault(("longest",), "it is not longer than the shortest", "a longer one is wanted")
    return CoilBlock(
        asked.name, part, ends, asked.one(part.place_step, "length") or 0.0, part.number, _loss(part, asked),
        asked.sketch.size, asked.unknown("rate", "rate", part.rate, "stiffness", part.rate_step), free, part.acts,
        shortest, longest,
    )  # fmt: skip


@_block.register
def _gas(part: GasStrut, asked: _Asked) -> Block:
    ends = _ends(part.gas_spring, "gas_spring", asked)
    length = asked.unknown("length", "length", part.length, "length", part.length_step)
    stroke, rise = asked.sure(part.stroke, "length"), asked.sure(part.rise, "number")
    if stroke >= length.high:
        texts = [show(v, "length", asked.sketch.mechanism.units) for v in (stroke, length.high)]
        raise fault(("stroke",), f"{texts[0]}, not less than its length, {texts[1]}", "less is wanted")
    if rise < 1:
        raise fault(("rise",), f"{rise:g} cannot stand here", "1 or more is wanted, usually 1.2 to 1.4")
    return GasBlock(
        asked.name, part, ends, asked.one(part.place_step, "length") or 0.0, part.number, _loss(part, asked),
        asked.sketch.size, asked.unknown("force", "force", part.force, "force", part.force_step), length, stroke, rise,
        asked.sure(part.exponent, "number"), asked.sure(part.spare, "length"), _warmth(part, asked),
    )  # fmt: skip


def _loss(part: Coil | GasStrut, asked: _Asked) -> float:
    loss = asked.sure(part.loss, "number")
    if loss >= 1:
        raise fault(("loss",), f"{loss:g} of its force is all of it", "a part is wanted, e.g. 0.1")
    return loss


def _warmth(part: GasStrut, asked: _Asked) -> Value:
    """(case, 1, 1) strength over that at the temperature at which it is told: the ideal gas keeps p/T."""
    mechanism = asked.sketch.mechanism
    told = asked.sure(part.temperature, "temperature")
    cases = list(mechanism.cases.values())
    warm = [c.temperature if c.temperature is not None else mechanism.temperature for c in cases]
    kelvin = [asked.sure(t, "temperature") for t in warm or [mechanism.temperature]]
    every = np.repeat(kelvin, len(asked.ready.pushing.cases) // len(kelvin))
    return np.asarray(every / told, float).reshape(-1, 1, 1)


def _located(item: tuple[str, ...], make: Callable[[], Room]) -> Room:
    try:
        return make()
    except Faults as found:
        raise Faults([Fault((*item, *f.item), f.what, f.wanted) for f in found.faults]) from None
