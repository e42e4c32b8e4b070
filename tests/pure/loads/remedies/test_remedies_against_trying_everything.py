"""Every smallest change equals the least of all changes there are, on drawn small cabins of up to five seats
and three holds. The judge is `brute`, which tries everything by the whole assessment.

The figures were computed on both sides; nothing here is taken from a publication.
"""

import os
from fractions import Fraction

import pytest

from loads.balance.remedies.amounts import least_ballast, least_removed
from loads.balance.remedies.arranging import Found, arranged
from loads.balance.remedies.fuelling import less_fuel
from loads.balance.remedies.question import TENTH, Question
from loads.balance.remedies.reach import ways_of
from loads.balance.remedies.steps import Ballast, Refuel, Reseat, Shift, Take, taken
from tests.pure.loads.remedies.brute import (
    fewest_items,
    fewest_moved,
    least_fuel_out,
    least_off,
    least_on,
    small,
)
from tests.pure.loads.remedies.cabins import asked

MOST_BALLAST = 30  # tenths: beyond that trying everything takes too long
CABINS = range(60 if os.environ.get("TAREBOOK_LONG_FORMS") == "1" else 14)


def question_of(number: int) -> Question:
    return asked(*small(number))


def weight_of(found: Found | None) -> Fraction | None:
    if found is None:
        return None
    return sum((s.weight for s in found.steps if isinstance(s, Shift | Take | Ballast)), Fraction(0))


def truly_within(question: Question, found: Found | None) -> bool:
    return found is None or question.judge(taken(question.declared, found.steps)).verdict == "within"


@pytest.mark.parametrize("number", CABINS)
def test_the_fewest_people_move_and_of_these_the_least_weight(number: int) -> None:
    question = question_of(number)
    if question.result.verdict != "outside":
        return
    found = arranged(question, ways_of(question.result, question.ready), people=True, items=False)
    moved = None
    if found is not None:
        weights = [step.person.weight or Fraction(0) for step in found.steps if isinstance(step, Reseat)]
        moved = len(weights), sum(weights, Fraction(0))
        assert found.proven
    assert moved == fewest_moved(question)
    assert truly_within(question, found)


@pytest.mark.parametrize("number", CABINS)
def test_the_fewest_lines_of_items_move_and_of_these_the_least_weight(number: int) -> None:
    question = question_of(number)
    if question.result.verdict != "outside":
        return
    found = arranged(question, ways_of(question.result, question.ready), people=False, items=True)
    moved = None if found is None else (len(found.steps), weight_of(found))
    assert moved == fewest_items(question)
    assert truly_within(question, found)


@pytest.mark.parametrize("number", CABINS)
def test_the_least_weight_of_items_stays_behind(number: int) -> None:
    question = question_of(number)
    if question.result.verdict != "outside":
        return
    found = least_removed(question)
    assert weight_of(found) == least_off(question)
    assert found is None or found.proven
    assert truly_within(question, found)


@pytest.mark.parametrize("number", CABINS)
def test_the_least_ballast_is_loaded(number: int) -> None:
    question = question_of(number)
    if question.result.verdict != "outside":
        return
    found = least_ballast(question)
    least, tried = weight_of(found), least_on(question, MOST_BALLAST)
    assert tried == (least if least is not None and least <= MOST_BALLAST * TENTH else None)
    assert truly_within(question, found)


@pytest.mark.parametrize("number", CABINS)
def test_the_least_fuel_is_left_out(number: int) -> None:
    question = question_of(number)
    if question.result.verdict != "outside":
        return
    found = less_fuel(question)
    out = None
    if found is not None:
        out = -sum((step.volume for step in found.steps if isinstance(step, Refuel)), Fraction(0))
    assert out == least_fuel_out(question)
    assert truly_within(question, found)


def test_the_drawn_cabins_are_no_empty_promise() -> None:
    """Enough of them are outside, and enough of these can be mended in each way."""
    counts = dict.fromkeys(("people", "items", "off", "on", "fuel"), 0)
    for number in range(60):
        question = question_of(number)
        if question.result.verdict != "outside":
            continue
        ways = ways_of(question.result, question.ready)
        counts["people"] += arranged(question, ways, people=True, items=False) is not None
        counts["items"] += arranged(question, ways, people=False, items=True) is not None
        counts["off"] += least_removed(question) is not None
        counts["on"] += least_ballast(question) is not None
        counts["fuel"] += less_fuel(question) is not None
    assert min(counts.values()) >= 4, counts
