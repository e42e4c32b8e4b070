"""What a floor bears: per area, per running length and per compartment, at once.

Common practice of loading manuals: the load on an area is the weight over what touches the floor (not over
the outline), the running load is the weight over how far that runs along the hold; a pallet, net or spreader
weighs too, and spreads. Each figure below is reckoned by hand beside it.
"""

from dataclasses import replace
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fleet.basis import Basis
from fleet.conversion import converted
from fleet.quantities import Unit
from fleet.stations import Floor, FloorLimit
from loads.balance import checks_floor
from loads.balance.declared import read_load
from loads.balance.prepared import prepared
from loads.balance.result import Check
from loads.balance.shape import check_shape
from records.refusal import Invalid
from tests.pure.loads.making import SOURCE, F, load, place, result_of, twin


def per_area(value: str | int | None, unit: Unit = Unit.LB_PER_FT2) -> FloorLimit:
    exact = None if value is None else converted(F(value), unit, Unit.LB_PER_IN2)
    return FloorLimit(exact, None if value is None else unit, SOURCE)


def per_length(value: str | int | None, unit: Unit = Unit.LB_PER_FT) -> FloorLimit:
    exact = None if value is None else converted(F(value), unit, Unit.LB_PER_IN)
    return FloorLimit(exact, None if value is None else unit, SOURCE)


def hold(area: FloorLimit | None, run: FloorLimit | None, **more: Any) -> Basis:
    """The twin whose aft hold (300 lb at most) has a floor that runs along the aircraft."""
    floor = Floor(**{"runs": "along", "per_area": area, "per_length": run} | more)
    aft = replace(place("AFT-HOLD", 190, 300), floor=floor)
    basis = twin()
    return replace(basis, places=tuple(aft if one.id == aft.id else one for one in basis.places))


def quantity(value: str | int, unit: str) -> dict[str, Any]:
    return {"value": value, "unit": unit}


def sides(length: Any, width: Any, lies: str = "along", unit: str = "in", **feet: int) -> dict[str, Any]:
    return {"length": quantity(length, unit), "width": quantity(width, unit), "lies": lies, **feet}


def crate(weight: Any, footprint: Any = None, **more: Any) -> dict[str, Any]:
    item = {"kind": "cargo", "what": "crate", "place": "AFT-HOLD", "how": "weighed", **more}
    item["weight"] = quantity(weight, "lb")
    return item if footprint is None else item | {"footprint": footprint}


def loaded(*items: dict[str, Any]) -> dict[str, Any]:
    return load(persons_on_board=1, passengers=[], items=list(items))


def floor_checks(basis: Basis, *items: dict[str, Any]) -> dict[str, Check]:
    return {check.code: check for check in result_of(loaded(*items), basis).checks if "floor" in check.code}


NONE = per_length(None)


def test_weight_on_what_touches_the_floor_is_checked_and_on_the_limit_is_within() -> None:
    # 24 in x 24 in is 4 ft2; 200 lb on it are 50 lb/ft2.
    check = floor_checks(hold(per_area(50), NONE), crate(200, sides(24, 24)))["floor-area.AFT-HOLD.1"]

    assert (check.outcome, check.actual, check.limit, check.unit) == ("pass", "50", "50", "lb/ft2")
    assert check.margin_text == "on the limit"
    assert check.source == str(SOURCE)


def test_too_much_on_an_area_names_the_least_spreader_that_would_do_rounded_up() -> None:
    # 200 lb on 18 in x 18 in = 2.25 ft2 are 88.88 lb/ft2; at 45 lb/ft2 they need 4.44 ft2.
    check = floor_checks(hold(per_area(45), NONE), crate(200, sides(18, 18)))["floor-area.AFT-HOLD.1"]

    assert (check.outcome, check.actual, check.limit) == ("fail", "88.9", "45")
    assert check.what_next == (
        "Stand item 1 on a spreader: at least 4.5 ft2 under it, and more by what the spreader itself weighs; "
        "or put part of it elsewhere."
    )


def test_a_spreader_weighs_too_and_is_what_touches_the_floor() -> None:
    # A board of 30 in x 24 in = 5 ft2 that weighs 20 lb: 220 lb on 5 ft2 are 44 lb/ft2, of 45.
    board = {"weight": quantity(20, "lb"), **sides(30, 24)}
    result = result_of(loaded(crate(200, sides(18, 18), spreader=board)), hold(per_area(45), NONE))
    check = result.check("floor-area.AFT-HOLD.1")

    assert (check.outcome, check.actual, check.margin) == ("pass", "44", "1")
    assert result.check("place.AFT-HOLD").actual == "220"
    lines = [(line.what, line.weight) for line in result.lines if line.group == "items"]
    assert lines == [("aft hold, cargo", F(200)), ("aft hold, spreader of cargo", F(20))]
    assert result.check("place.AFT-HOLD").room == F(80)  # 300 less 220


def test_the_moment_of_pallet_net_and_spreader_is_in_every_phase() -> None:
    rigged = crate(100, pallet={"weight": quantity(30, "lb")}, net={"weight": quantity(5, "lb")})
    plain, with_rigging = result_of(loaded(crate(100))), result_of(loaded(rigged))

    for before, after in zip(plain.states, with_rigging.states, strict=True):
        assert after.weight - before.weight == 35
        assert after.moment - before.moment == 35 * 190


def test_a_pallet_with_a_size_stands_on_the_floor_and_a_spreader_beneath_it_in_its_stead() -> None:
    pallet = {"weight": quantity(10, "lb"), **sides(24, 24)}  # 4 ft2
    board = {"weight": quantity(10, "lb"), **sides(36, 24)}  # 6 ft2
    item = crate(180, sides(12, 12), pallet=pallet)

    alone = floor_checks(hold(per_area(90), NONE), item)["floor-area.AFT-HOLD.1"]
    on_board = floor_checks(hold(per_area(90), NONE), item | {"spreader": board})["floor-area.AFT-HOLD.1"]

    assert alone.actual == "47.5"  # 190 lb on 4 ft2
    assert on_board.actual == "33.3"  # 200 lb on 6 ft2


def test_contact_area_is_that_of_the_feet_not_of_the_outline() -> None:
    # Four feet of 3 in x 2 in: 24 in2, a sixth of a square foot; 50 lb on it are 300 lb/ft2.
    feet = sides(3, 2, feet_lengthwise=2, feet_widthwise=2)
    check = floor_checks(hold(per_area(200), NONE), crate(50, feet))["floor-area.AFT-HOLD.1"]

    assert (check.outcome, check.actual, check.margin) == ("fail", "300", "-100")


@pytest.mark.parametrize(
    ("runs", "lies", "actual"),
    [
        # 120 lb, 48 in x 18 in: 30 lb/ft over 4 ft, 80 lb/ft over 1.5 ft.
        ("along", "along", "30"),
        ("along", "across", "80"),
        ("across", "along", "80"),
        ("across", "across", "30"),
    ],
)
def test_running_load_counts_the_way_the_place_runs_and_the_way_the_item_lies(
    runs: str, lies: str, actual: str
) -> None:
    basis = hold(per_area(None), per_length(60), runs=runs)
    check = floor_checks(basis, crate(120, sides(48, 18, lies)))["floor-run.AFT-HOLD.1"]

    assert (check.actual, check.limit, check.unit) == (actual, "60", "lb/ft")
    assert check.outcome == ("pass" if actual == "30" else "fail")


def test_turning_an_item_is_named_where_its_other_side_is_long_enough() -> None:
    # 120 lb at 60 lb/ft need 2 ft; the item is 4 ft the other way.
    basis = hold(per_area(None), per_length(60))
    turned = floor_checks(basis, crate(120, sides(48, 18, "across")))["floor-run.AFT-HOLD.1"]
    short = floor_checks(basis, crate(125, sides(18, 18)))["floor-run.AFT-HOLD.1"]

    assert turned.what_next.startswith(
        "Turn item 1, or stand it on a spreader: at least 2 ft along the aircraft"
    )
    # 125 lb need 2.0833 ft: rounded up, 2.1 ft.
    assert short.what_next.startswith(
        "Stand item 1 on a spreader: at least 2.1 ft along the aircraft under it"
    )


def test_area_length_and_compartment_hold_at_once() -> None:
    # 290 lb on 48 in x 36 in: 24.2 lb/ft2 of 25, 72.5 lb/ft of 72, 290 lb of 300.
    result = result_of(loaded(crate(290, sides(48, 36))), hold(per_area(25), per_length(72)))

    assert result.check("floor-area.AFT-HOLD.1").outcome == "pass"
    assert result.check("floor-run.AFT-HOLD.1").outcome == "fail"
    assert result.check("place.AFT-HOLD").outcome == "pass"
    assert result.verdict == "outside"


def test_without_a_footprint_a_place_with_a_floor_limit_is_unresolved() -> None:
    result = result_of(loaded(crate(80)), hold(per_area(50), per_length(60)))

    for code in ("floor-area.AFT-HOLD.1", "floor-run.AFT-HOLD.1"):
        assert result.check(code).outcome == "unresolved"
        assert result.check(code).what_next == (
            "Enter the footprint of item 1: what touches the floor, not its outline."
        )
    assert result.verdict == "unresolved"


def test_what_the_basis_says_needs_no_footprint_needs_none() -> None:
    basis = hold(per_area(50), per_length(60), free_up_to=F(40), free_kinds=("baggage",))
    bags = crate(150) | {"kind": "baggage"}

    assert {check.outcome for check in floor_checks(basis, crate(40), bags).values()} == {"pass"}
    heavier = floor_checks(basis, crate("40.1"), bags)
    assert heavier["floor-area.AFT-HOLD.1"].outcome == "unresolved"


def test_what_needs_no_footprint_is_still_checked_where_it_states_one() -> None:
    basis = hold(per_area(50), NONE, free_up_to=F(40))

    assert floor_checks(basis, crate(40, sides(6, 6)))["floor-area.AFT-HOLD.1"].actual == "160"


def test_a_floor_limit_that_was_not_entered_is_unresolved_and_one_shown_to_be_none_is_not() -> None:
    absent = floor_checks(hold(None, NONE), crate(80, sides(24, 24)))
    none = floor_checks(hold(per_area(None), NONE), crate(80))

    assert absent["floor-area.AFT-HOLD.1"].outcome == "unresolved"
    assert {check.outcome for check in none.values()} == {"pass"}


def test_every_item_that_fails_or_is_unknown_is_told_and_of_the_others_the_tightest() -> None:
    basis = hold(per_area(50), NONE)
    small, wide, heavy = crate(40, sides(12, 12)), crate(40, sides(24, 24)), crate(90, sides(12, 12))

    assert "floor-area.AFT-HOLD.1" in floor_checks(basis, small, wide)  # 40 lb/ft2, the other 10
    assert "floor-area.AFT-HOLD.2" not in floor_checks(basis, small, wide)
    told = {
        code: check.outcome
        for code, check in floor_checks(basis, small, heavy, crate(60)).items()
        if "area" in code
    }
    assert told == {"floor-area.AFT-HOLD.2": "fail", "floor-area.AFT-HOLD.3": "unresolved"}


def test_items_that_are_too_much_side_by_side_are_to_stand_one_behind_another() -> None:
    # Two of 80 lb, 2 ft long: 40 lb/ft each, of 60; side by side they are 80.
    two = (crate(80, sides(24, 12)), crate(80, sides(24, 12)))
    together = floor_checks(hold(per_area(None), per_length(60)), *two)["floor-run.AFT-HOLD"]
    longer = floor_checks(hold(per_area(None), per_length(60), length=F(48)), *two)["floor-run.AFT-HOLD"]
    short = floor_checks(hold(per_area(None), per_length(60), length=F(47)), *two)["floor-run.AFT-HOLD"]

    assert together.outcome == longer.outcome == "advisory"
    assert together.margin_text == (
        "side by side these items would load it with 80 lb/ft of 60: "
        "stand them one behind another, lengthwise"
    )
    assert short.outcome == "unresolved"
    assert short.margin_text.endswith("one behind another they need 48 in of 47 in")
    # 30 lb/ft each: together on the limit however they stand, so nothing is told.
    light = (crate(60, sides(24, 12)), crate(60, sides(24, 12)))
    assert "floor-run.AFT-HOLD" not in floor_checks(hold(per_area(None), per_length(60)), *light)


def test_a_metric_limit_on_an_aircraft_in_pounds_is_converted_exactly() -> None:
    # 250 kg/m2 are 250 / 0.45359237 * 0.0254^2 lb/in2; an item of just that on one square metre is on it.
    basis = hold(per_area(250, Unit.KG_PER_M2), NONE)
    on = crate(250, sides(1000, 1000, unit="mm")) | {"weight": quantity(250, "kg")}
    over = on | {"weight": quantity("250.0001", "kg")}

    assert floor_checks(basis, on)["floor-area.AFT-HOLD.1"].room == 0
    check = floor_checks(basis, over)["floor-area.AFT-HOLD.1"]
    assert (check.outcome, check.limit, check.unit) == ("fail", "250", "kg/m2")
    assert check.what_next.startswith("Stand item 1 on a spreader: at least 1.001 m2")


@given(weight=st.integers(1, 299), board=st.integers(1, 100))
def test_an_area_just_large_enough_for_all_that_stands_on_it_does_and_a_smaller_one_does_not(
    weight: int, board: int
) -> None:
    # Naive: an area of (weight + board) / limit is just enough, one square hundredth of an inch less is not.
    limit = F(45, 144)
    least = (weight + board) / limit
    basis = hold(per_area(45), NONE)
    for size, outcome in ((least, "pass"), (least - F(1, 100), "fail")):
        if size <= 0:
            continue
        item = crate(weight)
        item["spreader"] = {"weight": quantity(board, "lb"), **sides("1", "1")}
        declared = read_load(loaded(item), basis)
        assert declared.items[0].contact is not None
        contact = declared.items[0].contact._replace(area=size)
        items = (replace(declared.items[0], contact=contact),)
        assert (
            checks_floor.floor_checks(replace(declared, items=items), prepared(basis))[0].outcome == outcome
        )


BAD: list[tuple[dict[str, Any], str, str]] = [
    ({"footprint": sides(0, 12)}, "/items/0/footprint/length/value", "zero"),
    ({"footprint": sides(12, 12, "sideways")}, "/items/0/footprint/lies", "choice"),
    ({"footprint": {"length": quantity(1, "ft")}}, "/items/0/footprint/width", "missing"),
    ({"footprint": sides(12, 12, unit="lb")}, "/items/0/footprint/length/unit", "unit-dimension"),
    ({"footprint": sides(2, 2, feet_lengthwise=0)}, "/items/0/footprint/feet_lengthwise", "out-of-range"),
    ({"footprint": 12}, "/items/0/footprint", "object-form"),
    ({"footprint": sides(2, 2) | {"height": 3}}, "/items/0/footprint/height", "unknown-field"),
    ({"pallet": {"weight": quantity(0, "lb")}}, "/items/0/pallet/weight/value", "zero"),
    ({"net": {"weight": quantity(1, "in")}}, "/items/0/net/weight/unit", "unit-dimension"),
    ({"net": {"weight": quantity(1, "lb"), "length": 3}}, "/items/0/net/length", "unknown-field"),
    ({"spreader": sides(24, 24)}, "/items/0/spreader/weight", "missing"),
    (
        {"spreader": {"weight": quantity(9, "lb"), "length": quantity(4, "ft")}},
        "/items/0/spreader/width",
        "missing",
    ),
    (
        {"footprint": sides(24, 24), "spreader": {"weight": quantity(9, "lb"), **sides(12, 12)}},
        "/items/0/spreader",
        "smaller-than-contact",
    ),
    (
        {"kind": "equipment", "removed": True, "footprint": sides(2, 2)},
        "/items/0/footprint",
        "removed-stands-nowhere",
    ),
]


@pytest.mark.parametrize(("change", "pointer", "code"), BAD)
def test_a_footing_that_makes_no_sense_is_refused_with_its_field(
    change: dict[str, Any], pointer: str, code: str
) -> None:
    document = loaded(crate(80) | change)

    with pytest.raises(Invalid) as refused:
        read_load(document, hold(per_area(50), per_length(60)))
    with pytest.raises(Invalid) as unseen:  # without a basis the same can be seen
        check_shape(document)

    assert (pointer, code) in {(fault.pointer, fault.code) for fault in refused.value.faults}
    assert (pointer, code) in {(fault.pointer, fault.code) for fault in unseen.value.faults}


def test_an_item_only_thought_of_is_judged_too_and_called_so() -> None:
    declared = read_load(loaded(crate(80)), hold(per_area(50), NONE))
    thought = replace(declared, items=(replace(declared.items[0], pointer=""),))

    check = checks_floor.floor_checks(thought, prepared(hold(per_area(50), NONE)))[0]

    assert (check.code, check.outcome) == ("floor-area.AFT-HOLD.added", "unresolved")
    assert check.margin_text == "the footprint of an added item is not known"
