"""Blocks -> text for a terminal: tables that fit its width, notes that wrap."""

from __future__ import annotations

import textwrap
from collections.abc import Callable, Iterable
from dataclasses import replace

from linkcalc.report.blocks import Block, Cell, Chart, Column, Drawing, Heading, Lines, Note, PinDiagrams, Roses, Table
from linkcalc.report.numbers import GAP, number, plain

WIDTH = 96
_WRAP = 22


def as_text(blocks: Iterable[Block], width: int = WIDTH) -> str:
    """Blocks one under the other; a table wider than `width` is split, its key columns repeated."""
    return "\n\n".join(_WRITERS[type(block)](block, width) for block in blocks) + "\n"


def cell_text(cell: Cell, column: Column) -> str:
    """A cell as it is printed: numbers by the digits of their column."""
    if cell is None:
        return GAP
    if isinstance(cell, str):
        return cell
    if isinstance(cell, int):
        return str(cell)
    return number(float(cell), column.digits, column.places, column.zero)


def _heading(block: Heading, _width: int) -> str:
    line = {1: "=", 2: "-"}.get(block.level)
    return f"{block.text}\n{line * len(block.text)}" if line else block.text


def _note(block: Note, width: int) -> str:
    lead = f"{block.label}: " if block.label else ""
    return textwrap.fill(
        lead + block.text, width, subsequent_indent=" " * len(lead), break_long_words=False, break_on_hyphens=False
    )


def _lines_as_they_are(block: Lines, _width: int) -> str:
    return "\n".join([block.title, "", *(f"  {line}" for line in block.lines)])


def _table(block: Table, width: int) -> str:
    """As it is if it fits; else its words on several lines; else in parts."""
    text = _grid(block)
    if _wide(text) > width:
        text = _grid(block, _WRAP)
    if len(block.columns) > block.keys + 1 and _wide(text) > width:
        text = "\n\n".join(_grid(part, _WRAP) for part in _split(block, width))
    return f"{block.title}\n\n{text}" if block.title else text


def _split(block: Table, width: int) -> Iterable[Table]:
    """The table in parts that each fit, as few as may be, the key columns in every one."""
    keys, start = block.keys, block.keys
    while start < len(block.columns):
        stop = start + 1
        while stop < len(block.columns) and _wide(_grid(_part(block, keys, start, stop + 1), _WRAP)) <= width:
            stop += 1
        yield _part(block, keys, start, stop)
        start = stop


def _part(block: Table, keys: int, start: int, stop: int) -> Table:
    return replace(
        block,
        columns=(*block.columns[:keys], *block.columns[start:stop]),
        rows=tuple((*row[:keys], *row[start:stop]) for row in block.rows),
    )


def _grid(block: Table, wrap: int = 1000) -> str:
    import tabulate

    rows = [
        [_lines(cell_text(c, column), wrap) for c, column in zip(row, block.columns, strict=True)] for row in block.rows
    ]
    if not rows:
        return "none"
    tabulate.MIN_PADDING = 0  # its own room round every head would push a table off the page
    align = [_alignment(block, i) for i in range(len(block.columns))]
    text = tabulate.tabulate(rows, _heads(block.columns), tablefmt="simple", colalign=align, disable_numparse=True)
    return "\n".join(line.rstrip() for line in text.splitlines())


def _lines(text: str, wrap: int) -> str:
    return textwrap.fill(text, wrap, break_long_words=False, break_on_hyphens=False) if len(text) > wrap else text


def _heads(columns: Iterable[Column]) -> list[str]:
    """Heads on several lines, no wider than numbers are likely to be, all standing on the rule beneath."""
    stacks = [
        [
            *textwrap.wrap(c.head, 12, break_long_words=False, break_on_hyphens=False),
            *([f"[{plain(c.unit)}]"] * bool(c.unit)),
        ]
        for c in columns
    ]
    height = max(len(s) for s in stacks)
    # a blank, not nothing: an empty first line would be trimmed and the head would rise
    return ["\n".join([" "] * (height - len(s)) + s) for s in stacks]


def _alignment(block: Table, index: int) -> str:
    words = any(isinstance(row[index], str) and row[index] for row in block.rows)
    return "left" if words else "decimal"


def _wide(text: str) -> int:
    return max(len(line) for line in text.splitlines())


def _chart(block: Chart, _width: int) -> str:
    return f"(chart: {block.title})"


def _drawing(block: Drawing, width: int) -> str:
    """Of a drawing a terminal takes what is written under it."""
    return "\n\n".join(
        [block.title, *([block.caption] * bool(block.caption)), *(_table(t, width) for t in block.tables)]
    )


def _roses(block: Roses, _width: int) -> str:
    return f"(load roses: {block.title})"


def _pin_diagrams(block: PinDiagrams, _width: int) -> str:
    return f"(pins across their plates: {block.title})"


_WRITERS: dict[type, Callable[..., str]] = {
    Heading: _heading,
    Note: _note,
    Lines: _lines_as_they_are,
    Table: _table,
    Chart: _chart,
    Drawing: _drawing,
    Roses: _roses,
    PinDiagrams: _pin_diagrams,
}
