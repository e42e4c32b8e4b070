"""The sums of a weighing, reckoned by hand; published weighings are in tests/reference."""

from fractions import Fraction

import pytest

from fleet.worksheet import NotWeighed, SignedLine, Sums, WeighingPoint, together, weighed

F = Fraction


def point(name, reading, tare, arm, lateral=0):
    return WeighingPoint(name, F(reading), F(tare), F(arm), F(lateral))


POINTS = (point("left", 1010, 10, 120, -50), point("right", 1000, 10, 120, 50), point("nose", 505, 5, 20))


def test_by_hand_three_points_with_tare_and_one_correction():
    """Nets 1000, 990 and 500: 2,490 lb. Moments 1000*120 + 990*120 + 500*20 = 248,800; across
    -50,000 + 49,500 = -500. Less 90 lb of fuel at 130 in: 2,400 lb and 237,100 lb in, at 98.79 in.
    """
    found = weighed(POINTS, [SignedLine("fuel on board", F(-90), F(130))])

    assert found.as_weighed == Sums(F(2490), F(248_800), F(-500))
    assert found.empty == Sums(F(2400), F(237_100), F(-500))
    assert found.empty.arm == F(237_100, 2400)
    assert found.empty.lateral_arm == F(-500, 2400)


def test_what_is_missing_is_added_at_its_own_arm():
    found = weighed(POINTS, [SignedLine("seat, in the workshop", F(30), F(160), F(14))])

    assert found.empty == Sums(F(2520), F(248_800 + 4800), F(-500 + 420))


def test_nets_stand_in_the_order_of_the_points():
    assert [net.weight for net in weighed(POINTS).nets] == [1000, 990, 500]
    assert together([]) == Sums(F(0), F(0), F(0))


@pytest.mark.parametrize(
    ("points", "code", "number"),
    [
        ((), "no-points", None),
        ((point("left", 100, -1, 5),), "tare-negative", 0),
        ((point("left", 100, 1, 5), point("right", 3, 4, 5)), "reading-below-tare", 1),
    ],
)
def test_what_cannot_be_read_is_named(points, code, number):
    with pytest.raises(NotWeighed) as refused:
        weighed(points)

    assert (refused.value.code, refused.value.point) == (code, number)


def test_corrections_that_leave_nothing_are_refused():
    with pytest.raises(NotWeighed) as refused:
        weighed(POINTS, [SignedLine("fuel", F(-2490), F(100))])

    assert refused.value.code == "nothing-left"
