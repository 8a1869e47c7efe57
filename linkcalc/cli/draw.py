"""linkcalc draw"""

from __future__ import annotations

from typing import Annotated

import numpy as np
import typer

from linkcalc.cli.files import (
    STDOUT,
    CaseName,
    JsonFile,
    ModelFile,
    check_outputs,
    check_picture,
    in_file,
    option_fault,
    put,
)
from linkcalc.cli.poses import pose_value
from linkcalc.design.answer import StrokeAnswer
from linkcalc.model.mechanism import DRAWN, GROUND
from linkcalc.words import nearest

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
        from linkcalc.report.figure import save
        from linkcalc.report.free_body import free_body

        for target in output:
            check_picture("--output", target)
        check_outputs(file, {"--json": [json], "--output": output})
        moving = [m for m in model.members if m != GROUND]
        if member is not None and member not in moving:
            what = "the ground cannot be cut free" if member == GROUND else f"unknown member {member!r}"
            raise option_fault("--member", what, nearest(member, moving))
        for point in trace or ():
            if point not in model.points:
                raise option_fault("--trace", f"unknown point {point!r}", nearest(point, model.points))
        answer, poses = _posed(ask(model, case=case), at or [])
        if member is not None:
            picture = free_body(answer, member, pose=poses[0])
        else:
            picture = draw_mechanism(answer, poses=poses, forces=forces, joint_sizes=joint_forces, traces=trace)
        if json:
            from linkcalc.report.json import as_json

            put(json, lambda: as_json(answer))
        for target in output:
            save(drawing_figure(picture), target)
            typer.echo(f"wrote {target}", err=json == STDOUT)


def _posed(answer: StrokeAnswer, at: list[str]) -> tuple[StrokeAnswer, list[int]]:
    """The answer with the poses that are drawn among its poses, and their numbers."""
    last = answer.drive.shape[-1] - 1
    if not answer.drive_name:
        if at and set(at) != {DRAWN}:
            raise option_fault("--at", "the model has no stroke", "it is drawn in its drawing pose")
        return answer, [0]
    ends = {"start": float(answer.drive[0, 0, 0]), "end": float(answer.drive[0, 0, -1])}
    if not at:
        return answer, [0, last]
    places = [pose_value(answer.mechanism, text, ends) for text in at]
    low, high = min(ends.values()), max(ends.values())
    for text, place in zip(at, places, strict=True):
        if not low - 1e-9 <= place <= high + 1e-9:
            raise option_fault("--at", f"{text} is outside the stroke", "choose a pose between its ends")
    from linkcalc.design.stroke import stroke as ask

    drive = np.array(sorted({*answer.drive[0, 0].tolist(), *places}))
    drive = drive if ends["end"] >= ends["start"] else drive[::-1]
    case = answer.cases[0] if len(answer.cases) == 1 and answer.mechanism.cases else None
    return ask(answer.mechanism, case=case, at=drive.tolist()), [int(np.argmin(np.abs(drive - p))) for p in places]
