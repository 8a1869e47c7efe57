"""Scales of our own to ask."""

from __future__ import annotations

from pathlib import Path

from linkcalc import parse, read
from linkcalc.model.mechanism import Mechanism

EXAMPLES = Path(__file__).parents[4] / "examples"

BEAM = """
[dimensions]
short_arm = { size = 50, tol = 0.05 }
[points]
F = [0, 0]
hook = ["-short_arm", -0.5]
end = [600, 0]
heart = [60, -4]
[members]
ground = ["F"]
beam = { points = ["hook", "F", "end", "heart"], path = ["hook", "end"], mass = 1, centre = "heart" }
[load]
mass_at = "hook"
mass = 20
[poises.rider]
along = ["F", "end"]
mass = 2
from = 20
"""

PAN = """
free = ["pan"]
[points]
F = [0, 0]
left = [-100, -1]
right = [400, 0]
heart = [0, -5]
low = [-100, -301]
aside = [-60, -301]
[members]
ground = ["F"]
beam = { points = ["left", "F", "right", "heart"], path = ["left", "right"], mass = 2, centre = "heart" }
pan = { points = ["left", "low", "aside"], path = ["left", "low"], mass = 0.5 }
[load]
mass_at = "low"
mass = 5
[poises.rider]
along = ["F", "right"]
mass = 2
"""


def beam(*changes: tuple[str, str]) -> Mechanism:
    """The beam with some of its text changed."""
    return parse(changed(BEAM, *changes))


def changed(text: str, *changes: tuple[str, str]) -> str:
    for old, new in changes:
        assert old in text, old
        text = text.replace(old, new)
    return text


def platform() -> Mechanism:
    """The example with two levers, a notched bar, a fine bar and a ball."""
    return read(EXAMPLES / "two_bar_scale.toml")


def hanging() -> Mechanism:
    """The example with a poise and weights on a hanger."""
    return read(EXAMPLES / "steelyard.toml")
