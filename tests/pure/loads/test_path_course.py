"""A stretch of the burn and a part of a transfer as polynomials: worked examples of all they tell."""

from fractions import Fraction

import pytest

from loads.balance.path import Knot, Stretch
from loads.balance.path_course import Moved, burned, rational_between, roots, strictly_within
from loads.balance.surd import Surd, rational

F = Fraction
# From 100 lb to 80 lb: the moment 3000 - 2 W + W**2 / 10, the lateral moment 45 - W / 2.
START, END = Knot(F(100), F(3800), F(-5)), Knot(F(80), F(3480), F(5))
BURN = Stretch("flight", ("LEFT",), START, END, F(1, 10))
# At 50 lb: the moment 100 + 20 V + 30 V**2, the lateral moment 10 - 5 V, V from nothing moved to all.
MOVE = Moved("reserve", "the words", F(50), F(100), F(20), F(30), F(10), F(-5), F(45))


def test_a_stretch_is_told_as_polynomials_of_the_weight():
    course = burned(BURN)

    assert course == (BURN, F(3000), F(-2), F(1, 10), F(45), F(-1, 2))
    assert (course.low, course.high) == (80, 100)
    # Half way: 3000 - 180 + 810 and 45 - 45.
    assert course.knot(F(90)) == Knot(F(90), F(3630), F(0))
    assert course.arm() == (F(3000), F(-2), F(1, 10))
    assert course.less(F(1), F(2), F(3), F(5)) == (1, -3, 3)


def test_the_margin_of_a_stretch_to_a_side_of_arms_or_of_moments():
    side = (F(-1), F(2), F(7))  # -y + 2 x + 7

    # -L/W + 2 M/W + 7 = (-45 + 6000)/W + (1/2 - 4 + 7) + W/5
    assert burned(BURN).margin(side, moments=False) == (F(5955), F(7, 2), F(1, 5))
    # -L + 2 M/W + 7 = 6000/W + (-45 - 4 + 7) + (1/2 + 1/5) W
    assert burned(BURN).margin(side, moments=True) == (F(6000), F(-42), F(7, 10))


def test_a_margin_of_a_stretch_at_a_weight_with_and_without_a_root():
    margin = F(6), F(-1), F(2)

    assert burned(BURN).value(margin, rational(F(3))) == rational(F(7))  # 2 - 1 + 6
    # At W = 1 + sqrt 2: 6/W = 6 (sqrt 2 - 1), so -6 - 1 + 2 and (6 + 2) sqrt 2.
    assert burned(BURN).value(margin, Surd(F(1), F(1), F(2))) == Surd(F(-5), F(8), F(2))
    # At W = 3 + sqrt 3: 6/W = 3 - sqrt 3, so 3 - 1 + 6 and (-1 + 2) sqrt 3.
    assert burned(BURN).value(margin, Surd(F(3), F(1), F(3))) == Surd(F(8), F(1), F(3))
    # At W = 2 sqrt 3: 6/W = sqrt 3, and 2 W = 4 sqrt 3.
    assert burned(BURN).value(margin, Surd(F(0), F(2), F(3))) == Surd(F(-1), F(5), F(3))


@pytest.mark.parametrize(
    ("margin", "turn"),
    [
        ((2, 9, 1), Surd(F(0), F(1), F(2))),
        ((-8, 9, -2), rational(F(2))),
        ((2, 9, -1), None),
        ((0, 9, 3), None),
        ((3, 9, 0), None),
        ((1, 9, 4), rational(F(1, 2))),
        ((F(1, 2), 9, F(1, 3)), Surd(F(0), F(1), F(3, 2))),
    ],
)
def test_a_margin_of_a_stretch_turns_where_its_ends_are_of_one_sign(margin, turn):
    assert burned(BURN).turn(tuple(map(F, margin))) == turn


def test_a_transfer_is_told_as_polynomials_of_what_has_moved():
    assert (MOVE.low, MOVE.high) == (0, 1)
    # Half of it: 100 + 10 + 7.5, and 10 - 2.5.
    assert MOVE.knot(F(1, 2)) == Knot(F(50), F("117.5"), F("7.5"))
    assert MOVE.arm() == (F(2), F(2, 5), F(3, 5))
    assert MOVE.less(F(1), F(2), F(3), F(5)) == (-4, 2, 3)


def test_a_transfer_is_a_stretch_in_which_nothing_burns():
    start, end = Knot(F(50), F(100), F(10)), Knot(F(50), F(150), F(5))

    assert MOVE.stretch == Stretch("reserve", (), start, end, F(0), ({}, F(0)), F(45), "the words")


def test_the_margin_of_a_transfer_to_a_side_of_arms_or_of_moments():
    side = (F(-1), F(2), F(7))

    # -L/50 + 2 M/50 + 7, by the powers of V.
    assert MOVE.margin(side, moments=False) == (F(-1, 5) + 4 + 7, F(1, 10) + F(4, 5), F(6, 5))
    # -L + 2 M/50 + 7.
    assert MOVE.margin(side, moments=True) == (-10 + 4 + 7, 5 + F(4, 5), F(6, 5))


def test_a_margin_of_a_transfer_at_a_share_with_and_without_a_root():
    margin = F(6), F(-1), F(2)

    assert MOVE.value(margin, rational(F(3))) == rational(F(21))  # 6 - 3 + 18
    # At V = 3 + 2 sqrt 5, V**2 is 29 + 12 sqrt 5: 6 - 3 + 58 and (-2 + 24) sqrt 5.
    assert MOVE.value(margin, Surd(F(3), F(2), F(5))) == Surd(F(61), F(22), F(5))


def test_a_margin_of_a_transfer_turns_once_unless_it_is_straight():
    assert MOVE.turn((F(9), F(-3), F(6))) == rational(F(1, 4))
    assert MOVE.turn((F(9), F(-3), F(0))) is None


@pytest.mark.parametrize(
    ("a", "b", "c", "found"),
    [
        (6, -4, 0, [rational(F(3, 2))]),
        (6, 0, 0, []),
        (6, -5, 1, [rational(F(3)), rational(F(2))]),
        (6, -10, 4, [rational(F(3, 2)), rational(F(1))]),
        (9, -6, 1, [rational(F(3)), rational(F(3))]),  # it touches nothing
        (10, -6, 1, []),
        (-1, -2, 1, [Surd(F(1), F(1, 2), F(8)), Surd(F(1), F(-1, 2), F(8))]),
    ],
)
def test_where_a_square_margin_is_nothing(a, b, c, found):
    assert roots(F(a), F(b), F(c)) == found


def test_a_number_at_an_end_does_not_lie_between():
    low, high = Surd(F(0), F(1), F(2)), Surd(F(0), F(1), F(3))

    assert strictly_within(rational(F(3, 2)), low, high)
    assert not strictly_within(low, low, high)
    assert not strictly_within(high, low, high)
    assert not strictly_within(rational(F(1)), low, high)
    assert not strictly_within(rational(F(2)), low, high)


@pytest.mark.parametrize(
    ("low", "high", "between"),
    [
        (rational(F(80)), rational(F(100)), F(90)),
        (Surd(F(0), F(1), F(2)), rational(F(3, 2)), F(362 + 384, 512)),  # 362/256 is just below sqrt 2
    ],
)
def test_a_rational_between_two_numbers(low, high, between):
    assert rational_between(low, high) == between


def test_two_numbers_that_lie_very_close_have_a_rational_between():
    low, high = Surd(F(0), F(1), F(2)), Surd(F(1, 10**12), F(1), F(2))

    assert strictly_within(rational(rational_between(low, high)), low, high)
