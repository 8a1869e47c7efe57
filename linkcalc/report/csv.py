"""A table -> CSV: one head line with units, then a row a line, every number with all its digits."""

from __future__ import annotations

import csv
import io
import math

from linkcalc.report.blocks import Cell, Table


def as_csv(table: Table) -> str:
    """Comma-separated text of a table; gaps are empty fields, so that a column stays a column of numbers."""
    text = io.StringIO()
    writer = csv.writer(text, lineterminator="\n")
    writer.writerow([column.title for column in table.columns])
    writer.writerows([[_field(cell) for cell in row] for row in table.rows])
    return text.getvalue()


def _field(cell: Cell) -> str:
    if cell is None or (isinstance(cell, float) and math.isnan(cell)):
        return ""
    return repr(float(cell)) if isinstance(cell, float) else str(cell)
