"""The worst point against a lateral limit that varies with the longitudinal CG, worked by hand and told in
full.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from loads.balance.path import Knot, Path, Stretch, Turn
from loads.balance.path_across import (
    WorstAcross,
    courses_of,
    lateral_figure,
    moved,
    stays_across,
    worst_across,
)
from loads.balance.path_course import Moved, burned
from loads.balance.surd import Surd
from tests.pure.loads.hand import by_cg

F = Fraction
# From 2 in left to 2 in right at 10 in, to 3 in right at 20 in.
PLAIN = by_cg((10, -2), (10, 2), (20, 3), (20, -2))


def flown(top, bottom, start, end, bend=0, **more):
    """A stretch between two weights, with the (arm, lateral arm) at each."""
    ends = [
        Knot(F(weight), weight * F(along), weight * F(across))
        for weight, (along, across) in ((top, start), (bottom, end))
    ]
    return Stretch(more.pop("leg", "flight"), ("LEFT",), *ends, F(bend), **more)


def worst(limit, *stretches):
    return worst_across([burned(each) for each in stretches], limit)


def event(*knots, weight=80, swept=False, leg="flight"):
    made = tuple((Knot(F(weight), weight * F(x), weight * F(y)), {}) for x, y in knots)
    return Turn(leg, "the words", made, swept, F(55))


def test_what_a_limit_judges_is_the_arm_or_the_moment():
    assert lateral_figure(PLAIN, F(80), F(120)) == F(3, 2)
    assert lateral_figure(replace(PLAIN, gives="moment"), F(80), F(120)) == 120


def test_the_worst_point_is_told_with_the_stretch_of_the_limit_there():
    # 1 in right at 15 in: 1.5 in from the right edge; 1 in left: 1 in from the left one.
    stretch = flown(90, 60, (15, 1), (15, -1))

    found = worst(PLAIN, stretch)

    assert found == WorstAcross(PLAIN, stretch, stretch.end, F(-2), F(5, 2), F(1), False)
    assert found.figure == -1


@pytest.mark.parametrize(
    ("start", "end", "weight", "room", "right"),
    [
        ((15, 2), (15, 2), 90, F(1, 2), True),
        ((15, 1), (15, 2), 60, F(1, 2), True),
        ((15, F(5, 2)), (15, 2), 90, 0, True),
        ((15, 3), (15, 2), 90, F(-1, 2), True),
        ((15, -2), (15, 2), 90, 0, False),
        ((15, F(1, 4)), (15, F(1, 4)), 90, F(9, 4), False),  # as near to both: the left is named
        ((10, 2), (20, 3), 90, 0, True),
    ],
)
def test_of_equals_the_first_in_flight_counts(start, end, weight, room, right):
    found = worst(PLAIN, flown(90, 60, start, end))

    assert (found.knot.weight, found.room, found.right) == (weight, room, right)


def test_off_the_whole_limit_is_worse_than_any_other_and_the_farthest_counts():
    ahead, behind = flown(90, 60, (8, 0), (15, 0)), flown(50, 40, (15, 0), (24, 0))
    outside = flown(55, 52, (15, 9), (15, 9))

    first = worst(PLAIN, outside, ahead)
    farther = worst(PLAIN, ahead, behind, outside)

    assert first == WorstAcross(PLAIN, ahead, ahead.start, None, None, None, False)
    assert farther == WorstAcross(PLAIN, behind, behind.end, None, None, None, False)
    assert worst(PLAIN, behind, ahead).stretch is behind
    even = flown(90, 60, (6, 0), (15, 0))
    assert worst(PLAIN, even, behind).stretch is even


def test_a_bent_stretch_may_be_farthest_off_in_between():
    # The arm is W/4 + 900/W - 10 in: 22.5 in at both ends, 20 in at 60 lb; mirrored it is 17.5, 20, 17.5.
    near = by_cg((22, -2), (22, 2), (30, 2), (30, -2))
    stretch = flown(90, 40, (F(45, 2), 0), (F(45, 2), 0), bend=F(1, 4))

    found = worst(near, stretch)

    assert (found.knot.weight, found.room) == (60, None)
    beyond = by_cg((10, -2), (10, 2), (18, 2), (18, -2))
    mirrored = flown(90, 40, (F(35, 2), 0), (F(35, 2), 0), bend=F(-1, 4))
    found = worst(beyond, mirrored)
    assert (found.knot.weight, found.knot.moment, found.room) == (60, 1200, None)


def test_a_notch_is_met_at_its_corner_where_the_path_passes_it():
    # At 15 in the right edge comes down to 1 in.
    notched = by_cg((10, -2), (10, 3), (14, 3), (15, 1), (16, 3), (20, 3), (20, -2))
    # 13 in at 90 lb, 18 in at 60 lb: the moment is 900 + 3 W, so it is at 15 in at 75 lb.
    stretch = flown(90, 60, (13, F(1, 2)), (18, F(1, 2)))

    found = worst(notched, stretch)

    assert (found.knot.weight, found.room, found.right) == (75, F(1, 2), True)
    assert (found.low, found.high) == (-2, 1)


def test_a_slanted_edge_may_be_nearest_in_between_at_an_irrational_weight():
    # The moment is 900 + 5 W; the right edge 900 lb in and 10 more for each inch beyond 10.
    moments = by_cg((10, -900), (10, 900), (20, 1000), (20, -900), gives="moment")
    # 4 W + 500 lb in right: 900 + 10 (900/W - 5) - 4 W - 500 is 9000/W - 4 W + 350, least at 90 lb.
    stretch = Stretch("flight", ("LEFT",), Knot(F(90), F(1350), F(860)), Knot(F(60), F(1200), F(740)), F(0))
    falls = worst(moments, stretch)
    assert (falls.knot.weight, falls.room) == (90, 90)
    # 1000 - 4 W: 9000/W + 4 W - 150, least at sqrt(2250) lb, 2 sqrt(36000) - 150.
    dips = Stretch("flight", ("LEFT",), Knot(F(55), F(1175), F(780)), Knot(F(40), F(1100), F(840)), F(0))
    wide = by_cg((10, -900), (10, 900), (40, 1200), (40, -900), gives="moment")
    found = worst(wide, dips)
    dip = Surd(F(0), F(15), F(10))
    assert found.knot.weight == dip.floor(80)
    assert found.room == Surd(F(-150), F(120), F(10)).floor(80)
    assert found.right


def test_an_irrational_worst_point_that_is_outside_is_told_by_one_that_is_outside():
    # As above with 400 lb in more to the right: outside, least at sqrt(2250) lb.
    dips = Stretch("flight", ("LEFT",), Knot(F(55), F(1175), F(1180)), Knot(F(40), F(1100), F(1240)), F(0))
    wide = by_cg((10, -900), (10, 900), (40, 1200), (40, -900), gives="moment")

    found = worst(wide, dips)

    weight = found.knot.weight
    assert abs(weight - Surd(F(0), F(15), F(10)).floor(80)) <= F(1, 2**78)
    assert found.room == Surd(F(-550), F(120), F(10)).floor(80)
    assert found.figure == found.knot.lateral_moment > found.high
    assert found.knot == dips.at(weight)


def test_between_two_pieces_the_worst_is_half_way():
    forked = by_cg((10, -4), (10, 4), (30, 4), (30, 1), (15, 1), (15, -1), (30, -1), (30, -4))

    found = worst(forked, flown(90, 60, (20, -2), (20, 2)))

    # The lateral arm passes 0 where both pieces are 1 in away.
    assert (found.figure, found.room) == (0, -1)
    inside = worst(forked, flown(90, 60, (20, 2), (20, 3)))
    assert (inside.low, inside.high, inside.room) == (1, 4, 1)


def test_at_the_very_arm_of_a_corner_what_both_sides_leave_counts():
    stepped = by_cg((10, -2), (10, 2), (20, 2), (20, 4), (30, 4), (30, -2))

    on = worst(stepped, flown(90, 60, (20, 3), (20, 3)))

    assert (on.low, on.high, on.room, on.right) == (-2, 4, 1, True)
    assert worst(stepped, flown(90, 60, (19, 3), (19, 3))).room == -1


def test_a_path_stays_inside_a_limit_or_does_not():
    def stays(*stretches):
        return stays_across([burned(each) for each in stretches], PLAIN)

    inside, on = flown(90, 60, (15, 1), (15, 1)), flown(90, 60, (10, 2), (20, 3))
    assert stays(inside, on)
    assert not stays(inside, flown(90, 60, (15, 1), (15, F(251, 100))))
    assert not stays(flown(90, 60, (15, 1), (F(201, 10), 1)), inside)
    assert stays()


def test_without_a_part_there_is_no_worst_point():
    assert worst_across([], PLAIN) is None


def test_an_event_is_points_and_a_transfer_what_it_goes_through():
    def part(m0, m1, m2, v0, v1):
        return Moved("flight", "the words", F(80), *map(F, (m0, m1, m2, v0, v1)), F(55))

    assert moved(event((1, 2), (3, 4))) == [part(80, 0, 0, 160, 0), part(240, 0, 0, 320, 0)]
    # From 1 over 4 to 3 in, the half told: 80 + b + c at all of it, 80 + b/2 + c/4 = 320 at the half.
    swept = event((1, 0), (4, -1), (3, -2), swept=True)
    assert moved(swept) == [part(80, 800, -640, 0, -160)]
    two = moved(event((1, 0), (2, 0), (3, 0), (4, 1), (5, 2), swept=True))
    assert two == [part(80, 160, 0, 0, 0), part(240, 160, 0, 0, 160)]
    # With a point that is not known what is known is judged point by point.
    assert len(moved(event((1, 0), (3, 0), swept=True))) == 2


def test_the_courses_of_some_legs_are_stretches_settings_and_events():
    trip, taxi = flown(90, 60, (15, 1), (15, 1)), flown(95, 90, (15, 1), (15, 1), leg="taxi")
    path = Path((taxi, trip), (), F(6), (event((15, 2), leg="reserve"), event((15, 1))), (trip, taxi))

    assert [each.stretch.leg for each in courses_of(path, ("flight",))] == ["flight", "flight", "flight"]
    assert courses_of(path, ("taxi",)) == [burned(taxi), burned(taxi)]
    (point,) = courses_of(path, ("reserve",))
    assert point.stretch.start.lateral_moment == 160
    assert courses_of(path, ()) == []


def test_an_event_at_one_weight_is_judged_where_it_is():
    found = worst_across(moved(event((15, 1), (15, 2))), PLAIN)

    assert (found.room, found.right, found.stretch.setting, found.knot.lateral_moment) == (
        F(1, 2),
        True,
        "the words",
        160,
    )
    off = worst_across(moved(event((15, 1), (21, 0))), PLAIN)
    assert (off.room, off.knot.moment) == (None, 1680)


def test_a_transfer_is_worst_where_its_margin_turns():
    # The arm goes 12 + 12 V - 12 V**2: 12, 15 at the half, 12; with 2 in right 2.2 - 2 at the ends.
    found = worst_across(moved(event((12, 2), (15, 2), (12, 2), swept=True)), PLAIN)
    assert (found.room, found.knot.moment) == (F(1, 5), 960)
    # The other way it comes forward to 11 in at the half: 0.1 in is left there.
    dips = worst_across(moved(event((14, 2), (11, 2), (14, 2), swept=True)), PLAIN)
    assert (dips.room, dips.knot.moment) == (F(1, 10), 880)
    assert (dips.low, dips.high, dips.right) == (-2, F(21, 10), True)
    # And off the limit it is farthest at the half.
    off = worst_across(moved(event((11, 2), (8, 2), (11, 2), swept=True)), PLAIN)
    assert (off.room, off.knot.moment) == (None, 640)


# The arm W/4 + 900/W - 10 passes 21 in at 62 - 2 sqrt(61) lb, some 46.4, on the way from 60 to 40 lb.
PASSED = Surd(F(62), F(-2), F(61)).floor(80)


def passing(start, end):
    """The stretch with these lateral moments."""
    knots = Knot(F(60), F(1200), F(start)), Knot(F(40), F(900), F(end))
    return Stretch("flight", ("LEFT",), *knots, F(1, 4))


def test_at_an_irrational_weight_where_the_narrower_part_ends_the_point_lies_within_that_part():
    # The lateral arm is 360 / W - 6: 1.76 in there, of 2 in up to 21 in and of 4 in beyond.
    widens = by_cg((15, -2), (15, 2), (21, 2), (21, 4), (30, 4), (30, -2))

    found = worst(widens, passing(0, 120))

    assert found.knot.weight == PASSED + F(1, 2**80)
    assert found.room == Surd(F(9, 5), F(-1, 5), F(61)).floor(80)
    assert (found.low, found.high, found.right) == (-2, 2, True)
    # 480 / W - 8 is 2.35 in there: outside, and so is the point that is told.
    out = worst(widens, passing(0, 160))
    assert (out.knot.weight, out.high) == (PASSED + F(1, 2**80), 2)
    assert out.figure > 2
    assert out.room == Surd(F(26, 15), F(-4, 15), F(61)).floor(80)


def test_at_an_irrational_weight_where_the_narrower_part_begins_the_point_lies_within_that_part():
    # The lateral arm is 12 - 480 / W: 1.65 in there, of 6 in up to 21 in and of 2 in beyond.
    narrows = by_cg((15, -2), (15, 6), (21, 6), (21, 2), (30, 2), (30, -2))

    found = worst(narrows, passing(240, 0))

    assert (found.knot.weight, found.high, found.right) == (PASSED, 2, True)
    assert found.room == Surd(F(-26, 15), F(4, 15), F(61)).floor(80)


def test_the_ends_of_a_limit_that_leans_on_both_sides_are_told_where_the_point_is():
    leaning = by_cg((10, -2), (10, 2), (20, 3), (20, -3))

    found = worst(leaning, flown(90, 60, (15, -2), (15, -2)))

    assert (found.low, found.high, found.room, found.right) == (F(-5, 2), F(5, 2), F(1, 2), False)
