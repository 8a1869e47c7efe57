"""linkcalc balance"""

from __future__ import annotations

from dataclasses import replace
from typing import Annotated, Any

import typer

from linkcalc.cli.files import (
    FAILED,
    STDOUT,
    CaseName,
    CsvFile,
    JsonFile,
    ModelFile,
    check_moving,
    in_file,
    of_option,
    option_fault,
)
from linkcalc.cli.outputs import check_outputs, put, save_all
from linkcalc.cli.stroke import Plots
from linkcalc.model.mechanism import LEAST_PEAK, LEAST_SQUARE, Balancing, Mechanism
from linkcalc.words import nearest

MassOn = Annotated[
    str | None,
    typer.Option(
        "--mass-on", help="Find a counterweight on this member, in place of the model's [balance].", metavar="MEMBER"
    ),
]
At = Annotated[
    str | None,
    typer.Option("--at", help="With --mass-on: its place is this point; else it is found too.", metavar="POINT"),
]
Mass = Annotated[
    str | None,
    typer.Option("--mass", help='With --mass-on: it is this heavy ("12 kg"), its place is found.', metavar="SIZE"),
]
Most = Annotated[
    str | None, typer.Option("--most-mass", help="With --mass-on: it is no heavier than this.", metavar="SIZE")
]
Goal = Annotated[
    str | None, typer.Option("--goal", help=f'"{LEAST_PEAK}" or "{LEAST_SQUARE}" of the effort.', metavar="GOAL")
]
Hand = Annotated[
    str,
    typer.Option(
        "--effort", help="Tell the balance positions with this effort; without it, with none.", metavar="SIZE"
    ),
]
Starts = Annotated[int, typer.Option("--starts", help="Starts of the search of places.", metavar="N")]
Seed = Annotated[int, typer.Option("--seed", help="Another one makes other starts.", metavar="N")]
Output = Annotated[
    list[str] | None,
    typer.Option(
        "--output", "-o", help="Draw it with what was found in: .svg, .png or .pdf. May be repeated.", metavar="FILE"
    ),
]
OutputModel = Annotated[
    str | None, typer.Option("--output-model", help="Write the model with what was found in.", metavar="FILE")
]
_MOST_STARTS = 1000


def balance(
    file: ModelFile,
    mass_on: MassOn = None,
    at: At = None,
    mass: Mass = None,
    most_mass: Most = None,
    goal: Goal = None,
    case: CaseName = None,
    effort: Hand = "0",
    starts: Starts = 24,
    seed: Seed = 1,
    output_model: OutputModel = None,
    output: Output = None,
    json: JsonFile = None,
    csv: CsvFile = None,
    plot: Plots = None,
) -> None:
    """Take the effort out of the hand: find a counterweight or springs, and where it balances along the stroke."""
    with in_file(file) as model:
        if output_model == STDOUT:
            raise option_fault("--output-model", "it cannot be printed among the rest", "give it a file")
        pictures = {"--output": output, "--plot": plot}
        quiet = check_outputs(file, {"--json": json, "--csv": csv}, pictures, {"--output-model": output_model})
        if not 1 <= starts <= _MOST_STARTS:
            raise option_fault("--starts", f"{starts} starts", f"from 1 to {_MOST_STARTS} are wanted")
        if seed < 0:
            raise option_fault("--seed", f"{seed} is less than nothing", "a whole number from 0 on is wanted")
        model = _asked(_one_case(model, case), mass_on, at, mass, most_mass, goal)
        if model.balance is None or not model.balance.find:
            needed = [o for o, given in (("--output-model", output_model), *pictures.items()) if given]
            if needed:
                raise option_fault(needed[0], "the model does not say what may be put in",
                                   "give it [balance.find.NAME], or add --mass-on MEMBER")  # fmt: skip
            _positions(model, effort, json, csv, quiet=quiet)
            return
        holds = _balance(model, effort, starts, seed, output_model, output or [], json, csv, plot or [], quiet=quiet)
    if not holds:
        raise typer.Exit(FAILED)


def _balance(
    model: Mechanism, effort: str, starts: int, seed: int, output_model: str | None, output: list[str],
    json: str | None, csv: str | None, plot: list[str], *, quiet: bool,
) -> bool:  # fmt: skip
    from linkcalc.design.balance import balance as ask

    bar: Any = None

    def progress(done: int, whole: int) -> None:
        nonlocal bar
        if bar is None:
            import sys

            # shown on a terminal only; what is printed stays clean
            bar = typer.progressbar(length=whole, label="searching", file=sys.stderr, hidden=not sys.stderr.isatty())
        bar.update(1)
        if done == whole:
            bar.render_finish()

    answer = ask(model, effort=_size(model, effort), starts=starts, seed=seed, progress=progress)
    made: list[tuple[Any, str]] = []
    for target in plot:
        from linkcalc.report.balance_chart import balance_chart
        from linkcalc.report.chart_figure import chart_figure

        made.append((chart_figure(balance_chart(answer)), target))
    for target in output:
        from linkcalc.report.drawing import draw_mechanism
        from linkcalc.report.drawing_figure import drawing_figure

        last = answer.after.drive.shape[-1] - 1
        made.append((drawing_figure(draw_mechanism(answer.after, poses=[0, last])), target))
    if output_model:
        from linkcalc.model.write import dumps

        put(output_model, lambda: dumps(answer.after.mechanism))
    if json:
        from linkcalc.report.balance_json import balance_json

        put(json, lambda: balance_json(answer))
    if csv:
        from linkcalc.report.balance_json import balance_table
        from linkcalc.report.csv import as_csv

        put(csv, lambda: as_csv(balance_table(answer)))
    save_all(made)
    if not quiet:
        from linkcalc.report.balance import balance_blocks
        from linkcalc.report.text import as_text

        typer.echo(as_text(balance_blocks(answer)))
    return answer.holds


def _positions(model: Mechanism, effort: str, json: str | None, csv: str | None, *, quiet: bool) -> None:
    from linkcalc.design.positions import balance_positions
    from linkcalc.design.stroke import stroke

    found, answer = balance_positions(model, effort=_size(model, effort)), stroke(model)
    if json:
        from linkcalc.report.balance_json import positions_json

        put(json, lambda: positions_json(found, answer))
    if csv:
        from linkcalc.report.balance_json import positions_table
        from linkcalc.report.csv import as_csv

        put(csv, lambda: as_csv(positions_table(found, answer)))
    if not quiet:
        from linkcalc.report.balance import positions_blocks
        from linkcalc.report.text import as_text

        typer.echo(as_text(positions_blocks(found, answer)))


def _one_case(model: Mechanism, case: str | None) -> Mechanism:
    from linkcalc.model.select import only_case

    model = only_case(model, case)
    if case is None or model.balance is None or not model.balance.cases:
        return model
    return replace(model, balance=replace(model.balance, cases=()))


def _asked(
    model: Mechanism, mass_on: str | None, at: str | None, mass: str | None, most: str | None, goal: str | None
) -> Mechanism:
    """The model with what the options say."""
    if goal is not None and goal not in (LEAST_PEAK, LEAST_SQUARE):
        raise option_fault("--goal", f"unknown goal {goal!r}", nearest(goal, (LEAST_PEAK, LEAST_SQUARE)))
    plan = model.balance or Balancing()
    if goal is not None:
        plan = replace(plan, goal=goal)
    if mass_on is None:
        for option, value in (("--at", at), ("--mass", mass), ("--most-mass", most)):
            if value is not None:
                raise option_fault(option, "it goes with --mass-on", "add --mass-on MEMBER")
        return replace(model, balance=plan) if model.balance is not None else model
    from linkcalc.parts.balancers.counterweight import Counterweight
    from linkcalc.parts.rooms.at import At as Place

    check_moving(model, "--mass-on", mass_on, "the ground does not move")
    if at is not None and at not in model.members[mass_on].points:
        raise option_fault("--at", f"{mass_on} does not carry {at!r}", nearest(at, model.members[mass_on].points))
    if mass is not None and most is not None:
        raise option_fault("--most-mass", "the mass is given by --mass", "one of the two is wanted")
    for option, text in (("--mass", mass), ("--most-mass", most)):
        if text is not None:
            _told(option, model, text, "mass")
    span = mass if mass is not None else (0, most) if most is not None else None
    part = Counterweight(mass_on, Place(at) if at is not None else None, _plain(span))
    return replace(model, balance=replace(plan, find={"counterweight": part}))


def _plain(span: Any) -> Any:
    """A number alone is in the file's unit, as it is everywhere."""
    if isinstance(span, tuple):
        return tuple(_plain(s) for s in span)
    try:
        return float(span) if isinstance(span, str) else span
    except ValueError:
        return span


def _size(model: Mechanism, text: str) -> float:
    from linkcalc.model.mechanism import strength_kind

    kind = strength_kind(model.effort) if model.effort is not None else "force"
    return _told("--effort", model, text, kind)


def _told(option: str, model: Mechanism, text: str, kind: str) -> float:
    """[SI] a size given to an option. Raises Faults."""
    import numpy as np

    from linkcalc.model.sketch import drawn

    with of_option(option):
        return float(np.ravel(drawn(model).value(_plain(text), kind))[0])
