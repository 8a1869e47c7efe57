"""JSON and CSV are complete against the answer, in the file's units, and valid for any reader."""

import csv
import io
import json
import math

import numpy as np
import pytest

from linkcalc.design.answer import SCHEMA, quantities
from linkcalc.mechanics.state import Status
from linkcalc.report.csv import as_csv
from linkcalc.report.json import as_json
from linkcalc.report.stroke_table import stroke_table
from tests.unit.report.by_hand import LBF, lever, toggle


def _refuse(word: str) -> None:
    raise AssertionError(f"{word} is no JSON")


def _tree(answer):
    return json.loads(as_json(answer), parse_constant=_refuse)


def test_every_bearing_is_there_with_every_array_in_full_precision():
    answer = toggle()
    tree = _tree(answer)
    assert tree["schema"] == SCHEMA
    assert [(j["joint"], j["kind"], j["member"]) for j in tree["joints"]] == [
        (b.joint, b.word, b.member) for b in answer.bearings
    ]
    for i, joint in enumerate(tree["joints"]):
        assert joint["x"]["unit"] == "N"
        assert joint["x"]["axes"] == ["case", "variant", "pose"]
        np.testing.assert_array_equal(joint["x"]["values"], answer.force[i, 0])
        np.testing.assert_array_equal(joint["y"]["values"], answer.force[i, 1])
        np.testing.assert_allclose(joint["resultant"]["values"], np.hypot(*answer.force[i]), rtol=1e-15)
        assert np.shape(joint["moment"]["values"]) == answer.moment[i].shape
        assert joint["direction"]["unit"] == "deg"


def test_directions_are_from_the_x_axis_and_from_the_members_own_axis():
    joints = {(j["joint"], j["member"]): j for j in _tree(toggle())["joints"]}
    link = joints["C", "link"]
    angles = np.linspace(30, 2, 57)
    np.testing.assert_allclose(link["direction"]["values"][0][0], 180 - angles, atol=1e-9)
    np.testing.assert_allclose(link["direction from own axis"]["values"][1][0], 180, atol=1e-9)


def test_every_array_of_the_answer_has_its_place():
    answer = toggle()
    tree = _tree(answer)
    told = {name.replace(" ", "_") for name in tree["quantities"]}
    told |= {"force", "moment"} if tree["joints"] else set()
    told |= {"axial"} if "axial" in tree["two-force members"][0] else set()
    assert tree["ropes"] == []  # it has none, so no tensions either
    told |= {"tension"}
    assert not answer.rubs  # nothing rubs, so what friction costs is not told
    assert not answer.loose  # nor does anything settle by itself
    told |= {name for name, meta in quantities(answer).items() if meta["when"] in ("rubs", "loose")}
    told |= set(tree["members"][0]) - {"member"}
    assert told == set(quantities(answer))
    assert [m["member"] for m in tree["members"]] == ["ground", "crank", "link", "ram"]
    np.testing.assert_allclose(tree["members"][3]["x"]["values"], answer.x[3] * 1000)
    assert tree["members"][3]["x"]["unit"] == "mm"


def test_units_are_those_of_the_file():
    tree = _tree(lever())
    assert tree["quantities"]["effort"]["unit"] == "lbf"
    assert tree["quantities"]["effort"]["values"][0][0][0] == pytest.approx(50 / 3)
    assert tree["joints"][0]["y"]["values"][0][0][0] == pytest.approx(50 + 5 + 50 / 3)
    assert tree["joints"][0]["moment"]["unit"] == "in*lbf"
    assert tree["members"][1]["x"]["values"][0][0][0] == pytest.approx(-4)


def test_a_frame_has_no_drive_and_says_so_with_null():
    tree = _tree(lever())
    assert tree["drive"] == ""
    assert tree["quantities"]["drive"]["values"] == [[[None]]]


def test_failed_poses_are_null_with_a_status_that_is_explained():
    answer = toggle(lost=2)
    tree = _tree(answer)
    assert tree["quantities"]["effort"]["values"][0][0][-3:][1:] == [None, None]
    assert tree["status"]["values"][1][0][-1] == int(Status.OUT_OF_REACH)
    assert tree["status"]["meaning"][str(int(Status.OUT_OF_REACH))] == Status.OUT_OF_REACH.text
    assert len(tree["status"]["meaning"]) == len(Status)


def test_events_verdicts_warnings_and_checks_are_all_there():
    answer = toggle()
    tree = _tree(answer)
    assert len(tree["events"]) == len(answer.events)
    assert tree["events"][0] == {
        "kind": "largest",
        "quantity": "force at A",
        "case": "heavy",
        "drive": {"unit": "deg", "value": pytest.approx(30)},
        "value": {"unit": "N", "value": pytest.approx(1500 / math.cos(math.radians(30)))},
    }
    assert tree["events"][-1]["value"]["value"] is None
    assert tree["requirements"][1]["holds"] is False
    assert tree["requirements"][0]["limit"] == {"unit": "N", "value": 2000.0}
    assert tree["holds"] is False
    assert tree["warnings"] == [{"item": "stroke", "text": "it ends 2 deg before the dead point"}]
    assert tree["checks"]["virtual work"] == answer.checks.virtual_work


def test_the_same_answer_gives_the_same_text():
    assert as_json(toggle()) == as_json(toggle())


def test_csv_has_a_row_a_case_and_pose_and_units_in_its_heads():
    answer = toggle()
    rows = list(csv.reader(io.StringIO(as_csv(stroke_table(answer)))))
    head, body = rows[0], rows[1:]
    assert len(body) == 2 * 57
    assert {len(row) for row in body} == {len(head)}
    for wanted in ("case", "turn of crank [deg]", "effort [N]", "load [N]", "force ratio", "C on ram x [N]", "status"):
        assert wanted in head
    for b in answer.bearings:
        assert f"{b.joint} on {b.member} resultant [N]" in head
    assert len(set(head)) == len(head)
    at = head.index("C on ram y [N]")
    assert float(body[57][at]) == answer.force_on("C", "ram")[1, 1, 0, 0]
    assert [row[0] for row in body] == ["light"] * 57 + ["heavy"] * 57


def test_csv_leaves_gaps_empty_and_gives_the_reason():
    rows = list(csv.DictReader(io.StringIO(as_csv(stroke_table(toggle(lost=1))))))
    assert rows[56]["effort [N]"] == ""
    assert rows[56]["status"] == Status.OUT_OF_REACH.text
    assert rows[55]["status"] == Status.FINE.text


def test_csv_in_pounds():
    rows = list(csv.DictReader(io.StringIO(as_csv(stroke_table(lever())))))
    answer = lever()
    assert float(rows[0]["effort [lbf]"]) == pytest.approx(answer.effort[0, 0, 0] / LBF)
