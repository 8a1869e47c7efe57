"""Make the pictures of the pages anew, by the commands of the pages: python -m tests.docs.make_pictures"""

from __future__ import annotations

import re
import shutil
import sys
import tempfile
from pathlib import Path

from tests.docs.blocks import ROOT, blocks, pages
from tests.endtoend.shell import shell

PICTURES = ROOT / "docs" / "pictures"


def make() -> list[str]:
    """Run every page's commands in a folder of its own; keep the pictures that some page shows. -> their names."""
    PICTURES.mkdir(exist_ok=True)
    texts = [page.read_text(encoding="utf-8") for page in pages()]
    shown = {name for text in texts for name in re.findall(r"pictures/([\w.]+)\)", text)}
    for old in PICTURES.iterdir():
        old.unlink()
    for page in pages():
        with tempfile.TemporaryDirectory() as scratch:
            folder = Path(scratch)
            shutil.copytree(ROOT / "examples", folder / "examples")
            for block in blocks(page):
                block.lay(folder)
                for command in block.runs:
                    shell(command.line, folder)
            for picture in sorted(folder.glob("*.svg")):
                if picture.name in shown:
                    shutil.copyfile(picture, PICTURES / picture.name)
    return sorted(p.name for p in PICTURES.iterdir())


if __name__ == "__main__":
    print("\n".join(make()), file=sys.stdout)
