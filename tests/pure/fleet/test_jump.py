"""The step between two empty weights against a threshold.

AMC1 CAT.POL.MAB.100(b) (read): 0.5 % of the maximum landing mass; "exceeds", so equal does not.
"""

from dataclasses import replace
from decimal import Decimal
from fractions import Fraction

import pytest

from fleet.jump import jump_of
from tests.pure.loads.making import twin, twin_empty, with_limits

HALF = Decimal("0.5")


def jump(change, basis=None):
    before = twin_empty()
    return jump_of(before, replace(before, weight=before.weight + Fraction(change)), HALF, basis or twin())


@pytest.mark.parametrize(
    ("change", "needs"),
    [("32.5", False), ("-32.5", False), ("32.501", True), ("-32.501", True), ("0", False)],
)
def test_half_a_percent_of_the_landing_limit_of_6500_is_32_and_a_half(change, needs):
    found = jump(change)

    assert found.most == Fraction("32.5")
    assert found.needs_cause is needs
    assert found.difference == Fraction(change)


def test_without_a_landing_limit_that_of_take_off_counts():
    assert jump("1", with_limits(take_off=6800, landing=None)).most == 34


def test_without_either_any_change_needs_a_cause():
    basis = with_limits(ramp=6840)

    assert jump("0.1", basis).needs_cause
    assert not jump("0", basis).needs_cause
