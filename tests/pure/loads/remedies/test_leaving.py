"""Who would have to stay: how many, from which rows and how heavy at least, reckoned by hand.

The aircraft of `rejects` takes off with 2,548 lb and its passengers; nobody else can go, and all fuel is
wanted at landing. Row 1 is at 100 in, row 2 at 120 in.
"""

from dataclasses import replace
from fractions import Fraction
from typing import Any

import pytest

from fleet.basis import Basis
from loads.balance.remedies.leaving import fewest_left, rows_of
from loads.balance.remedies.question import Question
from tests.pure.loads.making import F, envelope, seat
from tests.pure.loads.remedies.rejects import INFANT, aircraft, gallons, loaded, question_of
from tests.pure.loads.round_figures import box, q

FOUR = {"S1": 170, "S2": 150, "S3": 180, "S4": 200}
Told = tuple[int, tuple[str, ...], Fraction, int, bool]


def told(question: Question) -> Told | None:
    """People, rows, weight, what takes off without the lightest such group, and whether fewer do not do."""
    left = fewest_left(question)
    if left is None:
        return None
    assert left.result.verdict == "within"
    take_off = left.result.state("take-off").weight
    return left.people, left.rows, left.weight, int(take_off), left.proven


def wide(take_off: int) -> Basis:
    return aircraft({"take_off": take_off}, envelopes=(box(90, 110),))


def allowed(take_off: int, people: dict[str, Any] | None = None) -> Question:
    """A question about who may stay where only weight decides."""
    return question_of((loaded(FOUR if people is None else people), wide(take_off)))


@pytest.mark.parametrize(
    ("take_off", "wanted"),
    [
        # 3,248 lb: one of any seat, of row 2, of one seat; two of any seat, ...; all of them.
        (3098, (1, ("1", "2"), 150, 3098, True)),
        (3097, (1, ("1", "2"), 170, 3078, True)),
        (3078, (1, ("1", "2"), 170, 3078, True)),
        (3077, (1, ("2",), 180, 3068, True)),
        (3048, (1, ("2",), 200, 3048, True)),
        (3047, (2, ("1", "2"), 320, 2928, True)),
        (2928, (2, ("1", "2"), 320, 2928, True)),
        (2927, (2, ("1", "2"), 330, 2918, True)),
        (2868, (2, ("2",), 380, 2868, True)),
        (2867, (3, ("1", "2"), 500, 2748, True)),
        (2700, (3, ("1", "2"), 550, 2698, True)),
        (2548, (4, ("1", "2"), 700, 2548, True)),
        (2547, None),
    ],
)
def test_by_weight_alone(take_off: int, wanted: Told | None) -> None:
    assert told(allowed(take_off)) == wanted


def test_where_the_balance_decides_only_some_rows_are_told() -> None:
    # -2,000 + 3,600 + 4,000 = 5,600 where 2,900 lb at zero fuel may have 5,800; 150 lb less in row 1 may have
    # but 5,500. So one of row 2, or two of whom one is.
    one = question_of((loaded(FOUR), aircraft({"take_off": 3098})))
    assert told(one) == (1, ("2",), 180, 3068, True)
    two = question_of((loaded(FOUR), aircraft({"take_off": 2928})))
    assert told(two) == (2, ("1", "2"), 330, 2918, True)


def test_a_row_of_which_one_as_heavy_would_not_do_is_left_out() -> None:
    # -2,000 + 4,000 + 3,000 + 1,000 = 6,000 where 2,770 lb may have 5,540: 460 too much, with 200 lb less in
    # row 1 860. In row 2 even 150 lb are enough; but of 200 lb not any would do.
    people = {"S4": 200, "S3": 150, "S1": 200}
    assert told(question_of((loaded(people, ("REAR", 20)), aircraft()))) == (1, ("2",), 150, 2968, True)
    people = {"S1": 200, "S3": 150, "S4": 200}
    assert told(question_of((loaded(people, ("REAR", 20)), aircraft()))) == (1, ("2",), 150, 2968, True)


def test_where_of_two_as_heavy_in_one_row_one_would_not_do_the_number_alone_is_told() -> None:
    # 10 US gal more on the left: -3,000 lb in; without the 180 lb on the right of row 2 it is -4,800, where
    # 1.5 in of 2,440 lb with the least fuel at landing are 3,660. Without those on the left it is within.
    across = envelope((F(-3, 2), 1000), (F(-3, 2), 5000), (F(3, 2), 5000), (F(3, 2), 1000), axis="lateral")
    basis = replace(wide(2850), envelopes=(*wide(2850).envelopes, across))
    document = loaded({"S3": 180, "S4": 180}, at_engine_start=gallons(40, 30), minimum_at_landing=q(288))
    assert told(question_of((document, basis))) == (1, (), 0, 2788, True)
    # With 181 lb on the left it is told how heavy.
    document["passengers"][0]["weight"] = q(181)
    assert told(question_of((document, basis))) == (1, ("2",), 181, 2788, True)


def test_when_the_time_runs_out_on_the_way_nobody_is_told() -> None:
    question = allowed(2868)  # two of row 2
    ticks = iter(range(10_000))
    question.clock = lambda: float(next(ticks))
    for seconds in (0, 1, 3):
        question.until = question.clock() + seconds
        assert told(question) is None


def test_nobody_with_an_infant_and_nobody_whom_an_event_names_is_asked() -> None:
    document = loaded(FOUR)
    document["passengers"][3] |= INFANT
    document["persons_on_board"] += 1
    basis = wide(3098)  # 3,268 lb: 170 too much
    assert told(question_of((document, basis))) == (1, ("1", "2"), 170, 3098, True)
    document["sequence"] = [{"after_burning": q(30), "leave": [{"seat": "S3"}]}]
    assert told(question_of((document, basis))) == (1, ("1",), 170, 3098, True)


def test_what_lies_on_a_seat_stays_with_who_sits_there() -> None:
    document = loaded({"S1": 170, "S2": 150})
    document["passengers"][1] |= {"category": "child", "restraint": q(25)}
    # 2,893 lb: 175 too much, the child with its restraint.
    assert told(question_of((document, wide(2718)))) == (1, ("1",), 175, 2718, True)


def test_without_time_or_passengers_nobody_is_told() -> None:
    question = allowed(3098)
    question.until = 0.0
    assert told(question) is None
    assert told(allowed(2500, {})) is None


def test_rows_are_named_by_the_basis_or_counted_from_the_front() -> None:
    seats = (
        seat("P", 90, 0, "crew"),
        seat("A", 130, 0, "passenger"),
        seat("B", 110, -5, "passenger"),
        seat("C", 110, 5, "either"),
        replace(seat("D", 150, 0, "passenger"), row="club"),
        replace(seat("E", 90, 0, "crew"), row="1"),
    )
    assert rows_of(seats) == {"P": "", "A": "2", "B": "1", "C": "1", "D": "club", "E": "1"}


def test_numbered_rows_stand_in_their_order_and_before_named_ones() -> None:
    basis = aircraft({"take_off": 2900})
    names = {"S1": "club", "S2": "10", "S3": "9", "S4": "bar"}
    seats = tuple(replace(one, row=names.get(one.id)) for one in basis.seats)
    question = question_of((loaded(dict.fromkeys(names, 180)), replace(basis, seats=seats)))
    left = fewest_left(question)
    assert left is not None
    assert (left.people, left.rows, left.weight) == (3, ("9", "10", "bar", "club"), 540)
