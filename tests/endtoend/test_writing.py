"""Outputs are written whole or not at all, never over the model; pipes that close and disks that fill tell no tales."""

from __future__ import annotations

from pathlib import Path

import pytest

from linkcalc import files
from tests.endtoend.models import CLAMP, linkcalc
from tests.endtoend.shell import shell


@pytest.fixture(autouse=True)
def _in_a_folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    Path("clamp.toml").write_text(CLAMP, encoding="utf-8")


OUTPUTS = ["stroke clamp.toml --json {}", "stroke clamp.toml --csv {}", "stroke clamp.toml --plot {}.svg",
           "check clamp.toml --json {}", "draw clamp.toml -o {}.png", "start clamp --force -o {}"]  # fmt: skip


@pytest.mark.parametrize("line", OUTPUTS)
def test_a_disk_that_fills_leaves_the_old_file(line: str, monkeypatch: pytest.MonkeyPatch) -> None:
    command = line.format("out").split()
    name = command[-1]
    Path(name).write_text("the old one", encoding="utf-8")

    def full(*_: object) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(files.os, "replace", full)
    said = linkcalc(*command)
    assert (said.status, said.out, said.err) == (2, "", f"{name}: cannot be written: no space left on device\n")
    assert sorted(p.name for p in Path().iterdir()) == sorted(["clamp.toml", name])
    assert Path(name).read_text(encoding="utf-8") == "the old one"


@pytest.mark.parametrize("line", OUTPUTS)
def test_an_old_file_is_replaced_whole(line: str) -> None:
    command = line.format("out").split()
    Path(command[-1]).write_text("x" * 1_000_000, encoding="utf-8")
    assert linkcalc(*command).status == 0
    assert b"xxxxxxxx" not in Path(command[-1]).read_bytes()
    assert sorted(p.name for p in Path().iterdir()) == sorted(["clamp.toml", command[-1]])


def test_a_link_to_a_file_stays_a_link() -> None:
    Path("real.json").write_text("old", encoding="utf-8")
    Path("link.json").symlink_to("real.json")
    assert linkcalc("check", "clamp.toml", "--json", "link.json").status == 0
    assert Path("link.json").is_symlink()
    assert Path("real.json").read_text(encoding="utf-8").startswith("{")


def test_the_model_is_never_written_over_even_by_another_name() -> None:
    Path("also.toml").symlink_to("clamp.toml")
    said = linkcalc("stroke", "also.toml", "--csv", "clamp.toml")
    assert said.err == "--csv: clamp.toml is the model itself; give it another file\n"
    assert Path("clamp.toml").read_text(encoding="utf-8") == CLAMP


def test_a_reader_that_goes_away_is_no_reason_to_complain(tmp_path: Path) -> None:
    done = shell("linkcalc stroke clamp.toml --csv - --poses 2000 | head -n 1", tmp_path)
    assert done.stdout.startswith("case,")
    assert done.stderr == ""
    done = shell("linkcalc stroke clamp.toml --json - --poses 2000 | (exec <&-; sleep 2)", tmp_path)
    assert (done.stdout, done.stderr) == ("", "")


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="no device that is always full")
@pytest.mark.parametrize("command", ["stroke", "check"])
def test_a_full_disk_behind_the_standard_output(command: str, tmp_path: Path) -> None:
    done = shell(f"linkcalc {command} clamp.toml > /dev/full", tmp_path)
    assert (done.returncode, done.stderr) == (2, "what is printed: cannot be written: no space left on device\n")


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="no device that is always full")
def test_a_device_that_is_full() -> None:
    said = linkcalc("check", "clamp.toml", "--json", "/dev/full")
    assert (said.status, said.out, said.err) == (2, "", "/dev/full: cannot be written: no space left on device\n")
