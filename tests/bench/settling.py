"""What free members cost: the four-bar with a coupler that stretches, and with a pan hung on its tip, batched."""

from __future__ import annotations

from dataclasses import replace

from linkcalc.model.mechanism import Mechanism, Member
from linkcalc.parts.points.polar import Polar
from tests.bench.many_copies import quarter_turn, run, scattered
from tests.bench.told import head, target

COPIES = 16_384


def stretching() -> Mechanism:
    """The coupler gives by 20 kN/mm."""
    bare = quarter_turn()
    coupler = replace(bare.members["coupler"], stiffness="20 kN/mm")
    return replace(bare, members={**bare.members, "coupler": coupler})


def hanging() -> Mechanism:
    """A pan of 2 kg hangs on the tip, 80 mm long."""
    bare = quarter_turn()
    pan = {"low": Polar("tip", 80, -90)}
    return replace(
        bare,
        points={**bare.points, **pan},
        free=("pan",),
        members={**bare.members, "pan": Member(("tip", "low"), mass=2)},
    )


def report(*, quick: bool) -> bool:
    head(f"7  members that settle, {COPIES:,} copies of the four-bar")
    bare = quarter_turn()
    sizes = scattered(bare, COPIES // (8 if quick else 1))
    met = True
    for name, mechanism in (("a coupler that stretches", stretching()), ("a pan hung on the tip", hanging())):
        times = [(run(bare, sizes)[0], run(mechanism, sizes)[0]) for _ in range(1 if quick else 3)]
        plain, settled = (min(t[k] for t in times) for k in (0, 1))
        print(f"  rigid {plain * 1e6:.3f} us a pose, with {name} {settled * 1e6:.3f} us a pose")
        met &= target("times the rigid frictionless pose", settled / plain, 10, at_least=False)
    return met
