"""What all commands share: reading the model, telling faults, writing answers."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterator, Mapping, Sequence
from contextlib import contextmanager
from pathlib import Path
from typing import Annotated

import typer

from linkcalc.faults import Fault, Faults
from linkcalc.files import write_whole
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.read import read
from linkcalc.model.source import open_source

FAILED, BAD = 1, 2
STDOUT = "-"

ModelFile = Annotated[Path, typer.Argument(help="Model file (TOML).", metavar="FILE", show_default=False)]
CaseName = Annotated[str | None, typer.Option("--case", help="Only this load case.", metavar="NAME")]
JsonFile = Annotated[
    str | None, typer.Option("--json", help="Write the whole answer as JSON; - prints it.", metavar="FILE")
]
CsvFile = Annotated[
    str | None, typer.Option("--csv", help="Write the table, all poses, as CSV; - prints it.", metavar="FILE")
]


@contextmanager
def told() -> Iterator[None]:
    """Faults raised inside are printed, one line each, and end the command with status 2."""
    try:
        yield
    except Faults as found:
        for fault in found.faults:
            typer.echo(str(fault), err=True)
        raise typer.Exit(BAD) from None


@contextmanager
def in_file(path: Path) -> Iterator[Mechanism]:
    """The model in a file; faults found later, in solving it, are told with file and line too."""
    with told():
        model = read(path)
        try:
            yield model
        except Faults as found:
            # an item of the model has a line there; anything else (an output file, an option) has not
            inside = [f for f in found.faults if not f.file and f.item]
            others = [f for f in found.faults if f.file or not f.item]
            raise Faults([*(open_source(path).located(inside).faults if inside else ()), *others]) from None


def put(target: str, text: Callable[[], str]) -> None:
    """Write a text whole, or print it for "-". Raises Faults: the file cannot be written."""
    if target == STDOUT:
        typer.echo(text(), nl=False)
    else:
        write_whole(target, text())
        typer.echo(f"wrote {target}", err=True)


def check_outputs(model: Path, outputs: Mapping[str, Sequence[str | None]]) -> None:
    """Raises Faults: an option would write over the model, or over what another option writes.

    outputs  option -> the files it names
    """
    taken = {os.path.realpath(model): "the model itself"}
    for option, targets in outputs.items():
        for target in targets:
            if not target or target == STDOUT:
                continue
            place = os.path.realpath(target)
            if place in taken:
                raise option_fault(option, f"{target} is {taken[place]}", "give it another file")
            taken[place] = f"written by {option} already"


def check_picture(option: str, target: str) -> None:
    """Raises Faults: no picture can be written under that name."""
    from linkcalc.report.figure import picture_format

    try:
        picture_format(target)
    except Faults as found:
        raise Faults([Fault((), f"{option}: {target}: {f.what}", f.wanted) for f in found.faults]) from None


def option_fault(option: str, what: str, wanted: str = "") -> Faults:
    """A fault of an option, not of the model."""
    return Faults(Fault((), f"{option}: {what}", wanted))
