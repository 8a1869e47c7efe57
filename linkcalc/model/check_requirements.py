"""Requirements that ask of what the model has not."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

from linkcalc.faults import fault
from linkcalc.model import walk
from linkcalc.model.check_names import Known
from linkcalc.model.dimensions import reckon
from linkcalc.model.gather import Gather
from linkcalc.model.mechanism import Mechanism, Pin
from linkcalc.model.requirements import (
    DRAWN,
    EXAMPLES,
    JOINT,
    LOADING,
    MEMBER,
    MOVER,
    NEEDS,
    PIN,
    PRESSED,
    ROPE,
    SAFETY,
    Requirement,
    requirement,
)
from linkcalc.model.sketch import Drawing
from linkcalc.model.told import told_by
from linkcalc.words import nearest


def check_requirements(mechanism: Mechanism, known: Known, drawing: Drawing | None, gather: Gather) -> None:
    """Each requirement by itself: its text, its names, its sizes. Without a drawing names are only looked up."""
    sizes = reckon(mechanism, {}, Gather())
    for name, text in mechanism.requirements.items():
        with gather.at("requirements", name):
            one = requirement(name, text)
            if any(gather.touches(table) for table in ("effort", "load", "stroke", "units", "dimensions")):
                continue  # what it is judged by is not known
            _check_has(one, mechanism)
            _check_names(one, mechanism, known, drawing)
            if drawing:
                _check_told(one, drawing)
            if one.strength:
                _check_strength(one, mechanism, drawing)
            one.limit(mechanism, sizes)
            one.place(mechanism, sizes)


def _check_has(one: Requirement, mechanism: Mechanism) -> None:
    """The model must have the effort, load and stroke that are spoken of."""
    needs = {"effort": ("effort",), "load": ("load",), "tare effort": ("effort",)}
    ratios = {"force ratio": ("effort", "load"), "ideal ratio": ("effort", "load")}
    for part in (needs | ratios).get(one.quantity, ()):
        if getattr(mechanism, part) is None:
            raise fault(
                (), f"the model has no {part}", f"give it an [{part}]" if part == "effort" else "give it a [load]"
            )
    if one.at and mechanism.stroke is None:
        raise fault((), f"the model has no stroke for 'at {one.at}'", "give it a [stroke], or leave that out")


def _check_names(one: Requirement, mechanism: Mechanism, known: Known, drawing: Drawing | None) -> None:
    joints = tuple(_sides(drawing)) if drawing else known.joints + known.points
    pools = {JOINT: joints, MEMBER: known.members[1:], MOVER: known.joints + known.points}
    pools[DRAWN] = known.members[1:] + known.ropes
    pools[PIN] = tuple(drawing.pins) if drawing else known.points
    pools[PRESSED] = pools[PIN] + (tuple(guides(mechanism)) if drawing else known.joints)
    pools[LOADING] = tuple(item[-1] for item, _ in walk.loads(mechanism))
    pools[ROPE] = known.ropes
    what = one.measure.of
    if what == DRAWN and not known.ropes:
        what = MEMBER
    if what:
        # the sides of a rope ("hoist at P") are known from a drawing only
        _known(one.of if drawing else one.of.partition(" at ")[0], what, pools[what])
    if one.on:
        _known(one.on, "member", known.members)


def _check_told(one: Requirement, drawing: Drawing) -> None:
    """The joint must have that force, moment or travel, and the member that side of it."""
    of = one.measure.of
    joints = [joint for joint in drawing.joints if joint.name == one.of]
    if of == JOINT and not joints:  # one side of a joint that acts at several places
        _check_side(one, drawing)
    elif of == JOINT:
        if one.measure.kind == "moment" and not any(any(joint.angular) for joint in joints):
            able = [j.name for j in drawing.joints if any(j.angular)]
            raise fault((), f"{one.of!r} takes no moment", nearest(one.of, able))
        sides = {drawing.members[m] for joint in joints for m in joint.members}
        if one.on and one.on not in sides:
            raise fault((), f"{one.of!r} does not join {one.on!r}", f"it joins {', '.join(sorted(sides))}")
    if of == MOVER and one.of not in drawing.points and not any(hasattr(joint, "travel") for joint in joints):
        raise fault((), f"{one.of!r} has no travel", "a point, slot, slide or track is wanted")
    for key in NEEDS.get(one.quantity, ()) if one.inside else ():
        if getattr(drawing.mechanism.members[one.of], key) is None:
            raise fault((), f"{one.of!r} has no {key}", f"give the member one: {EXAMPLES[key]}")
    if of == LOADING:
        told = [t.name for (_, name), load in drawing.pushers().items() if name == one.of for t in told_by(load)]
        if one.quantity not in told:
            wanted = f"it tells {', '.join(dict.fromkeys(told))}" if told else "a spring, a cylinder or the like does"
            raise fault((), f"{one.of!r} tells no {one.quantity}", wanted)


def guides(mechanism: Mechanism) -> Mapping[str, Any]:
    """The joints that tell of the face they bear on, if they care to."""
    return {item[-1]: joint for item, joint in walk.joints(mechanism) if hasattr(joint, "allowed_pressure")}


def _check_strength(one: Requirement, mechanism: Mechanism, drawing: Drawing | None) -> None:
    """What the pin, guide or rope must have, beside its force, for what is asked of it."""
    if drawing is None and one.of not in mechanism.points:
        return  # its joint may be what is wrong
    if one.quantity == SAFETY:
        if mechanism.joints["rope"][one.of].breaking_load is None:
            raise fault((), f"the rope {one.of} has no breaking load", f"give it one: [ropes.{one.of}] breaking_load")
    elif one.of in guides(mechanism):
        _check_guide(one, guides(mechanism)[one.of])
    else:
        _check_pin(one, mechanism)


def _check_guide(one: Requirement, guide: Any) -> None:
    if one.on:
        raise fault((), f"the {one.quantity} is that of the whole guide", f"leave 'on {one.on}' out")
    lacking = [key for key in ("length", "width") if getattr(guide, key) is None]
    if lacking:
        raise fault((), f"the guide {one.of} has no {' and no '.join(lacking)}", "the face that it bears on is wanted")


def _check_pin(one: Requirement, mechanism: Mechanism) -> None:
    """What the pin must have, beside its force, for what is asked of it."""
    pin = mechanism.pins.get(one.of, Pin())
    if one.on:
        raise fault((), f"the {one.quantity} is that of the whole pin", f"leave 'on {one.on}' out")
    if one.quantity == "life":
        if pin.bearing is None:
            raise fault((), f"the pin {one.of} has no bearing", f'name one: [pins.{one.of}] bearing = "..."')
        return
    if pin.diameter is None and mechanism.friction.diameter is None:
        raise fault((), f"the pin {one.of} has no diameter", f"give it one: [pins.{one.of}] diameter")
    lined = one.quantity == "pressure" and pin.bush is not None and pin.length is not None
    if not pin.stack and not lined:
        besides = ", or a bush and its length" if one.quantity == "pressure" else ""
        wanted = f"give it the plates across it in order: [pins.{one.of}] stack{besides}"
        raise fault((), f"the pin {one.of} has no stack", wanted)


def _sides(drawing: Drawing) -> dict[str, str]:
    """Names of all joints; of one that acts at several places those of its sides, each with its member or pin."""
    sides: dict[str, str] = {}
    for joint in drawing.joints:
        if not hasattr(joint, "contacts"):
            sides[joint.name] = ""
            continue
        for contact in joint.contacts(drawing.drawn):
            pin = contact.on_pin if contact.on_pin in drawing.pins else ""
            sides[contact.name] = f"pin {pin}" if pin else drawing.members[contact.site.member]
    return sides


def _check_side(one: Requirement, drawing: Drawing) -> None:
    feels = _sides(drawing)[one.of]
    if one.measure.kind == "moment":
        raise fault((), f"{one.of!r} takes no moment", "a slide or weld is wanted")
    if one.on and one.on != feels:
        raise fault((), f"{one.of!r} does not join {one.on!r}", f"it acts on {feels}: leave 'on {one.on}' out")


def _known(name: str, what: str, pool: Iterable[str]) -> None:
    if name not in pool:
        raise fault((), f"unknown {what} {name!r}", nearest(name, pool))
