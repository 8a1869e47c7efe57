"""What `check` says of freedoms."""

from __future__ import annotations

import pytest

from linkcalc import check_model, parse
from linkcalc.report.check import check_blocks
from linkcalc.report.text import as_text
from tests.samples import BRACKET, CLAMP, RAM

PAN = """
free = ["rod"]
[points]
A = [0, 0]
B = [0, -90]
[members]
ground = ["A"]
rod = { points = ["A", "B"], mass = 1 }
"""


@pytest.mark.parametrize(
    ("text", "said"),
    [
        (BRACKET, "Freedoms: none: the frame stands"),
        (RAM, "Freedoms: 1; the stroke takes it"),
        (PAN, "Freedoms: 1; 1 settles in balance."),
        (CLAMP, "the stroke takes one, 4 settle in balance"),
    ],
    ids=["frame", "stroke", "hangs free", "gives"],
)
def test_freedoms_are_told(text: str, said: str) -> None:
    assert said in as_text(check_blocks(check_model(parse(text))))
