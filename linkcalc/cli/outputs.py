"""What commands write: checked before anything is solved, texts and pictures alike."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterable, Mapping, Sequence
from pathlib import Path
from typing import Any

import typer

from linkcalc.cli.files import STDOUT, option_fault
from linkcalc.faults import Fault, Faults
from linkcalc.files import write_whole

Pictures = Mapping[str, Sequence[str] | None]
_NONE: Mapping[str, None] = {}


def check_outputs(
    model: Path, texts: Mapping[str, str | None], pictures: Pictures = _NONE, files: Mapping[str, str | None] = _NONE
) -> bool:
    """Look over where everything goes, option by option. True if a text is printed, and the report so is not.

    texts     may be printed, by "-"
    pictures  several of each, their format told by their names
    files     other files

    Raises Faults: two texts printed, a name that no picture can have, a file over the model or over another.
    """
    printed = [option for option, target in texts.items() if target == STDOUT]
    if len(printed) > 1:
        two = len(texts) == 2
        what = "both cannot be printed" if two else "not all can be printed"
        raise option_fault(" and ".join(printed), what, f"give {'one of them' if two else 'all but one'} a file")
    for option, targets in pictures.items():
        for target in targets or ():
            _check_picture(option, target)
    taken = {os.path.realpath(model): "the model itself"}
    single = {option: [target] for option, target in {**texts, **files}.items() if target and target != STDOUT}
    for option, targets in {**single, **pictures}.items():
        for target in targets or ():
            place = os.path.realpath(target)
            if place in taken:
                raise option_fault(option, f"{target} is {taken[place]}", "give it another file")
            taken[place] = f"written by {option} already"
    return bool(printed)


def _check_picture(option: str, target: str) -> None:
    """Raises Faults: no picture can be written under that name."""
    from linkcalc.report.figure import picture_format

    try:
        picture_format(target)
    except Faults as found:
        raise Faults([Fault((), f"{option}: {target}: {f.what}", f.wanted) for f in found.faults]) from None


def put(target: str, text: Callable[[], str]) -> None:
    """Write a text whole, or print it for "-". Raises Faults: the file cannot be written."""
    if target == STDOUT:
        typer.echo(text(), nl=False)
    else:
        write_whole(target, text())
        typer.echo(f"wrote {target}", err=True)


def save_all(figures: Iterable[tuple[Any, str]], *, err: bool = True) -> None:
    """Write figures under their names, and say so. Raises Faults: a file cannot be written.

    err  say so on the error stream: what is printed stays clean
    """
    from linkcalc.report.figure import save

    for figure, target in figures:
        save(figure, target)
        typer.echo(f"wrote {target}", err=err)
