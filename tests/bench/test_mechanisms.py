"""Every competitor must be given the same linkage: what linkcalc draws is what the peers were given."""

from __future__ import annotations

import numpy as np
import pytest

from linkcalc.model.mechanism import Mechanism
from linkcalc.model.sketch import Drawing
from tests.bench import mechanisms
from tests.bench.peers import linkages
from tests.reference.linkage import Linkage

PAIRS = {
    "four-bar": (mechanisms.fourbar(), linkages.fourbar()),
    "six-bar": (mechanisms.sixbar(), linkages.sixbar()),
    "tongs by turn": (mechanisms.lazy_tongs(3), linkages.lazy_tongs(3)),
    "tongs by distance": (mechanisms.lazy_tongs(2, by_distance=True), linkages.lazy_tongs(2, by_distance=True)),
}


@pytest.mark.parametrize(("mechanism", "linkage"), PAIRS.values(), ids=PAIRS.keys())
def test_the_same_places_and_members(mechanism: Mechanism, linkage: Linkage) -> None:
    places = Drawing(mechanism).points
    assert places.keys() == linkage.places.keys()
    for name, place in linkage.places.items():
        assert places[name] == pytest.approx(place, abs=1e-12), name
    assert {name: member.points for name, member in mechanism.members.items()} == linkage.bodies


def test_a_batch_of_link_lengths_redraws_the_four_bar() -> None:
    sizes = {name: size + np.array([0.0, 1e-3, -1e-3]).reshape(1, 3, 1) for name, size in linkages.FOURBAR.items()}
    places = Drawing(mechanisms.fourbar(), sizes).points

    def apart(p: str, q: str) -> np.ndarray:
        (px, py), (qx, qy) = places[p], places[q]
        return np.hypot(qx - px, qy - py)

    for name, ends in {"frame": "AD", "crank": "AB", "coupler": "BC", "rocker": "DC"}.items():
        np.testing.assert_allclose(apart(*ends), sizes[name], rtol=0, atol=1e-12)
