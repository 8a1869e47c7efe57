"""Target 1: a four-bar with all joint forces, 100,000 toleranced copies x 91 poses."""

from __future__ import annotations

import resource
from dataclasses import replace
from time import perf_counter

import numpy as np

from linkcalc.design.copies import copies
from linkcalc.model.mechanism import Mechanism
from tests.bench.mechanisms import fourbar
from tests.bench.peers import clock
from tests.bench.told import head, target

COPIES, POSES = 100_000, 91


def quarter_turn() -> Mechanism:
    """The crank turned a quarter, a degree a pose: the poses that the peers are given."""
    mechanism = fourbar()
    assert mechanism.stroke is not None
    start = float(np.degrees(clock.CRANK_DRAWN))
    return replace(mechanism, stroke=replace(mechanism.stroke, start="drawn", stop=f"{start + 90!r} deg", poses=POSES))


def scattered(mechanism: Mechanism, count: int) -> dict[str, np.ndarray]:
    """Sizes of the copies [m], normally distributed with the tolerance at three standard deviations."""
    rng = np.random.default_rng(2026)
    sizes = {}
    for name, dimension in mechanism.dimensions.items():
        assert isinstance(dimension.size, (int, float)) and isinstance(dimension.tol, (int, float))
        sizes[name] = (dimension.size + rng.normal(scale=dimension.tol / 3, size=count)) * 1e-3
    return sizes


def run(mechanism: Mechanism, sizes: dict[str, np.ndarray]) -> tuple[float, float]:
    """Seconds a pose, and the largest effort met (so that nothing can be left out)."""
    count = next(iter(sizes.values())).size
    start, top = perf_counter(), 0.0
    for pose in copies(mechanism, sizes):
        top = max(top, float(pose.effort.max()))
    return (perf_counter() - start) / (count * POSES), top


def report(*, quick: bool) -> bool:
    head(f"1  four-bar, all joint forces, {COPIES:,} toleranced copies x {POSES} poses, one core")
    mechanism = quarter_turn()
    sizes = scattered(mechanism, COPIES // 10 if quick else COPIES)
    small = {name: size[: COPIES // 10] for name, size in sizes.items()}
    rounds = 2 if quick else 5
    peers = {"plain script": clock.plain_fourbar, "plain script by hand": clock.by_hand_fourbar,
             "mujoco": clock.engine_fourbar}  # fmt: skip
    ours, theirs = [], {name: [] for name in peers}
    for _ in range(rounds):
        ours.append(run(mechanism, small)[0])
        for name, peer in peers.items():
            theirs[name].append(peer(POSES if "plain" in name else 20_000))
    whole, _ = run(mechanism, sizes)
    best = min(ours)
    least = {name: min(times) for name, times in theirs.items()}
    print(f"  linkcalc                {best * 1e6:8.3f} us a pose ({whole * 1e6:.3f} us over the whole run)")
    for name, time in least.items():
        print(f"  {name:22}  {time * 1e6:8.3f} us a pose")
    memory = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024
    met = [
        target(
            "times faster than mujoco (one forward, one rnePostConstraint)", least["mujoco"] / best, 10, at_least=True
        ),
        target("times faster than the plain script", least["plain script"] / best, 200, at_least=True),
        target("largest memory of this process, mujoco in it [MB]", memory, 1000, at_least=False),
    ]
    print(f"  for the record: {least['plain script by hand'] / best:.3g} times the plain script typed in by hand")
    return all(met)
