"""Tank tables worked by hand: what is between two points, where the table ends, and every refusal in full."""

from fractions import Fraction

import pytest

from fleet.basis import Tank, TankTable
from fleet.sourced import Source
from fleet.tanks import NotATable, OutsideTable, TankCurve, TankPiece

F = Fraction


def curve(points, against="volume", gives="arm", straight_in="arm", density=None):
    return TankCurve(
        against=against,
        gives=gives,
        straight_in=straight_in,
        density=None if density is None else F(density),
        points=[(F(quantity), F(value)) for quantity, value in points],
    )


ARMS = ((10, 100), (20, 110), (40, 110))


def test_an_arm_against_volume_straight_in_arm():
    """At 15 the arm is half way, 105: 15 * 105 are 1,575, and at 6 a unit of volume 9,450."""
    tank = curve(ARMS)
    assert [tank.arm(F(volume)) for volume in (10, 15, 20, 30, 40)] == [100, 105, 110, 110, 110]
    assert tank.volume_moment(F(15)) == 1575
    assert tank.moment(F(15), F(6)) == 9450
    assert (tank.first, tank.last) == (10, 40)
    assert tank.one_arm is None
    # arm = 90 + V from 10 to 20, then 110: V * arm is 90 V + V * V, then 110 V.
    assert tank.pieces == (
        TankPiece(F(10), F(20), F(0), F(90), F(1)),
        TankPiece(F(20), F(40), F(0), F(110), F(0)),
    )


def test_an_arm_against_volume_straight_in_moment():
    """10 * 100 = 1,000 and 20 * 110 = 2,200; half way 1,600, at 15: 106.67 in."""
    tank = curve(ARMS, straight_in="moment")
    assert tank.volume_moment(F(15)) == 1600
    assert tank.arm(F(15)) == F(1600, 15)
    # 1000 + 120 (V - 10) = -200 + 120 V, then 2200 + 110 (V - 20) = 0 + 110 V
    assert tank.pieces == (
        TankPiece(F(10), F(20), F(-200), F(120), F(0)),
        TankPiece(F(20), F(40), F(0), F(110), F(0)),
    )


def test_moments_against_weight_hold_for_the_density_they_were_printed_for():
    """At 2 a unit of volume 20 weigh as much as 10: 3,000 of moment are 1,500 a unit of density."""
    tank = curve(((0, 0), (20, 3000)), against="weight", gives="moment", straight_in="moment", density=2)
    assert (tank.first, tank.last) == (0, 10)
    assert tank.volume_moment(F(10)) == 1500
    assert tank.moment(F(10), F(3)) == 4500
    assert tank.arm(F(5)) == 150
    assert tank.one_arm == 150


def test_moments_against_volume_straight_in_arm():
    """3,000 at 10 and density 2 is an arm of 150; 8,000 at 20 is 200."""
    tank = curve(((10, 3000), (20, 8000)), gives="moment", density=2)
    assert (tank.arm(F(10)), tank.arm(F(15)), tank.arm(F(20))) == (150, 175, 200)
    assert tank.moment(F(15), F(1)) == 15 * 175


def test_arms_against_weight_belong_to_the_volume():
    tank = curve(((20, 100), (40, 120)), against="weight", density=2)
    assert (tank.first, tank.last, tank.arm(F(15))) == (10, 20, 110)


def test_points_without_a_kink_between_them_are_one_piece():
    tank = curve(((0, 100), (10, 110), (20, 120), (30, 120)))
    assert tank.pieces == (
        TankPiece(F(0), F(20), F(0), F(100), F(1)),
        TankPiece(F(20), F(30), F(0), F(120), F(0)),
    )


@pytest.mark.parametrize(
    ("points", "straight_in", "one_arm"),
    [
        (((0, 120), (10, 120), (20, 120)), "arm", 120),
        (((0, 120), (10, 120)), "moment", 120),
        (((1, 120), (10, 120)), "arm", None),  # not down to nothing
        (((0, 120), (10, 121)), "arm", None),  # bends
        (((0, 120), (10, 120), (20, 121)), "arm", None),
    ],
)
def test_a_tank_has_one_arm_where_it_has_it_down_to_nothing(points, straight_in, one_arm):
    assert curve(points, straight_in=straight_in).one_arm == one_arm


def test_an_empty_tank_has_no_moment_and_no_arm():
    tank = curve(ARMS)
    assert tank.volume_moment(F(0)) == 0
    assert tank.moment(F(0), F(6)) == 0
    with pytest.raises(OutsideTable):
        tank.arm(F(0))


@pytest.mark.parametrize("volume", ["9.99", "40.01", "-1"])
def test_nothing_is_extrapolated(volume):
    for asked in (curve(ARMS).volume_moment, curve(ARMS).arm):
        with pytest.raises(OutsideTable) as outside:
            asked(F(volume))
        assert (outside.value.volume, outside.value.first, outside.value.last) == (F(volume), 10, 40)
        assert str(outside.value) == f"{volume} lies outside the table, which runs from 10 to 40"


@pytest.mark.parametrize(
    ("given", "code", "row", "detail"),
    [
        (
            {"points": ((0, 1),)},
            "tank-table-too-short",
            None,
            "a tank table needs at least two points; enter those of the manual",
        ),
        (
            {"points": ((-1, 1), (2, 1))},
            "tank-table-negative",
            0,
            "a quantity below zero does not exist; correct the point",
        ),
        (
            {"points": ((0, 1), (2, 1), (2, 1))},
            "tank-table-not-rising",
            2,
            "quantities must rise from point to point; correct or reorder them",
        ),
        (
            {"points": ((0, 1), (2, 1)), "against": "weight"},
            "tank-table-no-density",
            None,
            "a table by weight or in moments holds for one density; enter the one it was printed for",
        ),
        (
            {"points": ((1, 1), (2, 1)), "gives": "moment"},
            "tank-table-no-density",
            None,
            "a table by weight or in moments holds for one density; enter the one it was printed for",
        ),
        (
            {"points": ((0, 1), (2, 1)), "density": 6},
            "tank-table-density-unused",
            None,
            "a table of arms against volume holds for every density; leave it out",
        ),
        (
            {"points": ((0, 1), (2, 1)), "against": "weight", "density": 0},
            "tank-table-density",
            None,
            "a density lies above zero; correct it",
        ),
        (
            {"points": ((0, 1), (2, 1)), "gives": "moment", "straight_in": "moment", "density": 6},
            "tank-table-moment-of-nothing",
            0,
            "an empty tank has no moment; correct the first point",
        ),
        (
            {"points": ((0, 0), (2, 1)), "gives": "moment", "density": 6},
            "tank-table-no-arm",
            0,
            "moments at zero quantity give no arm to interpolate; begin at the first quantity above zero",
        ),
    ],
)
def test_points_that_make_no_table_are_refused_with_what_to_do(given, code, row, detail):
    with pytest.raises(NotATable) as refused:
        curve(**given)
    assert (refused.value.code, refused.value.row, str(refused.value)) == (code, row, detail)


def test_a_tank_has_the_moments_of_its_fuel_along_and_across():
    """10 at 6 a unit of volume are 60, at 100 along and -92 across."""
    table = TankTable("volume", "arm", "arm", None, tuple((F(v), F(arm)) for v, arm in ARMS))
    tank = Tank("LEFT", "left", F(40), F(-92), table, Source("FM", "A", "1"))
    assert (tank.moment(F(10), F(6)), tank.lateral_moment(F(10), F(6))) == (6000, -5520)
    weighed = TankTable("weight", "moment", "moment", F(2), ((F(0), F(0)), (F(20), F(3000))))
    assert (weighed.curve.last, weighed.curve.volume_moment(F(10))) == (10, 1500)


def test_a_density_just_above_zero_is_one():
    assert curve(((0, 1), (2, 1)), against="weight", density="0.5").last == 4
