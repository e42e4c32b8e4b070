"""Exact arithmetic: each operation against one worked by hand, and sums of unlike parts."""

from fractions import Fraction

import pytest

from loads.balance.exact import added, minus, plus, product, quotient, times, total

F = Fraction


def test_two_rationals_are_multiplied_divided_added_and_taken_from_each_other():
    one, other = F(3, 4), F(-5, 6)

    assert product(one, other) == (-15, 24)
    assert times(one, other) == F(-5, 8)
    assert quotient(one, other) == F(-9, 10)
    assert plus(one, other) == F(-1, 12)
    assert minus(one, other) == F(19, 12)


def test_a_division_by_nothing_is_refused():
    with pytest.raises(ZeroDivisionError):
        quotient(F(1), F(0))


@pytest.mark.parametrize(
    ("ratios", "factor", "sum_"),
    [
        ([], (1, 1), F(0)),
        ([(1, 1), (2, 1)], (1, 1), F(3)),
        ([(1, 6), (1, 4)], (1, 1), F(5, 12)),  # 2/12 + 3/12
        ([(1, 6), (1, 4), (1, 3), (5, 12)], (1, 1), F(7, 6)),  # 2 + 3 + 4 + 5 twelfths
        ([(2, 4), (3, 4)], (1, 1), F(5, 4)),  # unreduced
        ([(1, 6), (1, 4)], (3, 10), F(1, 8)),  # 5/12 * 3/10
    ],
)
def test_a_sum_of_unreduced_parts_is_exact_and_multiplied_once(ratios, factor, sum_):
    assert total(ratios, factor) == sum_
    if factor == (1, 1):
        assert total(ratios) == sum_


def test_rationals_are_added_and_the_sum_of_none_is_nothing():
    assert added([]) == 0
    assert added([F(1, 2), F(1, 3), F(-1, 6)]) == F(2, 3)
