"""At least one small machine for every word of the registry: the laws of parts are held against these.

A kind without a sample fails ``test_every_part.py``, so a new kind is tested by existing.
"""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc import parse
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import Drawing


@dataclass(frozen=True)
class Sample:
    """A machine that uses a word.

    family, word  of the registry
    name          what the machine calls the part: a joint, load or point; "" for the coordinate of the stroke
    text          the machine, as a model file
    """

    family: str
    word: str
    name: str
    text: str

    def __str__(self) -> str:
        return f"{self.family} {self.word} {self.name}".strip()

    @property
    def mechanism(self) -> Mechanism:
        return parse(self.text)

    @property
    def drawing(self) -> Drawing:
        return Drawing(self.mechanism)


RAM = """
[points]
A = [0, 0]
B = { from = "A", distance = 40, angle = 60 }
C = { meets = [["B", 110], ["A", 128]], side = "right" }
nose = { on = ["A", "C"], distance = 150, offset = 12 }
[members]
ground = ["A"]
crank = ["A", "B"]
rod = ["B", "C"]
ram = { points = ["C", "nose"], mass = 1.5 }
[slides.guide]
member = "ram"
along = ["A", "C"]
at = "nose"
[effort]
torque_on = "crank"
[load]
at = "nose"
direction = -172
size = 300
[loads.spring]
between = ["B", "nose"]
size = -45
[loads.brake]
torque_on = "rod"
against = "crank"
size = 2
[stroke]
travel = "guide"
from = "drawn"
to = 155
poses = 7
"""
"""A crank pushes a ram up a guide that leans a little; the stroke is the travel of the ram."""

COLLAR = """
[points]
A = [0, 0]
B = { from = "A", distance = 50, angle = 110 }
O = [0, -90]
P = { from = "O", distance = 160, angle = 83 }
Q = { on = ["O", "P"], part = "0.3", offset = -8 }
grip = { mirror = "P", line = ["O", "A"] }
[members]
ground = ["A", "O"]
crank = ["A", "B"]
rocker = ["O", "Q", "P", "grip"]
collar = { points = ["B"], mass = 0.8 }
[slides.collar_on_rocker]
member = "collar"
on = "rocker"
along = ["O", "P"]
[effort]
torque_on = "crank"
[load]
at = "grip"
square_to = ["O", "grip"]
size = 60
[loads.tool]
at = "P"
along = ["P", "Q"]
size = 20
[loads.plate]
mass_at = "grip"
mass = 3
[stroke]
turn = "rocker"
line = ["O", "grip"]
against = "crank"
to = 10
poses = 7
"""
"""A collar on a moving rocker, guided through a point beside the line; the stroke is a turn against the crank."""

SLOTTED = """
[points]
A = [0, 0]
B = { from = "A", distance = 45, angle = 20 }
O = [10, -70]
tip = { on = ["O", "B"], distance = 190 }
side = { crossing = [["O", "tip"], ["A", "low"]] }
low = [60, -3]
[members]
ground = ["A", "O"]
crank = { points = ["A", "B"], mass = 0.6 }
link = ["B", "low"]
arm = ["O", "tip", "side"]
[slots.in_arm]
point = "B"
along = ["O", "tip"]
on = "arm"
[slots.level]
point = "low"
along = 5
[effort]
at = "B"
square_to = ["A", "B"]
on = "crank"
[load]
at = "tip"
direction = 170
turns_with = "arm"
size = 80
[loads.bob]
mass_at = "B"
mass = 2
[stroke]
distance = ["A", "low"]
to = 66
poses = 7
"""
"""A slot in a moving arm that guides the pin of two other members; the stroke is a distance."""

BRACKET = """
[points]
W = [0, 0]
K = [0, 120]
E = [200, 130]
T = [260, 90]
[members]
ground = ["W"]
post = { points = ["W", "K"], mass = 4 }
beam = { points = ["K", "E"], mass = 3 }
stay = ["E", "T"]
[slots.roller]
point = "T"
along = 80
[welds.foot]
members = ["post", "ground"]
at = "W"
[welds.corner]
members = ["beam", "post"]
at = "K"
[loads.hook]
at = "E"
direction = -80
size = 500
[loads.twist]
torque_on = "beam"
size = -15
"""
"""A bracket built into the ground and welded at its corner: a frame without a stroke."""

BOOM = """
[points]
O = [0, 0]
T = { from = "O", distance = 200, angle = 50 }
Q = { on = ["O", "T"], part = "0.5", offset = 15 }
M = [-60, 180]
K = [-80, 150]
W = [-120, 40]
B = [190, -40]
[members]
ground = ["O", "M", "K", "W"]
boom = { points = ["O", "T", "Q"], mass = 4 }
pan = { points = ["B"], mass = 2 }
[slides.ways]
member = "pan"
along = 80
[ropes.line]
path = ["M", { pulley = "T", radius = 6, wrap = "left", pin_friction = 0.15, pin_diameter = 5 }, "B"]
[ropes.fall]
path = ["Q", { pulley = "K", radius = 3, wrap = "right", friction = 0.2, turns = 0.5 }, "W"]
end = "hauling"
[effort]
haul = "fall"
[load]
mass_at = "B"
mass = 40
[stroke]
haul = "fall"
from = -15
to = 25
poses = 7
"""
"""A boom that carries a rope with a pan on it, and is drawn up by another rope; the stroke is the rope hauled in."""

SECTOR = """
[points]
O = [0, 0]
A = { from = "O", distance = 80, angle = 100 }
R = [160, 20]
P = { meets = [["A", 150], ["R", 110]], side = "left" }
S = [230, -90]
foot = [230, -190]
[members]
ground = ["O", "R"]
lever = ["O", "A"]
link = ["A", "P"]
rocker = ["R", "P"]
weight = { points = ["S", "foot"], mass = 6 }
[slides.shaft]
member = "weight"
along = 85
[ropes.strap]
path = [
  { drum = "O", radius = 10, wrap = "left", on = "lever" },
  { pulley = "P", radius = 4, wrap = "right", efficiency = 0.9 },
  "S",
]
[effort]
torque_on = "lever"
[load]
at = "foot"
direction = -90
size = 200
[stroke]
turn = "lever"
from = "drawn"
to = 125
poses = 7
"""
"""A strap from a sector of a lever, crossed to a pulley on a pin of the linkage, to a weight in a shaft."""

CAM = """
[points]
O = [0, 0]
A = { from = "O", distance = 60, angle = 65 }
G = [150, -10]
groove_top = [40, 80]
groove_in = { from = "O", distance = 60, angle = 65 }
groove_low = [6, 30]
groove_end = [-5, -5]
[members]
ground = ["O", "G"]
crank = { points = ["O", "A"], mass = 0.4 }
plate = ["G", "groove_top", "groove_end"]
[tracks.groove]
point = "A"
through = ["groove_top", "groove_in", "groove_low", "groove_end"]
on = "plate"
[effort]
torque_on = "crank"
[load]
torque_on = "plate"
size = -8
[stroke]
travel = "groove"
from = 25
to = 45
poses = 7
"""
"""A crank pin in the curved groove of a plate; the stroke is the travel along the groove."""

RAIL = """
[points]
C = [0, 150]
L = [-80, 0]
M = [0, -20]
R = [80, 0]
foot = { from = "C", distance = 170, angle = -100 }
H = [-20, 90]
[members]
ground = ["H"]
arm = { points = ["H", "foot"], mass = 2 }
carriage = { points = ["L", "M", "R"], mass = 5 }
[slides.ways]
member = "carriage"
along = 10
[tracks.rail]
point = "foot"
arc = ["L", "M", "R"]
on = "carriage"
[effort]
at = "R"
direction = 10
[load]
torque_on = "arm"
size = 6
[stroke]
travel = "rail"
from = "drawn"
to = 60
poses = 7
"""
"""The foot of a hanging arm on the round rail of a carriage; the stroke is the travel along the rail."""

SPRUNG = """
[points]
A = [0, 0]
D = [200, 0]
H = [-60, 130]
K = [290, 160]
B = { from = "A", distance = 60, angle = 70 }
C = { meets = [["B", 180], ["D", 120]], side = "left" }
tip = { from = "D", distance = 170, angle = 80 }
[members]
ground = ["A", "D", "H", "K"]
crank = { points = ["A", "B"], mass = 0.4 }
rod = ["B", "C"]
rocker = { points = ["D", "C", "tip"], mass = 1.2 }
[effort]
cylinder = ["H", "C"]
bore = 25
rod = 10
acts = "pull"
[loads.return]
spring = ["K", "tip"]
rate = 1.5
preload = -20
[loads.buffer]
spring = ["A", "C"]
on = ["ground", "rod"]
rate = 2
free_length = 210
acts = "compression"
[loads.winder]
torsion_spring = "rod"
against = "crank"
rate = "12 N*mm/deg"
free_angle = -80
[loads.lid]
torsion_spring = "rocker"
rate = "0.8 N*m/rad"
preload = 1
[loads.stay]
gas_spring = ["H", "tip"]
force = 90
length = 340
stroke = 120
rise = 1.3
seal_friction = 6
[loads.strip]
constant_spring = ["K", "B"]
pull = 8
[loads.magnet]
force_over = ["H", "B"]
table = [[40, -9], [110, -6], [150, 1], [260, 2]]
[loads.cam]
torque_over = "rod"
against = "rocker"
formula = "0.4 N*m*sin(2*angle)"
[loads.jack]
screw = ["B", "tip"]
diameter = 12
lead = 3
friction = 0.12
size = 15
[stroke]
turn = "crank"
to = 95
poses = 7
"""
"""A four-bar with something of every kind that pushes by a law; the unknown is the pressure of a drawing cylinder."""

CLAMP = """
[points]
A = [0, 0]
B = [90, 30]
C = [180, 0]
pad = [220, -5]
face = [224, -20]
face2 = [224, 20]
stop = [90, -8]
knee = [90, 120]
[members]
ground = ["A", "face", "face2", "knee", "stop"]
lever = { points = ["A", "B"], stiffness = "18 kN/mm" }
link = { points = ["B", "C"], stiffness = "12 kN/mm" }
jaw = { points = ["C", "pad"], mass = 0.8 }
[pins.C]
stiffness = "90 kN/mm"
[slides.guide]
member = "jaw"
along = 0
[contacts.work]
point = "pad"
along = ["face", "face2"]
stiffness = 6000
gap = 1.5
[contacts.rest]
point = "B"
of = "lever"
along = 0
stiffness = 900
side = "left"
gap = 34
[effort]
at = "B"
direction = -90
[stroke]
distance = ["knee", "B"]
to = 122
poses = 9
"""
"""A toggle clamp: its links and one pin give, it presses a workpiece, goes over centre and comes down on a rest."""
TRAIN = """
[points]
O = [0, 0]
P = { from = "O", distance = 50, angle = 25 }
R = { from = "O", distance = 100, angle = 100 }
H = { from = "R", distance = 45, angle = 200 }
tip = { from = "P", distance = 35, angle = 80 }
grip = { from = "O", distance = 60, angle = 190 }
[members]
ground = ["O", "R"]
arm = { points = ["O", "P"], mass = 0.5 }
planet = { points = ["tip", "P"], mass = 0.8 }
sun = ["O", "grip"]
drum = ["R", "H"]
[gears.inner]
members = ["planet", "ground"]
centres = ["P", "O"]
radii = [15, 65]
mesh = "internal"
pressure_angle = 25
[gears.outer]
members = ["planet", "sun"]
centres = ["P", "O"]
radii = [15, 35]
[gears.side]
members = ["drum", "sun"]
centres = ["R", "O"]
radii = [40, 60]
[effort]
torque_on = "arm"
[load]
at = "H"
direction = -30
size = 60
[stroke]
turn = "arm"
from = "drawn"
to = 75
poses = 7
"""
"""A planet on an arm between a fixed ring and a sun that drives a drum: gears inside and outside, centres that move."""

WINDER = """
[points]
O = [0, 0]
C = [60, 70]
grip = [120, 100]
near = [20, 45]
far = { from = "near", distance = 100, angle = 0 }
K = [-40, 40]
[members]
ground = ["O"]
lever = { points = ["O", "near", "far"], mass = 1 }
wheel = { points = ["grip", "C"], mass = 0.7 }
block = ["C", "K"]
[slides.ways]
member = "block"
along = 0
on = "lever"
at = "K"
[racks.teeth]
pinion = "wheel"
centre = "C"
radius = 25
along = ["near", "far"]
on = "lever"
[slots.cam]
point = "grip"
along = 60
[effort]
torque_on = "wheel"
[load]
at = "K"
direction = 200
size = 40
[stroke]
turn = "wheel"
against = "lever"
to = 20
poses = 7
"""
"""A pinion on a block rolls along a rack on a lever, and swings that by a pin in a fixed slot; stroke: its turn."""
BUILT_IN = """
[points]
A = [0, 0]
B = [600, 80]
[members]
ground = ["A"]
bar = { points = ["A", "B"], mass = 2, section = { SECTION }, material = "S235", factor = 3 }
[welds.foot]
members = ["ground", "bar"]
at = "A"
[load]
at = "B"
direction = -80
size = 120
"""
"""A bar built in at one end."""

GANTRY = """
[points]
O = [0, 0]
P = { from = "O", distance = 120, angle = 15 }
H = { from = "O", distance = 70, angle = 160 }
Q = [240, -20]
K = [60, 90]
[members]
ground = ["O"]
lever = { points = ["O", "P", "H"], mass = 2 }
table = { points = ["P", "Q", "K"], mass = 3 }
[slots.floor]
point = "Q"
along = -10
[effort]
torque_on = "lever"
[load]
mass_along = ["P", "Q"]
mass = 25
[loads.roller]
moves_along = ["H", "P"]
direction = -70
turns_with = "lever"
place = 30
size = 45
[loads.bed]
spread = ["Q", "K"]
intensity = 0.2
intensity_end = 0.5
direction = -60
turns_with = "table"
[loads.snow]
spread = ["O", "P"]
on = "lever"
intensity = 0.3
direction = -90
per = "projection"
[stroke]
place = "load"
from = 10
to = 95
poses = 7
"""
"""A table from a lever to the floor, with goods that are moved along it, and a roller on the lever."""

SAMPLES = (
    Sample("joint", "contact", "work", CLAMP),
    Sample("joint", "contact", "rest", CLAMP),
    Sample("joint", "slide", "guide", RAM),
    Sample("joint", "slide", "collar_on_rocker", COLLAR),
    Sample("joint", "slot", "in_arm", SLOTTED),
    Sample("joint", "slot", "level", SLOTTED),
    Sample("joint", "rope", "line", BOOM),
    Sample("joint", "rope", "strap", SECTOR),
    Sample("joint", "track", "groove", CAM),
    Sample("joint", "track", "rail", RAIL),
    Sample("joint", "gear", "inner", TRAIN),
    Sample("joint", "gear", "outer", TRAIN),
    Sample("joint", "gear", "side", TRAIN),
    Sample("joint", "rack", "teeth", WINDER),
    Sample("joint", "weld", "corner", BRACKET),
    Sample("joint", "weld", "foot", BRACKET),
    Sample("load", "at", "load", RAM),
    Sample("load", "at", "load", COLLAR),
    Sample("load", "at", "tool", COLLAR),
    Sample("load", "at", "load", SLOTTED),
    Sample("load", "at", "effort", SLOTTED),
    Sample("load", "between", "spring", RAM),
    Sample("load", "torque_on", "effort", RAM),
    Sample("load", "torque_on", "brake", RAM),
    Sample("load", "torque_on", "twist", BRACKET),
    Sample("load", "mass_at", "plate", COLLAR),
    Sample("load", "mass_at", "bob", SLOTTED),
    Sample("load", "haul", "effort", BOOM),
    Sample("coordinate", "haul", "", BOOM),
    Sample("load", "spring", "return", SPRUNG),
    Sample("load", "spring", "buffer", SPRUNG),
    Sample("load", "torsion_spring", "winder", SPRUNG),
    Sample("load", "torsion_spring", "lid", SPRUNG),
    Sample("load", "gas_spring", "stay", SPRUNG),
    Sample("load", "constant_spring", "strip", SPRUNG),
    Sample("load", "force_over", "magnet", SPRUNG),
    Sample("load", "torque_over", "cam", SPRUNG),
    Sample("load", "cylinder", "effort", SPRUNG),
    Sample("load", "screw", "jack", SPRUNG),
    Sample("coordinate", "travel", "", RAM),
    Sample("coordinate", "turn", "", COLLAR),
    Sample("coordinate", "distance", "", SLOTTED),
    Sample("load", "mass_along", "load", GANTRY),
    Sample("load", "moves_along", "roller", GANTRY),
    Sample("load", "spread", "bed", GANTRY),
    Sample("load", "spread", "snow", GANTRY),
    Sample("coordinate", "place", "", GANTRY),
    Sample("construction", "x", "A", RAM),
    Sample("construction", "from", "B", RAM),
    Sample("construction", "meets", "C", RAM),
    Sample("construction", "on", "nose", RAM),
    Sample("construction", "on", "Q", COLLAR),
    Sample("construction", "crossing", "side", SLOTTED),
    Sample("construction", "mirror", "grip", COLLAR),
)


def _section(word: str, text: str) -> Sample:
    return Sample("section", word, "bar", BUILT_IN.replace("SECTION", text))


SAMPLES += (
    _section("flat", "flat = [40, 10]"),
    _section("round", "round = 30"),
    _section("tube", "tube = [30, 2.5]"),
    _section("rectangular_tube", "rectangular_tube = [40, 20, 2]"),
    _section("area", 'area = 171, second_moment = "2.4 cm^4", edge_distance = 20, second_moment_across = 8000'),
)


def samples(family: str) -> list[Sample]:
    """Those of one family."""
    return [sample for sample in SAMPLES if sample.family == family]
