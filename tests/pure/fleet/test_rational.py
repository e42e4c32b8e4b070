"""Rationals made quickly are those that `Fraction` makes, in every respect that the rest relies on."""

import pickle
from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fleet.rational import rational

WHOLE = st.integers(-(10**30), 10**30)


@given(WHOLE, WHOLE.filter(bool))
def test_it_is_the_rational_that_the_class_makes(above: int, below: int) -> None:
    made, known = rational(above, below), Fraction(above, below)
    assert made == known
    assert type(made) is Fraction
    assert made.as_integer_ratio() == (made.numerator, made.denominator) == known.as_integer_ratio()
    assert hash(made) == hash(known)
    assert pickle.loads(pickle.dumps(made)) == known  # noqa: S301 # its own bytes
    assert made + known == 2 * known
    assert str(made) == str(known)


@pytest.mark.parametrize(("above", "below", "parts"), [(0, -7, (0, 1)), (6, -4, (-3, 2)), (-6, -4, (3, 2))])
def test_it_is_reduced_and_its_sign_stands_above(above: int, below: int, parts: tuple[int, int]) -> None:
    assert rational(above, below).as_integer_ratio() == parts


@pytest.mark.parametrize("above", [0, 5, -5])
def test_nothing_below_raises(above: int) -> None:
    with pytest.raises(ZeroDivisionError):
        rational(above, 0)
