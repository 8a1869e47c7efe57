"""Pins, bushes, bearings, eyes, guides, ropes: what is needed, what was chosen, how far it is used, what governs."""

from __future__ import annotations

import math

from linkcalc.design.pins_answer import GUIDE, PinsAnswer, Sized
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number, plain
from linkcalc.report.sections.pins_worst import where_cells, where_columns

_NOTE = (
    "Used: part of what is allowed, 100 % at the limit. Factor and material are those of the model, else {} and {}. A"
    " pin without a stack is reckoned for shear in one section only; with one it bends too: give [pins.NAME] a stack."
    " The option --working NAME prints the calculation."
)
_ROPES = (
    "Ropes: needed is the breaking load. Factor {} against it unless the model has one (common practice); the codes for"
    " lifting have their own."
)
_GUIDES = (
    "Straight pressure along a block without play, N/(l b) + 6 M/(l² b) with its length l and width b; with play it"
    " bears at its ends."
)


def pins_sizes(answer: PinsAnswer) -> list[Block]:
    """A part a row, and why the next smaller does not do."""
    found = [(name, s) for name, sized in answer.sized.items() for s in sized]
    if not found:
        return []
    from linkcalc.design.sizing.model_pins import USUAL_FACTOR, USUAL_MATERIAL
    from linkcalc.design.sizing.rope import USUAL_FACTOR as USUAL_ROPE

    edge = Edge(answer.stroke)
    alone = all(s.kind == "length" for _, s in found)  # a rope needs no length, so each then tells its own unit
    columns = (
        Column("joint"), Column("part"), Column("of"), Column("factor", digits=2),
        Column("needed", edge.unit("length") if alone else ""), Column("size"),
        Column("used", "%", digits=3), Column("governed by"),
    )  # fmt: skip
    rows = []
    for k, (joint, s) in enumerate(found):
        first = k == 0 or found[k - 1][0] != joint
        cells: tuple[Cell, ...] = (joint if first else "", s.item, _of(s), _factor(s))
        needed = math.nan if s.required is None else s.required
        cells += (edge.one(needed, s.kind) if alone or math.isnan(needed) else edge.text(needed, s.kind),)
        used = 100 * s.utilisation if s.working.checks else None
        rows.append((*cells, size_text(s, edge), used, s.working.governs.removesuffix(f" of the {s.item}")))
    notes = [_why(joint, s) for joint, s in found if s.choice is not None and s.choice.why]
    fails = [f"{joint}: the {s.item} does not do: {s.working.governs}" for joint, s in found if not s.working.passes]
    usual = _NOTE.format(number(USUAL_FACTOR, trim=True), USUAL_MATERIAL)
    return [
        Table(columns, tuple(rows), "Sizes", keys=2),
        Note(usual),
        *([] if alone else [Note(_ROPES.format(number(USUAL_ROPE, trim=True)))]),
        *([Note(" ".join(notes))] if notes else []),
        *_guides(answer, edge),
        *(Note(text, "Warning") for text in fails),
        *(Note(text, "Caution") for text in dict.fromkeys(c for _, s in found for c in s.working.cautions)),
    ]


def _guides(answer: PinsAnswer, edge: Edge) -> list[Block]:
    """Force and moment of each guide where its edge is pressed most."""
    found = [(name, s, s.worst) for name, sized in answer.sized.items() for s in sized if s.item == GUIDE]
    columns = (
        Column("guide"), Column("normal force", edge.unit("force")), Column("moment", edge.unit("moment")),
        Column("pressure at edge", edge.unit("stress")), *where_columns(answer, edge),
    )  # fmt: skip
    rows = tuple(
        (name, edge.one(float(s.working["N"]), "force"), edge.one(float(s.working["M"]), "moment"),
         edge.one(worst.value, "stress"), *where_cells(answer, edge, worst))
        for name, s, worst in found if worst is not None
    )  # fmt: skip
    return [Table(columns, rows, "Guides, where their edge is pressed most"), Note(_GUIDES)] if rows else []


def size_text(sized: Sized, edge: Edge) -> str:
    """ "16 mm", "12 mm given", a designation."""
    if sized.choice is not None:
        return sized.chosen or "none does"
    if sized.chosen:
        return f"{sized.chosen} given"
    if math.isnan(sized.size):
        return "given"
    return f"{number(edge.one(sized.size, sized.kind), trim=True)} {plain(edge.unit(sized.kind))} given"


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
