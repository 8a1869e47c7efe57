"""The report on a stroke, in the order in which a designer asks."""

from __future__ import annotations

from linkcalc.design.answer import StrokeAnswer
from linkcalc.report.blocks import Block
from linkcalc.report.sections.events import events
from linkcalc.report.sections.head import head
from linkcalc.report.sections.joint_forces import joint_forces
from linkcalc.report.sections.over_stroke import over_stroke
from linkcalc.report.sections.pose_forces import pose_forces
from linkcalc.report.sections.requirements import requirements
from linkcalc.report.sections.rests import rests
from linkcalc.report.sections.trust import trust


def stroke_blocks(answer: StrokeAnswer, *, all_joints: bool = False) -> list[Block]:
    """Everything on a stroke, or on a frame: a frame has its forces by components in place of the worst over a stroke.

    all_joints  the table over the stroke gets a column for each joint
    """
    single = answer.drive.shape[-1] == 1
    return [
        *head(answer),
        *over_stroke(answer, all_joints=all_joints and not single),
        *events(answer),
        *rests(answer),
        *(pose_forces(answer, 0) if single else joint_forces(answer)),
        *requirements(answer),
        *trust(answer),
    ]
