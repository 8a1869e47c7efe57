"""The report on a balance, in the order in which a designer asks: what to put in, what it does, what is left."""

from __future__ import annotations

import numpy as np

from linkcalc.design.balance_answer import BalanceAnswer, FoundPart
from linkcalc.design.positions import Positions
from linkcalc.model.mechanism import LEAST_SQUARE
from linkcalc.parts.pose import Array
from linkcalc.report.blocks import Block, Cell, Column, Note, Table
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import places_for, plain
from linkcalc.report.sections.head import head
from linkcalc.report.sections.over_stroke import thinned
from linkcalc.report.sections.positions import positions
from linkcalc.report.sections.requirements import requirements
from linkcalc.report.sections.trust import trust

CAUTION = (
    "what is balanced can move by itself: a lid, hatch or guard falls or flies up when a spring fails, loses gas or is"
    " taken out, or when a counterweight comes off; secure counterweights against falling, prop what is open, keep"
    " hands clear"
)


def balance_blocks(answer: BalanceAnswer) -> list[Block]:
    """Everything on a balance."""
    return [
        *head(answer.before),
        Note(_goal(answer)),
        _found(answer),
        Note(_how(answer)),
        _change(answer),
        Note(_left(answer)),
        *_stays(answer),
        _curve(answer),
        *positions(answer.positions_before, answer.before, "Balance positions before"),
        *positions(answer.positions_after, answer.after, "Balance positions after"),
        *requirements(answer.after),
        *(Note(f"{c.item}: {c.text}.", "Warning") for c in answer.caveats),
        *trust(answer.after),
        Note(f"{CAUTION}.", "Caution"),
    ]


def _goal(answer: BalanceAnswer) -> str:
    what = "the mean square of the effort" if answer.goal == LEAST_SQUARE else "the largest effort"
    cases = f"the case{'s' * (len(answer.cases) > 1)} {', '.join(answer.cases)}" if answer.cases else "the whole stroke"
    return f"Made as small as the bounds allow: {what}, over {cases}."


def _found(answer: BalanceAnswer) -> Table:
    edge = Edge(answer.after)
    rows: list[tuple[Cell, ...]] = []
    for part in answer.found:
        for k, size in enumerate(part.sizes):
            told = "rounded" if size.rounded else "found" if size.open else "given"
            first = (part.name, called(part), ", ".join(part.on)) if k == 0 else ("", "", "")
            rows.append((*first, size.name, edge.text(size.value, size.kind, 6), told))
    heads = ("name", "what", "on", "size", "", "")
    return Table(tuple(Column(h) for h in heads), tuple(rows), "To be put in")


def called(part: FoundPart) -> str:
    """ "2 gas springs" """
    return part.word if part.number == 1 else f"{part.number} {part.word}s"


def _how(answer: BalanceAnswer) -> str:
    if answer.linear:
        steps = any(size.rounded for part in answer.found for size in part.sizes)
        before = ", before it was rounded to steps" if steps else ""
        return f"The effort is linear in what was to be found: there is no better answer within the bounds{before}."
    several = f"{answer.alike} of {answer.starts} starts ended as well as this"
    if answer.elsewhere:
        several += ", some of them at other places (of those alike the smallest rates and forces are told)"
    tail = "" if answer.alike == answer.starts else "; the others ended at worse answers or at none"
    doubt = ". Few did: more starts may find a better one" if answer.alike < 3 else ""
    return f"Places and lengths were searched, seed {answer.seed}: {several}{tail}{doubt}."


def _change(answer: BalanceAnswer) -> Table:
    edge = Edge(answer.before)
    unit, exact = plain(edge.unit("effort")), answer.exact
    several = len(answer.after.cases) > 1
    places = edge.drive_places(answer.after.drive)
    peak = answer.peak_after
    at: tuple[Cell, ...] = (*((peak.case,) if several else ()), edge.one(peak.drive, "drive"))
    gap: tuple[Cell, ...] = (*(("",) if several else ()), None)

    def row(what: str, before: float, after: float, kind: str, where: tuple[Cell, ...] = gap) -> tuple[Cell, ...]:
        return (what, edge.one(before, kind), edge.one(after, kind), percent(before, after), *where)

    peaks = abs(answer.peak_before.value), 0.0 if exact else abs(peak.value)
    squares = answer.square_before, 0.0 if exact else answer.square_after
    rows = [
        row(f"largest effort [{unit}]", *peaks, "effort", gap if exact else at),
        row(f"root mean square of the effort [{unit}]", *squares, "effort"),
        *(row(f"force at {j.joint} [{plain(edge.unit('force'))}]", j.before, j.after, "force") for j in answer.joints),
        row(f"moving mass [{plain(edge.unit('mass'))}]", answer.mass_before, answer.mass_after, "mass"),
    ]
    columns = (
        Column("worst over stroke and cases"), Column("before"), Column("after"), Column("change"),
        *((Column("after: case"),) if several else ()),
        Column(f"after: at {answer.after.drive_name}", edge.unit("drive"), places=places),
    )  # fmt: skip
    return Table(columns, tuple(rows), "Before and after")


def percent(before: float, after: float) -> str:
    """How much more or less: "-84 %"; "" where there was nothing.

    >>> percent(200.0, 32.0), percent(0.0, 1.0)
    ('-84 %', '')
    """
    if not (np.isfinite(before) and np.isfinite(after)) or before == 0:
        return ""
    change = round(100 * (after / before - 1))
    return f"{change:+d} %" if change else "0 %"


def _left(answer: BalanceAnswer) -> str:
    edge = Edge(answer.before)
    square = answer.goal == LEAST_SQUARE
    stroke = answer.square_after if square else abs(answer.peak_after.value)
    told = f"All of it by a stroke of the model with it in; foretold was {edge.text(answer.foretold, 'effort')}."
    if answer.exact:
        return f"Balanced at every pose: what is left of the effort is rounding. {told}"
    if np.isnan(answer.geometry):
        return told
    least = edge.text(answer.geometry, "effort")
    if answer.geometry <= 1e-9 * abs(answer.peak_before.value):
        return f"A counterweight could balance it at every pose; bounds and steps leave the rest. {told}"
    geometry = "geometry and friction" if answer.after.rubs else "geometry"
    if stroke <= answer.geometry * (1 + 1e-4):
        return f"What is left is {geometry}: no mass on these members, however heavy and wherever, leaves less. {told}"
    part = f"Of what is left {least} is {geometry} that no mass on these members can balance"
    return f"{part}; bounds and steps leave the rest. {told}"


def _stays(answer: BalanceAnswer) -> list[Block]:
    if not answer.stays:
        return []
    edge = Edge(answer.after)
    several = len(answer.after.cases) > 1
    rows = tuple(
        (s.end, edge.text(s.wanted, "effort"), edge.text(s.takes, "effort", 5), "holds" if s.holds else "FAILS",
         *((s.case,) if several else ()))
        for s in answer.stays
    )  # fmt: skip
    heads = ("stays at", "wanted to leave", "takes at the least", "", *(("case",) if several else ()))
    return [Table(tuple(Column(h) for h in heads), rows, "Stays by itself at the ends of the stroke")]


def _curve(answer: BalanceAnswer) -> Table:
    """The effort pose by pose, of the largest size of all cases."""
    edge = Edge(answer.before)
    drive = edge.out(answer.after.drive[0, 0], "drive")
    picked = thinned(drive.size)
    before, after = (furthest(a.effort[:, 0]) for a in (answer.before, answer.after))
    zero = edge.zero("effort")
    columns = (
        Column(answer.after.drive_name, edge.unit("drive"), places=places_for([float(drive[p]) for p in picked])),
        Column("before", edge.unit("effort"), zero=zero), Column("after", edge.unit("effort"), zero=zero),
    )  # fmt: skip
    rows = tuple(
        (float(drive[p]), edge.one(float(before[p]), "effort"), edge.one(float(after[p]), "effort")) for p in picked
    )
    title = "Effort over the stroke" + (", the largest of all cases" if len(answer.after.cases) > 1 else "")
    return Table(columns, rows, title)


def furthest(effort: Array) -> Array:
    """(case, pose) -> (pose) that of the largest size, with its sign."""
    at = np.argmax(np.where(np.isfinite(effort), np.abs(effort), -1.0), axis=0)
    return np.asarray(effort[at, np.arange(effort.shape[1])])


def positions_blocks(found: Positions, answer: object) -> list[Block]:
    """Balance positions alone, of a model in which nothing is to be put."""
    from linkcalc.design.answer import StrokeAnswer

    assert isinstance(answer, StrokeAnswer)
    hint = "To have a counterweight or springs found, give the model [balance.find.NAME], or add --mass-on MEMBER."
    return [*head(answer), *positions(found, answer, "Balance positions"), Note(hint), *trust(answer)]
