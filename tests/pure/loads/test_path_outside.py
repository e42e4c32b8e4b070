"""Where an operator's margins use a piece of an envelope up, the next one is the nearest from there on."""

from fractions import Fraction

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
