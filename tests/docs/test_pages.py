"""Every command in the pages runs, prints the excerpt that is shown, and makes the pictures that are shown."""

from __future__ import annotations

import re
import shutil
from pathlib import Path
from urllib.parse import unquote

import pytest

from tests.docs.blocks import ROOT, Block, blocks, pages
from tests.endtoend.shell import shell

_WRITTEN = re.compile(r"(?:-o|--output|--plot|--roses|--stacks|--bars|--marks|--csv|--json)[ =](\S+)")
_LINK = re.compile(r"\]\(([^)\s]+)\)")

PAGES = [pytest.param(page, id=page.name) for page in pages()]


def _run(block: Block, folder: Path) -> None:
    for command in block.runs:
        done = shell(command.line, folder)
        assert done.returncode == block.status, f"{command.line}\n{done.stdout}{done.stderr}"
        printed = iter([line.split() for line in (done.stdout + done.stderr).splitlines()])
        for line in command.prints:
            assert line.split() in printed, f"{command.line}\ndoes not print (in this order): {line}\n{done.stdout}"
        for name in _WRITTEN.findall(command.line):
            assert name == "-" or (folder / name).stat().st_size > 0, f"{command.line}\nwrote no {name}"


@pytest.mark.parametrize("page", PAGES)
def test_commands_of_a_page_run(page: Path, tmp_path: Path) -> None:
    """In order, in one folder that holds the examples; a ```toml block marked "file NAME" is put there first."""
    shutil.copytree(ROOT / "examples", tmp_path / "examples")
    for block in blocks(page):
        block.lay(tmp_path)
        _run(block, tmp_path)


@pytest.mark.parametrize("page", PAGES)
def test_links_of_a_page_lead_somewhere(page: Path) -> None:
    for link in _LINK.findall(page.read_text(encoding="utf-8")):
        if not link.startswith(("http://", "https://", "#", "mailto:")):
            place = page.parent / unquote(link.partition("#")[0])
            assert place.exists(), f"{page.name}: {link}"


def test_every_picture_is_shown_and_made_by_a_command_of_the_pages() -> None:
    shown, made = set[str](), set[str]()
    for page in pages():
        text = page.read_text(encoding="utf-8")
        shown |= {Path(link).name for link in _LINK.findall(text) if "pictures/" in link}
        made |= {name for b in blocks(page) for c in b.runs for name in _WRITTEN.findall(c.line)}
    there = {p.name for p in (ROOT / "docs" / "pictures").iterdir()}
    assert shown == there
    assert shown <= made
