"""Pins, lugs, bushes, bearings, columns and sections of the sources in ``elements.toml``: what comes out, in SI.

The sizes are those of the source, written in its units by hand.
"""

from __future__ import annotations

import math
import tomllib
from collections.abc import Callable, Mapping
from typing import Any

import numpy as np

from linkcalc.design.sizing.bearing_list import Bearing
from linkcalc.design.sizing.bush import bush
from linkcalc.design.sizing.bush_materials import BushMaterial
from linkcalc.design.sizing.column import ENDS, critical_load, two_force_member
from linkcalc.design.sizing.lug import Lug, lug
from linkcalc.design.sizing.materials import Material
from linkcalc.design.sizing.pin import Clevis, clevis_pin, least_diameter, sheared_pin
from linkcalc.design.sizing.rolling import Duty, mean_load, needed_rating, rolling_bearing, stepped_load
from linkcalc.design.sizing.search import smallest
from linkcalc.design.sizing.section import flat, least_size, round_bar, stressed, tube

from .expected import HERE, SI, Printed

IN, LBF, PSI, MM, KN, MPA = SI["in"], SI["lbf"], SI["psi"], SI["mm"], SI["kN"], SI["MPa"]
RATIOS = (1.2, 1.4, 1.6, 1.8, 2, 3, 4, 6, 8, 10)
TURN = math.pi  # swing of a bush that turns through: half a turn there, half a turn on

Values = Mapping[str, Any]


def printed_elements() -> dict[str, dict[str, Any]]:
    """Case -> its source and its printed values."""
    tree = tomllib.loads((HERE / "elements.toml").read_text(encoding="utf-8"))
    return {case: {**body, "printed": tuple(Printed(**row) for row in body["printed"])} for case, body in tree.items()}


def steel(allowed: float, modulus: float | None = None) -> Material:
    """A material of which so much is allowed, with a factor of 1."""
    return Material("as the source has it", allowed, modulus=modulus)


def two_pins_of_a_link() -> Values:
    force, some = 750 * LBF, steel(1e9)
    fork = clevis_pin(force, 0.25 * IN, Clevis(0.25 * IN, 0.375 * IN), some, 1.0)
    link = lug(force, Lug(0.375 * IN, 0.375 * IN, 1.25 * IN, 1.0 * IN), some, 1.0)
    return {
        "shear of the pin of 3/8 in": sheared_pin(force, 0.375 * IN, 1, some, 1.0)["tau"],
        "shear of the pin of 1/4 in": fork["tau"],
        "tension beside the hole": link["sigma"],
        "pressure on the fork": fork["p1"],
    }


def eye_bar() -> Values:
    force, bar = 120 * KN, steel(175 * MPA)
    bolt = steel(100 * MPA * math.sqrt(3))  # 100 MPa are allowed in shear
    eye = lug(force, Lug(28 * MM, 20 * MM, 62.3 * MM, 60 * MM), bar, 1.0)
    return {
        "least bolt": least_diameter(lambda d: sheared_pin(force, d, 2, bolt, 1.0)),
        "pressure in the eye": eye["p"],
        "tension of an eye 62.3 mm wide": eye["sigma"],
        "least depth of the bar": least_size(lambda h: flat(h, 20 * MM), force, 0.0, bar, 1.0),
    }


def bell_crank_pin() -> Values:
    return {
        "shear of the pin": sheared_pin(52.984 * KN, 20 * MM, 2, steel(1e9), 1.0)["tau"],
        "least rod": least_size(round_bar, 31.177 * KN, 0.0, steel(100 * MPA), 1.0),
    }


def bush_by_pv() -> Values:
    limit = 3000 * PSI * SI["ft/min"]
    lining = BushMaterial("as the source has it", pv=(limit, limit))

    def of(length: float) -> Any:
        return bush(20 * LBF, 0.75 * IN, length, lining, swing=TURN, rate=500 / 60)

    made = of(0.875 * IN)
    return {"pressure": made["p"], "rubbing speed": made["v"], "least length": smallest(of)}


def _turns(rating: float, load: float, kind: str = "ball") -> float:
    one = Bearing("of the source", 0.02, 0.05, 0.01, rating, rating, kind)
    return float(rolling_bearing(one, Duty(load, swing=TURN))["L10"])


def bearing_hours() -> Values:
    return {"life": _turns(5050, 2400) / 1750 * 60}


def roller_rating() -> Values:
    turns = 40_000 * 60 * 520
    return {"turns": turns, "rating needed": needed_rating(13.92 * KN, turns, 10 / 3)}


def bearing_turns() -> Values:
    return {"life": _turns(5590, 0.56 * 1250 + 1.2 * 625)}


def bearing_three_loads() -> Values:
    speeds, times = np.array([1440, 1080, 720]), np.array([0.25, 0.5, 0.25])
    mean = stepped_load(np.array([3000, 4000, 5000]), speeds * times, 3.0)
    return {"rating needed": needed_rating(mean, 10_000 * 60 * float(np.sum(speeds * times)), 3.0)}


def column_ends() -> Values:
    made = steel(5000 * MPA, 210_000 * MPA)
    return {ends: critical_load(1200 * MM, tube(40 * MM, 2 * MM), made, ends) for ends in ENDS}


def column_of_two_planes() -> Values:
    made = steel(40_000 * PSI, 10.1e6 * PSI)

    def of(side: float) -> Any:
        bar = flat(side, 0.35 * side)
        return two_force_member(-5000 * LBF, 20 * IN, bar, made, 2.5, ends=2.0, ends_across=0.7)

    side = smallest(of)
    return {"larger side": side, "smaller side": 0.35 * side}


def column_euler() -> Values:
    made = steel(42_000 * PSI, 30e6 * PSI)
    bar = two_force_member(-1.0, 30 * IN, round_bar(0.625 * IN), made, 1.0)
    return {"slenderness": bar["slenderness"], "transition": bar["transition"], "buckling load": bar["Pcr"]}


def transition_36_ksi() -> Values:
    bar = two_force_member(-1.0, 30 * IN, round_bar(0.625 * IN), steel(36_000 * PSI, 30e6 * PSI), 1.0)
    return {"transition": bar["transition"]}


def curved_flat() -> Values:
    return {f"rectangle, R/c = {ratio:g}": _inner(flat(20 * MM, 8 * MM), ratio) for ratio in RATIOS}


def curved_round() -> Values:
    return {f"round, R/c = {ratio:g}": _inner(round_bar(20 * MM), ratio) for ratio in RATIOS}


def _inner(section: Any, ratio: float) -> float:
    return float(stressed(section, 0.0, 1.0, steel(1e9), 1.0, radius=ratio * 10 * MM)["k_i"])


def hot_finished_tubes() -> Values:
    found = {}
    for outside, wall in ((48.3, 3.2), (60.3, 4.0), (114.3, 5.0)):
        made = tube(outside * MM, wall * MM).working
        for what, symbol in (("area", "A"), ("second moment", "I"), ("section modulus", "W")):
            found[f"{what} of {outside:g} x {wall:g}"] = made[symbol]
    return found


def rubbing_speed() -> Values:
    lining = BushMaterial("any", p=(1e9, 1e9))
    made = bush(1.0, 1000 * MM, 1.0, lining, swing=math.radians(200), rate=10 / 60)
    return {"rubbing speed": made["v"]}


def swelling_load() -> Values:
    turn = np.linspace(0, math.pi, 721)
    return {"mean load": float(mean_load(np.abs(np.sin(turn)), turn, 3.0))}


ELEMENTS: dict[str, Callable[[], Values]] = {
    made.__name__: made
    for made in (
        two_pins_of_a_link, eye_bar, bell_crank_pin, bush_by_pv, bearing_hours, roller_rating, bearing_turns,
        bearing_three_loads, column_ends, column_of_two_planes, column_euler, transition_36_ksi, curved_flat,
        curved_round, hot_finished_tubes, rubbing_speed, swelling_load,
    )
}  # fmt: skip
"""Case -> what comes out for it, by the words of ``elements.toml``."""
