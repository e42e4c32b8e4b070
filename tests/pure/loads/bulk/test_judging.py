"""What is noted of the room that is left to a limit, with what error the room has."""

import numpy as np

from loads.balance.bulk.judging import Errors, Judge
from loads.balance.bulk.known import known_of
from loads.balance.bulk.reading import Batch
from tests.pure.loads.making import twin, twin_empty

INFINITE = float("inf")


def judge_of(count):
    known = known_of(twin(), "six-seat", twin_empty())
    assert known is not None
    one = np.zeros(count)
    batch = Batch(np.zeros((count, 9)), np.zeros((count, 4)), one + 6, one, one, one, one, one)
    return Judge(known, batch, Errors(1.0, 2.0, 3.0))


def noted(judge):
    return (
        judge.outside.tolist(),
        judge.unsure.tolist(),
        [(code, fails.tolist(), over.tolist()) for code, fails, over in judge.broken],
    )


def test_a_judge_begins_with_nothing_found():
    judge = judge_of(2)

    assert noted(judge) == ([False] * 2, [False] * 2, [])
    assert judge.refused.tolist() == [False] * 2
    assert [each.dtype for each in (judge.outside, judge.unsure, judge.refused)] == [np.bool_] * 3
    assert judge.errors == Errors(1.0, 2.0, 3.0)


def test_less_room_than_none_by_more_than_the_error_is_outside_and_within_it_is_unsure():
    judge = judge_of(7)
    judge.left("weight.ramp", np.array([-2.0, -1.0, -0.5, 0.0, 1.0, 1.5, INFINITE]), 1.0)

    assert noted(judge) == (
        [True, False, False, False, False, False, False],
        [False, True, True, True, True, False, False],
        [("weight.ramp", [True] + [False] * 6, [2.0, 1.0, 0.5, 0.0, -1.0, -1.5, -INFINITE])],
    )


def test_room_of_just_the_error_is_unsure_and_a_hair_more_is_enough():
    judge = judge_of(2)
    judge.left("weight.ramp", np.array([1.0001, 5.0]), 1.0)
    assert noted(judge) == ([False] * 2, [False] * 2, [])

    judge.left("weight.ramp", np.array([1.0, 5.0]), 1.0)
    assert noted(judge) == ([False] * 2, [True, False], [])


def test_what_several_limits_find_adds_up_in_their_order():
    judge = judge_of(3)
    judge.left("weight.ramp", np.array([-3.0, 9.0, 0.0]), 1.0)
    judge.left("seat.ROW1-L", np.array([9.0, -4.0, 9.0]), 1.0)

    outside, unsure, broken = noted(judge)
    assert (outside, unsure) == ([True, True, False], [False, False, True])
    assert [code for code, _, _ in broken] == ["weight.ramp", "seat.ROW1-L"]


def test_without_loads_there_is_nothing_to_note():
    judge = judge_of(0)
    judge.left("weight.ramp", np.zeros(0), 1.0)

    assert noted(judge) == ([], [], [])
