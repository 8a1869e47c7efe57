"""Every published case, through the public interface; and the page that shows them."""

from __future__ import annotations

import re

import pytest

from .expected import HEAD_KEYS, HERE, head, printed_values
from .table import COMPUTED, PAGE, render, rows

CASES = list(printed_values())


@pytest.mark.parametrize("case", CASES)
def test_comes_out_as_printed(case: str) -> None:
    wrong = [" | ".join(row.cells) for row in rows(case) if not row.agrees]
    assert not wrong


def test_every_model_has_printed_values() -> None:
    assert sorted(CASES) == sorted(file.stem for file in (HERE / "cases").glob("*.toml"))


@pytest.mark.parametrize("case", CASES)
def test_head_names_the_source(case: str) -> None:
    top = head(case)
    assert [key for key in HEAD_KEYS if not top.get(key)] == []


def test_page_is_up_to_date() -> None:
    stored = [_cells(line) for line in PAGE.read_text(encoding="utf-8").splitlines()]
    fresh = [_cells(line) for line in render().splitlines()]
    assert [_given(cells) for cells in stored] == [_given(cells) for cells in fresh]
    # the last shown digit may differ between machines
    for before, now in zip(stored, fresh, strict=True):
        for old, new in zip(_worked_out(before), _worked_out(now), strict=True):
            assert float(old) == pytest.approx(float(new), abs=2.1 * 10.0 ** -len(new.partition(".")[2])), now


def _cells(line: str) -> list[str]:
    return re.split(r"(?<!\\)\|", line.strip("| "))


def _is_value(cells: list[str]) -> bool:
    return len(cells) == 4 + len(COMPUTED) and bool(re.fullmatch(r"\s*-?\d+\.\d+\s*", cells[-1]))


def _given(cells: list[str]) -> list[str]:
    return cells[: -len(COMPUTED)] if _is_value(cells) else cells


def _worked_out(cells: list[str]) -> list[str]:
    return [cell.strip() for cell in cells[-len(COMPUTED) :]] if _is_value(cells) else []
