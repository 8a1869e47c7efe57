"""Facts of lever scales, each with its source, through ``weigh``."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from linkcalc import Faults, parse, weigh
from linkcalc.design.weighing.accuracy import Accuracy, accuracy
from linkcalc.design.weighing.scale import Scale, probe
from linkcalc.mechanics.scales import tilted

STEELYARD = """
[units]
length = "{unit}"
[points]
O = [0, 0]
load_end = [{load_arm}, {hook_height}]
tail = [{tail}, 0]
heart = [{heart}, {heart_height}]
[members]
ground = ["O"]
beam = {{ points = ["load_end", "O", "tail", "heart"], mass = {beam}, centre = "heart" }}
[load]
mass_at = "load_end"
mass = {most}
[poises.rider]
along = ["O", "tail"]
mass = {poise}
from = {start}
"""


def steelyard(unit="mm", load_arm=-50.0, tail=600.0, beam=0.0, poise=1.0, most=1.0, start=0.0, heart=0.0,
              heart_height=-1.0, hook_height=0.0):  # fmt: skip
    return parse(STEELYARD.format(**locals()))


def test_roman_steelyard_weighs_twenty_kilograms() -> None:
    """Load 15 cm from the suspension, 20 N rider at 150 cm, g = 10: 20 kg. Source: school question bank,
    https://byjus.com/question-answer/in-a-roman-steelyard-the-length-of-the-scale-is-1-5-m-and-the"""
    found = weigh(steelyard("cm", -15, 150, poise=2, beam=0.1, most=20), places={"rider": 1.5})
    assert found.asked_load == pytest.approx(20, rel=1e-12)
    assert found.capacity == pytest.approx(20, rel=1e-12)


def test_metre_rule_of_120_g_balances_64_g() -> None:
    """A uniform metre rule pivoted at 34 cm balances 64 g at 4 cm: it weighs 120 g. Source: worked moment problems,
    problem 17, https://mathix.co/problems/physics/rods-weights-moments-542190. The poise stands on the pivot."""
    rule = steelyard("cm", -30, 66, beam=0.12, heart=16, poise=0.01, most=0.064)
    assert weigh(rule, loads=[0.064]).places["rider"] == pytest.approx(0, abs=1e-12)
    assert weigh(rule, loads=[0.064]).least == pytest.approx(0.064, rel=1e-12)


@pytest.mark.parametrize(("mass", "arm", "heart"), [(1.0, 50.0, 0.0), (2.5, 40.0, 90.0), (0.3, 75.0, 20.0)])
def test_graduations_are_even_and_as_far_apart_as_load_arm_over_poise(mass: float, arm: float, heart: float) -> None:
    """Pitch for a unit of load = load arm / poise mass, the scale even whatever the beam weighs: that shifts its zero
    only. Source: moments about the fulcrum (derived); the rule of steelyards, common practice."""
    most = 600 * mass / arm * 0.9 + 0.7 * heart / arm
    found = weigh(steelyard(load_arm=-arm, poise=mass, beam=0.7, heart=heart, most=most), step=most / 40)
    bar = found.bars[0]
    assert bar.spacing[1:] / np.diff(bar.loads) == pytest.approx(arm * 1e-3 / mass, rel=1e-9)
    assert bar.uneven < 1e-12
    assert found.least == pytest.approx(0.7 * heart / arm, abs=1e-12)


def test_a_poise_that_is_off_errs_by_its_mass_over_the_load_arm() -> None:
    """Error = poise mass x shift / load arm. Source: moments about the fulcrum (derived): 1.2 kg, 0.2 mm, 48 mm: 5
    g."""
    found = weigh(steelyard(load_arm=-48, poise=1.2, most=10), mark_error=0.2e-3)
    (cause,) = found.causes
    assert cause.size[-1] == pytest.approx(0.005, rel=1e-9)
    # the poise at nothing rests against its stop
    assert cause.size[0] == 0


TRAIN = """
[points]
A = [0, 0]
a = [10, 0]
aa = [100, 0]
B = [80, 200]
b = [100, 200]
bb = [240, 200]
C = [200, 400]
c = [240, 400]
end = [180, 400]
heart = [200, 390]
[members]
ground = ["A", "B", "C"]
first = ["A", "a", "aa"]
rod = ["aa", "b"]
second = ["B", "b", "bb"]
link = ["bb", "c"]
third = { points = ["end", "C", "c", "heart"], path = ["end", "c"], mass = 0.5, centre = "heart" }
[load]
mass_at = "a"
mass = 240
[counterpoises.weights]
at = "end"
weights = [6]
"""


def test_multiple_of_a_lever_train_is_the_product_of_its_levers() -> None:
    """10 x 8 x 0.5 = 40, so 6 kg holds 240 kg. Source: http://metrology.burtini.ca/mechanical.html; power arm over load
    arm 100/10, 160/20, 20/40."""
    found = weigh(parse(TRAIN))
    assert found.ratios["weights"] == pytest.approx(40, rel=1e-9)
    assert found.capacity == pytest.approx(240, rel=1e-9)
    assert found.hung["weights"][-1] == pytest.approx(6)


PANS = """
[points]
O = [0, 0]
left = [-200, {end}]
right = [200, {end}]
heart = [0, {heart}]
[members]
ground = ["O"]
beam = {{ points = ["left", "O", "right", "heart"], path = ["left", "right"], mass = 0.5, centre = "heart" }}
[load]
mass_at = "left"
mass = 4
[loads.pan]
mass_at = "left"
mass = 0.1
[loads.other_pan]
mass_at = "right"
mass = 0.1
[counterpoises.pan_weights]
at = "right"
weights = 1
most = 4
"""


def test_beam_comes_to_rest_at_the_angle_of_the_moment_equation() -> None:
    """tan(angle) = (P - Q) a / ((P + Q + 2 S) h + W k). Source: I. Todhunter, Analytical Statics, art. 150 (moment
    equation); the numbers are ours: P 2.0001, Q 2, S 0.1, W 0.5 kg, a 200, h 0.05, k 2 mm."""
    bare = probe(parse(PANS.format(end=-0.05, heart=-2)), "beam")
    scale = Scale(bare, "beam")
    level = scale.pushing(np.array([2.0]), {"pan_weights": np.array([2.0])})
    more = scale.pushing(np.array([2.0001]), {"pan_weights": np.array([2.0])})
    turn = tilted(scale.ready, scale.closed(level), more, scale.beam)[0, 0, 0]
    p, q, s, w, a, h, k = 2.0001, 2.0, 0.1, 0.5, 200.0, 0.05, 2.0
    assert math.tan(turn) == pytest.approx((p - q) * a / ((p + q + 2 * s) * h + w * k), rel=1e-6)


@pytest.mark.parametrize("end", [-0.05, 0.0, 0.02])
def test_sensitivity_of_a_beam_with_two_pans(end: float) -> None:
    """At balance the tilt for a kilogram more is a / ((P + Q + 2 S) h + W k): falling with the load where the end edges
    lie below the fulcrum, even in one plane, rising above. Source: as above, P = Q (derived)."""
    found = weigh(parse(PANS.format(end=end, heart=-2)), loads=[0, 1, 2, 4])
    wanted = 200.0 / ((2 * found.loads + 0.2) * -end + 0.5 * 2.0)
    assert found.tilt.per_load == pytest.approx(wanted, rel=1e-6)


def test_beam_with_its_end_edges_above_the_fulcrum_turns_unstable() -> None:
    """At (P + Q + 2 S) |h| = W k. Source: as above: (2 P + 0.2) 0.2 = 0.5 x 2, P = 2.4 kg."""
    found = weigh(parse(PANS.format(end=0.2, heart=-2)), loads=[0, 1, 2, 3, 4])
    assert found.tilt.unstable == pytest.approx(2.4, rel=1e-6)
    assert found.tilt.steady.tolist() == [1, 1, 1, -1, -1]
    assert any("unstable from 2.4 kg" in c.text for c in found.caveats)


def test_a_beam_is_indifferent_with_its_centre_in_the_edge_and_topples_above_it() -> None:
    """k = 0 stays where it is put, k < 0 falls over. Source: Museo Galileo,
    http://catalogue.museogalileo.it/indepth/SensitivityBalance.html"""
    assert (weigh(parse(PANS.format(end=0, heart=0))).tilt.steady == 0).all()
    with pytest.raises(Faults, match="topples at every load"):
        weigh(parse(PANS.format(end=0, heart=1)))


PLATFORM = """
[dimensions]
load_arm = {load_arm}
[points]
F = [0, 0]
P = [60, 0]
Q = [300, 0]
tail = [-500, 0]
heart = [0, -5]
S1 = [60, -200]
lever_end = [300, -300]
bottom = [550, -300]
S2 = {{ on = ["bottom", "lever_end"], distance = "load_arm" }}
near = [70, -190]
far = [480, -190]
[members]
ground = ["F", "bottom"]
beam = {{ points = ["tail", "F", "P", "Q", "heart"], path = ["tail", "Q"], mass = 2, centre = "heart" }}
rod_P = ["P", "S1"]
rod_Q = ["Q", "lever_end"]
lever = ["bottom", "S2", "lever_end"]
platform = ["S1", "near", "far", "S2"]
[load]
mass_at = "near"
mass = 25
[poises.rider]
along = ["F", "tail"]
mass = 4
"""


def test_platform_of_matched_levers_passes_the_corner_test() -> None:
    """Load arm : end arm of the bottom lever as p : q of the beam (50 : 250 = 60 : 300): the place does not matter,
    and the
    load acts as if all of it hung at p. Source: moments about the two fulcrums (derived); every lever under a platform
    has the same multiple to the beam, common practice."""
    found = weigh(parse(PLATFORM.format(load_arm=50)))
    assert found.corners is not None and found.corners.free
    assert [c.error for c in found.corners.corners] == pytest.approx([0, 0, 0], abs=1e-12)
    assert found.places["rider"][-1] == pytest.approx(25 * 0.06 / 4, rel=1e-9)


def test_platform_of_unmatched_levers_is_told_the_proportion_that_cures_it() -> None:
    """With other arms (60 : 250) a load at far, 420 mm of 430 to the right, acts as W1 60 + W2 (60/250) 300. Source: as
    above. The arm that would cure it is 50."""
    found = weigh(parse(PLATFORM.format(load_arm=60)))
    corners = found.corners
    assert corners is not None and not corners.free

    def arm(x: float) -> float:
        second = (x - 60) / 430
        return (1 - second) * 60 + second * (60 / 250) * 300

    far = next(c for c in corners.corners if c.point == "far")
    assert far.multiple == pytest.approx(arm(480) / arm(70), rel=1e-9)
    assert far.error == pytest.approx(corners.load * (arm(480) / arm(70) - 1), rel=1e-9)
    (cure,) = corners.cures
    assert cure.wanted == pytest.approx(0.05, rel=1e-9)
    # the multiples of the two supports: 60 at S1, 72 at S2
    supports = {s.joint: s.multiple * arm(70) for s in corners.supports}
    assert supports["S1"] == pytest.approx(60, rel=1e-9)
    assert supports["S2"] == pytest.approx(72, rel=1e-9)


PARALLEL = """
[points]
O1 = [0, 0]
L1 = [-200, 0]
R1 = [200, 0]
heart = [0, -3]
O2 = [0, -150]
L2 = { on = ["O2", "side"], distance = 200 }
side = [-200, -150]
upper = [-200, 40]
out = [-320, 40]
in = [-50, 40]
[members]
ground = ["O1", "O2"]
beam = { points = ["L1", "O1", "R1", "heart"], path = ["L1", "R1"], mass = 0.5, centre = "heart" }
stay = ["L2", "O2"]
stem = ["L1", "upper", "out", "in", "L2"]
[load]
mass_at = "upper"
mass = 2
[counterpoises.pan]
at = "R1"
weights = [2]
"""


def test_a_parallel_arm_pan_does_not_mind_where_the_load_stands() -> None:
    """A pan on a parallelogram only goes up and down: the place on it changes nothing. Source: Encyclopaedia
    Britannica, http://www.britannica.com/print/topic/505608."""
    found = weigh(parse(PARALLEL), loads=[0, 2])
    assert found.corners is not None and found.corners.free
    assert [c.error for c in found.corners.corners] == pytest.approx([0] * 4, abs=1e-12)
    assert found.ratios["pan"] == pytest.approx(1, rel=1e-12)


def test_local_gravity_does_not_matter_for_a_lever_scale() -> None:
    """Masses are compared; a spring would show 0.5 % more at the poles than at the equator. Source: common practice."""
    here = steelyard(most=10, beam=0.5)
    there = replace(here, gravity=replace(here.gravity, size="9.78 m/s^2"))
    assert weigh(there).places["rider"] == pytest.approx(weigh(here).places["rider"], rel=1e-12)
    assert not weigh(here).gravity.any()


def table(name: str, loads: list[float]) -> list[float]:
    """In intervals."""
    return [float(v) for v in accuracy(name, 1.0).limit(np.array(loads))]


@pytest.mark.parametrize(
    ("name", "edges"),
    [("OIML I", (50_000, 200_000, 500_000)), ("OIML II", (5_000, 20_000, 100_000)),
     ("OIML III", (500, 2_000, 10_000)), ("OIML IIII", (50, 200, 1_000))],
)  # fmt: skip
def test_errors_of_the_oiml_classes(name: str, edges: tuple[float, float, float]) -> None:
    """0.5, 1, 1.5 e up to the edges, twice as much in service. Source: OIML R 76-1 Table 6; UK SI 1995/1907 Schedule 2,
    https://legislation.gov.uk/uksi/1995/1907/schedule/2/paragraph/4/made"""
    loads = [0, edges[0], edges[0] + 1, edges[1], edges[1] + 1, edges[2]]
    assert table(name, loads) == [0.5, 0.5, 1.0, 1.0, 1.5, 1.5]
    assert accuracy(name, 1.0, in_use=True).limit(edges[0]) == pytest.approx(1.0)


@pytest.mark.parametrize(
    ("name", "edges"),
    [("NIST I", (50_000, 200_000)), ("NIST II", (5_000, 20_000)), ("NIST III", (500, 2_000, 4_000)),
     ("NIST IIII", (50, 200, 400))],
)  # fmt: skip
def test_tolerances_of_nist_handbook_44(name: str, edges: tuple[float, ...]) -> None:
    """Maintenance 1, 2, 3, 5 d (classes I and II: 1, 2, 3), acceptance half of it. Source: NIST Handbook 44, 2.20
    Scales, Table 6; class III read in a forum on metrology, the others from memory."""
    maintenance = Accuracy(name, 1.0, in_use=True)
    wanted = (1, 2, 3, 5)
    for k, edge in enumerate(edges):
        assert maintenance.limit(edge) == wanted[k]
        assert maintenance.limit(edge + 1) == wanted[k + 1]
    assert table(name, [0, edges[0], edges[0] + 1]) == [0.5, 0.5, 1.0]


def test_tolerances_of_class_three_l() -> None:
    """1 d up to 500, 2 d up to 1000, then 1 d more for each further 500 d or part. Source: NIST Handbook 44, 2.20
    Scales, Table 6, from memory."""
    maintenance = Accuracy("NIST III L", 1.0, in_use=True)
    loads = [0, 500, 501, 1000, 1001, 1500, 1501, 2000, 10_000]
    assert maintenance.limit(np.array(loads, float)).tolist() == [1, 1, 2, 2, 3, 3, 4, 4, 20]


def test_worked_tolerances_of_a_scale_of_500_pounds() -> None:
    """500 lb x 0.05 lb, class III: 0.15 lb at 150 lb and 0.25 lb at 500 lb, acceptance 0.125 lb. Source: metrology
    forum,
    https://elsmar.com/elsmarqualityforum/threads/nist-hdbk-44-table-t-3-class-iii-tolerance-in-divisions-clarification.65983/
    (maintenance); acceptance from memory."""
    maintenance, acceptance = Accuracy("NIST III", 0.05, in_use=True), Accuracy("NIST III", 0.05)
    assert maintenance.limit(np.array([150.0, 500.0])) == pytest.approx([0.15, 0.25], rel=1e-12)
    assert acceptance.limit(500.0) == pytest.approx(0.125, rel=1e-12)


@pytest.mark.parametrize(
    ("arm", "travel"), [(0.3, 10), (0.31, 13), (0.5, 13), (1.0, 18), (1.2, 23)]
)  # fmt: skip
def test_travel_of_a_beam_between_its_stops(arm: float, travel: float) -> None:
    """10, 13, 18, 23 mm by the distance from fulcrum to stop; 1 d at zero and 2 d at the most take it from the
    middle to a
    stop. Source: NIST Handbook 44, 2.20 Scales, S.1.5.2 and T.N.6, from memory."""
    judged = accuracy("NIST III", 0.1)
    assert judged.extra(0.0, 100.0, arm) == pytest.approx((0.1, travel / 2e3))
    assert judged.extra(100.0, 100.0, arm) == pytest.approx((0.2, travel / 2e3))
    assert judged.extra(50.0, 100.0, arm) is None


@pytest.mark.parametrize(
    ("name", "most", "way"), [("OIML II", 10, 1), ("OIML III", 30, 2), ("OIML III", 31, 5), ("OIML IIII", 200, 5)]
)
def test_displacement_that_an_extra_load_must_give(name: str, most: float, way: float) -> None:
    """The largest error put on besides moves the indicating element by 1, 2 or 5 mm. Source: OIML R 76-1 6.1, from
    memory."""
    judged = accuracy(name, most / 1000)
    assert judged.extra(most, most, 0.5) == pytest.approx((float(judged.limit(most)), way * 1e-3))


def test_intervals_that_a_class_allows() -> None:
    """OIML III: e 0.1 to 2 g with 100 to 10 000, e from 5 g with 500 to 10 000; Min 20 e. Source: OIML R 76-1 Table
    3."""
    assert accuracy("OIML III", 0.005).unfit(0.005 * 400) == ("intervals", 500, 10_000)
    assert accuracy("OIML III", 0.005).unfit(0.005 * 500) is None
    assert accuracy("OIML III", 0.002).unfit(0.002 * 400) is None
    assert accuracy("OIML III", 0.002).unfit(0.002 * 10_001) is not None
    assert accuracy("OIML III", 0.05).least_load() == pytest.approx(1.0)
