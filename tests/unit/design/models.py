"""Machines whose answer is a formula, as texts to be varied."""

from __future__ import annotations

import numpy as np

from linkcalc import parse, stroke
from linkcalc.design.answer import Event, StrokeAnswer


def ask(text: str, **more: object) -> StrokeAnswer:
    return stroke(parse(text), **more)


def happened(answer: StrokeAnswer, kind: str, quantity: str, case: str = "") -> list[Event]:
    return [e for e in answer.events if (e.kind, e.quantity, e.case) == (kind, quantity, case)]


def only(answer: StrokeAnswer, kind: str, quantity: str, case: str = "") -> Event:
    (event,) = happened(answer, kind, quantity, case)
    return event


PRESS = """
[points]
A = [0, 0]
B = { from = "A", distance = 100, angle = 60 }
C = { mirror = "A", line = ["B", "foot"] }
foot = [50, 0]
[members]
ground = ["A"]
upper = ["A", "B"]
lower = ["B", "C"]
[slots.way]
point = "C"
along = 0
[effort]
at = "B"
on = "upper"
direction = -90
[load]
at = "C"
direction = 180
size = 1000
[stroke]
turn = "upper"
from = 60
to = 5
poses = 12
"""
"""Two equal links of 100 mm at an angle a to the line of their ends, pressed at the knee: ratio 1 / (2 tan a).

Past a = 0 the knee has gone through; the effort is 2 F tan a throughout, the links carry F / cos a.
"""

LEVER = """
[points]
A = [0, 0]
hand = { from = "A", distance = 300, angle = 10 }
hook = { from = "A", distance = 100, angle = 190 }
[members]
ground = ["A"]
lever = ["hook", "A", "hand"]
[effort]
at = "hand"
square_to = ["hand", "A"]
[load]
at = "hook"
direction = -90
size = 600
[stroke]
turn = "lever"
from = 10
to = 70
poses = 13
"""
"""Effort square to the lever: 600 N x 100/300 x cos a, where a is the lever's angle. It pulls down at the hand."""

FOUR_BAR = """
[points]
A = [0, 0]
D = [100, 0]
B = { from = "A", distance = 30, angle = 60 }
C = { meets = [["B", 90], ["D", 70]], side = "left" }
tip = { from = "D", distance = 110, angle = 80 }
[members]
ground = ["A", "D"]
crank = ["A", "B"]
coupler = ["B", "C"]
rocker = { points = ["D", "C", "tip"], mass = 2 }
[effort]
torque_on = "crank"
[load]
at = "tip"
direction = -90
size = 100
[stroke]
turn = "crank"
from = 60
to = 420
poses = 61
"""
"""A crank rocks a lever with a load on its tip, once round: several humps in every curve."""

WELDED = """
[points]
A = [0, 0]
P = [100, 0]
E = [150, 40]
[members]
ground = ["A"]
post = ["A", "P"]
arm = ["P", "E"]
[welds.corner]
members = ["arm", "post"]
at = "P"
[slots.roller]
point = "P"
along = 0
[loads.end]
at = "E"
direction = -90
size = 100
[loads.corner_load]
at = "P"
direction = -90
size = 10
"""
"""A post and an arm welded at a corner with a roller under it: no pin there, the roller bears on a member."""


def degrees(event: Event) -> float:
    return float(np.degrees(event.drive))
