"""Every published pin, lug, bush, bearing, column and section; the page shows them beside the published mechanisms."""

from __future__ import annotations

import pytest

from .elements import ELEMENTS, printed_elements
from .table import element_rows

CASES = list(printed_elements())


@pytest.mark.parametrize("case", CASES)
def test_comes_out_as_printed(case: str) -> None:
    found = element_rows(case)
    assert [" | ".join(row.cells) for row in found if not row.agrees] == []
    assert {row.printed.ask for row in found} == ELEMENTS[case]().keys()


def test_every_case_is_printed_and_asked() -> None:
    assert sorted(CASES) == sorted(ELEMENTS)


@pytest.mark.parametrize("case", CASES)
def test_every_case_names_its_source(case: str) -> None:
    body = printed_elements()[case]
    assert all(body.get(key) for key in ("source", "url", "inputs", "printed"))
