"""What a designer of a scale must not miss."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.answer import Caveat
from linkcalc.design.weighing.answer import WeighAnswer
from linkcalc.model.units import show

_EXACT = 1e-9


def caveats(answer: WeighAnswer, most: float) -> Iterator[Caveat]:
    """All warnings. most: [kg] the greatest load that is to be weighed."""
    units, tilts = answer.mechanism.units, answer.tilt
    if np.any(tilts.steady == 0):
        text = "it is neutral: it stays where it is put, and does not show what is too much or too little"
        yield Caveat(answer.beam, f"{text}; lower its centre of mass a little")
    if np.any(tilts.steady < 0):
        yield Caveat(answer.beam, f"it is unstable from {show(tilts.unstable, 'mass', units)} on: it falls to its stop")
    if np.any(answer.left):
        worst = float(answer.left[np.argmax(np.abs(answer.left))])
        text = f"with notches and weights alone up to {show(abs(worst), 'mass', units)} stays unbalanced"
        yield Caveat("poises", f"{text}; a poise that slides freely would take it")
    if not answer.zeroed and answer.least > _EXACT * most:
        yield Caveat("poises", f"the least load is {show(answer.least, 'mass', units)}, with everything at nothing")
    if answer.scatter is not None and answer.scatter.failed:
        yield Caveat("copies", f"{answer.scatter.failed} of {answer.scatter.copies} cannot be drawn, and are left out")
    if answer.accuracy is not None:
        unfit = answer.accuracy.unfit(most)
        if unfit is not None:
            n = most / answer.accuracy.interval
            yield Caveat(answer.accuracy.name, f"{n:.6g} intervals; {unfit[1]:.6g} to {unfit[2]:.6g} are allowed")
        if answer.accuracy.visible:
            over = answer.dead_band > answer.accuracy.visible * answer.accuracy.limit(answer.loads)
            if over.any():
                first, part = show(float(answer.loads[over].min()), "mass", units), f"{answer.accuracy.visible:g}"
                yield Caveat(answer.accuracy.name, f"friction hides {part} of the largest error from {first} on")
    for one in answer.asked:
        if np.isnan(one.gives):
            more, at = show(one.extra, "mass", units), show(one.load, "mass", units)
            yield Caveat(answer.beam, f"for {more} more at {at} it does not come to rest near level")
