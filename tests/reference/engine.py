"""The same linkage in the physics engine `mujoco`: held at rest, its constraint forces are the joint forces.

Bodies hang in a tree of hinges about z; pins that close a loop are `connect` constraints. The driven hinge carries so
much armature that it stays where it is, and so passes on the torque that holds it. The engine's constraints are soft:
each gives way by a part of the acceleration that it stops, 1e-4 at least, so that joint forces are right to some 3e-4
(four-bar) or 1e-3 (six-bar) of the largest. The error is in proportion to that part: from two runs it can be taken
out. Gravity is off; bodies have a mass only because the engine wants one.
"""

from __future__ import annotations

from collections.abc import Sequence

import mujoco
import numpy as np

from tests.reference.linkage import Force, Linkage, Solution, Torque, Turn

GIVE = 1e-4
"""The part of an acceleration that a constraint lets through; the engine takes no less."""
HELD = "1e9"
IDLE = ("contact", "gravity", "spring", "damper", "island", "warmstart")
"""Stages of the engine that have nothing to do here and take time. A warm start must be off: beside the armature of
the held hinge the solver takes it for good enough, and the forces with it."""


class Engine:
    """One linkage of pins, driven by the turn of a body that is pinned to the ground, with the torque on it unknown.

    hung    body -> (parent, place of the hinge), parents first
    closed  (place, body a, body b) of the pins that close the loops
    """

    def __init__(self, linkage: Linkage, *, give: float = GIVE, off: Sequence[str] = IDLE, **option: str):
        if linkage.slots or linkage.slides or not isinstance(linkage.drive, Turn):
            raise ValueError("the engine takes pins and a turning drive only")
        if linkage.effort != Torque(linkage.drive.body):
            raise ValueError("the engine finds the torque on the driven body only")
        self.linkage, self.driven = linkage, linkage.drive.body
        self.hung, self.closed = _tree(linkage)
        if self.hung[self.driven][0] != "ground":
            raise ValueError(f"the engine drives a body that is pinned to the ground, {self.driven} is not")
        self.model = mujoco.MjModel.from_xml_string(self._xml(give, off, option))
        self.data = mujoco.MjData(self.model)
        self.hinges = [self.model.joint(i).name for i in range(self.model.njnt)]
        for load in linkage.loads:
            self._push(load)

    def angles(self, poses: np.ndarray) -> np.ndarray:
        """(pose, hinge): turn of each body against its parent, from (pose, moving body, 3) as in a `Solution`."""
        moving = self.linkage.moving()
        turn = {body: poses[:, i, 2] - self.linkage.frame(body)[2] for i, body in enumerate(moving)}
        turn["ground"] = np.zeros(len(poses))
        return np.column_stack([turn[body] - turn[self.hung[body][0]] for body in self.hinges])

    def forward(self, angles: np.ndarray) -> None:
        """One forward pass and one pass for the forces between bodies, at one pose (hinge,)."""
        self.data.qpos[:] = angles
        mujoco.mj_forward(self.model, self.data)
        mujoco.mj_rnePostConstraint(self.model, self.data)

    def forces(self) -> dict[tuple[str, str, str], np.ndarray]:
        """(3,) force x, y [N] and no couple that body a feels from body b, after `forward`."""
        found = {}
        for body, (parent, at) in self.hung.items():
            fx, fy = self.data.body(body).cfrc_int[3:5]
            found[at, body, parent] = np.array([fx, fy, 0.0])
        for i, pin in enumerate(self.closed):
            fx, fy = self.data.efc_force[3 * i : 3 * i + 2]
            found[pin] = np.array([fx, fy, 0.0])
        return found

    def torque(self) -> float:
        """Torque on the driven body [N m], after `forward`: what it feels from the ground, about its hinge."""
        felt, com = self.data.body(self.driven).cfrc_int, self.data.body(self.driven).subtree_com
        (x, y, _), (fx, fy) = com - self.data.body(self.driven).xpos, felt[3:5]
        return float(felt[2] + x * fy - y * fx)

    def _push(self, load: object) -> None:
        match load:
            case Force(body, _, fx, fy, False):
                self.data.body(body).xfrc_applied[:2] += fx, fy
            case Torque(body, size, "ground"):
                self.data.body(body).xfrc_applied[5] += size
            case _:
                raise ValueError(f"the engine does not take this load: {load}")

    def _xml(self, give: float, off: Sequence[str], option: dict[str, str]) -> str:
        settings = " ".join(f'{key}="{value}"' for key, value in option.items())
        known = [flag for flag in off if hasattr(mujoco.mjtDisableBit, f"mjDSBL_{flag.upper()}")]  # some are recent
        flags = " ".join(f'{flag}="disable"' for flag in known)
        stiff = f'solref="0.002 1" solimp="{1 - give!r} {1 - give!r} 0.001 0.5 2"'
        ties = "".join(
            f'<connect body1="{a}" body2="{b}" anchor="{self._offset(self._origin(a), at)}" {stiff}/>'
            for at, a, b in self.closed
        )
        return (
            f'<mujoco><option {settings}><flag {flags}/></option><compiler angle="radian"/>'
            f"<worldbody>{self._hang('ground')}</worldbody><equality>{ties}</equality></mujoco>"
        )

    def _hang(self, parent: str) -> str:
        """The bodies that hang on a parent; each has its origin at its hinge and its mass where its load acts."""
        text = ""
        for body, (above, at) in self.hung.items():
            if above != parent:
                continue
            loaded = {load.at for load in self.linkage.loads if isinstance(load, Force) and load.body == body}
            if len(loaded) > 1:
                raise ValueError(f"the engine takes forces at one place of a body, {body} has {len(loaded)}")
            centre = loaded.pop() if loaded else self.linkage.bodies[body][-1]
            text += (
                f'<body name="{body}" pos="{self._offset(self._origin(parent), at)}">'
                f'<joint name="{body}" axis="0 0 1" armature="{HELD if body == self.driven else 0}"/>'
                f'<inertial pos="{self._offset(at, centre)}" mass="1" diaginertia="0.01 0.01 0.01"/>'
                f"{self._hang(body)}</body>"
            )
        return text

    def _origin(self, body: str) -> str:
        return self.hung[body][1] if body in self.hung else ""

    def _offset(self, start: str, end: str) -> str:
        (x0, y0), (x1, y1) = self.linkage.places.get(start, (0.0, 0.0)), self.linkage.places[end]
        return f"{x1 - x0!r} {y1 - y0!r} 0"


def _tree(linkage: Linkage) -> tuple[dict[str, tuple[str, str]], list[tuple[str, str, str]]]:
    """Bodies are hung one layer after another from the ground; what is left of the pins closes loops."""
    hung, order, left = {}, ["ground"], linkage.pins()
    for parent in order:
        for at, a, b in list(left):
            child = b if a == parent else a
            if parent in (a, b) and child not in order:
                hung[child] = (parent, at)
                order.append(child)
                left.remove((at, a, b))
    return hung, left


def solve(linkage: Linkage, poses: np.ndarray, give: float = GIVE) -> Solution:
    """Effort and joint forces at poses that are already known: (pose, moving body, 3) as in a `Solution`."""
    engine = Engine(linkage, give=give)
    efforts, felt = [], []
    for angles in engine.angles(poses):
        engine.forward(angles)
        efforts.append(engine.torque())
        felt.append(engine.forces())
    forces = {key: np.array([f[key] for f in felt]) for key in felt[0]}
    return Solution(("ground", *linkage.moving()), poses, np.array(efforts), forces)
