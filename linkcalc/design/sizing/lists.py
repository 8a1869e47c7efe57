"""Lists of the user's own, CSV or TOML: rows with their numbers, so that what is wrong with one can be told."""

from __future__ import annotations

import csv
import io
import math
import tomllib
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from linkcalc.faults import Fault, Faults, fault
from linkcalc.words import nearest


@dataclass(frozen=True)
class Row:
    """A row of a list.

    file   it was read from
    line   in the file, 1 first; 0 in a TOML file, where the name tells it
    count  number of the row, 1 first, heads not counted
    name   what it is called
    cells  key -> what stands there, text in a CSV file
    units  key -> unit in the head of its column, "" if none
    head   line of the heads
    """

    file: str
    line: int
    count: int
    name: str
    cells: dict[str, Any]
    units: dict[str, str]
    head: int = 0

    def located(self, found: Fault) -> Fault:
        """A fault of this row, with file, line and row."""
        row = f"row {self.count}" + (f" ({self.name})" if self.name else "")
        return Fault((row, *found.item), found.what, found.wanted, self.file, self.line)


def open_rows(path: str | Path, name: str, keys: Sequence[str], needed: Sequence[str] = ()) -> list[Row]:
    """The rows of a list. A head may carry its unit: "C [kN]".

    name    the column that names a row
    keys    the others that may stand there
    needed  those of them that must

    Raises Faults: no file, no such list, columns that are missing or unknown, rows that are too short or too long.
    """
    try:
        text = Path(path).read_text(encoding="utf-8-sig")
    except (OSError, UnicodeDecodeError) as error:
        reason = (
            "it is no UTF-8 text" if isinstance(error, UnicodeDecodeError) else (error.strerror or str(error)).lower()
        )
        raise Faults(Fault((), f"cannot be read: {reason}", "", str(path))) from None
    return rows_of(text, str(path), name, keys, needed)


def rows_of(text: str, file: str, name: str, keys: Sequence[str], needed: Sequence[str] = ()) -> list[Row]:
    """The rows of a text, as ``open_rows`` gives them; its name tells the format. Raises Faults."""
    rows = _toml(text, file) if file.lower().endswith(".toml") else _csv(text, file, name, keys, needed)
    if not rows:
        raise Faults(Fault((), "an empty list", f"rows are wanted with the columns {', '.join((name, *keys))}", file))
    faults = [row.located(f) for row in rows for f in _keys_of(row, keys, needed)]
    if faults:
        raise Faults(faults)
    return rows


def number(item: tuple[str, ...] | str, raw: Any) -> float:
    """A number from a cell. Raises Faults: none, or not finite."""
    try:
        if isinstance(raw, bool):
            raise ValueError
        value = float(raw)
    except (TypeError, ValueError):
        comma = isinstance(raw, str) and "," in raw
        wanted = "write a decimal point, not a comma" if comma else "a number is wanted"
        raise fault(
            item, f"{raw!r} is no number" if raw not in (None, "") else "nothing stands there", wanted
        ) from None
    if not math.isfinite(value):
        raise fault(item, f"{raw!r} is no number", "a number is wanted")
    return value


def _keys_of(row: Row, keys: Sequence[str], needed: Sequence[str]) -> list[Fault]:
    unknown = [Fault((key,), f"unknown key {key!r}", nearest(key, keys)) for key in row.cells if key not in keys]
    return unknown + [Fault((key,), "is missing") for key in needed if key not in row.cells]


def _toml(text: str, file: str) -> list[Row]:
    try:
        tree = tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        raise Faults(Fault((), f"is no TOML: {error}", "", file)) from None
    wrong = [key for key, value in tree.items() if not isinstance(value, dict)]
    if wrong:
        raise Faults(Fault((wrong[0],), "is no table", "a table is wanted for each", file))
    return [Row(file, 0, k, key, dict(value), {}) for k, (key, value) in enumerate(tree.items(), 1)]


def _csv(text: str, file: str, name: str, keys: Sequence[str], needed: Sequence[str]) -> list[Row]:
    # a semicolon parts the columns where the comma is the decimal sign, and most spreadsheets write it there
    first = text.lstrip("\n").partition("\n")[0]
    reader = csv.reader(io.StringIO(text), delimiter=";" if first.count(";") > first.count(",") else ",")
    lines = [
        (reader.line_num, cells) for cells in reader if any(c.strip() for c in cells) and not cells[0].startswith("#")
    ]
    if not lines:
        return []
    heads = [_head(cell) for cell in lines[0][1]]
    columns = [head for head, _ in heads]
    known = (name, *keys)
    faults = [Fault((head or "head",), "is no column of this list", nearest(head, known)) for head in columns
              if head not in known]  # fmt: skip
    faults += [Fault((key,), "is missing among the columns", f"wanted are {', '.join(known)}")
               for key in (name, *needed) if key not in columns]  # fmt: skip
    if faults:
        raise Faults(f.located(file, lines[0][0]) for f in faults)
    rows, faults = [], []
    for count, (line, cells) in enumerate(lines[1:], 1):
        told = cells[columns.index(name)].strip() if columns.index(name) < len(cells) else ""
        given = {key: cell.strip() for key, cell in zip(columns, cells, strict=False) if key != name}
        row = Row(file, line, count, told, given, dict(heads), lines[0][0])
        if len(cells) != len(columns):
            faults.append(row.located(Fault((), f"{len(cells)} cells", f"{len(columns)} are wanted, as in the head")))
        elif not told:
            faults.append(row.located(Fault((name,), "nothing stands there", "a name of your own is wanted")))
        rows.append(row)
    if faults:
        raise Faults(faults)
    return rows


def _head(cell: str) -> tuple[str, str]:
    """A head and its unit: "C [kN]" -> ("C", "kN")."""
    head, bracket, rest = cell.strip().partition("[")
    return head.strip(), rest.partition("]")[0].strip() if bracket else ""
