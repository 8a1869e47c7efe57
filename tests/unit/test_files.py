"""Files are written whole or not at all."""

from __future__ import annotations

import os
import stat
from pathlib import Path

import pytest

from linkcalc.faults import Faults
from linkcalc.files import write_whole


@pytest.mark.parametrize(("data", "bytes_"), [("µ ≤ 2\n", "µ ≤ 2\n".encode()), (b"\x00\xff", b"\x00\xff"), ("", b"")])
def test_what_is_written_stands_there(tmp_path: Path, data: str | bytes, bytes_: bytes) -> None:
    target = tmp_path / "a.txt"
    target.write_text("old, and longer than what comes")
    write_whole(target, data)
    assert target.read_bytes() == bytes_
    assert [p.name for p in tmp_path.iterdir()] == ["a.txt"]


def test_the_mode_of_an_old_file_is_kept_and_a_new_one_has_the_usual(tmp_path: Path) -> None:
    old, new, usual = tmp_path / "old", tmp_path / "new", tmp_path / "usual"
    old.touch()
    old.chmod(0o640)
    usual.touch()
    for target in (old, new):
        write_whole(target, "x")
    assert stat.S_IMODE(old.stat().st_mode) == 0o640
    assert new.stat().st_mode == usual.stat().st_mode


def test_a_link_keeps_pointing(tmp_path: Path) -> None:
    target, link = tmp_path / "real", tmp_path / "link"
    target.write_text("old")
    link.symlink_to(target)
    write_whole(link, "new")
    assert link.is_symlink()
    assert target.read_text() == "new"


def test_a_pipe_is_written_to(tmp_path: Path) -> None:
    pipe = tmp_path / "pipe"
    os.mkfifo(pipe)
    reader = os.open(pipe, os.O_RDONLY | os.O_NONBLOCK)
    write_whole(pipe, "through")
    assert os.read(reader, 20) == b"through"
    os.close(reader)


def test_a_failure_leaves_the_old_file(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """The disk fills up while the new one is written."""
    target = tmp_path / "a.txt"
    target.write_text("old")

    def full(_: int) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(Faults) as raised:
        write_whole(target, "new")
    assert str(raised.value) == f"{target}: cannot be written: no space left on device"
    assert target.read_text() == "old"
    assert [p.name for p in tmp_path.iterdir()] == ["a.txt"]


@pytest.mark.parametrize(
    ("name", "data", "message"),
    [
        ("", "x", "cannot be written: it is a folder; the name of a file is wanted"),
        ("none/a.txt", "x", "cannot be written: there is no folder {folder}/none"),
        ("a\0b", "x", "cannot be written: not a name for a file"),
        ("a.txt", "\ud800", "cannot be written: it holds half a character"),
        ("x" * 300, "x", "cannot be written: file name too long"),
    ],
)
def test_where_nothing_can_be_written(tmp_path: Path, name: str, data: str, message: str) -> None:
    with pytest.raises(Faults) as raised:
        write_whole(f"{tmp_path}/{name}", data)
    assert str(raised.value) == f"{tmp_path}/{name}: " + message.format(folder=tmp_path)
    assert list(tmp_path.iterdir()) == []


@pytest.mark.skipif(os.geteuid() == 0, reason="the superuser may write anywhere")
def test_a_file_that_may_not_be_written(tmp_path: Path) -> None:
    target = tmp_path / "a.txt"
    target.touch()
    target.chmod(0o400)
    with pytest.raises(Faults, match="cannot be written: permission denied"):
        write_whole(target, "x")
