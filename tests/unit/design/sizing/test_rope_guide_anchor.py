"""Ropes, guides and standing frames: hand calculations."""

from __future__ import annotations

import numpy as np
import pytest
from scipy.integrate import quad

from linkcalc.design.sizing.anchor import Footing, standing
from linkcalc.design.sizing.guide import guide
from linkcalc.design.sizing.rope import rope
from linkcalc.faults import Faults


def test_a_rope() -> None:
    found = rope(np.array([800.0, 2000.0]), 20e3, 5.0)
    np.testing.assert_allclose(found.utilisation, [0.2, 0.5])
    assert any("lifting" in c for c in found.cautions)
    with pytest.raises(Faults, match="factor against breaking: 0 cannot stand here"):
        rope(1.0, 1.0, 0.0)
    with pytest.raises(Faults, match="least breaking load, by its maker: -1 cannot stand here"):
        rope(1.0, -1.0, 5.0)


def test_a_guide_balances() -> None:
    """The straight pressure carries force and moment: its integrals along the block are N and M."""
    length, width, normal, moment = 0.08, 0.02, 1200.0, 30.0
    found = guide(normal, -moment, length, width, 10e6)
    mean, more = float(found["p_mean"]), float(found["p_moment"])

    def pressure(x: float) -> float:
        return (mean + more * x / (length / 2)) * width

    assert quad(pressure, -length / 2, length / 2)[0] == pytest.approx(normal)
    assert quad(lambda x: pressure(x) * x, -length / 2, length / 2)[0] == pytest.approx(moment)
    assert found["p_edge"] == pytest.approx(pressure(length / 2) / width)
    assert found.utilisation == pytest.approx(float(found["p_edge"]) / 10e6)
    # bearing at both ends only: N/2 ± M/l
    assert found["F_end"] == pytest.approx(600 + 375)


def test_a_guide_of_no_length() -> None:
    with pytest.raises(Faults, match="length of the guided block: 0 cannot stand here"):
        guide(1.0, 1.0, 0.0, 0.01)


def test_a_frame_that_tips() -> None:
    """500 N at the middle of 1 m; 100 N to the right at 1 m above the ground turns it about its right foot with
    100 N m, against 250 N m: factor 2.5."""
    found = standing(np.array([[100.0, 0.0]]), np.array([[0.2, 1.0]]), np.array(0.0), Footing(0, 1, 0, 500, 0.5), 2.0)
    assert found["tip_right"] == pytest.approx(100)
    assert found["tip_left"] == 0
    assert found.utilisation == pytest.approx(2.0 / 2.5)
    assert found.governs == "tipping about the right foot"
    assert found["mu"] == pytest.approx(0.2)


def test_a_lift_at_the_edge_tips_about_the_other_foot() -> None:
    """200 N upward at the right foot of the same frame: 200 N m about the left, held by 250 N m."""
    found = standing(np.array([[0.0, 200.0]]), np.array([[1.0, 0.3]]), np.array(0.0), Footing(0, 1, 0, 500, 0.5), 1.0)
    assert found["tip_left"] == pytest.approx(200)
    assert found.utilisation == pytest.approx(0.8)
    assert found["N"] == pytest.approx(300)


def test_a_batch_of_frames() -> None:
    forces = np.array([[[100.0, -100.0], [0.0, 0.0]]])
    found = standing(forces, np.array([[0.5, 1.0]]), np.zeros(2), Footing(0, 1, 0, 500, 0.4), 1.0)
    np.testing.assert_allclose(found.utilisation, [100 / 300, 100 / 200])


@pytest.mark.parametrize(
    ("footing", "says"),
    [
        (Footing(1, 1, 0, 500, 1), "between the feet: 0 cannot stand here"),
        (Footing(0, 1, 0, 0, 0.5), "weight that holds it down: 0 cannot stand here"),
        (Footing(0, 1, 0, 500, 1.5), "the weight does not stand between the feet"),
    ],
)
def test_faults(footing: Footing, says: str) -> None:
    with pytest.raises(Faults, match=says):
        standing(np.array([[1.0, 0.0]]), np.array([[0.5, 1.0]]), np.array(0.0), footing, 1.0)
