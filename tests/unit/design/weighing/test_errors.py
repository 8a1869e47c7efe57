"""Errors of the indication: by hand, and copies against each copy weighed by itself."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from linkcalc import Faults, parse, weigh
from linkcalc.design.weighing.accuracy import accuracy
from linkcalc.design.weighing.errors import drawn_sizes
from linkcalc.model.mechanism import Mechanism
from tests.unit.design.weighing.models import PAN, beam, changed, hanging, platform


def indicated(nominal: Mechanism, other: Mechanism, load: float) -> float:
    """[kg] what the marks of the one say of the place where the other balances."""
    place = weigh(other, loads=[load]).places["rider"][0]
    return weigh(nominal, places={"rider": float(place)}).asked_load


def sized(mechanism: Mechanism, **sizes: float) -> Mechanism:
    dimensions = {n: replace(d, size=sizes.get(n, d.size)) for n, d in mechanism.dimensions.items()}
    return replace(mechanism, dimensions=dimensions)


def test_a_longer_load_arm_weighs_in_proportion() -> None:
    """0.05 of 50 mm: a thousandth of the load, by the law of the lever."""
    (cause,) = weigh(beam(), loads=[5, 20]).causes
    assert cause.high == pytest.approx([0.005, 0.02]) and cause.low == pytest.approx([-0.005, -0.02])


@pytest.mark.parametrize("size", [49.2, 50.7])
def test_errors_are_those_of_the_copy_weighed_by_itself(size: float) -> None:
    found = weigh(beam(), loads=[4, 13, 20], sizes={"short_arm": np.array([size * 1e-3])})
    for k, load in enumerate(found.loads):
        wanted = indicated(beam(), sized(beam(), short_arm=size), float(load)) - load
        assert found.scatter is not None
        assert found.scatter.mean[k] == pytest.approx(wanted, rel=1e-9)


def test_errors_of_a_scale_with_a_free_pan_are_those_of_the_copy_weighed_by_itself() -> None:
    text = changed(PAN, ("[points]", "[dimensions]\narm = { size = 100, tol = 0.1 }\n[points]"),
                   ("left = [-100", 'left = ["-arm"'), ("low = [-100", 'low = ["-arm"'))  # fmt: skip
    found = weigh(parse(text), loads=[1, 5], sizes={"arm": np.array([0.101, 0.1, 0.0995])})
    assert found.scatter is not None
    wanted = [indicated(parse(text), sized(parse(text), arm=a), 5.0) - 5.0 for a in (101, 100, 99.5)]
    assert found.scatter.mean[1] == pytest.approx(np.mean(wanted), rel=1e-7)


def test_copies_scatter_as_their_tolerance_says() -> None:
    """Normal, tolerance 3 deviations: error of 20 kg x 0.05/50 at three deviations. 20,000 copies: 2 % is 4 sigma of
    the
    deviation's own scatter."""
    found = weigh(beam(), loads=[20], copies=20_000, seed=3)
    assert found.scatter is not None
    assert found.scatter.deviation[0] == pytest.approx(0.02 / 3, rel=0.02)
    assert found.scatter.high[0] == pytest.approx(0.02, rel=0.1)
    again = weigh(beam(), loads=[20], copies=20_000, seed=3)
    assert again.scatter is not None and again.scatter.mean == pytest.approx(found.scatter.mean, abs=0)
    other = weigh(beam(), loads=[20], copies=20_000, seed=4)
    assert other.scatter is not None and other.scatter.mean[0] != found.scatter.mean[0]


@pytest.mark.parametrize("distribution", ["normal", "uniform", "triangular"])
def test_sizes_are_drawn_within_their_tolerances(distribution: str) -> None:
    """Deviation of a uniform scatter: half width / sqrt 3; of a triangular one: / sqrt 6; normal: / 3."""
    text = ("tol = 0.05", f'tol = [-0.02, 0.06], distribution = "{distribution}"')
    sizes = drawn_sizes(beam(text), 50_000, 1)["short_arm"]
    over = {"normal": 3.0, "uniform": math.sqrt(3), "triangular": math.sqrt(6)}[distribution]
    assert sizes.mean() == pytest.approx(0.05002, abs=1e-6)
    assert sizes.std() == pytest.approx(0.04e-3 / over, rel=0.02)


def test_out_of_level_moves_what_lies_off_the_line_of_the_edges() -> None:
    """Turned by b every arm u at height v becomes u cos b + v sin b. Hook 0.5 mm and centre 4 mm below the edge,
    poise on
    the line: r/g = load (50 c - 0.5 s) ... solved for the poise's place."""
    tilt = 0.01
    (_, cause) = weigh(beam(), loads=[8, 20], out_of_level=tilt).causes
    for sign, errors in ((-1, cause.low), (1, cause.high)):
        for load, error in zip((8.0, 20.0), errors, strict=True):
            # gravity turned counter-clockwise by b: moment of a mass at (u, v) is -(u cos b + v sin b)
            c, s = math.cos(tilt), sign * math.sin(tilt)
            place = (-load * (-50 * c - 0.5 * s) - 1 * (60 * c - 4 * s)) / (2 * c)
            assert error == pytest.approx((2 * place + 60) / 50 - load, rel=1e-9)


def test_friction_hides_its_circle_over_the_load_arm() -> None:
    """Force on the edge x radius of friction / load arm: (60 + 1.2 + 1.6 + 0.03 + 5 + 1.5) kg x 0.005/75."""
    found = weigh(hanging(), loads=[60])
    assert found.dead_band[0] == pytest.approx(69.33 * 0.005 / 75, rel=1e-6)
    friction = next(c for c in found.causes if c.name == "friction")
    assert friction.high == pytest.approx(found.dead_band)


def test_friction_of_all_edges_counts() -> None:
    """Platform of two levers: each edge by its force, radius and turn, over the way of the load (virtual work)."""
    mechanism = platform()
    plain = weigh(mechanism, loads=[200]).dead_band
    rubbing = replace(mechanism, friction=replace(mechanism.friction, pins=0.1, diameter=0.2))
    # mu r/sqrt(1 + mu^2) at every pin; against the beam the long lever turns by 60/1200, the short one by 600/500 of
    # that;
    # platform, rod and shackle do not turn, and the platform stands on the short lever by a slot
    radius = 0.1 * 0.1 / math.hypot(1, 0.1)
    found = weigh(rubbing, loads=[200])
    assert not plain.any() and found.dead_band[0] > 0
    second = 225 * (560 - 120) / (1000 - 120)  # goods and platform stand at 560 mm, on U1 at 120 and U2 at 1000
    first = 225 - second
    shackle = (second * 100 + 3 * 250) / 500
    rod = (first * 120 + shackle * 600 + 8 * 600) / 1200
    e1, e2, f = first + shackle + 8 - rod, second + 3 - shackle, rod + 4 + 2.2 + 0.5
    long, short = 60 / 1200, 60 / 1200 * 600 / 500
    turns = (e1 + first + shackle) * long + (shackle + e2) * short + rod * long + (rod + f) * 1
    assert found.dead_band[0] == pytest.approx(radius * turns / 6, rel=1e-3)


def test_friction_with_a_free_pan() -> None:
    """Edge of the beam: load, pan, beam and poise on it, its whole turn; edge of the pan: the pan hangs straight, so
    the beam turns against it as much. 0.02 mm, load arm 100 mm."""
    rubbing = changed(PAN, ("[load]", "[pins]\nF.friction_radius = 0.02\nleft.friction_radius = 0.02\n[load]"))
    found = weigh(parse(rubbing), loads=[0, 5])
    wanted = [((load + 0.5 + 2 + 2) + (load + 0.5)) * 0.02 / 100 for load in (0, 5)]
    assert found.dead_band == pytest.approx(wanted, rel=1e-6)
    assert found.places["rider"] == pytest.approx(weigh(parse(PAN), loads=[0, 5]).places["rider"])


def test_copies_that_cannot_be_drawn_are_told_and_left_out() -> None:
    """The hook drawn by two arcs of which one is too short to reach the other in the second copy."""
    arcs = 'hook = { meets = [["F", "short_arm"], ["low", 40]], side = "right" }\nlow = [0, -40]'
    mechanism = beam(('hook = ["-short_arm", -0.5]', arcs))
    found = weigh(mechanism, loads=[8], sizes={"short_arm": np.array([0.05, 0.09, 0.0501])})
    assert found.scatter is not None and found.scatter.failed == 1
    assert np.isfinite(found.scatter.mean).all()
    assert any("1 of 3 cannot be drawn" in c.text for c in found.caveats)
    with pytest.raises(Faults, match="it comes to no place"):
        weigh(mechanism, loads=[8], sizes={"short_arm": np.array([0.09, 0.1])})


def test_progress_is_told_to_the_end() -> None:
    told: list[tuple[int, int]] = []
    weigh(beam(), loads=[5], copies=20_000, progress=lambda now, whole: told.append((now, whole)))
    assert [now for now, _ in told] == [8192, 16384, 20_000] and {whole for _, whole in told} == {20_000}


def test_knife_edges_off_their_line_show_when_out_of_level() -> None:
    """A hook 0.3 mm lower puts load x 0.3 mm x sin(tilt) on the beam, over 50 mm of load arm."""
    text = ("short_arm = { size = 50, tol = 0.05 }", "short_arm = 50\nedge = { size = 0.5, tol = 0.3 }")
    lower = ('"-short_arm", -0.5', '"-short_arm", "-edge"')
    (level_cause,) = weigh(beam(text, lower), loads=[10]).causes
    assert level_cause.size == pytest.approx(0, abs=1e-12)
    askew = beam(text, lower, ("[load]", "[gravity]\ndirection = -89\n[load]"))
    (cause,) = weigh(askew, loads=[10]).causes
    assert cause.size[0] == pytest.approx(
        10 * 0.3 * math.sin(math.radians(1)) / (50 * math.cos(math.radians(1))), rel=0.02
    )


def test_the_verdict_tells_the_range_that_fails() -> None:
    """A thousandth of the load against 0.5 e up to 500 e, 1 e up to 2000 e: with e = 20 g, 0.5 e is met at 10 kg
    exactly,
    and 15 kg is off by 15 g of 20 g; with e = 10 g, 0.5 e goes to 5 kg only, and 1 e to 20 kg."""
    wide = weigh(beam(), loads=[5, 10, 15, 20], accuracy=accuracy("OIML III", 0.02))
    assert [b.holds for b in wide.bands] == [True, True] and wide.holds
    fine = weigh(beam(), loads=[5, 10, 15, 20], accuracy=accuracy("OIML III", 0.01))
    assert [b.holds for b in fine.bands] == [True, False] and not fine.holds
    assert fine.bands[1].at == 20
