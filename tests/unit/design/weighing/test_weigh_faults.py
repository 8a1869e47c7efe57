"""What cannot be weighed: what is wrong, and what would cure it."""

from __future__ import annotations

import pytest

from linkcalc import Faults, parse, weigh
from tests.unit.design.weighing.models import BEAM, PAN, beam, changed, hanging

RIDER = "[poises.rider]"
ZERO = '[poises.ball]\nalong = ["F", "end"]\nmass = 0.1\nto = 80\nuse = "zero"\n'


@pytest.mark.parametrize(
    ("changes", "loads", "says"),
    [
        ((), [30], r"poises\.rider: 30 kg is over the capacity of 25\.2 kg \(rider at 600 mm\); a bar that goes on to "
                   r"720 mm, or a poise of about 2\.41379 kg, would do"),
        ((), [1], r"load: 1 kg cannot be balanced: with everything at nothing it balances 2 kg; let the bar begin"),
        ((), [], r"no load is asked for: the table would be empty; give one load or more"),
        ((), [float("nan")], r"a load that is no number; a mass is wanted"),
        ((('"heart"]', '"heart", "up"]'), ("heart = [60, -4]", "heart = [60, 20]\nup = [0, 9]")), None,
         r"members\.beam: it topples at every load: .*; lower its centre of mass"),
        ((('along = ["F", "end"]', 'along = ["F", "top"]'), ('"heart"]', '"heart", "top"]'),
          ("heart =", "top = [0, 300]\nheart =")), None,
         r"poises\.rider\.along: sliding it does nothing to the beam: its bar stands along gravity"),
        ((('hook = ["-short_arm", -0.5]', "hook = [0, -100]"),), None,
         r"load: it does nothing to the beam: its point does not move up or down"),
        ((('along = ["F", "end"]', 'along = ["end", "F"]'),), None,
         r"poises\.rider: it slides the wrong way: further on it balances less load, not more; swap 'from' and 'to'"),
        (((RIDER, ZERO + RIDER),), None,
         r"poises\.ball: to balance the empty scale it would have to stand at -1000 mm, and it goes from 0 mm "
          r"to 80 mm; "
         r"move it"),
        ((("from = 20", "from = 20\nnotches = 700"),), None,
         r"poises\.rider: 1 notch at 700 mm on a way of 580 mm; 2 to 5000 are wanted"),
        ((('mass_at = "hook"\nmass = 20', 'at = "hook"\ndirection = -90\nsize = 20'),), None,
         r"load: what is weighed is a hung mass; \[load\] with mass_at and mass"),
        ((("[load]", "[gravity]\nsize = 0\n[load]"),), None, r"gravity: without gravity nothing weighs anything"),
    ],
)  # fmt: skip
def test_it_is_told_with_a_cure(changes: tuple[tuple[str, str], ...], loads: list[float] | None, says: str) -> None:
    with pytest.raises(Faults, match=says):
        weigh(beam(*changes), loads=loads)


def test_without_a_poise_there_is_nothing_to_balance_with() -> None:
    text = BEAM[: BEAM.index(RIDER)]
    with pytest.raises(Faults, match=r"poises: nothing is there that could balance a load; give it a poise"):
        weigh(parse(text))


@pytest.mark.parametrize(
    ("asked", "says"),
    [
        ({"places": {"rider": 0.7}}, r"poises\.rider: 700 mm is off its bar; from 20 mm to 600 mm is wanted"),
        ({"places": {"ridder": 0.1}}, r"unknown poise 'ridder'; did you mean 'rider'\?"),
        ({"tare": 1.0}, r'poises: no poise is there for a tare of 1 kg; give one use = "tare"'),
        ({"pointer": "edn"}, r"'edn' is no point of beam; did you mean 'end'\?"),
        ({"case": "full"}, r"cases: unknown case 'full'; there are none"),
    ],
)
def test_options_that_cannot_be_met(asked: dict[str, object], says: str) -> None:
    with pytest.raises(Faults, match=says):
        weigh(beam(), **asked)  # type: ignore[arg-type]


def test_copies_without_a_tolerance() -> None:
    with pytest.raises(Faults, match="no dimension has a tolerance, so all copies are alike"):
        weigh(parse(PAN), copies=10)


def test_too_many_weights_and_weights_without_end() -> None:
    from dataclasses import replace

    scale = hanging()
    hanger = scale.counterpoises["hanger"]
    with pytest.raises(Faults, match=r"70 kg is over the capacity of 60 kg .*; 6 kg on hanger would do"):
        weigh(scale, loads=[70])
    with pytest.raises(Faults, match=r"counterpoises\.hanger: weights in steps of 1 kg without an end"):
        weigh(replace(scale, counterpoises={"hanger": replace(hanger, weights=1)}))
    with pytest.raises(Faults, match=r"counterpoises\.hanger\.weights: 15 weights; up to 14 are wanted"):
        weigh(replace(scale, counterpoises={"hanger": replace(hanger, weights=(1,) * 15)}))
    with pytest.raises(Faults, match=r"counterpoises\.hanger\.at: it hangs on the wrong side"):
        weigh(replace(scale, counterpoises={"hanger": replace(hanger, at="hook")}))


@pytest.mark.parametrize(
    ("old", "new", "says"),
    [
        ('along = ["F", "end"]', 'along = ["F", "F"]', r"model:\d+: poises\.rider\.along: F to F is no line; two"),
        ('along = ["F", "end"]', 'along = ["F", "edn"]', r"poises\.rider\.along: unknown point 'edn'; did you "
         r"mean 'end'"),
        ("mass = 2\n", "mass = 0\n", r"poises\.rider\.mass: 0 kg cannot stand here; more than nothing is wanted"),
        ("mass = 2\n", "", r"poises\.rider: 'mass' is missing"),
        ("from = 20", "from = 620", r"poises\.rider\.from: 620 mm is off its bar F to end; from 0 mm to 600 mm "
         r"is wanted"),
        ("from = 20", "to = 601", r"poises\.rider\.to: 601 mm is off its bar F to end"),
        ("from = 20", "at = 700", r"poises\.rider\.at: 700 mm is off its bar F to end"),
        ("from = 20", "from = 600", r"poises\.rider\.to: it cannot slide: 'from' and 'to' are one place"),
        ("from = 20", "from = 20\nnotches = [10, 50]", r"poises\.rider\.notches: 10 mm is off the way of the poise"),
        ("from = 20", "notches = []", r"poises\.rider\.notches: an empty list; a length is wanted, or a list of some"),
        ("from = 20", "notches = 0", r"poises\.rider\.notches: 0 mm cannot stand here; more than nothing is wanted"),
        ("from = 20", "notches = 20\nnotch_load = 1", r"poises\.rider\.notch_load: 'notches' is given too; one "
         r"of the two"),
        ("from = 20", 'use = "net"', r"poises\.rider\.use: 'net' is not known here; one of 'load', 'tare', 'zero'"),
        ("from = 20", 'use = "zero"\nnotches = 5', r"poises\.rider: what sets the empty scale to zero has no notches"),
        ("from = 20", 'on = "bean"', r"poises\.rider\.on: unknown member 'bean'; did you mean 'beam'"),
        ("[poises.rider]", "[poises.hook]", r"poises\.hook: 'hook' is the name of something else already"),
        ("from = 20", 'from = 20\n[counterpoises.h]\nat = "nowhere"\nweights = [1]', r"unknown point 'nowhere'"),
        ("from = 20", 'from = 20\n[counterpoises.h]\nat = "end"', r"counterpoises\.h: 'weights' is missing"),
        ('ground = ["F"]', 'ground = ["F"]\nspare = ["F", "end"]',
         r"poises\.rider: spare and beam both carry F and end; tell with 'on' which one it is on"),
    ],
)  # fmt: skip
def test_poises_that_cannot_be(old: str, new: str, says: str) -> None:
    with pytest.raises(Faults, match=says):
        parse(changed(BEAM, (old, new)))
