"""Where an operator's margins use a piece of an envelope up, the next one is the nearest from there on."""

from fractions import Fraction

import pytest

from loads.balance.path import Knot, Stretch
from loads.balance.path_curve import Piece
from loads.balance.path_outside import worst_outside

# From 100 lb down to 80 lb the moment is 7920 - 79 W: an arm of 0.2 in, 9 in at 90 lb, 20 in at the end.
STRETCH = Stretch(
    "flight",
    ("LEFT",),
    Knot(Fraction(100), Fraction(20), Fraction(0)),
    Knot(Fraction(80), Fraction(1600), Fraction(0)),
    Fraction(0),
)
PIECE = Piece(STRETCH, 100, 1, 80, 1, 7920, -79, 0, 1)
# From 10 in to 11 - 90 / W in: 1 in wide at a great weight, used up at 90 lb and nothing below.
TIP = (1, 0, -10, 0, -1, -90, 11, 0)
FAR = (1, 0, -20, 0, -1, 0, 21, 0)  # from 20 to 21 in at every weight


def test_the_path_is_farthest_out_where_the_tip_ends() -> None:
    """At 100 lb it lies 9.8 in before the tip; at 90 lb the tip ends, and the far piece is 11 in away."""
    worst = worst_outside(PIECE, (TIP, FAR))

    assert (worst.weight.whole, worst.weight.factor) == (90, 0)
    assert (worst.margin.whole, worst.margin.factor) == (-11, 0)
    assert worst.sides == FAR


def test_without_a_far_piece_the_tip_alone_counts() -> None:
    worst = worst_outside(PIECE, (TIP,))

    assert (worst.weight.whole, worst.margin.whole) == (80, Fraction(1600 - 880 + 90, -80))


def test_a_piece_that_is_there_all_along_is_measured_to_at_the_worse_end() -> None:
    worst = worst_outside(PIECE, (FAR,))

    assert (worst.weight.whole, worst.margin.whole) == (100, Fraction(1, 5) - 20)


# Between 0 and 1 in, and the same on the other side of the path: it goes from 3 in at 100 lb to 12 in.
NEAR = (1, 0, 0, 0, -1, 0, 1, 0)
ACROSS = Stretch(
    "flight",
    ("LEFT",),
    Knot(Fraction(100), Fraction(300), Fraction(0)),
    Knot(Fraction(50), Fraction(600), Fraction(0)),
    Fraction(0),
)
BETWEEN = Piece(ACROSS, 100, 1, 50, 1, 900, -6, 0, 1)


def test_between_two_pieces_the_worst_is_where_both_are_equally_near() -> None:
    """From 0 to 1 in and from 20 to 21 in: 10.5 in, so 900/W - 6 = 10.5 at 600/11 lb, 9.5 in from either."""
    worst = worst_outside(BETWEEN, (NEAR, FAR))

    assert (worst.weight.whole, worst.weight.factor) == (Fraction(600, 11), 0)
    assert (worst.margin.whole, worst.margin.factor) == (Fraction(-19, 2), 0)
    assert (worst.stretch, worst.sides, worst.aft, worst.floor) == (ACROSS, NEAR, True, 50)


def test_the_sides_may_be_given_in_any_multiple() -> None:
    """Three times the line is the same line: the margin is along the arm, in the unit of arms."""
    tripled = (3, 0, -60, 0, -3, 0, 63, 0)

    worst = worst_outside(BETWEEN._replace(u0=1800, u1=-12, unit=2), (tripled,))

    assert (worst.weight.whole, worst.margin.whole, worst.aft) == (100, -17, False)


def test_an_end_that_is_no_whole_weight_is_told_as_it_is() -> None:
    """At 99.5 lb, where the piece ends at 60.5 lb: 900/W - 6 is 3.045 in at the top."""
    worst = worst_outside(BETWEEN._replace(top=199, over=2, bottom=121, under=2), (FAR,))

    assert (worst.weight.whole, worst.floor) == (Fraction(199, 2), Fraction(121, 2))
    assert worst.margin.whole == Fraction(1800, 199) - 26


def test_where_no_piece_is_left_there_is_nothing_to_measure_to() -> None:
    with pytest.raises(ValueError, match=r"^between two weights of corners an envelope has a part$"):
        worst_outside(BETWEEN, ())
