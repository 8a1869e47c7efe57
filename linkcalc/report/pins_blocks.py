"""The report on joints, in the order in which a designer asks."""

from __future__ import annotations

from linkcalc.design.pins_answer import PinsAnswer
from linkcalc.report.blocks import Block, Note
from linkcalc.report.sections.head import head
from linkcalc.report.sections.pins_ground import pins_ground
from linkcalc.report.sections.pins_motion import pins_motion, rate_line
from linkcalc.report.sections.pins_sizes import pins_sizes
from linkcalc.report.sections.pins_worst import pins_worst
from linkcalc.report.sections.requirements import requirements
from linkcalc.report.sections.trust import trust


def sheet_blocks(answer: PinsAnswer, joint: str) -> list[Block]:
    """The calculation of the parts of one joint, sheet after sheet, under what it must carry."""
    from linkcalc.report.sections.working import working_blocks

    units = answer.stroke.mechanism.units
    sheets = (working_blocks(s.working, units, s.choice) for s in answer.joint(joint).sized)
    return [*head(answer.stroke)[:1], *(block for sheet in sheets for block in sheet)]


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
