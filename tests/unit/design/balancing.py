"""Models to be balanced, and an independent count of what masses do."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from linkcalc import parse, stroke
from linkcalc.model.mechanism import Mechanism
from linkcalc.parts.loads.weight import Weight

LINKAGE = """
[points]
A = [0, 0]
D = [300, 20]
B = { from = "A", distance = 100, angle = 40 }
C = { meets = [["B", 250], ["D", 200]], side = "left" }
G = { on = ["B", "C"], distance = 130, offset = 40 }
low = [-150, -130]
high = [-20, -30]
[members]
ground = ["A", "D"]
crank = ["A", "B"]
coupler = { points = ["B", "C", "G"], path = ["B", "C"], mass = 5, centre = "G" }
rocker = { points = ["D", "C"], mass = 2 }
[effort]
torque_on = "crank"
[stroke]
turn = "crank"
from = 20
to = 150
poses = 41
"""
"""A four-bar whose coupler carries its mass beside its line: no counterweight on the crank balances every pose."""

BOX = """
[balance]
goal = "{goal}"
[balance.find.bob]
mass_on = "crank"
place = {{ box = ["low", "high"] }}
mass = [0, 9]
"""

HATCH = """
[points]
A = [0, 0]
centre = [420, 0]
grip = [900, 0]
F1 = [50, -350]
F2 = [300, -100]
R1 = [200, 0]
R2 = [700, 0]
[members]
ground = ["A"]
lid = { points = ["A", "centre", "grip"], mass = 18, centre = "centre" }
[effort]
at = "grip"
square_to = ["A", "grip"]
[stroke]
turn = "lid"
from = 0
to = 80
poses = 41
[balance.find.strut]
gas_spring = [{ box = ["F1", "F2"], on = "ground" }, { line = ["R1", "R2"], on = "lid" }]
length = 700
stroke = 310
rise = 1.3
force = [50, 1200]
"""


def with_mass(mechanism: Mechanism, member: str, mass: float, x: float, y: float) -> Mechanism:
    """The model with a mass [kg] hung at a place [mm] of the drawing, by plain editing of the model."""
    from linkcalc.parts.points.coordinates import Coordinates

    old = mechanism.members[member]
    members = {
        **mechanism.members,
        member: replace(old, points=(old.points[0], "hung", *old.points[1:]), path=old.path or old.points),
    }
    points = {**mechanism.points, "hung": Coordinates(x, y)}
    return replace(mechanism, points=points, members=members, loads={"hung": Weight("hung", mass)}, balance=None)


def columns(mechanism: Mechanism, member: str) -> tuple[np.ndarray, np.ndarray]:
    """(poses) effort of the bare model, and (poses, 3) what a kilogram, a kilogram times a mm of x and of y add to it:
    differences of whole strokes, nothing of the search in it."""
    bare = replace(mechanism, balance=None)
    base = stroke(bare).effort[0, 0]
    at = [stroke(with_mass(mechanism, member, 1.0, x, y)).effort[0, 0] for x, y in ((0, 0), (1, 0), (0, 1))]
    return base, np.stack([at[0] - base, at[1] - at[0], at[2] - at[0]], axis=1)


def linkage(goal: str = "least peak") -> Mechanism:
    return parse(LINKAGE + BOX.format(goal=goal))
