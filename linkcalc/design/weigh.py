"""A lever scale: where the poises balance a load, the graduations, how the beam tilts, how wrong it indicates."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import replace

import numpy as np

from linkcalc.design.answer import Caveat
from linkcalc.design.weighing.accuracy import Accuracy
from linkcalc.design.weighing.answer import WeighAnswer
from linkcalc.design.weighing.bars import bars
from linkcalc.design.weighing.caveats import caveats
from linkcalc.design.weighing.corners import corners
from linkcalc.design.weighing.errors import Judge, Progress, drawn_sizes, judged
from linkcalc.design.weighing.scale import Scale, beam_of, check_effect, hung_load, one_case, probe
from linkcalc.design.weighing.setting import Balancing
from linkcalc.design.weighing.tilts import asked_of, tilt
from linkcalc.design.weighing.verdicts import Wrong, bands_of, gravity
from linkcalc.faults import fault
from linkcalc.model.check import check
from linkcalc.model.mechanism import Mechanism, Units
from linkcalc.model.poises import ZERO
from linkcalc.model.select import only_case
from linkcalc.model.units import from_si, show
from linkcalc.parts.pose import Array
from linkcalc.words import nearest

_ROWS = 10
_MOST = 5000
_EXACT = 1e-9
_CORNER = 1 / 3  # of the largest load: the test load of OIML R 76-1 3.6.2 and of NIST Handbook 44 N.1.3
CAUTION = Caveat(
    "scale", "weighing for trade needs a type that the authority has approved, and each scale verified by it; "
    "limits here are a help for design, the text of the standard in force counts",
)  # fmt: skip


def weigh(
    mechanism: Mechanism,
    *,
    loads: Sequence[float] | Array | None = None,
    case: str | None = None,
    step: float | None = None,
    tare: float = 0.0,
    places: Mapping[str, float] | None = None,
    accuracy: Accuracy | None = None,
    copies: int = 0,
    seed: int = 1,
    sizes: Mapping[str, Array] | None = None,
    out_of_level: float = 0.0,
    mark_error: float = 0.0,
    pointer: str | None = None,
    points: Sequence[str] = (),
    progress: Progress | None = None,
) -> WeighAnswer:
    """Balance loads on a scale with its beam as drawn, and tell how it tilts and how wrong it may indicate.

    loads        (n) [kg] to be weighed; evenly up to the mass of [load] if left out
    case         one load case; None: the model as written, its cases left out
    step         [kg] between the lines of a poise that slides freely; the interval, or a round step, if left out
    tare         [kg] of a container, balanced by the poise with use = "tare"
    places       poise -> [m] place, or counterpoise -> [kg] on it: the load for these is told; the others at nothing
    accuracy     class and interval that errors are held against, see ``accuracy``
    copies       so many copies with sizes drawn within the tolerances, by `seed`
    sizes        name of a dimension -> (copies) [SI] instead
    out_of_level [rad] the scale stands askew by as much, either way
    mark_error   [m] lines and notches are off by as much, either way
    pointer      point of the beam whose way is told; the farthest from the fulcrum if left out
    points       where the load is put for the corner test; all points of the platform if left out

    Raises Faults: whatever is wrong with the model; nothing that balances; loads that cannot be balanced; a beam that
    topples at every load.
    """
    mechanism = check(mechanism)
    beam, own = beam_of(mechanism), hung_load(mechanism)
    mechanism = one_case(only_case(mechanism, case), case)
    bare = probe(mechanism, beam)
    scale = Scale(bare, beam)
    check_effect(scale, scale.terms(np.zeros(1)))
    balancing = Balancing(scale, tare)
    greatest = float(np.ravel(scale.drawing.value(own.mass, "mass"))[0]) or balancing.most
    asked = _asked(loads, balancing, greatest)
    setting = balancing.setting(asked)
    balancing.check(setting)
    tilts = tilt(balancing, setting, pointer)
    zeroed = any(s.use == ZERO for s in balancing.slides)
    if sizes is None and copies:
        sizes = drawn_sizes(bare, copies, seed) or None
        if sizes is None:
            raise fault("dimensions", "no dimension has a tolerance, so all copies are alike", "give some a 'tol'")
    wrong = Wrong(mechanism, bare, balancing, zeroed, sizes, accuracy, out_of_level, mark_error)
    judge, band, reasons, spread = wrong.found(setting, progress)
    test = greatest * _CORNER if balancing.least < greatest * _CORNER < balancing.most else float(asked[-1])
    at_test = Judge(balancing, balancing.setting(np.array([test])), zeroed=zeroed)
    moved = corners(at_test, bare, tuple(points), test)
    answer = WeighAnswer(
        mechanism=mechanism, case=case or "", beam=beam, fulcrum=scale.fulcrum(), least=balancing.least,
        capacity=balancing.most, loads=asked, tare=tare,
        places=dict(zip(scale.poises, setting.places, strict=True)),
        hung=dict(zip(scale.counterpoises, setting.hung, strict=True)), left=setting.left,
        ratios={h.name: h.ratio for h in balancing.hangers}, zero=balancing.zero, tare_place=balancing.tare_place,
        asked_load=_load(balancing, places), bars=bars(balancing, _step(step, accuracy, asked, balancing)), tilt=tilts,
        zeroed=zeroed, causes=reasons, dead_band=band, gravity=gravity(judge, setting), scatter=spread,
        accuracy=accuracy, asked=(), bands=(), corners=moved, caveats=(), cautions=(CAUTION,),
    )  # fmt: skip
    if accuracy is not None:
        edges = np.array([b[1] for b in accuracy.bands(greatest) if balancing.least <= b[1] <= balancing.most])
        known = [(asked, judged(reasons, spread, mechanism.dimensions, asked.size), spread)]
        if edges.size:
            _, _, reasons, spread = wrong.found(balancing.setting(edges), None)
            known.append((edges, judged(reasons, spread, mechanism.dimensions, edges.size), spread))
        answer = replace(
            answer, asked=tuple(asked_of(balancing, accuracy, tilts, greatest)),
            bands=tuple(bands_of(known, accuracy, greatest)),
            corners=None if moved is None else replace(moved, limit=float(accuracy.limit(test))),
        )  # fmt: skip
    return replace(answer, caveats=tuple(caveats(answer, greatest)))


def _asked(loads: Sequence[float] | Array | None, balancing: Balancing, greatest: float) -> Array:
    """Raises Faults: none, too many, not a number."""
    if loads is None:
        return _even(max(0.0, balancing.least), greatest, balancing.scale.mechanism.units)
    found = np.asarray(loads, float).ravel()
    if not found.size:
        raise fault((), "no load is asked for: the table would be empty", "give one load or more")
    if found.size > _MOST:
        raise fault((), f"{found.size} loads", f"up to {_MOST} are wanted")
    if not np.isfinite(found).all():
        raise fault((), "a load that is no number", "a mass is wanted")
    return found


def _even(least: float, greatest: float, units: Units) -> Array:
    """About ten loads at a round step of the file's unit, the greatest among them."""
    step = _round_step(greatest / _ROWS, units)
    first = np.ceil(least / step - _EXACT)
    found = step * np.arange(first, np.floor(greatest / step * (1 + _EXACT) + _EXACT) + 1)
    return found if found.size and found[-1] >= greatest * (1 - _EXACT) else np.append(found, greatest)


def _step(step: float | None, accuracy: Accuracy | None, loads: Array, balancing: Balancing) -> float:
    """[kg] between two lines: as asked, else the interval, else that of the loads or a tenth of the bar."""
    if step is not None or accuracy is not None:
        return accuracy.interval if step is None and accuracy is not None else float(step or 0.0)
    apart = np.diff(np.unique(loads))
    fine = balancing.fine
    tenth = (
        _round_step(balancing.slides[fine].span / _ROWS, balancing.scale.mechanism.units)
        if fine is not None
        else np.inf
    )
    own = float(apart.min()) if apart.size else np.inf
    return min(own, tenth) if min(own, tenth) < np.inf else 1.0


def _round_step(rough: float, units: Units) -> float:
    """[kg] the next round number of the file's unit."""
    unit = float(1 / from_si(1.0, "mass", units))
    power = 10.0 ** np.floor(np.log10(rough / unit))
    return float(next(s * power for s in (1, 2, 2.5, 5, 10) if s * power >= rough / unit * (1 - _EXACT)) * unit)


def _load(balancing: Balancing, places: Mapping[str, float] | None) -> float:
    """[kg] for the places given. Raises Faults: unknown names, places off the bar."""
    if not places:
        return float("nan")
    known = [s.name for s in balancing.slides] + [h.name for h in balancing.hangers]
    units = balancing.scale.mechanism.units
    for name in places:
        if name not in known:
            raise fault((), f"unknown poise {name!r}", nearest(name, known))
    at = []
    for slide, base in zip(balancing.slides, balancing.base, strict=True):
        place = float(places.get(slide.name, base))
        low, high = sorted((slide.start, slide.stop))
        if not low - _EXACT <= place <= high + _EXACT:
            ends = f"from {show(low, 'length', units)} to {show(high, 'length', units)} is wanted"
            raise fault(("poises", slide.name), f"{show(place, 'length', units)} is off its bar", ends)
        at.append(place)
    return balancing.load(np.array(at), np.array([float(places.get(h.name, 0.0)) for h in balancing.hangers]))
