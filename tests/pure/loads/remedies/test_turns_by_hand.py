"""Where the verdict of a load may turn, reckoned by hand in round figures, and nothing besides.

A weight y at an arm d from 100 in brings a CG to c from 100 in where m + d*y = c * (w + y), so at
y = (c*w - m) / (d - c); x counts tenths of it.
"""

from dataclasses import replace
from fractions import Fraction
from typing import Any

import pytest

from fleet.fuel_balance import FuelBalance
from fleet.stations import Rail
from fleet.tanks import OutsideTable
from fleet.trim import Trim, TrimLine, TrimTable
from loads.balance.aboard import Declared
from loads.balance.prepared import prepared
from loads.balance.remedies.steps import Ballast, Refuel, taken
from loads.balance.remedies.tables import fuel_turns, trim_turns
from loads.balance.remedies.varying import CannotBe, Change, Varying, table_points
from loads.balance.touching import Varied
from loads.balance.varied_flights import Fit
from tests.pure.loads.making import SOURCE, F, straight
from tests.pure.loads.remedies.rejects import (
    Asked,
    a_hump_between_two_points,
    aircraft,
    gallons,
    loaded,
    question_of,
)
from tests.pure.loads.remedies.roomy import stopped_across, stopped_by_trim_and_the_balance_of_fuel

ENDS = (F(0), F(1500))
ZERO = (F(0),)


def in_place(asked: Asked, number: int) -> Varying:
    """Tenths of a pound more in one of the two holds: the nose 50 in before 100 in, the rear 50 behind."""
    question = question_of(asked)
    place = question.ready.basis.places[number]

    def changed(count: Fraction) -> Declared:
        return taken(question.declared, [Ballast(place, count / 10)])

    return Varying(question, Change(changed))


def exact(varying: Varying, low: Any, high: Any) -> list[Fraction]:
    turns = varying.turns(F(low), F(high))
    assert all(turn.low == turn.high for turn in turns)
    return [turn.low for turn in turns]


def reaching(cg: Any, arm: int, states: tuple[int, ...]) -> list[Fraction]:
    """Tenths of a pound at an arm which bring -2,000 lb in at these weights to a CG, all from 100 in."""
    return [10 * (F(cg) * weight + 2000) / (arm - F(cg)) for weight in states]


# Pilot and 200 lb at 100 in: zero fuel, least fuel at landing, landing, take-off, ramp.
STATES = (2400, 2460, 2628, 2748, 2760)


@pytest.mark.parametrize(("number", "cg", "arm"), [(1, 2, 50), (0, -2, -50)])
def test_each_phase_turns_where_its_centre_of_gravity_comes_to_the_limit(
    number: int, cg: int, arm: int
) -> None:
    varying = in_place((loaded({"S1": 200}), aircraft()), number)
    assert exact(varying, 0, 3000) == reaching(cg, arm, STATES)
    some = [each for each in reaching(cg, arm, STATES) if 600 <= each <= 700 or 1420 <= each <= 1500]
    assert exact(varying, 600, 700) + exact(varying, 1420, 1500) == some
    assert exact(varying, 5, 5) == []
    assert exact(varying, 6, 5) == []


def test_a_setting_turns_at_the_ends_of_what_is_allowed_and_of_its_table() -> None:
    # The setting is 105 less the CG: 4 at 101 in, 6.2 at 98.8; the table ends at 97 and 103 in.
    asked = stopped_by_trim_and_the_balance_of_fuel()
    at_rear = reaching(1, 50, (3008,)) + reaching(2, 50, (2660, 2720, 2888, 3008, 3020))
    assert exact(in_place(asked, 1), 0, 3000) == at_rear + reaching(3, 50, (3008,))
    in_nose = reaching("-1.2", -50, (3008,)) + reaching(-2, -50, (2660, 2720, 2888, 3008, 3020))
    assert exact(in_place(asked, 0), 0, 3000) == in_nose + reaching(-3, -50, (3008,))


def test_what_was_assessed_once_is_kept() -> None:
    varying = in_place((loaded({"S1": 200}), aircraft()), 1)
    first = varying.result(F(7))
    assert varying.question.tried == 1
    assert varying.result(F(7)) is first
    assert varying.question.tried == 1


@pytest.mark.parametrize("why", [CannotBe(), OutsideTable(F(3), F(0), F(2))])
def test_where_there_is_no_such_load_there_is_no_result(why: Exception) -> None:
    def changed(count: Fraction) -> Declared:
        raise why

    varying = Varying(question_of((loaded({}), aircraft())), Change(changed))
    assert varying.result(F(1)) is None
    assert varying.kept == {F(1): None}


def test_points_of_a_table_are_counted_from_what_a_tank_holds() -> None:
    question = question_of((loaded({}, at_engine_start=gallons(30, 30)), aircraft()))
    held = replace(question.declared.fuel.tanks[0], trapped=F(2))
    assert table_points(held, F(1, 10)) == (-320, 180)
    assert table_points(held, F(-1, 10)) == (320, -180)


def more_on_the_left(asked: Asked, at: tuple[int, ...]) -> list[Declared]:
    question = question_of(asked)
    left = question.declared.fuel.tanks[0].tank
    return [taken(question.declared, [Refuel(left, F(one))]) for one in at]


def balance(**changes: Any) -> FuelBalance:
    made = FuelBalance(
        "W", "w", ("LEFT",), ("RIGHT",), "volume", F(4), (), ("ramp", "take-off", "landing"), SOURCE
    )
    return replace(made, **changes)


def turns_of_fuel(limit: FuelBalance, ends: tuple[Any, Any] = (-40, 19)) -> set[Fraction]:
    """31 US gal left and x more, 29 right: 2 burn in taxi and 20 on the trip, alike from both."""
    asked = loaded({}, at_engine_start=gallons(31, 29)), aircraft(fuel_balance=(limit,))
    fit = Fit([F(1), F(2), F(3)])
    loads = more_on_the_left(asked, (1, 2, 3))
    ready = prepared(asked[1])
    found = list(fuel_turns(loads, (F(1),), fit, ready, (F(ends[0]), F(ends[1]))))
    assert all(one.low == one.high for one in found)
    return {one.low for one in found}


def test_a_difference_turns_where_it_comes_to_what_is_allowed_either_way() -> None:
    assert turns_of_fuel(balance()) == {2, -6}
    assert turns_of_fuel(balance(), (0, 19)) == {2}


def test_a_difference_by_weight_turns_by_the_density() -> None:
    # 2 + x US gal are 12 + 6 x lb.
    assert turns_of_fuel(balance(by="weight", maximum=F(30))) == {3, -7}


def line(*points: tuple[Any, Any]) -> tuple[tuple[Fraction, Fraction], ...]:
    return tuple((F(at), F(allowed)) for at, allowed in points)


# What is aboard at engine start, take-off, landing and with the least fuel is 60 + x, 58 + x, 38 + x and 10.
# By one line, 1 + aboard / 10, 2 + x comes to it at 5 / 0.9, 4.8 / 0.9, 2.8 / 0.9 and 0, and -2 - x at
# -9 / 1.1, -8.8 / 1.1, -6.8 / 1.1 and -4. At landing nothing is aboard with -38.
SLOPE = {F(50, 9), F(16, 3), F(28, 9), F(0), F(-90, 11), F(-8), F(-68, 11), F(-4), F(-38)}


def test_a_difference_turns_where_it_comes_to_a_table_of_what_is_allowed() -> None:
    # At the ends of the table 1 and 11 are allowed.
    straight = balance(maximum=None, points=line((0, 1), (100, 11)))
    assert turns_of_fuel(straight) == SLOPE | {-1, -3, 9, -13}
    # Bent at 50, where 6 are allowed, and so on: there with 12, -10 and -8.
    bent = line((0, 1), (50, 6), (100, 6))
    assert turns_of_fuel(balance(maximum=None, points=bent)) == SLOPE | {-1, -3, 4, -8, 12, -10}
    by_weight = tuple((6 * at, 6 * allowed) for at, allowed in bent)
    weighed = balance(maximum=None, by="weight", points=by_weight)
    assert turns_of_fuel(weighed) == SLOPE | {-1, -3, 4, -8, 12, -10}


def test_fuel_that_cannot_be_used_counts_for_the_difference() -> None:
    # 3 US gal trapped on the left and 1 on the right: 4 + x, and all that is aboard and usable as before.
    document = loaded({}, at_engine_start=gallons(31, 29))
    document["fuel"]["not_usable"] = gallons(3, 1)
    basis = aircraft(fuel_balance=(balance(maximum=F(5)),))
    loads = more_on_the_left((document, basis), (1, 2, 3))
    found = list(fuel_turns(loads, (F(1),), Fit([F(1), F(2), F(3)]), prepared(basis), (F(-15), F(15))))
    assert {one.low for one in found} == {1, -9}


def test_a_transfer_turns_a_difference_before_and_after_it() -> None:
    # 2 US gal from left to right leave 2 + x before it and -2 + x after it; 4 are allowed.
    limit = balance()
    moved = {"from": "LEFT", "to": "RIGHT", "quantity": {"value": 2, "unit": "US gal"}}
    event = {"after_burning": {"value": 30, "unit": "lb"}, "transfer": moved}
    document = loaded({}, at_engine_start=gallons(31, 29)) | {"sequence": [event]}
    basis = aircraft(fuel_balance=(limit,))
    fit = Fit([F(1), F(2), F(3)])
    loads = more_on_the_left((document, basis), (1, 2, 3))
    found = list(fuel_turns(loads, (F(1),), fit, prepared(basis), (F(-8), F(8))))
    assert {one.low for one in found} == {2, -6, 6, -2}


def turns_of_density(limit: FuelBalance) -> set[Fraction]:
    """The same fuel, x thousandths denser; 12, 120 and all but 60 lb of it are burned."""
    declared = question_of((loaded({}, at_engine_start=gallons(31, 29)), aircraft())).declared
    loads = [
        replace(declared, fuel=replace(declared.fuel, density=F(6) * (1 + F(one, 1000)))) for one in (1, 2, 3)
    ]
    ready = prepared(aircraft(fuel_balance=(limit,)))
    found = list(fuel_turns(loads, (F(1), F(1, 1000)), Fit([F(1), F(2), F(3)]), ready, (F(-500), F(500))))
    assert all(one.low == one.high for one in found)
    return {one.low for one in found}


def test_a_difference_turns_with_the_density_where_it_is_one_of_weight() -> None:
    # 2 US gal are 15 lb at 7.5 lb/US gal; by volume they are 2 at any density.
    assert turns_of_density(balance(by="weight", maximum=F(15))) == {250}
    assert turns_of_density(balance(maximum=F(3))) == set()
    # 2 are allowed with 100 / 3 US gal aboard: at landing, 60 less 132 lb, at 4.95 lb/US gal.
    assert turns_of_density(balance(maximum=None, points=line((0, 1), (100, 4)))) == {-175}


def test_off_the_table_of_a_tank_no_difference_is_known() -> None:
    limit = balance()
    asked = loaded({}, at_engine_start=gallons(31, 29)), aircraft(fuel_balance=(limit,))
    loads = more_on_the_left(asked, (100, 200, 300))
    assert not list(fuel_turns(loads, (F(1),), Fit([F(100), F(200), F(300)]), prepared(asked[1]), ENDS))


def behind() -> Asked:
    """Both tanks 20 in behind: 7,200 lb in of 360 lb, and -2,000."""
    basis = aircraft()
    tanks = tuple(replace(one, table=straight(120, 50)) for one in basis.tanks)
    return loaded({"S1": 200}), replace(basis, tanks=tanks)


def test_a_tank_turns_what_its_fuel_moves_and_where_the_other_runs_dry() -> None:
    # A tenth more is 0.6 lb, 12 lb in where 1.2 may be. At the ramp 5,200 of 5,520, at take-off 4,960 of
    # 5,496, at landing 2,560 of 5,256. With 10 US gal more the right tank is dry where 10 are left in all.
    question = question_of(behind())
    held = question.declared.fuel.tanks[0]

    def changed(count: Fraction) -> Declared:
        return taken(question.declared, [Refuel(held.tank, count / 10)])

    varying = Varying(question, Change(changed, refuels=True, marks=table_points(held, F(1, 10))))
    assert exact(varying, 0, 200) == [0, F(3200, 108), F(5360, 108), 100, 200]


def test_the_density_turns_what_the_fuel_moves_until_it_is_burned() -> None:
    # A thousandth more is 0.36 lb, 7.2 lb in where 0.72 may be, as long as what is burned is a weight.
    question = question_of(behind())
    plan = question.declared.fuel

    def denser(count: Fraction) -> Declared:
        return replace(question.declared, fuel=replace(plan, density=plan.density * (1 + count / 1000)))

    varying = Varying(question, Change(denser, over=(F(1), F(1, 1000)), refuels=True))
    assert exact(varying, 0, 500) == [0, *(F(each) / F("6.48") for each in (320, 536, 2696)), 500]


def test_seats_on_a_rail_turn_with_their_seats_at_either_end() -> None:
    # 200 lb at 120 in on a rail from 115 to 125 in: 1,000, 2,000 and 3,000 lb in.
    basis = aircraft()
    rail = Rail(F(115), F(125), (), SOURCE)
    seats = tuple(replace(one, rail=rail) if one.id == "S3" else one for one in basis.seats)
    varying = in_place((loaded({"S3": 200}), replace(basis, seats=seats)), 1)
    wanted = [10 * F(2 * weight - moment, 48) for moment in (1000, 2000, 3000) for weight in STATES]
    assert exact(varying, 0, 1500) == sorted(wanted)


def test_a_burn_that_bends_turns_where_it_is_worst() -> None:
    # 418 lb in too much with 27 US gal left, 176 at landing, 52 in a pound in the nose.
    varying = in_place(a_hump_between_two_points(), 0)
    assert exact(varying, 0, 300) == [10 * F(176, 52), 10 * F(418, 52)]


def test_across_it_turns_where_the_lateral_centre_of_gravity_comes_to_the_limit() -> None:
    # 20 in left, with 20 lb there: with the passengers and 3 US gal more on the left -3,300 lb in, where 1.5
    # in are allowed: of the least weight at landing, of landing, take-off and ramp; never at zero fuel.
    document, basis = stopped_across()
    places = tuple(replace(one, lateral_arm=F(-20)) for one in basis.places)
    wanted = [10 * (F(3, 2) * weight - 3300) / F("18.5") for weight in (2480, 2666, 2786, 2798)]
    assert exact(in_place((document, replace(basis, places=places)), 1), 0, 600) == wanted


def test_a_basis_without_a_balance_turns_nowhere() -> None:
    asked = loaded({}), aircraft()
    assert not list(
        fuel_turns(
            more_on_the_left(asked, (1, 2, 3)), (F(1),), Fit([F(1), F(2), F(3)]), prepared(asked[1]), ENDS
        )
    )


def setting_of(*lines: TrimLine, **changes: Any) -> Trim:
    made = Trim(
        "arm",
        "units",
        F(1, 10),
        F(4),
        F(6),
        SOURCE,
        (
            TrimTable(
                None,
                lines,
            ),
        ),
    )
    return replace(made, **changes)


def turns_of_trim(trim: Trim) -> list[Fraction]:
    """3,000 + x lb with x at 150 in and 300,000 lb in before: the CG is 100 + 50 x / (3,000 + x)."""
    take_off = Varied(ZERO, ZERO, ((F(3000), F(1)),), ((F(300_000), F(150)),), (ZERO,), (F(1),))
    found = list(trim_turns(take_off, prepared(aircraft(trim=trim)), ENDS))
    assert all(one.low == one.high for one in found)
    return sorted({one.low for one in found})


def arm(cg: Any) -> Fraction:
    """The x at which the CG is that: (cg - 100) * (3,000 + x) = 50 x."""
    return 3000 * (F(cg) - 100) / (150 - F(cg))


def falls(*points: tuple[Any, Any], weight: Any = None) -> TrimLine:
    exact_points = tuple((F(cg), F(setting)) for cg, setting in points)
    return TrimLine(None if weight is None else F(weight), exact_points, SOURCE)


@pytest.mark.parametrize(
    ("trim", "wanted"),
    [
        # 9 at 97 in, one less an inch: 6 at 100 in, 4 at 102.
        (setting_of(falls((97, 9), (105, 1))), [0, arm(102), arm(105)]),
        (setting_of(falls((97, 9), (105, 1)), lowest=None), [0, arm(105)]),
        (setting_of(falls((97, 9), (105, 1)), highest=None), [arm(102), arm(105)]),
        # A bend at 101 in, where it is 5: from there half a unit an inch. Straight on it was 4 at 102 in.
        (setting_of(falls((97, 9), (101, 5), (105, 3))), [0, arm(102), arm(103), arm(105)]),
        # By the chord, 109.5 to 175.5 in: 66 in, so 100 in is -14.39 %. 4 is at 102 in again.
        (
            setting_of(
                falls((F(97 * 2 - 219, 132) * 100, 9), (F(105 * 2 - 219, 132) * 100, 1)), against="chord"
            ),
            [0, arm(102), arm(105)],
        ),
        # 105 less the CG at 2,000 lb, twice that at 4,000: (105 W - M) / 2,000 = 7.5 - 45 x / 2,000.
        (
            setting_of(falls((95, 10), (106, -1), weight=2000), falls((95, 20), (106, -2), weight=4000)),
            [F(3000 - 0, 45), F(7000, 45), arm(106), F(1000)],
        ),
    ],
)
def test_a_setting_turns_by_hand(trim: Trim, wanted: list[Fraction]) -> None:
    assert turns_of_trim(trim) == sorted(wanted)


def test_without_a_chord_a_setting_against_it_is_not_known() -> None:
    basis = replace(aircraft(trim=setting_of(falls((0, 9), (50, 1)), against="chord")), chord=None)
    take_off = Varied(ZERO, ZERO, ((F(3000), F(1)),), ((F(300_000), F(150)),), (ZERO,), (F(1),))
    assert list(trim_turns(take_off, prepared(basis), ENDS)) == []
    assert list(trim_turns(take_off, prepared(aircraft()), ENDS)) == []
