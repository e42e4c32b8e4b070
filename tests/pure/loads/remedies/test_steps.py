"""The load with a step taken: what changes, in which order lines stand, and that all else stays."""

from dataclasses import replace
from typing import Any

import pytest

from loads.balance.aboard import Declared, Item, LapInfant
from loads.balance.declared import read_load
from loads.balance.remedies.steps import Ballast, Leave, Refit, Refuel, Reseat, Shift, Take, taken
from tests.pure.loads.making import F, load, twin

BASIS = twin()
NOSE, REAR, LOCKER = BASIS.places
BAGS = Item("baggage", "bags", REAR, F(120), "weighed", removed=False, pointer="/items/0")
CRATE = Item("cargo", "crate", LOCKER, F(60), "weighed", removed=False, pointer="/items/1")


def declared() -> Declared:
    return replace(read_load(load(), BASIS), items=(BAGS, CRATE))


def seats_of(one: Declared) -> list[str]:
    return [person.seat.id for person in one.passengers]


@pytest.mark.parametrize(
    ("steps", "lines"),
    [
        ([], [BAGS, CRATE]),
        ([Shift(BAGS, NOSE, F(120))], [replace(BAGS, place=NOSE), CRATE]),
        (
            [Shift(BAGS, NOSE, F(50))],
            [replace(BAGS, weight=F(70)), replace(BAGS, place=NOSE, weight=F(50)), CRATE],
        ),
        (
            [Shift(BAGS, NOSE, F(50)), Shift(BAGS, LOCKER, F(30))],
            [
                replace(BAGS, weight=F(40)),
                replace(BAGS, place=LOCKER, weight=F(30)),
                replace(BAGS, place=NOSE, weight=F(50)),
                CRATE,
            ],
        ),
        ([Take(BAGS, F(120))], [CRATE]),
        ([Take(CRATE, F("0.1"))], [BAGS, replace(CRATE, weight=F("59.9"))]),
        (
            [Ballast(NOSE, F(12))],
            [BAGS, CRATE, Item("ballast", "ballast", NOSE, F(12), "weighed", removed=False, pointer="")],
        ),
    ],
)
def test_lines_after_a_step(steps: list[Any], lines: list[Item]) -> None:
    before = declared()
    assert taken(before, steps) == replace(before, items=tuple(lines))


def test_a_passenger_goes_to_another_seat_and_nobody_else_does() -> None:
    before = declared()
    after = taken(before, [Reseat(before.passengers[1], BASIS.seats[4])])
    assert seats_of(before) == ["ROW1-L", "ROW1-R"]
    assert seats_of(after) == ["ROW1-L", "ROW2-L"]
    assert replace(after, passengers=before.passengers) == before


def test_fuel_changes_in_its_tank_alone() -> None:
    before = declared()
    after = taken(before, [Refuel(BASIS.tanks[0], F("-4.7")), Refuel(BASIS.tanks[2], F(2))])
    assert [held.usable for held in before.fuel.tanks] == [50, 50, 15, 15]
    assert [held.usable for held in after.fuel.tanks] == [F("45.3"), 50, 17, 15]
    assert replace(after, fuel=before.fuel) == before


def test_another_configuration_leaves_everybody_where_they_are() -> None:
    before = declared()
    other = BASIS.configurations[1]
    assert taken(before, [Refit(other)]) == replace(before, configuration=other)


def test_who_stays_is_one_person_less_and_with_an_infant_two() -> None:
    before = declared()
    alone, adult = before.passengers
    assert isinstance(adult.lap_infant, LapInfant)
    one = taken(before, [Leave(alone)])
    assert (one.passengers, one.persons_on_board) == ((adult,), 3)
    two = taken(before, [Leave(adult)])
    assert (two.passengers, two.persons_on_board) == ((alone,), 2)


def test_all_of_a_line_or_a_part_of_it() -> None:
    assert [Shift(BAGS, NOSE, F(weight)).whole for weight in (119, 120)] == [False, True]
    assert [Take(BAGS, F(weight)).whole for weight in (119, 120)] == [False, True]
