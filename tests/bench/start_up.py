"""Target 3: `linkcalc stroke` printing a table, against the imports that it cannot do without."""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path
from time import perf_counter

from tests.bench.told import head, target

EXAMPLE = Path(__file__).parents[2] / "examples" / "hold_down.toml"


def _wall(*command: str) -> float:
    # as with a user, whose Python keeps what it has compiled
    env = {name: value for name, value in os.environ.items() if name != "PYTHONDONTWRITEBYTECODE"}
    start = perf_counter()
    subprocess.run(command, check=True, env=env, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL)
    return perf_counter() - start


def report(*, quick: bool) -> bool:
    head("3  linkcalc stroke examples/hold_down.toml, whole process")
    ours, bare = [], []
    for _ in range(4 if quick else 15):
        ours.append(_wall(sys.executable, "-m", "linkcalc.cli.app", "stroke", str(EXAMPLE)))
        bare.append(_wall(sys.executable, "-c", "import numpy, typer, tabulate"))
    print(f"  linkcalc stroke               {min(ours):.3f} s")
    print(f"  import numpy, typer, tabulate {min(bare):.3f} s")
    return target("times the bare imports", min(ours) / min(bare), 2, at_least=False)
