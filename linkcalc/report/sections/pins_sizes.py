"""Pins, bushes, bearings and eyes: what is needed, what was chosen, how far it is used and what governs."""

from __future__ import annotations

import math

from linkcalc.design.pins_answer import PinsAnswer, Sized
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number, plain

_NOTE = (
    "Used: part of what is allowed, 100 % at the limit. Factor and material are those of the model, else {} and {}. A"
    " pin without a stack is reckoned for shear in one section only; with one it bends too: give [pins.NAME] a stack."
    " The option --working NAME prints the calculation."
)


def pins_sizes(answer: PinsAnswer) -> list[Block]:
    """A part a row, and why the next smaller does not do."""
    found = [(j.joint, s) for j in answer.joints for s in j.sized]
    if not found:
        return []
    from linkcalc.design.sizing.model_pins import USUAL_FACTOR, USUAL_MATERIAL

    edge = Edge(answer.stroke)
    unit = edge.unit("length")
    columns = (
        Column("joint"), Column("part"), Column("of"), Column("factor", digits=2), Column("needed", unit),
        Column("size"), Column("used", "%", digits=3), Column("governed by"),
    )  # fmt: skip
    rows = []
    for k, (joint, s) in enumerate(found):
        first = k == 0 or found[k - 1][0] != joint
        cells: tuple[Cell, ...] = (joint if first else "", s.item, _of(s), _factor(s))
        cells += (edge.one(math.nan if s.required is None else s.required, "length"), size_text(s, edge))
        rows.append((*cells, 100 * s.utilisation, s.working.governs.removesuffix(f" of the {s.item}")))
    notes = [_why(joint, s) for joint, s in found if s.choice is not None and s.choice.why]
    fails = [f"{joint}: the {s.item} does not do: {s.working.governs}" for joint, s in found if not s.working.passes]
    usual = _NOTE.format(number(USUAL_FACTOR, trim=True), USUAL_MATERIAL)
    return [
        Table(columns, tuple(rows), "Sizes", keys=2),
        Note(usual),
        *([Note(" ".join(notes))] if notes else []),
        *(Note(text, "Warning") for text in fails),
        *(Note(text, "Caution") for text in dict.fromkeys(c for _, s in found for c in s.working.cautions)),
    ]


def size_text(sized: Sized, edge: Edge) -> str:
    """ "16 mm", "12 mm given", a designation."""
    if sized.choice is not None:
        return sized.chosen or "none does"
    if sized.chosen:
        return f"{sized.chosen} given"
    if math.isnan(sized.size):
        return "given"
    return f"{number(edge.one(sized.size, 'length'), trim=True)} {plain(edge.unit('length'))} given"


def _of(sized: Sized) -> str:
    """What it is made of, from the working: the yield stress or limit that was given carries the name."""
    for entry in sized.working.entries:
        for lead in ("yield stress of ", "most pressure of "):
            if entry.text.startswith(lead):
                return entry.text.removeprefix(lead)
    return ""


def _factor(sized: Sized) -> float | None:
    for entry in sized.working.entries:
        if entry.symbol in ("S", "s0_min"):
            return float(entry.value)
    return None


def _why(joint: str, sized: Sized) -> str:
    assert sized.choice is not None
    if not sized.chosen:
        return f"{joint}, {sized.item}: {sized.choice.why}."
    return f"{joint}, {sized.item}: {sized.choice.smaller} does not do, {sized.choice.why}."
