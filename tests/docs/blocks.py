"""Commands in the pages: blocks of ```sh and ```console, and what a comment above a block says about it.

python -m tests.docs.blocks README.md 1     prints the first block that is marked <!-- bare machine -->
"""

from __future__ import annotations

import re
import sys
from dataclasses import dataclass
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
_BLOCK = re.compile(r"(?:^<!-- (?P<note>[^\n]*) -->\n)?^```(?P<kind>\w+)\n(?P<body>.*?)^```$", re.DOTALL | re.MULTILINE)
_FILE = "file "
_NOT_HERE = ("bare machine", "not run")


@dataclass(frozen=True)
class Command:
    """A command of a page, and lines that it prints: in this order, others may stand between."""

    line: str
    prints: tuple[str, ...] = ()


@dataclass(frozen=True)
class Block:
    """A fenced block.

    kind  "sh": commands only; "console": commands after "$ ", with excerpts of what they print; "toml": a file
    note  what the comment above it says: "bare machine", "not run", "exits 1", "file NAME"; "" without one
    body  its text
    """

    kind: str
    note: str
    body: str

    @property
    def status(self) -> int:
        return int(self.note.removeprefix("exits ")) if self.note.startswith("exits ") else 0

    @property
    def commands(self) -> list[Command]:
        lines = self.body.replace("\\\n", " ").splitlines()
        if self.kind == "sh":
            return [Command(line) for line in lines if line.strip()]
        found: list[Command] = []
        for line in lines:
            if line.startswith("$ "):
                found.append(Command(line[2:]))
            elif line.strip() not in ("", "..."):
                found[-1] = Command(found[-1].line, (*found[-1].prints, line.strip()))
        return found

    @property
    def runs(self) -> list[Command]:
        """The commands that a page's reader runs one after the other."""
        return self.commands if self.kind in ("sh", "console") and self.note not in _NOT_HERE else []

    def lay(self, folder: Path) -> None:
        """Save the block under its name if it is a file."""
        if self.note.startswith(_FILE):
            (folder / self.note.removeprefix(_FILE)).write_text(self.body, encoding="utf-8")


def blocks(page: Path) -> list[Block]:
    """The fenced blocks of a page, in order."""
    text = page.read_text(encoding="utf-8")
    return [Block(m["kind"], m["note"] or "", m["body"]) for m in _BLOCK.finditer(text)]


def pages() -> list[Path]:
    """README, DEVELOPERS and all pages in docs/."""
    return [ROOT / "README.md", ROOT / "DEVELOPERS.md", *sorted((ROOT / "docs").glob("*.md"))]


if __name__ == "__main__":
    bare = [b.body for b in blocks(ROOT / sys.argv[1]) if b.note == "bare machine"]
    print(bare[int(sys.argv[2]) - 1], end="")
