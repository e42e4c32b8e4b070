"""The program of who and what goes where, for loads small enough to write every column and row by hand."""

from collections.abc import Mapping
from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Zone
from loads.balance.events import Event, Leaving
from loads.balance.footing import Contact, Rigging
from loads.balance.remedies.arranging import arranged, can_be_parted, is_movable, table_of, tenths_up
from loads.balance.remedies.program import INFINITE, Program
from loads.balance.remedies.question import Question
from loads.balance.remedies.reach import Ways, ways_of
from loads.balance.remedies.steps import Reseat, Shift
from tests.pure.loads.making import F, limit
from tests.pure.loads.remedies.rejects import (
    a_crate_goes_whole,
    a_full_floor,
    a_notch_between,
    aircraft,
    line,
    loaded,
    question_of,
    too_far_aft,
    too_heavy_to_take_off,
)
from tests.pure.loads.round_figures import q

Row = tuple[float, dict[int, float], float]


def rows_of(program: Program) -> list[Row]:
    ends = [*program.starts[1:], len(program.columns)]
    return [
        (low, dict(zip(program.columns[start:end], program.coefficients[start:end], strict=True)), high)
        for low, high, start, end in zip(
            program.row_lows, program.row_highs, program.starts, ends, strict=True
        )
    ]


def row(parts: Mapping[int, Any], low: Any = -INFINITE, high: Any = INFINITE) -> Row:
    """A row as it is kept, its largest coefficient 1."""
    largest = max(abs(float(each)) for each in parts.values())
    return (
        float(low) / largest,
        {at: float(each) / largest for at, each in parts.items()},
        float(high) / largest,
    )


def table(question: Question, *, people: bool, items: bool) -> Any:
    ways = ways_of(question.result, question.ready)
    return table_of(question, ways, people=people, items=items)


def test_people_and_bags_have_these_columns_and_rows() -> None:
    # 200 lb in S3 and 100 in S4; S2 bears 190 lb. 100 lb in the rear: 1,000 tenths. 3,800 lb in too much.
    found = table(question_of(too_far_aft()), people=True, items=True)
    ways = [(person.seat.id, seat.id) for person, seat in found.seats.values()]
    assert list(found.seats) == [0, 1, 2, 3, 4]
    assert ways == [("S3", "S1"), ("S3", "S4"), ("S4", "S1"), ("S4", "S2"), ("S4", "S3")]
    assert {at: (item.pointer, place.id, each) for at, (item, place, each) in found.moves.items()} == {
        5: ("/items/0", "NOSE", 6)
    }
    assert found.along == {0: -4000, 1: 0, 2: -2000, 3: -2000, 4: 0, 6: -10}
    assert found.across == {0: 0, 1: 4000, 2: -2000, 3: 0, 4: -2000, 6: 0}
    assert found.more == {
        "S1": {0: 200, 2: 100},
        "S2": {3: 100},
        "S3": {0: -200, 1: -200, 4: 100},
        "S4": {1: 200, 2: -100, 3: -100, 4: -100},
        "REAR": {6: F("-0.1")},
        "NOSE": {6: F("0.1")},
    }
    assert found.program.costs == [1, 1, 1, 1, 1, 1, 0]
    assert found.program.highs == [1, 1, 1, 1, 1, 1, 1000]
    assert rows_of(found.program) == [
        row({0: 1, 2: 1}, high=1),  # S1 is free: one of two may come
        row({0: 1, 1: 1}, high=1),  # who sits in S3 goes to one seat
        row({4: 1, 0: -1, 1: -1}, high=0),  # and only then somebody comes
        row({2: 1, 3: 1, 4: 1}, high=1),
        row({1: 1, 2: -1, 3: -1, 4: -1}, high=0),
        row({6: 1, 5: -1000}, high=0),  # tenths only behind the switch
        row({6: F("0.1")}, high=100),  # the nose is empty
        row({6: F("-0.1")}, high=100),  # the rear has 100 of 200 lb
        row({0: -4000, 2: -2000, 3: -2000, 6: -10}, low=-14_200, high=-3800),
    ]


def test_a_crate_is_one_column_and_goes_nowhere_but_to_a_place_that_bears_it() -> None:
    found = table(question_of(a_crate_goes_whole()), people=False, items=True)
    assert found.seats == {}
    assert {at: (item.pointer, place.id, each) for at, (item, place, each) in found.moves.items()} == {
        0: ("/items/0", "REAR", 1),
        2: ("/items/1", "NOSE", 2),
        3: ("/items/2", "NOSE", 3),
    }
    assert rows_of(found.program) == [
        row({1: 1, 0: -400}, high=0),
        row({1: F("-0.1"), 2: 30, 3: 130}, high=60),
        row({1: F("0.1"), 2: -30, 3: -130}, high=40),
        row({1: 10, 2: -3000, 3: -13_000}, low=-13_200, high=-2800),
    ]


def test_of_two_ways_one_is_chosen() -> None:
    question = question_of(a_notch_between())
    one, other = (F(-100), F(-40)), (F(60), F(90))
    found = table_of(question, Ways((one, other), ((F(-5), F(7)),)), people=True, items=False)
    ways = [(person.seat.id, seat.id) for person, seat in found.seats.values()]
    assert ways == [("S1", "S3"), ("S1", "S4"), ("S3", "S1"), ("S3", "S2"), ("S3", "S4")]
    assert rows_of(found.program)[5:] == [
        row({5: 1, 6: 1}, low=1, high=1),
        row({0: 4000, 1: 4000, 2: -3800, 3: -3800, 5: 100, 6: -60}, low=0),
        row({0: 4000, 1: 4000, 2: -3800, 3: -3800, 5: 40, 6: -90}, high=0),
        row({1: 4000, 3: 3800, 4: 3800}, low=-5, high=7),
    ]


def test_a_zone_counts_its_seats_and_places_together() -> None:
    basis = aircraft()
    floor = Zone("FLOOR", "floor", ("S1", "S2", "NOSE"), limit(500))
    no_limit = Zone("ALL", "all", ("S1", "S3"), limit(None))
    document = loaded({"S1": 150, "S3": 180}, ("REAR", 20), ("NOSE", 10))
    question = question_of((document, replace(basis, zones=(floor, no_limit))))
    ways = ways_of(question.result, question.ready)
    found = table_of(question, ways._replace(along=None), people=True, items=True)
    last = rows_of(found.program)[-1]
    # S1 150 to S2, S3, S4, S3 180 to S1, S2, S4; 20 lb forward, 10 lb aft: 340 lb more may come.
    seats = {at: (person.seat.id, seat.id) for at, (person, seat) in found.seats.items()}
    assert list(seats.values()) == [
        ("S1", "S2"), ("S1", "S3"), ("S1", "S4"), ("S3", "S1"), ("S3", "S2"), ("S3", "S4"),
    ]  # fmt: skip
    forward, aft = (each for _, _, each in found.moves.values())
    assert last == row(
        {1: -150, 2: -150, 3: 180, 4: 180, forward: F("0.1"), aft: F("-0.1")}, high=500 - 150 - 10
    )


def test_what_an_event_names_hangs_outside_or_is_not_aboard_stays_where_it_is() -> None:
    document = loaded({"S1": 150}, ("REAR", 20), ("NOSE", 10), ("REAR", 30))
    question = question_of((document, aircraft()))
    ways = ways_of(question.result, question.ready)
    plain = question.declared

    def moving() -> list[tuple[str, str]]:
        found = table_of(question, ways, people=False, items=True)
        return [(item.pointer, place.id) for item, place, _ in found.moves.values()]

    every = [("/items/0", "NOSE"), ("/items/1", "REAR"), ("/items/2", "NOSE")]
    assert moving() == every
    event = Event(1, "flight", F(5), "/sequence/0", leaving=(Leaving("/items/0"),))
    question.declared = replace(plain, sequence=(event,))
    assert moving() == every[1:]
    for changes in (
        {"removed": True},
        {"weight": None},
        {"place": replace(plain.items[0].place, external=True)},
    ):
        changed = replace(plain.items[0], **changes)
        question.declared = replace(plain, items=(changed, *plain.items[1:]))
        assert moving() == every[1:]


def test_nothing_is_moved_to_where_nothing_may_lie() -> None:
    document = loaded({"S1": 150}, ("REAR", 20))
    for changes in ({"maximum": None}, {"external": True}):
        basis = aircraft()
        places = tuple(replace(one, **changes) if one.id == "NOSE" else one for one in basis.places)
        found = table(question_of((document, replace(basis, places=places))), people=False, items=True)
        assert found.moves == {}
    basis = aircraft()
    (own,) = basis.configurations
    short = replace(basis, configurations=(replace(own, places=("REAR",)),))
    assert table(question_of((document, short)), people=False, items=True).moves == {}


def test_a_line_that_may_go_to_two_places_goes_there_with_no_more_than_all_of_it() -> None:
    basis = aircraft()
    wing = replace(basis.places[0], id="WING", name="wing", arm=F(110), lateral_arm=F(-30))
    (own,) = basis.configurations
    known = replace(own, places=(*own.places, "WING"))
    basis = replace(basis, places=(*basis.places, wing), configurations=(known,))
    question = question_of((loaded({"S1": 150}, ("REAR", 20)), basis))
    found = table_of(question, Ways(None, None), people=False, items=True)
    assert [(place.id, each) for _, place, each in found.moves.values()] == [("NOSE", 1), ("WING", 3)]
    assert found.along == {1: -10, 3: -4}
    assert found.across == {1: 0, 3: -3}
    assert rows_of(found.program)[:3] == [
        row({1: 1, 0: -200}, high=0),
        row({3: 1, 2: -200}, high=0),
        row({1: F(1, 200), 3: F(1, 200)}, high=1),
    ]


@pytest.mark.parametrize(
    ("changes", "parted"),
    [
        ({}, True),
        ({"kind": "cargo"}, True),
        ({"kind": "ballast"}, True),
        ({"kind": "consumable"}, True),
        ({"kind": "equipment"}, False),
        ({"contact": Contact(F(6), F(2), F(3))}, False),
        ({"rigging": (Rigging("net", F(3), "/items/0/net"),)}, False),
    ],
)
def test_what_may_be_parted(changes: dict[str, Any], *, parted: bool) -> None:
    item = question_of(too_far_aft()).declared.items[0]
    assert can_be_parted(replace(item, **changes)) is parted


def test_what_was_taken_out_of_the_empty_weight_is_not_there_to_move() -> None:
    item = question_of(too_far_aft()).declared.items[0]
    assert is_movable(item)
    assert not is_movable(replace(item, removed=True))


@pytest.mark.parametrize(("amount", "tenths"), [(0, 0), ("0.01", 1), ("0.1", 1), ("0.11", 2), (20, 200)])
def test_an_amount_in_tenths_is_rounded_up(amount: Any, tenths: int) -> None:
    assert tenths_up(F(amount)) == tenths


def moved(question: Question, *, people: bool, items: bool) -> Any:
    found = arranged(question, ways_of(question.result, question.ready), people=people, items=items)
    if found is None:
        return None
    told = [
        (step.person.seat.id, step.end.id)
        if isinstance(step, Reseat)
        else (step.item.pointer, step.end.id, step.weight)
        for step in found.steps
        if isinstance(step, Reseat | Shift)
    ]
    return told, found.proven


def test_nothing_that_moves_mends_a_weight_or_what_people_alone_can_mend() -> None:
    assert moved(question_of(too_heavy_to_take_off()), people=True, items=True) is None
    light = aircraft({"minimum_flying": 2700})
    assert moved(question_of((loaded({"S3": 200}, ("REAR", 90)), light)), people=True, items=True) is None
    heavy = question_of((loaded({"S2": 195, "S3": 200}, ("REAR", 90)), aircraft()))
    assert moved(heavy, people=False, items=True) is None


def test_a_weight_on_its_limit_is_no_hindrance() -> None:
    # 2,838 lb at take-off, and 2,550 lb with the least fuel at landing: 490 + 2,000 + 60.
    document = loaded({"S3": 200}, ("REAR", 90))
    tight = aircraft({"take_off": 2838, "minimum_flying": 2550})
    # -2,000 + 4,000 + 4,500 = 6,500 where 2,490 lb at zero fuel may have 4,980: 1,520 too much, 15.2 lb.
    assert moved(question_of((document, tight)), people=False, items=True) == (
        [("/items/0", "NOSE", F("15.2"))],
        True,
    )


@pytest.mark.parametrize(
    ("line_weight", "crate", "moves"),
    [
        # 2,000 + 777.5 + 3,750 lb in where 2,490.55 lb may have 4,981.1: 1,546.4 too much; 155 tenths are
        # 15.5 lb, and with the last of them goes what is no whole tenth.
        ("15.55", 75, "15.55"),
        # 0.85 lb in too much of 2,000 + 2.5 + 2,915, and the line is half a tenth.
        ("0.05", "58.3", "0.05"),
    ],
)
def test_what_is_no_whole_tenth_goes_along(line_weight: Any, crate: Any, moves: Any) -> None:
    document = loaded({"S3": 200})
    document["items"] = [line("REAR", q(line_weight)), line("REAR", q(crate), "equipment")]
    basis = aircraft()
    places = tuple(replace(one, maximum=limit(16)) if one.id == "NOSE" else one for one in basis.places)
    question = question_of((document, replace(basis, places=places)))
    assert moved(question, people=False, items=True) == ([("/items/0", "NOSE", F(moves))], True)


def test_where_no_way_is_left_nothing_moves() -> None:
    question = question_of(too_far_aft())
    for ways in (Ways((), None), Ways(None, ())):
        assert arranged(question, ways, people=True, items=True) is None
    assert moved(question_of(a_full_floor()), people=True, items=False) is None
