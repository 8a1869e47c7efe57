"""Models of our own to ask the commands about, and the commands in this very process."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from typer.testing import CliRunner

from linkcalc.cli.app import loaded

ROOT = Path(__file__).resolve().parents[2]
EXAMPLES = sorted((ROOT / "examples").glob("*.toml"))

CLAMP = """\
title = "Clamp"

[units]
length = "mm"
force = "N"
angle = "deg"

[dimensions]
crank = 40
strut_length = 100
leg = 50

[points]
A = [0, "leg"]
D = [140, 0]
B = { from = "A", distance = "crank", angle = 30 }
C = { meets = [["B", "strut_length"], ["D", "leg"]], side = "left" }
tip = { from = "D", distance = 75, angle = -90, line = ["D", "C"] }
grip = { from = "A", distance = 200, angle = 100, line = ["A", "B"] }

[members]
ground = ["A", "D"]
handle = ["A", "B", "grip"]
strut = ["B", "C"]
arm = ["D", "C", "tip"]

[effort]
at = "grip"
square_to = ["grip", "A"]

[load]
at = "tip"
direction = 90
size = 500

[stroke]
turn = "handle"
from = 130
to = 110
poses = 21
"""

CASES = """
[cases.normal]

[cases.heavy]
scale = { load = 1.5 }
"""

REQUIREMENTS = """
[requirements]
hand = "effort <= 200 N"
pin = "force at D <= 1 kN"
"""

GUIDED = """\
[points]
A = [0, 0]
B = [30, 40]
C = [80, 40]
T = [120, 40]

[members]
ground = ["A"]
crank = ["A", "B"]
rod = ["B", "C"]
ram = ["C", "T"]

[slides.ways]
member = "ram"
along = 0
at = "C"

[effort]
at = "T"
direction = 180

[load]
torque_on = "crank"
size = 5

[stroke]
travel = "ways"
to = -10
"""

FRAME = """\
[points]
A = [0, 0]
B = [0, 300]
C = [400, 0]

[members]
ground = ["A", "B"]
bar = ["A", "C"]
tie = ["B", "C"]

[load]
at = "C"
direction = -90
size = 900
"""


@dataclass(frozen=True)
class Said:
    """What a command ended with."""

    status: int
    out: str
    err: str


def linkcalc(*arguments: str | Path) -> Said:
    """Run a command here; anything but an orderly end is raised."""
    done = CliRunner().invoke(loaded(), [str(a) for a in arguments])
    if done.exception is not None and not isinstance(done.exception, SystemExit):
        raise done.exception
    return Said(done.exit_code, done.stdout, done.stderr)
