"""A mechanism of plain parts put before the independent solution: same numbers in, table against table.

Only what that solution knows: pins, slots, slides; forces that keep their direction or turn with the member they act
on, torques, pairs and weights, each on a member of its own; driven by a turn or a distance.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.mechanism import GROUND, Mechanism
from linkcalc.model.sketch import Drawing
from linkcalc.parts.coordinates.turn import Turn
from linkcalc.parts.loads.force import Force
from linkcalc.parts.loads.pair import Pair
from linkcalc.parts.loads.torque import Torque
from linkcalc.parts.loads.weight import Weight
from tests.reference import linkage as plain
from tests.reference.linkage import Linkage, Solution


def linkage_of(mechanism: Mechanism) -> Linkage:
    """The mechanism, drawn and in SI, as the independent solution takes it."""
    drawing = Drawing(mechanism)
    places = {name: (float(x), float(y)) for name, (x, y) in drawing.points.items()}
    bodies = {name: member.points for name, member in mechanism.members.items()}
    g, down = drawing.value(mechanism.gravity.size, "acceleration"), drawing.value(mechanism.gravity.direction, "angle")

    def weight(body: str, place: str, mass: float) -> plain.Force:
        return plain.Force(body, place, float(mass * g * np.cos(down)), float(mass * g * np.sin(down)))

    def load(part: Any) -> plain.Load:
        kind = "moment" if isinstance(part, Torque) else "force"
        size = 1.0 if part.size is None else float(drawing.value(part.size, kind))
        match part:
            case Torque():
                return plain.Torque(part.torque_on, size, part.against)
            case Pair():
                (p, q), (a, b) = part.between, part.on or ("", "")
                return plain.Pair(((a, p), (b, q)), size)
            case Force() if part.square_to:
                (ax, ay), (bx, by) = (places[p] for p in part.square_to)
                far = np.hypot(bx - ax, by - ay)
                return plain.Force(
                    part.on or "", part.at, float(size * (ay - by) / far), float(size * (bx - ax) / far), True
                )
            case Force():
                angle = drawing.value(part.direction or 0, "angle")
                turns = part.turns_with is not None
                return plain.Force(
                    part.on or "", part.at, float(size * np.cos(angle)), float(size * np.sin(angle)), turns
                )
        raise TypeError(f"the independent solution knows no {part}")

    loads: list[plain.Load] = []
    for part in (mechanism.load, *mechanism.loads.values()):
        if isinstance(part, Weight):
            loads.append(weight(part.on or "", part.mass_at, drawing.value(part.mass, "mass")))
        elif part is not None and drawing.value(part.size, "moment" if isinstance(part, Torque) else "force"):
            loads.append(load(part))
    for name, member in mechanism.members.items():
        if member.mass is not None and name != GROUND:
            middle = f"middle of {name}"
            site, origin = drawing.mass_site(name), places[member.points[0]]
            places[middle] = (origin[0] + float(site.u), origin[1] + float(site.v))
            loads.append(weight(name, middle, drawing.value(member.mass, "mass")))
    along = mechanism.stroke.along if mechanism.stroke else None
    drive: Any = None
    if along is not None:
        drive = (
            plain.Turn(along.turn)
            if isinstance(along, Turn)
            else plain.Distance(tuple((drawing.hub(p), p) for p in along.distance))
        )
    return Linkage(
        places,
        bodies,
        tuple(
            plain.Slot(s.of or drawing.hub(s.point), s.point, _direction(places, s.along), s.on)
            for s in mechanism.joints.get("slot", {}).values()
        ),
        tuple(
            plain.Slide(s.member, s.at or bodies[s.member][0], _direction(places, s.along), s.on)
            for s in mechanism.joints.get("slide", {}).values()
        ),
        tuple(loads),
        load(mechanism.effort) if mechanism.effort else None,
        drive,
    )


def _direction(places: dict[str, tuple[float, float]], line: Any) -> tuple[float, float]:
    (ax, ay), (bx, by) = (places[p] for p in line)
    return bx - ax, by - ay


def felt(answer: StrokeAnswer, place: str, member: str) -> np.ndarray:
    """(pose, 3): all that a member feels at a place, from the table of bearings: force x, y [N] and moment [N m]."""
    m = answer.mechanism
    total = np.zeros((answer.status.shape[2], 3))
    for k, b in enumerate(answer.bearings):
        at = b.joint
        if b.word != "pin":
            part = m.joints[b.word][b.joint]
            at = part.point if b.word == "slot" else part.at or m.members[part.member].points[0]
        if (at, b.member) == (place, member):
            total += np.stack([answer.force[k, 0, 0, 0], answer.force[k, 1, 0, 0], answer.moment[k, 0, 0]], axis=1)
    return total


def places_of(solution: Solution) -> list[tuple[str, str]]:
    """Every (place, body) where the independent solution tells a force."""
    return sorted({(place, body) for place, a, b in solution.forces for body in (a, b)})
