"""What it is: the title, what is stepped and how far, the load cases."""

from __future__ import annotations

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.report.blocks import Block, Heading, Note
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number, plain


def head(answer: StrokeAnswer) -> list[Block]:
    """Title, the model's note, and a line on stroke and cases."""
    mechanism = answer.mechanism
    blocks: list[Block] = [Heading(mechanism.title or mechanism.source or "Mechanism without a title", 1)]
    if mechanism.note:
        blocks.append(Note(mechanism.note))
    blocks.append(Note(f"{stroke_line(answer)} {case_line(answer)}"))
    return blocks


def stroke_line(answer: StrokeAnswer) -> str:
    """ "Stroke: turn of handle from 150 to 120 deg, 61 poses." """
    drive = Edge(answer).out(answer.drive[0, 0], "drive")
    if not answer.drive_name:
        return "Nothing drives it: solved where it settles." if answer.loose else "Solved in the drawing pose only."
    unit = plain(Edge(answer).unit("drive"))
    poses = f"{drive.size} poses" if drive.size > 1 else "1 pose"
    real = drive[np.isfinite(drive)]
    if not real.size:
        return f"Stroke: {answer.drive_name}, {poses}."
    places = Edge(answer).drive_places(answer.drive)
    first, last = (number(round(float(d), places), trim=True) for d in (real[0], real[-1]))
    return f"Stroke: {answer.drive_name} from {first} to {last} {unit}, {poses}."


def case_line(answer: StrokeAnswer) -> str:
    """ "Load cases: clamp, pry." """
    if answer.rubs:
        return f"Load cases, each along the stroke and back, with friction: {', '.join(answer.cases)}."
    if not answer.mechanism.cases:
        return "One load case, the model as written."
    return f"Load case{'s' if len(answer.cases) > 1 else ''}: {', '.join(answer.cases)}."
