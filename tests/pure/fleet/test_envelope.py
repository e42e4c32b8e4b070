"""Membership and margins, named cases, and the outlines that are refused."""

from fractions import Fraction

import pytest

from fleet.envelope import NotAnEnvelope, Section, Shape, demand_polygon
from tests.pure.fleet.documents import example
from tests.pure.fleet.outlines import PLANES, Plane, outline, shape


@pytest.mark.parametrize("plane", PLANES)
def test_corners_and_edges_are_inside_and_a_hair_beyond_is_not(plane: Plane) -> None:
    normal = shape("convex", plane)
    hair = Fraction(1, 10**12)

    assert normal.holds(Fraction(5600), Fraction(90 * 5600))
    assert normal.holds(Fraction(2700), Fraction(82 * 2700))
    assert not normal.holds(Fraction(2700), Fraction(82 * 2700) - hair)
    assert not normal.holds(5600 + hair, Fraction(92 * 5600))
    assert not normal.holds(2000 - hair, Fraction(90 * 2000))


def test_a_notch_stays_a_notch() -> None:
    notched = shape("notched", "arm")

    assert not notched.holds(Fraction(2500), Fraction("-10.5") * 2500)  # between the step and the slope
    assert not notched.holds(Fraction(1600), Fraction(0))  # under the roof cut into the lower edge
    assert notched.holds(Fraction(1800), Fraction("0.5") * 1800)  # the very tip of that cut
    assert not notched.holds(Fraction(1799), Fraction("0.5") * 1799)


def test_the_two_planes_differ_between_corners() -> None:
    weight = Fraction(4200)
    straight_in_arm = 82 + Fraction("4.5") * (weight - 3400) / 1600
    point = weight, straight_in_arm * weight

    assert shape("convex", "arm").holds(*point)
    assert shape("convex", "arm").arm_section(*point) == Section(
        straight_in_arm, Fraction("95.5") - Fraction(1, 2) * 2200 / 3600, Fraction(0), "low"
    )
    moment_plane = shape("convex", "moment").arm_section(*point)
    assert moment_plane is not None
    assert moment_plane.low != straight_in_arm


@pytest.mark.parametrize("weight", [0, -5, Fraction("0.001"), 10**12])
def test_weights_beyond_the_outline_are_outside_and_without_a_margin_along_the_arm(weight: Fraction) -> None:
    assert not shape("convex", "arm").holds(Fraction(weight), Fraction(0))
    assert shape("convex", "arm").arm_section(Fraction(weight), Fraction(weight) * 90) is None


def test_margins_are_two_figures() -> None:
    normal = shape("convex", "arm")

    along = normal.arm_section(Fraction(3000), Fraction(3000 * 83))
    upward = normal.weight_section(Fraction(3000), Fraction(3000 * 83))

    assert along == Section(Fraction(82), Fraction(191, 2) - Fraction(1, 2) / 3600 * 1000, Fraction(1), "low")
    assert upward is not None
    assert (upward.low, upward.edge, upward.margin) == (
        2000,
        "high",
        3400 + Fraction(1600) / Fraction("4.5") - 3000,
    )


def test_outside_the_margin_is_negative_and_counts_to_the_nearest_stretch() -> None:
    notched = shape("notched", "arm")

    section = notched.arm_section(Fraction(1600), Fraction("0.9") * 1600)

    # At 1600 the cut runs from -2 + 2.5/3 to 2 - 1.5/3.
    assert section == Section(Fraction(3, 2), Fraction(6), Fraction("0.9") - Fraction(3, 2), "low")


def test_at_the_weight_of_a_step_both_sides_of_it_count() -> None:
    assert shape("notched", "arm").arms_at(Fraction(2300)) == ((Fraction(-12), Fraction("3.75")),)


def test_along_one_arm_a_notch_parts_the_weights() -> None:
    notched = shape("notched", "arm")

    assert notched.weights_at(Fraction(-8)) == (
        (Fraction(1500), Fraction(2300)),
        (Fraction(2400), Fraction(2850)),
    )
    assert notched.weights_at(Fraction("0.5"))[0] == (Fraction(1800), Fraction(3100))
    assert notched.weights_at(Fraction(6)) == ((Fraction(1500), Fraction(2100)),)
    assert notched.weights_at(Fraction(7)) == ()
    assert notched.weight_section(Fraction(2000), Fraction(14000)) is None


def test_published_moment_limits_come_from_straight_lines_in_arm() -> None:
    published = example("PHAK-10-9-LIMITS")  # read; its three misprints are corrected in the file
    limits = _published_limits()

    for name, printed in published["expected"].items():
        side, weight = name.split("@")
        ((low, high),) = limits.arms_at(Fraction(weight))
        ours = (low if side == "min" else high) * Fraction(weight) / 100

        assert abs(ours - printed) <= Fraction(published["tolerance"]), name


def test_the_published_sample_load_is_within_with_the_published_limits() -> None:
    published = example("PHAK-10-9-SAMPLE")  # read
    weight, printed = Fraction(published["inputs"]["weight_lb"]), published["expected"]
    moment = Fraction(published["inputs"]["moment_index_over_100"]) * 100

    section = _published_limits().arm_section(weight, moment)

    assert _published_limits().holds(weight, moment) is printed["within"]
    assert section is not None
    assert abs(section.low * weight / 100 - printed["min_index"]) <= 1
    assert abs(section.high * weight / 100 - printed["max_index"]) <= 1
    assert abs(moment / weight - Fraction(printed["cg_in"])) <= Fraction("0.01")


@pytest.mark.parametrize(
    ("points", "code"),
    [
        ([(1, 10), (2, 20)], "envelope-too-few-points"),
        ([(1, 10), (2, 20), (3, 10), (1, 10)], "envelope-repeated-point"),
        ([(1, 0), (2, 20), (3, 10)], "envelope-weight"),
        ([(1, -1), (2, 20), (3, 10)], "envelope-weight"),
        ([(1, 10), (2, 20), (3, 30)], "envelope-no-area"),
        ([(1, 10), (3, 20), (3, 10), (1, 25)], "envelope-crosses-itself"),
        ([(1, 10), (5, 10), (5, 20), (3, 10), (1, 20)], "envelope-crosses-itself"),  # touches an edge
        ([(1, 10), (5, 10), (5, 30), (5, 20), (1, 20)], "envelope-crosses-itself"),  # a spike
        (
            [(0, 10), (4, 10), (0, 30), (4, 30)],
            "envelope-no-area",
        ),  # two equal halves turned against each other
    ],
)
def test_outlines_that_are_no_polygon_are_refused(points: list[tuple[int, int]], code: str) -> None:
    with pytest.raises(NotAnEnvelope) as refused:
        demand_polygon([(Fraction(x), Fraction(y)) for x, y in points])

    assert refused.value.code == code


def test_a_crossing_too_fine_for_doubles_is_still_refused() -> None:
    far = 2**55  # from here on doubles are whole multiples of eight
    left = [(far + 8, 1000), (far, 5000)]  # at 2000 it stands at far + 6
    right = [(far + 800, 5000), (far + 5, 2000), (far + 800, 1000)]  # which this corner passes by one
    points = [(Fraction(x), Fraction(y)) for x, y in left + right]
    demand_polygon(points)  # shapely takes the corner for one at far + 8

    with pytest.raises(NotAnEnvelope) as refused:
        Shape("arm", points)

    assert refused.value.code == "envelope-crosses-itself"


@pytest.mark.parametrize("plane", PLANES)
def test_the_order_of_going_round_makes_no_difference(plane: Plane) -> None:
    forth, back = outline("notched", plane), outline("notched", plane)[::-1]

    for arm in range(-14, 8, 3):
        for weight in range(1400, 3200, 50):
            point = Fraction(weight), Fraction(arm * weight)
            assert Shape(plane, forth).holds(*point) is Shape(plane, back[5:] + back[:5]).holds(*point)


def test_lowest_and_highest_are_the_ends_of_the_outline() -> None:
    assert (shape("sloping", "moment").lowest, shape("sloping", "moment").highest) == (
        Fraction("1903.7"),
        Fraction("3333.3"),
    )


def _published_limits() -> Shape:
    corners = [
        (Fraction(row["weight_lb"]), Fraction(row["fwd_in"]), Fraction(row["aft_in"]))
        for row in example("PHAK-10-9-LIMITS")["inputs"]["cg_limits"]
    ]
    corners.insert(0, (Fraction(2000), corners[0][1], corners[0][2]))  # "2,475 or less"
    return Shape("arm", [(fwd, w) for w, fwd, _ in corners] + [(aft, w) for w, _, aft in reversed(corners)])
