"""Inner forces of a frame of several members against a general-purpose finite element package (PyNiteFEA).

The package solves the stiffness equations of the whole frame; what comes out of a frame that balance alone decides does
not hang on the stiffness. It counts compression plus; its moment has the other sign; and its local y axis points
upwards, which is to the right of a member that runs from right to left.
"""

from __future__ import annotations

from math import hypot

import numpy as np
import pytest
from Pynite import FEModel3D

from linkcalc import members, parse
from linkcalc.design.diagram import diagram

PLACES = {"A": (0.0, 0.0), "K": (0.3, 1.2), "P": (1.1, 1.5), "T": (2.0, 1.4), "F": (1.5, 0.0), "H": (1.85, 0.7),
          "Q": (-0.35, 1.0)}  # fmt: skip
BARS = {
    "post": (("A", "K"), ("K", "P"), ("P", "T"), ("K", "Q")),  # bent twice, with a branch at K
    "leg": (("F", "H"), ("H", "T")),
}
MASS = {"post": 31.0, "leg": 12.0}
LOADS = {"P": (150.0, -900.0), "Q": (0.0, -400.0), "H": (-260.0, 40.0)}
"""[N] of each point x and y"""
GRAVITY = 9.80665

MODEL = f"""
[units]
length = "m"
[points]
{chr(10).join(f"{p} = [{x}, {y}]" for p, (x, y) in PLACES.items())}
[members]
ground = ["A", "F"]
post = {{ points = ["A", "K", "P", "T", "Q"], path = ["A", "K", "Q", "K", "P", "T"], mass = {MASS["post"]} }}
leg = {{ points = ["F", "H", "T"], mass = {MASS["leg"]} }}
{
    chr(10).join(
        f'''[loads.at_{p}]
at = "{p}"
direction = "atan2({fy}, {fx})"
size = {hypot(fx, fy)!r}'''
        for p, (fx, fy) in LOADS.items()
    )
}
"""


@pytest.fixture(scope="module")
def solved() -> FEModel3D:
    frame = FEModel3D()
    for point, (x, y) in PLACES.items():
        frame.add_node(point, x, y, 0.0)
    frame.add_material("steel", 210e9, 80e9, 0.3, 7850.0)
    frame.add_section("bar", 2e-3, 2e-6, 3e-6, 4e-6)
    for bar, edges in BARS.items():
        whole = sum(hypot(*np.subtract(PLACES[b], PLACES[a])) for a, b in edges)
        for a, b in edges:
            frame.add_member(a + b, a, b, "steel", "bar")
            weight = -MASS[bar] * GRAVITY / whole
            frame.add_member_dist_load(a + b, "FY", weight, weight)
    frame.def_releases("HT", Rzj=True)  # the pin at T
    for point in PLACES:
        held = point in "AF"
        frame.def_support(point, held, held, True, True, True, False)
    for point, (fx, fy) in LOADS.items():
        frame.add_node_load(point, "FX", fx)
        frame.add_node_load(point, "FY", fy)
    frame.analyze_linear(check_stability=True)
    return frame


@pytest.mark.parametrize("member", BARS)
def test_a_frame_bent_and_branched(solved: FEModel3D, member: str) -> None:
    found = diagram(members(parse(MODEL)), member)
    edges = {f"{s.start}{s.stop}": s for s in found.stretches}
    assert set(edges) == {a + b for a, b in BARS[member]}
    for name, ours in edges.items():
        theirs = solved.members[name]
        left = 1.0 if PLACES[ours.stop][0] > PLACES[ours.start][0] else -1.0
        size = 2000.0  # [N] and [N m] of the largest; stiffness equations keep about ten figures of it
        for k, x in enumerate(ours.way):
            assert -theirs.axial(x) == pytest.approx(ours.axial[k], abs=1e-7 * size)
            assert left * theirs.shear("Fy", x) == pytest.approx(ours.shear[k], abs=1e-7 * size)
            assert -left * theirs.moment("Mz", x) == pytest.approx(ours.bending[k], abs=1e-7 * size)
