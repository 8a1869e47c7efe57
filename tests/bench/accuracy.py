"""Target 5: how well the answers of all examples satisfy their own equations."""

from __future__ import annotations

from pathlib import Path

from linkcalc import read, stroke
from tests.bench.told import head, target

EXAMPLES = Path(__file__).parents[2] / "examples"


def report(*, quick: bool) -> bool:  # noqa: ARG001
    head("5  accuracy over all examples, all cases and poses")
    checks = {path.stem: stroke(read(path)).checks for path in sorted(EXAMPLES.glob("*.toml"))}
    met = []
    for field, wanted, text in (
        ("closure", 1e-12, "largest gap of a joint over the size of the mechanism"),
        ("equilibrium", 1e-10, "largest unbalance of a member over the largest force"),
        ("virtual_work", 1e-9, "largest disagreement of the effort with virtual work"),
    ):
        name = max(checks, key=lambda n, f=field: getattr(checks[n], f))
        met.append(target(f"{text} ({name})", getattr(checks[name], field), wanted, at_least=False))
    return all(met)
