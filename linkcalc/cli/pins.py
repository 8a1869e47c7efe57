"""linkcalc pins"""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from linkcalc.cli.files import (
    FAILED,
    CaseName,
    CsvFile,
    JsonFile,
    ModelFile,
    check_point,
    in_file,
    of_option,
    option_fault,
)
from linkcalc.cli.outputs import check_outputs, put, save_all
from linkcalc.cli.poses import check_poses
from linkcalc.cli.rates import rate_of, time_of
from linkcalc.model.mechanism import Mechanism

if TYPE_CHECKING:
    from linkcalc.design.pins_answer import PinsAnswer

Poses = Annotated[
    int | None,
    typer.Option("--poses", help="Poses that the worst is looked for between, 61 at the least.", metavar="N"),
]
Rate = Annotated[
    str | None,
    typer.Option("--rate", help='Strokes there and back ("20/min"), for the speed of rubbing.', metavar="RATE"),
]
Time = Annotated[
    str | None, typer.Option("--time", help='Time of one stroke, one way ("2 s"), instead of --rate.', metavar="TIME")
]
Diameter = Annotated[
    str | None,
    typer.Option("--diameter", help='Of the pins that the model gives none ("16 mm").', metavar="LENGTH"),
]
About = Annotated[
    str | None,
    typer.Option("--about", help="Point that moments on the foundation are taken about.", metavar="POINT"),
]
Bearings = Annotated[
    Path | None,
    typer.Option("--bearings", help="Your own list of rolling bearings (CSV) instead of the sample.", metavar="FILE"),
]
Bushes = Annotated[
    Path | None,
    typer.Option("--bushes", help="Your own list of bush materials (CSV or TOML).", metavar="FILE"),
]
Inch = Annotated[
    bool | None,
    typer.Option("--inch/--metric", help="Series that pins are chosen from; else by the model's unit of length."),
]
Sheet = Annotated[
    str | None,
    typer.Option("--working", help="Print the calculation of this joint's or rope's parts as a sheet.", metavar="NAME"),
]
Plots = Annotated[
    list[str] | None,
    typer.Option("--plot", help="Write the joint forces over the stroke: .svg, .png or .pdf.", metavar="FILE"),
]
RoseFiles = Annotated[
    list[str] | None,
    typer.Option("--roses", help="Write the load roses of all joints: .svg, .png or .pdf.", metavar="FILE"),
]
StackFiles = Annotated[
    list[str] | None,
    typer.Option("--stacks", help="Write pins across their plates, with shear and bending.", metavar="FILE"),
]


def pins(
    file: ModelFile,
    case: CaseName = None,
    poses: Poses = None,
    rate: Rate = None,
    time: Time = None,
    diameter: Diameter = None,
    about: About = None,
    bearings: Bearings = None,
    bushes: Bushes = None,
    inch: Inch = None,
    working: Sheet = None,
    json: JsonFile = None,
    csv: CsvFile = None,
    plot: Plots = None,
    roses: RoseFiles = None,
    stacks: StackFiles = None,
) -> None:
    """What every joint must carry: worst force of all cases, direction on each member, swing, mean load, foundation."""
    with in_file(file) as model:
        from linkcalc.design.pins import pins as ask

        check_poses(poses)
        if rate and time:
            raise option_fault("--rate and --time", "both say how fast the stroke goes", "give one of them")
        pictures = {"--plot": plot, "--roses": roses, "--stacks": stacks}
        quiet = check_outputs(file, {"--json": json, "--csv": csv}, pictures)
        if about is not None:
            check_point(model, "--about", about)
        answer = ask(
            model, case=case, poses=poses, about=about, diameters=_diameter(model, diameter),
            rate=rate_of(rate) if rate else None, time=time_of(time) if time else None,
            bearings=bearings, bushes=bushes, inch=inch,
        )  # fmt: skip
        if working:
            _must_be_sized(answer, working)
        figures = []
        for target in plot or ():
            from linkcalc.report.chart_figure import chart_figure
            from linkcalc.report.pins_chart import pins_chart

            figures.append((chart_figure(pins_chart(answer)), target))
        for target in roses or ():
            from linkcalc.report.rose_figure import rose_figure
            from linkcalc.report.roses import load_roses

            figures.append((rose_figure(load_roses(answer)), target))
        for target in stacks or ():
            from linkcalc.report.pin_figure import pin_figure
            from linkcalc.report.pin_stacks import pin_diagrams

            figures.append((pin_figure(pin_diagrams(answer)), target))
        if json:
            from linkcalc.report.pins_json import pins_json

            put(json, lambda: pins_json(answer))
        if csv:
            from linkcalc.report.csv import as_csv
            from linkcalc.report.pins_table import pins_table

            put(csv, lambda: as_csv(pins_table(answer)))
        if figures:
            save_all(figures)
        if not quiet:
            from linkcalc.report.pins_blocks import pins_blocks, sheet_blocks
            from linkcalc.report.text import as_text

            typer.echo(as_text(sheet_blocks(answer, working) if working else pins_blocks(answer)))
    if not answer.holds:
        raise typer.Exit(FAILED)


def _must_be_sized(answer: PinsAnswer, joint: str) -> None:
    """Raises Faults: no such joint, or one that has no calculation."""
    from linkcalc.words import nearest

    known = {j.joint: j.word for j in answer.joints} | {r.rope: "rope" for r in answer.ropes}
    if joint not in known:
        raise option_fault("--working", f"unknown joint {joint!r}", nearest(joint, known))
    if joint not in answer.sized:
        what = f"{joint} is a {known[joint]} and has no calculation"
        if known[joint] == "pin":
            what = f"the pin {joint} carries nothing, or its force has no bound"
        raise option_fault("--working", what, _can_have(answer, known[joint]))


def _can_have(answer: PinsAnswer, word: str) -> str:
    """Which sheets there are, or what a joint of this kind needs for one."""
    needs = {"slide": "'length' and 'width'", "rope": "'breaking_load'"}
    needs |= dict.fromkeys(("slot", "track"), needs["slide"])
    own = f"give it {needs[word]}" if word in needs else ""
    others = f"there are those of {', '.join(answer.sized)}" if answer.sized else ""
    return "; ".join(text for text in (own, others) if text)


def _diameter(model: Mechanism, text: str | None) -> float | None:
    """[m] a size as a model file writes it. Raises Faults."""
    from linkcalc.design.sizes import length_of

    if text is None:
        return None
    with of_option("--diameter"):
        return length_of(model, text)
