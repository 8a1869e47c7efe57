"""Settled positions and joint forces against the physics engine `mujoco`, which finds them by swinging until it rests.

A tree of hinges has no soft constraint: what is left is how far it has come to rest, 1e-7 here. A loop is closed by a
constraint that gives (see `engine.py`), so it is right to some 1e-3.
"""

from __future__ import annotations

from math import atan2, hypot

import mujoco
import numpy as np
import pytest

from linkcalc import parse, stroke

BEAM = """
free = ["beam", "rod"]
[units]
length = "m"
stiffness = "N/m"
[points]
A = [0, 0]
G = [0.12, -0.03]
B = [0.3, 0.01]
C = [0.3, -0.2]
wall = [0.6, -0.1]
[members]
ground = ["A", "wall"]
beam = { points = ["A", "G", "B"], mass = 2, centre = "G" }
rod = { points = ["B", "C"], mass = 1 }
[loads.coil]
spring = ["C", "wall"]
rate = 60
free_length = 0.2
"""

TREE = """
<mujoco><option timestep="0.001" gravity="0 -9.80665 0" integrator="implicitfast"/><compiler angle="radian"/>
<worldbody><site name="wall" pos="0.6 -0.1 0"/>
<body name="beam" pos="0 0 0"><joint name="a" axis="0 0 1" damping="0.3"/>
<inertial pos="0.12 -0.03 0" mass="2" diaginertia="0.02 0.02 0.02"/>
<body name="rod" pos="0.3 0.01 0"><joint name="b" axis="0 0 1" damping="0.1"/>
<inertial pos="0 -0.105 0" mass="1" diaginertia="0.004 0.004 0.004"/>
<site name="end" pos="0 -0.21 0"/></body></body></worldbody>
<tendon><spatial stiffness="60" springlength="0.2"><site site="end"/><site site="wall"/></spatial></tendon></mujoco>
"""


def at_rest(xml: str, seconds: float) -> tuple[mujoco.MjModel, mujoco.MjData]:
    model = mujoco.MjModel.from_xml_string(xml)
    data = mujoco.MjData(model)
    for _ in range(int(seconds / model.opt.timestep)):
        mujoco.mj_step(model, data)
    data.qvel[:] = 0
    mujoco.mj_forward(model, data)
    mujoco.mj_rnePostConstraint(model, data)
    return model, data


def test_a_hanging_beam_with_a_rod_and_a_spring() -> None:
    answer = stroke(parse(BEAM))
    _, data = at_rest(TREE, 40)
    assert answer.steady[0, 0, 0] == 1
    turns = answer.turn[1:, 0, 0, 0]
    assert turns[0] == pytest.approx(float(data.qpos[0]), abs=2e-7)
    assert turns[1] - turns[0] == pytest.approx(float(data.qpos[1]), abs=2e-7)
    for member, joint in (("beam", "A"), ("rod", "B")):
        felt = answer.force_on(joint, member)[:, 0, 0, 0]
        np.testing.assert_allclose(felt, data.body(member).cfrc_int[3:5], atol=2e-5 * hypot(*felt))


LINKAGE = """
free = ["crank", "coupler", "rocker"]
[units]
length = "m"
stiffness = "N/m"
[points]
A = [0, 0]
B = [0.05, 0.12]
C = [0.3, 0.2]
D = [0.28, 0]
hook = [-0.1, 0.3]
[members]
ground = ["A", "D", "hook"]
crank = { points = ["A", "B"], mass = 1 }
coupler = { points = ["B", "C"], mass = 3 }
rocker = { points = ["D", "C"], mass = 1 }
[loads.coil]
spring = ["B", "hook"]
rate = 400
free_length = 0.1
"""


def test_a_spring_loaded_four_bar() -> None:
    """The loop is closed by a soft constraint, so it is right to a few thousandths only."""
    answer = stroke(parse(LINKAGE))
    xml = """
<mujoco><option timestep="0.0005" gravity="0 -9.80665 0" integrator="implicitfast"/><compiler angle="radian"/>
<worldbody><site name="hook" pos="-0.1 0.3 0"/>
<body name="crank" pos="0 0 0"><joint name="a" axis="0 0 1" damping="1"/><site name="b" pos="0.05 0.12 0"/>
<inertial pos="0.025 0.06 0" mass="1" diaginertia="0.01 0.01 0.01"/>
<body name="coupler" pos="0.05 0.12 0"><joint name="b" axis="0 0 1" damping="0.5"/>
<inertial pos="0.125 0.04 0" mass="3" diaginertia="0.02 0.02 0.02"/></body></body>
<body name="rocker" pos="0.28 0 0"><joint name="d" axis="0 0 1" damping="1"/>
<inertial pos="0.01 0.1 0" mass="1" diaginertia="0.01 0.01 0.01"/></body></worldbody>
<tendon><spatial stiffness="400" springlength="0.1"><site site="b"/><site site="hook"/></spatial></tendon>
<equality><connect body1="coupler" body2="rocker" anchor="0.25 0.08 0" solref="0.002 1"
solimp="0.9999 0.9999 0.001 0.5 2"/></equality></mujoco>
"""
    model, data = at_rest(xml, 20)
    assert answer.steady[0, 0, 0] == 1
    crank, _, rocker = answer.turn[1:, 0, 0, 0]
    hinges = {model.joint(i).name: float(data.qpos[i]) for i in range(model.njnt)}
    assert crank == pytest.approx(hinges["a"], abs=2e-3)
    assert rocker == pytest.approx(hinges["d"], abs=2e-3)
    felt = answer.force_on("A", "crank")[:, 0, 0, 0]
    np.testing.assert_allclose(felt, data.body("crank").cfrc_int[3:5], atol=2e-3 * hypot(*felt))
    # the spring by hand, in the position that was found: it draws along its line
    turn = atan2(0.12, 0.05) + crank
    bx, by = 0.13 * np.cos(turn), 0.13 * np.sin(turn)
    force = 400 * (0.1 - hypot(bx + 0.1, by - 0.3))
    assert answer.reading("force of coil")[0, 0, 0] == pytest.approx(force, rel=1e-9)
