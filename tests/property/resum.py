"""Equilibrium summed up again from the answer alone, as somebody would who checks it by hand.

Nothing of the mechanics is used: places come from x, y and turn of the answer and the drawn points, forces from the
table of bearings, loads from what the model says. A sum that is not nothing is a wrong or missing entry of the table.
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise
from typing import Any

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.mechanism import GROUND, Case, Member
from linkcalc.model.sketch import Drawing
from linkcalc.parts.loads.force import Force
from linkcalc.parts.loads.haul import HaulForce
from linkcalc.parts.loads.moving import MovingForce, MovingMass
from linkcalc.parts.loads.pair import Pair
from linkcalc.parts.loads.spread import SpreadForce
from linkcalc.parts.loads.torque import Torque
from linkcalc.parts.loads.weight import Weight

Wrench = tuple[str, np.ndarray, np.ndarray, np.ndarray, np.ndarray, np.ndarray]
"""(who feels it: a member or "pin C", place x, y, force x, y, couple)"""


class Resum:
    """Sums over one answer; every array is (case, variant, pose)."""

    def __init__(self, answer: StrokeAnswer):
        self.answer, self.mechanism = answer, answer.mechanism
        self.drawing = Drawing(self.mechanism)
        self.index = {name: k for k, name in enumerate(self.drawing.members)}
        self.shape = answer.status.shape
        # with friction each case comes twice, along the stroke and back
        cases = list((self.mechanism.cases or {"": Case()}).values())
        self.cases = [case for case in cases for _ in range(self.shape[0] // len(cases))]
        self.pins = {b.joint for b in answer.bearings if b.word == "pin"}

    def place(self, point: str, member: str) -> tuple[np.ndarray, np.ndarray]:
        """[m] where a point of a member is in every pose."""
        return self.carried(self.drawing.points[point], member)

    def carried(self, drawn: tuple[Any, Any], member: str) -> tuple[np.ndarray, np.ndarray]:
        k = self.index[member]
        x, y, turn = (np.broadcast_to(v[k], self.shape) for v in (self.answer.x, self.answer.y, self.answer.turn))
        if member == GROUND:
            return x + drawn[0], y + drawn[1]
        origin = self.drawing.points[self.mechanism.members[member].points[0]]
        u, v = drawn[0] - origin[0], drawn[1] - origin[1]
        return x + np.cos(turn) * u - np.sin(turn) * v, y + np.sin(turn) * u + np.cos(turn) * v

    def somewhere(self, point: str) -> tuple[np.ndarray, np.ndarray]:
        """Where a point is, by any member that carries it; a point nobody carries stands still."""
        return self.place(point, next(iter(self.carriers(point)), GROUND))

    def carriers(self, point: str) -> list[str]:
        return [name for name, member in self.mechanism.members.items() if point in member.points]

    def bearer(self, point: str, on: str | None) -> str:
        """Who takes a force at a point: the member named, the pin itself, or the one that carries it."""
        carriers = self.carriers(point)
        if on is None and len(carriers) > 1 and point in self.pins:
            return f"pin {point}"
        return on or (GROUND if GROUND in carriers or not carriers else carriers[0])

    def joint_place(self, joint: str, word: str) -> tuple[np.ndarray, np.ndarray]:
        if word == "pin":
            # a link that stretches reaches for its pin; the others have it where they are drawn with it
            firm = [m for m in self.carriers(joint) if self.mechanism.members[m].stiffness is None]
            return self.place(joint, firm[0]) if firm else self.somewhere(joint)
        if word == "rope":  # a side of it is called by the place: "hoist at P"
            rope, _, point = joint.partition(" at ")
            step = next(s for s in self.mechanism.joints[word][rope].path if s.point == point)
            return self.place(point, step.on) if step.on else self.somewhere(point)
        part = self.mechanism.joints[word][joint]
        match word:
            case "slot" | "track" | "contact":
                return self.place(part.point, part.of or self.carriers(part.point)[0])
            case "slide":
                return self.place(part.at or self.mechanism.members[part.member].points[0], part.member)
            case "gear":
                spots = [self.place(c, m) for c, m in zip(part.centres, part.members, strict=True)]
                first, second = (self.drawing.value(r, "length") for r in part.radii)
                # of an inner mesh the circles touch on the far side of the smaller one
                share = first / (first + second if part.mesh == "external" else first - second)
                (ax, ay), (bx, by) = spots
                return ax + share * (bx - ax), ay + share * (by - ay)
            case "rack":
                px, py = self.place(part.centre, part.pinion)
                (ax, ay), (bx, by) = (self.place(point, part.on) for point in part.along)
                way = ((px - ax) * (bx - ax) + (py - ay) * (by - ay)) / ((bx - ax) ** 2 + (by - ay) ** 2)
                return ax + way * (bx - ax), ay + way * (by - ay)
            case "weld":
                return self.place(part.at, part.members[0])
        raise TypeError(f"not a joint: {word}")

    def joints(self) -> Iterator[Wrench]:
        for k, b in enumerate(self.answer.bearings):
            force, moment = b.copies * self.answer.force[k], b.copies * self.answer.moment[k]
            yield b.member, *self.joint_place(b.joint, b.word), *force, moment

    def loads(self) -> Iterator[Wrench]:
        """Everything that pushes, with the strength it has in each case."""
        m = self.mechanism
        cases = self.cases
        if m.effort is not None:
            told = {r.name: r.values for r in self.answer.readings}
            effort = told.get("rod force of effort", self.answer.effort)
            for k, case in enumerate(cases):
                size = np.zeros(self.shape)
                size[k] = effort[k]
                yield from self.wrenches(case.effort or m.effort, size)
        if m.load is not None:
            yield from self.wrenches(m.load, np.array(self.answer.load))
        for name, load in m.loads.items():
            factors = [self._factor(c, name) for c in cases]
            yield from self.wrenches(load, self._told(load, name) if _tells(load) else self._strength(load, factors))
        for k, case in enumerate(cases):
            for name, load in case.add.items():
                only = np.zeros(len(cases))
                only[k] = case.scale.get(name, 1.0)
                told = _tells(load)
                yield from self.wrenches(load, self._told(load, name) if told else self._strength(load, list(only)))
        for name, member in m.members.items():
            if member.mass is not None and name != GROUND:
                mass = member.copies * self.drawing.value(member.mass, "mass")
                ux, uy, field = (np.broadcast_to(v, self.shape) for v in self._gravity())
                at = self.carried(self._centre(member), name)
                yield name, *at, mass * field * ux, mass * field * uy, np.zeros(self.shape)

    def _factor(self, case: Case, name: str) -> float:
        return 0.0 if name in case.drop else case.scale.get(name, 1.0)

    def _strength(self, load: Any, factors: list[float]) -> np.ndarray:
        """Size of a load with its factor in each case; a hung mass pulls as the gravity of the case makes it."""
        each = np.reshape(np.array(factors, float), (-1, 1, 1))
        if isinstance(load, SpreadForce):
            return np.broadcast_to(each, self.shape)
        if isinstance(load, (Weight, MovingMass)):
            size = self.drawing.value(load.mass, "mass") * self._gravity()[2]
            return np.broadcast_to(each * size, self.shape)
        size = self.drawing.value(load.size, "moment" if isinstance(load, Torque) else "force")
        return np.broadcast_to(each * size, self.shape)

    def _told(self, load: Any, name: str) -> np.ndarray:
        """Strength of a spring or the like, as the answer gives it; nothing in a case that is without it."""
        told = {r.name: r.values for r in self.answer.readings}
        strength = told.get(f"rod force of {name}")  # what its seals leave of it
        if strength is None:
            strength = self.answer.reading(f"{'torque' if hasattr(load, 'turned') else 'force'} of {name}")
        return np.nan_to_num(strength)

    def _centre(self, member: Member) -> tuple[Any, Any]:
        if member.centre:
            return self.drawing.points[member.centre]
        spots = [np.array(self.drawing.points[p]) for p in member.path or member.points]
        pieces = [(np.hypot(*(b - a)), (a + b) / 2) for a, b in pairwise(spots)]
        whole = sum(length for length, _ in pieces)
        middle = sum(length * place for length, place in pieces) / whole if whole else spots[0]
        return middle[0], middle[1]

    def _gravity(self) -> tuple[np.ndarray, np.ndarray, np.ndarray]:
        """Direction x, y [-] and strength [m/s2] of gravity, case by case."""
        g, value = self.mechanism.gravity, self.drawing.value
        changes = [c.gravity for c in self.cases]
        angle = np.array([value(g.direction, "angle") + value(c.turn, "angle") for c in changes]).reshape(-1, 1, 1)
        size = np.array([value(g.size, "acceleration") * c.scale for c in changes]).reshape(-1, 1, 1)
        return np.cos(angle), np.sin(angle), size

    def wrenches(self, load: Any, size: np.ndarray) -> Iterator[Wrench]:
        none = np.zeros(self.shape)
        match load:
            case Force():
                ux, uy = self._direction(load)
                yield self.bearer(load.at, load.on), *self.somewhere(load.at), size * ux, size * uy, none
            case SpreadForce():
                yield from self._spread(load, size)
            case MovingForce() | MovingMass():
                yield self._moving(load, size)
            case HaulForce():
                return  # the rope tells what it does
            case Torque():
                yield from self._couple((load.torque_on, load.against), size)
            case Pair():
                yield from self._apart(load.between, load.on, size)
            case Weight():
                ux, uy, _ = self._gravity()
                yield self.bearer(load.mass_at, load.on), *self.somewhere(load.mass_at), size * ux, size * uy, none
            case _ if hasattr(load, "ends"):
                yield from self._apart(load.ends, load.on, -size if getattr(load, "acts", "") == "pull" else size)
            case _ if hasattr(load, "turned"):
                yield from self._couple(load.turned, size)
            case _:
                raise TypeError(f"not a load: {load}")

    def _moving(self, load: MovingForce | MovingMass, size: np.ndarray) -> Wrench:
        """At its place along its line, which the stroke may step."""
        m, (first, second) = self.mechanism, load.way
        who = load.on or next(n for n in self.carriers(first) if n in self.carriers(second))
        (ax, ay), (bx, by) = self.place(first, who), self.place(second, who)
        stepped = {"effort": m.effort, "load": m.load, **m.loads}.get(getattr(m.stroke and m.stroke.along, "place", ""))
        way = self.answer.drive if stepped is load else self.drawing.value(load.place, "length")
        part = way / np.hypot(bx - ax, by - ay)
        if isinstance(load, MovingMass):
            ux, uy, _ = self._gravity()
        else:
            turn = self.answer.turn[self.index[load.turns_with]] if load.turns_with else np.zeros(self.shape)
            angle = self.drawing.value(load.direction, "angle") + np.broadcast_to(turn, self.shape)
            ux, uy = np.cos(angle), np.sin(angle)
        x, y = ax + part * (bx - ax), ay + part * (by - ay)
        return who, x, y, size * ux, size * uy, np.zeros(self.shape)

    def _spread(self, load: SpreadForce, factor: np.ndarray) -> Iterator[Wrench]:
        """By Simpson's rule, which is exact here: force and arm are straight lines over the length."""
        first, second = load.way
        who = load.on or next(n for n in self.carriers(first) if n in self.carriers(second))
        (ax, ay), (bx, by) = self.place(first, who), self.place(second, who)
        length = np.hypot(bx - ax, by - ay)
        tx, ty = (bx - ax) / length, (by - ay) / length
        ux, uy = -ty, tx
        if load.direction is not None:
            turn = self.answer.turn[self.index[load.turns_with]] if load.turns_with else np.zeros(self.shape)
            angle = self.drawing.value(load.direction, "angle") + np.broadcast_to(turn, self.shape)
            ux, uy = np.cos(angle), np.sin(angle)
        seen = np.abs(tx * uy - ty * ux) if load.per == "projection" else 1.0
        ends = [self.drawing.value(q, "line load") for q in (load.intensity, load.intensity_end or load.intensity)]
        for part, weight in ((0.0, 1 / 6), (0.5, 4 / 6), (1.0, 1 / 6)):
            force = factor * seen * weight * length * (ends[0] + part * (ends[1] - ends[0]))
            yield who, ax + part * (bx - ax), ay + part * (by - ay), force * ux, force * uy, np.zeros(self.shape)

    def _couple(self, members: tuple[str, str], size: np.ndarray) -> Iterator[Wrench]:
        none = np.zeros(self.shape)
        for who, sign in zip(members, (1.0, -1.0), strict=True):
            yield who, none, none, none, none, sign * size

    def _apart(self, points: tuple[str, str], on: tuple[str, str] | None, size: np.ndarray) -> Iterator[Wrench]:
        (ax, ay), (bx, by) = (self.somewhere(p) for p in points)
        none, far = np.zeros(self.shape), np.hypot(bx - ax, by - ay)
        fx, fy = size * (bx - ax) / far, size * (by - ay) / far
        first, second = (self.bearer(p, m) for p, m in zip(points, on or (None, None), strict=True))
        yield first, ax, ay, -fx, -fy, none
        yield second, bx, by, fx, fy, none

    def _direction(self, load: Force) -> tuple[np.ndarray, np.ndarray]:
        if load.direction is not None:
            turn = self.answer.turn[self.index[load.turns_with]] if load.turns_with else np.zeros(self.shape)
            angle = self.drawing.value(load.direction, "angle") + np.broadcast_to(turn, self.shape)
            return np.cos(angle), np.sin(angle)
        (ax, ay), (bx, by) = (self.somewhere(p) for p in load.along or load.square_to or ("", ""))
        far = np.hypot(bx - ax, by - ay)
        ux, uy = (bx - ax) / far, (by - ay) / far
        return (ux, uy) if load.along else (-uy, ux)


def _tells(load: Any) -> bool:
    return hasattr(load, "tells")


def unbalanced(answer: StrokeAnswer) -> dict[str, float]:
    """What is left of the sums of every moving member and every pin that takes forces itself, over the largest force.

    Moments are taken about the ground's origin and counted over the size of the drawing. Cases and poses without
    an answer are left aside; a sum that is not a number counts as endless.
    """
    table = Resum(answer)
    sums: dict[str, list[np.ndarray]] = {}
    largest = np.full(table.shape, 1e-300)
    for who, x, y, fx, fy, couple in (*table.joints(), *table.loads()):
        total = sums.setdefault(who, [np.zeros(table.shape) for _ in range(3)])
        for old, part in zip(total, (fx, fy, x * fy - y * fx + couple), strict=True):
            old += part
        largest = np.maximum(largest, np.maximum(np.hypot(fx, fy), np.abs(couple) / table.drawing.size))
    answered = answer.status == 0
    out: dict[str, float] = {}
    for who, (fx, fy, moment) in sums.items():
        if who != GROUND and not who.startswith("pin "):
            left = np.maximum(np.hypot(fx, fy), np.abs(moment) / table.drawing.size) / largest
            out[who] = _worst(left[answered])
    for point in table.pins:
        # what the pin gives its members is what it takes itself: its loads, and slots that guide it
        felt = [
            b.copies * answer.force[k] for k, b in enumerate(answer.bearings) if (b.joint, b.word) == (point, "pin")
        ]
        own = sums.get(f"pin {point}", [np.zeros(table.shape)] * 3)
        left = np.hypot(sum(f[0] for f in felt) - own[0], sum(f[1] for f in felt) - own[1]) / largest
        out[f"pin {point}"] = _worst(left[answered])
    for who in set(sums) - set(out) - {GROUND}:
        out[who] = float("inf")  # a force on a pin that is none
    return out


def _worst(values: np.ndarray) -> float:
    return float(np.max(np.where(np.isfinite(values), values, np.inf), initial=0.0))
