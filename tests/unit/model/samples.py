"""Models to try the model layer on."""

HOLD_DOWN = """
title = "Hold-down"
[dimensions]
link = { size = 40, tol = 0.05 }
lean = "12 deg"
[points]
A = [0, 0]
B = { from = "A", distance = "3*link", angle = "lean + 90 deg" }
C = { meets = [["B", 150], ["D", 105]], side = "left" }
D = [180, 0]
E = [180, 0]
grip = { from = "A", distance = 240, angle = 150 }
tip = { from = "D", distance = 90, angle = 20 }
[members]
ground = ["A", "D"]
handle = { points = ["A", "B", "grip"], mass = 0.35 }
strut = ["B", "C"]
arm = ["D", "C", "tip"]
[effort]
at = "grip"
square_to = ["A", "grip"]
[load]
at = "tip"
direction = -90
size = "1.2 kN"
[stroke]
turn = "handle"
from = 150
to = 120
poses = 61
[requirements]
hand = "effort <= 400 N"
"""
"""A four-bar clamp; E is drawn on top of D and carried by nobody."""

EVERYTHING = """
title = "Rig"
note = '''two
lines with "quotes" and a \\ in them'''
[units]
length = "in"
force = "lbf"
angle = "rad"
mass = "lb"
moment = "lbf*in"
stress = "ksi"
stiffness = "lbf/in"
acceleration = "ft/s^2"
[dimensions]
a = 4
b = "2*a"
c = { size = "30 deg", tol = "0.5 deg", distribution = "uniform" }
d = { size = 3, tol = [-0.1, "0.2 mm"], distribution = "triangular" }
[points]
A = [0, 0]
B = ["b", "0 in"]
C = { from = "A", distance = "a", angle = "c" }
D = { from = "B", distance = "d", angle = "90 deg", line = ["A", "B"] }
E = { on = ["A", "B"], part = 0.5, offset = "1/4 in" }
F = { on = ["A", "B"], distance = 3 }
G = { crossing = [["A", "D"], ["B", "C"]] }
H = { mirror = "C", line = ["A", "B"] }
I = { meets = [["A", 9], ["B", "9 in"]], side = "right" }
J = [20, 3]
K = [26, 3]
M = [30, 3]
L = { on = ["J", "K"], part = "0.5" }
[members]
ground = ["A", "J"]
bar = { points = ["A", "B", "F"], path = ["A", "E", "B"], mass = "2 kg", centre = "E" }
rod = ["B", "D"]
ram = { points = ["D", "C"], mass = 1 }
beam = ["K", "L"]
block = ["G", "H"]
crank = ["I", "J"]
[slots.guide]
point = "I"
along = "0.3 rad"
on = "ground"
[slots.roll]
point = "L"
along = ["J", "M"]
of = "beam"
[slides.way]
member = "block"
along = ["A", "B"]
at = "H"
[welds.root]
members = ["beam", "ground"]
at = "K"
[pins.A]
friction = 0.1
diameter = 0.5
material = "own-steel"
factor = 2
stack = [["ground", 0.25], { plate = "bar", thickness = 0.5, width = 2 }, { plate = "ground", thickness = "6 mm" }]
bush = "bronze, greased"
length = "1/2 in"
[pins.B]
diameter = 0.5
bearing = "ball"
life = "1e6"
[materials.own-steel]
yield = 50
ultimate = "500 MPa"
modulus = 30000
[materials.plain]
yield = 36
[gravity]
size = "9.81 m/s^2"
direction = "-100 deg"
[effort]
between = ["G", "B"]
on = ["block", "rod"]
[load]
at = "B"
on = "bar"
direction = "-90 deg"
turns_with = "bar"
size = 40
[loads.wind]
torque_on = "bar"
against = "rod"
size = "-3 N*m"
[loads.sack]
mass_at = "B"
mass = 5
[loads.push]
at = "F"
along = ["F", "G"]
size = 2
[stroke]
turn = "bar"
line = ["A", "F"]
against = "rod"
from = "lower limit"
to = "upper limit"
poses = 9
[cases.plain]
[cases."wet day"]
scale = { load = 1.5, sack = 0 }
drop = ["wind"]
effort = { at = "D", on = "ram", square_to = ["D", "C"] }
gravity = { turn = "5 deg", scale = 0.5 }
[cases."wet day".add.rain]
at = "D"
direction = "-90 deg"
size = 3
[requirements]
"pull is light" = "effort <= 40"
way = "moment at way < 3 N*m at start"
"""
"""Every kind of point, joint, load and case at once. It says nothing sensible, but nothing wrong."""
