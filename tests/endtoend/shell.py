"""linkcalc in a process of its own: as installed beside this Python, else straight from the checkout."""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
_CALL = "import sys; sys.argv[0] = 'linkcalc'; from linkcalc.cli.app import main; main()"


def environment(folder: Path) -> dict[str, str]:
    """Variables with which a shell finds `linkcalc`; where it is not installed a stand-in is put into the folder."""
    env = {**os.environ, "COLUMNS": "80"}
    beside = Path(sys.executable).parent
    if not (beside / "linkcalc").exists():
        beside = folder / ".bin"
        beside.mkdir(exist_ok=True)
        call = beside / "linkcalc"
        call.write_text(f'#!/bin/sh\nexec "{sys.executable}" -c "{_CALL}" "$@"\n', encoding="utf-8")
        call.chmod(0o755)
        env["PYTHONPATH"] = str(ROOT)
    env["PATH"] = f"{beside}{os.pathsep}{env['PATH']}"
    return env


def shell(line: str, folder: Path) -> subprocess.CompletedProcess[str]:
    """A line for the shell, run in a folder."""
    return subprocess.run(
        ["bash", "-c", line], cwd=folder, env=environment(folder), capture_output=True, text=True, check=False
    )
