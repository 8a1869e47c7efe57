"""Laws of scales over random steelyards and platforms: masses doubled, the model mirrored, the table monotone."""

from __future__ import annotations

import numpy as np
from hypothesis import given
from hypothesis import strategies as st

from linkcalc import parse, weigh
from linkcalc.design.weighing.answer import WeighAnswer

MODEL = """
[points]
E = [{e}, -500]
F = [0, 0]
V = [{v}, -500]
U = [{u}, -500]
Q = [{v}, {drop}]
end = [{end}, {rise}]
heart = [{heart}, {low}]
[members]
ground = ["E", "F"]
lever = {{ points = ["E", "U", "V"], mass = {lever} }}
rod = ["V", "Q"]
beam = {{ points = ["Q", "F", "end", "heart"], path = ["Q", "end"], mass = {beam}, centre = "heart" }}
[load]
mass_at = "U"
mass = {load}
[poises.rider]
along = ["F", "end"]
mass = {rider}
offset = {offset}
"""


@st.composite
def scales(draw: st.DrawFn) -> dict[str, float]:
    """A lever that hangs on a beam: everything low enough for the beam to be stable, the load within reach."""
    size = st.floats
    short, reach = draw(size(30, 120)), draw(size(300, 900))
    part = draw(size(0.1, 0.9))
    sizes = {
        "v": -short, "e": -short - reach, "u": -short - reach * (1 - part), "drop": draw(size(-3, 0)), "rise": 0.0,
        "end": draw(size(400, 900)), "heart": draw(size(-20, 20)), "low": draw(size(-30, -10)),
        "lever": draw(size(0, 3)), "beam": draw(size(1, 4)), "rider": draw(size(1, 5)), "offset": draw(size(-1, 0)),
    }  # fmt: skip
    empty = -sizes["lever"] / 2 * short + sizes["beam"] * sizes["heart"]
    most = (sizes["rider"] * sizes["end"] + empty) / (part * short)
    return {**sizes, "load": max(0.5, 0.9 * most)}


def asked(sizes: dict[str, float], **more: float) -> WeighAnswer:
    mechanism = parse(MODEL.format(**{**sizes, **more}))
    base = parse(MODEL.format(**sizes))
    least = weigh(base, loads=[sizes["load"]]).least
    loads = np.linspace(max(least, 0.0), sizes["load"], 9) if least < sizes["load"] else [sizes["load"]]
    return weigh(mechanism, loads=np.asarray(loads) * more.get("load", sizes["load"]) / sizes["load"])


@given(scales())
def test_twice_all_masses_stand_where_they_stood(sizes: dict[str, float]) -> None:
    twice = {name: 2 * sizes[name] for name in ("lever", "beam", "rider", "load")}
    once, doubled = asked(sizes), asked(sizes, **twice)
    np.testing.assert_allclose(doubled.places["rider"], once.places["rider"], rtol=1e-9, atol=1e-12)
    np.testing.assert_allclose(doubled.tilt.stiffness, 2 * once.tilt.stiffness, rtol=1e-5)
    assert (doubled.tilt.steady == once.tilt.steady).all()


@given(scales())
def test_a_mirrored_scale_is_the_scale_mirrored(sizes: dict[str, float]) -> None:
    flipped = {name: -sizes[name] for name in ("v", "e", "u", "end", "heart", "offset")}
    once, other = asked(sizes), asked(sizes, **flipped)
    np.testing.assert_allclose(other.places["rider"], once.places["rider"], rtol=1e-9, atol=1e-12)
    np.testing.assert_allclose(other.tilt.stiffness, once.tilt.stiffness, rtol=1e-5)
    np.testing.assert_allclose(other.tilt.per_load, -once.tilt.per_load, rtol=1e-5)
    np.testing.assert_allclose(other.bars[0].x, -once.bars[0].x, rtol=1e-9, atol=1e-12)


@given(scales())
def test_more_load_stands_further_out_and_evenly(sizes: dict[str, float]) -> None:
    found = asked(sizes)
    places = found.places["rider"]
    assert (np.diff(places) > 0).all()
    np.testing.assert_allclose(np.diff(places, 2), 0, atol=1e-11)
    back = [weigh(found.mechanism, loads=[found.loads[-1]], places={"rider": float(p)}).asked_load for p in places[::4]]
    np.testing.assert_allclose(back, found.loads[::4], rtol=1e-9, atol=1e-9)
