"""Tracks against paper: an arc is a link to its centre, a spline keeps to known curves, and what may be wrong."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc import parse, stroke
from linkcalc.faults import Faults
from linkcalc.parts.paths.curves import arc_through, smooth_through

EXACT = 1e-9

HUNG = """
[points]
A = [0, 0]
B = [60, 0]
P = { meets = [["B", 100], ["C", 80]], side = "right" }
C = [150, 20]
u = { from = "C", distance = 80, angle = 200 }
v = { from = "C", distance = 80, angle = 270 }
w = { from = "C", distance = 80, angle = 340 }
[members]
ground = ["A", "C"]
crank = ["A", "B"]
rod = ["B", "P"]
[effort]
torque_on = "crank"
[loads.pull]
at = "P"
direction = -70
size = 90
[stroke]
turn = "crank"
from = -20
to = 40
poses = 9
"""


def test_an_arc_is_a_link_to_its_centre() -> None:
    """The force of the track runs through the centre of the arc, so a link from there does the same."""
    track = stroke(parse(HUNG + '[tracks.arc]\npoint = "P"\narc = ["u", "v", "w"]\n'))
    linked = HUNG.replace('rod = ["B", "P"]', 'rod = ["B", "P"]\nlink = ["P", "C"]').replace(
        'at = "P"', 'at = "P"\non = "rod"'
    )
    link = stroke(parse(linked))
    np.testing.assert_allclose(track.effort, link.effort, rtol=EXACT)
    np.testing.assert_allclose(track.force_on("arc", "rod"), link.force_on("P", "rod"), atol=1e-7)
    assert track.checks.virtual_work < 1e-12


def test_travel_along_an_arc_is_radius_times_angle() -> None:
    answer = stroke(parse(HUNG + '[tracks.arc]\npoint = "P"\narc = ["u", "v", "w"]\n[requirements]\n'
                          't = "travel of arc <= 1 m"\n'))  # fmt: skip
    turn = answer.turn[2, 0, 0]
    p = (
        answer.x[2, 0, 0] + np.cos(turn) * _drawn(0) - np.sin(turn) * _drawn(1),
        (answer.y[2, 0, 0] + np.sin(turn) * _drawn(0) + np.cos(turn) * _drawn(1)),
    )
    angle = np.unwrap(np.arctan2(p[1] - 0.02, p[0] - 0.15))
    assert answer.verdicts[0].worst >= 0.08 * np.ptp(angle) - EXACT
    assert answer.verdicts[0].worst == pytest.approx(0.08 * np.ptp(angle), rel=0.05)


def _drawn(axis: int) -> float:
    """From B to P as drawn [m]."""
    from linkcalc.model.sketch import Drawing

    drawing = Drawing(parse(HUNG + '[tracks.arc]\npoint = "P"\narc = ["u", "v", "w"]\n'))
    return float(drawing.points["P"][axis] - drawing.points["B"][axis])


def test_a_point_beyond_the_end_of_its_track_is_a_warning() -> None:
    """The arc ends at 265 deg about C; the point stands at 263 deg as drawn, and goes on."""
    short = HUNG.replace("distance = 80, angle = 270", "distance = 80, angle = 230").replace(
        "angle = 340", "angle = 265"
    )
    answer = stroke(parse(short + '[tracks.arc]\npoint = "P"\narc = ["u", "v", "w"]\n'))
    whole = stroke(parse(HUNG + '[tracks.arc]\npoint = "P"\narc = ["u", "v", "w"]\n'))
    np.testing.assert_allclose(answer.effort, whole.effort, rtol=EXACT)
    assert [c.item for c in answer.caveats if "beyond an end of the track" in c.text] == ["arc"]
    assert not [c for c in whole.caveats if c.item == "arc"]


@pytest.mark.parametrize("side", [1, -1])
def test_the_arc_through_three_points(side: int) -> None:
    """Half a circle of 5 about (2, 1), one way round and the other."""
    arc = arc_through([(7.0, 1.0), (2.0, 1.0 + 5 * side), (-3.0, 1.0)])
    assert (arc.sense, float(arc.length)) == (side, pytest.approx(5 * np.pi, rel=EXACT))
    foot = arc.foot(2.0, 1.0 + 4 * side)
    assert float(foot.left) == pytest.approx(side, abs=EXACT)  # 1 within the circle: left of it, going round leftward
    assert float(arc.along(foot)) == pytest.approx(2.5 * np.pi, rel=EXACT)


def test_a_spline_through_points_of_a_line_is_the_line() -> None:
    curve = smooth_through([(0.0, 0.0), (3.0, 4.0), (4.5, 6.0), (9.0, 12.0)])
    assert float(curve.length) == pytest.approx(15.0, rel=EXACT)
    for along, left in ((7.0, 0.3), (-2.0, -0.1), (17.0, 0.2)):  # beyond its ends it goes straight on
        foot = curve.foot(0.6 * along - 0.8 * left, 0.8 * along + 0.6 * left)
        assert (float(curve.along(foot)), float(foot.left)) == (
            pytest.approx(along, abs=EXACT),
            pytest.approx(left, abs=EXACT),
        )


def test_a_spline_is_that_of_the_library() -> None:
    """scipy.interpolate.CubicSpline with natural ends, over the chords; its foot by dense sampling."""
    from scipy.interpolate import CubicSpline

    points = np.array([(0.0, 0.0), (1.0, 2.0), (2.5, 2.2), (4.0, 0.5), (4.2, -1.0)])
    chords = np.concatenate([[0.0], np.cumsum(np.hypot(*np.diff(points, axis=0).T))])
    library = CubicSpline(chords, points, bc_type="natural")
    curve = smooth_through([tuple(p) for p in points])
    t = np.linspace(0.3, chords[-1] - 0.3, 40)
    d = library(t, 1)
    normal = np.stack([-d[:, 1], d[:, 0]], axis=1) / np.hypot(*d.T)[:, None]
    off = np.linspace(-0.08, 0.08, 40)[:, None] * normal
    place = (library(t) + off).T.reshape(2, 1, 1, -1)
    foot = curve.foot(place[0], place[1])
    np.testing.assert_allclose(foot.left[0, 0], np.linspace(-0.08, 0.08, 40), atol=EXACT)
    np.testing.assert_allclose(np.stack([foot.nx[0, 0], foot.ny[0, 0]], axis=1), normal, atol=EXACT)
    fine = np.linspace(0.0, chords[-1], 200_001)
    speed = np.hypot(*library(fine, 1).T)
    length = np.concatenate([[0.0], np.cumsum((speed[1:] + speed[:-1]) / 2 * np.diff(fine))])
    np.testing.assert_allclose(curve.along(foot)[0, 0], np.interp(t, fine, length), atol=1e-8)


def test_copies_have_each_its_own_curve() -> None:
    text = HUNG.replace("[points]", "[dimensions]\nd = 80\n[points]").replace("distance = 80", 'distance = "d"')
    text = text.replace('["C", 80]', '["C", "d"]') + '[tracks.arc]\npoint = "P"\nthrough = ["u", "x", "v", "w"]\n'
    # the curve goes through P as drawn: x stands there
    text = text.replace("[members]", 'x = { meets = [["B", 100], ["C", "d"]], side = "right" }\n[members]')
    sizes = np.array([0.078, 0.08, 0.083])
    copies = stroke(parse(text), sizes={"d": sizes})
    for k, size in enumerate(sizes):
        alone = stroke(parse(text.replace("d = 80", f'd = "{float(size) * 1000!r} mm"')))
        np.testing.assert_allclose(copies.effort[:, k], alone.effort[:, 0], rtol=1e-7)


@pytest.mark.parametrize(
    ("line", "says"),
    [
        ('through = ["u", "w"]', 'tracks.arc.through: a list of 2; a list of names is wanted, e.g. ["A", "B", "C"]'),
        ('arc = ["u", "w"]', 'tracks.arc.arc: a list of 2; three names are wanted, e.g. ["A", "B", "C"]'),
        ('arc = ["u", "v", "W"]', "tracks.arc.arc: unknown point 'W'; did you mean 'w'?"),
        ('arc = ["u", "v", "w"]\nthrough = ["u", "v", "w"]',
         "tracks.arc: more than one of 'arc', 'through' is given; exactly one is needed"),
        ('arc = ["A", "m", "B2"]',
         "tracks.arc.arc: A, m, B2 stand in line; an arc is wanted, or a slot along a straight line"),
        ('arc = ["u", "B", "w"]', "tracks.arc.arc: B is a point of crank and rod, not of ground; "
         "take a point that ground or no member carries"),
        # u, x and w lie on a circle of 75.60 about (150, 0.60), and P = (140.43, -59.43) 60.79 from its centre
        ('arc = ["u", "x", "w"]', "tracks.arc: it does not hold as drawn, by 14.82 mm; draw its point on its line"),
    ],
)  # fmt: skip
def test_one_fault(line: str, says: str) -> None:
    text = HUNG.replace("[members]", "m = [50, 50]\nB2 = [100, 100]\nx = [150, -75]\n[members]")
    text += f'[tracks.arc]\npoint = "P"\n{line}\n'
    with pytest.raises(Faults) as raised:
        parse(text, "cam.toml")
    (told,) = (str(fault) for fault in raised.value.faults)
    assert told.partition(": ")[2] == says
    name, _, at = told.partition(": ")[0].partition(":")
    at_line = text.splitlines()[int(at) - 1]
    assert name == "cam.toml"
    assert at_line in (*line.splitlines(), "[tracks.arc]")
