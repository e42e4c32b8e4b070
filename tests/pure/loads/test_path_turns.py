"""Which points of an event can be its worst one: both sides, and the middle of a gap a transfer crosses."""

from fractions import Fraction

import pytest

from loads.balance.path import Knot, Turn
from loads.balance.path_turns import moment_of, turn_points

F = Fraction
FULL, HALF, EMPTY = {"A": F(9)}, {"A": F(5)}, {"A": F(1)}
# A transfer at 10 lb: the arm goes from 1 in over 4 in to 3 in; the lateral arm from 0 to -6 in.
KNOTS = (
    (Knot(F(10), F(10), F(0)), FULL),
    (Knot(F(10), F(40), F(-20)), HALF),
    (Knot(F(10), F(30), F(-60)), EMPTY),
)


def turn(swept=True, knots=KNOTS):
    return Turn("flight", "the words", knots, swept, F(8))


def test_the_moment_along_the_aircraft_or_across_it():
    assert moment_of(KNOTS[2][0], "longitudinal") == 30
    assert moment_of(KNOTS[2][0], "lateral") == -60


def test_both_sides_of_an_event_are_told_as_they_are():
    gapped = [(F(0), F(1)), (F(2), F(5))]

    assert turn_points(turn(swept=False), gapped, "longitudinal") == list(KNOTS)
    assert turn_points(turn(), [(F(0), F(5))], "longitudinal") == list(KNOTS)


def test_a_transfer_across_a_gap_is_judged_in_its_middle_too():
    # The gap from 1 in to 3 in, so at 2 in: a third of the way from the first knot to the second.
    found = turn_points(turn(), [(F(0), F(1)), (F(3), F(5))], "longitudinal")

    assert found == [*KNOTS, (Knot(F(10), F(20), F(-20, 3)), {})]


def test_across_the_aircraft_the_moment_along_it_is_told_beside():
    # The gap from -5 in to -3 in, so at -4 in: half way from the second knot to the third.
    found = turn_points(turn(), [(F(-9), F(-5)), (F(-3), F(5))], "lateral")

    assert found == [*KNOTS, (Knot(F(10), F(35), F(-40)), {})]


@pytest.mark.parametrize("pieces", [[(F(0), F(1)), (F(1), F(5))], [(F(-3), F(4)), (F(4), F(9))]])
def test_a_gap_whose_middle_is_an_end_of_the_transfer_adds_nothing(pieces):
    # At 1 in, where it begins, and at 4 in, its greatest: these are points already.
    assert turn_points(turn(), pieces, "longitudinal") == list(KNOTS)


def test_each_of_several_gaps_is_judged():
    found = turn_points(turn(), [(F(0), F(1)), (F(2), F(3)), (F(4), F(5))], "longitudinal")

    assert [knot.moment for knot, _ in found[3:]] == [15, 35]
