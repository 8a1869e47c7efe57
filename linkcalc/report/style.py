"""The only colours, line widths and type of the pictures.

A sober page: dark ink on white, a few muted colours that differ in lightness as well as in hue, so that they stay
apart for a colour-blind reader and on a grey print. Cases differ by the style of the line, never by colour alone.
"""

from __future__ import annotations

from typing import Any

# mm, the width between the margins of an A4 page
PAGE_WIDTH = 170.0
TALLEST = 235.0
MM = 1 / 25.4

INK = "#20262d"
SOFT = "#66707a"
FAINT = "#b9c0c6"
HAIR = "#dfe3e6"
PAPER = "#ffffff"

# dark to light and back, never two neighbours of like lightness
HUES = ("#173f5f", "#c4572e", "#3a8f83", "#d9a441", "#6d3f73", "#7fa8c9", "#8a6a3b", "#9a9a9a")
DASHES: tuple[Any, ...] = (
    "solid",
    (0, (5, 2)),
    (0, (1.2, 1.4)),
    (0, (7, 2, 1.2, 2)),
    (0, (3, 1.2)),
    (0, (7, 2, 1.2, 2, 1.2, 2)),
)

# what a force on a drawing is, told by its colour and by what is written beside it
TONES = {
    "plain": INK,
    "ghost": FAINT,
    "effort": "#c4572e",
    "load": "#173f5f",
    "joint": "#3a8f83",
    "weight": "#6d3f73",
    "axial": "#173f5f",
    "shear": "#3a8f83",
    "bending": "#c4572e",
}

# fills of members: near to white, so that a grey print keeps the outlines
BODIES = ("#e6ebf0", "#f1e8dc", "#e2ece6", "#eee4ea", "#ebebdf")
BODY_GHOST = "#fafbfb"

CURVE = 1.3
BROAD = 3.6
THIN = 0.6
OUTLINE = 0.9
ARROW = 1.4
# points
BAR = 8.0  # across a member
ROPE = 1.7
PIN = 5.0
BLOCK = 10.0
SHORTEST_ARROW, LONGEST_ARROW = 20.0, 44.0
MARGIN = 60.0  # round the geometry, for arrows and words

TEXT = 8.0
SMALL = 7.0
TITLE = 10.5

RC: Any = {
    "font.family": "sans-serif",
    "font.sans-serif": ["DejaVu Sans"],
    "font.size": TEXT,
    "axes.titlesize": TITLE,
    "axes.labelsize": TEXT,
    "axes.linewidth": THIN,
    "axes.edgecolor": SOFT,
    "axes.labelcolor": INK,
    "axes.grid": True,
    "axes.axisbelow": True,
    "grid.color": HAIR,
    "grid.linewidth": 0.5,
    "text.color": INK,
    "xtick.color": SOFT,
    "ytick.color": SOFT,
    "xtick.labelcolor": INK,
    "ytick.labelcolor": INK,
    "xtick.labelsize": SMALL,
    "ytick.labelsize": SMALL,
    "xtick.major.width": THIN,
    "ytick.major.width": THIN,
    "legend.fontsize": SMALL,
    "legend.frameon": False,
    "svg.fonttype": "none",  # words stay words: they can be searched and set again
    "svg.hashsalt": "linkcalc",  # the same drawing gives the same file
    "pdf.fonttype": 42,
    "path.simplify": False,
}


def tone(name: str) -> str:
    """The colour of a thing on a drawing."""
    return TONES.get(name, INK)


def hue(index: int) -> str:
    """The colour of the index-th curve."""
    return HUES[index % len(HUES)]


def dash(case: int) -> Any:
    """The line style of a load case."""
    return DASHES[case % len(DASHES)]
