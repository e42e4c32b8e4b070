"""Moments of fuel in a tank: published tables, the density they were printed for, and what is refused."""

from fractions import Fraction
from itertools import pairwise
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fleet.tanks import NotATable, OutsideTable, TankCurve
from tests.pure.fleet.documents import example

L_SHAPED = example("AH64-TANK")  # read: US Army TM 1-1520-238-10, par. 6.12.1


def test_an_l_shaped_tank_gives_the_arms_and_the_moment_its_manual_prints() -> None:
    tank = _l_shaped()
    printed, density = L_SHAPED["expected"], Fraction(L_SHAPED["inputs"]["density_lb_gal"])

    for gallons in L_SHAPED["inputs"]["quantities_gal"]:
        assert tank.arm(Fraction(gallons)) == Fraction(printed[f"arm@{gallons}"])
    assert Fraction(156) * density == printed["weight@156"]
    assert abs(tank.moment(Fraction(156), density) / 100 - Fraction(printed["moment/100@156"])) <= Fraction(
        "0.05"
    )


def test_burned_fuel_has_the_moment_before_less_the_moment_after() -> None:
    published = example("AH64-BURN")  # computed from the same paragraph
    before, after = Fraction(published["inputs"]["from_gal"]), Fraction(published["inputs"]["to_gal"])
    density, tank = Fraction(published["inputs"]["density_lb_gal"]), _l_shaped()

    burned = tank.moment(before, density) - tank.moment(after, density)

    printed = published["expected"]
    assert (before - after) * density == Fraction(printed["burned_lb"])
    assert burned == Fraction(printed["burned_moment"])
    assert abs(burned / Fraction(printed["burned_lb"]) - Fraction(printed["arm_of_burned_in"])) <= Fraction(
        "0.01"
    )


def test_a_table_by_weight_keeps_its_arm_at_the_volume_when_the_fuel_is_lighter() -> None:
    tank = _curve(against="weight", density=Fraction("0.8"), points=[(0, 4600), (80, 4650), (400, 4700)])

    assert tank.arm(Fraction(100)) == 4650  # 80 kg at the printed density is 100 l
    assert tank.moment(Fraction(100), Fraction("0.75")) == Fraction(75) * 4650


def test_a_table_of_moments_is_rescaled_from_the_density_it_was_printed_for() -> None:
    tank = _curve(
        gives="moment", straight_in="moment", density=Fraction("0.79"), points=[(0, 0), (100, 158_000)]
    )

    assert tank.arm(Fraction(50)) == 2000
    assert tank.moment(Fraction(50), Fraction("0.79")) == 79_000
    assert tank.moment(Fraction(50), Fraction("0.70")) == 70_000


def test_straight_in_arm_and_straight_in_moment_differ_between_points_and_agree_at_them() -> None:
    points = [(10, 100), (30, 160)]
    by_arm, by_moment = _curve(points=points), _curve(points=points, straight_in="moment")

    assert by_arm.moment(Fraction(20), Fraction(1)) == 20 * 130
    assert by_moment.moment(Fraction(20), Fraction(1)) == Fraction(10 * 100 + 30 * 160, 2)
    assert [by_arm.moment(Fraction(v), Fraction(2)) for v, _ in points] == [
        by_moment.moment(Fraction(v), Fraction(2)) for v, _ in points
    ]


def test_moments_straight_in_arm_begin_above_zero_quantity() -> None:
    tank = _curve(gives="moment", density=Fraction(2), points=[(10, 2000), (20, 4400)])

    assert tank.arm(Fraction(15)) == 105
    assert tank.moment(Fraction(0), Fraction(2)) == 0


@pytest.mark.parametrize("volume", [Fraction("156.001"), Fraction(-1), Fraction(1, 10**9)])
def test_nothing_is_extrapolated_beyond_the_last_or_below_the_first_point(volume: Fraction) -> None:
    tank = _curve(points=[(10, 150), (156, 153)])

    with pytest.raises(OutsideTable) as refused:
        tank.moment(volume, Fraction("6.5"))

    assert (refused.value.first, refused.value.last) == (10, 156)


def test_an_empty_tank_has_no_moment_and_no_arm() -> None:
    tank = _curve(points=[(10, 150), (156, 153)])

    assert tank.moment(Fraction(0), Fraction("6.5")) == 0
    with pytest.raises(OutsideTable):
        tank.arm(Fraction(0))


@pytest.mark.parametrize(
    ("changes", "code", "row"),
    [
        ({"points": [(0, 1)]}, "tank-table-too-short", None),
        ({"points": [(0, 1), (5, 1), (5, 2)]}, "tank-table-not-rising", 2),
        ({"points": [(0, 1), (5, 1), (4, 2)]}, "tank-table-not-rising", 2),
        ({"points": [(-1, 1), (5, 1)]}, "tank-table-negative", 0),
        ({"against": "weight"}, "tank-table-no-density", None),
        ({"gives": "moment"}, "tank-table-no-density", None),
        ({"density": Fraction(1)}, "tank-table-density-unused", None),
        ({"against": "weight", "density": Fraction(0)}, "tank-table-density", None),
        (
            {"gives": "moment", "straight_in": "moment", "density": Fraction(1), "points": [(0, 3), (5, 9)]},
            "tank-table-moment-of-nothing",
            0,
        ),
        ({"gives": "moment", "density": Fraction(1), "points": [(0, 0), (5, 9)]}, "tank-table-no-arm", 0),
    ],
)
def test_points_that_make_no_table_are_refused(changes: dict[str, Any], code: str, row: int | None) -> None:
    with pytest.raises(NotATable) as refused:
        _curve(**({"points": [(0, 100), (50, 120)]} | changes))

    assert (refused.value.code, refused.value.row) == (code, row)


@given(
    steps=st.lists(st.integers(1, 400), min_size=2, max_size=8),
    arms=st.lists(st.integers(-5000, 5000), min_size=8, max_size=8),
    share=st.fractions(0, 1),
    straight_in=st.sampled_from(["arm", "moment"]),
)
def test_interpolation_agrees_with_a_search_from_the_first_point_on(
    steps: list[int], arms: list[int], share: Fraction, straight_in: Any
) -> None:
    volumes = [sum(steps[: n + 1]) for n in range(len(steps))]
    points = list(zip(volumes, arms, strict=False))
    volume = volumes[0] + share * (volumes[-1] - volumes[0])

    tank = _curve(points=points, straight_in=straight_in)

    assert tank.moment(volume, Fraction("0.8")) == Fraction("0.8") * _plainly(points, volume, straight_in)


def _plainly(points: list[tuple[int, int]], volume: Fraction, straight_in: str) -> Fraction:
    for (v1, a1), (v2, a2) in pairwise(points):
        if v1 <= volume <= v2:
            share = (volume - v1) / (v2 - v1)
            if straight_in == "arm":
                return volume * ((1 - share) * a1 + share * a2)
            return (1 - share) * v1 * a1 + share * v2 * a2
    raise AssertionError


def _l_shaped() -> TankCurve:
    return _curve(points=[(Fraction(v), Fraction(a)) for v, a in L_SHAPED["inputs"]["arm_against_gallons"]])


def _curve(
    *,
    points: list[tuple[Any, Any]],
    against: Any = "volume",
    gives: Any = "arm",
    straight_in: Any = "arm",
    density: Fraction | None = None,
) -> TankCurve:
    exact = [(Fraction(quantity), Fraction(value)) for quantity, value in points]
    return TankCurve(against=against, gives=gives, straight_in=straight_in, density=density, points=exact)
