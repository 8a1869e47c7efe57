"""One pose of an answer as geometry and forces: where everything is, and what acts on which member."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.parts_list import EFFORT, LOAD, CaseLoads
from linkcalc.model.sketch import drawn
from linkcalc.parts.contract import Joint, Mark, Pusher, Site
from linkcalc.parts.law_push import ROD_FORCE
from linkcalc.parts.pose import Poses

Spot = tuple[float, float]


@dataclass(frozen=True)
class Acts:
    """A force or couple on one member or pin.

    name    what the file calls it, or the joint it comes from
    tone    "effort", "load", "joint", or the shape that any other load is drawn by
    member  index of the member, 0 for the ground
    pin     name of the pin that takes it, "" if the member does
    spot    [m] where it acts
    force   [N] ground axes
    moment  [N m] about the spot, counter-clockwise plus
    """

    name: str
    tone: str
    member: int
    pin: str
    spot: Spot
    force: tuple[float, float]
    moment: float

    def about(self, x: float, y: float) -> float:
        """[N m] its moment about a place [m]."""
        return self.moment + (self.spot[0] - x) * self.force[1] - (self.spot[1] - y) * self.force[0]


class Scene:
    """What a drawing asks of an answer; everything in SI, one variant."""

    def __init__(self, answer: StrokeAnswer):
        self.answer = answer
        self.sketch = drawn(answer.mechanism)

    @cached_property
    def _cases(self) -> tuple[CaseLoads, ...]:
        """In the order of the answer's: with friction each comes twice, along the stroke and back."""
        return tuple(c for c in self.sketch.assembly().cases for _ in range(1 + self.answer.rubs))

    def at(self, pose: int, case: int = 0) -> Poses:
        """All members in one pose, as plain numbers; gravity as in that case."""
        a, loads = self.answer, self._cases[case]
        placed = min(case, a.turn.shape[1] - 1)  # only free members stand elsewhere in other cases
        x, y, turn = (q[:, placed, 0, pose] for q in (a.x, a.y, a.turn))
        down = (_number(loads.down[0]), _number(loads.down[1]))
        c, s = [float(v) for v in np.cos(turn)], [float(v) for v in np.sin(turn)]
        at = Poses([float(v) for v in x], [float(v) for v in y], c, s, down, _number(loads.field))
        stroke = a.mechanism.stroke
        if stroke is not None and getattr(stroke.along, "stands", False):
            at = stroke.along.coordinate(self.sketch).put(at, float(a.drive[0, 0, pose]))
        return at

    def known(self, pose: int) -> bool:
        """False where the pose could not be computed."""
        return bool(np.isfinite(self.answer.turn[:, 0, 0, pose]).all())

    def point(self, at: Poses, point: str, member: str) -> Spot:
        """[m] a point as a member carries it."""
        return _spot(at.spot(self.sketch.site(point, member)))

    def place(self, at: Poses, site: Site) -> Spot:
        """[m] where a site is."""
        return _spot(at.spot(site))

    def body(self, at: Poses, member: str) -> tuple[Spot, ...]:
        """[m] the line of a member's body."""
        entry = self.answer.mechanism.members[member]
        return tuple(self.point(at, p, member) for p in entry.path or entry.points)

    def joints(self, at: Poses) -> list[tuple[Joint, Mark]]:
        """Every joint with its mark, once for each name and place."""
        seen: dict[tuple[str, str], tuple[Joint, Mark]] = {}
        for joint in self.sketch.joints:
            mark = joint.mark(at)
            # of the joints of one pin the one that has the ground in it says most
            if (mark.shape, mark.name) not in seen or 0 in joint.members:
                seen[mark.shape, mark.name] = (joint, mark)
        return list(seen.values())

    def pushers(self, case: int) -> Iterator[tuple[Pusher, str, float]]:
        """Everything that pushes in a case, with its tone and factor."""
        loads, pushers = self._cases[case], self.sketch.pushers()
        if loads.effort is not None:
            yield pushers[loads.effort], EFFORT, 1.0
        for key, factor in loads.factors.items():
            yield pushers[key], LOAD if key == ("", LOAD) else pushers[key].mark(self.at(0, case)).shape, factor

    def acting(self, pose: int, case: int) -> list[Acts]:
        """What pushes from outside: effort, loads, weights, each where it acts."""
        at, found = self.at(pose, case), []
        answered = {EFFORT: self.answer.effort, LOAD: self.answer.load}
        for pusher, tone, factor in self.pushers(case):
            if hasattr(pusher, "through"):
                continue  # a joint tells it
            rod = f"{ROD_FORCE} of {pusher.name}"
            told = next((r.values[case, 0, pose] for r in self.answer.readings if r.name == rod), None)
            size = answered[tone][case, 0, pose] if tone in answered else factor * _number(pusher.strength(at))
            size = size if told is None else told
            spots = pusher.mark(at).spots
            for k, push in enumerate(pusher.push(at)):
                member, fx, fy, turning = push[0], *(float(part * size) for part in push[1:])
                # pushes come one a spot; the two couples of a torque share the only one
                x, y = spots[min(k, len(spots) - 1)]
                moment = turning - ((x - float(at.x[member])) * fy - (y - float(at.y[member])) * fx)
                if abs(moment) <= 1e-9 * self.sketch.size * np.hypot(fx, fy):
                    moment = 0.0  # rounding of a force's moment about its own place
                # where all members at a point are welded there is no pin to take the load: its member does
                pin = pusher.on_pins[k] if pusher.on_pins[k] in self.sketch.pins else ""
                found.append(Acts(pusher.name, tone, member, pin, (x, y), (fx, fy), moment))
        return found

    def hauling(self, pose: int, case: int) -> list[Acts]:
        """What pulls at the hauling ends of ropes, each on its end and along it; what it does is told by the rope."""
        at, found = self.at(pose, case), []
        answered = {EFFORT: self.answer.effort, LOAD: self.answer.load}
        for pusher, tone, factor in self.pushers(case):
            if not hasattr(pusher, "through"):
                continue
            size = answered[tone][case, 0, pose] if tone in answered else factor * _number(pusher.strength(at))
            (ax, ay), (bx, by) = self.sketch.hauled(pusher.through).mark(at).line[-2:]
            long = float(np.hypot(bx - ax, by - ay))
            force = float(size) * (bx - ax) / long, float(size) * (by - ay) / long
            found.append(Acts(pusher.name, tone, -1, "", (bx, by), force, 0.0))
        return found

    def bearings(self, pose: int, case: int) -> list[Acts]:
        """What each member feels of each joint; what a pin itself feels of a slot is between them, and left out."""
        at = self.at(pose, case)
        places = {mark.name: mark.spots[0] for _, mark in self.joints(at)}
        places |= {
            contact.name: _spot(at.spot(contact.site))
            for joint in self.sketch.joints
            for contact in (joint.contacts(at) if hasattr(joint, "contacts") else ())
        }
        return [
            Acts(
                b.joint, "joint", self.sketch.member(b.member), "", places[b.joint],
                (float(self.answer.force[i, 0, case, 0, pose]), float(self.answer.force[i, 1, case, 0, pose])),
                float(self.answer.moment[i, case, 0, pose]),
            )
            for i, b in enumerate(self.answer.bearings)
            if b.member in self.sketch.members
        ]  # fmt: skip


def _number(value: float | np.ndarray) -> float:
    return float(np.asarray(value).ravel()[0])


def _spot(place: tuple[float | np.ndarray, float | np.ndarray]) -> Spot:
    return _number(place[0]), _number(place[1])
