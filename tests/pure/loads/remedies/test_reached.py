"""How far a load can grow, tenth by tenth: equal to a limit holds, a tenth beyond does not."""

from dataclasses import replace
from fractions import Fraction
from typing import Any

import pytest

from loads.balance.aboard import Declared
from loads.balance.remedies.question import Question
from loads.balance.remedies.reaching import MOST_TENTHS, NOT_SOUGHT, Reach, bound_of, reached
from loads.balance.remedies.steps import Ballast, Refuel, taken
from loads.balance.remedies.varying import Change
from tests.pure.loads.making import F
from tests.pure.loads.remedies.rejects import Asked, aircraft, loaded, question_of, too_far_aft
from tests.pure.loads.remedies.roomy import (
    in_and_out_of_a_slit,
    stopped_by_the_centre_of_gravity,
    stopped_by_weight,
)
from tests.pure.loads.round_figures import q

NOSE, REAR = 0, 1


def more_in(question: Question, number: int) -> Change:
    place = question.ready.basis.places[number]

    def changed(count: Fraction) -> Declared:
        return taken(question.declared, [Ballast(place, count / 10)])

    return Change(changed)


def told(found: Reach) -> tuple[int, str | None, bool]:
    return found.count, None if found.stop is None else found.stop.code, found.sought


@pytest.mark.parametrize(
    ("make", "place", "most", "wanted"),
    [
        # 17 lb up to the limit of take-off, 10 lb up to that of the nose.
        (stopped_by_weight, REAR, 5000, (170, "weight.take-off", True)),
        (stopped_by_weight, REAR, 170, (170, "weight.take-off", True)),
        (stopped_by_weight, REAR, 169, (169, None, True)),
        (stopped_by_weight, REAR, 171, (170, "weight.take-off", True)),
        (stopped_by_weight, REAR, 1, (1, None, True)),
        (stopped_by_weight, REAR, 0, (0, None, True)),
        (stopped_by_weight, REAR, -1, (0, None, True)),
        (stopped_by_weight, NOSE, 5000, (100, "place.NOSE", True)),
        # 160 lb in at 48 lb in a pound: 3.33 lb.
        (stopped_by_the_centre_of_gravity, REAR, 5000, (33, "cg.zero-fuel", True)),
        (stopped_by_the_centre_of_gravity, REAR, 33, (33, "cg.zero-fuel", True)),
        (stopped_by_the_centre_of_gravity, REAR, 32, (32, None, True)),
        # 16.457 lb up to a slit; beyond it there is room again.
        (in_and_out_of_a_slit, REAR, 1000, (164, "cg.ramp", True)),
        (in_and_out_of_a_slit, REAR, 164, (164, "cg.ramp", True)),
        (in_and_out_of_a_slit, REAR, 163, (163, None, True)),
    ],
)
def test_the_last_tenth_that_holds(make: Any, place: int, most: int, wanted: tuple[Any, ...]) -> None:
    question = question_of(make())
    found = reached(question, more_in(question, place), most)
    assert told(found) == wanted
    assert found.stopped_by == (None if found.stop is None else found.stop.title)


def test_a_load_that_may_not_grow_at_all_has_no_tenth() -> None:
    # 2,945 lb allowed and there: the first tenth is one too many.
    document, _ = stopped_by_weight()
    question = question_of((document, aircraft({"take_off": 2928})))
    assert told(reached(question, more_in(question, REAR), 500)) == (0, "weight.take-off", True)


def test_without_time_nothing_was_sought() -> None:
    question = question_of(stopped_by_weight())
    question.until = 0.0
    assert reached(question, more_in(question, REAR), 500) == NOT_SOUGHT
    assert not NOT_SOUGHT.sought
    assert NOT_SOUGHT.count == 0
    assert NOT_SOUGHT.stopped_by is None


def test_a_tank_that_takes_more_in_flight_than_its_table_knows_stops_it() -> None:
    # 30 US gal less 1 for taxi, and 15 from the left: 44 of 50.
    moved = {"from": "LEFT", "to": "RIGHT", "quantity": q(15, "US gal")}
    document = loaded({"S1": 200}) | {"sequence": [{"after_burning": q(0), "transfer": moved}]}
    question = question_of((document, aircraft()))
    right = question.declared.fuel.tanks[1].tank

    def fuller(count: Fraction) -> Declared:
        return taken(question.declared, [Refuel(right, count / 10)])

    assert told(reached(question, Change(fuller, refuels=True), 200)) == (60, "tank-table.RIGHT", True)


def with_range(asked: Asked, take_off: int | None) -> Question:
    question = question_of(asked)
    if take_off is None:
        kept = tuple(one for one in question.result.checks if not one.code.startswith("weight."))
        question.result = replace(question.result, checks=kept)
    return question


@pytest.mark.parametrize(
    ("room", "weighs", "wanted"),
    [
        (None, 17, 170),
        (F(20), 17, 170),
        (F("9.99"), 17, 99),
        (F(0), 17, 0),
        (F("9.99"), None, 99),
        (None, None, MOST_TENTHS),
        (F("-0.05"), 17, -1),
    ],
)
def test_what_a_place_and_the_flight_leave_in_tenths(room: Any, weighs: int | None, wanted: int) -> None:
    assert bound_of(with_range(stopped_by_weight(), weighs), room) == wanted


def test_a_load_that_is_outside_has_less_than_nothing() -> None:
    assert bound_of(question_of((loaded({"S1": 200}), aircraft({"take_off": 2700}))), None) == -480
    assert bound_of(question_of(too_far_aft()), F(5)) == 50
