"""What friction costs: a pose of the four-bar with rubbing pins against one without, batched."""

from __future__ import annotations

from dataclasses import replace

from linkcalc.model.mechanism import Friction
from tests.bench.many_copies import quarter_turn, run, scattered
from tests.bench.told import head, target

COPIES = 16_384


def report(*, quick: bool) -> bool:
    head(f"6  friction in all pins, both senses, {COPIES:,} copies of the four-bar")
    bare = quarter_turn()
    rubbing = replace(bare, friction=Friction(pins=0.1, diameter=10))
    sizes = scattered(bare, COPIES)
    times = [(run(bare, sizes)[0], run(rubbing, sizes)[0]) for _ in range(2 if quick else 5)]
    plain, rubbed = (min(t[k] for t in times) for k in (0, 1))
    print(f"  without friction {plain * 1e6:.3f} us a pose, with it {rubbed * 1e6:.3f} us a pose (two answers)")
    return target("times the rigid frictionless pose", rubbed / plain, 4, at_least=False)
