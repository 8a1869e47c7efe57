"""Springs whose places are searched: against a grid, by hand, limits kept, the same answer for the same seed."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from linkcalc import balance, dumps, parse, read, stroke
from linkcalc.design.balance_answer import BalanceAnswer
from tests.unit.design.balancing import HATCH

EXAMPLES = Path(__file__).parents[3] / "examples"


@pytest.fixture(scope="module")
def hatch() -> BalanceAnswer:
    return balance(parse(HATCH), starts=12)


def _by_hand(turn: np.ndarray, foot: np.ndarray, hook: np.ndarray, push: np.ndarray) -> np.ndarray:
    """[N] hand at the grip for a push apart [N]: moments of weight and push about the hinge. Arrays broadcast."""
    x, y = hook[0] * np.cos(turn) - hook[1] * np.sin(turn), hook[0] * np.sin(turn) + hook[1] * np.cos(turn)
    length = np.hypot(x - foot[0], y - foot[1])
    moment = push * (x * (y - foot[1]) - y * (x - foot[0])) / length
    return (18 * 9.80665 * 0.42 * np.cos(turn) - moment) / 0.9


def _gas(turn: np.ndarray, foot: np.ndarray, hook: np.ndarray) -> np.ndarray:
    """Force for 1 N fully extended, by the gas law, nan where the spring does not reach."""
    x, y = hook[0] * np.cos(turn) - hook[1] * np.sin(turn), hook[0] * np.sin(turn) + hook[1] * np.cos(turn)
    into = 0.7 - np.hypot(x - foot[0], y - foot[1])
    force = 1 / (1 - into * (1 - 1 / 1.3) / 0.31)
    return np.where((into >= -1e-9) & (into <= 0.31 + 1e-9), force, np.nan)


def test_no_place_of_a_grid_is_better(hatch: BalanceAnswer) -> None:
    """All places of a grid by hand formulas, the best force at each by trial: none beats what was found."""
    turn = np.radians(np.linspace(0, 80, 41))
    best = np.inf
    for x in np.linspace(0.05, 0.3, 26):
        for y in np.linspace(-0.35, -0.1, 26):
            hooks = np.array([np.linspace(0.2, 0.7, 51), np.zeros(51)])[:, :, None]
            foot = np.array([x, y])
            unit = _gas(turn, foot, hooks)
            sound = ~np.isnan(unit).any(axis=1)
            if not sound.any():
                continue
            bare = _by_hand(turn, foot, hooks[:, sound], 0.0 * unit[sound])
            arm = bare - _by_hand(turn, foot, hooks[:, sound], unit[sound])
            forces = np.linspace(50, 1200, 461)
            peak = np.abs(bare[..., None] - arm[..., None] * forces).max(axis=1).min()
            best = min(best, float(peak))
    found = abs(hatch.peak_after.value)
    assert found <= best
    assert found >= 0.8 * best


def test_it_is_what_the_formulas_by_hand_give(hatch: BalanceAnswer) -> None:
    found = hatch.found[0]
    foot = np.array([found.size("x of the first end"), found.size("y of the first end")])
    hook = np.array([0.2 + found.size("from R1 of the second end"), 0.0])
    turn = hatch.after.drive[0, 0]
    effort = _by_hand(turn, foot, hook, found.size("force") * _gas(turn, foot, hook))
    np.testing.assert_allclose(hatch.after.effort[0, 0], effort, atol=1e-8)


def test_the_same_seed_gives_the_same_answer(hatch: BalanceAnswer) -> None:
    again = balance(parse(HATCH), starts=12)
    assert again.found == hatch.found
    assert (again.starts, again.alike, again.seed) == (hatch.starts, hatch.alike, hatch.seed) == (12, hatch.alike, 1)


def test_another_seed_comes_to_the_same_effort(hatch: BalanceAnswer) -> None:
    assert balance(parse(HATCH), starts=12, seed=7).peak_after.value == pytest.approx(hatch.peak_after.value, rel=1e-3)


def test_progress_is_told_start_by_start() -> None:
    told: list[tuple[int, int]] = []
    balance(parse(HATCH), starts=3, progress=lambda done, whole: told.append((done, whole)))
    assert told == [(1, 3), (2, 3), (3, 3)]


def test_the_written_model_gives_the_told_effort(hatch: BalanceAnswer) -> None:
    again = stroke(parse(dumps(hatch.after.mechanism)))
    np.testing.assert_allclose(again.effort, hatch.after.effort, rtol=1e-9, atol=1e-12)


def test_the_roof_hatch_by_the_lines_of_its_head() -> None:
    """Both ends of the stroke by the hand calculation of the example, springs new and hot, and old and cold."""
    answer = balance(read(EXAMPLES / "roof_hatch.toml"), starts=8)
    found = answer.found[0]
    foot = np.array([found.size("x of the first end"), found.size("y of the first end")])
    hook = np.array([0.25 + found.size("from lid_1 of the second end"), -0.03])
    force = found.size("force")
    assert force % 50 == pytest.approx(0, abs=1e-9)
    cases = {"cold aged": 263.15 / 293.15 * 0.9, "hot": 313.15 / 293.15}
    for case, factor in cases.items():
        for pose, turn in ((0, 0.0), (-1, np.radians(75))):
            c, s = np.cos(turn), np.sin(turn)
            x, y = hook[0] * c - hook[1] * s, hook[0] * s + hook[1] * c
            length = np.hypot(x - foot[0], y - foot[1])
            push = 2 * factor * force / (1 - (0.685 - length) * (1 - 1 / 1.3) / 0.3)
            moment = push * (x * (y - foot[1]) - y * (x - foot[0])) / length
            hand = 34 * 9.80665 * 0.5 * c - moment
            k = answer.after.cases.index(case)
            assert answer.after.effort[k, 0, pose] == pytest.approx(hand, abs=1e-6)
            if (case, pose) == ("hot", 0):
                assert hand >= 5 - 1e-6  # stays shut
            if (case, pose) == ("cold aged", -1):
                assert hand <= -10 + 1e-6  # stays open
    assert all(stay.holds for stay in answer.stays)
    assert answer.after.cases == ("cold", "cold aged", "hot", "hot aged")
    # shut and new in the heat at least 5 N must be left, so old and cold at least 166.7 - 161.7/1.3223 = 44.4 N are
    least = 166.713 - (166.713 - 5) * (263.15 * 0.9) / 313.15
    assert abs(answer.peak_after.value) >= least - 1e-3


COIL = """
[points]
A = [0, 0]
S = [30, 260]
R = [150, 0]
G = [500, 0]
[members]
ground = ["A", "S"]
arm = { points = ["A", "R", "G"], mass = 10, centre = "G" }
[effort]
torque_on = "arm"
[stroke]
turn = "arm"
from = -40
to = 55
[balance.find.coil]
spring = ["S", "R"]
free_length = [60, 140]
acts = "tension"
rate = [0, 20]
"""


def test_rate_and_free_length_are_the_best_of_a_grid() -> None:
    """Rates and free lengths of a grid, judged by moments about the pivot by hand; never slack."""
    answer = balance(parse(COIL))
    turn = np.radians(np.linspace(-40, 55, 61))
    x, y = 0.15 * np.cos(turn), 0.15 * np.sin(turn)
    length = np.hypot(x - 0.03, y - 0.26)
    arm = (x * (y - 0.26) - y * (x - 0.03)) / length  # moment about A of 1 N apart
    rate, free = (v[..., None] for v in np.meshgrid(np.linspace(0, 20000, 401), np.linspace(0.06, 0.14, 81)))
    effort = 10 * 9.80665 * 0.5 * np.cos(turn) - rate * (free - length) * arm
    peak = np.where((length.min() >= free)[..., 0], np.abs(effort).max(axis=-1), np.inf)
    found = abs(answer.peak_after.value)
    assert found <= peak.min() * (1 + 1e-6)
    assert found >= 0.9 * peak.min()
    assert answer.after.reading("force of coil").max() <= 1e-9
    assert 0.06 - 1e-9 <= answer.found[0].size("free length") <= 0.14 + 1e-9


def test_several_springs_share_the_force() -> None:
    one = balance(parse(COIL))
    two = balance(parse(COIL + "number = 2\n"))
    assert two.found[0].size("rate") == pytest.approx(one.found[0].size("rate") / 2, rel=1e-6)
    assert two.peak_after.value == pytest.approx(one.peak_after.value, rel=1e-6)
    assert {"coil", "coil_2"} <= set(two.after.mechanism.loads)


def test_what_takes_the_place_of_a_load_is_judged_by_its_requirements() -> None:
    text = (EXAMPLES / "hatch.toml").read_text(encoding="utf-8")
    more = (
        '[balance.find.strut]\ngas_spring = ["F", "R"]\nlength = 700\nstroke = 310\nrise = 1.3\nforce = [100, 400]\n'
        'force_step = 10\ninstead_of = "strut"\n'
    )
    answer = balance(parse(text + more))
    assert list(answer.after.mechanism.loads) == ["strut"]
    assert [v.name for v in answer.after.verdicts] == ["light", "stays_open", "hinge", "room"]
    # best of all forces of the steps, each by a stroke of its own
    peaks = {}
    for force in range(150, 260, 10):
        plain = parse(text)
        strut = replace(plain.loads["strut"], force=force)
        peaks[force] = float(np.abs(stroke(replace(plain, loads={"strut": strut}, requirements={})).effort).max())
    assert answer.found[0].size("force") == pytest.approx(min(peaks, key=peaks.get), abs=1e-9)  # type: ignore[arg-type]


def test_springs_that_lose_force_are_judged_new_and_aged() -> None:
    answer = balance(parse(COIL + "loss = 0.2\n"))
    assert answer.after.cases == ("new", "aged")
    assert answer.lasting == (0, 0)
    new, aged = answer.after.reading("force of coil")[:, 0]
    np.testing.assert_allclose(aged, 0.8 * new, rtol=1e-12)
    assert np.abs(answer.after.effort).max() <= abs(answer.peak_after.value) * (1 + 1e-9)


def test_a_spring_without_seals_takes_the_place_of_one_that_rubs() -> None:
    """The hatch of the examples comes in both senses of motion, with the new spring in one only: told side by side."""
    text = (EXAMPLES / "hatch.toml").read_text(encoding="utf-8")
    more = (
        '[balance.find.new]\ngas_spring = ["F", "R"]\nlength = 700\nstroke = 310\nforce = [100, 400]\nloss = 0.1\n'
        'instead_of = "strut"\n'
    )
    model = replace(parse(text), requirements={})
    answer = balance(parse(dumps(model) + more))
    assert answer.before.rubs and not answer.after.rubs
    assert [answer.before.cases[k] for k in answer.lasting] == ["cold", "cold", "mild", "mild", "hot", "hot"]
    assert answer.foretold == pytest.approx(abs(answer.peak_after.value), rel=1e-6)
