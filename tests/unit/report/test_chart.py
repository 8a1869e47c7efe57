"""What a chart shows: which curves, on which panel, in which unit."""

from dataclasses import replace

import numpy as np
import pytest

from linkcalc.design.answer import Event
from linkcalc.report.chart import stroke_chart
from linkcalc.report.chart_figure import chart_figure
from tests.unit.report.by_hand import toggle


def _names(panel):
    return list(dict.fromkeys(c.name for c in panel.curves))


def test_a_steady_load_is_told_beside_its_case_and_draws_no_curve():
    chart = stroke_chart(toggle())
    assert chart.cases == ("case light, load 1000 N", "case heavy, load 1500 N")
    assert [p.axis.title for p in chart.panels] == ["effort [N]", "force ratio", "joint force [N]"]


def test_a_load_that_varies_shares_the_axis_of_an_effort_of_like_size():
    answer = toggle()
    chart = stroke_chart(replace(answer, load=answer.load * np.linspace(1, 2, 57)))
    assert _names(chart.panels[0]) == ["effort", "load"]
    assert chart.panels[0].axis.title == "effort, load [N]"
    assert chart.cases == ("case light", "case heavy")


@pytest.mark.parametrize("kind, factor", [("moment", 1.0), ("force", 1000.0)])
def test_a_load_of_another_unit_or_size_gets_a_panel_of_its_own(kind, factor):
    answer = toggle()
    kinds = {**answer.kinds, "load": kind}
    chart = stroke_chart(replace(answer, kinds=kinds, load=factor * answer.load * np.linspace(1, 2, 57)))
    assert [_names(p) for p in chart.panels[:2]] == [["effort"], ["load"]]
    assert chart.panels[1].axis.unit == {"moment": "N m", "force": "N"}[kind]


def test_tare_effort_stands_beside_the_effort_once_if_all_cases_agree():
    answer = toggle()
    chart = stroke_chart(replace(answer, tare_effort=np.full_like(answer.effort, 30.0)))
    tare = [c for c in chart.panels[0].curves if c.name == "tare effort"]
    assert len(tare) == 1
    assert tare[0].values[5] == pytest.approx(30)


def test_the_ideal_ratio_is_drawn_broad_beneath_where_it_differs():
    answer = toggle()
    curves = stroke_chart(replace(answer, ideal_ratio=answer.ideal_ratio * 1.1)).panels[1].curves
    assert [(c.name, c.broad) for c in curves] == [("ideal ratio", True), ("force ratio", False)]
    same = stroke_chart(answer).panels[1].curves
    assert [c.name for c in same] == ["force ratio = ideal ratio"]


def test_both_ends_of_a_link_share_a_curve_and_cases_keep_theirs_apart():
    panel = stroke_chart(toggle()).panels[2]
    assert [(c.name, c.case) for c in panel.curves] == [("A, B, C", 0), ("A, B, C", 1), ("guide", 0), ("guide", 1)]
    assert len({f.hue for f in panel.flags}) == 2


def test_too_many_curves_give_way_to_the_worst_case_of_each_joint():
    answer = toggle()
    force = answer.force * np.arange(1, 9).reshape(8, 1, 1, 1, 1)
    extra = {**vars(answer), "force": force}
    crowded = replace(type(answer)(**extra), cases=("a", "b", "c"))
    for name in ("effort", "load", "tare_effort", "force_ratio", "ideal_ratio", "status"):
        values = getattr(answer, name)
        crowded = replace(crowded, **{name: np.concatenate([values, values[1:]])})
    for name in ("force", "moment", "axial"):
        values = getattr(crowded, name)
        axis = values.ndim - 3
        crowded = replace(crowded, **{name: np.concatenate([values, 2 * values.take([1], axis)], axis)})
    panel = stroke_chart(crowded).panels[2]
    assert panel.axis.text == "joint force, worst case"
    assert len(panel.curves) == 4
    largest = crowded.joint_force("guide").max()
    guide = next(c for c in panel.curves if c.name == "guide")
    assert max(guide.values) == pytest.approx(largest)


def test_neighbouring_lines_are_told_a_row_apart():
    answer = toggle()
    near = [Event("limit", "stroke", "", np.radians(d), np.nan, "number") for d in (10.0, 10.2, 25.0)]
    figure = chart_figure(stroke_chart(replace(answer, events=tuple(near))))
    texts = [t for t in figure.axes[0].texts if t.get_text() == "limit"]
    renderer = figure.canvas.get_renderer()
    figure.draw(renderer)
    heights = sorted(round(t.get_window_extent(renderer).y0) for t in texts)
    assert len(texts) == 3
    assert heights[0] == heights[1] < heights[2]
