"""A scale as text, tables, JSON and pictures: the same figures in all, and bars at true size."""

from __future__ import annotations

import csv
import io
import json
import re
from pathlib import Path

import numpy as np
import pytest

from linkcalc import Faults, weigh
from linkcalc.design.weighing.accuracy import accuracy
from linkcalc.design.weighing.answer import WeighAnswer
from linkcalc.report.csv import as_csv
from linkcalc.report.figure import save
from linkcalc.report.text import as_text
from linkcalc.report.weigh.bar_figure import bar_figure
from linkcalc.report.weigh.blocks import weigh_blocks
from linkcalc.report.weigh.chart_figure import weigh_figure
from linkcalc.report.weigh.json import weigh_json, weigh_tree
from linkcalc.report.weigh.tables import marks_table, setting_table
from tests.unit.design.weighing.models import beam, hanging, platform

MM = 72 / 25.4
TOP = [
    "schema", "answer", "title", "note", "case", "beam", "fulcrum", "least", "capacity", "tare", "zero place",
    "tare place", "load for places", "load", "poises", "counterpoises", "unbalanced", "bars", "sensitivity", "errors",
    "accuracy", "corners", "holds", "warnings", "cautions",
]  # fmt: skip


def asked() -> WeighAnswer:
    return weigh(platform(), step=0.5, copies=200, out_of_level=0.002, accuracy=accuracy("OIML III", 0.1))


def test_text_fits_the_page_and_tells_everything() -> None:
    text = as_text(weigh_blocks(asked()))
    assert max(len(line) for line in text.splitlines()) <= 96
    for words in ("Balanced with the beam level", "Marks on the bars", "Sensitivity", "Motion for an extra load",
                  "Errors of the indication", "Against OIML III, interval 0.1 kg", "Corner test", "local "
                   "gravity cancels",
                  "approved, and each scale verified"):  # fmt: skip
        assert re.sub(r"\s+", " ", words) in re.sub(r"\s+", " ", text), words


def test_csv_has_a_row_a_load_with_all_digits() -> None:
    answer = asked()
    rows = list(csv.DictReader(io.StringIO(as_csv(setting_table(answer, whole=True)))))
    assert [float(r["load [kg]"]) for r in rows] == pytest.approx(answer.loads)
    assert [float(r["place of fine [mm]"]) for r in rows] == pytest.approx(answer.places["fine"] * 1e3, rel=1e-15)
    assert [float(r["likely error [kg]"]) for r in rows] == pytest.approx(answer.likely)
    assert [float(r["largest error allowed [kg]"]) for r in rows] == pytest.approx([0.05] * 3 + [0.1] * 8)


def test_coordinates_of_every_notch_are_those_from_the_fulcrum() -> None:
    """Notches lie on the line F to tip, which is level: x is the place, y nothing; the fine bar lies 45 mm lower."""
    rows = list(csv.DictReader(io.StringIO(as_csv(marks_table(asked())))))
    notches = [r for r in rows if r["mark"] == "notch"]
    assert [float(r["x from fulcrum [mm]"]) for r in notches] == pytest.approx([40 + 60 * k for k in range(10)])
    assert [float(r["load [kg]"]) for r in notches] == pytest.approx([20 * k for k in range(10)])
    fine = [r for r in rows if r["poise"] == "fine"]
    assert [float(r["y from fulcrum [mm]"]) for r in fine] == pytest.approx([-45] * 41)
    assert [float(r["spacing [mm]"]) for r in fine[1:]] == pytest.approx([15] * 40)


def test_json_is_as_documented() -> None:
    tree = json.loads(weigh_json(asked()), parse_constant=lambda name: pytest.fail(f"{name} is no JSON"))
    assert list(tree) == TOP
    assert (tree["schema"], tree["answer"], tree["beam"], tree["fulcrum"]) == (1, "weigh", "beam", "F")
    count = len(tree["load"]["values"])
    for array in (tree["unbalanced"], *(p["place"] for p in tree["poises"]), tree["sensitivity"]["stiffness"],
                  tree["sensitivity"]["way for load"], tree["errors"]["likely"], tree["errors"]["copies"]["low"],
                  *(c["high"] for c in tree["errors"]["causes"])):  # fmt: skip
        assert len(array["values"]) == count and array["unit"]
    assert {c["cause"] for c in tree["errors"]["causes"]} >= {"arm", "fine_mass", "out of level"}
    assert [b["holds"] for b in tree["accuracy"]["bands"]] == [True, True]
    assert tree["corners"]["free"] is True and tree["holds"] is True
    bare = weigh_tree(weigh(beam(), loads=[5.0]))
    assert bare["accuracy"] is None and bare["corners"] is None and bare["errors"]["copies"] is None
    assert bare["zero place"] == {"unit": "mm", "value": None}


@pytest.mark.parametrize("which", [platform, hanging])
def test_bars_are_drawn_at_true_size(tmp_path: Path, which: object) -> None:
    """In the SVG a point is 1/72 in: lines of the fine bar stand as many mm apart as they are cut, and the length to
    check
    a print by is 100 mm."""
    answer = weigh(which())  # type: ignore[operator]
    save(bar_figure(answer), tmp_path / "bars.svg")
    text = (tmp_path / "bars.svg").read_text(encoding="utf-8")
    size = re.search(r'width="([\d.]+)pt" height="([\d.]+)pt"', text)
    assert size is not None
    width, height = float(size[1]), float(size[2])
    box = re.search(r'viewBox="0 0 ([\d.]+) ([\d.]+)"', text)
    assert box is not None and (float(box[1]), float(box[2])) == pytest.approx((width, height))
    lines = [
        (float(x0), float(x1)) for x0, y0, x1, y1 in re.findall(r'd="M ([\d.]+) ([\d.]+) \nL ([\d.]+) ([\d.]+) '
         r'\n"', text)
        if y0 == y1
    ]  # fmt: skip
    lengths = [(b - a) / MM for a, b in lines]
    assert any(abs(length - 100) < 1e-3 for length in lengths)
    for bar in answer.bars:
        assert any(abs(length - bar.length * 1e3) < 1e-3 for length in lengths)
    upright = [float(x0) for x0, x1 in re.findall(r'd="M ([\d.]+) [\d.]+ \nL ([\d.]+) [\d.]+ \n"', text) if x0 == x1]
    left = min(a for a, _ in lines)
    drawn = {round((x - left) / MM, 3) for x in upright}
    for bar in answer.bars:
        if not bar.notched:
            assert {round(float(p) * 1e3, 3) for p in bar.places} <= drawn


@pytest.mark.parametrize("suffix", ["svg", "png", "pdf"])
def test_pictures_reach_the_disk(tmp_path: Path, suffix: str) -> None:
    answer = asked()
    for name, figure in (("bars", bar_figure(answer)), ("chart", weigh_figure(answer))):
        path = tmp_path / f"{name}.{suffix}"
        save(figure, path)
        assert path.stat().st_size > 1000


def test_figures_beside_marks_do_not_touch() -> None:
    from matplotlib.text import Text

    figure = bar_figure(weigh(platform(), step=0.1))
    figure.draw_without_rendering()
    boxes = [t.get_window_extent() for t in figure.findobj(Text) if t.get_text()]
    for k, a in enumerate(boxes):
        assert not any(a.overlaps(b) for b in boxes[k + 1 :])


def test_one_load_has_no_curve_and_no_bar_no_drawing() -> None:
    with pytest.raises(Faults, match="a curve needs more than one load"):
        weigh_figure(weigh(beam(), loads=[5.0]))


def test_inch_pound_units_go_through() -> None:
    mechanism = beam(("[dimensions]", '[units]\nlength = "in"\nmass = "lb"\n[dimensions]'))
    answer = weigh(mechanism, loads=np.array([5.0, 10.0]) * 0.45359237)
    tree = weigh_tree(answer)
    assert tree["load"] == {"unit": "lb", "values": pytest.approx([5, 10])}
    # 50 in of load arm, 60 lb in of the beam, 2 lb of poise
    assert tree["poises"][0]["place"]["values"] == pytest.approx([(5 * 50 - 60) / 2, (10 * 50 - 60) / 2])
