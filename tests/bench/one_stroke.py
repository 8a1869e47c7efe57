"""Target 2: one six-bar, 181 poses: joint forces and events, against the plain script's poses and forces alone."""

from __future__ import annotations

from dataclasses import replace
from time import perf_counter

from linkcalc import stroke
from linkcalc.model.check import check
from tests.bench.mechanisms import sixbar
from tests.bench.peers import clock
from tests.bench.told import head, target

POSES = 181


def report(*, quick: bool) -> bool:
    head(f"2  six-bar, {POSES} poses, all joint forces and events, after import")
    mechanism = sixbar(POSES)
    assert mechanism.stroke is not None
    # half a turn, a degree a pose, as the plain script is given it
    mechanism = replace(mechanism, stroke=replace(mechanism.stroke, start="drawn", stop=half_turn_on(), poses=POSES))
    mechanism = check(mechanism)  # as a mechanism that was read from a file has been
    ours, plain = [], []
    for _ in range(5 if quick else 20):
        start = perf_counter()
        answer = stroke(mechanism)
        ours.append(perf_counter() - start)
        plain.append(clock.plain_sixbar(POSES) * POSES)
    print(f"  linkcalc      {min(ours) * 1e3:7.2f} ms ({len(answer.events)} events)")
    print(f"  plain script  {min(plain) * 1e3:7.2f} ms (no events)")
    return target("times faster than the plain script", min(plain) / min(ours), 5, at_least=True)


def half_turn_on() -> str:
    """The end of a stroke of half a turn from the drawing pose."""
    return f"{clock.CRANK_DRAWN} rad + 180 deg"
