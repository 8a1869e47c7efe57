"""Pictures reach the disk in the format their suffix asks for, with their words in them and none over another."""

import itertools
import math
import subprocess
import sys
from dataclasses import replace

import numpy as np
import pytest

from linkcalc.design.answer import Event
from linkcalc.faults import Faults
from linkcalc.report.chart import stroke_chart
from linkcalc.report.chart_figure import chart_figure, visible
from linkcalc.report.drawing import draw_mechanism
from linkcalc.report.drawing_figure import drawing_figure
from linkcalc.report.figure import picture_format, save
from linkcalc.report.free_body import free_body
from tests.unit.report.by_hand import lever, toggle

TURNS = tuple(float(t) for t in range(-30, 31, 5))
FIRST_BYTES = {"svg": b"<?xml", "png": b"\x89PNG\r\n\x1a\n", "pdf": b"%PDF-"}
PICTURES = {
    "chart of the toggle": lambda: chart_figure(stroke_chart(toggle())),
    "chart of the lever": lambda: chart_figure(stroke_chart(lever(TURNS))),
    "toggle": lambda: drawing_figure(draw_mechanism(toggle(), poses=(0, 28, 56), case=1, joint_sizes=True)),
    "lever": lambda: drawing_figure(draw_mechanism(lever(TURNS), poses=(3,))),
    "frame": lambda: drawing_figure(draw_mechanism(lever())),
    "ram cut free": lambda: drawing_figure(free_body(toggle(), "ram", pose=20)),
    "lever cut free": lambda: drawing_figure(free_body(lever(TURNS), "lever", pose=10)),
}


@pytest.mark.parametrize("suffix", sorted(FIRST_BYTES))
def test_a_picture_is_of_the_format_of_its_suffix_and_the_same_every_time(tmp_path, suffix):
    first, second = tmp_path / f"one.{suffix}", tmp_path / f"two.{suffix.upper()}"
    save(PICTURES["toggle"](), first)
    save(PICTURES["toggle"](), second)
    assert first.read_bytes().startswith(FIRST_BYTES[suffix])
    assert first.read_bytes() == second.read_bytes()


@pytest.mark.parametrize("name", ["picture.gif", "picture", "picture.svg.gz"])
def test_another_suffix_is_refused_with_the_three_there_are(tmp_path, name):
    with pytest.raises(Faults, match=r"\.svg, \.png or \.pdf"):
        picture_format(tmp_path / name)


def test_a_picture_that_cannot_be_written_is_one_clear_fault(tmp_path):
    with pytest.raises(Faults, match="no folder"):
        save(PICTURES["lever"](), tmp_path / "missing" / "lever.svg")


def _svg(tmp_path, name: str) -> str:
    save(PICTURES[name](), tmp_path / "picture.svg")
    return (tmp_path / "picture.svg").read_text(encoding="utf-8")


def test_the_drawing_names_members_points_and_forces_with_their_sizes(tmp_path):
    text = _svg(tmp_path, "toggle")
    for word in ("crank", "link", "ram", ">B<", "nose", "case heavy", "lighter 16 and 2 deg", "mm<"):
        assert word in text
    assert f"effort {2 * 1500 * math.tan(math.radians(30)):.0f} N<" in text
    assert "load 1500 N<" in text
    assert f"guide {1500 * math.tan(math.radians(30)):.0f} N<" in text


def test_the_chart_has_units_on_its_axes_and_its_largest_values(tmp_path):
    text = _svg(tmp_path, "chart of the toggle")
    for word in ("effort [N]", "force ratio", "joint force [N]", "turn of crank [deg]", "case heavy, load 1500 N"):
        assert word in text
    assert f"A, B, C {1500 / math.cos(math.radians(30)):.0f} N<" in text
    assert "dead point" in text


def test_a_member_cut_free_has_its_sums_printed(tmp_path):
    text = _svg(tmp_path, "ram cut free")
    for word in ("ram cut free", "sum", "Fx", "Fy", "moment about C", "[N m]"):
        assert word in text


@pytest.mark.parametrize("name", sorted(PICTURES))
def test_no_word_stands_on_another_and_none_leaves_the_page(name):
    figure = PICTURES[name]()
    renderer = figure.canvas.get_renderer()
    figure.draw(renderer)
    words = [t for part in (figure, *figure.axes) for t in part.texts if t.get_text()]
    boxes = [(t.get_text(), t.get_window_extent(renderer)) for t in words]
    for (one, a), (other, b) in itertools.combinations(boxes, 2):
        # a hair of the box is white: letters touch only where boxes go into one another by more
        clear = a.x1 <= b.x0 + 1 or b.x1 <= a.x0 + 1 or a.y1 <= b.y0 + 1 or b.y1 <= a.y0 + 1
        assert clear, f"{one!r} stands on {other!r}"
    page = figure.bbox
    for text, box in boxes:
        assert page.x0 <= box.x0 and box.x1 <= page.x1 and page.y0 <= box.y0 and box.y1 <= page.y1, text


def test_the_drive_axis_runs_in_the_direction_of_the_stroke():
    figure = PICTURES["chart of the toggle"]()
    first, last = figure.axes[0].get_xlim()
    assert first > 30 > 2 > last


def test_a_drawing_is_to_scale():
    ax = PICTURES["toggle"]().axes[0]
    x = ax.transData.transform((100.0, 0.0)) - ax.transData.transform((0.0, 0.0))
    y = ax.transData.transform((0.0, 100.0)) - ax.transData.transform((0.0, 0.0))
    assert x[0] == pytest.approx(y[1])


def test_an_axis_shows_all_of_a_steep_curve_but_cuts_one_that_runs_off():
    turns = np.radians(np.linspace(30, 0.01, 300))
    chart = stroke_chart(toggle())
    curve = chart.panels[1].curves[0]
    low, high, clipped = visible((curve,))
    assert not clipped
    assert high > max(curve.values)
    runs_off = replace(curve, values=tuple(float(v) for v in 1 / (2 * np.tan(turns))))
    low, high, clipped = visible((runs_off,))
    assert clipped
    assert low == 0
    assert high < 200 < max(runs_off.values)


def test_a_curve_that_runs_off_is_marked_and_keyed():
    answer = toggle()
    ratio = 1 / (2 * np.tan(np.radians(np.linspace(30, 0.01, answer.drive.shape[-1])))) + 0 * answer.effort
    figure = chart_figure(stroke_chart(replace(answer, force_ratio=ratio, ideal_ratio=ratio)))
    panel = figure.axes[1]
    markers = [line for line in panel.lines if line.get_marker() == "^"]
    assert len(markers) == 1
    assert markers[0].get_ydata()[0] == panel.get_ylim()[1]
    assert "runs off the scale" in [t.get_text() for t in panel.get_legend().get_texts()]


def test_a_reversal_gets_a_panel_with_its_mark():
    answer = toggle()
    axial = answer.axial.copy()
    axial[1] = np.linspace(-100, 100, axial.shape[-1])
    event = Event("reversal", "link", "light", math.radians(16), 0.0, "force")
    chart = stroke_chart(replace(answer, axial=axial, events=(event,)))
    assert chart.panels[-1].axis.title == "tension (plus) [N]"
    assert [f.text for f in chart.panels[-1].flags] == ["link reverses"]


def test_a_frame_has_no_chart_and_says_why():
    with pytest.raises(Faults, match="only one pose"):
        stroke_chart(lever())


def test_report_modules_do_not_load_the_drawing_library():
    code = (
        "import sys, pkgutil, importlib, linkcalc.report as r\n"
        "[importlib.import_module(m.name) for m in pkgutil.walk_packages(r.__path__, 'linkcalc.report.')]\n"
        "print([m for m in ('matplotlib', 'scipy', 'pint', 'tabulate') if m in sys.modules])"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "[]"


def test_an_effort_the_other_way_round_is_marked_where_it_is_largest_in_size():
    answer = toggle()
    chart = stroke_chart(replace(answer, effort=-answer.effort, events=()))
    (flag,) = chart.panels[0].flags
    assert flag.drive == pytest.approx(30)
    assert flag.value == pytest.approx(-2 * 1500 * math.tan(math.radians(30)))
