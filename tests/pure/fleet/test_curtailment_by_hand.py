"""What an operator's margins leave, worked by hand: every figure exact, ends of ranges included."""

from fractions import Fraction

import pytest

from fleet.curtailment import NONE, Amounts, CurtailedShape, Curtailment, Inset, holding
from fleet.envelope import Shape
from fleet.sourced import Source
from tests.pure.fleet.test_curtailment import curtailment

F = Fraction
SQUARE = ((100, 2000), (100, 4000), (110, 4000), (110, 2000))


def shape(corners=SQUARE, plane="arm"):
    return Shape(plane, [(F(x), F(y)) for x, y in corners])


def left(*rows, corners=SQUARE, plane="arm", axis="longitudinal"):
    return CurtailedShape(shape(corners, plane), [curtailment(*rows)], axis)


def arm(value):
    return Inset(arm=F(value))


def moment(value):
    return Inset(moment=F(value))


def test_an_inset_is_an_arm_and_a_moment_that_counts_for_less_the_heavier_the_aircraft():
    assert Inset(F(0), F(0)) == NONE
    assert Inset(F(1), F(3000)).at(F(2000)) == F("2.5")
    assert arm("0.25").at(F(2000)) == F("0.25")
    assert arm(0).at(F(0)) == 0  # no moment, so nothing is divided
    assert Inset(F(1), F(2)).plus(Inset(F(10), F(20))) == Inset(F(11), F(22))


@pytest.mark.parametrize(
    ("least", "most", "held"),
    [
        (None, None, [True, True, True]),
        (2000, None, [False, True, True]),
        (None, 2000, [True, True, False]),
        (2000, 2000, [False, True, False]),
    ],
)
def test_a_row_holds_from_its_least_to_its_most_weight_both_included(least, most, held):
    row = Amounts(None if least is None else F(least), None if most is None else F(most))
    assert [row.hold(F(weight)) for weight in (1999, 2000, 2001)] == held


def test_forward_and_left_are_the_low_edges_aft_and_right_the_high_ones():
    row = Amounts(None, None, forward=arm(1), aft=arm(2), left=arm(3), right=arm(4))
    assert row.sides("longitudinal") == (arm(1), arm(2))
    assert row.sides("lateral") == (arm(3), arm(4))
    assert Amounts(None, None).sides("lateral") == (NONE, NONE)


def test_a_curtailment_moves_nothing_where_no_row_holds_and_each_side_by_the_greater_where_two_meet():
    """At 3,000 lb 1,500 lb in are half an inch."""
    rows = (
        Amounts(F(2000), F(3000), forward=moment(1500), aft=arm(2)),
        Amounts(F(3000), None, forward=arm("0.4"), aft=arm(3)),
    )
    one = curtailment(*rows)
    assert one.insets("longitudinal", F(1999)) == (NONE, NONE)
    assert one.insets("longitudinal", F(2000)) == (moment(1500), arm(2))
    assert one.insets("longitudinal", F(3000)) == (moment(1500), arm(3))
    assert one.insets("longitudinal", F(3001)) == (arm("0.4"), arm(3))
    assert one.insets("lateral", F(3000)) == (NONE, NONE)


def test_curtailments_add_up_and_each_moves_its_own_axis():
    two = [
        curtailment(Amounts(None, None, forward=arm(1), left=moment(7)), name="A"),
        curtailment(Amounts(None, None, forward=moment(2000), right=arm(2)), name="B"),
    ]
    along = CurtailedShape(shape(), two, "longitudinal")
    across = CurtailedShape(shape(), two, "lateral")

    assert along.insets(F(2000)) == (Inset(F(1), F(2000)), NONE)
    assert across.insets(F(2000)) == (moment(7), arm(2))
    assert along.arms_at(F(2000)) == ((F(102), F(110)),)
    assert across.arms_at(F(3500)) == ((F(100) + F(7, 3500), F(108)),)
    assert (along.axis, along.curtailments) == ("longitudinal", tuple(two))


def test_of_a_configuration_or_phase_without_an_amount_on_the_axis_nothing_holds():
    nothing = curtailment(Amounts(None, None), Amounts(F(1), None))
    later = curtailment(Amounts(None, F(1)), Amounts(F(1), None, aft=arm(1)))
    aft = curtailment(Amounts(None, None, aft=arm(1)))
    assert holding((nothing, later, aft), "take-off", "longitudinal") == (later, aft)
    assert holding((nothing, later, aft), "take-off", "lateral") == ()


def test_beyond_the_envelope_there_is_no_arm_and_at_its_ends_there_is():
    moved = left(Amounts(None, None, forward=arm(1)))
    assert moved.arms_at(F(2000)) == moved.arms_at(F(4000)) == ((F(101), F(110)),)
    assert moved.arms_at(F(1999)) == moved.arms_at(F(4001)) == ()
    assert (moved.lowest, moved.highest) == (2000, 4000)


def test_what_is_left_of_no_width_is_still_left():
    """5 in from either side of 10: one arm."""
    assert left(Amounts(None, None, arm(5), arm(5))).arms_at(F(3000)) == ((F(105), F(105)),)
    assert left(Amounts(None, None, arm(5), arm("5.01"))).arms_at(F(3000)) == ()


def test_a_moment_leaves_the_weights_from_which_it_counts_for_little_enough():
    """Forward 1,000 lb in: at 100.4 in 1000 / W is 0.4 or less from 2,500 lb on. Aft 500: at 109.8 in from
    2,500 lb on, too.
    """
    moved = left(Amounts(None, None, moment(1000), moment(500)))
    assert moved.weights_at(F("100.4")) == ((F(2500), F(4000)),)
    assert moved.weights_at(F("109.8")) == ((F(2500), F(4000)),)
    assert moved.weights_at(F("100.25")) == ((F(4000), F(4000)),)
    assert moved.weights_at(F("100.2")) == ()
    assert moved.weights_at(F(105)) == ((F(2000), F(4000)),)
    assert moved.weights_at(F(99)) == moved.weights_at(F(111)) == ()


def test_at_the_very_arm_of_a_moved_side_a_moment_more_leaves_nothing():
    moved = left(Amounts(None, None, Inset(F(1), F(500))))
    assert moved.weights_at(F(101)) == ()
    assert left(Amounts(None, None, arm(1))).weights_at(F(101)) == ((F(2000), F(4000)),)


def test_a_moment_of_less_than_one_counts_too():
    """0.75 lb in are a 4,000th of an inch at 3,000 lb."""
    moved = left(Amounts(None, None, moment("0.75")))
    assert moved.weights_at(100 + F(1, 4000)) == ((F(3000), F(4000)),)


def test_amounts_that_are_no_whole_numbers_are_exact():
    moved = left(Amounts(None, None, Inset(F(1, 3), F(100, 7)), Inset(F(2, 9), F(3, 11))))
    assert moved.arms_at(F(3000)) == ((100 + F(1, 3) + F(1, 210), 110 - F(2, 9) - F(1, 11000)),)
    assert moved.arms_at(F(4000)) == ((100 + F(1, 3) + F(1, 280), 110 - F(2, 9) - F(3, 44000)),)


def test_an_arm_leaves_every_weight_or_none_along_a_level_side():
    moved = left(Amounts(None, None, arm(1), arm(2)))
    assert moved.weights_at(F(101)) == moved.weights_at(F(108)) == ((F(2000), F(4000)),)
    assert moved.weights_at(F("100.99")) == moved.weights_at(F("108.01")) == ()


def test_rows_end_at_their_own_weights():
    """2 in from 2,500 to 3,000 lb."""
    moved = left(Amounts(F(2500), F(3000), forward=arm(2)))
    assert [moved.arms_at(F(weight))[0][0] for weight in (2499, 2500, 2750, 3000, 3001)] == [
        100,
        102,
        102,
        102,
        100,
    ]
    assert moved.weights_at(F(101)) == ((F(2000), F(2500)), (F(3000), F(4000)))


def test_rows_that_end_beyond_the_envelope_or_at_its_ends_cut_nothing():
    for least, most in ((None, 5000), (1000, None), (2000, 4000), (1000, 5000)):
        row = Amounts(None if least is None else F(least), None if most is None else F(most), arm(1))
        assert left(row).slabs.levels == (2000, 4000)


SLOPING = ((100, 2000), (105, 4000), (130, 4000), (130, 2000))


@pytest.mark.parametrize(
    ("forward", "at", "weights"),
    [
        # The front edge is 95 + W/400, and m/W more: W*W + (95 - a)*400*W + 400*m is 0 or less between roots.
        (15525, "107.5", ((2300, 2700),)),  # 5000 +- 400, halved
        (9375, "105", ((2000, 2500),)),  # 1,500 and 2,500
        (12000, "106", ((2000, 2400),)),  # 2,000 and 2,400
        (15625, "107.5", ((2500, 2500),)),  # both roots 2,500
        (15626, "107.5", ()),  # none
        (24000, "111", ((2400, 4000),)),  # 2,400 and 4,000
        ("48125/3", "323/3", ((2500, F(7700, 3)),)),
    ],
)
def test_along_a_sloping_edge_a_moment_leaves_what_lies_between_two_roots(forward, at, weights):
    moved = left(Amounts(None, None, moment(forward)), corners=SLOPING)
    assert moved.weights_at(F(at)) == weights


def test_along_an_edge_that_falls_back_a_moment_leaves_what_lies_above_one_root():
    """The front edge is 110 - W/400, and m/W more. At 104 in W*W - 2400*W - 400*m is 0 or more from its upper
    root on, 1200 + sqrt(1,440,000 + 400*m): with m = 6,400 at 3,200, with m = 4,200 at no rational weight,
    and then the end is moved inward.
    """
    falling = ((105, 2000), (100, 4000), (130, 4000), (130, 2000))
    rational = left(Amounts(None, None, moment(6400)), corners=falling)
    assert rational.weights_at(F(104)) == ((F(3200), F(4000)),)
    ((low, high),) = left(Amounts(None, None, moment(4200)), corners=falling).weights_at(F(104))
    assert high == 4000
    assert (low - 1200 - F(1, 2**79)) ** 2 < 3_120_000 < (low - 1200) ** 2


NARROWING = ((100, 2000), (105, 4000), (115, 4000), (120, 2000))


def test_a_margin_may_leave_the_middle_of_an_envelope_only():
    """The edges are 95 + W/400 and 125 - W/400; 21,875 lb in from either meet at 2,500 and at 3,500 lb."""
    both = Amounts(None, None, moment(21875), moment(21875))
    moved = left(both, corners=NARROWING)
    assert moved.weights_at(F(110)) == ((F(2500), F(3500)),)
    assert moved.arms_at(F(3000)) == ((F("102.5") + F(21875, 3000), F("117.5") - F(21875, 3000)),)
    assert moved.arms_at(F(2499)) == moved.arms_at(F(3501)) == ()
    assert list(moved.used_up()) == [(F(2000), F(4000))]


def test_an_irrational_end_is_told_inside_and_less_than_a_hair_from_the_edge():
    """22,000 lb in from either side: W*W - 6000*W + 8,800,000 is 0 at 3,000 -+ sqrt(200,000)."""
    moved = left(Amounts(None, None, moment(22000), moment(22000)), corners=NARROWING)
    ((low, high),) = moved.weights_at(F(110))
    assert (low - 3000) ** 2 < 200_000 < (low - F(1, 2**79) - 3000) ** 2
    assert (high - 3000) ** 2 < 200_000 < (high + F(1, 2**79) - 3000) ** 2


NOTCHED = (
    (100, 2000),
    (100, 4000),
    (104, 4000),
    (104, 3000),
    (106, 3000),
    (106, 4000),
    (110, 4000),
    (110, 2000),
)


def test_as_long_as_one_of_two_parts_is_left_nothing_is_used_up():
    """2.5 in forward use up neither part of 4 in; 2.5 from either side use up both above 3,000 lb."""
    assert list(left(Amounts(None, None, arm("2.5")), corners=NOTCHED).used_up()) == []
    both = left(Amounts(None, None, arm("2.5"), arm("2.5")), corners=NOTCHED)
    assert list(both.used_up()) == [(F(3000), F(4000))]
    assert both.arms_at(F(2500)) == ((F("102.5"), F("107.5")),)
    narrow = ((100, 2000), (100, 4000), (104, 4000), (104, 3000), (109, 3000), *NOTCHED[5:])
    narrow = tuple((109, y) if (x, y) == (106, 4000) else (x, y) for x, y in narrow)
    one = left(Amounts(None, None, arm(1), arm(1)), corners=narrow)  # 1 in wide from 109 to 110
    assert list(one.used_up()) == []
    assert one.arms_at(F(3500)) == ((F(101), F(103)),)
    assert len(one.slabs.trapezoids[1]) == 1


def test_what_is_left_of_no_width_at_every_weight_is_not_used_up():
    assert list(left(Amounts(None, None, arm(5), arm(5))).used_up()) == []
    assert list(left(Amounts(None, None, arm(5), arm("5.001"))).used_up()) == [(F(2000), F(4000))]
    light = [(x, F(y, 40000)) for x, y in SQUARE]
    assert list(left(Amounts(None, None, arm(5), arm("4.999")), corners=light).used_up()) == []


# Two parts beside each other above 2,000 lb: the one of NARROWING, and aft of it one that stays as wide.
TWO_PARTS = (
    (100, 1000),
    (100, 2000),
    (105, 4000),
    (115, 4000),
    (120, 2000),
    (140, 2000),
    (140, 4000),
    (180, 4000),
    (180, 1000),
)


@pytest.mark.parametrize(
    ("amount", "parts"),
    [
        (21875, 2),  # left between 2,500 and 3,500 lb
        (22500, 2),  # at 3,000 lb, by no width
        (22501, 1),
        (19999, 2),  # left at either end
    ],
)
def test_a_part_is_left_out_where_nothing_of_it_is_left_at_any_weight(amount, parts):
    moved = left(Amounts(None, None, moment(amount), moment(amount)), corners=TWO_PARTS)
    assert [len(pieces) for pieces in moved.slabs.trapezoids] == [1, parts]


def test_where_two_rows_meet_nothing_may_be_left_at_that_one_weight():
    """6 in aft up to 3,000 lb, 6 in forward from there: at 3,000 lb both count, of 10 in."""
    moved = left(Amounts(None, F(3000), aft=arm(6)), Amounts(F(3000), None, forward=arm(6)))
    assert list(moved.used_up()) == [(F(3000), F(3000))]
    assert moved.arms_at(F(3000)) == ()
    assert moved.arms_at(F(2999)) == ((F(100), F(104)),)
    halves = [(x, F(y, 3)) for x, y in SQUARE]
    third = left(
        Amounts(None, F(2000, 3), aft=arm(6)), Amounts(F(2000, 3) + 1, None, forward=arm(6)), corners=halves
    )
    assert list(third.used_up()) == []
    meeting = left(Amounts(None, F(2501, 3), aft=arm(6)), Amounts(F(2501, 3), None, arm(6)), corners=halves)
    assert list(meeting.used_up()) == [(F(2501, 3), F(2501, 3))]


@pytest.mark.parametrize(
    ("corners", "tip"),
    [(((100, 2000), (105, 4000), (110, 2000)), 4000), (((105, 2000), (100, 4000), (110, 4000)), 2000)],
)
@pytest.mark.parametrize("plane", ["arm", "moment"])
def test_of_an_envelope_that_runs_to_a_point_up_or_down_the_tip_may_go(corners, tip, plane):
    points = [(x * y if plane == "moment" else x, y) for x, y in corners]
    half = left(Amounts(None, None, arm("0.5"), arm("0.5")), corners=points, plane=plane)
    assert list(half.used_up()) == []
    assert half.arms_at(F(tip)) == ()
    assert list(left(Amounts(None, None, arm(6), arm(6)), corners=points, plane=plane).used_up()) == [
        (F(2000), F(4000))
    ]


def test_a_row_that_holds_at_the_tip_alone_may_use_up_more_than_the_tip():
    """The tent is 1 in wide at 3,800 lb: half an inch from either side leaves its middle, an inch nothing."""
    tent = ((100, 2000), (105, 4000), (110, 2000))
    half, inch = (left(Amounts(F(3800), None, arm(value), arm(value)), corners=tent) for value in ("0.5", 1))
    assert list(half.used_up()) == []
    assert list(inch.used_up()) == [(F(3800), F(4000))]


def test_a_curtailment_keeps_what_it_is_for():
    source = Source("OM-A", "4", "8-12")
    one = Curtailment("FUEL", "fuel", ("landing",), (Amounts(None, None),), source)
    assert (one.configurations, one.categories) == ((), ())
