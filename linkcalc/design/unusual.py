"""Figures that can be right but seldom are: a friction beyond what is usual."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from linkcalc.design.answer import Caveat
from linkcalc.model import walk
from linkcalc.model.sketch import Drawing


def unusual(drawing: Drawing) -> Iterator[Caveat]:
    """A warning for each size of the model that is outside what is sensible for it."""
    for part in walk.everything(drawing.mechanism):
        for item, entry, size in part.fields():
            sensible = entry.metadata.get("sensible")
            if sensible is None:
                continue
            least, most = sensible
            value = drawing.value(size, entry.metadata["unit"])
            if np.any(np.less(value, least)) or np.any(np.greater(value, most)):
                worst = float(np.max(value)) if np.any(np.greater(value, most)) else float(np.min(value))
                text = f"{worst:g} is unusual: {least:g} to {most:g} is common practice; see that it is meant"
                yield Caveat(".".join(item), text)
