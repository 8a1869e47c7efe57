"""What the worst of many load cases costs: every joint of the six-bar with friction, against one stroke of one case."""

from __future__ import annotations

from dataclasses import replace
from time import perf_counter

from linkcalc import pins, stroke
from linkcalc.model.check import check
from linkcalc.model.mechanism import Case, Friction, Mechanism
from tests.bench.mechanisms import sixbar
from tests.bench.one_stroke import half_turn_on
from tests.bench.told import head, target

CASES, POSES = 12, 181


def rubbing(cases: int) -> Mechanism:
    """The six-bar of the other parts over half a turn, its pins of 20 mm rubbing, with as many loads."""
    bare = sixbar(POSES)
    assert bare.stroke is not None
    step = replace(bare.stroke, start="drawn", stop=half_turn_on(), poses=POSES)
    scales = {f"load {k}": Case(scale={"load": 0.3 + 0.1 * k}) for k in range(cases)} if cases > 1 else {}
    return check(replace(bare, stroke=step, friction=Friction(pins=0.1, diameter=20), cases=scales))


def report(*, quick: bool) -> bool:
    head(f"8  worst of {CASES} cases x {POSES} poses x both senses, all joints of the six-bar with friction")
    one, many = rubbing(1), rubbing(CASES)
    ours, single = [], []
    for _ in range(3 if quick else 10):
        start = perf_counter()
        answer = pins(many)
        ours.append(perf_counter() - start)
        start = perf_counter()
        stroke(one)
        single.append(perf_counter() - start)
    largest = max(answer.joints, key=lambda joint: joint.largest.value)
    told = f"worst {largest.joint}, {largest.largest.value:.0f} N in case {largest.largest.case}"
    print(f"  pins, {CASES} cases    {min(ours) * 1e3:7.1f} ms ({told})")
    print(f"  stroke, one case  {min(single) * 1e3:7.1f} ms")
    return target("times one case's stroke", min(ours) / min(single), 6, at_least=False)
