"""A working as a sheet that can be checked by hand: what went in, each formula with the numbers put in and its result,
what is allowed and how far it is used.
"""

from __future__ import annotations

import textwrap
from collections.abc import Iterator, Mapping

import numpy as np

from linkcalc.design.sizing.working import Check, Choice, Entry, Working
from linkcalc.model.mechanism import Units
from linkcalc.model.tokens import tokens_of
from linkcalc.parts.contract import Value
from linkcalc.report.blocks import Block, Cell, Column, Heading, Lines, Note, Table
from linkcalc.report.json import Tree
from linkcalc.report.quantities import out, shown, unit_of

_WIDTH, _TEXT = 94, 34  # columns of a line, and of the text in it
_TIGHT = "\N{NO-BREAK SPACE}"


def working_blocks(working: Working, units: Units, choice: Choice | None = None) -> list[Block]:
    """The sheet of one item; with the choice that it belongs to, what was needed and chosen."""
    blocks: list[Block] = [Heading(working.title[:1].upper() + working.title[1:], 2)]
    if choice is not None:
        blocks.append(Note(choice_text(choice, units)))
    blocks.append(Lines("Given", tuple(line for e in working.inputs for line in _given(e, units))))
    blocks.append(Lines("Reckoned", tuple(line for e in working.steps for line in _step(e, working, units))))
    if working.checks:
        blocks.append(Lines("Against what is allowed", tuple(_check(c, working, units) for c in working.checks)))
        verdict = f"{working.governs} governs, used {_percent(working.utilisation)}"
        blocks.append(Note(verdict if working.passes else f"{verdict}: this does not do", "Result"))
    blocks += [Note(text, "Note") for text in working.notes]
    return blocks + [Note(text, "Caution") for text in working.cautions]


def working_table(working: Working, units: Units) -> Table:
    """The same as rows, for CSV: a quantity or a check a row."""
    columns = ("what", "symbol", "text", "formula", "numbers put in", "value", "unit", "source")
    rows: list[tuple[Cell, ...]] = [
        (
            "step" if e.formula or e.how else "given", e.symbol, e.text, e.formula or e.how,
            put_in(e, working, units) if e.formula else "", _cell(out(e.value, e.dims, units)),
            unit_of(e.dims, units)[0], e.source,
        )
        for e in working.entries
    ]  # fmt: skip
    rows += [
        ("check", c.symbol, c.name, _against(c), "", _cell(c.utilisation), "", "utilisation") for c in working.checks
    ]
    return Table(tuple(Column(head) for head in columns), tuple(rows), working.title, keys=2)


def working_tree(working: Working, units: Units, choice: Choice | None = None) -> Tree:
    """The same for JSON, every number with all its digits."""
    tree: Tree = {
        "title": working.title,
        "given": [_entry(e, working, units) for e in working.inputs],
        "steps": [_entry(e, working, units) for e in working.steps],
        "checks": [
            {"name": c.name, "symbol": c.symbol, "limit": c.limit, "at least": c.at_least,
             "utilisation": _plain(c.utilisation)}
            for c in working.checks
        ],
        "utilisation": _plain(working.utilisation),
        "governs": working.governs or None,
        "passes": working.passes,
        "notes": list(working.notes),
        "cautions": list(working.cautions),
    }  # fmt: skip
    return tree if choice is None else {**choice_tree(choice, units), "working": tree}


def choice_tree(choice: Choice, units: Units) -> Tree:
    """What was needed and chosen."""
    unit, factor = unit_of((1, 0, 0, 0), units)
    needed = None if choice.required is None else choice.required / factor
    return {
        "needed": {"unit": unit, "value": needed}, "chosen": choice.chosen or None, "series": choice.series or None,
        "next smaller": choice.smaller or None, "why not smaller" if choice.chosen else "why none": choice.why or None,
    }  # fmt: skip


def choice_text(choice: Choice, units: Units) -> str:
    """The same in a sentence or two."""
    needed = "" if choice.required is None else f"Needed: {shown(choice.required, (1, 0, 0, 0), units)}. "
    if not choice.chosen:
        return f"{needed}None of the series will do: {choice.why}."
    smaller = f" The next smaller, {choice.smaller}, does not do: {choice.why}." if choice.smaller else ""
    series = f" ({choice.series})" if choice.series else ""
    return f"{needed}Chosen: {choice.chosen}{series}.{smaller}"


def put_in(entry: Entry, working: Working, units: Units) -> str:
    """A formula with the numbers put in: "12000 N/(2*314.16 mm^2)"."""
    names = _before(entry, working)
    tokens = tokens_of(entry.formula, names)
    parts = []
    for k, token in enumerate(tokens):
        text = token.text
        if token.kind == "name" and text in names:
            one = names[text]
            text = shown(one.value, one.dims, units)
            divides, raised = k > 0 and tokens[k - 1].text == "/", tokens[k + 1].text == "^"
            if (
                (" " in text and (divides or raised))
                or "/" in text
                or (text.startswith("-") and k > 0 and tokens[k - 1].text not in ("(", ","))
            ):
                text = f"({text})"
        parts.append(f" {text} " if token.kind == "sign" and text in "+-" and k > 0 else text)
    return "".join(parts).replace(",", ", ")


def _before(entry: Entry, working: Working) -> Mapping[str, Entry]:
    """What a formula could use: the quantities above it."""
    place = working.entries.index(entry)
    return {e.symbol: e for e in working.entries[:place]}


def _given(entry: Entry, units: Units) -> Iterator[str]:
    source = f" [{entry.source}]" if entry.source else ""
    yield from _fold(f"{entry.symbol} = {shown(entry.value, entry.dims, units)}", f"{entry.text}{source}")


def _step(entry: Entry, working: Working, units: Units) -> Iterator[str]:
    source = f" [{entry.source}]" if entry.source else ""
    if entry.how:
        value = shown(entry.value, entry.dims, units)
        yield from _fold(f"{entry.symbol} = {value}", f"{entry.text}, {entry.how}{source}")
        return
    yield from _fold(f"{entry.symbol} = {entry.formula}", f"{entry.text}{source}")
    lead = " " * len(entry.symbol) + " = "
    if np.ndim(entry.value) == 0:
        numbers = put_in(entry, working, units)
        if numbers != shown(entry.value, entry.dims, units):
            yield from _formula(lead + numbers, len(lead) + 2)
    yield lead + shown(entry.value, entry.dims, units)


def _fold(formula: str, text: str) -> Iterator[str]:
    """A formula, and what it is beside it, or under it if there is no room."""
    beside = len(formula) < _TEXT - 1
    indent = " " * (_TEXT if beside else 8)
    lines = textwrap.wrap(text, _WIDTH, initial_indent=indent, subsequent_indent=indent, break_on_hyphens=False)
    if beside and lines:
        lines[0] = f"{formula:{_TEXT}}{lines[0].strip()}"
    else:
        lines[:0] = _formula(formula, formula.index("=") + 4)
    yield from lines


def _formula(text: str, indent: int) -> list[str]:
    """A formula on as many lines as it takes, broken before a plus or minus only."""
    whole = text.replace(" ", _TIGHT)
    for sign in (" + ", " - "):
        whole = whole.replace(sign.replace(" ", _TIGHT), f" {sign[1]}{_TIGHT}")
    lead = len(whole) - len(whole.lstrip(_TIGHT))
    lines = textwrap.wrap(whole[lead:], _WIDTH - lead, subsequent_indent=" " * (indent - lead), break_long_words=False,
                          break_on_hyphens=False)  # fmt: skip
    return [" " * lead + line.replace(_TIGHT, " ") for line in lines]


def _check(check: Check, working: Working, units: Units) -> str:
    one, limit = working.entry(check.symbol), working.entry(check.limit)
    held = "at least" if check.at_least else "at most"
    values = f"{check.symbol} = {shown(one.value, one.dims, units)}, {held} {shown(limit.value, limit.dims, units)}"
    return f"{check.name}: {values}: used {_percent(check.utilisation)}"


def _against(check: Check) -> str:
    return f"{check.limit}/{check.symbol}" if check.at_least else f"{check.symbol}/{check.limit}"


def _percent(used: Value) -> str:
    return f"{100 * float(np.nanmax(used)):.1f} %"


def _entry(entry: Entry, working: Working, units: Units) -> Tree:
    tree: Tree = {"symbol": entry.symbol, "text": entry.text}
    if entry.formula:
        tree |= {"formula": entry.formula, "put in": put_in(entry, working, units)}
    if entry.how:
        tree["how"] = entry.how
    value = _plain(out(entry.value, entry.dims, units))
    return tree | {"value": value, "unit": unit_of(entry.dims, units)[0], "source": entry.source or None}


def _plain(value: Value) -> object:
    """Numbers and nested lists; JSON knows no nan and no infinity."""
    array = np.asarray(value, dtype=float)
    return np.where(np.isfinite(array), array, None).tolist()  # type: ignore[call-overload]


def _cell(value: Value) -> Cell:
    """One number of a table; of an array its largest."""
    return float(np.nanmax(value))
