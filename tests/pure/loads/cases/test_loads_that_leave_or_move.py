"""Loads that leave or move in flight: skydivers who bunch at the door and leave in groups, a sling load that
is released, a hopper that is emptied, somebody who walks aft, fuel that is pumped. Both sides are judged.

Common practice; every figure is reckoned by hand on the invented aircraft of `round_figures`.
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import BurnStage, Tank, TankTable
from loads.balance.assess import assess
from loads.balance.declared import read_load
from tests.pure.loads.making import SOURCE, F, place, tank
from tests.pure.loads.round_figures import EMPTY, SEATS, at, box, flown, q, round_basis, round_load

TO_THE_DOOR = [{"seat": name, "to": "DOOR"} for name in SEATS]


def event(at_burned: Any, **what: Any) -> dict[str, Any]:
    return {"after_burning": q(at_burned), **what}


def jump_run(moving: int) -> list[dict[str, Any]]:
    """So many go to the door at 60 lb burned; two leave, then the other two."""
    return [
        event(60, move=TO_THE_DOOR[:moving]),
        event(60, leave=[{"seat": "S1"}, {"seat": "S2"}]),
        event(60, leave=[{"seat": "S3"}, {"seat": "S4"}]),
    ]


def test_skydivers_who_bunch_at_the_door_are_outside_while_take_off_and_landing_are_inside() -> None:
    # take-off: 2000 + 200 + 4 * 200 + 360 = 3360 lb; 200000 + 18000 + 4 * 22000 + 36000 = 342000 lb in
    # 60 lb later, four of them 30 in farther aft: 3300 lb; 342000 - 6000 + 4 * 200 * 30 = 360000: 109.09 in
    # two gone: 2900 lb, 360000 - 2 * 28000 = 304000; four gone: 2500 lb, 248000
    # landing after 60 lb more: 2440 lb, 242000
    result = flown(round_load(4, sequence=jump_run(4)), round_basis(box(95, 109)))

    assert at(result, "take-off") == (3360, 342_000)
    assert at(result, "landing") == (2440, 242_000)
    assert result.check("cg.take-off").outcome == result.check("cg.landing").outcome == "pass"
    worst = result.check("path.longitudinal")
    assert (worst.outcome, worst.actual, worst.limit, worst.edge) == ("fail", "109.09", "109", "aft")
    assert worst.room == 109 - F(360_000, 3300)
    assert worst.margin_text == (
        "0.1 in beyond the aft limit, just after event 1, at 3300 lb with 300 lb of fuel"
    )
    assert worst.at is not None
    assert worst.at["tanks"] == {"MAIN": "50"}
    assert result.verdict == "outside"


def test_two_at_a_time_at_the_door_are_inside() -> None:
    # two of them aft: 336000 + 2 * 200 * 30 = 348000 lb in at 3300 lb: 105.45 in, 3.54 from the limit
    result = flown(round_load(4, sequence=jump_run(2)), round_basis(box(95, 109)))

    worst = result.check("path.longitudinal")
    assert worst.outcome == "pass"
    assert result.verdict == "within"


def test_the_empty_return_is_judged_too() -> None:
    # all gone and only fuel left: 2500 lb at 99.2 in; on the way down to 2260 lb at 224000 / 2260 = 99.115 in
    result = flown(round_load(4, sequence=jump_run(2)), round_basis(box("99.12", 109)))

    worst = result.check("path.longitudinal")
    assert (worst.outcome, worst.edge) == ("fail", "forward")
    assert worst.room == F(224_000, 2260) - F("99.12")
    assert at(result, "minimum at landing") == (2260, 224_000)


def test_persons_on_board_stay_the_count_at_the_start_and_landing_weight_is_without_who_left() -> None:
    limits = {"landing": 2440, "zero_fuel": 3000}
    result = flown(round_load(4, sequence=jump_run(2)), round_basis(weights=limits))

    assert result.check("persons.count").outcome == "pass"
    assert result.check("weight.landing").margin_text == "on the limit"
    # zero fuel: all that is aboard at take-off, 2000 + 200 + 800
    assert result.check("weight.zero-fuel").margin_text == "on the limit"


def test_more_at_the_door_than_it_bears_is_named_with_the_event() -> None:
    spots = round_basis().places
    basis = round_basis(places=(place("DOOR", 140, 600), *spots[1:]))

    check = flown(round_load(4, sequence=jump_run(4)), basis).check("place.DOOR")

    assert (check.outcome, check.actual, check.limit) == ("fail", "800", "600")
    assert check.margin_text == "200 lb above the limit, after event 1"


def test_both_sides_of_the_release_of_a_sling_load_are_judged() -> None:
    # 400 lb on the hook at 80 in: take-off 2960 lb, 254000 + 32000 = 286000: 96.62 in
    # after 60 lb: 2900 lb, 280000 = 96.55 in with the load; 2500 lb, 248000 = 99.2 in without
    slung = round_load(items=[("drum", "HOOK", 400)], sequence=[event(60, leave=[DRUM])])

    inside = flown(slung, round_basis(box("96.5", "99.2")))
    assert inside.check("path.longitudinal").outcome == "pass"
    assert inside.check("path.longitudinal").margin_text.startswith("on the aft limit, just after event 1")

    before = flown(slung, round_basis(box("96.56", 105)))
    assert before.check("path.longitudinal").room == F(280_000, 2900) - F("96.56")
    assert "just before event 1" in before.check("path.longitudinal").margin_text


DRUM = {"place": "HOOK", "what": "drum"}


def test_a_hopper_is_emptied_in_parts_and_the_lines_add_up() -> None:
    # 300 lb of water at 130 in; 100 lb out at 30 lb burned, the rest at 90 lb burned
    water = {"place": "HOLD", "what": "water"}
    parts = [event(30, leave=[water | {"weight": q(100)}]), event(90, leave=[water])]
    result = flown(round_load(items=[("water", "HOLD", 300)], sequence=parts))

    # take-off 2860 lb and 293000; landing 2440 lb and 293000 - 12000 - 39000
    assert at(result, "take-off") == (2860, 293_000)
    assert at(result, "landing") == (2440, 242_000)
    gone = [line for line in result.lines if line.group == "sequence"]
    assert [(line.weight, line.moment) for line in gone] == [(-100, -13_000), (-200, -26_000)]


def test_somebody_who_walks_aft_and_back_is_judged_where_they_stand() -> None:
    # 200 lb from 110 to 130 in and back: 4000 lb in, while 30 to 90 lb are burned
    walk = [event(30, move=[WALKS | {"to": "HOLD"}]), event(90, move=[WALKS | {"to": "S1"}])]
    result = flown(round_load(1, sequence=walk))

    moves = [(line.what, line.weight, line.moment) for line in result.lines if line.group == "sequence"]
    assert moves == [
        ("event 1, moves from s1 to hold", 0, 4000),
        ("event 2, moves from hold to s1", 0, -4000),
    ]
    assert at(result, "landing") == (2640, 200_000 + 18_000 + 22_000 + 24_000)


WALKS = {"seat": "S1"}


def test_fuel_pumped_between_tanks_moves_the_moment_at_one_weight() -> None:
    # 20 US gal, 120 lb, from 80 to 120 in: 4800 lb in more at 2560 - 60 = 2500 lb
    tanks = (tank("FRONT", 80, 50), tank("REAR", 120, 50))
    order = (BurnStage(("FRONT",)), BurnStage(("REAR",)))
    basis = round_basis(box(90, "101.59"), tanks=tanks, burn_order=order, taxi_order=order)
    pumped = event(60, transfer={"from": "FRONT", "to": "REAR", "quantity": q(20, "US gal")})
    amounts = {"FRONT": q(30, "US gal"), "REAR": q(30, "US gal")}
    document = round_load(start=amounts, sequence=[pumped])

    # take-off 2560 lb: 218000 + 14400 + 21600 = 254000; after 60 lb from the front tank 249200 at 2500 lb
    # then 254000 at 2500 lb: 101.6 in, 0.01 beyond
    worst = flown(document, basis).check("path.longitudinal")
    assert worst.room == F("101.59") - F(254_000, 2500) == F(-1, 100)
    assert worst.at is not None
    assert worst.at["tanks"] == {"FRONT": "0", "REAR": "50"}
    assert worst.at["weight"] == "2500"


def test_a_moment_that_swings_out_while_fuel_is_pumped_is_found_between_both_ends() -> None:
    # The rear tank's arm falls from 140 in when empty to 100 in at 40 US gal: n US gal in it have the moment
    # 6 * n * (140 - n). Pumped from a tank at 100 in, n US gal change the moment by 6 * n * (40 - n):
    # nothing at 0 and at 40, and 2400 lb in at 20.
    table = TankTable("volume", "arm", "arm", None, ((F(0), F(140)), (F(40), F(100))))
    rear = Tank("REAR", "rear", F(40), F(0), table, SOURCE)
    order = (BurnStage(("FRONT",)), BurnStage(("REAR",)))
    tanks = (tank("FRONT", 100, 100), rear)
    pumped = event(60, transfer={"from": "FRONT", "to": "REAR", "quantity": q(40, "US gal")})
    start = {"FRONT": q(60, "US gal"), "REAR": q(0, "US gal")}
    document = round_load(start=start, fuel={"minimum_at_landing": q(240)}, sequence=[pumped])

    # at 2500 lb: 248000 before and after, 250400 in the middle
    basis = round_basis(box(90, 100), tanks=tanks, burn_order=order, taxi_order=order)
    worst = flown(document, basis).check("path.longitudinal")
    assert worst.room == 100 - F(250_400, 2500) == F(-4, 25)
    assert "during the transfer of event 1" in worst.margin_text


@pytest.mark.parametrize("weight", [None, 120])
def test_a_load_without_a_sequence_is_as_it_was(weight: int | None) -> None:
    items = [] if weight is None else [("box", "HOLD", weight)]
    result = flown(round_load(2, items=items))
    document = result.as_document()
    assert "sequence" not in document
    assert "runs" not in document["path"]
    assert not [line for line in result.lines if line.group == "sequence"]


def test_a_transfer_into_a_tank_that_a_restriction_filled_in_part_is_named_with_the_event() -> None:
    # 50 US gal at most: 30 usable, 20 pumped in, and 10 that a restriction made unusable are 60
    tanks = (tank("FRONT", 100, 50), tank("REAR", 100, 70))
    order = (BurnStage(("FRONT",)), BurnStage(("REAR",)))
    basis = round_basis(tanks=tanks, burn_order=order, taxi_order=order)
    small = replace(tanks[1], capacity=F(50))
    pumped = event(0, transfer={"from": "FRONT", "to": "REAR", "quantity": q(20, "US gal")})
    start = {"FRONT": q(30, "US gal"), "REAR": q(30, "US gal")}
    declared = read_load(round_load(start=start, sequence=[pumped]), basis)
    plan = declared.fuel
    filled = replace(plan.tanks[1], tank=small, trapped=F(10))
    restricted = replace(declared, fuel=replace(plan, tanks=(plan.tanks[0], filled)))

    check = assess(restricted, basis, EMPTY).check("tank.REAR")
    assert (check.outcome, check.actual, check.limit) == ("fail", "60", "50")
    assert check.margin_text == "10 US gal above the limit, after event 1"


def test_the_allowable_take_off_weight_counts_what_leaves_before_the_landing() -> None:
    # landing limit 2440, 120 lb burned and 800 lb of people gone by then: 3360 lb may take off
    result = flown(round_load(4, sequence=jump_run(2)), round_basis(weights={"landing": 2440}))
    allowable = result.as_document()["allowable_take_off"]
    assert isinstance(allowable, dict)
    assert allowable["weight"] == "3360"
    assert allowable["governed_by"] == "landing limit + trip fuel and what leaves"
