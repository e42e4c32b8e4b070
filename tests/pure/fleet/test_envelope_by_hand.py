"""The shape of an envelope worked by hand, every figure of a section, and every refusal in full."""

from fractions import Fraction

import pytest

from fleet.envelope import Section, Shape, merged
from fleet.polygon import NotAnEnvelope, Slabs, demand_polygon, overlap, slabs_of

F = Fraction
SQUARE = ((100, 2000), (100, 4000), (110, 4000), (110, 2000))
# A square with a valley from its upper corners down to 3,500 lb in the middle.
CROWN = ((100, 2000), (100, 4000), (105, 3500), (110, 4000), (110, 2000))


def exact(corners):
    return [(F(x), F(y)) for x, y in corners]


def shape(corners, plane="arm"):
    return Shape(plane, exact(corners))


def moments(corners):
    return [(x * y, y) for x, y in corners]


REFUSALS = [
    (
        ((1, 10), (2, 20)),
        "envelope-too-few-points",
        "an envelope needs at least three points; enter the missing ones",
    ),
    (
        ((1, 10), (2, 20), (3, 10), (1, 10)),
        "envelope-repeated-point",
        "a point stands twice; leave the repetition out, the envelope closes by itself",
    ),
    (
        ((1, 0), (2, 20), (3, 10)),
        "envelope-weight",
        "weights of an envelope lie above zero; correct the point",
    ),
    (
        ((1, 10), (2, 20), (3, 30)),
        "envelope-no-area",
        "the points enclose no area; correct them or their order",
    ),
    (
        ((1, 10), (3, 20), (3, 10), (1, 25)),
        "envelope-crosses-itself",
        "the outline crosses or touches itself (self-intersection); enter the points in order around it",
    ),
]


@pytest.mark.parametrize(("points", "code", "detail"), REFUSALS)
def test_an_outline_that_is_no_polygon_is_refused_with_what_to_do(points, code, detail):
    with pytest.raises(NotAnEnvelope) as refused:
        demand_polygon(exact(points))
    assert (refused.value.code, str(refused.value)) == (code, detail)


def test_three_points_and_a_weight_just_above_zero_are_an_envelope():
    demand_polygon([(F(1), F(1, 10**6)), (F(2), F(20)), (F(3), F(10))])


def test_a_crossing_of_fractions_is_seen_as_one_of_whole_numbers_is():
    tenths = [(F(x, 10), F(y, 7)) for x, y in ((1, 10), (3, 20), (3, 10), (1, 25))]
    with pytest.raises(NotAnEnvelope):
        demand_polygon(tenths)
    demand_polygon([(F(x, 10), F(y, 7)) for x, y in SQUARE])


@pytest.mark.parametrize(
    ("other", "common"),
    [
        (((105, 3000), (105, 5000), (120, 5000), (120, 3000)), True),
        (((110, 2000), (110, 4000), (120, 4000), (120, 2000)), False),  # an edge alone in common
        (((110, 4000), (120, 5000), (120, 4000)), False),  # a corner alone
        (((200, 2000), (200, 4000), (210, 4000)), False),
        (((109, 3999), (109, 5000), (120, 5000), (120, F(7999, 2))), True),  # half a pound inch and less
    ],
)
def test_two_polygons_overlap_where_they_have_an_area_in_common(other, common):
    assert overlap(exact(SQUARE), exact(other)) is common
    assert overlap(exact(other), exact(SQUARE)) is common


def test_an_outline_is_cut_at_every_weight_of_a_corner():
    """Sides are positive to their right: moment - 100 W, and 110 W - moment; whole numbers of 2,000 lb."""
    slabs = slabs_of("arm", exact(SQUARE))
    assert slabs == Slabs(1, (2000, 4000), (((2000, 0, -200000, 0, -2000, 0, 220000, 0),),))
    halves = slabs_of("moment", [(F(1), F(1, 2)), (F(1), F(3)), (F(4), F(3)), (F(4), F(1, 2))])
    assert (halves.scale, halves.levels) == (2, (1, 6))
    crown = slabs_of("arm", exact(CROWN))
    assert [len(pieces) for pieces in crown.trapezoids] == [1, 2]


@pytest.mark.parametrize("plane", ["arm", "moment"])
def test_every_corner_and_edge_is_inside_and_a_hair_beyond_is_not(plane):
    one = shape(moments(CROWN) if plane == "moment" else CROWN, plane)
    hair = F(1, 10**15)
    for arm, weight in CROWN:
        assert one.holds(F(weight), F(arm) * weight)
    assert not one.holds(F(4000), F(4000) * (100 - hair))
    assert not one.holds(F(4000), F(4000) * (100 + hair))  # the valley begins at once
    assert one.holds(F(3500), F(3500) * 105)
    assert not one.holds(F(3500) + hair, (F(3500) + hair) * 105)
    assert not one.holds(F(2000) - hair, (F(2000) - hair) * 105)
    assert not one.holds(F(4000) + hair, (F(4000) + hair) * 100)


def test_a_point_is_found_whatever_its_figures_are_counted_in():
    one = shape(SQUARE)
    assert one.holds(F(6001, 2), F(6001, 2) * F(301, 3)) is True  # 100.33 in
    assert one.holds(F(6001, 2), F(6001, 2) * F(299, 3)) is False  # 99.67 in
    assert one.holds_whole(6001, 6001 * 105, 2) is True
    assert one.holds_whole(6001, 6001 * 111, 2) is False
    assert one.holds_whole(8001, 8001 * 105, 2) is False


def test_the_arms_at_a_weight_of_a_crown():
    """Above 3,500 lb the valley is an inch wider to either side every 100 lb: at 3,750 lb 102.5 to 107.5."""
    crown = shape(CROWN)
    assert crown.arms_at(F(3000)) == ((F(100), F(110)),)
    assert crown.arms_at(F(3500)) == ((F(100), F(110)),)
    assert crown.arms_at(F(3750)) == ((F(100), F("102.5")), (F("107.5"), F(110)))
    assert crown.arms_at(F(4000)) == ((F(100), F(100)), (F(110), F(110)))
    assert crown.arms_at(F(4001)) == crown.arms_at(F(1999)) == ()


def test_the_weights_along_an_arm_of_a_crown():
    crown = shape(CROWN)
    assert crown.weights_at(F(105)) == ((F(2000), F(3500)),)
    assert crown.weights_at(F("102.5")) == ((F(2000), F(3750)),)
    assert crown.weights_at(F(100)) == crown.weights_at(F(110)) == ((F(2000), F(4000)),)
    assert crown.weights_at(F("99.9")) == crown.weights_at(F("110.1")) == ()


def test_the_weights_along_an_arm_through_two_parts_and_in_the_moment_plane():
    """A notch from the front, 100 to 105 in deep, between 2,500 and 3,000 lb."""
    notched = (*SQUARE[:1], (100, 2500), (105, 2500), (105, 3000), (100, 3000), *SQUARE[1:])
    both = ((F(2000), F(2500)), (F(3000), F(4000)))
    assert shape(notched).weights_at(F(102)) == both
    assert shape(moments(notched), "moment").weights_at(F(102)) == both
    assert shape(notched).weights_at(F(105)) == ((F(2000), F(4000)),)
    assert shape(moments(SQUARE), "moment").weights_at(F(110)) == ((F(2000), F(4000)),)
    sloping = ((100, 2000), (104, 4000), (110, 4000), (110, 2000))
    assert shape(sloping).weights_at(F(101)) == ((F(2000), F(2500)),)


@pytest.mark.parametrize("turned", range(3))
def test_the_edge_that_closes_an_outline_counts_as_the_others_do(turned):
    """The front edge rises 400 lb an inch from 100 in, the rear one falls 400 from 105 in."""
    tent = ((105, 4000), (110, 2000), (100, 2000))
    one = shape(tent[turned:] + tent[:turned])
    assert one.weights_at(F(102)) == ((F(2000), F(2800)),)
    assert one.weights_at(F(108)) == ((F(2000), F(2800)),)
    assert one.arms_at(F(3000)) == ((F("102.5"), F("107.5")),)


def test_a_crossing_too_fine_for_doubles_is_told_as_one():
    far = 2**55
    left = [(far + 8, 1000), (far, 5000)]
    right = [(far + 800, 5000), (far + 5, 2000), (far + 800, 1000)]
    with pytest.raises(NotAnEnvelope) as refused:
        shape(left + right)
    assert str(refused.value) == REFUSALS[-1][2]


def test_a_corner_alone_on_an_arm_is_a_weight():
    tip = ((105, 2000), (100, 4000), (110, 4000))
    assert shape(tip).weights_at(F(100)) == ((F(4000), F(4000)),)
    assert shape(tip).weights_at(F(105)) == ((F(2000), F(4000)),)


@pytest.mark.parametrize(
    ("arm", "section"),
    [
        (103, (100, 110, 3, "low")),
        (108, (100, 110, 2, "high")),
        (105, (100, 110, 5, "low")),  # as far from either end
        (100, (100, 110, 0, "low")),
        (110, (100, 110, 0, "high")),
        (97, (100, 110, -3, "low")),
        (114, (100, 110, -4, "high")),
    ],
)
def test_a_section_is_the_stretch_the_margin_and_the_nearer_end(arm, section):
    low, high, margin, edge = section
    wanted = Section(F(low), F(high), F(margin), edge)
    assert shape(SQUARE).arm_section(F(3000), F(3000) * arm) == wanted
    along = shape(SQUARE).arm_section(F(9001, 3), F(9001, 3) * arm)
    assert along == wanted


@pytest.mark.parametrize(
    ("weight", "section"),
    [
        (2500, (2000, 4000, 500, "low")),
        (3600, (2000, 4000, 400, "high")),
        (1000, (2000, 4000, -1000, "low")),
        (4500, (2000, 4000, -500, "high")),
    ],
)
def test_a_section_of_weights(weight, section):
    low, high, margin, edge = section
    assert shape(SQUARE).weight_section(F(weight), F(weight) * 105) == Section(
        F(low), F(high), F(margin), edge
    )


def test_of_several_stretches_the_one_with_the_greatest_margin_counts_the_first_of_equals():
    crown = shape(CROWN)
    assert crown.arm_section(F(3750), F(3750) * 102) == Section(F(100), F("102.5"), F("0.5"), "high")
    assert crown.arm_section(F(3750), F(3750) * 108) == Section(F("107.5"), F(110), F("0.5"), "low")
    assert crown.arm_section(F(3750), F(3750) * 105) == Section(F(100), F("102.5"), F("-2.5"), "high")
    assert crown.arm_section(F(3750), F(3750) * 106) == Section(F("107.5"), F(110), F("-1.5"), "low")


def test_nothing_that_weighs_nothing_has_a_section_and_where_there_is_no_stretch_neither():
    one = shape(SQUARE)
    for weight in (F(0), F(-3000)):
        assert one.arm_section(weight, F(0)) is None
        assert one.weight_section(weight, F(0)) is None
    assert one.arm_section(F(4001), F(4001) * 105) is None
    assert one.weight_section(F(3000), F(3000) * 111) is None
    low = shape(((-1, F(1, 4)), (-1, 2), (1, 2), (1, F(1, 4))))
    assert low.arm_section(F(1, 2), F(0)) == Section(F(-1), F(1), F(1), "low")
    assert low.weight_section(F(1, 2), F(0)) == Section(F(1, 4), F(2), F(1, 4), "low")


def test_the_ends_of_an_outline_in_fractions_of_a_weight():
    one = shape(((0, F(1, 3)), (0, F(7, 2)), (1, 2)))
    assert (one.lowest, one.highest) == (F(1, 3), F(7, 2))


def test_stretches_that_touch_or_overlap_are_joined_whatever_their_order():
    assert list(merged([(F(5), F(6)), (F(1), F(3)), (F(3), F(4)), (F(2), F(3))])) == [
        (F(1), F(4)),
        (F(5), F(6)),
    ]
    assert list(merged([(F(1), F(9)), (F(2), F(3)), (F(8), F(10))])) == [(F(1), F(10))]
    assert list(merged([(F(1), F(1))])) == [(F(1), F(1))]
