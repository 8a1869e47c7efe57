"""The JSON of every example is what docs/json.md says, and agrees with CSV and with what is printed."""

from __future__ import annotations

import csv
import io
import json
import tomllib
from pathlib import Path
from typing import Any

import pytest

from tests.endtoend.models import CASES, CLAMP, EXAMPLES, REQUIREMENTS, linkcalc
from tests.endtoend.schema import QUANTITIES, Schema

DEFAULTS = {"length": "mm", "angle": "deg", "force": "N", "moment": "N*m", "pressure": "bar"}
LOAD_KINDS = {"torque_on": "moment"}


def _kinds(model: dict[str, Any]) -> dict[str, str]:
    """Kinds of drive, effort and load, read off the file as docs/model_file.md says."""
    kinds = {k: LOAD_KINDS.get(next(iter(model[k])), "force") for k in ("effort", "load") if k in model}
    if "stroke" in model:
        kinds["drive"] = "angle" if "turn" in model["stroke"] else "length"
    return kinds


@pytest.mark.parametrize("path", [pytest.param(p, id=p.stem) for p in EXAMPLES])
def test_it_is_as_documented(path: Path) -> None:
    said = linkcalc("stroke", path, "--json", "-", "--poses", "7")
    model = tomllib.loads(path.read_text(encoding="utf-8"))
    assert (said.status, said.err) == (0, "")
    tree = json.loads(said.out, parse_constant=lambda name: pytest.fail(f"{name} is no JSON"))
    Schema(tree, {**DEFAULTS, **model.get("units", {})}).check(_kinds(model))
    assert tree["axes"]["pose"] == (7 if "stroke" in model else 1)
    assert set(tree["axes"]["member"]) == set(model["members"])
    for key in ("title", "note"):
        assert tree[key] == model[key]


@pytest.fixture
def clamp(tmp_path: Path) -> Path:
    path = tmp_path / "clamp.toml"
    path.write_text(CLAMP + CASES + REQUIREMENTS, encoding="utf-8")
    return path


def test_the_page_names_every_key(clamp: Path) -> None:
    page = (Path(__file__).parents[2] / "docs" / "json.md").read_text(encoding="utf-8")
    tree = json.loads(linkcalc("stroke", clamp, "--json", "-").out)
    keys = {*tree, *tree["axes"], *tree["quantities"], *tree["joints"][0], *tree["events"][0], *tree["checks"]}
    keys |= {*tree["requirements"][0], *tree["two-force members"][0], *tree["members"][0], *tree["status"]}
    assert {key for key in keys if f"`{key}`" not in page} == set()


def test_csv_holds_every_number_of_the_json(clamp: Path) -> None:
    tree = json.loads(linkcalc("stroke", clamp, "--json", "-").out)
    said = linkcalc("stroke", clamp, "--csv", "-")
    assert said.err == ""
    rows = list(csv.DictReader(io.StringIO(said.out)))
    cases, poses = tree["axes"]["case"], tree["axes"]["pose"]
    assert [r["case"] for r in rows] == [c for c in cases for _ in range(poses)]

    def column(head: str) -> list[float | None]:
        return [float(r[head]) if r[head] else None for r in rows]

    def flat(array: dict[str, Any]) -> list[float | None]:
        values: list[float | None] = [v for case in array["values"] for variant in case for v in variant]
        return values * (len(rows) // len(values))

    heads = {"case", "status"}
    for name in QUANTITIES:
        array = tree["quantities"][name]
        head = {"drive": tree["drive"]}.get(name, name) + (f" [{array['unit']}]" if array["unit"] else "")
        assert column(head) == flat(array)
        heads.add(head)
    for side in tree["joints"]:
        for key in ("x", "y", "resultant", "direction", "direction from own axis"):
            head = f"{side['joint']} on {side['member']} {key} [{side[key]['unit']}]"
            assert column(head) == flat(side[key])
            heads.add(head)
    for two in tree["two-force members"]:
        head = f"axial in {two['member']} [{two['axial']['unit']}]"
        assert column(head) == flat(two["axial"])
        heads.add(head)
    assert set(rows[0]) == heads


def test_a_failed_requirement_is_in_the_json_and_in_the_status(tmp_path: Path) -> None:
    path = tmp_path / "weak.toml"
    path.write_text(CLAMP + REQUIREMENTS.replace("200 N", "20 N"), encoding="utf-8")
    for command in ("check", "stroke"):
        said = linkcalc(command, path, "--json", "-")
        tree = json.loads(said.out)
        assert (said.status, tree["holds"]) == (1, False)
        assert [r["holds"] for r in tree["requirements"]] == [False, True]


def test_check_tells_freedoms_and_range(clamp: Path) -> None:
    tree = json.loads(linkcalc("check", clamp, "--json", "-").out)
    assert (tree["schema"], tree["answer"], tree["freedoms"], tree["asked"]) == (1, "check", 1, "effort")
    assert tree["members"] == ["handle", "strut", "arm"]
    assert tree["joints"] == {"pin": 4}
    motion = tree["motion"]
    assert motion["lower"] < motion["stop"] < motion["start"] < motion["upper"]
    assert (motion["unit"], motion["coordinate"]) == ("deg", "turn of handle")


def test_a_ratio_without_bound_is_null_and_the_event_says_so(tmp_path: Path) -> None:
    """With the handle at 100 deg crank and strut stand in line: the load is held without any effort."""
    path = tmp_path / "over_centre.toml"
    text = CLAMP.replace("to = 110", "to = 98").replace("poses = 21", "poses = 17")
    path.write_text(text, encoding="utf-8")
    tree = json.loads(linkcalc("stroke", path, "--json", "-").out)
    ratio = tree["quantities"]["force ratio"]["values"][0][0]
    drive = tree["quantities"]["drive"]["values"][0][0]
    assert [round(d, 9) for d, r in zip(drive, ratio, strict=True) if r is None] == [100]
    largest = next(e for e in tree["events"] if (e["kind"], e["quantity"]) == ("largest", "force ratio"))
    assert largest["value"] == {"unit": "", "value": None, "unbounded": True}
    dead = next(e for e in tree["events"] if e["kind"] == "dead point")
    assert (dead["quantity"], round(dead["drive"]["value"], 6)) == ("load", 100)
    smallest = next(e for e in tree["events"] if (e["kind"], e["quantity"]) == ("smallest", "force ratio"))
    assert smallest["value"]["value"] == pytest.approx(min(abs(r) for r in ratio if r is not None), rel=1e-12)
