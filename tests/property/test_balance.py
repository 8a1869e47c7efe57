"""Random machines balanced: what is found gives what is told, and no other mass at its place is better."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import HealthCheck, assume, example, given, settings
from hypothesis import strategies as st

from linkcalc import Faults, balance, dumps, parse, stroke
from linkcalc.model.mechanism import GROUND, Mechanism
from linkcalc.parts.balancers.counterweight import Counterweight
from linkcalc.parts.loads.weight import Weight
from linkcalc.parts.rooms.within import Within
from tests.strategies import machines

TOLD = 1e-5
"""Of the effort before: the search foretells on rows that hold the exact worst poses, a linear programme to 1e-7."""


LEVEL = """
[points]
A = [0, 0]
F = [-8, -28]
B = [20, 0]
C = [40, 0]
D = [68, 28]
[members]
ground = ["A", "F"]
crank = ["A", "B", "D"]
bar = { points = ["A", "C"], mass = 1 }
link = ["D", "C"]
[effort]
torque_on = "crank"
[stroke]
turn = "crank"
from = 22.5
to = 23.5
poses = 7
"""
"""All turns about A as one: a mass on the link is one on the crank."""


@settings(max_examples=6, deadline=None, suppress_health_check=list(HealthCheck))
@example(parse(LEVEL), 2, 1.0)
@given(machines(plain=True, most=1), st.integers(0, 5), st.floats(0.9, 1.1))
def test_the_model_with_it_in_gives_what_is_told(machine: Mechanism, which: int, factor: float) -> None:
    """Up to 20 kg anywhere within 80 mm of a member's first point."""
    moving = [m for m in machine.members if m != GROUND]
    member = moving[which % len(moving)]
    part = Counterweight(member, Within(80, machine.members[member].points[0]), (0, 20))
    machine = replace(machine, requirements={})
    try:
        answer = balance(machine, {"bob": part})
    except Faults as found:
        # the stroke of a random machine may run into a limit; what only slides level does no work: told as it should be
        assume("cannot be reached" not in str(found) and "does work over the stroke" not in str(found))
        raise
    before = abs(answer.peak_before.value)
    assume(np.isfinite(before))
    after = stroke(parse(dumps(answer.after.mechanism)))
    np.testing.assert_allclose(after.effort, answer.after.effort, rtol=1e-6, atol=1e-9 * before)
    assert answer.foretold == pytest.approx(abs(answer.peak_after.value), abs=TOLD * before)
    assert abs(answer.peak_after.value) <= before * (1 + TOLD)
    bob = answer.after.mechanism.loads.get("bob")
    if isinstance(bob, Weight) and bob.mass * factor <= 20:
        loads = {**answer.after.mechanism.loads, "bob": replace(bob, mass=bob.mass * factor)}
        other = stroke(replace(answer.after.mechanism, loads=loads))
        assert np.abs(other.effort).max() >= abs(answer.peak_after.value) - 10 * TOLD * before
