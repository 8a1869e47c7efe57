"""linkcalc draw"""

from __future__ import annotations

from typing import Annotated

import numpy as np
import typer

from linkcalc.cli.files import CaseName, JsonFile, ModelFile, check_moving, check_point, in_file, option_fault
from linkcalc.cli.outputs import check_outputs, put, save_all
from linkcalc.cli.poses import pose_within
from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.mechanism import DRAWN

Output = Annotated[
    list[str], typer.Option("--output", "-o", help="Picture: .svg, .png or .pdf. May be repeated.", metavar="FILE")
]
At = Annotated[
    list[str] | None,
    typer.Option(
        "--at", help='Pose: a value of the stroke ("30 deg"), start, end or drawn. May be repeated.', metavar="POSE"
    ),
]
Member = Annotated[
    str | None, typer.Option("--member", help="This member free, with all the forces on it.", metavar="NAME")
]
Forces = Annotated[bool, typer.Option("--forces/--no-forces", help="Force arrows with their sizes.")]
JointSizes = Annotated[bool, typer.Option("--joint-forces", help="The size of its force beside each joint.")]
Trace = Annotated[
    list[str] | None, typer.Option("--trace", help="A point whose way is drawn. May be repeated.", metavar="POINT")
]


def draw(
    file: ModelFile,
    output: Output,
    at: At = None,
    case: CaseName = None,
    member: Member = None,
    forces: Forces = True,
    joint_forces: JointSizes = False,
    trace: Trace = None,
    json: JsonFile = None,
) -> None:
    """Draw the mechanism at chosen poses (the first in full, others behind it), or one member free with its forces."""
    with in_file(file) as model:
        from linkcalc.design.stroke import stroke as ask
        from linkcalc.report.drawing import draw_mechanism
        from linkcalc.report.drawing_figure import drawing_figure
        from linkcalc.report.free_body import free_body

        quiet = check_outputs(file, {"--json": json}, {"--output": output})
        if member is not None:
            check_moving(model, "--member", member, "the ground cannot be cut free")
        for point in trace or ():
            check_point(model, "--trace", point)
        answer, poses = _posed(ask(model, case=case), at or [])
        if member is not None:
            picture = free_body(answer, member, pose=poses[0])
        else:
            picture = draw_mechanism(answer, poses=poses, forces=forces, joint_sizes=joint_forces, traces=trace)
        if json:
            from linkcalc.report.json import as_json

            put(json, lambda: as_json(answer))
        save_all(((drawing_figure(picture), target) for target in output), err=quiet)


def _posed(answer: StrokeAnswer, at: list[str]) -> tuple[StrokeAnswer, list[int]]:
    """The answer with the poses that are drawn among its poses, and their numbers."""
    last = answer.drive.shape[-1] - 1
    if not answer.drive_name:
        if at and set(at) != {DRAWN}:
            raise option_fault("--at", "the model has no stroke", "it is drawn in its drawing pose")
        return answer, [0]
    if not at:
        return answer, [0, last]
    places = [pose_within(answer, text) for text in at]
    from linkcalc.design.stroke import stroke as ask

    drive = np.array(sorted({*answer.drive[0, 0].tolist(), *places}))
    drive = drive if answer.drive[0, 0, -1] >= answer.drive[0, 0, 0] else drive[::-1]
    case = answer.cases[0] if len(answer.cases) == 1 and answer.mechanism.cases else None
    return ask(answer.mechanism, case=case, at=drive.tolist()), [int(np.argmin(np.abs(drive - p))) for p in places]
