"""The help lists every option, the shell completes, the version is told."""

from __future__ import annotations

from importlib.metadata import version
from pathlib import Path

import pytest
from typer.main import get_command

from linkcalc.cli.app import loaded
from linkcalc.cli.start import kinds
from tests.endtoend.models import linkcalc
from tests.endtoend.shell import shell

COMMANDS = ("start", "check", "stroke", "draw", "pins", "balance", "weigh")


@pytest.mark.parametrize("command", COMMANDS)
def test_the_help_lists_every_option_with_a_word_on_it(command: str) -> None:
    said = linkcalc(command, "--help")
    assert (said.status, said.err) == (0, "")
    parameters = get_command(loaded()).commands[command].params  # type: ignore[attr-defined]
    assert {p.name for p in parameters} >= {"force"} if command == "start" else {"file", "case", "json"}
    for parameter in parameters:
        told = parameter.opts if parameter.param_type_name == "option" else [parameter.metavar]
        assert all(name in said.out for name in (*told, *parameter.secondary_opts)), told
        assert parameter.help, told
        assert parameter.help.split()[0] in said.out


def test_without_a_command_the_help_is_shown() -> None:
    said = linkcalc()
    assert all(f"\n  {command} " in said.out + said.err for command in COMMANDS)
    assert "Exit status: 0 fine, 1 a requirement of the model fails, 2 bad input." in said.out + said.err


def test_h_is_help() -> None:
    assert linkcalc("-h").out == linkcalc("--help").out
    assert linkcalc("draw", "-h").out == linkcalc("draw", "--help").out


def test_the_version_is_the_installed_one(tmp_path: Path) -> None:
    done = shell("linkcalc --version", tmp_path)
    assert (done.returncode, done.stderr) == (0, "")
    assert done.stdout.startswith("linkcalc")
    if "not installed" not in done.stdout:
        assert done.stdout == f"linkcalc {version('linkcalc')}\n"


def test_the_shell_completes_commands_and_kinds(tmp_path: Path) -> None:
    shown = shell("linkcalc --show-completion; :", tmp_path)
    assert "linkcalc" in shown.stdout
    assert "complete" in shown.stdout
    completed = shell("_LINKCALC_COMPLETE=complete_bash COMP_WORDS='linkcalc s' COMP_CWORD=1 linkcalc", tmp_path)
    assert completed.stdout.split() == ["start", "stroke"]
    completed = shell("_LINKCALC_COMPLETE=complete_bash COMP_WORDS='linkcalc start ' COMP_CWORD=2 linkcalc", tmp_path)
    assert completed.stdout.split() == kinds()
