"""The bands belong to the load at both ends, and not a gram beyond."""

from decimal import Decimal
from fractions import Fraction

import pytest

from fleet.quantities import Quantity, Unit
from loads.balance.plausible import (
    ADULT_KG,
    CHILD_KG,
    FUEL_KG_PER_L,
    LAP_INFANT_KG,
    person_band,
    within_band,
)


@pytest.mark.parametrize(
    ("band", "unit", "low", "high"),
    [
        (ADULT_KG, Unit.KG, "20", "250"),
        (CHILD_KG, Unit.KG, "2", "120"),
        (LAP_INFANT_KG, Unit.KG, "1", "25"),
        (FUEL_KG_PER_L, Unit.KG_PER_L, "0.60", "0.95"),
    ],
)
def test_both_ends_are_believed_and_a_thousandth_beyond_is_not(band, unit, low, high):
    step = Decimal("0.001")

    assert within_band(Quantity(Decimal(low), unit), band, unit)
    assert within_band(Quantity(Decimal(high), unit), band, unit)
    assert not within_band(Quantity(Decimal(low) - step, unit), band, unit)
    assert not within_band(Quantity(Decimal(high) + step, unit), band, unit)


def test_a_band_is_asked_in_the_unit_that_was_typed():
    assert within_band(Quantity(Decimal("44.1"), Unit.LB), ADULT_KG, Unit.KG)
    assert not within_band(Quantity(Decimal(44), Unit.LB), ADULT_KG, Unit.KG)
    assert Fraction("0.45359237") * 44 < 20


@pytest.mark.parametrize(
    ("category", "band"),
    [(None, ADULT_KG), ("adult", ADULT_KG), ("child", CHILD_KG), ("infant", CHILD_KG)],
)
def test_a_child_in_its_own_seat_has_a_wider_band(category, band):
    assert person_band(category) is band
