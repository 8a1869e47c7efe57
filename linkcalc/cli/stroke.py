"""linkcalc stroke"""

from __future__ import annotations

from typing import Annotated

import typer

from linkcalc.cli.files import FAILED, CaseName, CsvFile, JsonFile, ModelFile, in_file
from linkcalc.cli.outputs import check_outputs, put, save_all
from linkcalc.cli.poses import Poses, check_poses

Plots = Annotated[
    list[str] | None,
    typer.Option("--plot", help="Write the curves as a picture: .svg, .png or .pdf. May be repeated.", metavar="FILE"),
]
AllJoints = Annotated[bool, typer.Option("--joints", help="A column for every joint in the table.")]


def stroke(
    file: ModelFile,
    case: CaseName = None,
    poses: Poses = None,
    joints: AllJoints = False,
    json: JsonFile = None,
    csv: CsvFile = None,
    plot: Plots = None,
) -> None:
    """Step a mechanism through its stroke: effort, force ratio, every joint force, the poses that matter."""
    with in_file(file) as model:
        from linkcalc.design.stroke import stroke as ask

        check_poses(poses)
        quiet = check_outputs(file, {"--json": json, "--csv": csv}, {"--plot": plot})
        answer = ask(model, case=case, poses=poses)
        figures = []
        for target in plot or ():
            from linkcalc.report.chart import stroke_chart
            from linkcalc.report.chart_figure import chart_figure

            # made before anything is written: a model without a stroke has no curves
            figures.append((chart_figure(stroke_chart(answer)), target))
        if json:
            from linkcalc.report.json import as_json

            put(json, lambda: as_json(answer))
        if csv:
            from linkcalc.report.csv import as_csv
            from linkcalc.report.stroke_table import stroke_table

            put(csv, lambda: as_csv(stroke_table(answer)))
        if figures:
            save_all(figures)
        if not quiet:
            from linkcalc.report.stroke_blocks import stroke_blocks
            from linkcalc.report.text import as_text

            typer.echo(as_text(stroke_blocks(answer, all_joints=joints)))
    if not answer.holds:
        raise typer.Exit(FAILED)
