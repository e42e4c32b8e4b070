"""The worst point of a path outside an envelope, where the weight of it is no rational number: by hand.

Each path has its moment u0 + u1 * W + u2 * W**2, so an arm of u0 / W + u1 + u2 * W.
"""

from fractions import Fraction

import pytest

from loads.balance.path import Knot, Stretch
from loads.balance.path_curve import Piece
from loads.balance.path_outside import Nearest, worst_outside

F = Fraction
NOWHERE = Knot(F(1), F(0), F(0))
STRETCH = Stretch("flight", ("LEFT",), NOWHERE, NOWHERE, F(0))  # the piece alone is measured


def piece(top, bottom, *, u0=0, u1=0, u2=0, unit=1):
    return Piece(STRETCH, top, 1, bottom, 1, u0, u1, u2, unit)


def squared(found):
    """The number's rational part, and the square of its root with the sign of it."""
    sign = 1 if found.factor > 0 else -1
    return found.whole, sign * found.factor**2 * found.under


def about(found):
    return float(found.whole) + float(found.factor) * float(found.under) ** 0.5


def told(found: Nearest):
    return squared(found.weight), squared(found.margin), found.aft


WIDE = (-1, 0, 1000, 0)  # a right side at 1000 in, far away


def test_the_margin_to_a_leaning_side_may_be_least_between_the_ends():
    """The arm 900 / W against a left side at 200 - 3 W: 900 / W + 3 W - 200 is least at W = sqrt(300), where
    it is 2 * sqrt(2700) - 200; at 10 and at 30 lb it is -80.
    """
    found = worst_outside(piece(30, 10, u0=900), ((1, 0, -200, 3, *WIDE),))

    assert told(found) == ((0, 300), (-200, 10800), False)
    assert (found.stretch, found.floor) == (STRETCH, 10)


def test_the_margin_to_a_leaning_right_side_may_be_least_between_the_ends_too():
    """The arm -900 / W against a right side at 3 W - 200."""
    found = worst_outside(piece(30, 10, u0=-900), ((1, 0, 1000, 0, -1, 0, -200, 3),))

    assert told(found) == ((0, 300), (-200, 10800), True)


def test_a_margin_may_be_least_in_between_however_little_it_bends():
    """The arm 1 / (2 W) against a side at 200 - W / 10: least at W = sqrt(5), 2 * sqrt(1/20) - 200."""
    found = worst_outside(piece(10, 1, u0=1, unit=2), ((10, 0, -2000, 1, *WIDE),))

    assert told(found) == ((0, 5), (-200, F(1, 5)), False)


@pytest.mark.parametrize(("top", "bottom", "weight"), [(16, 10, 16), (30, 18, 18)])
def test_where_that_weight_is_beyond_an_end_the_nearer_end_is_the_worst(top, bottom, weight):
    found = worst_outside(piece(top, bottom, u0=900), ((1, 0, -200, 3, *WIDE),))

    assert (found.weight.whole, found.weight.factor) == (weight, 0)
    assert found.margin.whole == F(900, weight) + 3 * weight - 200


def test_a_margin_that_only_rises_or_falls_is_worst_at_an_end():
    """The arm -900 / W against a left side at 200 - 3 W rises with the weight; 900 / W against 200 + W, too,
    the other way.
    """
    rising = worst_outside(piece(30, 10, u0=-900), ((1, 0, -200, 3, *WIDE),))
    falling = worst_outside(piece(30, 10, u0=900), ((1, 0, -200, -1, *WIDE),))

    assert (rising.weight.whole, rising.margin.whole) == (10, -90 + 30 - 200)
    assert (falling.weight.whole, falling.margin.whole) == (30, 30 - 30 - 200)


NEAR = (1, 0, 0, 0, -1, 0, 1, 0)  # from 0 to 1 in


def test_two_pieces_may_be_equally_near_at_the_lower_of_two_irrational_weights():
    """The arm 900 / W - 6 between 1 in and a left side at 20 - W / 10: 2 * (900 / W - 6) = 21 - W / 10 where
    W**2 - 330 W + 18000 is nothing, at 165 - sqrt(9225), some 69 lb.
    """
    leaning = (10, 0, -200, 1, -1, 0, 40, 0)

    found = worst_outside(piece(100, 50, u0=900, u1=-6), (NEAR, leaning))

    weight = 165 - 9225**0.5
    assert squared(found.weight) == (165, -9225)
    assert about(found.margin) == pytest.approx(7 - 900 / weight)
    assert (found.sides, found.aft) == (NEAR, True)


def test_two_pieces_may_be_equally_near_at_the_higher_of_two_irrational_weights():
    """The arm 15 - 600 / W between 1 in and a left side at 20 - W / 20: 30 - 1200 / W = 21 - W / 20 where
    W**2 + 180 W - 24000 is nothing, at -90 + sqrt(32100), some 89 lb.
    """
    leaning = (20, 0, -400, 1, -1, 0, 40, 0)

    found = worst_outside(piece(100, 50, u0=-600, u1=15), (NEAR, leaning))

    weight = -90 + 32100**0.5
    assert squared(found.weight) == (-90, 32100)
    assert about(found.margin) == pytest.approx(-14 + 600 / weight)


# From 10 in to 15 - 90 / W - W / 50: 5 - 90 / W - W / 50 wide, nothing where W**2 - 250 W + 4500 is, at
# 125 - sqrt(11125), some 19.5 lb, and at 125 + sqrt(11125), some 230 lb; beyond both it is used up.
LENS = (1, 0, -10, 0, -50, -4500, 750, -1)
FAR = (1, 0, -40, 0, -1, 0, 41, 0)


def test_a_piece_may_be_used_up_at_the_lower_of_two_irrational_weights():
    """At 2 in all along: 8 in from the lens, and 38 in from the far piece once the lens is used up."""
    found = worst_outside(piece(50, 10, u1=2), (LENS, FAR))

    assert squared(found.weight) == (125, -11125)
    assert (found.margin.whole, found.margin.factor, found.sides) == (-38, 0, FAR)


def test_a_piece_may_be_used_up_at_the_higher_of_two_irrational_weights():
    """At W / 100 in, so the farther forward the lighter: the far piece counts down to the lens's weight, and
    is 40 - W / 100 away there.
    """
    found = worst_outside(piece(300, 100, u2=1, unit=100), (LENS, FAR))

    assert squared(found.weight) == (125, 11125)
    assert squared(found.margin) == (F(125, 100) - 40, F(11125, 10000))
    assert found.sides == FAR


def test_with_the_order_of_pieces_the_other_way_the_same_is_found():
    found = worst_outside(piece(50, 10, u1=2), (FAR, LENS))

    assert squared(found.weight) == (125, -11125)
    assert found.sides == FAR


def test_a_lens_that_is_nowhere_used_up_has_no_such_weight():
    """Wider by 10 in: 15 - 90 / W - W / 50 is nothing at 6.05 and 744 lb only; it is 8 in away all along."""
    wider = (1, 0, -10, 0, -50, -4500, 1250, -1)

    found = worst_outside(piece(50, 10, u1=2), (wider, FAR))

    assert (found.weight.whole, found.margin.whole, found.sides) == (50, -8, wider)


def test_a_lens_used_up_at_every_weight_is_no_piece():
    """Narrower by 4 in: 1 - 90 / W - W / 50 is below nothing everywhere."""
    narrower = (1, 0, -10, 0, -50, -4500, 550, -1)

    found = worst_outside(piece(50, 10, u1=2), (narrower, FAR))

    assert (found.weight.whole, found.margin.whole, found.sides) == (50, -38, FAR)


def test_a_piece_without_any_width_is_measured_to_where_no_other_is_left():
    """At 5 in: a piece from 40 in to 40 in at 100 lb and used up below, one from 10 to 9 in nowhere there."""
    just, nowhere = (1, 0, -40, 0, -10, 0, 300, 1), (1, 0, -10, 0, -1, 0, 9, 0)

    found = worst_outside(piece(100, 50, u1=5), (just, nowhere))

    assert (found.weight.whole, found.margin.whole, found.sides) == (100, -35, just)
    below = worst_outside(piece(99, 50, u1=5), (just, nowhere))
    assert (below.weight.whole, below.margin.whole, below.sides) == (99, -5, nowhere)
