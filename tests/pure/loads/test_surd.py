"""Numbers with one square root: signs and order are exact, also where no decimals would tell."""

from decimal import Decimal, localcontext
from fractions import Fraction

from hypothesis import given
from hypothesis import strategies as st

from loads.balance.surd import Surd, rational, root

F = Fraction
small = st.fractions(-20, 20, max_denominator=12)
positive = st.fractions(0, 30, max_denominator=12)


def approximately(number):
    """The number to 80 digits, by the decimal module: the second judge."""
    with localcontext() as context:
        context.prec = 80
        whole, factor, under = (Decimal(part.numerator) / Decimal(part.denominator) for part in number)
        return whole + factor * under.sqrt()


@given(small, small, positive)
def test_the_sign_is_the_one_that_eighty_digits_show(whole, factor, under):
    number = root(whole, factor, under)
    near = approximately(number)

    if abs(near) > Decimal("1e-60"):
        assert number.sign() == (1 if near > 0 else -1)
    else:
        assert number.sign() == 0


roots = st.builds(root, small, small, positive)


@given(roots, roots)
def test_order_under_unlike_roots_is_the_one_that_eighty_digits_show(one, other):
    way = approximately(one) - approximately(other)

    assert one.below(other) == (way < Decimal("-1e-60"))


def test_what_no_decimals_can_tell_apart_is_told_apart():
    # By hand: (1 + sqrt 2)**2 = 3 + 2 sqrt 2; and sqrt 2 is 1e-40 above a rational that is close to it.
    assert not Surd(F(3), F(2), F(2)).below(root(F(3), F(1), F(8)))
    assert not root(F(3), F(1), F(8)).below(Surd(F(3), F(2), F(2)))
    close = Surd(F(0), F(1), F(2)).floor(400)
    assert Surd(-close, F(1), F(2)).sign() == 1
    assert rational(close).below(Surd(F(0), F(1), F(2)))


@given(small, small, positive, st.integers(1, 90))
def test_a_number_rounded_down_is_never_above_it_and_no_farther_than_was_asked(whole, factor, under, bits):
    number = root(whole, factor, under)
    floor = number.floor(bits)

    assert not number.below(rational(floor))
    assert number.below(rational(floor + F(2, 2**bits)))


def test_a_root_that_is_rational_is_kept_as_a_rational():
    assert root(F(1), F(3), F(9, 4)) == rational(F(11, 2))
    assert rational(F(-1, 7)).floor(5) == F(-1, 7)
    assert (rational(F(0)).sign(), rational(F(-2)).sign()) == (0, -1)
