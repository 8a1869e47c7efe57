"""linkcalc members"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Annotated

import typer

from linkcalc.cli.files import (
    FAILED,
    STDOUT,
    CaseName,
    CsvFile,
    JsonFile,
    ModelFile,
    check_outputs,
    check_picture,
    in_file,
    option_fault,
    put,
)
from linkcalc.cli.poses import Poses, check_poses, pose_value
from linkcalc.design.diagram import Diagram
from linkcalc.design.members import MembersAnswer
from linkcalc.model.mechanism import DRAWN, GROUND, Mechanism
from linkcalc.words import nearest

MemberName = Annotated[
    str | None, typer.Option("--member", help="The diagrams along this member, in one pose.", metavar="NAME")
]
At = Annotated[
    str | None,
    typer.Option(
        "--at",
        help='With --member: the pose, a value of the stroke ("30 deg"), start, end or drawn; else its worst.',
        metavar="POSE",
    ),
]
WorkingOf = Annotated[
    str | None,
    typer.Option("--working", help="The strength of this member as a sheet that can be checked.", metavar="NAME"),
]
Output = Annotated[
    list[str] | None,
    typer.Option(
        "--output", "-o", help="With --member: its diagrams, .svg, .png or .pdf. May be repeated.", metavar="FILE"
    ),
]


def members(
    file: ModelFile,
    case: CaseName = None,
    poses: Poses = None,
    member: MemberName = None,
    at: At = None,
    output: Output = None,
    working: WorkingOf = None,
    json: JsonFile = None,
    csv: CsvFile = None,
) -> None:
    """Inner forces of every member at their worst: axial force, shear, bending moment, and where they are."""
    with in_file(file) as model:
        from linkcalc.design.members import members as ask

        check_poses(poses)
        _check_options(model, member, at, output or ())
        if working is not None:
            _check_member(model, "--working", working)
            if member is not None:
                raise option_fault("--working and --member", "both cannot be printed", "give one of them")
        if json == STDOUT and csv == STDOUT:
            raise option_fault("--json and --csv", "both cannot be printed", "give one of them a file")
        check_outputs(file, {"--json": [json], "--csv": [csv], "--output": output or []})
        answer = ask(model, case=case, poses=poses)
        if working is not None:
            _tell_working(answer, working, json, csv)
        elif member is None:
            _tell(answer, json, csv)
        else:
            _tell_diagram(_diagram(answer, member, at), output or (), json, csv)
    if not answer.stroke.holds:
        raise typer.Exit(FAILED)


def _check_options(model: Mechanism, member: str | None, at: str | None, output: Sequence[str]) -> None:
    moving = [m for m in model.members if m != GROUND]
    if member is None:
        for option, given in (("--at", at), ("--output", output)):
            if given:
                raise option_fault(option, "of which member?", "add --member NAME, one of " + ", ".join(moving))
    else:
        _check_member(model, "--member", member)
    for target in output:
        check_picture("--output", target)


def _check_member(model: Mechanism, option: str, member: str) -> None:
    moving = [m for m in model.members if m != GROUND]
    if member not in moving:
        what = "the ground has no inner forces here" if member == GROUND else f"unknown member {member!r}"
        raise option_fault(option, what, nearest(member, moving))


def _diagram(answer: MembersAnswer, member: str, at: str | None) -> Diagram:
    """Of the pose that is asked for, in the case where it is worst there; else at the worst of all."""
    from linkcalc.design.diagram import diagram

    stroke = answer.stroke
    if at is None:
        return diagram(answer, member)
    if not stroke.drive_name:
        if at != DRAWN:
            raise option_fault("--at", "the model has no stroke", "it is solved in its drawing pose")
        return diagram(answer, member)
    ends = {"start": float(stroke.drive[0, 0, 0]), "end": float(stroke.drive[0, 0, -1])}
    place = pose_value(stroke.mechanism, at, ends)
    if not min(ends.values()) - 1e-9 <= place <= max(ends.values()) + 1e-9:
        raise option_fault("--at", f"{at} is outside the stroke", "choose a pose between its ends")
    return diagram(answer, member, drive=place)


def _tell(answer: MembersAnswer, json: str | None, csv: str | None) -> None:
    from linkcalc.report.csv import as_csv
    from linkcalc.report.members_blocks import members_blocks
    from linkcalc.report.members_json import members_json
    from linkcalc.report.members_table import members_table
    from linkcalc.report.text import as_text

    if json:
        put(json, lambda: members_json(answer))
    if csv:
        put(csv, lambda: as_csv(members_table(answer)))
    if STDOUT not in (json, csv):
        typer.echo(as_text(members_blocks(answer)))


def _tell_working(answer: MembersAnswer, member: str, json: str | None, csv: str | None) -> None:
    from linkcalc.report.csv import as_csv
    from linkcalc.report.members_json import members_json
    from linkcalc.report.sections.member_strength import member_workings, workings_table
    from linkcalc.report.text import as_text

    blocks = member_workings(answer, member)
    if json:
        put(json, lambda: members_json(answer))
    if csv:
        put(csv, lambda: as_csv(workings_table(answer, member)))
    if STDOUT not in (json, csv):
        typer.echo(as_text(blocks))


def _tell_diagram(found: Diagram, output: Sequence[str], json: str | None, csv: str | None) -> None:
    from linkcalc.report.csv import as_csv
    from linkcalc.report.diagram_blocks import diagram_blocks, diagram_table
    from linkcalc.report.members_json import diagram_json
    from linkcalc.report.text import as_text

    if output:
        from linkcalc.report.diagram import draw_diagram
        from linkcalc.report.diagram_figure import diagram_figure
        from linkcalc.report.figure import save

        picture = diagram_figure(draw_diagram(found))
        for target in output:
            save(picture, target)
            typer.echo(f"wrote {target}", err=True)
    if json:
        put(json, lambda: diagram_json(found))
    if csv:
        put(csv, lambda: as_csv(diagram_table(found)))
    if STDOUT not in (json, csv):
        typer.echo(as_text(diagram_blocks(found)))
