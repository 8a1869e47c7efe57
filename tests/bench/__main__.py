"""The benchmark: `python -m tests.bench`. Prints figures and ratios of one run, and says which targets are met.

One core is used: set OMP_NUM_THREADS=1 (done here before numpy is loaded). Competitors take turns, and the least
time of each counts: whatever else the machine does only adds.
"""

from __future__ import annotations

import os

for _variable in ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS", "MKL_NUM_THREADS"):
    os.environ.setdefault(_variable, "1")

import argparse  # noqa: E402
import sys  # noqa: E402
from collections.abc import Sequence  # noqa: E402

from tests.bench import (  # noqa: E402
    accuracy,
    balancing,
    chain,
    friction,
    many_copies,
    one_stroke,
    pin_loads,
    settling,
    start_up,
    weighing,
)

PARTS = {
    "copies": many_copies.report,
    "stroke": one_stroke.report,
    "start": start_up.report,
    "chain": chain.report,
    "accuracy": accuracy.report,
    "friction": friction.report,
    "settling": settling.report,
    "pins": pin_loads.report,
    "weighing": weighing.report,
    "balancing": balancing.report,
}


def asked(arguments: Sequence[str] | None = None) -> tuple[list[str], bool]:
    """The parts that a command line asks for, and whether a quick look is enough."""
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("parts", nargs="*", choices=[*PARTS, "all"], default="all", help="which parts; else all")
    parser.add_argument("--quick", action="store_true", help="fewer copies and rounds: a look, not a measurement")
    given = parser.parse_args(arguments)
    return list(PARTS) if "all" in given.parts else given.parts, given.quick


def main() -> int:
    names, quick = asked()
    met = [PARTS[name](quick=quick) for name in names]
    print(f"\n{sum(met)} of {len(met)} parts meet their targets")
    return 0 if all(met) else 1


if __name__ == "__main__":
    sys.exit(main())
