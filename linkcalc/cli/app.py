"""The commands. Exit status: 0 fine, 1 a requirement failed, 2 bad input."""

from __future__ import annotations

import os
import sys
from importlib.metadata import PackageNotFoundError

import typer

from linkcalc.cli.balance import balance
from linkcalc.cli.check import check
from linkcalc.cli.draw import draw
from linkcalc.cli.files import BAD
from linkcalc.cli.members import members
from linkcalc.cli.pins import pins
from linkcalc.cli.start import start
from linkcalc.cli.stroke import stroke
from linkcalc.cli.weigh import weigh

app = typer.Typer(
    name="linkcalc",
    help="Statics of levers, clamps, toggles, linkages and weighing beams, over the whole stroke and every load case.",
    no_args_is_help=True,
    rich_markup_mode=None,
    pretty_exceptions_enable=False,
    context_settings={"help_option_names": ["-h", "--help"]},
    epilog="Exit status: 0 fine, 1 a requirement of the model fails, 2 bad input.",
)


@app.callback(invoke_without_command=True)
def _main(
    version: bool = typer.Option(False, "--version", help="Print the version and stop.", is_eager=True),
) -> None:
    if version:
        from importlib.metadata import version as installed

        try:
            typer.echo(f"linkcalc {installed('linkcalc')}")
        except PackageNotFoundError:
            typer.echo("linkcalc, run where it lies: not installed, so without a version")
        raise typer.Exit


for command in (start, check, stroke, members, pins, draw, balance, weigh):
    app.command()(command)


def main() -> None:
    """Run the command line."""
    try:
        app()
    except OSError as error:
        # only printing can fail like this: files are read and written with faults of their own
        typer.echo(f"what is printed: cannot be written: {(error.strerror or str(error)).lower()}", err=True)
        # what is still in the buffer would raise once more when Python ends
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        sys.exit(BAD)


if __name__ == "__main__":
    main()
