"""What of a basis the bulk sums know, in full, worked by hand; and each thing they do not know enough of."""

from dataclasses import replace
from fractions import Fraction

import numpy as np
import pytest

from fleet.basis import BurnStage, FixedItem
from loads.balance.bulk.known import known_of
from tests.pure.loads.bulk.plain_basis import (
    EMPTY,
    WEIGHTS,
    plain_basis,
    plainly_known,
    table,
    with_limits,
    with_tanks,
)
from tests.pure.loads.making import envelope, place, seat

F = Fraction
INFINITE = float("inf")


def test_spots_have_their_columns_arms_and_limits():
    """Of two spots no limit is shown or it is none; that of BACK was never entered."""
    known = plainly_known()

    assert known.spots == {"LEFT": 0, "RIGHT": 1, "BACK": 2, "SPARE": 3, "HOLD": 4, "SHELF": 5}
    assert known.arms.tolist() == [80.0, 82.0, 120.0, 121.0, 150.0, 151.0]
    assert known.laterals.tolist() == [-12.0, 12.0, 1.0, 2.0, 3.0, 4.0]
    assert known.caps.tolist() == [250.0, INFINITE, INFINITE, 300.0, 100.0, 20.0]
    assert known.unknown == (2,)
    assert (known.basis, known.configuration) == (plain_basis(), plain_basis().configurations[0])


def test_a_zone_with_a_limit_is_a_column_and_one_whose_limit_was_not_entered_is_its_members():
    known = plainly_known()

    assert known.zones.tolist() == [[0.0], [1.0], [0.0], [0.0], [1.0], [0.0]]
    assert known.zones.dtype == np.float64
    assert known.zone_caps.tolist() == [300.0]
    assert known.zone_codes == ("zone.REAR",)
    assert known.unknown_zones == ((0, 4),)


def test_without_zones_there_is_no_column():
    known = plainly_known(replace(plain_basis(), zones=()))

    assert known.zones.shape == (6, 0)
    assert (known.zone_caps.tolist(), known.zone_codes, known.unknown_zones) == ([], (), ())


def test_tanks_feed_in_the_order_of_their_stages():
    known = plainly_known()
    assert (known.taxi_order, known.burn_order) == (((0,),), ((1,), (0,)))

    together = replace(plain_basis(), taxi_order=(BurnStage(("AUX", "MAIN")),))
    assert plainly_known(together).taxi_order == ((1, 0),)


def test_the_base_is_the_empty_aircraft_with_its_equipment_and_operating_items():
    """2000 + 10 + 5; 200000 + 1000 - 100; -600 + 20 - 15."""
    assert plainly_known().base == (2015.0, 200900.0, -595.0)


def test_limits_of_weight_by_phase():
    known = plainly_known()
    expected = {"ramp": 3000.0, "take-off": 2900.0, "zero fuel": INFINITE, "landing": 2800.0}
    assert known.limits == {**expected, "minimum at landing": 2800.0}
    assert known.minimum_flying == 2010.0

    none = plainly_known(with_limits(**dict.fromkeys(WEIGHTS)))
    assert set(none.limits.values()) == {INFINITE}
    assert none.minimum_flying is None


@pytest.mark.parametrize("name", WEIGHTS)
def test_a_limit_of_weight_that_was_not_entered_is_too_little(name):
    some = {each: value for each, value in WEIGHTS.items() if each != name}

    assert known_of(with_limits(**some), "one", EMPTY) is None


TABLES = {
    "one arm": (table((0, 100), (50, 100)), [0, 50], [100, 100], True, 100.0, (100.0, 100.0)),
    # 90 + v / 2, so the moment is 90 v + v**2 / 2: its slope runs from 90 to 90 + 20.
    "arms": (table((0, 90), (20, 100)), [0, 20], [90, 100], True, None, (90.0, 110.0)),
    # Then 100 + (v - 20) = 80 + v: from 80 + 40 to 80 + 100.
    "bent arms": (
        table((0, 90), (20, 100), (50, 130)),
        [0, 20, 50],
        [90, 100, 130],
        True,
        None,
        (90.0, 180.0),
    ),
    # Falling from 130: 130 - v, from 130 down to 130 - 40.
    "falling arms": (table((0, 130), (20, 110)), [0, 20], [130, 110], True, None, (90.0, 130.0)),
    # Printed for 6: 2000 at 20, 5000 at 40. Slopes 100 and 150.
    "moments": (
        table((0, 0), (20, 12000), (40, 30000), straight_in="moment"),
        [0, 20, 40],
        [0, 2000, 5000],
        False,
        None,
        (100.0, 150.0),
    ),
    "one straight moment": (
        table((0, 0), (40, 24000), straight_in="moment"),
        [0, 40],
        [0, 4000],
        False,
        100.0,
        (100.0, 100.0),
    ),
}


@pytest.mark.parametrize("name", TABLES)
def test_a_tank_is_its_table_by_volume(name):
    points, volumes, values, of_arms, steady, slopes = TABLES[name]
    (found,) = plainly_known(with_tanks(points)).tanks

    assert (found.volumes.tolist(), found.values.tolist()) == (volumes, values)
    assert (found.of_arms, found.steady, found.slopes, found.lateral) == (of_arms, steady, slopes, 0.0)


def test_a_tank_has_its_own_lateral_arm():
    assert [tank.lateral for tank in plainly_known().tanks] == [-40.0, 30.0]


def test_one_envelope_for_all_phases_binds_every_leg():
    (bounds,) = plainly_known().bounds

    assert bounds.axis == "longitudinal"
    assert bounds.phases == ("ramp", "take-off", "zero fuel", "landing", "minimum at landing")
    codes = "cg.ramp", "cg.take-off", "cg.zero-fuel", "cg.landing", "cg.minimum-at-landing"
    assert bounds.codes == codes
    legs = ("ramp", "take-off"), ("take-off", "landing"), ("landing", "minimum at landing")
    assert bounds.legs == legs
    assert bounds.outline.levels.tolist() == [1500.0, 3500.0]


def box(half, *phases, axis="longitudinal"):
    middle = 100 if axis == "longitudinal" else 0
    left, right = middle - half, middle + half
    corners = (left, 1500), (left, 3500), (right, 3500), (right, 1500)
    return envelope(*corners, phases=phases, axis=axis)


def test_each_envelope_binds_the_legs_of_its_own_phases():
    landing = ("landing", "minimum at landing")
    each = box(11, "ramp"), box(12, "take-off"), box(13, "landing"), box(14, "zero fuel")
    across = box(3, "take-off", "landing", axis="lateral")

    bounds = plainly_known(replace(plain_basis(), envelopes=(*each, across))).bounds

    assert [(one.axis, one.phases, one.legs, one.codes) for one in bounds] == [
        ("longitudinal", ("ramp",), (("ramp", "take-off"),), ("cg.ramp",)),
        ("longitudinal", ("take-off",), (("take-off", "landing"), landing), ("cg.take-off",)),
        ("longitudinal", ("zero fuel",), (), ("cg.zero-fuel",)),
        ("longitudinal", landing, (landing,), ("cg.landing", "cg.minimum-at-landing")),
        (
            "lateral",
            ("take-off", *landing),
            (("take-off", "landing"), landing),
            ("lateral.take-off", "lateral.landing", "lateral.minimum-at-landing"),
        ),
    ]
    assert [one.outline.high[0].tolist() for one in bounds] == [
        [0.0, edge, 0.0] for edge in (111, 112, 114, 113, 3)
    ]


def test_two_envelopes_of_one_phase_both_bind_it():
    both = box(11, "take-off", "landing"), box(12, "take-off")
    bounds = plainly_known(replace(plain_basis(), envelopes=both)).bounds

    assert [one.phases for one in bounds] == [("take-off", "landing", "minimum at landing"), ("take-off",)]


TWO_PIECES = (
    (90, 1500),
    (90, 3500),
    (95, 3500),
    (95, 3000),
    (105, 3000),
    (105, 3500),
    (110, 3500),
    (110, 1500),
)
TOO_LITTLE = {
    "no envelope at take-off": {"envelopes": (box(11, "landing"),)},
    "no envelope at landing": {"envelopes": (box(11, "take-off"),)},
    "a lateral one at take-off only": {
        "envelopes": (box(11, "take-off", "landing"), box(3, "take-off", axis="lateral"))
    },
    "a lateral one at the ramp only": {
        "envelopes": (box(11, "take-off", "landing"), box(3, "ramp", axis="lateral"))
    },
    "lateral limits not entered": {"lateral_limits_entered": False},
    "two pieces side by side": {"envelopes": (envelope(*TWO_PIECES),)},
    "no tank": {"tanks": (), "burn_order": (), "taxi_order": ()},
    "a tank larger than its table": {
        "tanks": (replace(plain_basis().tanks[0], capacity=F(101)), plain_basis().tanks[1])
    },
    "a table that begins above nothing": {
        "tanks": (plain_basis().tanks[0], replace(plain_basis().tanks[1], table=table((1, 120), (50, 120))))
    },
    "a closed seat": {"closed": (("RIGHT", "a restriction"),)},
}


@pytest.mark.parametrize("what", TOO_LITTLE)
def test_of_some_bases_too_little_is_known(what):
    assert known_of(replace(plain_basis(), **TOO_LITTLE[what]), "one", EMPTY) is None


def test_a_lateral_envelope_is_enough_where_the_page_of_lateral_limits_is_not():
    envelopes = (*plain_basis().envelopes, box(3, "take-off", "landing", axis="lateral"))
    basis = replace(plain_basis(), envelopes=envelopes, lateral_limits_entered=False)

    assert len(plainly_known(basis).bounds) == 2


def test_the_configuration_must_be_there_and_the_empty_weight_fit_it():
    basis = plain_basis()
    floats = replace(basis.configurations[0], id="other", fit="floats")
    basis = replace(basis, configurations=(floats, *basis.configurations))

    assert known_of(basis, "one", EMPTY).configuration.fit == "wheels"
    assert known_of(basis, "nothing", EMPTY) is None
    assert known_of(basis, "other", EMPTY) is None
    assert known_of(basis, "one", None) is None
    assert known_of(basis, "one", replace(EMPTY, datum="tail")) is None


def one_seat(arm=1, across=0, fuel=1, **changes):
    """A basis with hardly an arm: one seat, one tank, an empty aircraft on the datum."""
    basis = with_tanks(table((0, fuel), (50, fuel)))
    configuration = replace(
        basis.configurations[0], seats=("S",), places=(), equipment=(), operating_items=()
    )
    few = replace(
        basis, seats=(seat("S", arm, across),), places=(), zones=(), configurations=(configuration,)
    )
    return replace(few, **changes)


NOWHERE = replace(EMPTY, moment=F(0), lateral_moment=F(0))
REACHES = {
    "nothing beyond one": (one_seat(0, 0, 0), NOWHERE, 1.0),
    "a seat": (one_seat(-80), NOWHERE, 80.0),
    "a seat far to the left": (one_seat(2, -30), NOWHERE, 30.0),
    "a place": (one_seat(places=(place("P", 5), place("Q", -90, lateral=3))), NOWHERE, 90.0),
    "the fuel": (one_seat(fuel=-70), NOWHERE, 70.0),
    "the empty aircraft along": (one_seat(), replace(NOWHERE, moment=F(-90000)), 45.0),
    "the empty aircraft across": (one_seat(), replace(NOWHERE, lateral_moment=F(8000)), 4.0),
    "an empty aircraft of no weight": (one_seat(2), replace(EMPTY, weight=F(0)), 2.0),
}


@pytest.mark.parametrize("what", REACHES)
def test_the_reach_is_the_greatest_arm_of_all(what):
    basis, empty, reach = REACHES[what]

    assert plainly_known(basis, empty).reach == reach


def test_the_reach_is_that_of_the_slope_of_a_table_too():
    """Arms from 90 down to -60: the slope of the moment runs from 90 to 90 - 2 * 150 = -210. Of arms from
    -150 up to 0 it runs from -150 to 150.
    """
    for points, reach in (((0, 90), (50, -60)), 210.0), (((0, -150), (50, 0)), 150.0):
        few = one_seat()
        tank = replace(few.tanks[0], table=table(*points))
        assert plainly_known(replace(few, tanks=(tank,)), NOWHERE).reach == reach

    told = replace(one_seat().tanks[0], table=table((0, 0), (50, 30000), straight_in="moment"))
    assert plainly_known(one_seat(tanks=(told,)), NOWHERE).reach == 100.0  # 30000 / 6 / 50

    left = replace(one_seat().tanks[0], lateral_arm=F(-33))
    assert plainly_known(one_seat(tanks=(left,)), NOWHERE).reach == 33.0


def test_an_item_taken_out_of_the_aircraft_counts_against_it():
    basis = plain_basis()
    less = replace(basis.configurations[0], equipment=(FixedItem("row", F(-40), F(90), F(5)),))

    base = plainly_known(replace(basis, configurations=(less,))).base
    assert base == (2000.0 - 40 + 5, 200000.0 - 3600 - 100, -600.0 - 200 - 15)


def test_a_zone_may_name_what_the_basis_has_not():
    zone = replace(plain_basis().zones[2], members=("GONE", "SHELF"))

    assert plainly_known(replace(plain_basis(), zones=(zone,))).unknown_zones == ((5,),)


def test_the_table_of_a_tank_may_end_at_its_capacity_or_beyond():
    small = replace(plain_basis().tanks[0], capacity=F(99))

    assert len(plainly_known(replace(plain_basis(), tanks=(small, plain_basis().tanks[1]))).tanks) == 2
