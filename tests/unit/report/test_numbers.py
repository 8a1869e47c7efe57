"""Numbers as people read them."""

import pytest

from linkcalc.report.numbers import number, places_for


@pytest.mark.parametrize(
    ("value", "shown"),
    [
        (0.0, "0"),
        (9.9996, "10.00"),
        (99_999.6, "100000"),
        (10_672.3, "10672"),
        (-0.00123456, "-0.001235"),
        (1.5e-7, "1.500e-7"),
        (2.5e9, "2.500e9"),
        (float("nan"), "-"),
        (float("-inf"), "no bound"),
    ],
)
def test_four_significant_digits_unless_the_number_needs_a_power_of_ten(value, shown):
    assert number(value) == shown


def test_what_rounding_left_of_nothing_is_written_as_nothing():
    assert number(-3e-12, zero=1e-9) == "0"
    assert number(-3e-12, places=2) == "0.00"
    assert number(-0.004, places=2) == "0.00"
    assert number(-0.006, places=2) == "-0.01"


def test_zeros_are_left_out_of_a_number_that_stands_alone_but_never_tens():
    assert number(1500.0, trim=True) == "1500"
    assert number(12.30, trim=True) == "12.3"
    assert number(0.5, places=3, trim=True) == "0.5"


def test_places_tell_the_steps_of_a_stroke_apart_and_give_up_on_thirds():
    assert places_for([30.0, 29.5, 29.0]) == 1
    assert places_for([0.0, 1 / 3, 2 / 3]) == 4
    assert places_for([float("nan"), 20.0]) == 0
