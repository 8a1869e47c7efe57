"""linkcalc weigh as a stranger meets it: options, statuses, files, exact words of faults."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from tests.endtoend.models import ROOT, linkcalc
from tests.unit.design.weighing.models import BEAM

SCALE = ROOT / "examples" / "two_bar_scale.toml"


@pytest.fixture(autouse=True)
def _in_a_folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    Path("beam.toml").write_text(BEAM, encoding="utf-8")
    Path("bare.toml").write_text(BEAM[: BEAM.index("[poises")], encoding="utf-8")


def test_all_files_are_written_and_the_table_is_printed() -> None:
    said = linkcalc("weigh", SCALE, "--loads", "0..200 kg step 50", "--step", "0.1 kg", "--class", "OIML III",
                    "--interval", "0.1 kg", "--copies", "500", "--out-of-level", "2 mm/m", "--mark-error", "0.05 mm",
                    "--json", "a.json", "--csv", "a.csv", "--marks", "m.csv", "--bars", "b.svg",
                    "--plot", "p.svg")  # fmt: skip
    assert said.status == 0
    assert {p.name for p in Path().iterdir()} >= {"a.json", "a.csv", "m.csv", "b.svg", "p.svg"}
    assert "place of" in said.out and "Against OIML III" in said.out
    assert len(Path("m.csv").read_text(encoding="utf-8").splitlines()) == 1 + 10 + 201 + 1


def test_ranges_and_lists_of_loads() -> None:
    for text, wanted in (("0..10 kg step 2.5", [0, 2.5, 5, 7.5, 10]), ("5, 7.5, 20 kg", [5, 7.5, 20]), ("30", [30]),
                         ("500 g, 1 kg", [0.5, 1]), ("0..1 t step 100 kg", None)):  # fmt: skip
        said = linkcalc("weigh", SCALE, "--loads", text, "--json", "-")
        if wanted is None:
            assert said.status == 2 and "is over the capacity of 200 kg" in said.err
        else:
            assert json.loads(said.out)["load"]["values"] == pytest.approx(wanted)


def test_a_class_that_is_not_kept_ends_with_status_1() -> None:
    said = linkcalc("weigh", "beam.toml", "--class", "OIML III", "--interval", "5 g", "--loads", "4..20 kg")
    assert said.status == 1 and "FAIL" in said.out


def test_the_load_for_given_places() -> None:
    said = linkcalc("weigh", SCALE, "--place", "notched=100 mm", "--place", "fine=70")
    assert said.status == 0 and "With the places given it balances 21 kg." in said.out


@pytest.mark.parametrize(
    ("line", "says"),
    [
        ("weigh bare.toml", "bare.toml: poises: nothing is there that could balance a load; give it a poise: "
         "[poises.NAME] "
         "with along, mass; or a hanger: [counterpoises.NAME] with at, weights"),
        ("weigh beam.toml --loads 30", "beam.toml:15: poises.rider: 30 kg is over the capacity of 25.2 kg "
         "(rider at 600 mm); "
         "a bar that goes on to 720 mm, or a poise of about 2.41379 kg, would do"),
        ("weigh beam.toml --loads ,", "--loads: no load is asked for: the table would be empty; loads are written as "
         '"0..25 kg step 0.5 kg", or as "5, 10, 20 kg"'),
        ("weigh beam.toml --loads 5..2", "--loads: '5..2' is empty: it goes up from the first load by the step "
         "to the second; "
         'loads are written as "0..25 kg step 0.5 kg", or as "5, 10, 20 kg"'),
        ("weigh beam.toml --loads 5mm", "--loads: '5mm': 5mm is a length; loads are written as "
         '"0..25 kg step 0.5 kg", or as "5, 10, 20 kg"'),
        ("weigh beam.toml --step 0", "--step: nothing or less; more than nothing is wanted"),
        ("weigh beam.toml --class OIML", "--class: it goes with an interval; give one: --interval \"20 g\""),
        ("weigh beam.toml --interval 1", "--interval: it goes with a class; give one: --class \"OIML III\""),
        ("weigh beam.toml --interval 1 --class OIMLIII", "--class: unknown accuracy class 'OIMLIII'; did you mean "
         "'OIML III' or 'OIML IIII'?"),
        ("weigh beam.toml --in-use", "--in-use: no class is given; --class and --interval are wanted"),
        ("weigh beam.toml --copies -1", "--copies: -1 copies; up to 10000000 are wanted"),
        ("weigh beam.toml --place rider", "--place: 'rider' is no place; NAME=PLACE is wanted, e.g. \"main=120 mm\""),
        ("weigh beam.toml --place rider=9kg", "--place: 9kg is a mass; a length is wanted (e.g. 12 mm)"),
        ("weigh beam.toml --corner hok", "--corner: unknown point 'hok'; did you mean 'hook'?"),
        ("weigh beam.toml --csv - --json -", "--json and --csv: not all can be printed; give all but one a file"),
        ("weigh beam.toml --bars beam.toml", "--bars: beam.toml: a picture cannot be written as '.toml'; end it "
         "in .svg, "
         ".png or .pdf"),
        ("weigh beam.toml --loads 5 --plot a.svg", "--plot: a curve needs more than one load; ask for several: --loads "
         '"0..25 kg"'),
    ],
)  # fmt: skip
def test_what_cannot_be_met_is_told_in_one_line(line: str, says: str) -> None:
    said = linkcalc(*line.split(" "))
    assert said.err == f"{says}\n"
    assert (said.status, said.out) == (2, "")
    assert not Path("a.svg").exists()
