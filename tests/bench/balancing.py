"""What a balance costs: places and force of gas springs searched, over plain strokes of the same hatch."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path
from time import perf_counter

from linkcalc import balance, read, stroke
from tests.bench.told import head, target

HATCH = Path(__file__).parents[2] / "examples" / "roof_hatch.toml"


def report(*, quick: bool) -> bool:
    head("10  gas springs of a hatch: places, force, rounding and judgement, in plain strokes of the same hatch")
    model = read(HATCH)
    bare = replace(model, balance=None)
    stroke(bare)
    balance(model, starts=1)  # loads what is loaded once
    plain = []
    for _ in range(5 if quick else 20):
        start = perf_counter()
        stroke(bare)
        plain.append(perf_counter() - start)
    start = perf_counter()
    answer = balance(model)
    whole = perf_counter() - start
    alike = f"{answer.alike} of {answer.starts} starts alike"
    print(f"  a stroke {min(plain) * 1e3:.2f} ms, the search {whole:.2f} s ({alike})")
    return target("plain strokes that the search costs", whole / min(plain), 2000, at_least=False)
