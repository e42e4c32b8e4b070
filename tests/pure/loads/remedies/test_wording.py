"""Remedies in plain words: each kind of step, and how many have to stay behind from where, word by word."""

from dataclasses import replace

import pytest

from loads.balance.aboard import FuelPlan, Item, LapInfant, Person
from loads.balance.prepared import prepared
from loads.balance.remedies.leaving import Left
from loads.balance.remedies.steps import Ballast, Refit, Refuel, Reseat, Shift, Step, Take
from loads.balance.remedies.wording import left_sentence, mended, sentence
from tests.pure.loads.making import F, result_of, seat, twin, with_limits

RESORT = "As the last resort, "
BASIS = twin()
READY = prepared(BASIS)
NOSE, REAR, LOCKER = BASIS.places
LEFT, RIGHT, *_ = BASIS.tanks
PLAN = FuelPlan(F(6), "note", (), F(24), F(420), F(240))
BAGS = Item("baggage", "bags", REAR, F(120), "weighed", removed=False, pointer="/items/0")
CRATE = Item("cargo", "crate", LOCKER, F("62.04"), "weighed", removed=False, pointer="/items/1")
INFANT = LapInfant("I", F(20), "declared", "/passengers/0/lap_infant")


def who(place: str, infant: LapInfant | None = None) -> Person:
    there = seat(place, 124)
    return Person("P", "passenger", None, None, None, there, F(170), "declared", infant, "/passengers/0")


@pytest.mark.parametrize(
    ("steps", "words"),
    [
        ([Reseat(who("ROW1-L"), seat("ROW2-R", 155))], "Reseat the passenger in row1 l to row2 r."),
        (
            [Reseat(who("ROW1-L", INFANT), seat("ROW2-R", 155))],
            "Reseat the passenger in row1 l with the infant on the lap to row2 r.",
        ),
        (
            [Reseat(who("A"), seat("B", 155)), Reseat(who("B"), seat("A", 124))],
            "Let the passengers in a and b change seats.",
        ),
        (
            [Reseat(who("A"), seat("B", 155)), Reseat(who("B"), seat("C", 124))],
            "Reseat 2 passengers: a to b, b to c.",
        ),
        (
            [
                Reseat(who("A"), seat("B", 155)),
                Reseat(who("B", INFANT), seat("C", 124)),
                Reseat(who("C"), seat("A", 124)),
            ],
            "Reseat 3 passengers with the infant on the lap: a to b, b to c, c to a.",
        ),
        ([Shift(BAGS, NOSE, F(120))], "Move all of the baggage (120 lb) from aft hold to nose hold."),
        ([Shift(BAGS, NOSE, F("44.01"))], "Move 44.1 lb of the baggage from aft hold to nose hold."),
        ([Take(CRATE, F("62.04"))], "Leave all of the cargo (62.1 lb) in wing locker behind."),
        ([Take(CRATE, F(30))], "Leave 30 lb of the cargo in wing locker behind."),
        ([Ballast(NOSE, F("12.25"))], "Load 12.3 lb of ballast in nose hold."),
        (
            [Refit(BASIS.configurations[1])],
            "Fly it in configuration freight, everybody and everything as it is.",
        ),
        ([Refuel(LEFT, F("-4.7"))], "Carry 4.7 US gal (28.2 lb) less fuel in left-main."),
        (
            [Refuel(LEFT, F("-2.51")), Refuel(RIGHT, F("-2.51"))],
            "Carry 5.1 US gal (30.2 lb) less fuel: 2.6 US gal less in left-main, "
            "2.6 US gal less in right-main.",
        ),
        (
            [Refuel(LEFT, F(-3)), Refuel(RIGHT, F(3))],
            "Carry the same fuel otherwise: 3 US gal less in left-main, 3 US gal more in right-main.",
        ),
        (
            [
                Shift(BAGS, NOSE, F(20)),
                Reseat(who("A"), seat("B", 155)),
                Take(CRATE, F(10)),
                Ballast(NOSE, F(5)),
            ],
            "Reseat the passenger in a to b. Move 20 lb of the baggage from aft hold to nose hold. "
            "Leave 10 lb of the cargo in wing locker behind. Load 5 lb of ballast in nose hold.",
        ),
    ],
)
def test_what_to_do_is_said_in_words(steps: list[Step], words: str) -> None:
    assert sentence(steps, PLAN, READY) == words


def left(people: int, *rows: str) -> str:
    said = left_sentence(Left(people, rows, F("180.04"), result_of()), READY)
    assert said.startswith(RESORT)
    return said.removeprefix(RESORT)


@pytest.mark.parametrize(
    ("people", "rows", "words"),
    [
        (1, "2", "one passenger of at least 180.1 lb from row 2 would have to stay behind."),
        (2, "1 2", "two passengers together of at least 180.1 lb from rows 1-2 would have to stay behind."),
        (
            3,
            "3 4 5",
            "three passengers together of at least 180.1 lb from rows 3-5 would have to stay behind.",
        ),
        (
            9,
            "1 3",
            "nine passengers together of at least 180.1 lb from rows 1 and 3 would have to stay behind.",
        ),
        (
            10,
            "1 2 4",
            "10 passengers together of at least 180.1 lb from rows 1, 2 and 4 would have to stay behind.",
        ),
        (
            2,
            "1 X",
            "two passengers together of at least 180.1 lb from rows 1 and X would have to stay behind.",
        ),
        (1, "club", "one passenger of at least 180.1 lb from row club would have to stay behind."),
        (1, "", "one passenger would have to stay behind, and not any one: try who it may be."),
        (5, "", "five passengers would have to stay behind, and not any five: try who it may be."),
        (12, "", "12 passengers would have to stay behind, and not any 12: try who it may be."),
    ],
)
def test_how_many_stay_behind_and_from_where_is_said_in_words(people: int, rows: str, words: str) -> None:
    assert left(people, *rows.split()) == words


@pytest.mark.parametrize("number", range(1, 10))
def test_small_numbers_are_written_out(number: int) -> None:
    names = ["one", "two", "three", "four", "five", "six", "seven", "eight", "nine"]
    assert left(number).startswith(f"{names[number - 1]} passenger")


def test_a_limit_that_is_gone_in_the_changed_load_is_told_as_gone() -> None:
    # 5,760.5 lb at take-off, 6,700 allowed by the sheet, and then by nothing at all.
    before = result_of(
        basis=with_limits(take_off=5700, ramp=6000, zero_fuel=6000, landing=6000, minimum_flying=4300)
    )
    after = result_of()
    assert mended(before, after) == [
        {
            "code": "weight.take-off",
            "title": "take-off weight",
            "before": "60.5 lb above the limit",
            "after": "1039.5 lb below the limit",
        }
    ]
    without = replace(after, checks=tuple(one for one in after.checks if one.code != "weight.take-off"))
    assert [one["after"] for one in mended(before, without)] == ["nothing there any more"]
