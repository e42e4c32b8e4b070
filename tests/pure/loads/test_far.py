"""When floats can tell that a polynomial of two figures is nothing nowhere: where every part of the sum that
it is (Bernstein's) is of one sign, and none of them small. The polynomials here are made from such parts, so
what they are is known.
"""

from fractions import Fraction
from itertools import product
from math import comb

import pytest

from loads.balance.far import far_from_nothing
from loads.balance.polynomial import Poly, add, multiply, scale

F = Fraction
UNIT = (F(0), F(1))
HERE, THERE = (F(2), F(4)), (F(-3), F(-1))


def power(base: Poly, exponent: int) -> Poly:
    found: Poly = (F(1),)
    for _ in range(exponent):
        found = multiply(found, base)
    return found


def basis(degree, at, ends):
    """The part of a number in the sum: comb(n, at) (x - low)**at (high - x)**(n - at) / (high - low)**n."""
    low, high = ends
    part = multiply(power((-low, F(1)), at), power((high, F(-1)), degree - at))
    return scale(part, comb(degree, at) / (high - low) ** degree)


def of_parts(parts, ends):
    """The polynomial of one figure that is the sum of these parts."""
    degree = len(parts) - 1
    return add(*(scale(basis(degree, at, ends), F(each)) for at, each in enumerate(parts)))


def margin(table, ends, reach):
    """The polynomial of x and t of a table of parts, a row a part of t; rows of floats by the power of t."""
    degree = len(table) - 1
    rows = [(F(0),)] * (degree + 1)
    for at, parts in enumerate(table):
        of_x = of_parts(parts, ends)
        for further, each in enumerate(basis(degree, at, reach)):
            rows[further] = add(rows[further], scale(of_x, each))
    return [[float(each) for each in row] for row in rows]


def far(table, ends=HERE, reach=THERE):
    return far_from_nothing(margin(table, ends, reach), ends, reach)


SIZES = [(across, along) for across in (1, 2, 3, 4) for along in (1, 2, 3)]
# Unlike numbers, none of them small.
NUMBERS = (5, 1, 3, 2, 7, 1, 4, 2, 1, 6, 3, 1)


def unlike(across, along, sign):
    """A table of unlike numbers."""
    return [[sign * NUMBERS[row * across + at] for at in range(across)] for row in range(along)]


@pytest.mark.parametrize(("across", "along"), SIZES)
@pytest.mark.parametrize("sign", [1, -1])
def test_a_polynomial_all_of_whose_parts_are_of_one_sign_is_far_from_nothing(across, along, sign):
    table = unlike(across, along, sign)

    assert far(table) is True
    assert far(table, THERE, UNIT) is True


@pytest.mark.parametrize(("across", "along"), SIZES[1:])
@pytest.mark.parametrize("sign", [1, -1])
def test_one_part_of_the_other_sign_or_next_to_nothing_is_enough_that_it_may_not_be(across, along, sign):
    for row, at in product(range(along), range(across)):
        for other in (-0.125, 0, 1e-13):
            table = unlike(across, along, sign)
            table[row][at] = sign * F(other)
            assert far(table) is False, (row, at, other)


def test_a_row_of_a_lower_degree_counts_for_what_it_is():
    """At t = 0 the parts are 4, 3, 2, 1; what t adds is -3 to 0 evenly, by thirds -3, -2, -1, 0: 1 all along
    at t = 1. One part less by 1.5 is below nothing there and above at t = 0.
    """
    more = [float(each) for each in of_parts((-3, 0), HERE)]
    for less in range(5):
        parts = [each - (1.5 if at == less else 0) for at, each in enumerate((4, 3, 2, 1))]
        if less == 3:
            parts[3] = -0.5
        row = [float(each) for each in of_parts([F(each) for each in parts], HERE)]
        assert far_from_nothing([row, more], HERE, UNIT) is (less == 4)
        assert far_from_nothing([[-each for each in one] for one in (row, more)], HERE, UNIT) is (less == 4)


def test_a_row_that_is_one_number_counts_all_along():
    row = [float(each) for each in of_parts((2, 3, 1), HERE)]

    assert far_from_nothing([row, [-0.5]], HERE, UNIT) is True
    assert far_from_nothing([row, [-1.5]], HERE, UNIT) is False
    assert far_from_nothing([[1.0], [float(each) for each in of_parts((0, -1.5), HERE)]], HERE, UNIT) is False


@pytest.mark.parametrize("reach", [(F(10**6), F(2 * 10**6)), (F(-2 * 10**6), F(-(10**6)))])
def test_what_is_small_against_what_it_was_made_of_is_not_far(reach):
    """From 10**6 up, t less 10**6 by a hair: the sums are made of 2 * 10**6, so 0.002 is not sure."""
    sign = 1 if reach[0] > 0 else -1
    for hair, sure in ((0.0015, False), (0.01, True)):
        assert far_from_nothing([[hair - 10**6], [float(sign)]], UNIT, reach) is sure


def test_within_one_the_numbers_themselves_are_what_it_was_made_of():
    """From 0 to 1/10, a number against 1 in the power of t: 2 * 10**-9 is sure, 5 * 10**-10 is not."""
    near = (F(0), F(1, 10))

    assert far_from_nothing([[2e-9], [1.0]], UNIT, near) is True
    assert far_from_nothing([[5e-10], [1.0]], UNIT, near) is False
    assert far_from_nothing([[-2e-9], [-1.0]], UNIT, near) is True
    assert far_from_nothing([[-5e-10], [-1.0]], UNIT, near) is False
