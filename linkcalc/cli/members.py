"""linkcalc members"""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING, Annotated

import typer

from linkcalc.cli.files import FAILED, CaseName, CsvFile, JsonFile, ModelFile, check_moving, in_file, option_fault
from linkcalc.cli.outputs import check_outputs, put, save_all
from linkcalc.cli.poses import Poses, check_poses, pose_within
from linkcalc.model.mechanism import DRAWN, GROUND, Mechanism

if TYPE_CHECKING:
    from linkcalc.design.diagram import Diagram
    from linkcalc.design.members import MembersAnswer

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
        _check_options(model, member, at, output)
        if working is not None:
            _check_member(model, "--working", working)
            if member is not None:
                raise option_fault("--working and --member", "both cannot be printed", "give one of them")
        quiet = check_outputs(file, {"--json": json, "--csv": csv}, {"--output": output})
        answer = ask(model, case=case, poses=poses)
        if working is not None:
            _tell_working(answer, working, json, csv, quiet=quiet)
        elif member is None:
            _tell(answer, json, csv, quiet=quiet)
        else:
            _tell_diagram(_diagram(answer, member, at), output or (), json, csv, quiet=quiet)
    if not answer.stroke.holds:
        raise typer.Exit(FAILED)


def _check_options(model: Mechanism, member: str | None, at: str | None, output: Sequence[str] | None) -> None:
    moving = [m for m in model.members if m != GROUND]
    if member is None:
        for option, given in (("--at", at), ("--output", output)):
            if given:
                raise option_fault(option, "of which member?", "add --member NAME, one of " + ", ".join(moving))
    else:
        _check_member(model, "--member", member)


def _check_member(model: Mechanism, option: str, member: str) -> None:
    check_moving(model, option, member, "the ground has no inner forces here")


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
    return diagram(answer, member, drive=pose_within(stroke, at))


def _tell(answer: MembersAnswer, json: str | None, csv: str | None, *, quiet: bool) -> None:
    from linkcalc.report.csv import as_csv
    from linkcalc.report.members_blocks import members_blocks
    from linkcalc.report.members_json import members_json
    from linkcalc.report.members_table import members_table
    from linkcalc.report.text import as_text

    if json:
        put(json, lambda: members_json(answer))
    if csv:
        put(csv, lambda: as_csv(members_table(answer)))
    if not quiet:
        typer.echo(as_text(members_blocks(answer)))


def _tell_working(answer: MembersAnswer, member: str, json: str | None, csv: str | None, *, quiet: bool) -> None:
    from linkcalc.report.csv import as_csv
    from linkcalc.report.members_json import members_json
    from linkcalc.report.sections.member_strength import member_workings, workings_table
    from linkcalc.report.text import as_text

    blocks = member_workings(answer, member)
    if json:
        put(json, lambda: members_json(answer))
    if csv:
        put(csv, lambda: as_csv(workings_table(answer, member)))
    if not quiet:
        typer.echo(as_text(blocks))


def _tell_diagram(found: Diagram, output: Sequence[str], json: str | None, csv: str | None, *, quiet: bool) -> None:
    from linkcalc.report.csv import as_csv
    from linkcalc.report.diagram_blocks import diagram_blocks, diagram_table
    from linkcalc.report.members_json import diagram_json
    from linkcalc.report.text import as_text

    if output:
        from linkcalc.report.diagram import draw_diagram
        from linkcalc.report.diagram_figure import diagram_figure

        picture = diagram_figure(draw_diagram(found))
        save_all((picture, target) for target in output)
    if json:
        put(json, lambda: diagram_json(found))
    if csv:
        put(csv, lambda: as_csv(diagram_table(found)))
    if not quiet:
        typer.echo(as_text(diagram_blocks(found)))
