"""linkcalc weigh"""

from __future__ import annotations

import sys
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from typing import Annotated, Any

import typer

from linkcalc.cli.files import FAILED, CaseName, JsonFile, ModelFile, check_point, in_file, of_option, option_fault
from linkcalc.cli.outputs import check_outputs, put, save_all
from linkcalc.model.mechanism import Mechanism

Loads = Annotated[
    str | None,
    typer.Option("--loads", help='Loads to weigh: "0..25 kg step 0.5 kg" or "5, 10, 20 kg".', metavar="LOADS"),
]
Step = Annotated[str | None, typer.Option("--step", help="Load between two lines of a free poise.", metavar="MASS")]
Tare = Annotated[str | None, typer.Option("--tare", help="Container that the tare poise balances.", metavar="MASS")]
Places = Annotated[
    list[str] | None,
    typer.Option("--place", help='Where a poise stands, or what is on a hanger: "main=120 mm". May be repeated.',
                 metavar="NAME=SIZE"),
]  # fmt: skip
ClassName = Annotated[
    str | None, typer.Option("--class", help='Accuracy class: "OIML III", "NIST III L".', metavar="CLASS")
]
Interval = Annotated[str | None, typer.Option("--interval", help="Scale interval of the class.", metavar="MASS")]
InUse = Annotated[bool, typer.Option("--in-use", help="Limits for a scale in use, not for its verification.")]
Copies = Annotated[int, typer.Option("--copies", help="Copies with sizes drawn within the tolerances.", metavar="N")]
Seed = Annotated[int, typer.Option("--seed", help="Start of the random numbers: same seed, same copies.", metavar="N")]
Level = Annotated[
    str | None, typer.Option("--out-of-level", help='Scale askew either way: "0.5 deg" or "2 mm/m".', metavar="ANGLE")
]
Marks = Annotated[
    str | None, typer.Option("--mark-error", help="Lines and notches off by as much, either way.", metavar="LENGTH")
]
Pointer = Annotated[str | None, typer.Option("--pointer", help="Point of the beam whose way is told.", metavar="POINT")]
Corner = Annotated[
    list[str] | None,
    typer.Option("--corner", help="Point where the load is put in the corner test. May be repeated.", metavar="POINT"),
]
Table = Annotated[
    str | None, typer.Option("--csv", help="Write the table, all figures, as CSV; - prints it.", metavar="FILE")
]
MarksFile = Annotated[
    str | None,
    typer.Option("--marks", help="Write lines and notches with coordinates as CSV; - prints.", metavar="FILE"),
]
Bars = Annotated[
    list[str] | None,
    typer.Option("--bars", help="Draw the bars at true size: .svg, .pdf or .png. May be repeated.", metavar="FILE"),
]
Plots = Annotated[
    list[str] | None,
    typer.Option("--plot", help="Write errors and sensitivity as a picture. May be repeated.", metavar="FILE"),
]
_MOST_COPIES, _LONG, _LONG_FREE = 10_000_000, 30_000, 300


def weigh(
    file: ModelFile,
    loads: Loads = None,
    case: CaseName = None,
    step: Step = None,
    tare: Tare = None,
    place: Places = None,
    class_: ClassName = None,
    interval: Interval = None,
    in_use: InUse = False,
    copies: Copies = 0,
    seed: Seed = 1,
    out_of_level: Level = None,
    mark_error: Marks = None,
    pointer: Pointer = None,
    corner: Corner = None,
    json: JsonFile = None,
    csv: Table = None,
    marks: MarksFile = None,
    bars: Bars = None,
    plot: Plots = None,
) -> None:
    """Balance loads on a lever scale: places of the poises, graduations, sensitivity, errors against a class."""
    with in_file(file) as model:
        from linkcalc.design.weigh import weigh as ask
        from linkcalc.design.weighing import asked

        texts = {"--json": json, "--csv": csv, "--marks": marks}
        quiet = check_outputs(file, texts, {"--bars": bars, "--plot": plot})
        if not 0 <= copies <= _MOST_COPIES:
            raise option_fault("--copies", f"{copies} copies", f"up to {_MOST_COPIES} are wanted")
        for point in corner or ():
            check_point(model, "--corner", point)

        def read(option: str, text: str | None, how: Callable[[str, Mechanism], Any], otherwise: Any) -> Any:
            return otherwise if text is None else _told(option, lambda: how(text, model))

        judged = _class(class_, read("--interval", interval, asked.mass_of, None), in_use)
        with _progress(copies >= (_LONG_FREE if model.free else _LONG), copies) as progress:
            answer = ask(
                model, loads=read("--loads", loads, asked.loads_of, None), case=case,
                step=_plus("--step", read("--step", step, asked.mass_of, None)),
                tare=read("--tare", tare, asked.mass_of, 0.0),
                places=dict(read("--place", text, asked.place_of, None) for text in place or ()),
                accuracy=judged, copies=copies, seed=seed,
                out_of_level=abs(read("--out-of-level", out_of_level, asked.angle_of, 0.0)),
                mark_error=abs(read("--mark-error", mark_error, asked.length_of, 0.0)),
                pointer=pointer, points=corner or (), progress=progress,
            )  # fmt: skip
        figures = _figures(answer, bars or (), plot or ())
        if json:
            from linkcalc.report.weigh.json import weigh_json

            put(json, lambda: weigh_json(answer))
        if csv or marks:
            from linkcalc.report.csv import as_csv
            from linkcalc.report.weigh.tables import marks_table, setting_table

            if csv:
                put(csv, lambda: as_csv(setting_table(answer, whole=True)))
            if marks:
                put(marks, lambda: as_csv(marks_table(answer)))
        if figures:
            save_all(figures)
        if not quiet:
            from linkcalc.report.text import as_text
            from linkcalc.report.weigh.blocks import weigh_blocks

            typer.echo(as_text(weigh_blocks(answer)))
    if not answer.holds:
        raise typer.Exit(FAILED)


def _figures(answer: Any, bars: Any, plot: Any) -> list[tuple[Any, str]]:
    """Made before anything is written."""
    out: list[tuple[Any, str]] = []
    for target in bars:
        from linkcalc.report.weigh.bar_figure import bar_figure

        out.append((_told("--bars", lambda: bar_figure(answer)), target))
    for target in plot:
        from linkcalc.report.weigh.chart_figure import weigh_figure

        out.append((_told("--plot", lambda: weigh_figure(answer)), target))
    return out


def _class(name: str | None, interval: float | None, in_use: bool) -> Any:
    from linkcalc.design.weighing.accuracy import accuracy

    if name is None and interval is None:
        if in_use:
            raise option_fault("--in-use", "no class is given", "--class and --interval are wanted")
        return None
    if name is None:
        raise option_fault("--interval", "it goes with a class", 'give one: --class "OIML III"')
    if interval is None:
        raise option_fault("--class", "it goes with an interval", 'give one: --interval "20 g"')
    return _told("--class", lambda: accuracy(name, interval, in_use=in_use))


def _plus(option: str, value: float | None) -> float | None:
    if value is not None and not value > 0:
        raise option_fault(option, "nothing or less", "more than nothing is wanted")
    return value


def _told(option: str, work: Callable[[], Any]) -> Any:
    with of_option(option):
        return work()


@contextmanager
def _progress(wanted: bool, copies: int) -> Iterator[Callable[[int, int], None] | None]:
    """A bar on the error stream while many copies are weighed, if somebody looks at it."""
    if not wanted or not sys.stderr.isatty():
        yield None
        return
    with typer.progressbar(length=copies, label="copies", file=sys.stderr) as bar:
        done = 0

        def told(now: int, _: int) -> None:
            nonlocal done
            bar.update(now - done)
            done = now

        yield told
