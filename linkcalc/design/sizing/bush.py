"""Plain bushes: pressure, rubbing speed and their product against what a material bears."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np

from linkcalc.design.sizing.bush_materials import BushMaterial
from linkcalc.design.sizing.search import told
from linkcalc.design.sizing.series import bush_bores, bush_lengths, source
from linkcalc.design.sizing.working import Choice, Sheet, Working, must_be_positive
from linkcalc.faults import fault
from linkcalc.parts.contract import Value

NARROW, BROAD = 0.5, 1.5
"""Length over bore of usual bushes; common practice."""


def bush(force: Value, bore: float, length: float, material: BushMaterial, *, swing: float = 0.0, rate: float = 0.0,
         mean_force: Value | None = None, factor: float = 1.0) -> Working:  # fmt: skip
    """A plain bush at a joint that swings to and fro.

    force       [N] worst force, float or array
    bore        [m] diameter that rubs; length [m] of the bush
    swing       [rad] whole angle from one end of the stroke to the other; with 0 it stands still
    rate        [1/s] strokes, there and back
    mean_force  [N] for p v; the worst force if not given
    factor      [-] on all limits

    Symbols: p, v, pv. Over a stroke there and back the bush rubs twice its swing.

    Raises Faults: sizes or factor not more than nothing.
    """
    sheet = Sheet("plain bush")
    sheet.given("F", np.abs(force), "force", "worst force")
    sheet.given("Fm", np.abs(force if mean_force is None else mean_force), "force", "mean force, for p v")
    sheet.positive("d", bore, "length", "bore")
    sheet.positive("b", length, "length", "length of the bush")
    sheet.given("swing", abs(swing), "angle", "swing, from one end to the other")
    sheet.given("f", rate, "rate", "strokes, there and back")
    sheet.positive("S", factor, "number", "factor on the limits")
    sheet.step("p", "F/(d*b)", "pressure on the projected area")
    sheet.step("v", "pi*d*2*swing/(360 deg)*f", "mean rubbing speed", "a stroke there and back rubs twice the swing")
    sheet.step("pv", "Fm/(d*b)*v", "pressure times speed")
    for symbol, kind, text, limit in material.limits(moving=swing * rate > 0):
        sheet.given(f"{symbol}_max", limit[0], kind, f"most {text} of {material.name}", material.source)
        sheet.step(f"{symbol}_allow", f"{symbol}_max/S", f"allowed {text}")
        sheet.at_most(text, symbol, f"{symbol}_allow")
        if limit[1] > limit[0] and np.any(np.greater(sheet[symbol], limit[0] / factor)):
            within = np.all(np.less_equal(sheet[symbol], limit[1] / factor))
            but = "but within it: some makes bear it" if within else "and beyond its upper end"
            sheet.note(f"The {text} is above the lower end of the range of {material.name}, {but}.")
    if not NARROW <= length / bore <= BROAD:
        sheet.note(f"Length over bore is {length / bore:.2g}; usual are {NARROW:g} to {BROAD:g} (common practice).")
    if material.temperature is not None:
        sheet.note(f"{material.name} bears up to {material.temperature:g} degC.")
    sheet.caution("Generic ranges: the figures of the maker of the bush come first. Wear is not reckoned.")
    return sheet.working()


def bush_life(depth: float, wear: float, pressure: float, speed: float) -> Working:
    """Time until a bush is worn by a depth: depth/(K p v), with the wear factor of its maker.

    depth [m], wear K [1/Pa], pressure [Pa], speed [m/s]; symbol: t [s]

    Raises Faults: what is not more than nothing.
    """
    for text, value in (("depth", depth), ("wear factor", wear), ("pressure", pressure), ("speed", speed)):
        must_be_positive(text, value)
    sheet = Sheet("wear of a plain bush")
    sheet.given("h", depth, "length", "depth that may wear")
    sheet.given("K", wear, "compliance", "wear factor of the maker")
    sheet.given("p", pressure, "stress", "pressure")
    sheet.given("v", speed, "speed", "rubbing speed")
    sheet.step("t", "h/(K*p*v)", "time until worn", "linear wear, depth = K p v t; common practice")
    return sheet.working()


def choose_bush(force: float, material: BushMaterial, *, bore: float | None = None, length: float | None = None,
                **motion: float) -> Choice:  # fmt: skip
    """The smallest bush of the usual series that passes.

    bore    [m] given: the shortest bush on that bore. Left out: the smallest bore of ISO 3547-1 on which a bush no
            longer than 1.5 times the bore will do
    length  [m] given: only the bore is looked for
    motion  swing, rate, mean_force, factor as for ``bush``

    Raises Faults: sizes or factor not more than nothing, no bush of the series is so short.
    """
    best: Choice | None = None
    for one, name in _sizes(bore, length):
        working = bush(force, one[0], one[1], material, **motion)
        if working.passes:
            smaller, why = (best.chosen, best.why) if best else ("", "")
            return Choice(None, name, working, smaller, why, f"{source('bushes')}, usual lengths")
        best = Choice(None, name, working, "", told(working))
    if best is None:
        raise fault((), "no bush of the series has these sizes", "look at bore and length")
    return Choice(None, "", best.working, "", f"the largest, {best.chosen}, does not do: {best.why}")


def _sizes(bore: float | None, length: float | None) -> list[tuple[tuple[float, float], str]]:
    """(bore, length) that come in question, rising, with what they are called."""
    outside: Mapping[float, float] = dict(bush_bores())
    bores = list(outside) if bore is None else [bore]
    lengths = [size for size, _ in bush_lengths()] if length is None else [length]
    return [
        ((d, b), _name(d, outside.get(d), b))
        for d in bores
        for b in lengths
        if length is not None or NARROW * d * (1 - 1e-9) <= b <= BROAD * d * (1 + 1e-9)
    ]


def _name(bore: float, outside: float | None, length: float) -> str:
    sizes = [bore, *([outside] if outside else []), length]
    return " x ".join(f"{round(size * 1e3, 6):g}" for size in sizes) + " mm"
