"""Limits of loads that are passed: a spring beyond its length, a cylinder beyond its end; exactly where."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.answer import Caveat
from linkcalc.design.curves import Curves, Wanted, Zeros
from linkcalc.design.places import place
from linkcalc.design.told import Watched

_ROUNDING = 1e-9  # of the largest room: a limit that is met but for rounding is met
_NOTHING = 1e-12  # [SI] the same where the room is nothing all the way


def limits(curves: Curves) -> Iterator[Caveat]:
    """A warning for each limit and case, with the poses between which it is passed."""
    watched = curves.survey.watched
    if not watched:
        return
    names = [w.name for w in watched]
    cases = curves.survey.ready.pushing.cases
    roots = Zeros(curves, names).found() if curves.drive.size > 1 else []
    wanted = [Wanted(name, case, -1) for name in names for case in range(len(cases))]
    least = dict(zip(wanted, curves.extremes(wanted), strict=True)) if curves.drive.size > 1 else {}
    for w in watched:
        samples = curves.samples(w.name)
        alike = bool(np.all((samples == samples[:1]) | np.isnan(samples)))
        for case in range(1 if alike else len(cases)):
            # what is alike in all cases has its roots told for case 0 only
            cuts = [drive for name, c, drive in roots if name == w.name and c == case]
            low = least.get(Wanted(w.name, case, -1))
            dip = low.drive if low and low.value < -_slack(curves, w) else None
            where = _where(curves, w, case, cuts, dip)
            if where:
                named = "" if alike else f" (case {cases[case]})"
                yield Caveat(w.load, f"{w.text}, {where}{named}")


def _slack(curves: Curves, w: Watched) -> float:
    return _ROUNDING * curves.size(w.name) + _NOTHING


def _where(curves: Curves, w: Watched, case: int, cuts: list[float], dip: float | None) -> str:
    """Where a limit is passed, in words; "" if nowhere."""
    ready, slack = curves.survey.ready, _slack(curves, w)
    if curves.drive.size < 2:
        return "in the drawing pose" if curves.samples(w.name)[case, 0] < -slack else ""
    start, end = float(curves.drive[0]), float(curves.drive[-1])
    nodes = [start, *sorted(cuts, reverse=end < start), end]
    middles = (np.array(nodes[:-1]) + nodes[1:]) / 2
    passed = curves.at([w.name], middles)[0, case] < -slack
    spans: list[tuple[float, float]] = []
    for k in np.flatnonzero(passed):
        a, b = nodes[k], nodes[k + 1]
        if spans and spans[-1][1] == a:
            a = spans.pop()[0]
        spans.append((a, b))
    if spans == [(start, end)]:
        return "over the whole stroke"
    texts = []
    for a, b in spans:
        first, last = place(ready, a), place(ready, b)
        texts.append(f"up to {last}" if a == start else f"from {first} on" if b == end else f"from {first} to {last}")
    if dip is not None and not any(min(a, b) <= dip <= max(a, b) for a, b in spans):
        texts.append(f"at {place(ready, dip)}")
    return " and ".join(texts)
