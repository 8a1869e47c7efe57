"""What stands where: against an independent stroke of the same model, and by hand."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from linkcalc import parse, stroke, weigh
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.poises import Poise
from tests.unit.design.weighing.models import PAN, beam, changed, hanging, platform


def effort_with(mechanism: Mechanism, load: float, places: dict[str, float], hung: dict[str, float]) -> float:
    """[N m] what must hold the beam as drawn with everything put where ``weigh`` says: by a stroke, not by
    ``weigh``."""
    poises: dict[str, Poise] = {
        n: replace(p, at=f"{places[n]!r} m") for n, p in mechanism.poises.items()
    }  # fmt: skip
    counterpoises = {n: replace(c, put_on=f"{hung[n]!r} kg") for n, c in mechanism.counterpoises.items()}
    put = replace(
        mechanism, poises=poises, counterpoises=counterpoises, load=replace(mechanism.load, mass=f"{load!r} kg"),
        pins={}, requirements={}, stroke=None,
    )  # fmt: skip
    if put.effort is None:
        from linkcalc.parts.loads.torque import Torque

        put = replace(put, effort=Torque("beam"), free=tuple(m for m in put.free if m != "beam"))
    return float(stroke(put).effort[0, 0, 0])


@pytest.mark.parametrize("which", ["beam", "platform", "hanging", "pan"])
def test_what_weigh_says_balances_in_a_stroke(which: str) -> None:
    mechanism = {"beam": beam, "platform": platform, "hanging": hanging, "pan": lambda: parse(PAN)}[which]()
    found = weigh(mechanism)
    for k, load in enumerate(found.loads):
        places = {n: float(v[k]) for n, v in found.places.items()}
        hung = {n: float(v[k]) for n, v in found.hung.items()}
        assert effort_with(mechanism, float(load), places, hung) == pytest.approx(0, abs=1e-11 * 9.81 * found.capacity)


def test_notched_and_fine_poise_share_the_load() -> None:
    """By the head of the example: 20 kg a notch of 60 mm, 30 mm a kilogram for the fine one, the ball at 54 mm."""
    found = weigh(platform(), loads=[0, 7.5, 19.9, 20, 137.3, 200])
    assert found.places["notched"] == pytest.approx([0.04, 0.04, 0.04, 0.1, 0.4, 0.58])
    assert found.places["fine"] == pytest.approx(0.04 + 0.03 * np.array([0, 7.5, 19.9, 0, 17.3, 20]))
    assert found.zero == pytest.approx(0.054) and found.zeroed
    assert (found.least, found.capacity) == (pytest.approx(0, abs=1e-12), pytest.approx(200))


def test_weights_on_the_hanger_stand_for_ten_times_their_mass() -> None:
    found = weigh(hanging(), loads=[0, 9.9, 10, 43.5, 60])
    assert found.ratios["hanger"] == pytest.approx(10)
    assert found.hung["hanger"] == pytest.approx([0, 0, 1, 4, 5])
    assert found.places["rider"] == pytest.approx(0.013 + 0.05 * np.array([0, 9.9, 0, 3.5, 10]))


def test_load_for_a_position_and_position_for_a_load_are_inverse() -> None:
    mechanism = platform()
    found = weigh(mechanism, places={"notched": 0.22, "fine": 0.34})
    assert found.asked_load == pytest.approx(70)
    back = weigh(mechanism, loads=[found.asked_load])
    assert (back.places["notched"][0], back.places["fine"][0]) == (pytest.approx(0.22), pytest.approx(0.34))
    assert weigh(hanging(), places={"hanger": 2.0, "rider": 0.113}).asked_load == pytest.approx(22)


def test_a_tare_poise_takes_the_container() -> None:
    """2 kg at 50 mm is 100 kg mm: a tare poise of 0.5 kg goes 200 mm."""
    tare = '[poises.tare]\nalong = ["F", "end"]\nmass = 0.5\nuse = "tare"\n[poises.rider]'
    mechanism = beam(("[poises.rider]", tare))
    plain, found = weigh(mechanism, loads=[4, 10]), weigh(mechanism, loads=[4, 10], tare=2.0)
    assert found.tare_place == pytest.approx(0.2)
    assert found.places["rider"] == pytest.approx(plain.places["rider"])
    assert found.least == pytest.approx(plain.least)


def test_a_free_pan_settles_under_its_load() -> None:
    """The load hangs straight under the edge: as if the pan were a point. 5 kg x 100 + 0.5 x 100 = 2 kg x 275."""
    found = weigh(parse(PAN), loads=[0, 5])
    assert found.places["rider"] == pytest.approx([0.025, 0.275], rel=1e-9)
    # off the middle the pan swings until it hangs straight again, and weighs the same
    aside = weigh(parse(changed(PAN, ('mass_at = "low"', 'mass_at = "aside"'))), loads=[0, 5])
    assert aside.places["rider"] == pytest.approx([0.025, 0.275], rel=1e-9)


def test_notches_by_load() -> None:
    mechanism = beam(("from = 20\n", "from = 20\nnotch_load = 5\n"))
    found = weigh(mechanism, loads=[8.0, 12.0])
    assert found.bars[0].notched
    assert np.diff(found.bars[0].loads) == pytest.approx(5)
    # 5 kg x 50 mm / 2 kg
    assert found.bars[0].spacing[1:] == pytest.approx(0.125)
    assert found.left.max() > 0 and any("stays unbalanced" in c.text for c in found.caveats)


def test_a_case_changes_the_scale() -> None:
    mechanism = beam(("[poises", '[cases.boxed.add.box]\nmass_at = "hook"\nmass = 1\n[cases.plain]\n[poises'))
    for case, alike in (("boxed", 6), ("plain", 5)):
        place = weigh(mechanism, case=case, loads=[5]).places["rider"]
        assert place == pytest.approx(weigh(mechanism, loads=[alike]).places["rider"])


def test_a_spring_makes_gravity_matter() -> None:
    """A pull of 2 N on the hook upward: 0.1 % more gravity weighs 2 N / g x 0.1 % too much."""
    up = '[loads.relief]\nat = "hook"\ndirection = 90\nsize = 2\n[poises'
    found = weigh(beam(("[poises", up)), loads=[5, 10])
    assert found.gravity == pytest.approx(2 / 9.80665 * 1e-3)
    assert not weigh(beam(), loads=[5, 10]).gravity.any()
