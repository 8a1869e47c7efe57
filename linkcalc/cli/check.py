"""linkcalc check"""

from __future__ import annotations

import typer

from linkcalc.cli.files import FAILED, CaseName, JsonFile, ModelFile, in_file
from linkcalc.cli.outputs import check_outputs, put


def check(file: ModelFile, case: CaseName = None, json: JsonFile = None) -> None:
    """Look a model over: freedoms, range of motion, warnings, requirements."""
    with in_file(file) as model:
        from linkcalc.design.check import check_model
        from linkcalc.report.check import check_blocks, check_json
        from linkcalc.report.text import as_text

        quiet = check_outputs(file, {"--json": json})
        answer = check_model(model, case=case)
        if json:
            put(json, lambda: check_json(answer))
        if not quiet:
            typer.echo(as_text(check_blocks(answer)))
    if not answer.stroke.holds:
        raise typer.Exit(FAILED)
