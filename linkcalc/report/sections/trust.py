"""What the reader may rely on: the checks the answer passes, its warnings, and what it does not cover."""

from __future__ import annotations

from linkcalc.design.answer import StrokeAnswer
from linkcalc.report.blocks import Block, Note

CAUTIONS = (
    "Static calculation only: no impact, no vibration, no fatigue.",
    "Forces of hands and feet, guards, people under loads, lifting, stored energy (springs, pressure) and legal"
    " weighing are governed by local codes and licensed practice.",
)


def trust(answer: StrokeAnswer) -> list[Block]:
    """Warnings first, then how well the answer satisfies its own equations, then the cautions."""
    checks = answer.checks
    figures = [
        (checks.closure, "joints close within {} of the size of the mechanism"),
        (checks.equilibrium, "forces on every member balance within {} of the largest"),
        *([(checks.virtual_work, "the effort agrees with virtual work within {}")] if "effort" in answer.kinds else []),
    ]
    told = [text.format(f"{value:.0e}" if value else "0") for value, text in figures]
    return [
        *(Note(f"{c.item}: {c.text}" if c.item else c.text, "Warning") for c in answer.caveats),
        Note("; ".join(told) + ".", "Checks"),
        *(Note(f"{c.item}: {c.text}.", "Caution") for c in answer.cautions),
        *(Note(text, "Caution") for text in CAUTIONS),
    ]
