"""A bad model ends every command with status 2 and one line: file, line, item, what is wrong, what would be right."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.endtoend.bad_loads import BAD_LOADS
from tests.endtoend.bad_models import BAD, Bad
from tests.endtoend.models import CLAMP, linkcalc

COMMANDS = [["check"], ["stroke"], ["draw", "--output", "picture.svg"]]


@pytest.fixture(autouse=True)
def _in_a_folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)


@pytest.mark.parametrize("bad", [pytest.param(b, id=b.name) for b in (*BAD, *BAD_LOADS)])
def test_a_fault_is_told_with_its_line_and_cure(bad: Bad) -> None:
    Path("model.toml").write_text(bad.text, encoding="utf-8")
    for command, *options in COMMANDS:
        said = linkcalc(command, "model.toml", *options)
        assert said.err == f"model.toml:{bad.line}: {bad.says}\n"
        assert (said.status, said.out) == (2, "")
    assert not Path("picture.svg").exists()


def test_all_faults_are_told_at_once_in_the_order_of_the_file() -> None:
    text = CLAMP.replace('"handle"\n', '"hand"\n').replace('"strut_length"', '"strut_len"').replace("500", "nan")
    Path("model.toml").write_text(text, encoding="utf-8")
    said = linkcalc("check", "model.toml")
    lines = [int(line.split(":")[1]) for line in said.err.splitlines()]
    assert said.status == 2
    assert lines == sorted(lines)
    told = ("unknown name 'strut_len'", "nan is no number", "unknown member 'hand'")
    assert all(any(what in line for line in said.err.splitlines()) for what in told)
    assert len(lines) == len(told)


@pytest.mark.parametrize(
    ("content", "says"),
    [
        pytest.param(b"\x89PNG\r\n\x1a\n\x00\xff", ":1: not text in UTF-8; a model is a TOML file", id="a picture"),
        pytest.param(b"title = 'x'\n\xff\xfe", ":2: not text in UTF-8; a model is a TOML file", id="bytes in line 2"),
        pytest.param(b"", ": the file is empty; a model is wanted", id="nothing"),
        pytest.param(b" \n\t\n", ": the file is empty; a model is wanted", id="blanks"),
        pytest.param(b"k = " + b"[" * 100_000, ": not a model: brackets stand too deep in one another", id="brackets"),
        pytest.param(b"k = " + b"9" * 10_000, ": not a model: a number is too long to be read", id="digits"),
        pytest.param(b"lever, 3, 4\n", ":1: not TOML: expected '=' after a key in a key/value pair", id="a table"),
    ],
)
def test_what_is_no_model_at_all(content: bytes, says: str) -> None:
    Path("model.toml").write_bytes(content)
    said = linkcalc("check", "model.toml")
    assert (said.status, said.out, said.err) == (2, "", f"model.toml{says}\n")


def test_a_file_that_is_not_there() -> None:
    said = linkcalc("check", "nothing.toml")
    assert (said.status, said.out, said.err) == (2, "", "nothing.toml: no such file\n")


def test_a_folder_for_a_file() -> None:
    said = linkcalc("stroke", ".")
    assert (said.status, said.out, said.err) == (2, "", ".: not a file; a model file is wanted\n")
