"""Random machines against the independent solution: root finder and one dense system, written from the equations."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
from hypothesis import given

from linkcalc.model.mechanism import Mechanism
from tests.property.judge import felt, linkage_of, places_of
from tests.reference import plain
from tests.strategies import machines, solved

AGREE = 1e-7
"""Of the largest force: the root finder of the other solution stops at 1e-13 of its unknowns or at its own rounding,
some 1e-10, which angles of transmission of 30 degrees in chains of three amplify."""


@given(machines(plain=True))
def test_effort_and_every_joint_force(machine: Mechanism) -> None:
    machine = replace(machine, cases={})
    answer = solved(machine)
    other = plain.solve(linkage_of(machine), answer.drive[0, 0])
    largest = float(np.abs(answer.force).max())
    arm = 1.0 if answer.kinds["effort"] == "force" else answer_size(machine)
    np.testing.assert_allclose(answer.effort[0, 0], other.effort, rtol=AGREE, atol=AGREE * largest * arm)
    told = places_of(other)
    assert len(told) >= len(answer.bearings) / 2
    for place, body in told:
        mine, theirs = felt(answer, place, body), other.force(place, body)
        np.testing.assert_allclose(mine[:, :2], theirs[:, :2], atol=AGREE * largest, err_msg=f"{place} on {body}")
        np.testing.assert_allclose(
            mine[:, 2], theirs[:, 2], atol=AGREE * largest * answer_size(machine), err_msg=f"{place} on {body}"
        )


def answer_size(machine: Mechanism) -> float:
    from linkcalc.model.sketch import Drawing

    return Drawing(machine).size
