"""linkcalc pins as a stranger meets it: tables, JSON, CSV, pictures, options, statuses, exact words of faults."""

from __future__ import annotations

import csv
import io
import json
import math
import tomllib
import xml.etree.ElementTree as ET
from pathlib import Path

import pytest

from tests.endtoend.models import CASES, CLAMP, EXAMPLES, FRAME, REQUIREMENTS, ROOT, linkcalc
from tests.endtoend.pins_schema import PinsSchema

UNITS = {"length": "mm", "angle": "deg", "force": "N", "moment": "N*m", "stress": "MPa", "": ""}
HEADS = {"svg": b"<?xml", "png": b"\x89PNG\r\n\x1a\n", "pdf": b"%PDF-"}
STACKED = """
[pins.B]
material = "S355"
factor = 2.5
stack = [["handle", 6], ["strut", 10, 0.5], ["handle", 6, 0.5]]

[pins.C]
diameter = 10
stack = [["arm", 5], ["strut", 10, 0.5], ["arm", 5, 0.5]]
bush = "sintered bronze"

[pins.D]
diameter = 12
bearing = "ball"
life = 100000
"""


@pytest.fixture(autouse=True)
def _in_a_folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    Path("clamp.toml").write_text(CLAMP + CASES, encoding="utf-8")
    Path("sized.toml").write_text(CLAMP + CASES + STACKED + REQUIREMENTS, encoding="utf-8")
    Path("frame.toml").write_text(FRAME, encoding="utf-8")


@pytest.mark.parametrize("path", [pytest.param(p, id=p.stem) for p in EXAMPLES])
def test_the_json_is_as_documented(path: Path) -> None:
    said = linkcalc("pins", path, "--json", "-")
    model = tomllib.loads(path.read_text(encoding="utf-8"))
    assert (said.status, said.err) == (0, "")
    tree = json.loads(said.out, parse_constant=lambda name: pytest.fail(f"{name} is no JSON"))
    drive = "" if "stroke" not in model else "angle" if "turn" in model["stroke"] else "length"
    PinsSchema(tree, {**UNITS, **model.get("units", {})}, drive).check()


def test_json_csv_and_print_agree() -> None:
    said = linkcalc("pins", "sized.toml", "--json", "a.json", "--csv", "a.csv", "--rate", "20/min")
    assert (said.status, said.err) == (1, "wrote a.json\nwrote a.csv\n")
    tree = json.loads(Path("a.json").read_text(encoding="utf-8"))
    rows = list(csv.DictReader(io.StringIO(Path("a.csv").read_text(encoding="utf-8"))))
    sides = [(j, m) for j in tree["joints"] for m in j["members"]]
    assert [(r["joint"], r["member"]) for r in rows] == [(j["joint"], m["member"]) for j, m in sides]
    for row, (joint, side) in zip(rows, sides, strict=True):
        assert float(row["largest force [N]"]) == joint["largest"]["value"]["value"]
        assert float(row["most on this member [N]"]) == side["largest"]["value"]["value"]
        (felt,) = [f for f in joint["largest"]["felt"] if f["member"] == side["member"]]
        assert float(row["direction [deg]"]) == felt["direction"]["value"]
    top = next(line for line in said.out.splitlines() if line.startswith("D "))
    assert top.split()[2] == f"{float(next(r for r in rows if r['joint'] == 'D')['largest force [N]']):.0f}"


def test_the_strut_is_pressed_along_its_axis() -> None:
    """See examples/hold_down.toml for the hand calculation: the strut carries 791.6 N at 130 deg for 500 N."""
    said = linkcalc("pins", "clamp.toml", "--case", "normal", "--json", "-")
    (b,) = [j for j in json.loads(said.out)["joints"] if j["joint"] == "B"]
    assert b["largest"]["value"]["value"] == pytest.approx(791.6, abs=0.05)
    strut = next(f for f in b["largest"]["felt"] if f["member"] == "strut")
    assert strut["direction from own axis"]["value"] == pytest.approx(0.0, abs=1e-9)


def test_speeds_say_what_they_rest_on() -> None:
    said = linkcalc("pins", "clamp.toml", "--rate", "20/min", "--diameter", "12")
    flat = " ".join(said.out.split())
    assert "Speeds: one stroke in 1.5 s, 20 a minute there and back; the turn of handle goes at even speed" in flat
    tree = json.loads(linkcalc("pins", "clamp.toml", "--time", "1.5 s", "--diameter", "12 mm", "--json", "-").out)
    a = tree["joints"][0]["swings"][0]
    # handle on the ground: 20 degrees on a radius of 6 mm in 1.5 s
    assert a["path of rubbing"]["value"] == pytest.approx(6 * math.radians(20), rel=1e-9)
    assert a["mean speed"]["value"] == pytest.approx(0.006 * math.radians(20) / 1.5, rel=1e-9)


@pytest.mark.parametrize(
    ("rate", "seconds"),
    [("20/min", 1.5), ("20", 1.5), ("0.5 /s", 1.0), ("1200/h", 1.5), ("20 / min", 1.5)],
)
def test_ways_to_write_a_rate(rate: str, seconds: float) -> None:
    tree = json.loads(linkcalc("pins", "clamp.toml", "--rate", rate, "--json", "-").out)
    assert tree["time of a stroke"]["value"] == pytest.approx(seconds)


@pytest.mark.parametrize(("time", "seconds"), [("2 s", 2.0), ("2", 2.0), ("0.5min", 30.0)])
def test_ways_to_write_a_time(time: str, seconds: float) -> None:
    tree = json.loads(linkcalc("pins", "clamp.toml", "--time", time, "--json", "-").out)
    assert tree["time of a stroke"]["value"] == pytest.approx(seconds)


def test_pictures_in_every_format() -> None:
    names = [f"{what}.{kind}" for what in ("plot", "roses") for kind in HEADS]
    options = [a for n in names for a in (f"--{n.split('.')[0]}", n)]
    said = linkcalc("pins", "clamp.toml", *options)
    assert (said.status, said.err) == (0, "".join(f"wrote {n}\n" for n in names))
    for name in names:
        assert Path(name).read_bytes().startswith(HEADS[name.split(".")[1]])
    words = ["".join(e.itertext()) for e in ET.parse("roses.svg").getroot().iter("{http://www.w3.org/2000/svg}text")]
    for title in ("A on handle", "A on ground", "B on strut", "D on arm", "no load: all but 0 deg"):
        assert title in words, title
    plotted = ET.parse("plot.svg").getroot().iter("{http://www.w3.org/2000/svg}text")
    assert any("joint force" in "".join(e.itertext()) for e in plotted)


def test_pictures_are_the_same_each_time() -> None:
    for name in ("a.svg", "b.svg"):
        linkcalc("pins", "clamp.toml", "--roses", name)
    assert Path("a.svg").read_bytes() == Path("b.svg").read_bytes()


def test_a_frame_has_roses_and_no_swing() -> None:
    said = linkcalc("pins", "frame.toml", "--roses", "a.svg")
    assert (said.status, said.err) == (0, "wrote a.svg\n")
    assert "swing" not in said.out
    assert "Anchors in the ground" in said.out


def test_the_working_of_a_joint_is_a_sheet() -> None:
    said = linkcalc("pins", "sized.toml", "--working", "B")
    for text in ("B: pin across a stack of plates", "Given", "Reckoned", "Against what is allowed", "S = 2.5"):
        assert text in said.out, text
    assert "What each joint carries" not in said.out


def test_sizes_stand_in_table_and_json() -> None:
    said = linkcalc("pins", "sized.toml", "--rate", "20/min")
    table = said.out[said.out.index("\nSizes\n") :]
    for text in ("S355", "10 mm given", "sintered bronze", "static safety", "sample ball"):
        assert text in table, text
    tree = json.loads(linkcalc("pins", "sized.toml", "--json", "-").out)
    sizes = {(j["joint"], s["part"]): s for j in tree["joints"] for s in j["sizes"]}
    assert set(sizes) == {("A", "pin"), ("B", "pin"), ("C", "pin"), ("C", "bush"), ("D", "pin"), ("D", "bearing")}
    chosen = sizes["B", "pin"]
    assert float(chosen["chosen"].split()[0]) >= chosen["needed"]["value"]
    assert chosen["working"]["passes"] is True


def test_guides_and_ropes_stand_among_the_sizes() -> None:
    said = linkcalc("pins", ROOT / "examples" / "goods_hoist.toml")
    table = said.out[said.out.index("\nSizes\n") :]
    for text in ("5294 N", "8000 N given", "the codes for lifting"):
        assert text in table, text
    tree = json.loads(linkcalc("pins", ROOT / "examples" / "twin_guides.toml", "--json", "-").out)
    (size,) = next(j for j in tree["joints"] if j["joint"] == "upper")["sizes"]
    assert (size["part"], size["size"]) == ("guide", {"unit": "mm", "value": 60.0})
    assert size["worst"]["value"]["unit"] == "MPa"
    assert size["utilisation"] == pytest.approx(size["worst"]["value"]["value"] / 4)


def test_a_guide_that_does_not_do_is_warned_of() -> None:
    text = (ROOT / "examples" / "twin_guides.toml").read_text(encoding="utf-8")
    Path("tight.toml").write_text(text.replace("allowed_pressure = 4", "allowed_pressure = 1.5"), encoding="utf-8")
    said = linkcalc("pins", "tight.toml")
    assert "Warning: upper: the guide does not do: pressure at the edge of the guide" in said.out
    assert "Warning: lower: the guide" not in said.out


def test_the_working_of_guide_and_rope() -> None:
    guide = linkcalc("pins", ROOT / "examples" / "twin_guides.toml", "--working", "upper").out
    for text in ("Upper: guide", "Where: turn of handle", "p_edge = p_mean + p_moment", "used 47.5 %"):
        assert text in guide, text
    rope = linkcalc("pins", ROOT / "examples" / "goods_hoist.toml", "--working", "fall").out
    for text in ("Fall: rope", "Where: case forward", "T_allow = B/S", "used 66.2 %", "Caution: Parts of lifting"):
        assert text in rope, text
    said = linkcalc("pins", ROOT / "examples" / "goods_hoist.toml", "--working", "rails")
    assert said.status == 2
    wanted = "give it 'length' and 'width'; there are those of O, fall"
    assert f"--working: rails is a slide and has no calculation; {wanted}" in said.err


def test_inch_sizes_on_request() -> None:
    tree = json.loads(linkcalc("pins", "clamp.toml", "--inch", "--json", "-").out)
    assert all(s["chosen"].endswith(" in") for j in tree["joints"] for s in j["sizes"])


def test_a_list_of_bearings_of_ones_own() -> None:
    text = "designation,bore [mm],outside [mm],width [mm],C [kN],C0 [kN],kind\nours 15,15,32,9,5.5,2.8,ball\n"
    Path("list.csv").write_text(text, encoding="utf-8")
    said = linkcalc("pins", "sized.toml", "--bearings", "list.csv")
    assert "ours 15" in said.out
    assert "Sample bearings" not in said.out


@pytest.mark.parametrize(
    ("requirement", "says"),
    [
        ("stress in pin B <= 500 MPa", "the pin B has no diameter; give it one: [pins.B] diameter"),
        ("pressure at D <= 10 MPa", "the pin D has no stack; give it the plates across it in order: [pins.D] stack,"
         " or a bush and its length"),
        ("life at C >= 1e6", 'the pin C has no bearing; name one: [pins.C] bearing = "..."'),
        ("pressure at C on arm <= 10 MPa", "the pressure is that of the whole pin; leave 'on arm' out"),
        ("stress in pin Q <= 10 MPa", "unknown pin 'Q'; known: A, B, C, D"),
        ("stress in pin C <= 10 N", "10 N is a force; a stress is wanted (e.g. 12 MPa)"),
    ],
)  # fmt: skip
def test_requirements_that_cannot_be_judged(requirement: str, says: str) -> None:
    Path("a.toml").write_text(CLAMP + STACKED + f'\n[requirements]\nit = "{requirement}"\n', encoding="utf-8")
    line = len(Path("a.toml").read_text(encoding="utf-8").splitlines())
    for command in ("check", "pins"):
        said = linkcalc(command, "a.toml")
        assert (said.status, said.err) == (2, f"a.toml:{line}: requirements.it: {says}\n")


def test_requirements_on_pins_are_judged_everywhere() -> None:
    """One held, one failed; pressure by hand: the largest force over the narrower plates, 2 x 5 x 10 or 10 x 10 mm²."""
    text = CLAMP + STACKED + '\n[requirements]\nweak = "stress in pin C <= 1 MPa"\nsoft = "pressure at C <= 8 MPa"\n'
    Path("a.toml").write_text(text, encoding="utf-8")
    for command in ("check", "stroke", "pins"):
        assert linkcalc(command, "a.toml").status == 1
    verdicts = {v["name"]: v for v in json.loads(linkcalc("pins", "a.toml", "--json", "-").out)["requirements"]}
    assert not verdicts["weak"]["holds"]
    assert verdicts["soft"]["holds"]
    assert verdicts["soft"]["worst"]["value"] == pytest.approx(791.6 / 100, abs=0.001)


@pytest.mark.parametrize(
    ("line", "says"),
    [
        ("--rate 20/min --time 2", "--rate and --time: both say how fast the stroke goes; give one of them"),
        ("--rate fast", '--rate: fast has no number; "20/min" or "0.5/s" is wanted'),
        ("--rate 0/min", '--rate: 0 is not more than nothing; "20/min" or "0.5/s" is wanted'),
        ("--rate 20/mm", "--rate: 20/mm: 'mm' is no unit of time; s, min or h is wanted"),
        ("--time 2mm", "--time: 2mm: 'mm' is no unit of time; s, min or h is wanted"),
        ("--time 2fortnihgt", "--time: 2fortnihgt: unknown unit 'fortnihgt'; s, min or h is wanted"),
        ("--diameter 12deg", "--diameter: 12deg is an angle; a length is wanted (e.g. 12 mm)"),
        ("--diameter -3", "--diameter: -3 is not more than nothing; a length is wanted, e.g. 16 mm"),
        ("--about top", "--about: unknown point 'top'; did you mean 'tip'?"),
        ("--poses 1", "--poses: 1 poses; from 2 to 100000 are wanted"),
        ("--working X", "--working: unknown joint 'X'; known: A, B, C, D"),
        ("--json - --csv -", "--json and --csv: both cannot be printed; give one of them a file"),
        ("--plot a.bmp", "--plot: a.bmp: a picture cannot be written as '.bmp'; end it in .svg, .png or .pdf"),
        ("--roses a", "--roses: a: the file of a picture needs a suffix; end it in .svg, .png or .pdf"),
        ("--plot a.svg --roses a.svg", "--roses: a.svg is written by --plot already; give it another file"),
        ("--bearings none.csv", "none.csv: cannot be read: no such file or directory"),
        ("--case hevy", None),
    ],
)
def test_options_that_cannot_be_met(line: str, says: str | None) -> None:
    said = linkcalc("pins", "clamp.toml", *line.split())
    assert (said.status, said.out) == (2, "")
    if says is None:
        assert said.err.endswith("cases: unknown case 'hevy'; did you mean 'heavy'?\n")
    else:
        assert said.err == f"{says}\n"
    assert sorted(p.name for p in Path().iterdir()) == ["clamp.toml", "frame.toml", "sized.toml"]


def test_a_frame_takes_no_time_and_has_no_curves() -> None:
    assert linkcalc("pins", "frame.toml", "--time", "2").err == (
        "frame.toml: stroke: the model has no stroke, so none that takes a time; give it a [stroke]\n"
    )
    assert linkcalc("pins", "frame.toml", "--plot", "a.svg").err == (
        "frame.toml: stroke: there is only one pose, so no curve over a stroke; give the model a [stroke]\n"
    )


def test_a_list_with_broken_rows_is_told_row_by_row() -> None:
    text = (
        "designation,bore [mm],outside [mm],width [mm],C [kN],C0 [kN],kind\na,15,32,9,5.5,2.8,bal\nb,15,32,9,x,2,ball\n"
    )
    Path("list.csv").write_text(text, encoding="utf-8")
    said = linkcalc("pins", "clamp.toml", "--bearings", "list.csv")
    assert said.status == 2
    assert said.err.splitlines() == [
        "list.csv:2: row 1 (a).kind: unknown kind 'bal'; did you mean 'ball'?",
        "list.csv:3: row 2 (b).C: 'x' is no number; a number is wanted",
    ]


def test_a_load_on_the_pin_itself_cannot_be_stacked() -> None:
    """The pin then feels three forces and the stack has plates for two."""
    text = CLAMP.replace('[load]\nat = "tip"', '[load]\nat = "C"') + STACKED
    Path("a.toml").write_text(text, encoding="utf-8")
    said = linkcalc("pins", "a.toml")
    assert said.status == 2
    assert "pins.C.stack: the forces on the pin do not balance" in said.err
