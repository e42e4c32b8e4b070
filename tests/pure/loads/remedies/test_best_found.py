"""What is not proved to be the smallest is told as the best found: a solver that ran out of time, or a limit
that the program does not know, such as a trim setting.
"""

from collections.abc import Callable, Sequence
from dataclasses import replace
from typing import Any

import pytest

from fleet.trim import Trim, TrimLine, TrimTable
from loads.balance.remedies.amounts import least_ballast, least_removed
from loads.balance.remedies.program import Outcome, Program, Solution
from loads.balance.remedies.question import Question
from tests.pure.loads.making import SOURCE, F
from tests.pure.loads.remedies.rejects import question_of, too_far_aft, too_heavy_to_take_off
from tests.pure.loads.remedies.test_smallest_amounts import reseated, shifted, told

Change = Callable[[Solution], Outcome]


def proved(solution: Solution) -> Outcome:
    return solution


def unproved(solution: Solution) -> Outcome:
    return solution._replace(proven=False)


def too_late(solution: Solution) -> Outcome:
    assert solution
    return "out of time"


def solved_as(monkeypatch: pytest.MonkeyPatch, changes: Sequence[Change]) -> None:
    """Let the solver's answers be changed like this, one by one, and the last for all that follow."""
    solve, left = Program.solve, list(changes)

    def changed(program: Program, seconds: float) -> Outcome:
        change = left.pop(0) if len(left) > 1 else left[0]
        solution = solve(program, seconds)
        return change(solution) if isinstance(solution, Solution) else solution

    monkeypatch.setattr(Program, "solve", changed)


@pytest.mark.parametrize(
    ("answers", "wanted"),
    [
        ([proved], "S3 to S1"),
        ([unproved, proved], "S3 to S1 ?"),  # fewer might do
        ([proved, unproved], "S3 to S1 ?"),  # as few with less weight might do
        ([unproved], "S3 to S1 ?"),
        ([proved, too_late], "S3 to S1 ?"),
        ([too_late], "none"),
    ],
)
def test_moves_are_proved_only_by_both_programs(
    monkeypatch: pytest.MonkeyPatch, answers: list[Change], wanted: str
) -> None:
    solved_as(monkeypatch, answers)
    assert told(reseated(question_of(too_far_aft()))) == wanted


@pytest.mark.parametrize(
    ("answers", "wanted"),
    [([proved], "28 of /items/0"), ([unproved], "28 of /items/0 ?"), ([too_late], "none")],
)
def test_an_amount_is_proved_only_by_its_program(
    monkeypatch: pytest.MonkeyPatch, answers: list[Change], wanted: str
) -> None:
    solved_as(monkeypatch, answers)
    assert told(least_removed(question_of(too_heavy_to_take_off()))) == wanted


def trimmed(lowest: Any) -> Question:
    """`too_far_aft` with a trim setting of 105 less the CG: 3 at 102 in."""
    table = TrimTable(None, (TrimLine(None, ((F(95), F(10)), (F(105), F(0))), SOURCE),))
    document, basis = too_far_aft()
    return question_of(
        (document, replace(basis, trim=Trim("arm", "units", F(1, 10), F(lowest), F(9), SOURCE, (table,))))
    )


@pytest.mark.parametrize(
    ("kind", "lowest", "wanted"),
    [
        # At take-off 9,000 lb in and 2,948 lb. With 73.1 lb in the nose it is 101.769 in, a setting of 3.231.
        (least_ballast, "3.23", "73.1 in NOSE"),
        # 101.754 in are reached with 3,829.2 / 51.754 lb.
        (least_ballast, "3.246", "74 in NOSE ?"),
        # Without 79.2 lb of the rear it is 101.757 in; 101.75 are 3,841 lb in at 48.25 a pound: 79.61 lb.
        (least_removed, "3.25", "79.7 of /items/0 ?"),
        # From rear to nose 100 a pound. With 38 lb it is 101.764 in, a setting of 3.236.
        (shifted, "3.23", "38 of /items/0 to NOSE"),
        (shifted, "3.25", "38.5 of /items/0 to NOSE ?"),
        # A setting of 5.33 is 99.67 in, 972.84 lb in forward of 100 in: 99.73 lb. All of it gives 5.3392.
        (shifted, "5.33", "99.8 of /items/0 to NOSE ?"),
        (shifted, "5.339", "100 of /items/0 to NOSE ?"),
        (shifted, "5.35", "none"),
    ],
)
def test_a_limit_the_program_does_not_know_is_gone_up_to_in_tenths(
    kind: Callable[[Question], Any], lowest: str, wanted: str
) -> None:
    assert told(kind(trimmed(lowest))) == wanted
