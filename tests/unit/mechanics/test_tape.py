"""A tape replays what was recorded, whatever was folded away: held against plain evaluation of the same program."""

from __future__ import annotations

import numpy as np
from hypothesis import example, given
from hypothesis import strategies as st

from linkcalc.mechanics.tape import Operand, Tape, is_constant

INPUTS = 4
ROUNDING = 1e-12
"""Of the largest value on the way: folding changes the order of a few dozen products and sums."""
WIDE = 1e6
"""Programs whose values leave 1/WIDE .. WIDE on the way lose figures by themselves, not by the tape."""

Step = tuple[str, int, int]
"""(operation, number of the first operand, of the second), counted round among all values so far"""

constants = st.sampled_from([0.0, 1.0, -1.0, 0.5, -2.0, 3.25])
steps = st.tuples(st.sampled_from(["times", "over", "less"]), st.integers(0, 40), st.integers(0, 40))
PLAIN = {"times": np.multiply, "over": np.divide, "less": np.subtract}


def run(program: list[Step], fixed: list[float], inputs: list[np.ndarray]) -> tuple[list[np.ndarray], list[np.ndarray]]:
    """What the tape gives for the last half of the values, and what plain arithmetic gives."""
    tape = Tape(INPUTS)
    recorded: list[Operand] = [*fixed, *range(1, INPUTS + 1)]
    plain = [*(np.full(inputs[0].shape, f) for f in fixed), *inputs]
    for name, a, b in program:
        a, b = a % len(recorded), b % len(recorded)
        value = PLAIN[name](plain[a], plain[b])
        sound = np.isfinite(value).all() and np.all(
            (np.abs(value) < WIDE) & ((value == 0) | (np.abs(value) > 1 / WIDE))
        )
        if not sound or (name == "over" and np.abs(plain[b]).min() < 1 / WIDE):
            continue
        recorded.append(getattr(tape, name)(recorded[a], recorded[b]))
        plain.append(value)
    half = len(recorded) // 2
    tape.finish(recorded[half:])
    return [np.broadcast_to(v, inputs[0].shape) for v in tape.play(inputs)], plain[half:]


@given(st.lists(steps, max_size=25), st.lists(constants, min_size=1, max_size=4), st.integers(0, 2**31))
@example([("less", 0, 1), ("times", 5, 5), ("over", 5, 6)], [0.0], 1)  # the sign of a negative register
@example([("less", 1, 0), ("less", 0, 4), ("less", 5, 4), ("less", 4, 5)], [0.0], 2)  # all four signs of a sum
@example([("over", 1, 2), ("over", 0, 1), ("times", 0, 5)], [-1.0], 3)  # a constant over a register
def test_replay_is_plain_evaluation(program: list[Step], fixed: list[float], seed: int) -> None:
    rng = np.random.default_rng(seed)
    inputs = list(rng.uniform(0.5, 2.0, (INPUTS, 1, 2, 3)) * rng.choice([-1, 1], (INPUTS, 1, 2, 3)))
    for got, wanted in zip(*run(program, fixed, inputs), strict=True):
        np.testing.assert_allclose(got, wanted, rtol=1e-9, atol=ROUNDING * WIDE)


def test_constants_and_signs_are_folded() -> None:
    tape = Tape(1)
    assert tape.times(1, 0.0) == 0.0 and is_constant(tape.times(1, 0.0))
    assert tape.times(1, 1.0) == 1 and tape.times(-1.0, 1) == -1
    assert tape.less(0.0, 1) == -1 and tape.less(1, 0.0) == 1
    assert tape.over(0.0, 1) == 0.0
    assert tape.times(3.0, 4.0) == 12.0 and tape.less(3.0, 4.0) == -1.0 and tape.over(3.0, 4.0) == 0.75
    assert len(tape.finish([tape.times(-1, -1.0)])) == 0


def test_only_steps_that_lead_to_an_output_are_played() -> None:
    tape = Tape(2)
    wanted = tape.times(1, 2)
    tape.less(1, 2)
    tape.times(tape.less(2, 1), 2)
    assert len(tape.finish([wanted, 5.0])) == 1
    assert tape.play([np.array(3.0), np.array(4.0)]) == [12.0, 5.0]


def test_inputs_are_left_as_they_were() -> None:
    """The arrays belong to the caller: a replay writes into none of them, and can be made again."""
    tape = Tape(2)
    out = tape.finish([tape.less(tape.times(1, 2), tape.over(1, 2)), 1, -2])
    inputs = [np.array([1.0, 2.0]), np.array([3.0, 4.0])]
    kept = [i.copy() for i in inputs]
    first = out.play(inputs)
    second = out.play(inputs)
    for a, b in zip(inputs, kept, strict=True):
        np.testing.assert_array_equal(a, b)
    for a, b in zip(first, second, strict=True):
        np.testing.assert_array_equal(a, b)


def test_inputs_broadcast() -> None:
    tape = Tape(2)
    out = tape.finish([tape.times(1, 2)])
    (product,) = out.play([np.ones((3, 1, 1)), np.arange(5.0).reshape(1, 1, 5)])
    assert product.shape == (3, 1, 5)
