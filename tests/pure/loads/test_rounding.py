"""What is printed tells the same as the numbers, whatever the numbers are."""

from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fleet.quantities import Unit
from loads.balance.rounding import (
    CHORD_PLACES,
    LENGTH_PLACES,
    MOMENT_PLACES,
    VOLUME_PLACES,
    WEIGHT_PLACES,
    against_maximum,
    against_minimum,
    between,
    printed,
    room,
)

F = Fraction

rationals = st.fractions(min_value=-20000, max_value=20000, max_denominator=997)
digits = st.integers(min_value=0, max_value=4)


@pytest.mark.parametrize(
    ("value", "places", "direction", "text"),
    [
        (F(8712), 1, "nearest", "8712"),
        (F("131.425"), 2, "nearest", "131.43"),
        (F("-131.425"), 2, "nearest", "-131.43"),
        (F("0.04"), 1, "nearest", "0"),
        (F("-0.04"), 1, "nearest", "0"),
        (F("-0.04"), 1, "down", "-0.1"),
        (F("37.99"), 1, "down", "37.9"),
        (F("37.91"), 1, "up", "38"),
        (F(1, 3), 0, "up", "1"),
        (F("100.50"), 2, "nearest", "100.5"),
        (F("-7.05"), 2, "nearest", "-7.05"),
    ],
)
def test_a_number_prints_in_the_direction_asked_for(value, places, direction, text):
    assert printed(value, places, direction) == text


@given(rationals, digits)
def test_down_never_prints_more_and_up_never_less_and_neither_is_a_digit_off(value, places):
    low, high = F(printed(value, places, "down")), F(printed(value, places, "up"))

    assert low <= value <= high
    assert high - low <= F(1, 10**places)
    assert abs(F(printed(value, places)) - value) * 2 <= F(1, 10**places)


@given(rationals, rationals, digits)
def test_a_pass_never_prints_beyond_its_limit_and_a_failure_is_seen_as_one(actual, limit, places):
    shown, bound, used = against_maximum(actual, limit, places)

    assert F(bound) <= limit
    assert (F(shown) <= F(bound)) == (actual <= limit)
    assert used >= places


@given(rationals, rationals, digits)
def test_the_same_holds_below_a_minimum(actual, limit, places):
    shown, bound, _ = against_minimum(actual, limit, places)

    assert F(bound) >= limit
    assert (F(shown) >= F(bound)) == (actual >= limit)


@given(rationals, rationals, rationals, digits)
def test_a_stretch_never_prints_wider_and_the_actual_prints_on_its_own_side(actual, one, other, places):
    low, high = min(one, other), max(one, other)
    shown, least, most, used = between(actual, low, high, places)

    if used < 15:
        assert low <= F(least) <= F(most) <= high
    assert (F(least) <= F(shown) <= F(most)) == (low <= actual <= high)


def test_the_next_digit_is_printed_when_the_limit_is_missed_by_less_than_one():
    shown, bound, used = against_maximum(F("85.7004"), F("85.7"), 1)

    assert (shown, bound, used) == ("85.7004", "85.7", 4)


def test_a_failure_by_less_than_any_digit_still_prints_above_its_limit():
    shown, bound, _ = against_maximum(F(8750) + F(1, 10**40), F(8750), 1)

    assert F(shown) > F(bound)


def test_room_rounds_down_and_excess_rounds_up():
    assert room(F("41.96"), 1) == "41.9"
    assert room(F("-41.96"), 1) == "42"
    assert room(F("-0.0001"), 1) == "0.1"


@pytest.mark.parametrize(
    ("unit", "arm", "moment"),
    [
        (Unit.IN, "0.33", "0.3"),
        (Unit.MM, "0.3", "0"),
        (Unit.CM, "0.33", "0.3"),
        (Unit.M, "0.3333", "0.333"),
        (Unit.FT, "0.333", "0.33"),
    ],
)
def test_every_unit_has_its_digits(unit, arm, moment):
    assert printed(F(1, 3), LENGTH_PLACES[unit]) == arm
    assert printed(F(1, 3), MOMENT_PLACES[unit]) == moment
    assert [printed(F(1, 3), places) for places in (WEIGHT_PLACES, VOLUME_PLACES, CHORD_PLACES)] == [
        "0.3"
    ] * 3


def test_what_is_beyond_a_limit_by_less_than_any_digit_shown_is_printed_outward() -> None:
    """One part in 10^20 above 1, and below -1: the fifteenth digit is the last that is shown."""
    hair = F(1, 10**20)

    assert between(1 + hair, F(0), F(1), 2) == ("1.000000000000001", "0", "1", 15)
    assert between(-1 - hair, F(-1), F(0), 2) == ("-1.000000000000001", "-1", "0", 15)


def test_a_stretch_too_narrow_for_any_digit_shown_prints_its_ends_to_the_nearest() -> None:
    """Between a third and a hair more no number of fifteen digits lies."""
    third, hair = F(1, 3), F(1, 10**20)
    shown = "0.333333333333333"

    assert between(third, third, third + hair, 2) == (shown, shown, shown, 15)


def test_an_actual_is_printed_to_the_nearest_digit_within_its_stretch() -> None:
    assert between(F("1.006"), F(0), F(2), 2) == ("1.01", "0", "2", 2)
    assert between(F("1.004"), F("1.004"), F(2), 2) == ("1.01", "1.01", "2", 2)
    assert between(F("1.996"), F(0), F("1.996"), 2) == ("1.99", "0", "1.99", 2)
