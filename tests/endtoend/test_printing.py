"""What is printed and where: answers on the standard output, news of written files beside it."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from linkcalc.cli.start import kinds
from tests.endtoend.models import CASES, CLAMP, FRAME, REQUIREMENTS, linkcalc
from tests.endtoend.shell import shell


@pytest.fixture(autouse=True)
def _in_a_folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    Path("clamp.toml").write_text(CLAMP + CASES + REQUIREMENTS, encoding="utf-8")
    Path("frame.toml").write_text(FRAME, encoding="utf-8")


def test_a_stroke_tells_what_a_designer_looks_for() -> None:
    """Of the hand calculation in examples/hold_down.toml: 105.7 N of effort and 844.9 N at D at 130 deg."""
    said = linkcalc("stroke", "clamp.toml")
    assert (said.status, said.err) == (1, "")  # 1.5 times the load is too much for pin D
    for text in ("105.7", "844.9", "force ratio", "Load cases: normal, heavy", "FAILS", "Caution:", "virtual work"):
        assert text in said.out, text


def test_one_case_only() -> None:
    said = linkcalc("stroke", "clamp.toml", "--case", "normal")
    assert said.status == 0
    assert "105.7" in said.out
    assert "heavy" not in said.out
    assert linkcalc("check", "clamp.toml", "--case", "normal").status == 0
    assert linkcalc("check", "clamp.toml", "--case", "heavy").status == 1


def test_the_number_of_poses_can_be_set() -> None:
    tree = json.loads(linkcalc("stroke", "clamp.toml", "--poses", "3", "--json", "-").out)
    assert tree["quantities"]["drive"]["values"][0][0] == pytest.approx([130, 120, 110], rel=1e-12)


def test_a_column_for_every_joint() -> None:
    assert "largest" in linkcalc("stroke", "clamp.toml").out.split("What happens")[0]
    said = linkcalc("stroke", "clamp.toml", "--joints").out.split("What happens")[0]
    head = next(line for line in said.splitlines() if "[deg]" in line)
    assert head.count("[N]") >= 4 + len("ABCD") - 1


def test_a_frame_has_no_stroke() -> None:
    """A tie from 300 above to 400 out, 3-4-5: it carries 900/0.6 = 1500 N, the bar 1200 N of thrust."""
    said = linkcalc("stroke", "frame.toml")
    assert (said.status, said.err) == (0, "")
    assert "1500" in said.out
    assert "1200" in said.out
    checked = linkcalc("check", "frame.toml")
    assert (checked.status, checked.err) == (0, "")
    assert "the frame stands" in checked.out


@pytest.mark.parametrize("command", ["check", "stroke"])
def test_json_to_the_standard_output_comes_alone(command: str) -> None:
    said = linkcalc(command, "clamp.toml", "--json", "-", "--case", "normal")
    assert (said.status, said.err) == (0, "")
    assert json.loads(said.out)["answer"] == command


def test_a_drawing_with_json_to_the_standard_output() -> None:
    said = linkcalc("draw", "clamp.toml", "-o", "clamp.svg", "--json", "-", "--at", "125")
    assert (said.status, said.err) == (0, "wrote clamp.svg\n")
    drive = json.loads(said.out)["quantities"]["drive"]["values"][0][0]
    assert min(abs(d - 125) for d in drive) < 1e-12


def test_csv_to_the_standard_output_with_other_files_beside_it() -> None:
    said = linkcalc("stroke", "clamp.toml", "--csv", "-", "--json", "a.json", "--plot", "a.svg", "--case", "normal")
    assert (said.status, said.err) == (0, "wrote a.json\nwrote a.svg\n")
    assert said.out.startswith("case,turn of handle [deg],effort [N]")
    assert len(said.out.splitlines()) == 1 + 21


def test_start_lists_its_kinds_and_writes_one() -> None:
    said = linkcalc("start")
    assert (said.status, said.err) == (0, "")
    assert [line.split()[0] for line in said.out.splitlines()] == kinds()
    assert linkcalc("start", "lever").out == "wrote lever.toml; next: linkcalc check lever.toml\n"
    assert linkcalc("start", "frame", "-o", "lever.toml", "--force").status == 0
    assert "[stroke]" not in Path("lever.toml").read_text(encoding="utf-8")


def test_names_with_blanks_and_letters_of_any_script() -> None:
    name = "Hebel für Größe 3.toml"
    Path(name).write_text(CLAMP.replace('"Clamp"', '"Hebel µ"'), encoding="utf-8")
    said = linkcalc("stroke", name, "--json", "größe 3.json", "--plot", "größe 3.svg")
    assert (said.status, said.err) == (0, "wrote größe 3.json\nwrote größe 3.svg\n")
    assert json.loads(Path("größe 3.json").read_text(encoding="utf-8"))["title"] == "Hebel µ"


def test_a_model_as_another_program_saves_it() -> None:
    """With a mark of byte order at its head and carriage returns at the ends of its lines."""
    Path("other.toml").write_bytes(b"\xef\xbb\xbf" + CLAMP.replace("\n", "\r\n").encode())
    assert linkcalc("check", "other.toml").status == 0


def test_in_a_process_of_its_own(tmp_path: Path) -> None:
    done = shell("linkcalc stroke clamp.toml --json - --case heavy", tmp_path)
    assert (done.returncode, done.stderr) == (1, "")
    assert json.loads(done.stdout)["axes"]["case"] == ["heavy"]
    done = shell("linkcalc stroke nothing.toml", tmp_path)
    assert (done.returncode, done.stdout, done.stderr) == (2, "", "nothing.toml: no such file\n")
