"""A graduation table of 200 loads with the errors of 10,000 toleranced copies of a platform scale, a position each."""

from __future__ import annotations

from pathlib import Path
from time import perf_counter

import numpy as np

from linkcalc import read, weigh
from linkcalc.model.mechanism import Mechanism
from tests.bench.many_copies import quarter_turn, run, scattered
from tests.bench.told import head, target

COPIES, ROWS = 10_000, 200
SCALE = Path(__file__).parents[2] / "examples" / "two_bar_scale.toml"


def timed(mechanism: Mechanism, copies: int) -> float:
    """Seconds a position, all that the answer holds counted."""
    start = perf_counter()
    found = weigh(mechanism, loads=np.linspace(0, 200, ROWS), copies=copies, step=1.0)
    assert found.scatter is not None and np.isfinite(found.scatter.high).all()
    return (perf_counter() - start) / (ROWS * copies)


def report(*, quick: bool) -> bool:
    head(f"9  platform scale, {ROWS} loads x {COPIES:,} toleranced copies")
    fourbar, mechanism = quarter_turn(), read(SCALE)
    sizes = scattered(fourbar, 10_000)
    copies, rounds = (COPIES // 10, 1) if quick else (COPIES, 3)
    times = [(run(fourbar, sizes)[0], timed(mechanism, copies)) for _ in range(rounds)]
    pose, position = (min(t[k] for t in times) for k in (0, 1))
    whole = position * ROWS * copies
    print(f"  a pose of the four-bar {pose * 1e6:.3f} us, a position {position * 1e6:.3f} us; the whole {whole:.2f} s")
    return target("times a pose of the batch benchmark", position / pose, 2, at_least=False)
