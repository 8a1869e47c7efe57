"""Poises and counterpoises that stand on nothing, or off their bar."""

from __future__ import annotations

from linkcalc.model import walk
from linkcalc.model.check_joints import Carried
from linkcalc.model.gather import Gather
from linkcalc.model.mechanism import GROUND, Mechanism
from linkcalc.model.poises import TARE, ZERO, Poise
from linkcalc.model.sketch import Drawing
from linkcalc.model.units import show
from linkcalc.parts.contract import Size

_SLACK = 1e-9


def check_poises(mechanism: Mechanism, gather: Gather) -> None:
    """Lines and hangers that no member carries, and keys that do not go together."""
    carried = Carried(mechanism)
    for name, poise in mechanism.poises.items():
        _check_line(name, poise, carried, gather)
        place = ("poises", name)
        if poise.notches != () and poise.notch_load is not None:
            gather.add((*place, "notch_load"), "'notches' is given too", "one of the two is wanted")
        if poise.use == ZERO and (poise.notches != () or poise.notch_load is not None):
            gather.add(place, "what sets the empty scale to zero has no notches", "leave them out")
    for name, counterpoise in mechanism.counterpoises.items():
        place = ("counterpoises", name)
        carriers = [m for m in carried.by(counterpoise.at) if m != GROUND]
        if not carriers:
            gather.add(place, f"no member that moves carries {counterpoise.at}", f"name {counterpoise.at} in the beam")
        elif counterpoise.on is not None and counterpoise.on not in carriers:
            wanted = f"{' or '.join(carriers)} is wanted"
            gather.add((*place, "on"), f"{counterpoise.on} does not carry {counterpoise.at}", wanted)
    for use in (TARE, ZERO):
        same = [name for name, p in mechanism.poises.items() if p.use == use]
        if len(same) > 1:
            gather.add(("poises", same[1], "use"), f"{same[0]} is for {use} already", "one is wanted")
    names = {*mechanism.loads, *mechanism.points, "load", "effort"}
    for item, _ in walk.balancers(mechanism):
        if item[-1] in names or (item[0] == "counterpoises" and item[-1] in mechanism.poises):
            gather.add(item, f"{item[-1]!r} is the name of something else already", "another name is wanted")


def _check_line(name: str, poise: Poise, carried: Carried, gather: Gather) -> None:
    item = ("poises", name)
    first, second = poise.along
    both = [m for m in carried.by(first) if m in carried.by(second) and m != GROUND]
    if first == second:
        gather.add((*item, "along"), f"{first} to {second} is no line", "two points are wanted")
    elif not both:
        what = f"no member that moves carries both {first} and {second}"
        gather.add((*item, "along"), what, "name both points in the beam")
    elif poise.on is not None and poise.on not in both:
        gather.add((*item, "on"), f"{poise.on} does not carry {first} and {second}", f"{' or '.join(both)} is wanted")
    elif poise.on is None and len(both) > 1:
        gather.add(item, f"{' and '.join(both)} both carry {first} and {second}", "tell with 'on' which one it is on")


def check_bars(drawing: Drawing, gather: Gather) -> None:
    """Places off the bar, as it is drawn."""
    units = drawing.mechanism.units
    for name, poise in drawing.mechanism.poises.items():
        length = float(poise.length(drawing))
        low, high = sorted(float(end) for end in poise.ends(drawing))
        slack = _SLACK * length

        def off(
            key: str, size: Size, low: float, high: float, what: str, name: str = name, slack: float = slack
        ) -> None:
            place = float(drawing.value(size, "length"))
            if not low - slack <= place <= high + slack:
                ends = f"from {show(low, 'length', units)} to {show(high, 'length', units)} is wanted"
                gather.add(("poises", name, key), f"{show(place, 'length', units)} is off {what}", ends)

        bar = f"its bar {poise.along[0]} to {poise.along[1]}"
        before = len(gather.faults)
        off("from", poise.start, 0.0, length, bar)
        if poise.stop is not None:
            off("to", poise.stop, 0.0, length, bar)
        if poise.at is not None:
            off("at", poise.at, 0.0, length, bar)
        if len(gather.faults) > before:
            continue
        if high - low <= _SLACK * length:
            gather.add(("poises", name, "to"), "it cannot slide: 'from' and 'to' are one place", "two are wanted")
        for one in poise.notches if isinstance(poise.notches, tuple) else ():
            off("notches", one, low, high, "the way of the poise")
