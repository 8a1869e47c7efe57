"""The report on the inner forces of all members."""

from __future__ import annotations

from linkcalc.design.members import MembersAnswer
from linkcalc.report.blocks import Block, Note
from linkcalc.report.sections.head import head
from linkcalc.report.sections.inner_forces import inner_forces
from linkcalc.report.sections.member_strength import member_strength
from linkcalc.report.sections.requirements import requirements
from linkcalc.report.sections.trust import trust


def members_blocks(answer: MembersAnswer) -> list[Block]:
    """Everything on the members, in the order in which a designer asks."""
    worst = max((m.unbalance for m in answer.members), default=0.0)
    figure = f"{worst:.0e}" if worst else "0"
    return [
        *head(answer.stroke),
        *inner_forces(answer),
        *member_strength(answer),
        *requirements(answer.stroke),
        *(Note(f"{c.item}: {c.text}", "Warning") for c in answer.caveats),
        Note(f"the diagram of every member ends at nothing within {figure} of the largest force.", "Checks"),
        *trust(answer.stroke),
    ]
