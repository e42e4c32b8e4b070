"""The moment of a stretch over weight in whole numbers, and where the corners of an envelope cut it."""

from fractions import Fraction

import pytest

from fleet.envelope import Shape
from loads.balance.path import Knot, Stretch
from loads.balance.path_curve import Curve, Piece, curves_of, pieces_of, side_of, slab_below

F = Fraction


def stretch(start, end, bend=0):
    """A stretch between two (weight, moment, lateral moment)."""
    return Stretch("flight", ("LEFT",), Knot(*map(F, start)), Knot(*map(F, end)), F(bend))


STRAIGHT = stretch((100, 20, 3), (80, 1600, 5))
# Kinks at 10, 20 and 30 lb: two slabs, the upper one half as wide.
STEPPED = Shape("arm", [(F(x), F(y)) for x, y in ((0, 10), (0, 30), (4, 30), (4, 20), (8, 20), (8, 10))])


def test_stretches_have_one_denominator_and_across_the_aircraft_no_bend():
    halves = stretch((F(201, 2), 20, F(1, 3)), (80, F(7, 5), 5), F(1, 9))

    assert curves_of([halves], "longitudinal") == [Curve(halves, 1005, 800, 200, 14, 10, F(1, 9))]
    assert curves_of([halves], "lateral") == [Curve(halves, 603, 480, 2, 30, 6, F(0))]
    assert curves_of([STRAIGHT, halves], "longitudinal") == [
        Curve(STRAIGHT, 1000, 800, 200, 16000, 10, F(0)),
        Curve(halves, 1005, 800, 200, 14, 10, F(1, 9)),
    ]


@pytest.mark.parametrize(
    ("weight", "over", "number"),
    [(9, 1, -1), (10, 1, -1), (21, 2, 0), (20, 1, 0), (41, 2, 1), (30, 1, 1), (61, 2, 2), (40, 1, 2)],
)
def test_a_path_that_goes_down_from_a_corner_is_below_it(weight, over, number):
    assert slab_below(weight, over, STEPPED.slabs) == number


def moments(piece):
    """The moment at both ends of a piece, by its polynomial."""
    ends = F(piece.top, piece.over), F(piece.bottom, piece.under)
    return [(w, (piece.u0 + piece.u1 * w + piece.u2 * w * w) / piece.unit) for w in ends]


def test_a_stretch_across_a_corner_is_cut_there_from_the_top_down():
    curve = curves_of([stretch((25, 50, 0), (15, 10, 0))], "longitudinal")[0]

    (upper, above), (lower, below) = pieces_of(curve, STEPPED.slabs)

    # By hand: the moment is 4 W - 50, so 30 at the corner.
    assert moments(upper) == [(25, 50), (20, 30)]
    assert moments(lower) == [(20, 30), (15, 10)]
    assert (above, below) == (STEPPED.slabs.trapezoids[1], STEPPED.slabs.trapezoids[0])
    assert upper == Piece(curve.stretch, 25, 1, 20, 1, -500, 40, 0, 10)


def test_what_lies_beyond_the_envelope_is_left_out_at_both_ends():
    curve = curves_of([stretch((40, 80, 0), (5, 10, 0))], "longitudinal")[0]

    pieces = [piece for piece, _ in pieces_of(curve, STEPPED.slabs)]

    assert [moments(piece) for piece in pieces] == [[(30, 60), (20, 40)], [(20, 40), (10, 20)]]


@pytest.mark.parametrize(
    ("start", "end", "cuts"),
    [
        (30, 20, [(30, 20)]),
        (20, 10, [(20, 10)]),
        (30, 10, [(30, 20), (20, 10)]),
        (40, 30, []),
        (10, 5, []),
        (50, 40, []),
        (8, 5, []),
        (F(41, 2), F(59, 3), [(F(41, 2), 20), (20, F(59, 3))]),
    ],
)
def test_a_stretch_that_ends_on_a_corner_has_no_part_beyond_it(start, end, cuts):
    curve = curves_of([stretch((start, 60, 0), (end, 40, 0))], "longitudinal")[0]

    found = [
        (F(piece.top, piece.over), F(piece.bottom, piece.under))
        for piece, _ in pieces_of(curve, STEPPED.slabs)
    ]

    assert found == cuts


def test_corners_at_parts_of_a_unit_cut_as_well():
    # One slab from 10.5 lb to 20.25 lb; the stretch comes from above and ends below it, at 7 + 1/3 lb.
    wedge = Shape("arm", [(F(0), F(21, 2)), (F(9), F(81, 4)), (F(0), F(81, 4))])
    curve = curves_of([stretch((30, 60, 0), (F(22, 3), F(44, 3), 0))], "longitudinal")[0]

    ((piece, sides),) = pieces_of(curve, wedge.slabs)

    assert moments(piece) == [(F(81, 4), F(81, 2)), (F(21, 2), 21)]
    assert sides == wedge.slabs.trapezoids[0]
    assert slab_below(31, 3, wedge.slabs) == -1  # 10.33 lb
    assert slab_below(32, 3, wedge.slabs) == 0  # 10.67 lb
    inside = curves_of([stretch((F(41, 3), 27, 0), (F(34, 3), 22, 0))], "longitudinal")[0]
    assert [moments(piece) for piece, _ in pieces_of(inside, wedge.slabs)] == [
        [(F(41, 3), 27), (F(34, 3), 22)]
    ]


def test_a_bent_stretch_keeps_its_ends_and_its_bend():
    curve = curves_of([stretch((F(49, 2), 50, 0), (F(31, 2), 14, 0), F(-2, 7))], "longitudinal")[0]

    upper, lower = (piece for piece, _ in pieces_of(curve, STEPPED.slabs))

    # By hand at 20 lb: 14 + 4 * 4.5, and -2/7 * (20 - 24.5) * (20 - 15.5) = 2/7 * 20.25 = 81/14 more.
    at_corner = 32 + F(81, 14)
    assert moments(upper) == [(F(49, 2), 50), (20, at_corner)]
    assert moments(lower) == [(20, at_corner), (F(31, 2), 14)]
    assert F(upper.u2, upper.unit) == F(-2, 7)
    assert upper.unit > 0


def test_the_margin_to_a_side_is_that_of_its_line():
    piece = Piece(STRAIGHT, 100, 1, 80, 1, 7920, -79, 2, 3)

    # P = -2, A = 5, B = 7, C = 11, each of these three times the unit.
    assert side_of(piece, -2, 5, 7, 11) == (-2 * 7920 + 15, 158 + 21, -4 + 33)
