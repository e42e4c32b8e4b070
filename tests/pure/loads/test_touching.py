"""Every amount at which a varied part of a flight touches an outline, worked by hand."""

from fractions import Fraction

import pytest

from fleet.envelope import Shape
from fleet.lateral import LateralByCg
from loads.balance.polynomial import Root
from loads.balance.touching import Varied, each_once, touching_across, touching_envelope
from tests.pure.loads.making import SOURCE

F = Fraction
FINE = F(1, 2**70)


def poly(*parts):
    return tuple(map(F, parts))


def shape(*points, plane="arm"):
    return Shape(plane, [(F(x), F(y)) for x, y in points])


BOX = shape((10, 50), (10, 100), (20, 100), (20, 50))
LEANING = shape((15, 50), (10, 100), (40, 100), (40, 50))  # the forward edge is 20 - W / 10
NOTHING, ONCE = poly(0), poly(1)


def point(weight, moment, lateral=NOTHING, over=ONCE):
    return Varied(NOTHING, NOTHING, (weight,), (moment,), (lateral,), over)


def stretch(low, high, *moment, lateral=(NOTHING,), over=ONCE):
    """A part of the burn: the parameter is the weight."""
    return Varied(low, high, (NOTHING, poly(1)), moment, lateral, over)


def touched(found, *expected):
    """Every one of these is found, and nothing else, in whatever order."""
    roots = each_once(found)
    assert [any(root.low <= at <= root.high for root in roots) for at in expected] == [True] * len(expected)
    assert all(root.high - root.low <= FINE for root in roots)
    assert len(roots) == len(expected)


@pytest.mark.parametrize("times", [1, 2])
def test_a_point_touches_a_side_and_a_level(times):
    # 60 lb at 15 in with x lb at 30 in more: 20 in at 30 lb more, the top at 40 lb more.
    part = point(poly(60, 1), poly(900 * times, 30 * times), over=poly(times))

    touched(touching_envelope(part, BOX, "longitudinal", (F(0), F(50))), 30, 40)
    touched(touching_envelope(part, BOX, "longitudinal", (F(-20), F(29))), -10)


def test_across_the_aircraft_the_lateral_moment_counts():
    part = point(poly(60, 1), poly(0), lateral=poly(900, 30), over=poly(7))

    touched(touching_envelope(part, BOX, "lateral", (F(0), F(50))), 30, 40)


def test_beyond_the_weights_of_a_side_it_is_not_touched():
    # 20 in at 30 lb more as before, but that is 110 lb there: only the top, at 20 lb more.
    part = point(poly(80, 1), poly(1300, 30))

    touched(touching_envelope(part, BOX, "longitudinal", (F(0), F(50))), 20)


def test_a_point_touches_a_side_that_is_slanted_in_arm():
    # 70 lb, moment 700 + 10 x: 20 - 7 = 13 in at x = 21, 40 in at x = 210.
    part = point(poly(70), poly(700, 10))

    touched(touching_envelope(part, LEANING, "longitudinal", (F(0), F(300))), 21, 210)


def test_a_point_touches_a_side_that_is_straight_in_moment():
    # The forward edge is 10 W, the aft one goes from 1000 lb in at 50 lb to 3000 lb in at 100 lb.
    wedge = shape((500, 50), (1000, 100), (3000, 100), (1000, 50), plane="moment")
    part = point(poly(70), poly(600, 10))

    touched(touching_envelope(part, wedge, "longitudinal", (F(0), F(300))), 10, 120)


@pytest.mark.parametrize("times", [1, 3])
def test_a_stretch_touches_at_its_ends_at_a_corner_and_where_an_end_meets_a_level(times):
    # From 88 + x lb down to 60 + x lb, the moment 14 W + 40 x. The low end is at 20 in where 40 x is
    # 6 (60 + x): 180/17. The high end reaches the top at 12, the path the upper aft corner at 15, where it
    # still lies within, and the low end the top at 40.
    moment = poly(0, 40 * times), poly(14 * times)
    part = stretch(poly(60, 1), poly(88, 1), *moment, over=poly(times))

    touched(touching_envelope(part, BOX, "longitudinal", (F(0), F(50))), F(180, 17), 12, 15, 40)


@pytest.mark.parametrize("times", [1, 3])
def test_a_stretch_touches_where_its_margin_dips(times):
    # From 90 to 60 lb: W times the margin is 490 + (x - 15) W + W**2 / 10, which touches nothing at x = 1
    # and 70 lb; at 90 lb it is nothing at 5/9, at 60 lb at 5/6.
    moment = poly(490 * times), poly(5 * times, times)
    part = stretch(poly(60), poly(90), *moment, over=poly(times))

    touched(touching_envelope(part, LEANING, "longitudinal", (F(0), F(10))), F(5, 9), F(5, 6), 1)
    touched(touching_envelope(part, LEANING, "longitudinal", (F(20), F(28))), F(161, 6))  # 40 in at 60 lb


def test_a_dip_beyond_the_ends_of_a_stretch_is_no_touch():
    part = stretch(poly(75), poly(90), poly(490), poly(5, 1))

    # At 75 lb: 490/75 + x - 15 + 7.5.
    touched(touching_envelope(part, LEANING, "longitudinal", (F(0), F(10))), F(5, 9), F(15, 2) - F(98, 15))


def test_a_bent_stretch_touches_a_straight_side_in_between():
    # The moment 900 + (x - 10) W + W**2 / 4 against 20 W: at 60 lb both ways, x = 0; ends at 40 and 90 lb.
    part = stretch(poly(40), poly(90), poly(900), poly(-10, 1), poly(F(1, 4)))
    box = shape((20, 30), (20, 100), (60, 100), (60, 30))

    touched(touching_envelope(part, box, "longitudinal", (F(-5), F(5))), F(-5, 2), 0)
    # The aft edge: 60 = 22.5 + x at both ends, first there.
    touched(touching_envelope(part, box, "longitudinal", (F(5), F(60))), F(75, 2), 40)


def test_a_stretch_far_inside_touches_nothing():
    part = stretch(poly(60), poly(90), poly(0, 1), poly(15))

    touched(touching_envelope(part, BOX, "longitudinal", (F(0), F(1))))


def test_a_transfer_at_one_weight_touches_a_level_and_no_side_of_its_own():
    # Its extremes are points of their own.
    moved = Varied(poly(0), poly(1), (poly(60, 1),), (poly(900, 30), poly(300)), (NOTHING,), poly(1))

    touched(touching_envelope(moved, BOX, "longitudinal", (F(0), F(50))), 40)


def by_cg(gives="arm", times=1):
    corners = ((10, -2), (10, 2), (20, 3), (20, -2))
    points = tuple((F(x), F(y) * times) for x, y in corners)
    return LateralByCg("LAT", ("take-off",), gives, points, SOURCE)


@pytest.mark.parametrize("over", [1, 5])
@pytest.mark.parametrize(("gives", "times"), [("arm", 1), ("moment", 100)])
def test_a_point_touches_a_lateral_limit_at_a_side_and_at_its_last_arm(gives, times, over):
    # 100 lb at 15 + x in, 1 + x in right: the right edge is 2.5 + x/10 there, so at 5/3; 20 in at 5.
    part = point(poly(100), poly(1500 * over, 100 * over), poly(100, 100), over=poly(over))

    touched(touching_across(part, by_cg(gives, times), (F(0), F(8))), F(5, 3), 5)
    touched(touching_across(part, by_cg(gives, times), (F(-6), F(-1))), -3, -5)  # 2 in left; 10 in


@pytest.mark.parametrize("over", [1, 5])
def test_a_stretch_touches_a_lateral_limit_of_arms_at_each_end(over):
    # 15 in throughout, x lb in right: 2.5 in at 60 lb where x is 150, at 90 lb where it is 225.
    part = stretch(poly(60), poly(90), poly(0), poly(15 * over), lateral=(poly(0, 1),), over=poly(over))

    touched(touching_across(part, by_cg(), (F(1), F(300))), 150, 225)


def test_a_stretch_touches_a_lateral_limit_of_moments_all_along_at_once():
    part = stretch(poly(60), poly(90), poly(0), poly(15), lateral=(poly(0, 1),))

    assert Root(F(250), F(250)) in list(touching_across(part, by_cg("moment", 100), (F(1), F(300))))


@pytest.mark.parametrize("over", [1, 5])
def test_a_stretch_touches_a_corner_of_a_lateral_limit_between_its_ends(over):
    # 1350 lb in throughout: 15 in at 90 lb, 20 in at 67.5 lb, where 3 in right is 202.5 lb in; at 90 lb
    # 2.5 in right is 225 lb in. At 60 lb it lies off the limit.
    part = stretch(poly(60), poly(90), poly(1350 * over), poly(0), lateral=(poly(0, 1),), over=poly(over))

    touched(touching_across(part, by_cg(), (F(1), F(300))), F(405, 2), 225)
    of_moments = list(touching_across(part, by_cg("moment", 100), (F(1), F(300))))
    assert {Root(F(at), F(at)) for at in (250, 300)} <= set(of_moments)


def test_a_stretch_moved_along_touches_the_last_arm_of_a_lateral_limit_at_each_end():
    # 15 in and x lb in more: 20 in at 60 lb where x is 300, at 90 lb where it is 450.
    part = stretch(poly(60), poly(90), poly(0, 1), poly(15), lateral=(poly(0),))

    touched(touching_across(part, by_cg(), (F(1), F(500))), 300, 450)


def test_a_bent_stretch_touches_a_straight_lateral_limit_at_its_ends():
    # W**2/4 + 900 - 10 W lb in lies inside; W/2 + x lb in left is 2 in at 55 lb where x is 82.5,
    # at 65 lb where it is 97.5.
    part = stretch(
        poly(55), poly(65), poly(900), poly(-10), poly(F(1, 4)), lateral=(poly(0, -1), poly(F(-1, 2)))
    )
    corners = tuple((F(x), F(y)) for x, y in ((10, -2), (10, 2), (30, 3), (30, -2)))
    wide = LateralByCg("LAT", ("take-off",), "arm", corners, SOURCE)

    touched(touching_across(part, wide, (F(1), F(300))), F(165, 2), F(195, 2))


def test_a_bent_stretch_touches_a_slanted_lateral_limit_where_its_margin_dips():
    # The arm is W/4 + 900/W - 10 in: 20 in at 60 lb, its least, 22.5 in at 40 and at 90 lb. The right edge is
    # 1 in more than a tenth of it, and the lateral arm is x/10 in all along.
    part = stretch(
        poly(40), poly(90), poly(900), poly(-10), poly(F(1, 4)), lateral=(poly(0), poly(0, F(1, 10)))
    )

    # W/40 + 90/W against x/10: 3 in at 60 lb, the least there is; 3.25 in at 40 and at 90 lb.
    found = each_once(touching_across(part, by_cg_from_15(), (F(25), F(35))))
    assert [root.low for root in found] == [30, F(65, 2)]


def by_cg_from_15():
    """From 15 to 30 in: 6 in left to a tenth of the arm + 1 in right."""
    corners = tuple((F(x), F(y)) for x, y in ((15, -6), (15, F(5, 2)), (30, 4), (30, -6)))
    return LateralByCg("LAT", ("take-off",), "arm", corners, SOURCE)


def test_roots_that_cannot_be_told_apart_become_one():
    found = [Root(F(5), F(5)), Root(F(1), F(2)), Root(F(2), F(3)), Root(F(5), F(5)), Root(F(1), F(4))]

    assert each_once(found) == [Root(F(1), F(4)), Root(F(5), F(5))]
    assert each_once([]) == []
    assert each_once([Root(F(1), F(6)), Root(F(2), F(3))]) == [Root(F(1), F(6))]


@pytest.mark.parametrize("times", [1, 3])
def test_a_stretch_touches_a_side_that_is_straight_in_moment_at_each_end(times):
    # From 90 to 60 lb, the moment 20 W + 30 x, against 40 W - 1000: 200 lb in at 60 lb, 800 at 90 lb.
    wedge = shape((500, 50), (1000, 100), (3000, 100), (1000, 50), plane="moment")
    part = stretch(poly(60), poly(90), poly(0, 30 * times), poly(20 * times), over=poly(times))

    touched(touching_envelope(part, wedge, "longitudinal", (F(0), F(50))), F(20, 3), F(80, 3))
    # Against 10 W it is the other way: -600 lb in at 60 lb, -900 at 90 lb.
    touched(touching_envelope(part, wedge, "longitudinal", (F(-50), F(0))), -20, -30)


def touches(part, at):
    return any(root.low <= at <= root.high for root in touching_envelope(part, BOX, "longitudinal", BROAD))


BROAD = (F(0), F(100))


def test_a_touch_beyond_the_end_of_a_side_by_a_millionth_of_its_ends_still_counts():
    """The sides reach from 50 to 100 lb: above, 50 + 100 + 1 millionths of a lb. Below 50 lb it is twice 50
    and 1, for a point there comes no farther up. 1500 + 10 x lb in at 20 in; 750 + 10 x.
    """
    for beyond, counts in ((F("0.0001505"), True), (F("0.0001515"), False)):
        part = point(poly(100 + beyond), poly(1500, 10))
        assert touches(part, (2000 + 20 * beyond - 1500) / 10) is counts
    for beyond, counts in ((F("0.0001005"), True), (F("0.0001015"), False)):
        part = point(poly(50 - beyond), poly(750, 10))
        assert touches(part, (1000 - 20 * beyond - 750) / 10) is counts


def test_a_stretch_whose_lateral_moment_varies_touches_a_limit_of_moments_at_each_end():
    # 15 in throughout, x + W lb in right: 250 lb in at 90 lb where x is 160, at 60 lb where it is 190.
    part = stretch(poly(60), poly(90), poly(0), poly(15), lateral=(poly(0, 1), poly(1)))

    touched(touching_across(part, by_cg("moment", 100), (F(1), F(300))), 160, 190)


@pytest.mark.parametrize("over", [1, 5])
def test_a_stretch_touches_the_left_corner_of_a_lateral_limit_too(over):
    # As before, x lb in left: 2 in at 67.5 lb, where it is at 20 in, are 135; at 90 lb, at 15 in, 180.
    part = stretch(poly(60), poly(90), poly(1350 * over), poly(0), lateral=(poly(0, -1),), over=poly(over))

    touched(touching_across(part, by_cg(), (F(1), F(300))), 135, 180)


@pytest.mark.parametrize("over", [1, 5])
def test_a_bent_stretch_touches_a_corner_of_a_lateral_limit_each_time_it_passes(over):
    # The arm W / 10 + 600 / W + 4 is 20 in at 60 and at 100 lb, less in between, more at 50 and at 120 lb.
    # Across x + W lb in, 3 in right at 60 lb where x is 120, at 100 lb where it is 200.
    moment = poly(600 * over), poly(4 * over), poly(F(over, 10))
    part = stretch(poly(50), poly(120), *moment, lateral=(poly(0, 1), poly(1)), over=poly(over))

    touched(touching_across(part, by_cg(), (F(100), F(250))), 120, 200)
    # 2 in left: x is -180 and -300.
    touched(touching_across(part, by_cg(), (F(-350), F(-150))), -180, -300)


def test_levels_that_are_fractions_are_touched_where_they_are():
    part = point(poly(60, 1), poly(900, 30))
    box = shape((10, "50.5"), (10, "100.25"), (20, "100.25"), (20, "50.5"))

    touched(touching_envelope(part, box, "longitudinal", (F(0), F(50))), 30, F(161, 4))


STEPPED = shape((0, 10), (0, 30), (4, 30), (4, 20), (8, 20), (8, 10))


def test_a_part_at_the_weights_of_the_upper_sides_touches_them():
    touched(touching_envelope(point(poly(25), poly(0, 1)), STEPPED, "longitudinal", (F(1), F(300))), 100)
    touched(touching_envelope(point(poly(15), poly(0, 1)), STEPPED, "longitudinal", (F(1), F(300))), 120)


def test_a_stretch_past_a_step_touches_both_of_its_corners():
    # x lb in throughout, from 25 to 15 lb: 4 in at 25 lb, 8 in at 15 lb, 4 and 8 in at 20 lb.
    part = stretch(poly(15), poly(25), poly(0, 1), poly(0))

    touched(touching_envelope(part, STEPPED, "longitudinal", (F(10), F(200))), 80, 100, 120, 160)


def test_a_stretch_touches_the_corner_a_slanted_side_begins_at():
    # x lb in throughout, from 60 to 40 lb: 15 and 40 in at 50 lb, 14 in at 60 lb.
    part = stretch(poly(40), poly(60), poly(0, 1), poly(0))

    touched(touching_envelope(part, LEANING, "longitudinal", (F(700), F(2300))), 750, 840, 2000)
