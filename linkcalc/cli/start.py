"""linkcalc start"""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

from linkcalc.cli.files import option_fault, told
from linkcalc.files import write_whole
from linkcalc.words import nearest

_TEMPLATES = Path(__file__).parent / "templates"


def kinds() -> list[str]:
    """Names of the models to begin from."""
    return sorted(t.name.removesuffix(".toml") for t in _TEMPLATES.iterdir() if t.name.endswith(".toml"))


def _complete(incomplete: str) -> list[str]:
    return [k for k in kinds() if k.startswith(incomplete)]


Kind = Annotated[
    str | None,
    typer.Argument(
        help="What to begin from; without it the kinds are listed.", metavar="KIND", autocompletion=_complete
    ),
]
Output = Annotated[
    str | None, typer.Option("--output", "-o", help="File to write; KIND.toml if left out.", metavar="FILE")
]
Force = Annotated[bool, typer.Option("--force", help="Write over a file that is there.")]


def start(kind: Kind = None, output: Output = None, force: Force = False) -> None:
    """Write a commented model to begin from."""
    with told():
        if kind is None:
            for name in kinds():
                typer.echo(f"{name:16}{_title(name)}")
            return
        if kind not in kinds():
            raise option_fault("KIND", f"unknown kind {kind!r}", nearest(kind, kinds()))
        target = output or f"{kind}.toml"
        if Path(target).exists() and not force:
            raise option_fault("--output", f"{target} is there already", "choose another name, or add --force")
        write_whole(target, _text(kind))
        typer.echo(f"wrote {target}; next: linkcalc check {target}")


def _text(kind: str) -> str:
    return (_TEMPLATES / f"{kind}.toml").read_text(encoding="utf-8")


def _title(kind: str) -> str:
    for line in _text(kind).splitlines():
        if line.startswith("title"):
            return line.partition("=")[2].strip().strip('"')
    return ""
