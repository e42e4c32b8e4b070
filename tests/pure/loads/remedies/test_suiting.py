"""Whom a seat suits, case by case (common practice; the rules named in the module are remembered)."""

from dataclasses import replace

import pytest

from fleet.basis import Seat
from loads.balance.aboard import LapInfant, Person
from loads.balance.remedies.arranging import arranged
from loads.balance.remedies.reach import ways_of
from loads.balance.remedies.steps import Reseat
from loads.balance.remedies.suiting import suits
from tests.pure.loads.making import F, seat
from tests.pure.loads.remedies.cabins import asked, empty_of, full_cabin, nineteen

PLAIN = seat("ROW1-A", 100, 0, "passenger")
INFANT = LapInfant("I", None, None, "/passengers/0/lap_infant")


def person(category: str | None = "adult", infant: LapInfant | None = None) -> Person:
    return Person("P", "passenger", None, None, category, PLAIN, F(170), "declared", infant, "/passengers/0")


@pytest.mark.parametrize(
    ("there", "who", "suited"),
    [
        (PLAIN, person(), True),
        (PLAIN, person(None), True),
        (replace(PLAIN, serves="crew"), person(), False),
        (replace(PLAIN, serves="either"), person(), True),
        (replace(PLAIN, attendant=True), person(), False),
        (replace(PLAIN, exit_row=True), person(), True),
        (replace(PLAIN, exit_row=True), person(None), False),
        (replace(PLAIN, exit_row=True), person("child"), False),
        (replace(PLAIN, exit_row=True, infant_restraint=True), person("infant"), False),
        (PLAIN, person("child"), False),
        (replace(PLAIN, infant_restraint=False), person("Child"), False),
        (replace(PLAIN, infant_restraint=True), person("child"), True),
        (PLAIN, person("adult", INFANT), False),
        (replace(PLAIN, infant_restraint=True), person("adult", INFANT), True),
        (replace(PLAIN, infant_restraint=True, exit_row=True), person("adult", INFANT), False),
    ],
)
def test_a_seat_suits_only_whom_it_is_known_to_suit(there: Seat, who: Person, suited: bool) -> None:
    assert suits(there, who) is suited


def test_crew_never_moves_and_a_passenger_never_takes_a_crew_seat() -> None:
    question = asked(full_cabin(2, count=15), nineteen(), empty_of(7600, 200))
    found = arranged(question, ways_of(question.result, question.ready), people=True, items=False)
    assert found is not None
    for step in found.steps:
        assert isinstance(step, Reseat)
        assert step.person.role == "passenger"
        assert step.end.serves != "crew"


def test_an_adult_with_an_infant_moves_only_to_a_seat_with_a_restraint_for_it() -> None:
    basis = nineteen()
    document = full_cabin(2, count=15, aft=250)
    for one in document["passengers"]:
        one["lap_infant"] = {
            "name": f"Infant {one['seat']}",
            "weight": {"value": 10, "unit": "lb"},
            "how": "declared",
        }
    document["persons_on_board"] += 15
    question = asked(document, basis, empty_of(7600, 199))
    assert question.result.verdict == "outside"
    assert arranged(question, ways_of(question.result, question.ready), people=True, items=False) is None

    there = tuple(replace(one, infant_restraint=True) if one.id == "ROW1-A" else one for one in basis.seats)
    question = asked(document, replace(basis, seats=there), empty_of(7600, 199))
    found = arranged(question, ways_of(question.result, question.ready), people=True, items=False)
    assert found is None or [step.end.id for step in found.steps if isinstance(step, Reseat)] == ["ROW1-A"]
    assert found is not None
