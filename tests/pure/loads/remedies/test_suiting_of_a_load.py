"""Which seats are open, which lines stay where they are, and which configurations carry a load as it is."""

from dataclasses import replace
from typing import Any

import pytest

from loads.balance.events import Event, Moving
from loads.balance.remedies.refitting import MOST_OFFERED, carries, refitted
from loads.balance.remedies.steps import Refit
from loads.balance.remedies.suiting import fixed_lines, free_seats
from tests.pure.loads.making import F, limit
from tests.pure.loads.remedies.rejects import aircraft, another_configuration, line, loaded, question_of
from tests.pure.loads.round_figures import q


def test_seats_of_the_configuration_are_open_but_for_the_crews_and_those_who_come_later() -> None:
    basis = aircraft()
    (own,) = basis.configurations
    basis = replace(basis, configurations=(replace(own, seats=("P", "S1", "S2", "S3")),))
    document = loaded({"S1": 200})
    declared = question_of((document, basis)).declared
    assert [one.id for one in free_seats(declared, basis.seats)] == ["S1", "S2", "S3"]
    comer = replace(declared.passengers[0], seat=basis.seats[2], pointer="/sequence/0/come/0")
    event = Event(1, "flight", F(5), "/sequence/0", coming=(comer,))
    later = replace(declared, sequence=(event,))
    assert [one.id for one in free_seats(later, basis.seats)] == ["S1", "S3"]


def test_a_seat_is_open_as_it_stands() -> None:
    basis = aircraft()
    declared = question_of((loaded({"S1": 200}), basis)).declared
    moved = replace(basis.seats[2], arm=F(105))
    standing = free_seats(replace(declared, settings=((moved, "5"),)), basis.seats)
    assert [(one.id, one.arm) for one in standing] == [("S1", 100), ("S2", 105), ("S3", 120), ("S4", 120)]


def test_lines_that_an_event_names_stay() -> None:
    document = loaded({"S1": 200, "S3": 150}, ("REAR", 40), ("NOSE", 20))
    document["sequence"] = [{"after_burning": q(30), "leave": [{"seat": "S3"}]}]
    declared = question_of((document, aircraft())).declared
    assert fixed_lines(declared) == {"/passengers/1"}
    (event,) = declared.sequence
    moves = Moving("/items/0", declared.items[1].place)
    assert fixed_lines(replace(declared, sequence=(event, replace(event, leaving=(), moving=(moves,))))) == {
        "/passengers/1",
        "/items/0",
    }
    assert fixed_lines(question_of((loaded({"S1": 200}), aircraft())).declared) == frozenset()


@pytest.mark.parametrize(
    ("changes", "carried"),
    [
        ({}, True),
        ({"id": "all"}, False),
        ({"fit": "floats"}, False),
        ({"minimum_crew": 2}, False),
        ({"minimum_crew": 0}, True),
        ({"seats": ("P", "S1")}, True),
        ({"seats": ("P", "S2")}, False),
        ({"seats": ("S1",)}, False),
        ({"places": ("REAR",)}, True),
        ({"places": ("NOSE",)}, False),
    ],
)
def test_a_configuration_carries_what_has_its_seat_and_place_and_crew_in_it(
    changes: dict[str, Any], *, carried: bool
) -> None:
    basis = aircraft()
    (own,) = basis.configurations
    declared = question_of((loaded({"S1": 200}, ("REAR", 40)), basis)).declared
    assert carries(replace(own, **({"id": "other"} | changes)), declared) is carried


def test_two_configurations_are_offered_and_no_more() -> None:
    document, basis = another_configuration()
    own, *_, strakes = basis.configurations
    named = [replace(strakes, id=f"strakes {number}") for number in (1, 2, 3)]
    question = question_of((document, replace(basis, configurations=(own, *named))))
    found = refitted(question)
    assert [one.steps for one in found] == [(Refit(one),) for one in named[:MOST_OFFERED]]
    assert MOST_OFFERED == 2
    assert [one.result.verdict for one in found] == ["within", "within"]
    assert [one.proven for one in found] == [False, False]
    question.until = 0.0
    assert refitted(question) == []


def test_one_that_does_not_carry_it_does_not_hide_the_next() -> None:
    document, basis = another_configuration()
    own, floats, *_, strakes = basis.configurations
    basis = replace(basis, configurations=(floats, own, replace(own, id="bare"), strakes))
    heavier = replace(own.limits, take_off=limit(3058))
    assert [one.steps for one in refitted(question_of((document, basis)))] == [(Refit(strakes),)]
    just = replace(basis, configurations=(own, replace(own, id="just", limits=heavier)))
    assert [one.steps for one in refitted(question_of((document, just)))] == [
        (Refit(just.configurations[1]),)
    ]
    document["items"].append(line("REAR", q("0.1")))
    assert refitted(question_of((document, just))) == []
