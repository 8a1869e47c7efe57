"""Every example of the project is reported, exported and cut free, each member in balance."""

import json
from pathlib import Path

import numpy as np
import pytest

from linkcalc import parse, read, stroke
from linkcalc.report.csv import as_csv
from linkcalc.report.free_body import free_body_table
from linkcalc.report.json import as_json
from linkcalc.report.stroke_blocks import stroke_blocks
from linkcalc.report.stroke_table import stroke_table
from linkcalc.report.text import as_text

EXAMPLES = sorted((Path(__file__).parents[3] / "examples").glob("*.toml"))
WELDED = """
[points]
A = [0, 0]
B = [300, 0]
C = [300, 200]
[members]
ground = ["A"]
beam = { points = ["A", "B"], mass = 3 }
post = ["B", "C"]
[welds]
root = { members = ["beam", "ground"], at = "A" }
knee = { members = ["post", "beam"], at = "B" }
[load]
at = "C"
direction = 0
size = 500
[loads.hung]
mass_at = "B"
mass = 20
"""
# crank and two rods on one pin that a slot of the ground guides: the slot acts on the pin, on no member
PIN_IN_SLOT = """
[points]
A = [0, 0]
B = [80, 60]
C = [160, 20]
E = [200, 100]
[members]
ground = ["A"]
crank = ["A", "B"]
bar = ["B", "C"]
rod = ["C", "E"]
[slots]
way = { point = "C", along = 0 }
up = { point = "E", along = 90 }
[effort]
torque_on = "crank"
[load]
at = "E"
direction = -90
size = 50
[stroke]
turn = "crank"
from = 50
to = 20
"""


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda p: p.stem)
def test_an_example_is_reported_in_full(path):
    answer = stroke(read(path))
    text = as_text(stroke_blocks(answer))
    assert max(len(line) for line in text.splitlines()) <= 100
    assert answer.mechanism.title in text
    assert len(json.loads(as_json(answer))["joints"]) == len(answer.bearings)
    assert len(as_csv(stroke_table(answer)).splitlines()) == 1 + answer.status.size
    for case in range(len(answer.cases)):
        _balanced(answer, case, answer.drive.shape[-1] // 3)


@pytest.mark.parametrize("text", [WELDED, PIN_IN_SLOT])
def test_loads_on_welds_and_slots_on_pins_are_told_of_the_right_member(text):
    answer = stroke(parse(text))
    assert as_text(stroke_blocks(answer))
    _balanced(answer, 0, 0)


def _balanced(answer, case: int, pose: int) -> None:
    for member in answer.mechanism.members:
        if member != "ground":
            table = free_body_table(answer, member, pose=pose, case=case)
            parts = np.array([row[3:] for row in table.rows[:-1]], dtype=float).reshape(-1, 3)
            sums = np.array(table.rows[-1][3:], dtype=float)
            largest = np.abs(parts).max(axis=0, initial=1e-9)
            assert (np.abs(sums) <= 1e-9 * np.array([*[largest[:2].max()] * 2, largest[2] + largest[:2].max()])).all()
