"""The report on a stroke says the right numbers with the right units; figures from the closed forms of by_hand."""

import math
import re
from dataclasses import replace

import numpy as np
import pytest

from linkcalc.design.answer import Event
from linkcalc.report.blocks import Table
from linkcalc.report.stroke_blocks import stroke_blocks
from linkcalc.report.text import as_text
from tests.unit.report.by_hand import LOADS, lever, toggle


def _table(blocks: list, title: str) -> Table:
    return next(b for b in blocks if isinstance(b, Table) and b.title.startswith(title))


def _column(table: Table, head: str) -> list:
    i = [c.head for c in table.columns].index(head)
    return [row[i] for row in table.rows]


def test_head_tells_title_stroke_and_cases():
    text = as_text(stroke_blocks(toggle()))
    assert text.startswith("Toggle for a riveting ram\n")
    assert "Stroke: turn of crank from 30 to 2 deg, 57 poses. Load cases: light, heavy." in text


@pytest.mark.parametrize(("case", "load"), list(enumerate(LOADS)))
def test_each_case_has_its_table_over_the_stroke(case, load):
    table = _table(stroke_blocks(toggle()), f"Over the stroke, case {('light', 'heavy')[case]}")
    assert 13 <= len(table.rows) <= 25
    turns = _column(table, "turn of crank")
    assert turns[0] == pytest.approx(30)
    assert turns[-1] == pytest.approx(2)
    for turn, effort, ratio, largest in zip(
        turns,
        _column(table, "effort"),
        _column(table, "force ratio"),
        _column(table, "largest joint force"),
        strict=True,
    ):
        a = math.radians(turn)
        assert effort == pytest.approx(2 * load * math.tan(a))
        assert ratio == pytest.approx(1 / (2 * math.tan(a)))
        assert largest == pytest.approx(load / math.cos(a))
    assert set(_column(table, "at")) == {"A"}
    assert [c.unit for c in table.columns] == ["deg", "N", "N", "", "", "N", ""]


def test_all_joints_get_a_column_each_when_asked():
    table = _table(stroke_blocks(toggle(), all_joints=True), "Over the stroke, case light")
    guide = _column(table, "guide")
    assert guide[0] == pytest.approx(1000 * math.tan(math.radians(30)))


def test_worst_joint_forces_tell_case_pose_and_both_directions():
    table = _table(stroke_blocks(toggle()), "Joint forces")
    worst = {row[0]: row for row in table.rows if row[0]}
    assert worst["C"][1] == "pin"
    assert worst["C"][2] == pytest.approx(1500 / math.cos(math.radians(30)))
    assert worst["C"][3] == "heavy"
    assert worst["C"][4] == pytest.approx(30)
    on = {(row[-3]): row[-2:] for row in table.rows[4:6]}
    # the link is pushed back along its own line, up and to the left; the ram the other way
    assert on["link"] == pytest.approx((150, 180))
    assert on["ram"] == pytest.approx((-30, -30))


def test_an_exact_event_between_the_poses_stands_in_for_the_sampled_worst():
    answer = toggle()
    event = Event("largest", "force at guide", "heavy", math.radians(20.1), 2000.0, "force")
    table = _table(stroke_blocks(replace(answer, events=(event,))), "Joint forces")
    row = next(row for row in table.rows if row[0] == "guide")
    assert row[2] == pytest.approx(2000)
    assert row[4] == pytest.approx(20.1)


def test_members_of_a_joint_that_feel_less_are_told_what_they_feel():
    answer = toggle()
    force = answer.force.copy()
    force[answer.bearing("B", "link")] *= 0.5
    table = _table(stroke_blocks(replace(answer, force=force)), "Joint forces")
    feels = [c.head for c in table.columns].index("feels")
    rows = {row[feels - 1]: row[feels] for row in table.rows[2:4]}
    assert rows["link"] == pytest.approx(rows["crank"] / 2)


def test_two_force_members_show_compression_as_a_plus_and_a_gap_for_tension():
    table = _table(stroke_blocks(toggle()), "Two-force members")
    crank = table.rows[0]
    assert crank[0] == "crank"
    assert crank[1] is None
    assert crank[4] == pytest.approx(1500 / math.cos(math.radians(30)))


def test_verdicts_show_worst_limit_margin_and_who_fails():
    blocks = stroke_blocks(toggle())
    table = _table(blocks, "Requirements")
    worst = 2 * 1500 * math.tan(math.radians(30))
    assert table.rows[0][:6] == ("hand", "effort <= 2 kN", f"{worst:.1f} N", "2000 N", "+13 %", "holds")
    assert table.rows[1][4:7] == ("-43 %", "FAILS", "light")
    assert "1 of 2 requirements FAIL." in as_text(blocks)


def test_warnings_checks_and_cautions_are_in_every_report():
    text = " ".join(as_text(stroke_blocks(toggle())).split())
    assert "Warning: stroke: it ends 2 deg before the dead point" in text
    assert "joints close within 2e-16" in text
    assert "agrees with virtual work within 4e-15" in text
    for word in ("Static calculation only", "people under loads", "local codes", "legal weighing", "pressure"):
        assert word in text


def test_failed_poses_are_gaps_with_their_reason():
    text = as_text(stroke_blocks(toggle(lost=3)))
    assert "no answer at 6 of 114 poses" in text
    assert "beyond the limit of motion" in " ".join(text.split())
    assert re.search(r"^\s+-\s+-\s+-\s+-\s+-\s+-\s+-$", text, re.M)


def test_what_happens_alike_in_several_cases_is_told_once():
    answer = toggle()
    two = [Event("largest", "ideal ratio", c, math.radians(2), 14.3, "number") for c in answer.cases]
    table = _table(stroke_blocks(replace(answer, events=tuple(two))), "What happens")
    assert [row[2] for row in table.rows] == ["all"]


def test_no_bound_is_said_in_words():
    answer = toggle()
    event = Event("largest", "force ratio", "light", 0.0, math.inf, "number")
    assert "no bound" in as_text(stroke_blocks(replace(answer, events=(event,))))


def test_a_frame_shows_components_on_each_member_in_its_own_units():
    blocks = stroke_blocks(lever())
    table = _table(blocks, "Force of each joint")
    assert table.rows[0][:3] == ("A", "pin", "lever")
    # 50 lbf of load, 5 lbf of own weight, 50/3 lbf of effort, all straight down on the lever
    assert table.rows[0][4] == pytest.approx(50 + 5 + 50 / 3)
    assert table.rows[1][6] == pytest.approx(-90)
    assert {c.unit for c in table.columns[3:6]} == {"lbf"}
    text = as_text(blocks)
    assert "Solved in the drawing pose only." in text
    assert "Over the stroke" not in text


def test_moments_are_listed_for_guides_that_take_one_and_not_for_rounding():
    answer = toggle()
    moment = answer.moment.copy()
    moment[answer.bearing("guide", "ram")] = 12.5
    moment[answer.bearing("A", "crank")] = 1e-12
    table = _table(stroke_blocks(replace(answer, moment=moment)), "Moments")
    assert [row[0] for row in table.rows] == ["guide"]
    assert table.rows[0][1] == pytest.approx(12.5)
    assert table.columns[1].unit == "N*m"


def test_the_report_fits_a_terminal_of_a_hundred_columns():
    for answer in (toggle(), lever(), lever((-30.0, 0.0, 30.0))):
        text = as_text(stroke_blocks(answer, all_joints=True))
        assert max(len(line) for line in text.splitlines()) <= 100


def test_a_column_for_tare_effort_only_where_there_is_some():
    answer = toggle()
    assert "tare effort" not in as_text(stroke_blocks(answer))
    assert "tare effort" in as_text(stroke_blocks(replace(answer, tare_effort=np.full_like(answer.effort, 5.0))))
