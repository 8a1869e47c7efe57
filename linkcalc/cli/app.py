"""The commands. Exit status: 0 fine, 1 a requirement failed, 2 bad input."""

from __future__ import annotations

import gc
import os
import sys
from collections.abc import Sequence
from importlib import import_module

import typer

COMMANDS = ("start", "check", "stroke", "members", "pins", "draw", "balance", "weigh")
"""In the order of the help; each is the function of that name in the file of that name."""

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
        from importlib.metadata import PackageNotFoundError
        from importlib.metadata import version as installed

        try:
            typer.echo(f"linkcalc {installed('linkcalc')}")
        except PackageNotFoundError:
            typer.echo("linkcalc, run where it lies: not installed, so without a version")
        raise typer.Exit


def loaded(asked: Sequence[str] = ()) -> typer.Typer:
    """The command line with all commands, or with the one that is asked for: it need not wait for the others."""
    known = {command.name for command in app.registered_commands}
    for name in asked if asked and asked[0] in COMMANDS else COMMANDS:
        if name not in known:
            app.command(name)(getattr(import_module(f"linkcalc.cli.{name}"), name))
    return app


def main() -> None:
    """Run the command line."""
    gc.set_threshold(50_000)  # what is loaded stays: looking for garbage in it takes a tenth of the start
    try:
        loaded(sys.argv[1:2])()
    except OSError as error:
        # only printing can fail like this: files are read and written with faults of their own
        typer.echo(f"what is printed: cannot be written: {(error.strerror or str(error)).lower()}", err=True)
        # what is still in the buffer would raise once more when Python ends
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        from linkcalc.cli.files import BAD

        sys.exit(BAD)


if __name__ == "__main__":
    main()
