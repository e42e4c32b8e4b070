"""The least margin of a path to an envelope, by hand: at an end, at a corner, in a dip, beyond it."""

from fractions import Fraction

import pytest

from fleet.envelope import Shape
from loads.balance.path import Knot, Stretch
from loads.balance.path_curve import curves_of
from loads.balance.path_margin import Beyond, least_margin
from loads.balance.path_outside import Nearest
from loads.balance.surd import Surd, rational

F = Fraction


def shape(*points, plane="arm"):
    return Shape(plane, [(F(x), F(y)) for x, y in points])


def flown(top, bottom, moment, bend=0):
    """A stretch from one weight down to another; `moment` of the weight, straight but for the bend."""
    start, end = (Knot(F(w), F(moment(F(w))), F(0)) for w in (top, bottom))
    return Stretch("flight", ("LEFT",), start, end, F(bend))


def worst_of(limits, *stretches):
    return least_margin(curves_of(stretches, "longitudinal"), limits)


def same(one, other):
    return not one.below(other) and not other.below(one)


BOX = shape((10, 50), (10, 100), (20, 100), (20, 50))
# Two slabs: 0 to 8 in from 10 to 20 lb, 0 to 4 in from 20 to 30 lb.
STEPPED = shape((0, 10), (0, 30), (4, 30), (4, 20), (8, 20), (8, 10))
# Between 20 and 30 lb two pieces, 0 to 3 in and 6 to 9 in.
FORKED = shape((0, 10), (0, 30), (3, 30), (3, 20), (6, 20), (6, 30), (9, 30), (9, 10))
# The forward edge goes forward with weight: 20 - W / 10.
LEANING = shape((15, 50), (10, 100), (40, 100), (40, 50))
# The same mirrored: the aft edge is W / 10 - 20.
MIRRORED = shape((-40, 50), (-40, 100), (-10, 100), (-15, 50))


def test_a_straight_stretch_is_worst_at_an_end():
    # 12.5 in at 90 lb, 18 in at 60 lb: 2.5 in from the forward edge, 2 in from the aft one.
    stretch = flown(90, 60, lambda w: 1080 + (w - 60) * F(3, 2))

    found = worst_of(BOX, stretch)

    assert found == Nearest(stretch, rational(F(60)), rational(F(2)), BOX.slabs.trapezoids[0][0], True, F(60))


@pytest.mark.parametrize(
    ("top_arm", "bottom_arm", "weight", "margin", "aft"),
    [
        (12, 18, 90, 2, False),  # as near at both: the first in flight
        (18, 12, 90, 2, True),
        (15, 15, 90, 5, False),  # in the middle the forward edge is named
        (10, 15, 90, 0, False),
        (15, 20, F(121, 2), 0, True),
        (F(21, 2), 20, F(121, 2), 0, True),
    ],
)
def test_of_equals_the_first_counts_and_on_the_edge_is_inside(top_arm, bottom_arm, weight, margin, aft):
    first, last = 90 * F(top_arm), F(121, 2) * F(bottom_arm)
    stretch = flown(90, F(121, 2), lambda w: first if w == 90 else last)

    found = worst_of(BOX, stretch)

    assert (found.weight, found.margin, found.aft) == (rational(F(weight)), rational(F(margin)), aft)
    assert found.floor == F(121, 2)


def test_of_several_stretches_the_least_margin_counts_of_equals_the_first():
    near, far = flown(90, 60, lambda w: 11 * w), flown(90, 60, lambda w: 13 * w)
    again = flown(80, 70, lambda w: 11 * w)

    assert worst_of(BOX, far, near).stretch is near
    assert worst_of(BOX, near, far).stretch is near
    assert worst_of(BOX, near, again).stretch is near
    assert worst_of(BOX, again, near).stretch is again


def test_where_the_envelope_jumps_the_narrower_side_counts_too():
    # 1.5 in at 25 lb, 3.1875 in at 20 lb, 6 in at 15 lb.
    stretch = flown(25, 15, lambda w: F(75, 2) + (25 - w) * F(21, 4))

    found = worst_of(STEPPED, stretch)

    upper = STEPPED.slabs.trapezoids[1][0]
    assert found == Nearest(stretch, rational(F(20)), rational(F(13, 16)), upper, True, F(20))


def test_a_path_may_run_along_the_whole_height_of_an_envelope():
    stretch = flown(30, 10, lambda w: 2 * w)

    found = worst_of(STEPPED, stretch)

    assert (found.weight, found.margin, found.aft) == (rational(F(30)), rational(F(2)), False)


def test_a_margin_that_dips_between_the_ends_is_found_there():
    # 490/W + 8 - 20 + W/10: 2.44 at 90 lb, 2.17 at 60 lb, 2 at 70 lb = sqrt(4900).
    stretch = flown(90, 60, lambda w: 490 + 8 * w)

    found = worst_of(LEANING, stretch)

    sides = LEANING.slabs.trapezoids[0][0]
    assert found == Nearest(stretch, rational(F(70)), rational(F(2)), sides, False, F(60))
    mirrored = worst_of(MIRRORED, flown(90, 60, lambda w: -490 - 8 * w))
    assert (mirrored.weight, mirrored.margin, mirrored.aft) == (rational(F(70)), rational(F(2)), True)


def test_a_dip_at_an_irrational_weight_is_exact():
    found = worst_of(LEANING, flown(90, 60, lambda w: 480 + 8 * w))

    assert same(found.weight, Surd(F(0), F(40), F(3)))  # sqrt(4800)
    assert same(found.margin, Surd(F(-12), F(8), F(3)))  # -12 + 2 sqrt(48)


@pytest.mark.parametrize(
    ("top", "bottom", "weight"), [(90, 75, 75), (65, 60, 65), (90, 70, 70), (70, 60, 70), (71, 69, 70)]
)
def test_a_dip_beyond_an_end_does_not_count(top, bottom, weight):
    found = worst_of(LEANING, flown(top, bottom, lambda w: 490 + 8 * w))

    margin = F(490, weight) - 12 + F(weight, 10)
    assert (found.weight, found.margin) == (rational(F(weight)), rational(margin))


def test_a_path_that_touches_the_edge_in_a_dip_is_inside_and_a_little_lower_is_not():
    on = worst_of(LEANING, flown(90, 60, lambda w: 490 + 6 * w))
    out = worst_of(LEANING, flown(90, 60, lambda w: 490 + F(59, 10) * w))

    assert (on.weight, on.margin) == (rational(F(70)), rational(F(0)))
    assert (out.weight, out.margin) == (rational(F(70)), rational(F(-1, 10)))


def test_a_bent_stretch_dips_to_an_edge_that_is_straight():
    # The arm is 900/W - 10 + W/4 in: 20 at 60 lb, where it turns, and 22.5 at both ends.
    box = shape((15, 30), (15, 100), (40, 100), (40, 30))
    moments = {90: 2025, 40: 900}
    stretch = flown(90, 40, lambda w: moments[w], bend=F(1, 4))

    found = worst_of(box, stretch)

    assert (found.weight, found.margin, found.aft) == (rational(F(60)), rational(F(5)), False)


def test_in_the_moment_plane_edges_are_straight_in_moment():
    # The forward edge is 500 lb in at every weight; 1000 lb in along the path.
    wedge = shape((500, 50), (500, 100), (3000, 100), (3000, 50), plane="moment")
    found = worst_of(wedge, flown(90, 60, lambda w: 1000 + 0 * w))

    assert (found.weight, found.margin, found.aft) == (rational(F(90)), rational(F(500, 90)), False)


@pytest.mark.parametrize(
    ("arm", "number", "margin", "aft"),
    [(1, 0, 1, False), (2, 0, 1, True), (7, 1, 1, False), (F(17, 2), 1, F(1, 2), True)],
)
def test_inside_one_of_two_pieces_the_margin_is_that_to_its_sides(arm, number, margin, aft):
    stretch = flown(28, 22, lambda w: arm * w)

    found = worst_of(FORKED, stretch)

    sides = FORKED.slabs.trapezoids[1][number]
    assert found == Nearest(stretch, rational(F(28)), rational(F(margin)), sides, aft, F(22))


def test_from_one_piece_to_the_other_it_is_worst_half_way_between_them():
    # 1 in at 28 lb, 8 in at 22 lb: 4.5 in at 616/25 = 24.64 lb.
    found = worst_of(FORKED, flown(28, 22, lambda w: 28 + (28 - w) * F(148, 6)))

    assert (found.weight, found.margin) == (rational(F(616, 25)), rational(F(-3, 2)))


def test_bent_it_is_worst_half_way_too_at_an_irrational_weight():
    moments = {28: 28, 22: 176}
    found = worst_of(FORKED, flown(28, 22, lambda w: moments[w], bend=F(1, 10)))

    # 1 in at 28 lb and 8 in at 22 lb as before: 4.5 in at a root of a quadratic.
    assert found.weight.factor
    assert same(found.margin, rational(F(-3, 2)))


def test_outside_the_worst_point_may_be_a_dip():
    # 490/W + 5 - 20 + W/10: -0.56 at 90 lb, -1 at 70 lb, -0.83 at 60 lb.
    found = worst_of(LEANING, flown(90, 60, lambda w: 490 + 5 * w))

    assert (found.weight, found.margin, found.aft) == (rational(F(70)), rational(F(-1)), False)


@pytest.mark.parametrize(
    ("top", "bottom", "weight", "by"),
    [(40, 25, 40, 10), (25, 5, 5, 5), (33, 4, 4, 6), (36, 5, 36, 6), (35, 5, 35, 5), (61, 40, 61, 31)],
)
def test_beyond_the_weights_of_the_envelope_the_farthest_end_counts(top, bottom, weight, by):
    stretch = flown(top, bottom, lambda w: 2 * w)

    assert worst_of(STEPPED, stretch) == Beyond(stretch, F(weight), F(by))


def test_beyond_is_worse_than_outside_and_the_farthest_of_all_is_named():
    outside, above = flown(28, 22, lambda w: 100 * w), flown(F(61, 2), 28, lambda w: 2 * w)
    below = flown(12, 9, lambda w: 2 * w)

    assert worst_of(STEPPED, outside, above) == Beyond(above, F(61, 2), F(1, 2))
    assert worst_of(STEPPED, above, below, outside) == Beyond(below, F(9), F(1))


def test_a_path_without_a_stretch_is_refused():
    with pytest.raises(ValueError, match=r"^a path without a stretch has no margin$"):
        least_margin([], BOX)


def in_units(points, moment, ends, bend, *, lengths, weights, plane="arm"):
    """The worst point of one stretch, everything told in units so many of which are the plain ones."""
    across = lengths if plane == "arm" else lengths * weights
    limits = shape(*((F(x) * across, F(y) * weights) for x, y in points), plane=plane)
    start, end = (Knot(F(w) * weights, F(moment(F(w))) * lengths * weights, F(0)) for w in ends)
    return worst_of(limits, Stretch("flight", ("LEFT",), start, end, F(bend) * lengths / weights))


LEANS = (15, 50), (10, 100), (40, 100), (40, 50)
MIRROR = (-40, 50), (-40, 100), (-10, 100), (-15, 50)
STEPS = (0, 10), (0, 30), (4, 30), (4, 20), (8, 20), (8, 10)
FORKS = (0, 10), (0, 30), (3, 30), (3, 20), (6, 20), (6, 30), (9, 30), (9, 10)
WEDGE = (500, 50), (1000, 100), (3000, 100), (1000, 50)


@pytest.mark.parametrize("weights", [F(1, 7), F(13, 3), F(1000)])
@pytest.mark.parametrize("lengths", [F(3, 11), F(25)])
@pytest.mark.parametrize(
    "path",
    [
        (LEANS, lambda w: 490 + 8 * w, (90, 60), 0),  # a dip between the ends
        (LEANS, lambda w: 480 + 8 * w, (90, 60), 0),  # one at an irrational weight
        (LEANS, lambda w: 490 + 8 * w, (90, 75), 0),
        (LEANS, lambda w: 490 + 8 * w, (65, 60), 0),
        (LEANS, lambda w: 490 + 5 * w, (90, 60), 0),  # outside
        (MIRROR, lambda w: -490 - 8 * w, (90, 60), 0),
        (MIRROR, lambda w: -10 * w, (90, 60), 0),
        (LEANS, lambda w: 10 * w, (100, 100 - F(1, 3)), 0),  # on the edge at the top
        (LEANS, lambda w: 40 * w, (90, 60), 0),  # along the aft edge
        (STEPS, lambda w: F(75, 2) + (25 - w) * F(21, 4), (25, 15), 0),
        (STEPS, lambda w: 2 * w, (30, 10), 0),
        (STEPS, lambda w: 5 * w, (F(45, 2), 15), 0),  # outside in the narrower part only
        (STEPS, lambda w: 1600 - 60 * w, (F(80, 3), 12), F(1, 2)),
        (FORKS, lambda w: 28 + (28 - w) * F(148, 6), (28, 22), 0),
        (FORKS, lambda w: 7 * w, (28, 22), 0),  # in the second of two pieces
    ],
)
def test_in_other_units_the_worst_point_is_the_same(path, lengths, weights):
    plain = in_units(*path, lengths=F(1), weights=F(1))

    found = in_units(*path, lengths=lengths, weights=weights)

    def times(number, by):
        return Surd(number.whole * by, number.factor * by, number.under)

    assert same(found.weight, times(plain.weight, weights))
    assert same(found.margin, times(plain.margin, lengths))
    assert (found.aft, found.floor) == (plain.aft, plain.floor * weights)


@pytest.mark.parametrize("weights", [F(1, 7), F(13, 3)])
@pytest.mark.parametrize(
    ("moment", "ends"),
    [
        (lambda w: 20 * w, (90, 60)),
        (lambda w: 12 * w, (90, 60)),
        (lambda w: 10 * w + 7, (90, 60)),
        (lambda w: 40 * w - 1003, (F(271, 3), 60)),
        (lambda w: 40 * w - 999, (90, 60)),
        (lambda w: 9 * w, (90, 60)),
    ],
)
def test_in_other_units_edges_straight_in_moment_are_the_same(moment, ends, weights):
    plain = in_units(WEDGE, moment, ends, 0, lengths=F(1), weights=F(1), plane="moment")

    found = in_units(WEDGE, moment, ends, 0, lengths=F(3, 11), weights=weights, plane="moment")

    assert (found.weight.whole, found.margin.whole) == (
        plain.weight.whole * weights,
        plain.margin.whole * F(3, 11),
    )
    assert found.aft is plain.aft
    # By hand: the margin to 10 W, and to 40 W - 1000, over the weight, at both ends.
    margins = [min(F(moment(F(w))) / w - 10, 40 - (F(moment(F(w))) + 1000) / w) for w in map(F, ends)]
    assert plain.margin.whole == min(margins)


@pytest.mark.parametrize("weights", [F(1, 7), F(13, 3)])
@pytest.mark.parametrize(("ends", "weight", "by"), [((40, 25), 40, 10), ((25, 5), 5, 5), ((36, 5), 36, 6)])
def test_in_other_units_a_path_is_beyond_by_the_same(ends, weight, by, weights):
    found = in_units(STEPS, lambda w: 2 * w, ends, 0, lengths=F(3, 11), weights=weights)

    assert (found.weight, found.by) == (weight * weights, by * weights)
