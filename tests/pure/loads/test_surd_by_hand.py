"""Numbers with one square root, each figure worked by hand: signs, order, and rounding down."""

from fractions import Fraction

import pytest

from loads.balance.surd import Surd, rational, root

F = Fraction

# (whole, factor, under): what it is, with the decimals beside it.
SIGNS = [
    (0, 0, 0, 0),
    (3, 0, 0, 1),
    (-3, 0, 0, -1),
    (3, 0, 7, 1),
    (0, 2, 3, 1),
    (0, -2, 3, -1),
    (0, 5, 0, 0),  # a root of nothing
    (-1, 5, 0, -1),
    (1, -5, 0, 1),
    (1, 1, 2, 1),
    (-1, -1, 2, -1),
    (1, -1, 2, -1),  # 1 - 1.414
    (2, -1, 2, 1),  # 2 - 1.414
    (-1, 1, 2, 1),
    (-2, 1, 2, -1),
    (2, -1, 4, 0),  # 2 - 2
    (-2, 1, 4, 0),
    (3, -3, 2, -1),  # 3 - 4.243
    (F(3, 2), -1, 2, 1),  # 1.5 - 1.414
    (F(7, 5), -1, 2, -1),  # 1.4 - 1.414
    (1, F(-1, 2), 3, 1),  # 1 - 0.866
    (1, F(-2, 3), 3, -1),  # 1 - 1.155
]


@pytest.mark.parametrize(("whole", "factor", "under", "sign"), SIGNS)
def test_the_sign_of_a_number_is_exact(whole, factor, under, sign):
    assert Surd(F(whole), F(factor), F(under)).sign() == sign


RISING = [
    Surd(F(-1), F(-2), F(3)),  # -4.464
    Surd(F(0), F(-1), F(5)),  # -2.236
    rational(F(-2)),
    Surd(F(1), F(-1), F(8)),  # -1.828
    Surd(F(-3), F(1), F(2)),  # -1.586
    Surd(F(2), F(-1), F(10)),  # -1.162
    Surd(F(-1), F(1, 3), F(2)),  # -0.529
    rational(F(-1, 2)),
    rational(F(0)),
    Surd(F(-1), F(1), F(2)),  # 0.4142
    Surd(F(0), F(1, 4), F(3)),  # 0.4330
    rational(F(1, 2)),
    Surd(F(-3, 2), F(1), F(5)),  # 0.7361
    Surd(F(3), F(-1), F(5)),  # 0.7639
    rational(F(1)),
    Surd(F(3), F(-1, 2), F(11)),  # 1.3417
    Surd(F(0), F(1), F(2)),  # 1.41421
    rational(F(99, 70)),  # 1.41429
    Surd(F(1), F(1), F(1, 5)),  # 1.4472
    Surd(F(0), F(1), F(3)),  # 1.732
    Surd(F(-1), F(2), F(2)),  # 1.828
    Surd(F(5), F(-1), F(7)),  # 2.354
    Surd(F(1), F(1), F(2)),  # 2.414
    Surd(F(1), F(1), F(3)),  # 2.732
]


@pytest.mark.parametrize("place", range(len(RISING)))
def test_each_number_of_a_rising_row_is_below_all_that_follow_and_no_other(place):
    number = RISING[place]

    assert [number.below(other) for other in RISING] == [at > place for at in range(len(RISING))]


def test_one_number_written_in_two_ways_is_not_below_itself():
    # 1 + sqrt 8 and 1 + 2 sqrt 2; and the root of nothing, whatever stands before it.
    one, other = Surd(F(1), F(1), F(8)), Surd(F(1), F(2), F(2))
    nothing, also = Surd(F(0), F(7), F(0)), Surd(F(0), F(-2), F(0))

    assert not one.below(other)
    assert not other.below(one)
    assert not Surd(F(0), F(1), F(4)).below(rational(F(2)))
    assert not nothing.below(also)
    assert not also.below(nothing)
    assert nothing.below(Surd(F(0), F(1), F(2)))
    assert Surd(F(0), F(-1), F(2)).below(nothing)


@pytest.mark.parametrize(
    ("number", "bits", "floor"),
    [
        (rational(F(-1, 7)), 3, F(-1, 7)),  # a rational is told as it is
        (Surd(F(0), F(1), F(2)), 0, F(1)),
        (Surd(F(0), F(1), F(2)), 2, F(5, 4)),  # 1.25 and 1.5 around 1.414
        (Surd(F(3), F(2), F(2)), 2, F(23, 4)),  # 5.75 and 6 around 5.828
        (Surd(F(0), F(-1), F(2)), 2, F(-3, 2)),
        (Surd(F(3), F(-1), F(2)), 2, F(3, 2)),
        (Surd(F(0), F(-2), F(2)), 0, F(-3)),  # -2.83
        (Surd(F(0), F(-1), F(4)), 0, F(-2)),  # a root that is one all the same
        (Surd(F(1), F(1, 2), F(2)), 3, F(27, 16)),  # sqrt(1/2) is told by halves of the step: 11/16
        (Surd(F(1), F(-1, 2), F(2)), 3, F(1, 4)),  # 1 - 12/16
    ],
)
def test_a_number_is_rounded_down_to_a_part_of_the_step(number, bits, floor):
    assert number.floor(bits) == floor


@pytest.mark.parametrize(
    ("whole", "factor", "under", "made"),
    [
        (1, 3, F(9, 4), rational(F(11, 2))),
        (1, -3, F(9, 4), rational(F(-7, 2))),
        (2, 5, 0, rational(F(2))),
        (0, 1, F(9, 2), Surd(F(0), F(1), F(9, 2))),  # the root of 9 is one, that of 2 is not
        (0, 1, F(2, 9), Surd(F(0), F(1), F(2, 9))),
        (4, 2, 3, Surd(F(4), F(2), F(3))),
    ],
)
def test_a_root_is_a_rational_where_it_is_one(whole, factor, under, made):
    assert root(F(whole), F(factor), F(under)) == made


def test_a_rational_has_no_root():
    assert rational(F(2, 3)) == Surd(F(2, 3), F(0), F(0))
