"""Options that cannot be met: status 2, one line that names the option, nothing printed, nothing written."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.endtoend.models import CASES, CLAMP, FRAME, linkcalc

FIRST_CASE = (CLAMP + CASES).splitlines().index("[cases.normal]") + 1


@pytest.fixture(autouse=True)
def _in_a_folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    Path("clamp.toml").write_text(CLAMP + CASES, encoding="utf-8")
    Path("frame.toml").write_text(FRAME, encoding="utf-8")
    Path("folder").mkdir()


@pytest.mark.parametrize(
    ("line", "says"),
    [
        ("stroke clamp.toml --poses 1", "--poses: 1 poses; from 2 to 100000 are wanted"),
        ("stroke clamp.toml --poses 100001", "--poses: 100001 poses; from 2 to 100000 are wanted"),
        ("check clamp.toml --case hevy", f"clamp.toml:{FIRST_CASE}: cases: unknown case 'hevy'; did you mean 'heavy'?"),
        ("stroke frame.toml --case heavy", "frame.toml: cases: unknown case 'heavy'; there are none"),
        (
            "stroke clamp.toml --plot curves.bmp",
            "--plot: curves.bmp: a picture cannot be written as '.bmp'; end it in .svg, .png or .pdf",
        ),
        (
            "draw clamp.toml -o drawing",
            "--output: drawing: the file of a picture needs a suffix; end it in .svg, .png or .pdf",
        ),
        (
            "stroke frame.toml --json frame.json --plot frame.svg",
            "frame.toml: stroke: there is only one pose, so no curve over a stroke; give the model a [stroke]",
        ),
        ("stroke clamp.toml --json - --csv -", "--json and --csv: both cannot be printed; give one of them a file"),
        ("stroke clamp.toml --json a --csv ./a", "--csv: ./a is written by --json already; give it another file"),
        ("check clamp.toml --json clamp.toml", "--json: clamp.toml is the model itself; give it another file"),
        ("draw clamp.toml -o a.svg --at 140", "--at: 140 is outside the stroke; choose a pose between its ends"),
        ("draw clamp.toml -o a.svg --at 12mm", "--at: 12mm is a length; an angle is wanted (e.g. 12 deg)"),
        (
            "draw clamp.toml -o a.svg --at begin",
            "--at: unknown pose 'begin'; known: drawn, end, start, or a value of the stroke (\"30 deg\")",
        ),
        ("draw frame.toml -o a.svg --at end", "--at: the model has no stroke; it is drawn in its drawing pose"),
        ("draw clamp.toml -o a.svg --member hadnle", "--member: unknown member 'hadnle'; did you mean 'handle'?"),
        (
            "draw clamp.toml -o a.svg --member ground",
            "--member: the ground cannot be cut free; known: arm, handle, strut",
        ),
        ("draw clamp.toml -o a.svg --trace top", "--trace: unknown point 'top'; did you mean 'tip'?"),
        ("start klamp", "KIND: unknown kind 'klamp'; did you mean 'clamp'?"),
        ("start clamp", "--output: clamp.toml is there already; choose another name, or add --force"),
        ("start lever -o clamp.toml", "--output: clamp.toml is there already; choose another name, or add --force"),
        ("start lever -o nowhere/a.toml", "nowhere/a.toml: cannot be written: there is no folder nowhere"),
        ("stroke clamp.toml --json nowhere/a", "nowhere/a: cannot be written: there is no folder nowhere"),
        ("stroke clamp.toml --csv folder", "folder: cannot be written: it is a folder; the name of a file is wanted"),
        ("stroke clamp.toml --plot nowhere/a.svg", "nowhere/a.svg: cannot be written: there is no folder nowhere"),
        ("draw clamp.toml -o clamp.toml/a.png", "clamp.toml/a.png: cannot be written: there is no folder clamp.toml"),
    ],
)
def test_the_option_is_named(line: str, says: str) -> None:
    before = {p: p.read_bytes() for p in Path().rglob("*") if p.is_file()}
    said = linkcalc(*line.split())
    assert (said.status, said.out, said.err) == (2, "", f"{says}\n")
    assert {p: p.read_bytes() for p in Path().rglob("*") if p.is_file()} == before


@pytest.mark.parametrize(
    ("line", "names"),
    [
        ("stroke clamp.toml --poses many", "--poses"),
        ("stroke clamp.toml --pose 3", "--pose"),
        ("draw clamp.toml", "--output"),
        ("stroke", "FILE"),
        ("stork clamp.toml", "stork"),
    ],
)
def test_a_line_that_cannot_be_parsed(line: str, names: str) -> None:
    said = linkcalc(*line.split())
    assert (said.status, said.out) == (2, "")
    assert said.err.startswith("Usage: ")
    assert names in said.err.splitlines()[-1]
