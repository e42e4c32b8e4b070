"""Non-linear fuel arms: the manual's points, straight in arm or in moment; burned moment is before less
after; a table by weight states its density, and its arms belong to the volume; nothing beyond the last point.

Common practice (a swept or tapered tank fills from one end); reckoned by hand on the aircraft of
`round_figures`, 2200 lb and 218000 lb in without fuel.
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Basis, Tank, TankTable
from fleet.tanks import OutsideTable
from tests.pure.loads.making import SOURCE, F
from tests.pure.loads.round_figures import at, box, flown, q, round_basis, round_load

# Arm against volume: 100 in up to 10 US gal, 120 in at 50 US gal.
POINTS = ((0, 100), (10, 100), (50, 120))


def tapered(straight_in: Any = "arm", points: Any = POINTS, **more: Any) -> Basis:
    against, density = more.get("against", "volume"), more.get("density")
    rows = tuple((F(volume), F(arm)) for volume, arm in points)
    table = TankTable(against, "arm", straight_in, density, rows)
    return round_basis(*more.get("envelopes", ()), tanks=(Tank("MAIN", "main", F(50), F(0), table, SOURCE),))


def with_fuel(gallons: Any, trip: Any, density: str = "6.0", least: Any = 1) -> dict[str, Any]:
    document = round_load(
        start={"MAIN": q(gallons, "US gal")},
        fuel={"trip": q(trip, "US gal"), "minimum_at_landing": q(least, "US gal")},
    )
    document["fuel"]["density"]["value"] = density
    return document


def test_burned_moment_is_moment_before_less_moment_after() -> None:
    # 50 US gal at 120 in: 300 lb, 36000. 30 US gal at 110 in: 180 lb, 19800. Burned: 16200, not 120 * 120.
    result = flown(with_fuel(50, 20), tapered())
    assert at(result, "take-off") == (2500, 254_000)
    assert at(result, "landing") == (2380, 237_800)
    burned = next(line for line in result.lines if line.what == "trip fuel")
    assert (burned.weight, burned.arm, burned.moment) == (-120, 135, -16_200)


def test_straight_in_moment_is_another_figure_between_the_points() -> None:
    # Moments 6000 at 10 and 36000 at 50 US gal; half way, at 30, 21000 and not 19800.
    assert at(flown(with_fuel(50, 20), tapered("moment")), "landing") == (2380, 239_000)


def test_the_arm_belongs_to_the_volume_whatever_it_weighs() -> None:
    # 30 US gal at 7 lb each: 210 lb at 110 in, 23100
    assert at(flown(with_fuel(50, 20, "7.0"), tapered()), "landing") == (2410, 241_100)


def test_a_table_by_weight_is_turned_into_one_of_volumes_by_the_density_it_was_printed_for() -> None:
    # Printed for 5 lb/US gal: 0, 50 and 250 lb are the same 0, 10 and 50 US gal.
    printed = tapered(points=((0, 100), (50, 100), (250, 120)), against="weight", density=F(5))
    assert at(flown(with_fuel(50, 20), printed), "landing") == (2380, 237_800)


def test_beyond_the_last_point_nothing_is_extrapolated() -> None:
    curve = tapered().tanks[0].table.curve
    with pytest.raises(OutsideTable):
        curve.moment(F("50.1"), F(6))


def test_the_worst_point_lies_between_two_points_of_the_table_where_the_moment_bends() -> None:
    # The arm of n US gal is 80 + n: of w = 6 n pounds the moment is 80 w + w * w / 6. The whole aircraft, at
    # W = 2200 + w, has 2546000 / 3 - 1960 / 3 * W + W * W / 6. Over W that is least at W * W = 5092000:
    # 2256.55 lb with 56.55 lb (9.4 US gal) of fuel: an arm of (2 * sqrt(1273000) - 1960) / 3 = 98.85 in.
    air = box(90, 110, phases=("take-off",))
    basis = tapered(points=((0, 80), (40, 120)), envelopes=(air,))
    check = flown(with_fuel(40, 39), replace(basis, tanks=(replace(basis.tanks[0], capacity=F(40)),))).check(
        "path.longitudinal"
    )
    assert (check.edge, check.actual) == ("forward", "98.85")
    assert check.at is not None
    assert (check.at["weight"], check.at["tanks"]) == ("2256.5", {"MAIN": "9.4"})
    assert check.room is not None
    low, high = check.room + 90, check.room + 90 + F(1, 2**79)
    assert (3 * low + 1960) ** 2 <= 4 * 1_273_000 < (3 * high + 1960) ** 2
