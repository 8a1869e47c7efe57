"""One load case out of several."""

from __future__ import annotations

from dataclasses import replace

from linkcalc.faults import fault
from linkcalc.model.check import in_order
from linkcalc.model.mechanism import Mechanism
from linkcalc.words import nearest


def only_case(mechanism: Mechanism, case: str | None) -> Mechanism:
    """The mechanism with one of its cases alone; as it is for None. Raises Faults: no such case."""
    if case is None:
        return mechanism
    if case not in mechanism.cases:
        raise fault("cases", f"unknown case {case!r}", nearest(case, mechanism.cases))
    return in_order(replace(mechanism, cases={case: mechanism.cases[case]}), mechanism.source)
