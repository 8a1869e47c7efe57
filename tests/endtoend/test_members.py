"""linkcalc members as a stranger meets it."""

from __future__ import annotations

import csv
import json
from pathlib import Path

import pytest

from tests.endtoend.models import CASES, CLAMP, FRAME, linkcalc


@pytest.fixture(autouse=True)
def _in_a_folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    Path("clamp.toml").write_text(CLAMP + CASES, encoding="utf-8")
    Path("frame.toml").write_text(FRAME, encoding="utf-8")


@pytest.mark.parametrize(
    ("line", "says"),
    [
        ("members clamp.toml --at start", "--at: of which member?; add --member NAME"),
        ("members clamp.toml -o arm.svg", "--output: of which member?; add --member NAME"),
        ("members clamp.toml --member ground", "--member: the ground has no inner forces here"),
        ("members clamp.toml --member nobody", "--member: unknown member 'nobody'"),
        ("members clamp.toml --working nobody", "--working: unknown member 'nobody'"),
        ("members clamp.toml --poses 1", "--poses: 1 poses; from 2 to 100000 are wanted"),
        ("members clamp.toml --json - --csv -", "--json and --csv: both cannot be printed"),
    ],
)
def test_options_that_cannot_be_met(line: str, says: str) -> None:
    done = linkcalc(*line.split())
    assert done.status == 2
    assert says in done.err and "Traceback" not in done.err
    assert sorted(p.name for p in Path().iterdir()) == ["clamp.toml", "frame.toml"]


def test_what_is_written_is_what_is_printed() -> None:
    done = linkcalc("members", "frame.toml", "--json", "all.json", "--csv", "all.csv")
    assert done.status == 0, done.err
    tree = json.loads(Path("all.json").read_text(encoding="utf-8"))
    assert tree["answer"] == "members"
    rows = list(csv.reader(Path("all.csv").read_text(encoding="utf-8").splitlines()))
    assert len(rows) == 1 + len(tree["stroke"]["axes"]["case"])
    for one in tree["members"]:
        assert one["member"] in done.out
        for name in one["over the stroke"]:
            assert any(head.startswith(f"{name} in {one['member']}") for head in rows[0])


def test_the_diagrams_of_one_member(tmp_path: Path) -> None:
    tree = json.loads(linkcalc("members", "clamp.toml", "--json", "-").out)
    name = next(m["member"] for m in tree["members"] if "bending moment" in m["worst"])
    done = linkcalc("members", "clamp.toml", "--member", name, "--at", "start", "-o", "one.svg", "--csv", "one.csv")
    assert done.status == 0, done.err
    assert "bending moment" in done.out
    text = (tmp_path / "one.svg").read_text(encoding="utf-8")
    for words in ("Axial force N", "Shear force V", "Bending moment M", name):
        assert words in text
    head, *rows = csv.reader((tmp_path / "one.csv").read_text(encoding="utf-8").splitlines())
    assert head[-1].startswith("M [") and len(rows) >= 2


def test_the_sheet_asks_for_section_and_material() -> None:
    tree = json.loads(linkcalc("members", "clamp.toml", "--json", "-").out)
    done = linkcalc("members", "clamp.toml", "--working", tree["members"][0]["member"])
    assert done.status == 2
    assert "'section' is missing" in done.err and "clamp.toml:" in done.err
