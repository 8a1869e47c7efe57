"""The worst inner forces of members, as a designer asks for them."""

from __future__ import annotations

import json
import math

import numpy as np
import pytest

from linkcalc import Faults, members, parse, stroke
from linkcalc.design.diagram import diagram
from linkcalc.report.csv import as_csv
from linkcalc.report.members_blocks import members_blocks
from linkcalc.report.members_json import diagram_json, members_json
from linkcalc.report.members_table import members_table
from linkcalc.report.text import as_text
from tests.samples import BOOM, BUILT_IN, COLLAR, RAM, SLOTTED, SPRUNG

PRESS = """
[points]
O = [0, 0]
A = [60, 20]
B = [240, 0]
T = [300, 60]
[members]
ground = ["O"]
crank = ["O", "A"]
rod = { points = ["A", "B"], mass = 0.6, section = { tube = [20, 2] }, material = "S235", factor = 2.5 }
ram = { points = ["B", "T"], mass = 3 }
[slides.guide]
member = "ram"
along = 0
at = "B"
[effort]
torque_on = "crank"
[load]
at = "T"
direction = 180
size = 900
[stroke]
turn = "crank"
from = 25
to = 155
poses = 21
[cases.full]
[cases.light]
scale = { load = 0.4 }
"""


@pytest.mark.parametrize("text", [RAM, COLLAR, SLOTTED, BOOM, SPRUNG, PRESS])
def test_the_worst_is_no_less_than_any_of_many_poses(text: str) -> None:
    """Against five times as many poses as are sampled; the exact worst is had at its own pose and place."""
    model = parse(text)
    found = members(model)
    fine = members(model, poses=301)
    for one, other in zip(found.members, fine.members, strict=True):
        for name, peak in (("axial force", one.axial), ("shear force", one.shear), ("bending moment", one.bending)):
            if peak is None:
                continue
            values = other.over[name]
            assert abs(peak.value) >= np.nanmax(np.abs(values)) * (1 - 1e-9)
            if math.isnan(peak.drive):
                continue
            again = diagram(found, one.member, case=peak.case or None, drive=peak.drive)
            assert again.peaks[name].value == pytest.approx(peak.value, rel=1e-9)


def test_a_two_force_member_has_its_axial_force_throughout() -> None:
    light = parse(PRESS.replace("mass = 0.6, ", ""))
    one = members(light).member("rod")
    assert one.two_force and one.bending is None and one.shear is None
    np.testing.assert_allclose(one.over["axial force"], stroke(light).axial_in("rod"), rtol=1e-9)


def test_every_diagram_ends_at_nothing() -> None:
    for text in (RAM, COLLAR, SLOTTED, BOOM, SPRUNG, PRESS):
        assert max(m.unbalance for m in members(parse(text)).members) < 1e-12


def test_a_member_that_is_pressed_buckles_at_its_largest_compression() -> None:
    """By hand, tube 20 x 2 of S235: I = pi/64 (20^4 - 16^4) = 4636.99 mm^4, A = pi/4 (20^2 - 16^2) = 113.097 mm^2,
    slenderness L/sqrt(I/A) below the transition sqrt(2 pi^2 E/Re) = 132.8, so Johnson."""
    found = members(parse(PRESS)).member("rod")
    long = math.hypot(180, 20)
    area, second = math.pi / 4 * (20**2 - 16**2), math.pi / 64 * (20**4 - 16**4)
    slender = long / math.sqrt(second / area)
    critical = area * 235 * (1 - 235 * slender**2 / (4 * math.pi**2 * 210_000))
    push = -float(np.nanmin(members(parse(PRESS), poses=301).member("rod").over["axial force"]))
    assert found.margin is not None and found.buckling is not None and found.used is not None
    assert found.margin.value == pytest.approx(critical / push, rel=1e-4)
    assert found.margin.value <= critical / push * (1 + 1e-9)
    assert found.buckling["P"] == pytest.approx(critical / found.margin.value)
    assert found.used.value >= 2.5 / found.margin.value


@pytest.mark.parametrize(
    ("text", "kind"),
    [
        ("bending moment in bar <= 80 N*m", "moment"),
        ("shear force in bar >= 1 N", "force"),
        ("axial force in bar <= 1 kN", "force"),
        ("stress in bar <= 200 MPa", "stress"),
        ("utilisation of bar <= 5", "number"),
    ],
)
def test_requirements_name_inner_forces(text: str, kind: str) -> None:
    model = BUILT_IN.replace("SECTION", "flat = [40, 10]") + f'[requirements]\nr = "{text}"\n'
    (verdict,) = stroke(parse(model)).verdicts
    found = members(parse(model)).member("bar")
    peaks = {"bending": found.bending, "shear": found.shear, "axial": found.axial, "stress": found.stress,
             "utilisation": found.used}  # fmt: skip
    peak = peaks[text.split()[0]]
    assert peak is not None and verdict.kind == kind
    assert verdict.worst == pytest.approx(abs(peak.value))


def test_the_foot_of_a_built_in_bar_by_hand() -> None:
    """Bar of (600, 80) mm and 2 kg, 120 N at its end 80 degrees below the level. Moment about the foot, clockwise:
    0.6 x 120 sin 80 + 0.08 x 120 cos 80 + 2 x 9.80665 x 0.3, which stretches the upper, left side."""
    found = members(parse(BUILT_IN.replace("SECTION", "flat = [40, 10]"))).member("bar")
    c, s = math.cos(math.radians(80)), math.sin(math.radians(80))
    moment = 0.6 * 120 * s + 0.08 * 120 * c + 2 * 9.80665 * 0.3
    long = math.hypot(0.6, 0.08)
    weight = 2 * 9.80665
    t = (0.6 / long, 0.08 / long)
    axial = t[0] * 120 * c - t[1] * (120 * s + weight)
    assert found.bending is not None and found.stress is not None
    assert found.bending.value == pytest.approx(-moment)
    assert found.bending.place is not None and found.bending.place.start == "A" and found.bending.place.way == 0.0
    # flat 40 x 10: A = 400 mm^2, W = 10 x 40^2/6 mm^3
    assert abs(found.stress.value) == pytest.approx(abs(axial) / 400e-6 + moment / (10 * 40**2 / 6 * 1e-9))


@pytest.mark.parametrize(
    ("member", "requirement", "message"),
    [
        ('points = ["A", "B"]', "stress in bar <= 1 MPa", "'bar' has no section"),
        ('points = ["A", "B"], section = { round = 20 }', "utilisation of bar <= 1", "'bar' has no material"),
        ('points = ["A", "B"], section = { round = 20 }, material = "S235"', "buckling margin of bar >= 3",
         "bar is not loaded at two places of a straight body only"),
        ('points = ["A", "B"], section = { flat = [40] }', "effort <= 1 N", "members.bar.section.flat: a list of 1;"
         " [depth, thickness] is wanted"),
        ('points = ["A", "B"], section = { flat = [40, -1] }', "stress in bar <= 1 MPa",
         "members.bar.section.flat: -1 mm cannot stand here"),
        ('points = ["A", "B"], section = { pipe = [40, 2] }', "stress in bar <= 1 MPa", "'flat'"),
        ('points = ["A", "B"], section = { tube = [20, 12] }', "stress in bar <= 1 MPa",
         "members.bar: a wall of 12 mm does not fit into 20 mm"),
        ('points = ["A", "B"], section = { round = 20 }, material = "S23"', "stress in bar <= 1 MPa", "'S235'"),
        ('points = ["A", "B"], section = { round = 20 }, ends = "hinged"', "stress in bar <= 1 MPa", "'pinned'"),
        ('points = ["A", "B"], section = { round = 20 }, factor = 0', "stress in bar <= 1 MPa", "more than nothing"),
    ],
)  # fmt: skip
def test_what_is_wrong(member: str, requirement: str, message: str) -> None:
    text = BUILT_IN.replace(
        'bar = { points = ["A", "B"], mass = 2, section = { SECTION }, material = "S235", factor = 3 }',
        f"bar = {{ {member} }}",
    )
    with pytest.raises(Faults) as found:
        members(parse(text + f'[requirements]\nr = "{requirement}"\n'))
    assert message in str(found.value)


def test_a_torque_goes_in_where_the_members_meet_or_where_it_is_told() -> None:
    """A bar built in at A and twisted: the moment runs from where the torque goes in to the foot, and not beyond."""
    text = BUILT_IN.replace("SECTION", "round = 20").replace(", mass = 2", "")
    torque = text.partition("[load]")[0].replace("B = [600, 80]", "B = [600, 0]\nM = [200, 0]").replace(
        '"A", "B"]', '"A", "M", "B"]')  # fmt: skip
    load = '[load]\ntorque_on = "bar"\nsize = 50\n'
    told = members(parse(torque + load + 'shaft = "M"\n')).member("bar")
    assert told.bending is not None and told.bending.place is not None
    assert told.bending.value == pytest.approx(50.0)
    assert told.bending.place.stop == "M"
    met = members(parse(torque + load))
    assert met.member("bar").bending is None  # it goes in at the foot, where the ground holds it
    assert any("'shaft' names another point" in c.text for c in met.caveats)


def test_what_was_assumed_is_told() -> None:
    text = BUILT_IN.replace("SECTION", "flat = [40, 10]")
    side = text.replace("B = [600, 80]", "B = [600, 80]\nS = [300, 200]\nK = [600, 300]").replace(
        'points = ["A", "B"]', 'points = ["A", "B", "S", "K"], path = ["A", "B", "K"], centre = "S"')  # fmt: skip
    texts = [c.text for c in members(parse(side)).caveats if c.item == "bar"]
    for words in ("S is beside its path", "its weight is taken as acting at S alone", "bends at B without a"):
        assert any(words in t for t in texts), words
    bent = side.replace("factor = 3", "factor = 3, bend_radius = 120")
    assert not any("without a 'bend_radius'" in c.text for c in members(parse(bent)).caveats)


def test_a_bend_carries_more_at_its_inside() -> None:
    """Winkler and Bach for a rectangle, by hand: h = 40, R = 60 mm, r_n = h/ln((R + h/2)/(R - h/2)), e = R - r_n,
    inner stress M (r_n - r_i)/(A e r_i) against M/W."""
    text = BUILT_IN.replace("SECTION", "flat = [40, 10]").replace(", mass = 2", "")
    text = text.replace("B = [600, 80]", "B = [600, 0]\nC = [600, 100]").replace(
        'points = ["A", "B"]', 'points = ["C", "B", "A"]').replace('at = "A"', 'at = "A"').replace(
        'at = "B"\ndirection = -80', 'at = "C"\ndirection = 0')  # fmt: skip
    straight = members(parse(text)).member("bar")
    bent = members(parse(text.replace("factor = 3", "factor = 3, bend_radius = 60"))).member("bar")
    r_n = 40 / math.log((60 + 20) / (60 - 20))
    more = (r_n - 40) / (400 * (60 - r_n) * 40) * (10 * 40**2 / 6)
    assert straight.stress is not None and bent.stress is not None
    # 120 N level at 100 mm beside the bar: M = 12 N m all along it, N = 120 N in it
    direct, moment = 120 / 400, 12e3 / (10 * 40**2 / 6)
    assert abs(straight.stress.value) == pytest.approx((direct + moment) * 1e6)
    assert abs(bent.stress.value) == pytest.approx((direct + more * moment) * 1e6)
    assert bent.strength is not None
    assert bent.strength["sigma"] == pytest.approx((direct + more * moment) * 1e6)


def test_everything_printed_is_in_the_json_and_the_table() -> None:
    found = members(parse(PRESS))
    tree = json.loads(members_json(found))
    rod = next(m for m in tree["members"] if m["member"] == "rod")
    assert rod["section"] == "tube 20 x 2 mm"
    assert rod["worst"]["buckling margin"]["value"] == pytest.approx(found.member("rod").margin.value)
    assert rod["strength"]["passes"] and rod["buckling"]["checks"]
    printed = as_text(members_blocks(found))
    for one in found.members:
        assert one.member in printed
    lines = as_csv(members_table(found)).splitlines()
    assert len(lines) == 1 + found.stroke.status.size
    assert "bending moment in ram [N*m]" in lines[0]
    picture = json.loads(diagram_json(diagram(found, "ram")))
    assert picture["answer"] == "diagram" and len(picture["stretches"]) >= 1
