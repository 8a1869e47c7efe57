"""Target 4: a lazy-tong chain of N crossed pairs: how the cost of a pose grows."""

from __future__ import annotations

from dataclasses import replace
from time import perf_counter

import numpy as np

from linkcalc.mechanics.path import lay_path
from linkcalc.mechanics.pipeline import solve_at
from linkcalc.mechanics.prepare import prepare
from linkcalc.model.sketch import Drawing
from tests.bench.mechanisms import lazy_tongs
from tests.bench.told import head, target

PAIRS = (1, 2, 5, 10, 20, 50, 100)
POSES = 91


def _seconds(pairs: int, rounds: int) -> float:
    """One pose of a stroke: loops closed from the neighbours' cubic, statics of all joints."""
    mechanism = lazy_tongs(pairs)
    ready = prepare(Drawing(replace(mechanism)))
    path = lay_path(ready)
    mesh, drive = path.mesh, path.poses(POSES)
    times = []
    for _ in range(rounds):
        start = perf_counter()
        solve_at(ready, mesh, drive)
        times.append(perf_counter() - start)
    return min(times) / POSES


def report(*, quick: bool) -> bool:
    head("4  lazy tongs of N crossed pairs (2 N members), cost of a pose")
    pairs = PAIRS[:-1] if quick else PAIRS
    times = np.array([_seconds(n, 2 if quick else 5) for n in pairs])
    for n, time in zip(pairs, times, strict=True):
        print(f"  N = {n:3}  {time * 1e6:9.2f} us")
    large = np.array(pairs) >= 5
    slope = float(np.polyfit(np.log(np.array(pairs)[large]), np.log(times[large]), 1)[0])
    whole = float(np.polyfit(np.log(pairs), np.log(times), 1)[0])
    print(f"  fit over N >= 5: time goes with N^{slope:.2f}; over all N: N^{whole:.2f}")
    return target("exponent over N >= 5", slope, 1.3, at_least=False)
