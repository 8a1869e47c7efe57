"""What all commands share: reading the model, telling faults."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Annotated

import typer

from linkcalc.faults import Fault, Faults
from linkcalc.model.mechanism import GROUND, Mechanism
from linkcalc.model.read import read
from linkcalc.model.source import open_source
from linkcalc.words import nearest

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


@contextmanager
def of_option(option: str) -> Iterator[None]:
    """Faults raised inside that have no item are told as those of an option."""
    try:
        yield
    except Faults as found:
        raise Faults([f if f.item else Fault((), f"{option}: {f.what}", f.wanted) for f in found.faults]) from None


def check_point(model: Mechanism, option: str, point: str) -> None:
    """Raises Faults: the model has no such point."""
    if point not in model.points:
        raise option_fault(option, f"unknown point {point!r}", nearest(point, model.points))


def check_moving(model: Mechanism, option: str, member: str, ground: str) -> None:
    """Raises Faults: no such member, or the ground.

    ground  what is said of the ground
    """
    moving = [m for m in model.members if m != GROUND]
    if member not in moving:
        raise option_fault(
            option, ground if member == GROUND else f"unknown member {member!r}", nearest(member, moving)
        )


def option_fault(option: str, what: str, wanted: str = "") -> Faults:
    """A fault of an option, not of the model."""
    return Faults(Fault((), f"{option}: {what}", wanted))
