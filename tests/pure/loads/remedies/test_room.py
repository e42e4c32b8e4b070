"""How much more can go, and how wrong weights may be: reckoned by hand, and the next digit always breaks."""

from dataclasses import replace
from fractions import Fraction

import pytest

from loads.balance.aboard import Declared
from loads.balance.remedies.error import room_for_error
from loads.balance.remedies.more import how_much_more
from loads.balance.remedies.question import TENTH, Question
from loads.balance.remedies.reaching import reached
from loads.balance.remedies.steps import Ballast, taken
from loads.balance.remedies.varying import Change
from tests.pure.loads.making import F, limit
from tests.pure.loads.remedies.brute import small
from tests.pure.loads.remedies.cabins import asked, empty_of, nineteen, seated


def roomy() -> Question:
    """Three passengers, 100 lb in the rear hold, in the middle of the envelope; take-off limit 9,900 lb."""
    basis = nineteen()
    weights = replace(basis.limits, take_off=limit(9900))
    basis = replace(basis, configurations=(replace(basis.configurations[0], limits=weights),))
    document = seated({"ROW3-A": 200, "ROW3-B": 150, "ROW3-C": 150}, {"AFT-HOLD": 100}, gallons=60)
    return asked(document, basis, empty_of(7600, 203))


def lines(found: list[dict[str, object]]) -> dict[tuple[object, object], dict[str, object]]:
    return {(one["kind"], one["id"]): one for one in found}


def test_what_more_can_go_where_reckoned_by_hand() -> None:
    # Take-off: 7600 + 355 crew + 500 + 100 + 120 US gal x 6.5 lb = 780, less 40 lb taxi = 9295: 605 lb left.
    # Nose hold 400 of 400, rear hold 500 of 600 left; a tank takes 605 / 6.5 = 93.07 US gal, rounded down.
    more = lines(how_much_more(roomy()))
    assert (more["place", "AFT-HOLD"]["amount"], more["place", "AFT-HOLD"]["stopped_by"]) == (
        "500",
        "aft hold",
    )
    assert (more["tank", "LEFT"]["amount"], more["tank", "LEFT"]["stopped_by"]) == ("93", "take-off weight")
    assert more["seat", "row 4"]["amount"] == "300"
    assert ("seat", "row 3") not in more  # no seat of it is free


def test_a_tank_that_takes_a_transfer_later_has_that_much_less_room() -> None:
    # Taxi burns 40 / 6.5 US gal, half from either tank: 56.92 and 50 more are 106.92 of 180 in the right.
    moved = {"from": "LEFT", "to": "RIGHT", "quantity": {"value": 50, "unit": "US gal"}}
    event = {"after_burning": {"value": 0, "unit": "US gal"}, "transfer": moved}
    document = seated({"ROW3-A": 200}, {"AFT-HOLD": 100}, gallons=60) | {"sequence": [event]}
    more = lines(how_much_more(asked(document, roomy().ready.basis, empty_of(7600, 203))))
    right = more["tank", "RIGHT"]
    assert (right["amount"], right["stopped_by"]) == ("73", "right, table of arms")  # which ends at 180, too
    assert float(str(more["tank", "LEFT"]["amount"])) > float("73")


def test_how_wrong_the_people_may_be_reckoned_by_hand() -> None:
    # 500 lb of people were declared, crew was weighed; 605 lb are left in all, but no seat takes over 300 lb:
    # 200 lb may be 50 % more, which is as far as is looked, and each may be 100 lb more.
    error = lines(room_for_error(roomy()))
    people = error["people", ""]
    assert (people["percent"], people["each"], people["stopped_by"]) == ("50", "100", "row3 a")


def test_a_weighed_person_is_not_taken_for_wrong() -> None:
    question = roomy()
    weighed = tuple(replace(one, how="weighed") for one in question.declared.passengers)
    question.declared = replace(question.declared, passengers=weighed)
    assert ("people", "") not in lines(room_for_error(question))


@pytest.mark.parametrize("number", range(60))
def test_every_amount_holds_and_the_next_tenth_does_not(number: int) -> None:
    question = asked(*small(number))
    if question.result.verdict != "within":
        return
    places = {place.id: place for place in question.ready.basis.places}
    for one in how_much_more(question):
        if one["kind"] != "place":
            continue
        amount, place = F(str(one["amount"])), places[str(one["id"])]
        for more, holds in ((amount, True), (amount + TENTH, one["stopped_by"] is None)):
            if more:
                changed = taken(question.declared, [Ballast(place, more)])
                assert (question.judge(changed).verdict == "within") is holds


def test_a_fuel_density_may_be_as_wrong_as_the_take_off_limit_allows() -> None:
    # 120 US gal at 6.5 lb are 780 lb; 605 lb more would be 77.5 %: 50 % is as far as is looked.
    error = lines(room_for_error(roomy()))
    density = error["fuel-density", ""]
    assert (density["percent"], density["each"], density["stopped_by"]) == ("50", "3.25", None)
    # With 9,400 lb allowed 105 lb are left: 105 / 780 = 13.46 %, rounded down.
    question = roomy()
    own = question.declared.configuration
    tight = replace(own, limits=replace(own.limits, take_off=limit(9400)))
    question.declared = replace(question.declared, configuration=tight)
    question.result = question.judge(question.declared)
    density = lines(room_for_error(question))["fuel-density", ""]
    assert (density["percent"], density["stopped_by"]) == ("13.4", "take-off weight")


def test_a_count_is_the_last_that_holds_before_the_first_that_does_not() -> None:
    question = roomy()
    place = question.ready.basis.places[1]

    def changed(count: Fraction) -> Declared:
        return taken(question.declared, [Ballast(place, count)])

    found = reached(question, Change(changed), 5000)
    assert found.count == 500
    assert found.stop is not None
    assert found.stop.code == "place.AFT-HOLD"
    assert reached(question, Change(changed), 10).stop is None


def test_a_figure_nobody_had_time_to_look_for_is_not_told() -> None:
    late = replace(roomy(), until=0.0, clock=lambda: 1.0)

    assert how_much_more(late) == []
    assert room_for_error(late) == []
