"""The worst joint forces of many copies: which copy it is from all of them at the poses, then exactly on that copy."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import replace

import numpy as np

from linkcalc.design.answer import Caveat
from linkcalc.design.copies import copies_in
from linkcalc.design.curves import Curves
from linkcalc.design.events import events
from linkcalc.design.joint_loads import peak_at
from linkcalc.design.over_cases import Asked, worst_cases
from linkcalc.design.pins_answer import Peak
from linkcalc.design.stroke import walked
from linkcalc.design.survey import Survey
from linkcalc.mechanics.copies import solve_copies
from linkcalc.mechanics.path import Path
from linkcalc.mechanics.pipeline import solve_drawn
from linkcalc.mechanics.prepare import prepare
from linkcalc.model.dimensions import evaluate
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import Drawing, drawn
from linkcalc.model.units import kind_of, unit
from linkcalc.parts.pose import Array

Peaks = dict[str, tuple[Peak, Peak]]


def copy_peaks(
    mechanism: Mechanism, sizes: Mapping[str, Array], path: Path | None, curves: Curves, joints: Sequence[str]
) -> tuple[Peaks, tuple[Caveat, ...]]:
    """Largest and smallest force of each joint over all copies, and a warning if some copies have poses without answer.

    Raises Faults: unknown dimensions, different counts.
    """
    copies_in(mechanism, sizes)
    ready = prepare(Drawing(mechanism, {k: np.reshape(v, (1, -1, 1)) for k, v in sizes.items()}))
    solved = solve_drawn(ready) if path is None else solve_copies(ready, path, curves.drive)
    survey = Survey(ready, solved)
    status = solved.balance.status
    worst: dict[int, list[tuple[str, int]]] = {}
    for joint in joints:
        name = f"force at {joint}"
        values = np.where(status == 0, np.broadcast_to(survey.quantities[name].of(survey.first), status.shape), np.nan)
        for sense in (1, -1):
            seen = np.nan_to_num(sense * values, nan=-np.inf).max(axis=(0, 2))
            if np.isfinite(seen).any():
                worst.setdefault(int(np.argmax(seen)), []).append((joint, sense))
    found: dict[tuple[str, int], Peak] = {}
    for variant, wanted in worst.items():
        found |= _exactly(mechanism, {k: float(np.ravel(v)[variant]) for k, v in sizes.items()}, wanted, variant)
    missing = int((status != 0).any(axis=(0, 2)).sum())
    text = f"{missing} of {status.shape[1]} have poses without an answer; these poses do not count"
    told = {j: (found[j, 1], found[j, -1]) for j in joints if (j, 1) in found}
    return told, ((Caveat("copies", text),) if missing else ())


def _exactly(
    mechanism: Mechanism, sizes: Mapping[str, float], wanted: Sequence[tuple[str, int]], variant: int
) -> dict[tuple[str, int], Peak]:
    """The peaks of one copy."""
    ready = prepare(drawn(_copy(mechanism, sizes)))
    solved, path = walked(ready)
    survey = Survey(ready, solved)
    curves = Curves(survey, survey.first, path.limits if path else ())
    if path:
        events(curves, path, extremes=False)  # the dead points, where forces have no bound
    each = worst_cases(curves, [Asked(f"force at {joint}", sense) for joint, sense in wanted])
    return {key: peak_at(curves, case, found, key[0], variant) for key, (case, found) in zip(wanted, each, strict=True)}


def _copy(mechanism: Mechanism, sizes: Mapping[str, float]) -> Mechanism:
    """The mechanism with these sizes [SI] written into it."""
    known, units = evaluate(mechanism), mechanism.units
    dimensions = dict(mechanism.dimensions)
    for name, size in sizes.items():
        word = units.of(kind_of(known[name].dims))
        text = f"{size / unit(word).factor!r} {word}".strip()
        dimensions[name] = replace(dimensions[name], size=text)
    return replace(mechanism, dimensions=dimensions)
