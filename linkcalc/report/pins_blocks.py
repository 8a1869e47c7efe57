"""The report on joints, in the order in which a designer asks."""

from __future__ import annotations

from linkcalc.design.pins_answer import PinsAnswer, Sized
from linkcalc.report.blocks import Block, Note
from linkcalc.report.edge import Edge
from linkcalc.report.sections.head import head
from linkcalc.report.sections.pins_ground import pins_ground
from linkcalc.report.sections.pins_motion import pins_motion, rate_line
from linkcalc.report.sections.pins_sizes import pins_sizes
from linkcalc.report.sections.pins_worst import pins_worst
from linkcalc.report.sections.requirements import requirements
from linkcalc.report.sections.trust import trust


def sheet_blocks(answer: PinsAnswer, joint: str) -> list[Block]:
    """The calculation of the parts of one joint or rope, sheet after sheet, under what it must carry."""
    from linkcalc.report.sections.working import working_blocks

    units = answer.stroke.mechanism.units
    blocks = head(answer.stroke)[:1]
    for sized in answer.sized[joint]:
        heading, *sheet = working_blocks(sized.working, units, sized.choice)
        blocks += [heading, *_where(answer, sized), *sheet]
    return blocks


def _where(answer: PinsAnswer, sized: Sized) -> list[Block]:
    """Case and pose that a sheet is of, if it is one of a single pose."""
    if sized.worst is None:
        return []
    edge, stroke = Edge(answer.stroke), answer.stroke
    case = f"case {sized.worst.case}" if len(stroke.cases) > 1 else ""
    pose = f"{stroke.drive_name} {edge.text(sized.worst.drive, 'drive')}" if stroke.drive_name else ""
    text = ", ".join(t for t in (case, pose) if t)
    return [Note(f"{text}, the worst of all", "Where")] if text else []


def pins_blocks(answer: PinsAnswer) -> list[Block]:
    """Everything on the joints of a mechanism or frame."""
    line = rate_line(answer)
    copies = f"The worst of {answer.variants} copies with other sizes counts too; a copy is told by its number from 0."
    return [
        *head(answer.stroke),
        *([Note(copies)] if answer.variants else []),
        *pins_worst(answer),
        *pins_sizes(answer),
        *([Note(line)] if line else []),
        *pins_motion(answer),
        *pins_ground(answer),
        *requirements(answer.stroke),
        *trust(answer.stroke),
    ]
