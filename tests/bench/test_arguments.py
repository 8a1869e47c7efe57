"""The command line of the benchmark, as it stands in the documents for contributors."""

from __future__ import annotations

import pytest

from tests.bench.__main__ import PARTS, asked


def test_every_part_runs_where_none_is_named() -> None:
    assert asked([]) == (list(PARTS), False)


def test_parts_run_in_the_order_asked_for() -> None:
    assert asked(["stroke", "copies", "--quick"]) == (["stroke", "copies"], True)


def test_a_part_that_is_not_there_is_refused() -> None:
    with pytest.raises(SystemExit) as told:
        asked(["strokes"])
    assert told.value.code == 2
