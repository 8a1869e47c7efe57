"""What every pin, slot, slide, weld and rope must carry: the worst of all cases, both senses and the whole stroke."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import replace
from pathlib import Path

import numpy as np

from linkcalc.design.answer import Caveat, Event
from linkcalc.design.assemble import assembled
from linkcalc.design.caveats import caveats
from linkcalc.design.copy_peaks import copy_peaks
from linkcalc.design.curves import Curves
from linkcalc.design.diameters import Diameters
from linkcalc.design.events import events
from linkcalc.design.footing import ground_quantities
from linkcalc.design.guide_sizes import guide_sized, rope_sized
from linkcalc.design.guides import normal_forces
from linkcalc.design.joint_loads import NO_PEAK, JointLoads
from linkcalc.design.pin_sizes import Mean, PinSizes, Shelf
from linkcalc.design.pin_stacks import stack_quantities
from linkcalc.design.pins_answer import JointLoad, PinsAnswer, Swing
from linkcalc.design.shoes import told_shoes
from linkcalc.design.sizing.bearing_list import bearings as bearing_list
from linkcalc.design.sizing.bush_materials import bush_materials
from linkcalc.design.sizing.model_pins import pin_spec
from linkcalc.design.stroke import walked
from linkcalc.design.survey import Survey
from linkcalc.design.swings import Pair, Swings, pairs_of, speeds
from linkcalc.design.verdicts import verdicts
from linkcalc.faults import fault
from linkcalc.mechanics.path import Path as Way
from linkcalc.mechanics.prepare import Ready, prepare
from linkcalc.model.check import check
from linkcalc.model.mechanism import GROUND, Mechanism
from linkcalc.model.select import only_case
from linkcalc.model.sketch import drawn
from linkcalc.parts.pose import Array
from linkcalc.words import nearest


def pins(
    mechanism: Mechanism,
    *,
    case: str | None = None,
    poses: int | None = None,
    sizes: Mapping[str, Array] | None = None,
    diameters: Mapping[str, float] | float | None = None,
    time: float | None = None,
    rate: float | None = None,
    about: str | tuple[float, float] | None = None,
    bearings: str | Path | None = None,
    bushes: str | Path | None = None,
    inch: bool | None = None,
) -> PinsAnswer:
    """What every joint of a mechanism must carry over the whole stroke and all load cases.

    case       only this load case
    poses      number of poses that the worst is looked for between, instead of the model's
    sizes      name of a dimension -> (copies) [SI] its size in each copy: the worst of these counts too
    diameters  [m] of the pins, for their path of rubbing: of each by name, or one for all that the model gives none
    time       [s] of one stroke, one way, for the speed of rubbing; the stroke's coordinate goes at even speed
    rate       [1/s] instead: strokes there and back; of a stroke that goes all the way round, strokes one way
    about      the point (name, or place in ground axes [m]) that the moment on the foundation is taken about; else the
               first of the ground
    bearings   the user's own list of rolling bearings (CSV), in place of the sample
    bushes     the user's own list of bush materials (CSV or TOML), in place of the table of the package
    inch       True: pins are chosen from inch sizes; None: if the model's unit of length is an inch

    Raises Faults: everything wrong with the model, its freedoms or its stroke; unknown names; time and rate together;
    lists that cannot be read; what is wrong with a pin's stack, material or factor.
    """
    mechanism = only_case(check(mechanism), case)
    ready = prepare(drawn(mechanism))
    place = _about(ready, about)
    sized = Diameters(ready.drawing, diameters)
    solved, path = walked(ready, poses)
    survey = Survey(ready, solved)
    # what is stepped may move nothing: a load that travels along a frame
    pairs = pairs_of(ready.chain) if solved.closed.speed and ready.steps else []
    shelf = _shelf(mechanism, bearings, bushes, inch=inch)
    specs = {pin: pin_spec(pin, mechanism, ready.drawing) for pin in ready.drawing.pins}
    stacks = {pin: spec.stack for pin, spec in specs.items() if spec.stack}
    more = [*speeds(pairs), *normal_forces(ready.chain), *ground_quantities(ready, place)]
    more += [*stack_quantities(survey, stacks), *told_shoes(ready)]
    survey.quantities |= {q.name: q for q in more}
    curves = Curves(survey, survey.first, path.limits if path else ())
    found = events(curves, path, extremes=False) if path else ()
    rounds = _rounds(curves)
    lasting = _time(curves, time, rate, rounds=rounds)
    swings = Swings(curves, pairs) if pairs and curves.drive.size > 1 else None
    loads = JointLoads(curves, found, _swings(swings, pairs, sized, lasting), sized)
    joints, warned = loads.joints(), caveats(curves, path, found)
    if sizes is not None:
        joints, lost = _of_copies(mechanism, sizes, path, curves, joints)
        warned += lost
    rate = 0.0 if np.isnan(lasting) else 0.5 / lasting
    joints = tuple(
        replace(joint, sized=PinSizes(joint, loads.pin_poses(joint), specs[joint.joint], mechanism, shelf,
                                      rate=rate, mean=_mean(swings, pairs, joint)).all())
        if joint.joint in specs and joint.word == "pin"
        else replace(joint, sized=guide_sized(curves, loads, joint.joint))
        for joint in joints
    )  # fmt: skip
    ropes = tuple(replace(rope, sized=rope_sized(curves, rope)) for rope in loads.ropes())
    sized_parts = [part for one in joints for part in one.sized] + [part for one in ropes for part in one.sized]
    if sizes is not None and any(part.worst for part in sized_parts):
        warned += (
            Caveat("copies", "guides and ropes are sized for the mechanism as drawn; copies may load them more"),
        )
    told = (*found, *_told(joints))
    stroke = assembled(ready, survey, survey.first, found=told, judged=verdicts(curves, shelf.bearings), warned=warned)
    variants = 0 if sizes is None else int(np.size(next(iter(sizes.values()))))
    return PinsAnswer(
        stroke, joints, ropes, loads.footing(place), lasting, rounds, variants,
    )  # fmt: skip


def _swings(
    swings: Swings | None, pairs: Sequence[Pair], sized: Diameters, time: float
) -> dict[str, tuple[Swing, ...]]:
    """Those of each joint."""
    out: dict[str, tuple[Swing, ...]] = {}
    for pair in pairs if swings else ():
        radius = sized.of(pair.joint) / 2 if pair.pin else float("nan")
        assert swings is not None
        out[pair.joint] = (*out.get(pair.joint, ()), swings.swing(pair, radius=radius, time=time))
    return out


def _mean(swings: Swings | None, pairs: Sequence[Pair], joint: JointLoad) -> Mean:
    """The mean load of a pin where it turns most, by the exponent of a life."""

    def of(exponent: float) -> float:
        assert swings is not None and joint.swing is not None
        names = swings.members
        pair = next(p for p in pairs if p.joint == joint.joint and p.pin and names[p.member] == joint.swing.member)
        return swings.mean(pair, exponent)[0]

    return of


def _shelf(mechanism: Mechanism, listed: str | Path | None, bushes: str | Path | None, *, inch: bool | None) -> Shelf:
    """What sizes are taken from. Raises Faults: lists that cannot be read."""
    inches = mechanism.units.length in ("in", "inch", "inches") if inch is None else inch
    return Shelf(inches, bearing_list(listed, mechanism.units), bush_materials(bushes) if bushes else None)


def _told(joints: Sequence[JointLoad]) -> Iterator[Event]:
    """The peaks as events of the stroke: its tables and curves go by them."""
    for joint in joints:
        for kind, peak in (("largest", joint.largest), ("smallest", joint.smallest)):
            if np.isfinite(peak.drive) and peak.variant is None:
                name = f"force at {joint.joint}"
                yield Event(kind, name, peak.case, peak.drive, peak.value, "force", peak.felt)
        if joint.moment is not None and np.isfinite(joint.moment.drive):
            name, peak = f"moment at {joint.joint}", joint.moment
            yield Event("largest", name, peak.case, peak.drive, peak.value, "moment")


def _of_copies(
    mechanism: Mechanism, sizes: Mapping[str, Array], path: Way | None, curves: Curves, joints: tuple[JointLoad, ...]
) -> tuple[tuple[JointLoad, ...], tuple[Caveat, ...]]:
    """The joints with the worst of all copies where that goes further, and a warning for copies without an answer."""
    found, lost = copy_peaks(mechanism, sizes, path, curves, [j.joint for j in joints])
    out = []
    for joint in joints:
        largest, smallest = found.get(joint.joint, (NO_PEAK, NO_PEAK))
        if largest.variant is not None and largest.value > joint.largest.value:
            joint = replace(joint, largest=largest)
        if smallest.variant is not None and smallest.value < joint.smallest.value:
            joint = replace(joint, smallest=smallest)
        out.append(joint)
    return tuple(out), lost


def _rounds(curves: Curves) -> bool:
    """True for a stroke that goes whole turns."""
    if curves.drive.size < 2 or curves.survey.ready.drive_kind != "angle":
        return False
    turns = abs(float(curves.drive[-1] - curves.drive[0])) / (2 * np.pi)
    return bool(round(turns) >= 1 and abs(turns - round(turns)) < 1e-6)


def _time(curves: Curves, time: float | None, rate: float | None, *, rounds: bool) -> float:
    """[s] of one stroke, one way; nan if neither is given."""
    if time is not None and rate is not None:
        raise fault((), "both a time and a rate of the stroke", "give one of them")
    given = time if time is not None else rate
    if given is None:
        return float("nan")
    if not (np.isfinite(given) and given > 0):
        raise fault((), f"a stroke cannot have a time or rate of {given:g}", "more than 0 is wanted")
    if curves.drive.size < 2:
        raise fault(("stroke",), "the model has no stroke, so none that takes a time", "give it a [stroke]")
    return given if time is not None else 1.0 / given / (1 if rounds else 2)


def _about(ready: Ready, about: str | tuple[float, float] | None) -> tuple[float, float]:
    """[m] the place that moments on the ground are taken about. Raises Faults: an unknown point."""
    drawing = ready.drawing
    if about is None:
        ground = drawing.mechanism.members.get(GROUND)
        about = ground.points[0] if ground and ground.points else (0.0, 0.0)
    if not isinstance(about, str):
        return float(about[0]), float(about[1])
    if about not in drawing.points:
        raise fault((), f"unknown point {about!r}", nearest(about, drawing.points))
    x, y = drawing.points[about]
    return float(x), float(y)
